"""Whether the description of the run fits the sweep: its step, its reference, and the data of the cables."""

import numpy as np

from feedpoint.finding import Figure, Finding
from feedpoint.line import RealArray
from feedpoint.run.cable import CableSection
from feedpoint.run.record import Run

# The reflection turns by twice the electrical length: by a quarter turn in an eighth of a wavelength.
_QUARTER_TURN = 0.125
# A law fitted to points is trusted this factor beyond them.
_TRUSTED_BEYOND = 3.0
_POOR_FIT = 0.05
_MISMATCH = 0.10
# Losses of ideal elements come out within this of 0.
_ROUNDING_DB = 1e-9


def coarse_step(frequency_hz: RealArray, electrical_length: RealArray) -> list[Finding]:
    """Finding about a run, `electrical_length` (S, F) in wavelengths, that turns far between two points."""
    if frequency_hz.size < 2 or electrical_length.shape[0] == 0:
        return []
    steps = np.diff(electrical_length.sum(axis=0))
    widest = int(np.argmax(steps))
    if steps[widest] <= _QUARTER_TURN:
        return []
    turn_deg = float(720.0 * steps[widest])
    finer = float(np.diff(frequency_hz)[widest] * _QUARTER_TURN / steps[widest])
    message = (
        f"The described run turns the reflection by {turn_deg:.0f} degrees between two points of the sweep (at "
        f"{frequency_hz[widest] / 1e6:.6g} MHz); what lies between them is a guess. Sweep in steps of "
        f"{finer / 1e3:.3g} kHz or less."
    )
    figures = {"turn_deg": turn_deg, "frequency_hz": float(frequency_hz[widest]), "step_that_suffices_hz": finer}
    return [Finding("coarse-step", "note", message, figures)]


def reference_mismatch(run: Run, reference_ohm: float) -> list[Finding]:
    """Finding about a sweep whose reference is not the characteristic resistance of the first cable."""
    first = next((section for section in run.sections if isinstance(section, CableSection)), None)
    if first is None or abs(reference_ohm - first.z0_ohm.value) <= _MISMATCH * first.z0_ohm.value:
        return []
    message = (
        f"The sweep refers to {reference_ohm:g} ohm, the first cable ({first.name}) has {first.z0_ohm.value:g} ohm. "
        "The impedances are right all the same; SWR and return loss refer to the sweep's resistance. --swr-reference "
        "chooses another."
    )
    figures = {"reference_ohm": reference_ohm, "z0_ohm": first.z0_ohm.value}
    return [Finding("reference-mismatch", "note", message, figures)]


def loss_data(run: Run, frequency_hz: RealArray) -> list[Finding]:
    """Findings about loss laws that do not follow their points, or are used far outside them."""
    findings = []
    for number, section in enumerate(run.sections, start=1):
        if isinstance(section, CableSection) and section.length_m.value > 0:
            label = f"section {number} ({section.name})"
            findings += _poor_fit(section, label) + _outside(section, label, frequency_hz)
    return findings


def _poor_fit(section: CableSection, label: str) -> list[Finding]:
    residual = section.loss.value.fit_residual
    if residual is None or residual <= _POOR_FIT:
        return []
    message = (
        f"The loss points of {label} differ from the best loss law by up to {100 * residual:.1f} %; the loss between "
        "them is no better known. Check the points; a copper-clad-steel conductor wants steel_core = true."
    )
    return [Finding("poor-loss-fit", "warning", message, {"section": section.name, "residual_percent": 100 * residual})]


def _outside(section: CableSection, label: str, frequency_hz: RealArray) -> list[Finding]:
    valid = section.loss.value.valid_hz
    low, high = float(frequency_hz[0]), float(frequency_hz[-1])
    if valid is None or (low * _TRUSTED_BEYOND >= valid[0] and high <= valid[1] * _TRUSTED_BEYOND):
        return []
    points = f"{valid[0] / 1e6:g} MHz" if valid[0] == valid[1] else f"{valid[0] / 1e6:g} to {valid[1] / 1e6:g} MHz"
    message = (
        f"The loss points of {label} reach from {points}, the sweep from {low / 1e6:.4g} to {high / 1e6:.4g} MHz: more "
        "than a factor 3 outside. Add a loss point near the sweep's frequencies."
    )
    if valid[0] == valid[1]:
        message = message.replace(f"reach from {points}", f"stand at {points} alone")
    figures: dict[str, Figure] = {
        "section": section.name,
        "points_low_hz": valid[0],
        "points_high_hz": valid[1],
    }
    return [Finding("outside-loss-data", "warning", message, figures)]


def two_port_gain(run: Run, matched_loss_db: RealArray) -> list[Finding]:
    """Findings about sections, `matched_loss_db` (S, F) [dB], that give more than they receive, or cannot be told."""
    findings = []
    for number, (section, losses) in enumerate(zip(run.sections, matched_loss_db, strict=True), start=1):
        if not np.all(losses >= -_ROUNDING_DB):
            message = (
                f"Section {number} ({section.name}) has no loss between matched ends at some frequencies, or less than "
                "none: a rest of its calibration. Total losses are that much off."
            )
            findings.append(Finding("two-port-gain", "warning", message, {"section": section.name}))
    return findings
