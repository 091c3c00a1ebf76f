"""
Texts of sweep files as analyzers save them: Touchstone of version 1 and 2, and delimited text.

The writers know nothing of any reader. Numbers are written with a fixed count of decimals, as instruments do.
"""

from collections.abc import Iterable, Mapping, Sequence

import numpy as np

HZ_PER_UNIT = {"HZ": 1.0, "KHZ": 1e3, "MHZ": 1e6, "GHZ": 1e9}


def pair(value: complex, form: str, decimals: int) -> str:
    """A complex number as Touchstone writes it: RI, MA (degrees) or DB (degrees)."""
    magnitude, angle = abs(value), np.degrees(np.angle(value))
    if form == "RI":
        return f"{value.real:.{decimals}f} {value.imag:.{decimals}f}"
    # As many figures of arc as of magnitude: 1e-6 rad is 6e-5 degrees.
    first = magnitude if form == "MA" else 20 * np.log10(magnitude)
    return f"{first:.{decimals}f} {angle:.{decimals - 2}f}"


def records(frequency_hz: np.ndarray, s: np.ndarray, form: str, unit: str, decimals: int) -> list[str]:
    """One line per frequency. A two-port (F, 2, 2) is written in the order 11, 21, 12, 22."""
    flat = s[:, np.newaxis] if s.ndim == 1 else np.stack([s[:, 0, 0], s[:, 1, 0], s[:, 0, 1], s[:, 1, 1]], axis=1)
    rows = zip(frequency_hz / HZ_PER_UNIT[unit.upper()], flat, strict=True)
    # 12 significant figures hold any frequency to a millihertz and drop what the division left.
    return [" ".join([f"{f:.12g}", *(pair(value, form, decimals) for value in row)]) for f, row in rows]


def touchstone_text(
    frequency_hz: np.ndarray,
    s: np.ndarray,
    *,
    form: str = "RI",
    unit: str = "Hz",
    reference_ohm: float = 50.0,
    comments: Iterable[str] = (),
    decimals: int = 6,
) -> str:
    """A Touchstone file of version 1: S-parameters (F,) of a one-port or (F, 2, 2) of a two-port."""
    head = [f"! {comment}" for comment in comments]
    option = f"# {unit} S {form} R {reference_ohm:g}"
    return "\n".join([*head, option, *records(frequency_hz, s, form, unit, decimals), ""])


def touchstone_2_text(
    frequency_hz: np.ndarray,
    s: np.ndarray,
    *,
    form: str = "RI",
    unit: str = "Hz",
    reference_ohm: float = 50.0,
    comments: Iterable[str] = (),
    decimals: int = 6,
) -> str:
    """A Touchstone file of version 2.0 with the same contents."""
    ports = 1 if s.ndim == 1 else 2
    head = [
        "[Version] 2.0",
        *(f"! {comment}" for comment in comments),
        f"# {unit} S {form} R {reference_ohm:g}",
        f"[Number of Ports] {ports}",
        *(["[Two-Port Data Order] 21_12"] if ports == 2 else []),
        f"[Number of Frequencies] {len(frequency_hz)}",
        "[Reference] " + " ".join([f"{reference_ohm:g}"] * ports),
        "[Network Data]",
    ]
    return "\n".join([*head, *records(frequency_hz, s, form, unit, decimals), "[End]", ""])


def delimited_text(
    columns: Mapping[str, Sequence[float] | np.ndarray],
    *,
    formats: Sequence[str],
    delimiter: str = ",",
    decimal: str = ".",
    preamble: Iterable[str] = (),
) -> str:
    """A table with a header: `columns` maps header words to values, `formats` are format specifications such as .3f."""
    rows = [
        delimiter.join(format(value, form).replace(".", decimal) for value, form in zip(row, formats, strict=True))
        for row in zip(*columns.values(), strict=True)
    ]
    return "\n".join([*preamble, delimiter.join(columns), *rows, ""])
