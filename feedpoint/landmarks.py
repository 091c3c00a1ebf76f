"""
What people read off a sweep: resonances, minimum SWR, the SWR <= 2 band, the worst SWR of a band.

Between the points of the sweep the reflection is the cubic through the four nearest points, in real and imaginary part:
local, so that a disturbed point reaches no further than its neighbours. Nothing is read outside the sweep.
"""

from collections.abc import Callable, Iterator, Sequence
from typing import Literal, NamedTuple

import numpy as np

from feedpoint.interval import Interval
from feedpoint.line import ComplexArray, RealArray, RealLike
from feedpoint.line.reflection import impedance_from_reflection, swr_from_reflection
from feedpoint.run.record import Band

# |Gamma|^2 at SWR 2.
_SWR_2 = 1.0 / 9.0
# Im Gamma, as far as the analyzer's noise has grown on its way, must pass from one side to the other of a strip of so
# many standard deviations of its own scatter, else noise around a resistive load would be a row of resonances: 4.5 are
# exceeded once in 150,000 points. The half-width is at most 0.02, the scatter of a poor analyzer: of a coarse sweep
# even a clean antenna looks like scatter.
_SCATTER_MULTIPLE = 4.5
_WIDEST_STRIP = 0.02
# Rounding of the de-embedding, in case the scatter is none.
_NARROWEST_STRIP = 1e-12
# Orders of differences that the scatter is estimated from, with (2 k)!/(k!)^2.
_SPREADS = ((3, 20.0), (5, 252.0), (7, 3432.0))
# A band edge that differs from the sweep's end by rounding lies on it.
_SAME_FREQUENCY = 1e-9

# Stands for an infinite reflection (an impedance of exactly minus the reference), which no polynomial goes through.
_BEYOND_ALL = 1e6
# Roots that rounding has put just outside their interval lie on its end.
_ON_THE_END = 1e-9

ResonanceKind = Literal["series", "parallel"]


class Resonance(NamedTuple):
    """A zero of Im Gamma: frequency [Hz], resistance there [ohm], and whether X rises (series) or falls (parallel)."""

    frequency_hz: Interval
    resistance_ohm: Interval
    kind: ResonanceKind


class BandReading(NamedTuple):
    """A band of the user's, with the worst SWR in it; null where the sweep does not cover the band."""

    band: Band
    worst_swr: Interval


class Landmarks(NamedTuple):
    """Readings at one end of a run."""

    resonances: tuple[Resonance, ...]
    minimum_swr: Interval
    minimum_swr_hz: Interval
    swr2_low_hz: Interval
    swr2_high_hz: Interval
    bands: tuple[BandReading, ...]


def landmarks_of(
    frequency_hz: RealArray,
    gamma: ComplexArray,
    reference_ohm: float,
    swr_gamma: ComplexArray,
    bands: Sequence[Band],
    error_growth: RealArray | None = None,
) -> Landmarks:
    """
    Read the landmarks off a reflection.

    Parameters
    ----------
    frequency_hz : array (F,) [Hz]
    gamma : complex array (F,), against `reference_ohm` [ohm]
        Where the resonances are read.
    swr_gamma : complex array (F,)
        The same reflection against the resistance that SWR refers to.
    bands : bands to look into
    error_growth : array (F,), optional
        By how much noise is larger here than where it arose, so that it can be told from an antenna.
    """
    gamma, swr_gamma = (np.where(np.isfinite(values), values, _BEYOND_ALL) for values in (gamma, swr_gamma))
    curve = _Curve(frequency_hz, swr_gamma)
    low, high = float(frequency_hz[0]), float(frequency_hz[-1])
    minimum_hz, minimum = curve.extreme(low, high, np.argmin)
    edges = (None, None) if minimum > _SWR_2 else curve.edges(minimum_hz, _SWR_2)
    return Landmarks(
        tuple(_resonances(frequency_hz, gamma, reference_ohm, 1.0 if error_growth is None else error_growth)),
        Interval(_swr(minimum)),
        Interval(minimum_hz),
        Interval(edges[0]),
        Interval(edges[1]),
        tuple(BandReading(band, Interval(_worst_swr(curve, band))) for band in bands),
    )


def _swr(power: float) -> float:
    return float(swr_from_reflection(np.sqrt(np.array(power, dtype=complex))))


def _worst_swr(curve: "_Curve", band: Band) -> float | None:
    low, high = float(curve.frequency[0]), float(curve.frequency[-1])
    if band.low_hz < low * (1 - _SAME_FREQUENCY) or band.high_hz > high * (1 + _SAME_FREQUENCY):
        return None
    return _swr(curve.extreme(max(band.low_hz, low), min(band.high_hz, high), np.argmax)[1])


class _Curve:
    """|Gamma|^2 against frequency, between the points too."""

    def __init__(self, frequency_hz: RealArray, gamma: ComplexArray) -> None:
        self.frequency = frequency_hz
        self.gamma = gamma

    def piece(self, interval: int) -> tuple[RealArray, float, float]:
        """|Gamma|^2 on an interval: coefficients, highest first, of t = (f - offset)/scale; offset and scale [Hz]."""
        local, offset, scale = local_cubic(self.frequency, self.gamma, interval)
        return np.convolve(local, local.conj()).real, offset, scale

    def interval_of(self, frequency_hz: float) -> int:
        """Index of the interval that a frequency [Hz] lies in."""
        after = int(np.searchsorted(self.frequency, frequency_hz, side="right"))
        return min(max(after - 1, 0), max(self.frequency.size - 2, 0))

    def extreme(self, low_hz: float, high_hz: float, pick: Callable[[RealArray], np.intp]) -> tuple[float, float]:
        """Where in a range |Gamma|^2 is lowest or highest (`pick`: argmin or argmax) [Hz], and its value there."""
        inside = self.frequency[(self.frequency > low_hz) & (self.frequency < high_hz)]
        places = np.concatenate([[low_hz], inside, [high_hz]])
        best = float(places[pick(self.at(places))])
        intervals = {self.interval_of(best), self.interval_of(np.nextafter(best, -np.inf))}
        between = [f for interval in intervals for f in self._turning_points(interval) if low_hz < f < high_hz]
        candidates = np.array([best, *between])
        values = self.at(candidates)
        chosen = int(pick(values))
        return float(candidates[chosen]), float(values[chosen])

    def at(self, frequency_hz: RealArray) -> RealArray:
        """|Gamma|^2 at frequencies within the sweep."""
        nearest = np.minimum(np.searchsorted(self.frequency, frequency_hz), self.frequency.size - 1)
        values = np.abs(self.gamma[nearest]) ** 2
        for place in np.flatnonzero(self.frequency[nearest] != frequency_hz):
            polynomial, offset, scale = self.piece(self.interval_of(frequency_hz[place]))
            values[place] = np.polyval(polynomial, (frequency_hz[place] - offset) / scale)
        return values

    def edges(self, centre_hz: float, level: float) -> tuple[float | None, float | None]:
        """Nearest frequencies [Hz] below and above a centre where |Gamma|^2 passes `level`; None beyond the sweep."""
        intervals = range(self.frequency.size - 1)
        start = self.interval_of(centre_hz)
        below = (self._passings(i, level) for i in reversed(intervals[: start + 1]))
        above = (self._passings(i, level) for i in intervals[start:])
        low = next((max(inside) for found in below if (inside := [f for f in found if f <= centre_hz])), None)
        high = next((min(inside) for found in above if (inside := [f for f in found if f >= centre_hz])), None)
        return low, high

    def _passings(self, interval: int, level: float) -> list[float]:
        low, high = np.abs(self.gamma[interval : interval + 2]) ** 2
        if low < level and high < level:
            return []
        polynomial, offset, scale = self.piece(interval)
        polynomial[-1] -= level
        return list(self._roots(polynomial, interval, offset, scale))

    def _turning_points(self, interval: int) -> list[float]:
        if self.frequency.size < 2:
            return []
        polynomial, offset, scale = self.piece(interval)
        return list(self._roots(np.polyder(polynomial).astype(float), interval, offset, scale))

    def _roots(self, polynomial: RealArray, interval: int, offset: float, scale: float) -> Iterator[float]:
        low, high = self.frequency[interval], self.frequency[interval + 1]
        yield from (offset + scale * t for t in real_roots(polynomial, (low - offset) / scale, (high - offset) / scale))


def local_cubic(frequency_hz: RealArray, gamma: ComplexArray, interval: int) -> tuple[ComplexArray, float, float]:
    """
    Coefficients, highest first, of the cubic through the four points nearest to an interval, with offset and scale.

    The variable is t = (f - offset)/scale, offset the lower end of the interval [Hz] and scale its width. Sweeps of
    fewer points give a polynomial of lower degree.
    """
    count = min(4, frequency_hz.size)
    first = min(max(interval - 1, 0), frequency_hz.size - count)
    chosen = slice(first, first + count)
    offset = float(frequency_hz[interval])
    scale = float(frequency_hz[interval + 1]) - offset if frequency_hz.size > 1 else 1.0
    powers = np.vander((frequency_hz[chosen] - offset) / scale)
    coefficients: ComplexArray = np.linalg.solve(powers, gamma[chosen]).astype(complex)
    return coefficients, offset, scale


def real_roots(polynomial: RealArray, low: float, high: float) -> list[float]:
    """Real roots from `low` to `high`, rising, of a polynomial with these coefficients, highest first."""
    significant = np.abs(polynomial) > 1e-14 * np.abs(polynomial).max()
    roots = np.roots(np.where(significant, polynomial, 0.0))
    # Roots of a companion matrix of degree <= 6 are good to about 1e-8 where two of them meet.
    real = roots.real[np.abs(roots.imag) < 1e-7]
    inside = real[(real >= low - _ON_THE_END) & (real <= high + _ON_THE_END)]
    return sorted(np.clip(inside, low, high).tolist())


def _resonances(
    frequency_hz: RealArray, gamma: ComplexArray, reference_ohm: float, error_growth: RealLike
) -> Iterator[Resonance]:
    """Resonances of a reflection, rising in frequency."""
    # Divided by the growth, noise is as large at every frequency as the analyzer made it.
    as_measured = gamma.imag / error_growth
    for passage in passages(as_measured, _strip(as_measured)):
        at_hz, real = _zero(frequency_hz, gamma, passage)
        resistance = impedance_from_reflection(np.array(complex(real, 0.0)), reference_ohm).real
        # dX/df has the sign of d Im Gamma/df where Gamma is real: dZ/dGamma = 2 R/(1 - Gamma)^2 is positive there.
        kind: ResonanceKind = "series" if passage.rises else "parallel"
        yield Resonance(Interval(at_hz), Interval(float(resistance)), kind)


def _zero(frequency_hz: RealArray, gamma: ComplexArray, passage: "Passage") -> tuple[float, float]:
    """Frequency [Hz] at which Im Gamma passes through 0, and Re Gamma there."""
    chosen = slice(passage.first, passage.last + 1)
    signs = np.sign(gamma.imag[chosen])
    changes = np.flatnonzero(signs[1:] != signs[:-1])
    if passage.first == passage.last:
        return float(frequency_hz[passage.first]), float(gamma.real[passage.first])
    if changes.size > 1 and np.all(signs):
        # Noise passes through 0 more than once: a straight line through all points of the passage is the better guess.
        offset, scale = float(frequency_hz[passage.first]), float(np.ptp(frequency_hz[chosen]))
        line = np.polyfit((frequency_hz[chosen] - offset) / scale, gamma[chosen], 1)
        at = float(np.clip(-line[1].imag / line[0].imag, 0.0, 1.0))
        return offset + scale * at, float(np.polyval(line, at).real)
    interval = passage.first + int(changes[0])
    local, offset, scale = local_cubic(frequency_hz, gamma, interval)
    left, right = gamma.imag[interval], gamma.imag[interval + 1]
    straight = left / (left - right)
    at = min(real_roots(local.imag, 0.0, 1.0), key=lambda t: abs(t - straight), default=straight)
    return offset + scale * at, float(np.polyval(local, at).real)


def _strip(values: RealArray) -> float:
    """Half-width of the strip around 0 within which the sign of `values` (F,) may be noise."""
    # Of white noise the k-th differences have sqrt((2 k)!/(k!)^2) times its standard deviation; what is smooth they
    # cancel the better the higher k is, as long as it turns by less than a radian from point to point.
    usable = ((order, spread) for order, spread in _SPREADS if order < values.size)
    scatters = [_median(np.abs(np.diff(values, order))) / (0.6745 * spread**0.5) for order, spread in usable]
    return min(max(_SCATTER_MULTIPLE * min(scatters, default=0.0), _NARROWEST_STRIP), _WIDEST_STRIP)


def _median(values: RealArray) -> float:
    # np.median takes 7 ms to import, for features that are not needed here.
    return float(np.sort(values)[values.size // 2])


class Passage(NamedTuple):
    """Points `first` to `last` (indices) over which values pass through 0, and whether they rise."""

    first: int
    last: int
    rises: bool


def passages(values: RealArray, strip: float) -> list[Passage]:
    """
    Where `values` (F,) pass through 0, from one side of a strip around it to the other.

    Values that begin or end at 0 pass through it too: rounding is no doubt about a sign.
    """
    sides = np.where(np.abs(values) > strip, np.sign(values), 0.0)
    decided = np.flatnonzero(sides)
    if decided.size == 0:
        return []
    turns = np.flatnonzero(sides[decided[1:]] != sides[decided[:-1]])
    found = [
        Passage(int(first), int(last), bool(sides[last] > 0))
        for first, last in zip(decided[turns], decided[turns + 1], strict=True)
    ]
    begins, ends = np.abs(values[[0, -1]]) <= _NARROWEST_STRIP
    if begins:
        found.insert(0, Passage(0, 0, bool(sides[decided[0]] > 0)))
    if ends:
        found.append(Passage(values.size - 1, values.size - 1, bool(sides[decided[-1]] < 0)))
    return found
