"""
Cables to simulate with: printed attenuation, and the two-term loss law that was fitted to it.

`conductor_loss` and `dielectric_loss` [dB/100 m with f in MHz, at 20 C] minimise the sum of squares of the relative
difference between true matched loss and printed loss; `fitted_terms` finds them, and a test holds the kept figures
against it. They are kept rounded so that nothing simulated hangs on the last digits of a solver.
"""

from dataclasses import dataclass

import numpy as np
from scipy.optimize import least_squares

from tests.simulated.simulator import DB_PER_100M_PER_NEPER_PER_M, Section, per_metre

FEET_PER_METRE = 1 / 0.3048


@dataclass(frozen=True)
class PrintedCable:
    """A cable as its source prints it: (MHz, dB/100 m) points, with the two terms fitted to them."""

    z0_ohm: float
    velocity_factor: float
    points: tuple[tuple[float, float], ...]
    source: str
    conductor_loss: float
    dielectric_loss: float

    def section(self, length_m: float, **changes: float) -> dict[str, float]:
        """A section of this cable for the simulator; `changes` replace or add keys."""
        figures = {
            "z0_ohm": self.z0_ohm,
            "velocity_factor": self.velocity_factor,
            "conductor_loss": self.conductor_loss,
            "dielectric_loss": self.dielectric_loss,
        }
        return {**figures, "length_m": length_m, **changes}


def per_100ft(*points: tuple[float, float]) -> tuple[tuple[float, float], ...]:
    """Points printed in dB/100 ft, in dB/100 m."""
    return tuple((mhz, value * FEET_PER_METRE) for mhz, value in points)


def per_10m(*losses: float) -> tuple[tuple[float, float], ...]:
    """Points printed in dB/10 m at the eight frequencies of the society's table, in dB/100 m."""
    frequencies_mhz = (30, 50, 145, 430, 900, 1200, 1300, 2300)
    return tuple((mhz, value * 10) for mhz, value in zip(frequencies_mhz, losses, strict=True))


GUIDE = "a two-way-radio system training guide, appendix H, p. 65 (nominal attenuation of 50-ohm cables)"
SOCIETY = "a national amateur-radio society's table of JIS C 3501 and foam cables (dB/10 m)"
SPECIFICATION = "a specification sheet of 1999 for JCS 5423 cables (standard attenuation at 20 C)"

CABLES = {
    "RG-58C/U": PrintedCable(
        50.0, 0.66, per_100ft((50, 3.30), (150, 6.10), (450, 11.75), (850, 17.75)), GUIDE, 1.38944, 0.0206474,
    ),
    "RG-213/U": PrintedCable(
        50.0, 0.66, per_100ft((50, 1.50), (150, 2.70), (450, 4.97), (850, 7.53)), GUIDE, 0.646536, 0.0064858,
    ),
    "5D-2V": PrintedCable(
        50.0, 0.67, per_10m(0.44, 0.60, 1.05, 1.85, 3.0, 3.5, 3.7, 5.3), SOCIETY, 0.784084, 0.00665996,
    ),
    "8D-2V": PrintedCable(
        50.0, 0.67, per_10m(0.30, 0.40, 0.72, 1.35, 2.15, 2.6, 2.7, 3.9), SOCIETY, 0.520165, 0.00636452,
    ),
    "10D-2V": PrintedCable(
        50.0, 0.67, per_10m(0.22, 0.31, 0.56, 1.05, 1.7, 2.1, 2.15, 3.2), SOCIETY, 0.384242, 0.00605244,
    ),
    "10D-FB": PrintedCable(
        50.0, 0.79, per_10m(0.17, 0.22, 0.39, 0.72, 1.1, 1.3, 1.4, 1.95), SOCIETY, 0.29687, 0.00235105,
    ),
    "S-5C-FB": PrintedCable(
        75.0, 0.80,
        ((90, 5.88), (220, 9.50), (470, 14.5), (770, 19.2), (1300, 26.1), (1550, 29.1), (1770, 31.5), (2000, 34.0),
         (2150, 35.5), (2602, 40.0)), SPECIFICATION, 0.583512, 0.00393769,
    ),
}  # fmt: skip


def true_loss_db_per_100m(frequency_hz: np.ndarray, cable: Section, temperature_c: float = 20.0) -> np.ndarray:
    """Matched loss per 100 m, (F,): the real part of sqrt(Z' Y')."""
    series, shunt = per_metre(frequency_hz, cable, temperature_c)
    return DB_PER_100M_PER_NEPER_PER_M * np.sqrt(series * shunt).real


def fitted_terms(cable: PrintedCable) -> tuple[float, float]:
    """Conductor and dielectric term of the law whose true loss fits the printed points best, relatively; both >= 0."""
    frequency_hz, printed = np.array(cable.points).T * np.array([[1e6], [1.0]])

    def misfit(terms: np.ndarray) -> np.ndarray:
        section = cable.section(1.0, conductor_loss=terms[0], dielectric_loss=terms[1])
        return true_loss_db_per_100m(frequency_hz, section) / printed - 1

    solution = least_squares(misfit, [1.0, 0.01], bounds=(0, np.inf), x_scale=[1.0, 0.01], xtol=1e-15, ftol=1e-15)
    return float(solution.x[0]), float(solution.x[1])
