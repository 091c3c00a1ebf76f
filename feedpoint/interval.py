"""A value with the low and high end of its 95 % interval, where they are known."""

from typing import NamedTuple


class Interval(NamedTuple):
    """
    A scalar and its 95 % interval.

    All three are in the unit that the field which holds the interval names. `value` is None where there is none (a
    resonance outside the sweep); `low` and `high` are None where no tolerance was stated that would give them.
    """

    value: float | None
    low: float | None = None
    high: float | None = None
