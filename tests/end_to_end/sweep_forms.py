"""
One invented antenna's sweep, written in every way the Touchstone standard allows.

The impedance at the shack end is chosen first and written out in each form, so it is known without any reader.
"""

import cmath
import math

FREQUENCY_HZ = [14.0e6 + 0.1e6 * step for step in range(7)]
SHACK_OHM = [complex(38 + 4 * step, -41 + 13 * step) for step in range(7)]
OTHER_PORT_OHM = 123.0 - 45.0j


def reflection(impedance_ohm: complex, reference_ohm: float) -> complex:
    """Gamma = (Z - R)/(Z + R)."""
    return (impedance_ohm - reference_ohm) / (impedance_ohm + reference_ohm)


def pair(value: complex, form: str = "RI") -> str:
    """One complex number in a Touchstone number format."""
    angle = math.degrees(cmath.phase(value))
    magnitude = abs(value)
    first, second = {
        "RI": (value.real, value.imag),
        "MA": (magnitude, angle),
        "DB": (20 * math.log10(magnitude), angle),
    }[form]
    return f"{first:.12g} {second:.12g}"


def records(form: str = "RI", unit_hz: float = 1e6, reference_ohm: float = 50.0, parameter: str = "S") -> list[str]:
    """The sweep as lines of numbers; Z and Y normalised to the reference as in version 1 (1 ohm: not normalised)."""
    of = {
        "S": lambda z: reflection(z, reference_ohm),
        "Z": lambda z: z / reference_ohm,
        "Y": lambda z: reference_ohm / z,
    }[parameter]
    return [f"{f / unit_hz:.12g} {pair(of(z), form)}" for f, z in zip(FREQUENCY_HZ, SHACK_OHM, strict=True)]


def version_1(option_line: str, lines: list[str], comment: str = "! invented") -> str:
    """A version 1 file."""
    return "\n".join([comment, option_line, *lines]) + "\n"


def version_2(
    lines: list[str], *, option_line: str = "# MHz S RI R 50", keywords: str = "", number: str = "2.0", ports: int = 1
) -> str:
    """A version 2 file; `keywords` are the lines between the number of frequencies and the data."""
    head = f"[Version] {number}\n{option_line}\n[Number of Ports] {ports}\n"
    order = "[Two-Port Data Order] 21_12\n" if ports == 2 else ""
    head += f"{order}[Number of Frequencies] {len(FREQUENCY_HZ)}\n{keywords}"
    return head + "[Network Data]\n" + "\n".join(lines) + "\n[End]\n"


def matrix_records(layout: str, port: int = 1) -> list[str]:
    """Two-port records with the sweep at one port: `full` S11 S21 S12 S22, `half` S11 S21 S22."""
    other = reflection(OTHER_PORT_OHM, 50.0)
    lines = []
    for f, z in zip(FREQUENCY_HZ, SHACK_OHM, strict=True):
        own = reflection(z, 50.0)
        s11, s22 = (own, other) if port == 1 else (other, own)
        through = [pair(0.11 + 0.07j)] * (2 if layout == "full" else 1)
        lines.append(" ".join([f"{f / 1e6:.12g}", pair(s11), *through, pair(s22)]))
    return lines


def three_port_records(layout: str) -> list[str]:
    """Three-port records of a line per matrix row; the sweep is at port 2, whose place differs between layouts."""
    other, through = pair(reflection(OTHER_PORT_OHM, 50.0)), pair(0.11 + 0.07j)
    lines = []
    for f, z in zip(FREQUENCY_HZ, SHACK_OHM, strict=True):
        own = pair(reflection(z, 50.0))
        rows = {
            "full": [[other, through, through], [through, own, through], [through, through, other]],
            "lower": [[other], [through, own], [through, through, other]],
            "upper": [[other, through, through], [own, through], [other]],
        }[layout]
        rows[0].insert(0, f"{f / 1e6:.12g}")
        lines += [" ".join(row) for row in rows]
    return lines


RI = records()
MHZ = "# MHz S RI R 50"
NOISE = ["4.0 1.2 0.3 45 0.4", "8.0 1.3 0.3 50 0.4", "16.0 1.4 0.3 55 0.4"]
OHMS = records(reference_ohm=1.0, parameter="Z")
SIEMENS = records(reference_ohm=1.0, parameter="Y")

# name of the case, file name, text, further options
FORMS = [
    ("hertz, magnitude and angle", "a.s1p", version_1("# Hz S MA R 50", records("MA", 1.0)), []),
    ("kilohertz, decibels", "a.s1p", version_1("# kHz S DB R 50", records("DB", 1e3)), []),
    ("gigahertz", "a.s1p", version_1("# GHz S RI R 50", records("RI", 1e9)), []),
    ("reference of 75 ohms", "a.s1p", version_1("# MHz S RI R 75", records(reference_ohm=75.0)), []),
    ("all defaults: GHz S MA R 50", "a.s1p", version_1("#", records("MA", 1e9)), []),
    ("only the unit", "a.s1p", version_1("# MHz", records("MA")), []),
    ("only the number format", "a.s1p", version_1("# RI", records("RI", 1e9)), []),
    ("only the reference", "a.s1p", version_1("# R 75", records("MA", 1e9, 75.0)), []),
    ("option words the other way round", "a.s1p", version_1("# R 75 RI S MHz", records(reference_ohm=75.0)), []),
    ("reference in the middle", "a.s1p", version_1("# RI R 75.0 MHz S", records(reference_ohm=75.0)), []),
    ("small option letters", "a.s1p", version_1("# mhz s ri r 50", RI), []),
    ("capital option letters", "a.s1p", version_1("# MHZ S RI R 5.0E+01", RI), []),
    ("comment behind the options", "a.s1p", version_1("# MHz S RI R 50 ! 50 ohms", RI), []),
    ("capital ending", "A.S1P", version_1(MHZ, RI), []),
    ("name with blanks, brackets and umlauts", "Dach [alt] süd.s1p", version_1(MHZ, RI), []),
    ("tabs", "a.s1p", version_1(MHZ.replace(" ", "\t"), [line.replace(" ", "\t") for line in RI]), []),
    ("indented, blanks at line ends", "a.s1p", version_1("  " + MHZ + "  ", [f"   {line}  " for line in RI]), []),
    ("blank lines", "a.s1p", "\n\n" + version_1(MHZ, ["", *(line + "\n \t" for line in RI), ""]), []),
    ("lines end as on Windows", "a.s1p", version_1(MHZ, RI).replace("\n", "\r\n"), []),
    ("comments everywhere", "a.s1p", version_1(MHZ, ["! before", *(line + " ! 1 2 3" for line in RI), "!"]), []),
    ("comments that begin with Gamma", "a.s1p", version_1(MHZ, ["! Gamma 0.1 0.2", *RI], "! Gamma"), []),
    ("comments that name a port impedance", "a.s1p", version_1(MHZ, ["! Port Impedance 75 0", *RI]), []),
    ("comment that looks like options", "a.s1p", version_1(MHZ, RI, "! # Hz S MA R 75"), []),
    ("comment in UTF-8", "a.s1p", version_1(MHZ, RI, "! 23 °C, Füßchen, 50 Ω"), []),
    ("byte order mark", "a.s1p", "\ufeff" + version_1(MHZ, RI), []),
    ("plus signs", "a.s1p", version_1(MHZ, ["+" + line for line in RI]), []),
    ("z1p, normalised", "a.z1p", version_1("# MHz Z RI R 50", records(parameter="Z")), []),
    ("z1p, normalised to 75", "a.z1p", version_1("# MHz Z MA R 75", records("MA", 1e6, 75.0, "Z")), []),
    ("y1p, normalised", "a.y1p", version_1("# MHz Y RI R 50", records(parameter="Y")), []),
    ("y1p, normalised to 75", "a.y1p", version_1("# MHz Y DB R 75", records("DB", 1e6, 75.0, "Y")), []),
    ("version 2, S", "a.ts", version_2(RI), []),
    ("version 2 in an s1p file", "a.s1p", version_2(RI), []),
    ("version 2.1", "a.ts", version_2(RI, number="2.1"), []),
    ("version 2, Z in ohms", "a.ts", version_2(OHMS, option_line="# MHz Z RI R 50"), []),
    ("version 2, Y in siemens", "a.ts", version_2(SIEMENS, option_line="# MHz Y RI R 75"), []),
    ("version 2, defaults", "a.ts", version_2(records("MA", 1e9), option_line="#"), []),
    ("reference before the option's", "a.ts", version_2(records(reference_ohm=75.0), keywords="[Reference] 75\n"), []),
    ("reference on the next line", "a.ts", version_2(records(reference_ohm=75.0), keywords="[Reference]\n75.0\n"), []),
    ("keywords in small letters", "a.ts", version_2(RI).replace("[N", "[n").replace("Ports", "ports"), []),
    ("keywords in capitals", "a.ts", version_2(RI).replace("[Network Data]", "[NETWORK DATA]"), []),
    ("comments between keywords", "a.ts", version_2(RI, keywords="! one\n\n! two\n").replace("1\n", "1 ! x\n", 1), []),
    (
        "information",
        "a.ts",
        version_2(RI, keywords="[Begin Information]\nUser's own: 1 2 3\n[Owner] nobody\n[End Information]\n"),
        [],
    ),
    ("two-port, port 1", "a.s2p", version_1(MHZ, matrix_records("full")), ["--port", "1"]),
    ("two-port, port 2", "a.s2p", version_1(MHZ, matrix_records("full", 2)), ["--port", "2"]),
    ("two-port with noise data", "a.s2p", version_1(MHZ, [*matrix_records("full"), *NOISE]), ["--port", "1"]),
    ("three-port, port 2", "a.s3p", version_1(MHZ, three_port_records("full")), ["--port", "2"]),
    ("version 2 two-port", "a.ts", version_2(matrix_records("full"), ports=2), ["--port", "1"]),
    (
        "version 2 two-port, other order",
        "a.ts",
        version_2(matrix_records("full", 2), ports=2).replace("21_12", "12_21"),
        ["--port", "2"],
    ),
    (
        "lower matrix",
        "a.ts",
        version_2(matrix_records("half", 2), ports=2, keywords="[Matrix Format] Lower\n"),
        ["--port", "2"],
    ),
    (
        "upper matrix",
        "a.ts",
        version_2(matrix_records("half", 2), ports=2, keywords="[Matrix Format] Upper\n"),
        ["--port", "2"],
    ),
    (
        "lower three-port matrix",
        "a.ts",
        version_2(three_port_records("lower"), ports=3, keywords="[Matrix Format] Lower\n"),
        ["--port", "2"],
    ),
    (
        "upper three-port matrix",
        "a.ts",
        version_2(three_port_records("upper"), ports=3, keywords="[Matrix Format] Upper\n"),
        ["--port", "2"],
    ),
    (
        "version 2 noise data",
        "a.ts",
        version_2(matrix_records("full"), ports=2, keywords="[Number of Noise Frequencies] 3\n").replace(
            "[End]", "\n".join(["[Noise Data]", *NOISE, "[End]"])
        ),
        ["--port", "1"],
    ),
    (
        "references of two ports",
        "a.ts",
        version_2(matrix_records("full", 2), ports=2, keywords="[Reference] 75 50\n"),
        ["--port", "2"],
    ),
    (
        "duplicates that agree",
        "a.s1p",
        version_1(MHZ, [line for line in RI for _ in range(2)]),
        [],
    ),
    ("point at 0 Hz", "a.s1p", version_1(MHZ, ["0 0.99 0", *RI]), []),
    ("descending frequencies", "a.s1p", version_1(MHZ, RI[::-1]), []),
]
