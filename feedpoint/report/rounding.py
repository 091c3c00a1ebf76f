"""
How numbers are shown to people.

Without an interval a figure is shown as finely as a field instrument resolves, never finer: two decimals below ten, one
below a thousand, none above. Files carry full precision instead.
"""

from collections.abc import Sequence
from itertools import pairwise
from math import ceil, isinf, isnan, log10

NOTHING = "-"
_HALF_A_HERTZ = 0.5


def shown(value: float | None) -> str:
    """Return a resistance, reactance, SWR or loss as people read it; `inf` where it is infinite, `-` where unknown."""
    if value is None or isnan(value):
        return NOTHING
    if isinf(value):
        return "inf" if value > 0 else "-inf"
    size = abs(value)
    if size >= 999_999.5:
        return f"{value:.1e}"
    # The limits are where rounding carries into the next digit: 9.996 is 10.0.
    decimals = 2 if size < 9.995 else 1 if size < 999.95 else 0
    text = f"{value:.{decimals}f}"
    return text if float(text) else text.lstrip("-")


def frequency_decimals(frequencies_hz: Sequence[float]) -> int:
    """
    Return how many decimals show rising frequencies in MHz: a tenth of their smallest step, or as many as they have.

    Frequencies that never end (a range cut in 137 steps) are cut at 100 Hz, unless their step is finer.
    """
    steps = [after - before for before, after in pairwise(frequencies_hz)]
    for_steps = min(ceil(-log10(min(steps) / 1e6)) + 1, 6) if steps else 0
    exact = (
        decimals
        for decimals in range(2, 4)
        if all(abs(round(hertz / 1e6, decimals) * 1e6 - hertz) < _HALF_A_HERTZ for hertz in frequencies_hz)
    )
    return max(for_steps, next(exact, 4))


def megahertz(frequency_hz: float, decimals: int) -> str:
    """Return a frequency [Hz] in MHz."""
    return f"{frequency_hz / 1e6:.{decimals}f}"


_PREFIXES = ((1e-12, "p"), (1e-9, "n"), (1e-6, "u"), (1e-3, "m"), (1.0, ""), (1e3, "k"), (1e6, "M"))


def with_prefix(value: float, unit: str) -> str:
    """Return a value with its unit and a decimal prefix, three or four digits: 150 nH."""
    scale, prefix = next(((s, p) for s, p in reversed(_PREFIXES) if abs(value) >= s), _PREFIXES[0])
    if value == 0:
        scale, prefix = 1.0, ""
    return f"{value / scale:.4g} {prefix}{unit}"


def plain_megahertz(frequency_hz: float) -> str:
    """Return a frequency [Hz] in MHz with as many digits as it needs, at most seven."""
    return f"{frequency_hz / 1e6:.7g}"
