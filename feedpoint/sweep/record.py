"""A sweep: one-port complex reflection against frequency."""

from collections.abc import Mapping
from dataclasses import dataclass, field
from types import MappingProxyType

import numpy as np
from numpy.typing import ArrayLike

from feedpoint.errors import SweepRefused
from feedpoint.finding import Finding
from feedpoint.line import ComplexArray, RealArray, read_only
from feedpoint.line.reflection import reflection_from_impedance

# Far beyond what any fault of an analyzer shows; squares of larger numbers overflow sooner or later.
MOST_MAGNITUDE = 1e6
# Wide for anything that is swept, and narrow enough that nothing overflows on its way.
LOWEST_HZ, HIGHEST_HZ = 1.0, 1e13
SMALLEST_REFERENCE_OHM, LARGEST_REFERENCE_OHM = 1e-3, 1e6


@dataclass(frozen=True, eq=False)
class Sweep:
    """
    One-port complex reflection against frequency, as saved by an analyzer.

    Attributes
    ----------
    frequency_hz : array (F,), F >= 1 [Hz]
        Finite, positive and strictly rising.
    gamma : complex array (F,)
        Reflection against `reference_ohm`; finite, exactly 1 for an open circuit. Both arrays are read-only copies.
    reference_ohm : float > 0 [ohm]
    source : str
        File name or another name that messages use.
    sha256 : str
        Of the file's bytes; empty for a sweep that was not read from a file.
    understood_as : mapping
        What the file was understood to be, in the words that `inspect` shows.
    comments : tuple of str
        Comment lines of the file.
    findings : tuple of Finding

    Raises
    ------
    SweepRefused
        If the arrays make no sweep.
    """

    frequency_hz: RealArray
    gamma: ComplexArray
    reference_ohm: float = 50.0
    source: str = "sweep"
    sha256: str = ""
    understood_as: Mapping[str, str | int | float] = field(default_factory=dict)
    comments: tuple[str, ...] = ()
    findings: tuple[Finding, ...] = ()

    def __post_init__(self) -> None:
        try:
            frequency = np.array(self.frequency_hz, dtype=float, ndmin=1)
            gamma = np.array(self.gamma, dtype=complex, ndmin=1)
            reference_ohm = float(self.reference_ohm)
        except (TypeError, ValueError):
            message = "frequencies, reflections or reference are no numbers."
            raise SweepRefused(message, source=self.source) from None
        problem = _problem(frequency, gamma, reference_ohm)
        if problem:
            raise SweepRefused(problem, source=self.source)
        object.__setattr__(self, "frequency_hz", read_only(frequency))
        object.__setattr__(self, "gamma", read_only(gamma))
        object.__setattr__(self, "reference_ohm", reference_ohm)
        object.__setattr__(self, "understood_as", MappingProxyType(dict(self.understood_as)))

    @classmethod
    def from_impedance(
        cls, frequency_hz: ArrayLike, impedance_ohm: ArrayLike, *, reference_ohm: float = 50.0, source: str = "sweep"
    ) -> "Sweep":
        """Sweep of an impedance (F,) [ohm], infinite values being open circuits, kept as its reflection."""
        try:
            impedance = np.asarray(impedance_ohm, dtype=complex)
        except (TypeError, ValueError):
            raise SweepRefused("the impedances are no numbers.", source=source) from None
        gamma = reflection_from_impedance(impedance, reference_ohm)
        return cls(np.asarray(frequency_hz, dtype=float), gamma, reference_ohm, source)


def _problem(frequency: RealArray, gamma: ComplexArray, reference_ohm: float) -> str:
    """Say what keeps the arrays from being a sweep; empty if nothing does."""
    if frequency.ndim != 1 or frequency.shape != gamma.shape:
        return f"{frequency.shape} frequencies and {gamma.shape} reflections; expected one of each per point."
    if frequency.size == 0:
        return "no points; a sweep has at least one."
    if not SMALLEST_REFERENCE_OHM <= reference_ohm <= LARGEST_REFERENCE_OHM:
        return f"the reference resistance is {reference_ohm} ohm; expected a positive number such as 50."
    if not (np.all(np.isfinite(frequency)) and np.all(np.isfinite(gamma))):
        return "a value is not finite; every frequency and reflection must be a number."
    if np.abs(gamma).max() > MOST_MAGNITUDE:
        return f"a reflection of {np.abs(gamma).max():.3g} is none; expected about 1 at most."
    if frequency[0] <= 0:
        return f"the frequency {frequency[0]:g} Hz is not positive."
    if not (frequency[0] >= LOWEST_HZ and frequency[-1] <= HIGHEST_HZ):
        return f"{frequency[0]:g} to {frequency[-1]:g} Hz; expected frequencies from {LOWEST_HZ:g} to {HIGHEST_HZ:g}."
    if np.any(np.diff(frequency) <= 0):
        return f"the frequencies do not rise at point {int(np.argmax(np.diff(frequency) <= 0)) + 2}."
    return ""
