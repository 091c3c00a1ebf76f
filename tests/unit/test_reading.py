"""Values read off a display."""

import pytest

from feedpoint.assumed import Assumed
from feedpoint.errors import WrongUsage
from feedpoint.sweep.reading import parse_reading, sweep_of_readings


@pytest.mark.parametrize(
    ("text", "impedance"),
    [
        ("17.8-22j@14.2MHz", 17.8 - 22j),
        ("17.8-j22@14.2MHz", 17.8 - 22j),
        ("17.8 + 22j @ 14.2 MHz", 17.8 + 22j),
        ("50@14.2MHz", 50),
        ("50ohm@14.2MHz", 50),
        ("-j22@14.2MHz", -22j),
        ("22j@14.2MHz", 22j),
        ("1e1+j2e0@14.2MHz", 10 + 2j),
        ("0@14.2MHz", 0),
    ],
)
def test_reading_is_understood(text, impedance):
    assert parse_reading(text) == (14.2e6, impedance)


@pytest.mark.parametrize(
    "text",
    ["17.8-22j", "17.8-22j@14.2", "17.8-22@14.2MHz", "17.8j22@14.2MHz", "@14MHz", "j@14MHz", "a+bj@14MHz", "1,5@14MHz"],
)
def test_reading_is_refused(text):
    with pytest.raises(WrongUsage):
        parse_reading(text)


def test_readings_become_a_rising_sweep():
    sweep = sweep_of_readings(["50@14.3MHz", "open@14.1MHz", "0@14.2MHz"], Assumed(50.0, "default"))
    assert sweep.frequency_hz.tolist() == [14.1e6, 14.2e6, 14.3e6]
    assert sweep.gamma.tolist() == [1.0, -1.0, 0.0]
    assert sweep.understood_as["reference_origin"] == "default"


@pytest.mark.parametrize("texts", [["50@14MHz", "51@14MHz"], ["-50@14MHz"]])
def test_readings_that_make_no_sweep_are_refused(texts):
    with pytest.raises(WrongUsage):
        sweep_of_readings(texts, Assumed(50.0))
