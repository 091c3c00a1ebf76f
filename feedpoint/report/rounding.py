"""
How numbers are shown to people.

Without an interval a figure is shown as finely as a field instrument resolves, never finer: two decimals below ten, one
below a thousand, none above. Files carry full precision instead.
"""

from math import isinf, isnan, log10

NOTHING = "-"


def shown(value: float | None) -> str:
    """Return a resistance, reactance, SWR or loss as people read it; `inf` where it is infinite, `-` where unknown."""
    if value is None or isnan(value):
        return NOTHING
    if isinf(value):
        return "inf" if value > 0 else "-inf"
    size = abs(value)
    # The limits are where rounding carries into the next digit: 9.996 is 10.0.
    decimals = 2 if size < 9.995 else 1 if size < 999.95 else 0
    text = f"{value:.{decimals}f}"
    return text if float(text) else text.lstrip("-")


def frequency_decimals(step_hz: float) -> int:
    """Return how many decimals of a frequency in MHz tell points `step_hz` apart from one another."""
    if step_hz <= 0:
        return 3
    return min(max(int(-log10(step_hz / 1e6) + 0.999) + 1, 2), 6)


def megahertz(frequency_hz: float, decimals: int) -> str:
    """Return a frequency [Hz] in MHz."""
    return f"{frequency_hz / 1e6:.{decimals}f}"


def plain_megahertz(frequency_hz: float) -> str:
    """Return a frequency [Hz] in MHz with as many digits as it needs, at most seven."""
    return f"{frequency_hz / 1e6:.7g}"
