"""
The checks that the points of every file pass before they are a sweep.

A reader hands over its points in the file's order, with their line numbers; it gets them back rising, each frequency
once, with findings about whatever was put right. `Points.values` may hold any number of complex columns, so that
one-ports and two-ports pass the same checks.
"""


from typing import NamedTuple

import numpy as np
from numpy.typing import NDArray

from feedpoint.errors import SweepRefused
from feedpoint.finding import Finding
from feedpoint.line import ComplexArray, RealArray
from feedpoint.sweep.record import HIGHEST_HZ

# Repeated points agree when they differ by no more than instruments print: 1e-6 of full reflection.
_AGREEMENT = 1e-6
# An analyzer in order reads at most about 1.005 on an open circuit; 1.05 is no calibrated reflection.
DOUBTFUL_MAGNITUDE = 1.05


class Points(NamedTuple):
    """Points of a file: frequency (F,) [Hz], values (F, ...), and the line that each came from (F,)."""

    frequency_hz: RealArray
    values: ComplexArray
    line: NDArray[np.intp]

    def chosen(self, which: slice | NDArray[np.bool_]) -> "Points":
        """Return some of the points."""
        return Points(self.frequency_hz[which], self.values[which], self.line[which])


def in_order(points: Points, source: str) -> tuple[Points, list[Finding]]:
    """
    Return the points with rising frequencies, and what had to be put right.

    A point at 0 Hz is left out, a descending file is reversed, repeated points that agree are merged.

    Raises
    ------
    SweepRefused
        For a frequency that is negative, out of order, or repeated with another value, and if no point is left.
    """
    findings: list[Finding] = []
    points = _without_zero_frequency(points, source, findings)
    steps = np.diff(points.frequency_hz)
    if points.frequency_hz.size > 1 and np.all(steps <= 0) and np.any(steps < 0):
        points = points.chosen(slice(None, None, -1))
        message = f"{source}: the frequencies descend; the sweep was reversed."
        findings.append(Finding("doubtful-file", "warning", message))
    return _merged(points, source, findings), findings


def _without_zero_frequency(points: Points, source: str, findings: list[Finding]) -> Points:
    negative = points.frequency_hz < 0
    if np.any(negative):
        at = int(np.argmax(negative))
        raise SweepRefused(
            f"the frequency {points.frequency_hz[at] / 1e6:.10g} MHz is negative; expected a positive one.",
            source=source,
            line=int(points.line[at]),
        )
    beyond = points.frequency_hz > HIGHEST_HZ
    if np.any(beyond):
        at = int(np.argmax(beyond))
        raise SweepRefused(
            f"the frequency {points.frequency_hz[at]:g} Hz is none of a sweep; expected at most {HIGHEST_HZ:g} Hz. Is "
            "the unit right?",
            source=source,
            line=int(points.line[at]),
        )
    at_zero = points.frequency_hz == 0
    if np.any(at_zero):
        message = f"{source}, line {points.line[np.argmax(at_zero)]}: the point at 0 Hz was left out."
        findings.append(Finding("zero-frequency", "note", message, {"points": int(np.sum(at_zero))}))
        points = points.chosen(~at_zero)
    if points.frequency_hz.size == 0:
        raise SweepRefused("no data points; expected at least one above 0 Hz.", source=source)
    return points


def _merged(points: Points, source: str, findings: list[Finding]) -> Points:
    steps = np.diff(points.frequency_hz)
    if np.any(steps < 0):
        at = int(np.argmax(steps < 0)) + 1
        raise SweepRefused(
            f"the frequency {points.frequency_hz[at]:.10g} Hz comes after {points.frequency_hz[at - 1]:.10g} Hz; "
            "expected rising (or throughout falling) frequencies. Were two sweeps put into one file?",
            source=source,
            line=int(points.line[at]),
        )
    repeated = np.flatnonzero(steps == 0) + 1
    if repeated.size == 0:
        return points
    apart = np.abs(points.values[repeated] - points.values[repeated - 1]).reshape(repeated.size, -1).max(axis=1)
    if np.any(apart > _AGREEMENT):
        at = int(repeated[np.argmax(apart > _AGREEMENT)])
        raise SweepRefused(
            f"the frequency {points.frequency_hz[at]:.10g} Hz of line {points.line[at - 1]} is repeated with another "
            "value; expected each frequency once. Delete the wrong one in a copy of the file.",
            source=source,
            line=int(points.line[at]),
        )
    message = f"{source}: {repeated.size} repeated point(s) with the same values were merged."
    findings.append(Finding("repeated-points", "note", message, {"points": int(repeated.size)}))
    keep = np.ones(points.frequency_hz.size, dtype=bool)
    keep[repeated] = False
    return points.chosen(keep)


def magnitude_finding(points: Points, source: str) -> list[Finding]:
    """Finding about reflections (F,) far above 1, which no calibrated analyzer shows of a passive load."""
    magnitude = np.abs(points.values)
    worst = int(np.argmax(magnitude))
    if magnitude[worst] <= DOUBTFUL_MAGNITUDE:
        return []
    message = (
        f"{source}, line {points.line[worst]}: the reflection reaches {magnitude[worst]:.3g} at "
        f"{points.frequency_hz[worst] / 1e6:.6g} MHz; a calibrated sweep of something passive stays below "
        f"{DOUBTFUL_MAGNITUDE}. Check the format words of the file and the calibration."
    )
    return [Finding("doubtful-file", "warning", message, {"gamma_magnitude": float(magnitude[worst])})]


