"""
What a Touchstone file says about its own numbers: option line and, in version 2, keywords.

References
----------
.. [1] EIA/IBIS Open Forum, *Touchstone File Format Specification*, version 1.1 (2002).
.. [2] IBIS Open Forum, *Touchstone File Format Specification*, version 2.0 (2009) and 2.1 (2024).
   The rules are written here from memory; tests hold them against the standard's own examples.
"""

import re
from collections.abc import Iterator
from dataclasses import dataclass, field

import numpy as np

from feedpoint.errors import SweepRefused, quoted
from feedpoint.line import RealArray
from feedpoint.sweep.record import LARGEST_REFERENCE_OHM, SMALLEST_REFERENCE_OHM
from feedpoint.units import parse_number

_UNITS_HZ = {"HZ": 1.0, "KHZ": 1e3, "MHZ": 1e6, "GHZ": 1e9}
_UNIT_NAMES = {1.0: "Hz", 1e3: "kHz", 1e6: "MHz", 1e9: "GHz"}
_PARAMETERS = ("S", "Z", "Y")
_FORMATS = ("RI", "MA", "DB")
_VERSIONS = ("2.0", "2.1")
# Room for every network that has a sweep in it; a wrong digit must not ask for gigabytes.
MOST_PORTS = 99
# Keywords of version 2 between [Version] and the data, in lower case.
_HEADER_KEYWORDS = (
    "number of ports",
    "two-port data order",
    "number of frequencies",
    "number of noise frequencies",
    "reference",
    "matrix format",
    "mixed-mode order",
)


@dataclass
class Options:
    """The option line; the defaults are the standard's: `# GHz S MA R 50`."""

    unit_hz: float = 1e9
    parameter: str = "S"
    number_format: str = "MA"
    reference_ohm: float = 50.0
    unit_stated: bool = False
    format_stated: bool = False

    @property
    def unit(self) -> str:
        """Name of the frequency unit."""
        return _UNIT_NAMES[self.unit_hz]


@dataclass
class Header:
    """Everything that the data section's meaning depends on."""

    source: str
    stated_ports: int | None
    version: str = "1"
    stated_options: Options | None = None
    keywords: dict[str, tuple[int, str]] = field(default_factory=dict)

    @property
    def ports(self) -> int:
        """Number of ports; the header has been checked to state it."""
        assert self.stated_ports is not None
        return self.stated_ports

    @property
    def options(self) -> Options:
        """The option line; the header has been checked to have one."""
        assert self.stated_options is not None
        return self.stated_options

    @property
    def is_version_2(self) -> bool:
        """Whether keywords rule the file."""
        return self.version != "1"

    def argument(self, keyword: str) -> str | None:
        """Return what stands after a keyword; None where the file does not have it."""
        return self.keywords[keyword][1] if keyword in self.keywords else None

    def refuse(self, message: str, line: int | None = None) -> SweepRefused:
        """Return the refusal of this file."""
        return SweepRefused(message, source=self.source, line=line)


def parse_option_line(header: Header, line: int, text: str) -> Options:
    """
    Return what an option line such as ``# MHz S RI R 50`` says; words in any order and case, each at most once.

    Raises
    ------
    SweepRefused
        For an unknown or repeated word, or a reference that is no positive number.
    """
    options = Options()
    words = iter(text.lstrip("#").split())
    seen: set[str] = set()
    for word in words:
        kind = _take_option(header, line, options, word.upper(), words)
        if kind in seen:
            raise header.refuse(f"the option line names the {kind} twice: {quoted(text)}.", line)
        seen.add(kind)
    return options


def _take_option(header: Header, line: int, options: Options, word: str, rest: Iterator[str]) -> str:
    if word in _UNITS_HZ:
        options.unit_hz, options.unit_stated = _UNITS_HZ[word], True
        return "frequency unit"
    if word in _PARAMETERS:
        options.parameter = word
        return "parameter"
    if word in _FORMATS:
        options.number_format, options.format_stated = word, True
        return "number format"
    if word == "R":
        options.reference_ohm = positive_number(header, line, next(rest, ""), "reference resistance after 'R'")
        return "reference"
    if word in ("G", "H"):
        raise header.refuse(f"{word} parameters; expected S, Z or Y, which a one-port has.", line)
    raise header.refuse(
        f"unknown word {quoted(word)} in the option line; expected a frequency unit (Hz, kHz, MHz, GHz), S, Z or Y, "
        "RI, MA or DB, and R with the reference resistance, such as '# MHz S RI R 50'.",
        line,
    )


def take_keyword(header: Header, line: int, text: str) -> str:
    """
    Enter a line ``[Keyword] argument`` of version 2 into `header` and return the keyword, in lower case.

    Raises
    ------
    SweepRefused
        For an unknown or repeated keyword, or an argument that cannot be.
    """
    match = re.fullmatch(r"\[\s*(.*?)\s*\](.*)", text)
    keyword = re.sub(r"\s+", " ", match[1]).lower() if match else ""
    if match is None or (keyword not in _HEADER_KEYWORDS and keyword not in ("network data", "noise data", "end")):
        raise header.refuse(f"unknown keyword {quoted(text)}; expected one of the Touchstone version 2 keywords.", line)
    if keyword in header.keywords:
        raise header.refuse(f"{quoted(match[0])} is the second of its kind; expected it once.", line)
    header.keywords[keyword] = (line, match[2].strip())
    match keyword:
        case "number of ports":
            _take_ports(header, line, match[2])
        case "number of frequencies" | "number of noise frequencies":
            whole_number(header, line, match[2], f"[{keyword.title().replace('Of', 'of')}]")
        case "mixed-mode order":
            raise header.refuse("mixed-mode data; expected single-ended ports.", line)
        case "two-port data order" if match[2].strip() not in ("12_21", "21_12"):
            raise header.refuse(f"two-port data order {quoted(match[2].strip())}; expected 12_21 or 21_12.", line)
        case "matrix format" if match[2].strip().lower() not in ("full", "lower", "upper"):
            raise header.refuse(f"matrix format {quoted(match[2].strip())}; expected Full, Lower or Upper.", line)
    return keyword


def _take_ports(header: Header, line: int, argument: str) -> None:
    ports = whole_number(header, line, argument, "[Number of Ports]")
    if ports > MOST_PORTS:
        raise header.refuse(f"[Number of Ports] is {ports}; expected at most {MOST_PORTS}.", line)
    if header.stated_ports not in (None, ports):
        raise header.refuse(
            f"[Number of Ports] is {ports} but the file name says {header.stated_ports}; expected the same. "
            "Rename the file.",
            line,
        )
    header.stated_ports = ports


def parse_version(header: Header, line: int, text: str) -> str:
    """Return the version that the first line of a version 2 file names."""
    match = re.fullmatch(r"\[\s*version\s*\]\s*(.*?)\s*", text, re.IGNORECASE)
    if match is None:
        raise header.refuse(
            f"keyword {quoted(text)} before [Version]; expected '[Version] 2.0' first, or an option line.", line
        )
    if match[1] not in _VERSIONS:
        raise header.refuse(f"version {quoted(match[1])}; expected 2.0 or 2.1.", line)
    return match[1]


def references_ohm(header: Header, continued: list[tuple[int, str]]) -> RealArray:
    """
    Return the reference resistance of each port (ports,) [ohm].

    Version 2 may state them with [Reference], on the keyword's line or (`continued`) on the lines after it.
    """
    if "reference" not in header.keywords:
        return np.full(header.ports, header.options.reference_ohm)
    line, argument = header.keywords["reference"]
    words = [(line, word) for word in argument.split()]
    words += [(number, word) for number, text in continued for word in text.split()]
    if len(words) != header.ports:
        raise header.refuse(
            f"[Reference] has {len(words)} value(s); expected {header.ports}, one for each port.", line
        )
    return np.array([positive_number(header, number, word, "reference resistance") for number, word in words])


def positive_number(header: Header, line: int, word: str, what: str) -> float:
    """Return the positive number that `word` is."""
    try:
        number = parse_number(word)
    except ValueError:
        raise header.refuse(f"{what}: found {quoted(word)}, expected a positive number such as 50.", line) from None
    if number <= 0:
        raise header.refuse(f"{what} is {word}; expected more than 0 ohm.", line)
    if not SMALLEST_REFERENCE_OHM <= number <= LARGEST_REFERENCE_OHM:
        raise header.refuse(f"{what} is {word}; expected one such as 50.", line)
    return number


def whole_number(header: Header, line: int, argument: str, what: str) -> int:
    """Return the whole number >= 1 that follows a keyword."""
    argument = argument.strip()
    if re.fullmatch("[0-9]{1,9}", argument, re.ASCII) is None or int(argument) < 1:
        raise header.refuse(f"{what} is {quoted(argument)}; expected a whole number from 1.", line)
    return int(argument)
