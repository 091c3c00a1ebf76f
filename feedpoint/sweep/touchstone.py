"""
Touchstone files, versions 1.0, 1.1, 2.0 and 2.1, read strictly: every refusal names its line.

Why a reader of our own: sweeps come from the field, cut short, edited by hand and converted by scripts, and a value
that is read wrong looks as plausible as one that is right. The general-purpose readers accept files without an option
line, with missing numbers or with the wrong count.

References: see `feedpoint.sweep.touchstone_header`.
"""

from collections.abc import Iterable, Iterator
from dataclasses import dataclass, field
from typing import NamedTuple

import numpy as np

from feedpoint.errors import quoted
from feedpoint.finding import Finding
from feedpoint.line import ComplexArray, RealArray
from feedpoint.line.scattering import (
    normalised_admittance,
    normalised_impedance,
    scattering_from_normalised_admittance,
    scattering_from_normalised_impedance,
)
from feedpoint.sweep.checks import Points, in_order
from feedpoint.sweep.text import numbered_lines
from feedpoint.sweep.touchstone_header import (
    Header,
    parse_option_line,
    parse_version,
    references_ohm,
    take_keyword,
)
from feedpoint.sweep.touchstone_records import BLANKS, Records, parse_records

# Version-1 Z and Y are normalised to R. A median resistance of ten times R, or a median impedance of twenty times, is
# no antenna over a band: plain ohms or siemens were written.
_PLAIN_RESISTANCE = 10.0
_PLAIN_SIZE = 20.0


class NetworkData(NamedTuple):
    """
    Content of a Touchstone file: scattering parameters (F, n, n) against the references (n,) [ohm] of n ports.

    `points.values` are the scattering parameters, rising in frequency; `understood_as` says what the file was taken as.
    """

    points: Points
    reference_ohm: RealArray
    understood_as: dict[str, str | int | float]
    comments: tuple[str, ...]
    findings: tuple[Finding, ...]


@dataclass
class _Sections:
    """The parts of a file: header, data lines, and what was found doubtful on the way."""

    header: Header
    data: list[tuple[int, str]] = field(default_factory=list)
    reference_lines: list[tuple[int, str]] = field(default_factory=list)
    comments: list[str] = field(default_factory=list)
    doubts: list[str] = field(default_factory=list)
    lines: int = 0
    noise_line: int | None = None


def parse_touchstone(text: str, *, source: str, ports: int | None) -> NetworkData:
    """
    Return the content of a Touchstone file.

    Parameters
    ----------
    text : str
    source : str
        Name of the file, for messages.
    ports : int or None
        Number of ports that the file name states (``.s2p``: 2); None for ``.ts``, whose [Number of Ports] states it.

    Raises
    ------
    SweepRefused
        With the line, for everything that is not a Touchstone file or could be understood in two ways.
    """
    sections = _split(text, source, ports)
    header = sections.header
    _check_header(header, ports, sections.lines)
    references = references_ohm(header, sections.reference_lines)
    if not sections.data:
        raise header.refuse("no data points; expected at least one.", sections.lines)
    records = parse_records(header, sections.data)
    scattering = _scattering(header, references, records)
    points, findings = in_order(Points(records.frequency_hz, scattering, records.line), source)
    doubts = sections.doubts + _doubts_about_values(header, records)
    if not header.options.unit_stated:
        doubts.append("the option line names no frequency unit: the standard's GHz was taken")
    if not header.options.format_stated:
        doubts.append("the option line names no number format: the standard's MA was taken")
    # A text that ends with a line end has an empty last line.
    if sections.data[-1][0] == sections.lines:
        doubts.append("the last record has no line end: it may be cut short")
    findings = [Finding("doubtful-file", "warning", f"{source}: {doubt}.") for doubt in doubts] + findings
    noise_line = sections.noise_line or records.noise_line
    if noise_line is not None:
        message = f"{source}, line {noise_line}: noise data of the two-port were skipped."
        findings.append(Finding("noise-data-skipped", "note", message))
    return NetworkData(points, references, _understood(header), tuple(sections.comments), tuple(findings))


def _split(text: str, source: str, ports: int | None) -> _Sections:
    """Sort the lines of a file into header, comments and data."""
    lines = numbered_lines(text)
    sections = _Sections(Header(source, ports), lines=len(lines))
    content = _without_comments(lines, sections.comments)
    first = next(content, None)
    if first is None:
        raise sections.header.refuse(
            "no data; expected an option line such as '# MHz S RI R 50' and data points.", len(lines)
        )
    if first[1].startswith("["):
        sections.header.version = parse_version(sections.header, *first)
        _split_version_2(sections, content)
    else:
        _split_version_1(sections, [first, *content])
    return sections


def _without_comments(lines: Iterable[tuple[int, str]], comments: list[str]) -> Iterator[tuple[int, str]]:
    for number, line in lines:
        content, mark, comment = line.partition("!")
        if mark and comment.strip():
            comments.append(comment.strip())
        if content.strip(BLANKS):
            yield number, content.strip(BLANKS)


def _split_version_1(sections: _Sections, content: Iterable[tuple[int, str]]) -> None:
    header = sections.header
    for number, line in content:
        if line.startswith("["):
            raise header.refuse(f"keyword {quoted(line)} in a file without [Version] as its first line.", number)
        if line.startswith("#"):
            _take_options(header, number, line)
        elif header.stated_options is None:
            raise header.refuse(
                f"data before any option line: {quoted(line)}; expected a line such as '# MHz S RI R 50' that says the "
                "unit, kind and format of the numbers.",
                number,
            )
        else:
            sections.data.append((number, line))


def _take_options(header: Header, number: int, line: str) -> None:
    options = parse_option_line(header, number, line)
    if header.stated_options not in (None, options):
        raise header.refuse(
            f"a second option line, {quoted(line)}, contradicts the first; expected one. Were two files joined?", number
        )
    header.stated_options = options


def _split_version_2(sections: _Sections, content: Iterator[tuple[int, str]]) -> None:
    header = sections.header
    place = "header"
    for number, line in _without_information(content, header):
        if place == "end":
            sections.doubts.append(f"line {number} and what follows stand after [End] and were ignored")
            return
        if line.startswith("["):
            place = _next_place(header, number, line, place)
            sections.noise_line = number if place == "noise" else sections.noise_line
        elif line.startswith("#") and place == "header":
            if header.stated_options is not None:
                raise header.refuse("a second option line; expected one.", number)
            header.stated_options = parse_option_line(header, number, line)
        elif place == "data":
            sections.data.append((number, line))
        elif place == "reference":
            sections.reference_lines.append((number, line))
        elif place != "noise":
            raise header.refuse(f"{quoted(line)} before [Network Data]; expected a keyword.", number)
    if place != "end":
        sections.doubts.append("[End] is missing: the file may be cut short")


def _without_information(content: Iterable[tuple[int, str]], header: Header) -> Iterator[tuple[int, str]]:
    """The lines outside [Begin Information] ... [End Information], where anything may stand."""
    opened: int | None = None
    for number, line in content:
        lowered = " ".join(line.lower().split())
        if opened is None and lowered == "[begin information]":
            opened = number
        elif opened is None:
            yield number, line
        elif lowered == "[end information]":
            opened = None
    if opened is not None:
        raise header.refuse("[Begin Information] has no [End Information]; the data cannot be found.", opened)


def _next_place(header: Header, number: int, line: str, place: str) -> str:
    """Enter a keyword line into the header and say what the lines after it are."""
    keyword = take_keyword(header, number, line)
    after_data = place in ("data", "noise")
    if after_data != (keyword in ("noise data", "end")):
        raise header.refuse(f"{quoted(line)} stands {'after' if after_data else 'before'} the network data.", number)
    if header.stated_options is None:
        raise header.refuse(f"{quoted(line)} before the option line; expected '# ...' after [Version].", number)
    if keyword in ("network data", "noise data", "end") and header.argument(keyword):
        raise header.refuse(f"{quoted(line)}: expected nothing after the keyword on its line.", number)
    places = {"network data": "data", "noise data": "noise", "end": "end", "reference": "reference"}
    return places.get(keyword, "header")


def _check_header(header: Header, ports_of_name: int | None, last_line: int) -> None:
    """Refuse a file whose header lacks what its numbers need to be understood, at the line where it is missed."""
    if header.stated_options is None:
        raise header.refuse("no option line; expected a line such as '# MHz S RI R 50' before the data.", last_line)
    if not header.is_version_2:
        if ports_of_name is None:
            raise header.refuse("no [Version] line; expected '[Version] 2.0' first in a .ts file.", 1)
        return
    missed = header.keywords.get("network data", (last_line, ""))[0]
    required = ["number of ports", "number of frequencies", "network data"]
    required += ["two-port data order"] if header.stated_ports == 2 else []
    for keyword in required:
        if keyword not in header.keywords:
            name = "[" + keyword.title().replace("Of", "of") + "]"
            raise header.refuse(f"{name} is missing; version {header.version} of the format requires it.", missed)


def _scattering(header: Header, references: RealArray, records: Records) -> ComplexArray:
    """Scattering parameters (F, n, n); version-1 Z and Y are normalised to R already, version-2 ones are not."""
    values, parameter = records.values, header.options.parameter
    # What overflows is refused below.
    with np.errstate(all="ignore"):
        if parameter == "Z":
            values = normalised_impedance(values, references) if header.is_version_2 else values
            values = scattering_from_normalised_impedance(values)
        elif parameter == "Y":
            values = normalised_admittance(values, references) if header.is_version_2 else values
            values = scattering_from_normalised_admittance(values)
    infinite = ~np.isfinite(values).all(axis=(1, 2))
    if np.any(infinite):
        line = int(records.line[np.argmax(infinite)])
        raise header.refuse(f"this {parameter} value has no finite reflection.", line)
    return values


def _doubts_about_values(header: Header, records: Records) -> list[str]:
    parameter = header.options.parameter
    if header.is_version_2 or parameter == "S" or header.options.reference_ohm == 1.0:
        return []
    values = records.values[:, 0, 0]
    size, resistance = float(np.median(np.abs(values))), float(np.median(values.real))
    plain_ohms = parameter == "Z" and (resistance >= _PLAIN_RESISTANCE or size >= _PLAIN_SIZE)
    plain_siemens = parameter == "Y" and size <= 1.0 / _PLAIN_SIZE
    if not (plain_ohms or plain_siemens):
        return []
    unit = "ohms" if plain_ohms else "siemens"
    return [
        f"version-1 {parameter} data are normalised to R, but a median of {size:.3g} looks like plain {unit}; if it "
        "is, write 'R 1' in the option line of a copy"
    ]


def _understood(header: Header) -> dict[str, str | int | float]:
    return {
        "format": "Touchstone",
        "version": "1.x" if not header.is_version_2 else header.version,
        "parameter": header.options.parameter,
        "number_format": header.options.number_format,
        "frequency_unit": header.options.unit,
        "ports": header.ports,
    }
