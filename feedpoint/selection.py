"""Which rows of a result are shown: those that were asked for, or about twenty telling ones."""

from collections.abc import Iterable
from typing import NamedTuple

import numpy as np
from numpy.typing import NDArray

from feedpoint.errors import WrongUsage
from feedpoint.finding import Finding
from feedpoint.landmarks import Landmarks
from feedpoint.line import ComplexArray, RealArray
from feedpoint.result import Columns, FeedpointResult

# Rows of a table that a screen holds together with the summary above it.
TELLING_ROWS = 20
_MOST_LANDMARK_ROWS = 14
# A frequency that differs from a point of the sweep by rounding is that point.
_SAME_FREQUENCY = 1e-9

Indices = NDArray[np.intp]


class RowChoice(NamedTuple):
    """What was asked for: single frequencies and ends of a range [Hz], every how-many-th point, all of them."""

    at_hz: tuple[float, ...] = ()
    from_hz: float | None = None
    to_hz: float | None = None
    every: int | None = None
    all_rows: bool = False

    @property
    def picks_points(self) -> bool:
        """Whether points of the sweep are asked for, beside or instead of single frequencies."""
        return self.from_hz is not None or self.to_hz is not None or self.every is not None or self.all_rows


class Rows(NamedTuple):
    """Rows of a result: every column (N,), and the reflection (N,) that an .s1p file holds."""

    columns: Columns
    saved_gamma: ComplexArray
    points_of_sweep: int
    thinned: bool
    findings: tuple[Finding, ...] = ()


def chosen_rows(result: FeedpointResult, choice: RowChoice, *, thin: bool) -> Rows:
    """
    Return the rows that were asked for.

    Parameters
    ----------
    choice : RowChoice
        Without any, all points are meant.
    thin : bool
        Whether about twenty telling rows may stand for a whole range (in tables, never in files).

    Raises
    ------
    WrongUsage
        For frequencies outside the sweep, and a range without points.
    """
    in_range = _range(result, choice) if choice.picks_points or not choice.at_hz else np.array([], dtype=int)
    thinned = thin and choice.every is None and not choice.all_rows and in_range.size > TELLING_ROWS + 4
    if thinned:
        in_range = telling_points(result, in_range)
    asked, between = _asked_for(result, choice)
    rows = _rows(result, np.array(sorted({*in_range.tolist(), *asked.tolist()}), dtype=int))
    if between.size == 0:
        return Rows(*rows, result.frequency_hz.size, thinned)
    said = (_said(between, result),)
    return Rows(*_merged(rows, _rows(result.at(between))), result.frequency_hz.size, thinned, said)


def _said(between: RealArray, result: FeedpointResult) -> Finding:
    frequencies = ", ".join(f"{frequency / 1e6:.9g}" for frequency in between)
    where = " at the antenna terminals" if result.run.sections else ""
    message = (
        f"{frequencies} MHz: between points of the sweep; the reflection{where} was interpolated (cubic, real and "
        "imaginary part)."
    )
    return Finding("interpolated-row", "note", message, {"rows": int(between.size)})


def _asked_for(result: FeedpointResult, choice: RowChoice) -> tuple[Indices, RealArray]:
    """Indices of the points that single frequencies name, and the frequencies [Hz] that lie between points."""
    frequency = result.frequency_hz
    asked = np.array(sorted(set(choice.at_hz)), dtype=float)
    nearest = np.searchsorted((frequency[1:] + frequency[:-1]) / 2.0, asked)
    on_point = np.isclose(asked, frequency[nearest], rtol=_SAME_FREQUENCY, atol=0.0)
    return nearest[on_point], asked[~on_point]


def _range(result: FeedpointResult, choice: RowChoice) -> Indices:
    frequency = result.frequency_hz
    low = frequency[0] if choice.from_hz is None else choice.from_hz * (1 - _SAME_FREQUENCY)
    high = frequency[-1] if choice.to_hz is None else choice.to_hz * (1 + _SAME_FREQUENCY)
    points = np.flatnonzero((frequency >= low) & (frequency <= high))[:: choice.every or 1]
    if points.size == 0:
        ends = ((" from", choice.from_hz), (" up to", choice.to_hz))
        asked = "".join(f"{word} {end / 1e6:.9g}" for word, end in ends if end is not None)
        raise WrongUsage(
            f"no point of the sweep lies{asked} MHz; it reaches from {frequency[0] / 1e6:.9g} to "
            f"{frequency[-1] / 1e6:.9g} MHz.",
            source=result.sweep.source,
        )
    return points


def _rows(result: FeedpointResult, points: Indices | slice = slice(None)) -> tuple[Columns, ComplexArray]:
    saved = result.gamma if result.direction == "deembed" else result.saved_shack_gamma()
    return {name: values[points] for name, values in result.columns.items()}, saved[points]


def _merged(first: tuple[Columns, ComplexArray], second: tuple[Columns, ComplexArray]) -> tuple[Columns, ComplexArray]:
    """Two sets of rows as one, rising in frequency."""
    order = np.argsort(np.concatenate([first[0]["frequency_hz"], second[0]["frequency_hz"]]))
    columns = {name: np.concatenate([first[0][name], second[0][name]])[order] for name in first[0]}
    return columns, np.concatenate([first[1], second[1]])[order]


def telling_points(result: FeedpointResult, points: Indices) -> Indices:
    """Return about twenty of the points (indices): both ends, those nearest to the landmarks, and even steps."""
    frequency = result.frequency_hz[points]
    marks = [mark for mark in _marks(result.landmarks) if frequency[0] <= mark <= frequency[-1]]
    nearest = np.searchsorted((frequency[1:] + frequency[:-1]) / 2.0, marks[:_MOST_LANDMARK_ROWS])
    telling = set(nearest.tolist()) | {0, points.size - 1}
    steps = np.linspace(0, points.size - 1, max(TELLING_ROWS - len(telling), 2) + 2).round().astype(int)
    return points[sorted(telling | set(steps.tolist()))]


def _marks(landmarks: Landmarks) -> Iterable[float]:
    """Frequencies [Hz] of the landmarks, the most telling first."""
    edges = (landmarks.swr2_low_hz, landmarks.swr2_high_hz)
    yield from (mark.value for mark in (landmarks.minimum_swr_hz, *edges) if mark.value is not None)
    for reading in landmarks.bands:
        yield from (reading.band.low_hz, reading.band.high_hz)
    yield from (resonance.frequency_hz.value for resonance in landmarks.resonances if resonance.frequency_hz.value)
