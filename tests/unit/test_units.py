"""Quantities with units, as people type them."""

import pytest

from feedpoint.errors import WrongUsage
from feedpoint.units import (
    parse_frequency_hz,
    parse_frequency_range_hz,
    parse_length_m,
    parse_loss_at,
    parse_loss_per_100m,
    parse_percent,
    parse_resistance_ohm,
    parse_temperature_c,
)


@pytest.mark.parametrize(
    ("parse", "text", "value"),
    [
        (parse_frequency_hz, "14.2MHz", 14.2e6),
        (parse_frequency_hz, "14200 kHz", 14.2e6),
        (parse_frequency_hz, ".1452ghz", 145.2e6),
        (parse_frequency_hz, "1e6Hz", 1e6),
        (parse_length_m, "31.5m", 31.5),  # metres, not thousandths
        (parse_length_m, "103ft", 103 * 0.3048),
        (parse_length_m, "0m", 0.0),
        (parse_resistance_ohm, "50ohm", 50.0),
        (parse_resistance_ohm, "75", 75.0),
        (parse_loss_per_100m, "1.3dB/100m", 1.3),
        (parse_loss_per_100m, "0.4 dB/100ft", 0.4 / 0.3048),
        (parse_loss_per_100m, "58.8dB/km", 5.88),
        (parse_percent, "10%", 10.0),
        (parse_temperature_c, "35C", 35.0),
        (parse_temperature_c, "95F", 35.0),
        (parse_temperature_c, "-40 °F", -40.0),
    ],
)
def test_quantity_is_understood(parse, text, value):
    assert parse(text) == pytest.approx(value, rel=1e-14)


@pytest.mark.parametrize(
    ("parse", "text", "fragment"),
    [
        (parse_frequency_hz, "14.2", "no unit"),
        (parse_frequency_hz, "14,2MHz", "14.2MHz"),
        (parse_frequency_hz, "14.2m", "unknown unit 'm'"),
        (parse_frequency_hz, "0MHz", "more than 0"),
        (parse_frequency_hz, "MHz", "expected a number"),
        (parse_frequency_hz, "1e999MHz", "expected a number"),
        (parse_frequency_hz, "nanMHz", "expected a number"),
        (parse_length_m, "31.5", "31.5m or 103ft"),
        (parse_length_m, "-1m", "negative"),
        (parse_length_m, "3 yards", "unknown unit"),
        (parse_resistance_ohm, "0", "more than 0"),
        (parse_loss_per_100m, "1.3dB", "dB/100m"),
        (parse_percent, "10", "10%"),
        (parse_temperature_c, "35", "35C"),
        (parse_temperature_c, "35K", "unknown unit"),
        (parse_loss_at, "10MHz", "10MHz:1.3dB/100m"),
        (parse_frequency_range_hz, "14MHz", "14.0MHz-14.35MHz"),
        (parse_frequency_range_hz, "15MHz-14MHz", "lower"),
    ],
)
def test_quantity_is_refused(parse, text, fragment):
    with pytest.raises(WrongUsage) as refusal:
        parse(text)
    assert fragment in str(refusal.value)


def test_pairs():
    assert parse_loss_at("10MHz:1.3dB/100m") == (10e6, 1.3)
    assert parse_frequency_range_hz("14.0MHz-14.35MHz") == (14.0e6, 14.35e6)
    assert parse_frequency_range_hz("900 kHz - 1.6 MHz") == (900e3, 1.6e6)
