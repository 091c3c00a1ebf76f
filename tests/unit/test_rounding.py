"""How numbers are shown to people."""

import math

import pytest

from feedpoint.report.rounding import frequency_decimals, shown, with_prefix


@pytest.mark.parametrize(
    ("value", "text"),
    [
        (1.234, "1.23"),
        (9.994, "9.99"),
        (9.996, "10.0"),
        (-22.04, "-22.0"),
        (999.94, "999.9"),
        (999.96, "1000"),
        (3691.4, "3691"),
        (-0.001, "0.00"),
        (999_999.0, "999999"),
        (999_999_951.0, "1.0e+09"),
        (-19_999_999.0, "-2.0e+07"),
        (math.inf, "inf"),
        (-math.inf, "-inf"),
        (math.nan, "-"),
        (None, "-"),
    ],
)
def test_value(value, text):
    assert shown(value) == text


@pytest.mark.parametrize(
    ("frequencies_hz", "decimals"),
    [
        ([14.2e6], 2),
        ([14.0333e6], 4),
        ([14e6, 14.01e6], 3),
        ([1e6, 2e6], 2),
        ([1e6, 1.029e6], 3),
        ([145.0e6, 145.0001e6], 5),
        ([1e6, 1e6 + 1], 6),
        ([1e6, 1e6 + 29e6 / 137], 4),
    ],
)
def test_decimals_of_frequencies(frequencies_hz, decimals):
    assert frequency_decimals(frequencies_hz) == decimals


@pytest.mark.parametrize(
    ("value", "text"),
    [(150e-9, "150 nH"), (0.0, "0 H"), (1.5e-6, "1.5 uH"), (4e-15, "0.004 pH"), (2.0, "2 H"), (1e-3, "1 mH")],
)
def test_prefix(value, text):
    assert with_prefix(value, "H") == text
