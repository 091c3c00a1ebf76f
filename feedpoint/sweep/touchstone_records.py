"""The data section of a Touchstone file: records of numbers, each one frequency."""

import re
from collections.abc import Iterable
from dataclasses import dataclass, field
from math import inf, isinf
from typing import NamedTuple

import numpy as np
from numpy.typing import NDArray

from feedpoint.errors import quoted
from feedpoint.line import ComplexArray, RealArray
from feedpoint.sweep.touchstone_header import Header
from feedpoint.units import NUMBER

# With only these signs left, float() accepts plain decimal numbers and nothing else.
_NUMBERS_ONLY = re.compile(r"[0-9+\-.eE \t]*")
# What may stand between numbers. Not whatever Unicode calls white space: a no-break space is a defect.
BLANKS = " \t"
_COLUMNS = {"RI": "real, imaginary", "MA": "magnitude, angle", "DB": "dB, angle"}
_NOISE_NUMBERS = 5


class Records(NamedTuple):
    """Frequencies (F,) [Hz], values (F, n, n) as in the file, line of each record (F,), first line of noise data."""

    frequency_hz: RealArray
    values: ComplexArray
    line: NDArray[np.intp]
    noise_line: int | None


@dataclass
class _Collected:
    numbers: list[list[float]] = field(default_factory=list)
    line: list[int] = field(default_factory=list)
    noise_line: int | None = None


def parse_records(header: Header, data: Iterable[tuple[int, str]]) -> Records:
    """
    Return the records of the data lines.

    Raises
    ------
    SweepRefused
        With the line, for a record with a number too many or too few, or one that is no finite number; for a count of
        records that is not [Number of Frequencies].
    """
    collected = _collect(header, data)
    stated = header.argument("number of frequencies")
    if stated is not None and int(stated) != len(collected.numbers):
        raise header.refuse(
            f"[Number of Frequencies] says {stated}, found {len(collected.numbers)} records. Was the file cut short?",
            header.keywords["number of frequencies"][0],
        )
    table = np.array(collected.numbers)
    line = np.array(collected.line)
    values = _complex_values(header, table[:, 1::2], table[:, 2::2], line)
    with np.errstate(over="ignore"):
        frequency_hz = table[:, 0] * header.options.unit_hz
    if not np.all(np.isfinite(frequency_hz)):
        at = int(line[np.argmin(np.isfinite(frequency_hz))])
        raise header.refuse("the frequency is too large to be one; expected a finite number.", at)
    return Records(frequency_hz, _matrices(header, values), line, collected.noise_line)


def _collect(header: Header, data: Iterable[tuple[int, str]]) -> _Collected:
    """Numbers of each record; a record of a network of more than two ports may go over several lines."""
    collected = _Collected()
    expected = 1 + 2 * _values_per_record(header)
    one_line = header.ports == 1 or (header.ports == 2 and not header.is_version_2)
    for line, text in data:
        numbers = _numbers(header, line, text)
        if collected.noise_line is not None or _is_noise(header, numbers, collected):
            collected.noise_line = collected.noise_line or line
            if len(numbers) != _NOISE_NUMBERS:
                raise header.refuse(f"expected 5 numbers of noise data, found {len(numbers)}: {quoted(text)}.", line)
            continue
        pending = bool(collected.numbers) and len(collected.numbers[-1]) < expected
        if pending and len(numbers) % 2 == 0 and not one_line:
            collected.numbers[-1] += numbers
        elif pending:
            break
        else:
            collected.numbers.append(numbers)
            collected.line.append(line)
        if len(collected.numbers[-1]) > expected or (one_line and len(numbers) < expected):
            break
    if collected.numbers and len(collected.numbers[-1]) != expected:
        raise _wrong_count(header, collected, expected, dict(data))
    return collected


def _is_noise(header: Header, numbers: list[float], collected: _Collected) -> bool:
    """Version 1 tells noise data of a two-port by their five numbers and a frequency that falls back."""
    if header.ports != 2 or header.is_version_2 or len(numbers) != _NOISE_NUMBERS or not collected.numbers:
        return False
    # In a sweep that falls anyway, five numbers are a record that was cut short.
    falling = len(collected.numbers) > 1 and collected.numbers[-1][0] < collected.numbers[-2][0]
    return numbers[0] <= collected.numbers[-1][0] and not falling


def _wrong_count(header: Header, collected: _Collected, expected: int, texts: dict[int, str]) -> Exception:
    line, found = collected.line[-1], len(collected.numbers[-1])
    pairs = _values_per_record(header)
    columns = f"frequency, {'' if pairs == 1 else f'{pairs} times '}{_COLUMNS[header.options.number_format]}"
    hint = " Was the file cut short?" if found < expected else f" Is it a file of {header.ports} port(s)?"
    return header.refuse(f"expected {expected} numbers ({columns}), found {found}: {quoted(texts[line])}.{hint}", line)


def _numbers(header: Header, line: int, text: str) -> list[float]:
    if _NUMBERS_ONLY.fullmatch(text) is not None:
        try:
            numbers = [float(word) for word in text.split()]
            if inf not in numbers and -inf not in numbers:
                return numbers
        except ValueError:
            pass
    words = re.split(f"[{BLANKS}]+", text)
    wrong = next(word for word in words if re.fullmatch(NUMBER, word, re.ASCII) is None or isinf(float(word)))
    hint = " Write decimal points, and blanks between the numbers." if "," in wrong else ""
    raise header.refuse(f"{quoted(wrong)} is not a finite number in plain decimal digits (ASCII).{hint}", line)


def _values_per_record(header: Header) -> int:
    triangular = (header.argument("matrix format") or "full").lower() != "full"
    return header.ports * (header.ports + 1) // 2 if triangular else header.ports**2


def _complex_values(header: Header, first: RealArray, second: RealArray, line: NDArray[np.intp]) -> ComplexArray:
    if header.options.number_format == "MA" and np.any(first < 0):
        at = int(line[np.argmax((first < 0).any(axis=1))])
        raise header.refuse("a negative magnitude; expected 0 or more. Are the numbers real and imaginary (RI)?", at)
    with np.errstate(all="ignore"):
        match header.options.number_format:
            case "RI":
                values = first + 1j * second
            case "MA":
                values = first * _unit_phasor(second)
            case _:
                values = 10.0 ** (first / 20.0) * _unit_phasor(second)
    finite = np.isfinite(values).all(axis=1) & np.isfinite(first).all(axis=1)
    if not np.all(finite):
        at = int(line[np.argmin(finite)])
        raise header.refuse("a number is too large to be a value; expected finite numbers.", at)
    return values


def _unit_phasor(angle_deg: RealArray) -> ComplexArray:
    """exp(j angle), exact at multiples of 90 degrees: a short at 180 degrees is -1 without a rest."""
    turned = np.remainder(angle_deg, 360.0)
    phasor = np.exp(1j * np.deg2rad(turned))
    for quarter, exact in enumerate((1.0, 1.0j, -1.0, -1.0j)):
        phasor[turned == 90.0 * quarter] = exact
    return phasor


def _matrices(header: Header, values: ComplexArray) -> ComplexArray:
    """Values of the records (F, count) in their places of the matrices (F, n, n)."""
    ports = header.ports
    layout = (header.argument("matrix format") or "full").lower()
    result = np.empty((values.shape[0], ports, ports), dtype=complex)
    if layout == "full":
        result[:] = values.reshape(-1, ports, ports)
        # Two-ports of version 1 run down the columns (S11 S21 S12 S22); version 2 says which.
        if ports == 2 and header.argument("two-port data order") in (None, "21_12"):
            result = result.transpose(0, 2, 1)
        return result
    rows, columns = np.tril_indices(ports) if layout == "lower" else np.triu_indices(ports)
    result[:, rows, columns] = values
    result[:, columns, rows] = values
    return result
