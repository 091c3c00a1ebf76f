"""What an antenna cannot do: return more than it received."""

import numpy as np

from feedpoint.finding import Finding
from feedpoint.line import ComplexArray, RealArray

# Calibrated analyzers read up to about 1.005 on an open circuit; beyond 1.01 it is no rest of the calibration.
MOST_PASSIVE_MAGNITUDE = 1.01


def reflection_above_unity(frequency_hz: RealArray, gamma: ComplexArray, where: str, advice: str) -> list[Finding]:
    """Finding about a stated reflection (F,) that no passive load shows; `where` names the end of the run."""
    excess = _excess(frequency_hz, gamma)
    if excess is None:
        return []
    message = (
        f"The reflection at {where} reaches {excess['gamma_magnitude']:.4g} at {excess['frequency_hz'] / 1e6:.6g} MHz, "
        f"above {MOST_PASSIVE_MAGNITUDE} at {excess['points']} point(s): nothing passive returns more than it "
        f"received. {advice}"
    )
    return [Finding("reflection-above-unity", "error", message, excess)]


def loss_above_ceiling(frequency_hz: RealArray, shack: ComplexArray, feedpoint: ComplexArray) -> list[Finding]:
    """Finding about an antenna (F,) that returns more than it received although the shack end shows nothing odd."""
    excess = _excess(frequency_hz, feedpoint)
    if excess is None or _excess(frequency_hz, shack) is not None:
        return []
    message = (
        f"Through the described run the antenna would return {excess['gamma_magnitude']:.4g} times what reaches it at "
        f"{excess['frequency_hz'] / 1e6:.6g} MHz (above {MOST_PASSIVE_MAGNITUDE} at {excess['points']} point(s)): the "
        "described loss is too high. Check the length, the cable and the loss of the run sheet."
    )
    return [Finding("loss-above-ceiling", "error", message, excess)]


def _excess(frequency_hz: RealArray, gamma: ComplexArray) -> dict[str, float | int] | None:
    magnitude = np.abs(gamma)
    worst = int(np.argmax(magnitude))
    if not magnitude[worst] > MOST_PASSIVE_MAGNITUDE:
        return None
    return {
        "gamma_magnitude": float(magnitude[worst]),
        "frequency_hz": float(frequency_hz[worst]),
        "points": int(np.count_nonzero(magnitude > MOST_PASSIVE_MAGNITUDE)),
    }
