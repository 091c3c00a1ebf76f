"""Values read off a display: ``17.8-22j@14.2MHz`` is one point of a sweep."""

import re
from collections.abc import Sequence
from dataclasses import replace
from itertools import pairwise

import numpy as np

from feedpoint.assumed import Assumed
from feedpoint.errors import SweepRefused, WrongUsage, quoted
from feedpoint.line.reflection import OPEN_CIRCUIT_OHM
from feedpoint.sweep.record import Sweep
from feedpoint.units import NUMBER, parse_frequency_hz

_UNSIGNED = NUMBER.removeprefix("[+-]?")
# The imaginary unit stands before or after its number: 17.8-22j, 17.8-j22, -j22, 50. A real part ends at a sign.
_IMPEDANCE = re.compile(
    rf"(?:(?P<real>[+-]?{_UNSIGNED})(?=[+-]|ohm|Ω|$))?"
    rf"(?:(?P<sign>[+-]?)(?:j(?P<after>{_UNSIGNED})|(?P<before>{_UNSIGNED})j))?(?:ohms?|Ω)?",
    re.ASCII | re.IGNORECASE,
)
_OPEN = ("inf", "open")


def parse_reading(text: str) -> tuple[float, complex]:
    """
    Return frequency [Hz] and impedance [ohm] of a reading such as ``17.8-22j@14.2MHz``, ``17.8-j22@14.2MHz``.

    ``inf`` or ``open`` stands for an open circuit.

    Raises
    ------
    WrongUsage
        For anything else.
    """
    impedance, at_sign, frequency = text.partition("@")
    if not at_sign:
        raise WrongUsage(f"{quoted(text)} is not a reading; write it like 17.8-22j@14.2MHz.")
    return parse_frequency_hz(frequency), parse_impedance_ohm(impedance, text)


def parse_impedance_ohm(text: str, whole: str = "") -> complex:
    """Return the impedance [ohm] that ``17.8-22j`` or ``17.8-j22`` is; `whole` is quoted in the refusal."""
    bare = re.sub(r"\s", "", text)
    if bare.lower() in _OPEN:
        return OPEN_CIRCUIT_OHM
    match = _IMPEDANCE.fullmatch(bare)
    reactance = match and (match["after"] or match["before"])
    if match is None or not (match["real"] or reactance):
        raise WrongUsage(f"{quoted(whole or text)}: {quoted(text)} is not an impedance; write it like 17.8-22j.")
    sign = -1.0 if match["sign"] == "-" else 1.0
    value = complex(float(match["real"] or 0.0), sign * float(reactance or 0.0))
    if not np.isfinite(value):
        raise WrongUsage(f"{quoted(whole or text)}: the number is too large.")
    return value


def sweep_of_readings(texts: Sequence[str], reference: Assumed[float]) -> Sweep:
    """
    Return the sweep of readings, in any order; its reflection refers to `reference` [ohm], and it keeps whose word
    that is.

    Raises
    ------
    WrongUsage
        For a text that is no reading, or two readings at one frequency.
    """
    readings = sorted((parse_reading(text) for text in texts), key=lambda reading: reading[0])
    frequencies = [frequency for frequency, _ in readings]
    for before, after in pairwise(frequencies):
        if before == after:
            raise WrongUsage(f"two readings at {after / 1e6:.9g} MHz; expected each frequency once.")
    reference_ohm = reference.value
    impedances = [impedance for _, impedance in readings]
    if any(impedance == -reference_ohm for impedance in impedances):
        raise WrongUsage(f"an impedance of {-reference_ohm:g} ohm has no reflection against {reference_ohm:g} ohm.")
    source = texts[0] if len(texts) == 1 else f"{len(texts)} readings"
    try:
        sweep = Sweep.from_impedance(frequencies, impedances, reference_ohm=reference_ohm, source=source)
        return replace(sweep, understood_as={"format": "readings", "reference_origin": reference.origin})
    except SweepRefused as refusal:
        # A value on the command line, not a file.
        raise WrongUsage(refusal.message, source=source) from None
