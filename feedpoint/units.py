"""
The only conversion factors, and the quantities with units that people type.

Inside the package every number is in SI (dB for losses, degrees Celsius for temperatures, dB/100 m for the loss law);
feet, MHz, nanoseconds and degrees Fahrenheit exist at the doors only, and this module is the door.
"""

import re
from math import isfinite, log

from feedpoint.errors import WrongUsage, quoted

SPEED_OF_LIGHT = 299_792_458.0                  # m/s, exact by definition of the metre (SI, 1983)
METRES_PER_FOOT = 0.3048                        # exact (international foot, 1959)
DECIBELS_PER_NEPER = 20.0 / log(10.0)           # dB per Np, from the definitions of both
HZ_PER_MHZ = 1e6
SECONDS_PER_NANOSECOND = 1e-9
# Temperatures of a cable, degrees Celsius: physical sense, not a limit of the formulas.
COLDEST_C, HOTTEST_C = -100.0, 250.0
METRES_PER_100M = 100.0

NUMBER = r"[+-]?(?:[0-9]+\.?[0-9]*|\.[0-9]+)(?:[eE][+-]?[0-9]+)?"
_QUANTITY = re.compile(rf"\s*({NUMBER})\s*([^\s\d.+-].*?)?\s*", re.ASCII | re.DOTALL)

_SCALES: dict[str, dict[str, float]] = {
    "frequency": {"hz": 1.0, "khz": 1e3, "mhz": 1e6, "ghz": 1e9},
    "length": {"m": 1.0, "cm": 0.01, "mm": 0.001, "km": 1000.0, "ft": METRES_PER_FOOT, "in": METRES_PER_FOOT / 12.0},
    "resistance": {"ohm": 1.0, "ohms": 1.0, "Ω": 1.0, "ω": 1.0, "kohm": 1e3},
    "loss per length": {"db/100m": 1.0, "db/m": 100.0, "db/km": 0.1, "db/100ft": 1.0 / METRES_PER_FOOT},
    "share": {"%": 0.01},
}
_EXAMPLES = {
    "frequency": "14.2MHz",
    "length": "31.5m or 103ft",
    "resistance": "50ohm",
    "loss per length": "1.3dB/100m or 0.4dB/100ft",
    "share": "10%",
    "temperature": "35C or 95F",
}


def parse_number(text: str) -> float:
    """Return the finite number that `text` is, in plain ASCII digits with a decimal point; ValueError otherwise."""
    if re.fullmatch(NUMBER, text.strip(), re.ASCII) is None or not isfinite(number := float(text)):
        raise ValueError(text)
    return number


def _number_and_unit(text: str, quantity: str) -> tuple[float, str]:
    match = _QUANTITY.fullmatch(text)
    example = _EXAMPLES[quantity]
    if match is None or not isfinite(float(match[1])):
        raise WrongUsage(f"{quoted(text)} is not a {quantity}; expected a number with a unit, such as {example}.")
    if match[2] is None:
        raise WrongUsage(f"{quoted(text)} has no unit; expected a {quantity} such as {example}.")
    return float(match[1]), match[2].replace(" ", "")


def _parse_scaled(text: str, quantity: str) -> float:
    number, unit = _number_and_unit(text, quantity)
    scale = _SCALES[quantity].get(unit.lower())
    if scale is None:
        known = ", ".join(_SCALES[quantity])
        raise WrongUsage(
            f"{quoted(text)}: unknown unit {quoted(unit)} of a {quantity} (known: {known}); write it like "
            f"{_EXAMPLES[quantity]}."
        )
    return number * scale


def _positive(value: float, text: str, quantity: str) -> float:
    if value <= 0.0:
        raise WrongUsage(f"{quoted(text)}: a {quantity} must be more than 0.")
    return value


def _not_negative(value: float, text: str, quantity: str) -> float:
    if value < 0.0:
        raise WrongUsage(f"{quoted(text)}: a {quantity} must not be negative.")
    return value


def parse_frequency_hz(text: str) -> float:
    """Return the frequency [Hz] that a text such as ``14.2MHz`` names; `WrongUsage` otherwise."""
    return _positive(_parse_scaled(text, "frequency"), text, "frequency")


def parse_length_m(text: str) -> float:
    """Return the length [m] that a text such as ``31.5m`` or ``103ft`` names; `WrongUsage` otherwise."""
    return _not_negative(_parse_scaled(text, "length"), text, "length")


def parse_resistance_ohm(text: str) -> float:
    """Return the resistance [ohm] that a text such as ``50ohm`` names; a bare number can only be ohms here."""
    try:
        number = parse_number(text)
    except ValueError:
        number = _parse_scaled(text, "resistance")
    return _positive(number, text, "resistance")


def parse_loss_per_100m(text: str) -> float:
    """Return the loss [dB/100 m] that a text such as ``1.3dB/100m`` or ``0.4dB/100ft`` names, or `WrongUsage`."""
    return _not_negative(_parse_scaled(text, "loss per length"), text, "loss")


def parse_percent(text: str) -> float:
    """Return the percentage that a text such as ``10%`` names (10.0); `WrongUsage` otherwise."""
    return 100.0 * _not_negative(_parse_scaled(text, "share"), text, "share")


def parse_temperature_c(text: str) -> float:
    """Return the temperature [degrees Celsius] that a text such as ``35C`` or ``95F`` names; `WrongUsage` otherwise."""
    number, unit = _number_and_unit(text, "temperature")
    match unit.lstrip("°").upper():
        case "C":
            celsius = number
        case "F":
            celsius = (number - 32.0) / 1.8
        case _:
            raise WrongUsage(f"{quoted(text)}: unknown unit {quoted(unit)} of a temperature; write it like 35C or 95F.")
    if not COLDEST_C <= celsius <= HOTTEST_C:
        raise WrongUsage(f"{quoted(text)} is no temperature of a cable; expected {COLDEST_C:g}C to {HOTTEST_C:g}C.")
    return celsius


def parse_loss_at(text: str) -> tuple[float, float]:
    """Return frequency [Hz] and loss [dB/100 m] of a text such as ``10MHz:1.3dB/100m``; `WrongUsage` otherwise."""
    frequency, colon, loss = text.partition(":")
    if not colon:
        raise WrongUsage(f"{quoted(text)} is not a loss at a frequency; write it like 10MHz:1.3dB/100m.")
    return parse_frequency_hz(frequency), parse_loss_per_100m(loss)


def parse_frequency_range_hz(text: str) -> tuple[float, float]:
    """Return low and high end [Hz] of a text such as ``14.0MHz-14.35MHz``; `WrongUsage` otherwise."""
    ends = re.fullmatch(r"(.*[A-Za-z])\s*-\s*(.+)", text, re.DOTALL)
    if ends is None:
        raise WrongUsage(f"{quoted(text)} is not a band; write it like 14.0MHz-14.35MHz.")
    low, high = parse_frequency_hz(ends[1]), parse_frequency_hz(ends[2])
    if not low < high:
        raise WrongUsage(f"{quoted(text)}: a band goes from the lower to the higher frequency.")
    return low, high
