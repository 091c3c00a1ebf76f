"""
Sweep files that must not be read: each defect is refused in one line that names the file, the line and the thing.

A defect that is read without a word becomes a wrong impedance.
The line that a message must name is the one that was spoilt.
All sweeps are invented.
"""

import hashlib
import pickle
import time
from pathlib import Path

import pytest

from .command import Fragment, assert_refused, run_feedpoint, word

RUN_SHEET = """\
[run]
name = "invented run"

[[section]]
name = "main run"
z0_ohm = 50.0
velocity_factor = 0.66
conductor_loss = 1.4
dielectric_loss = 0.02
length_m = 12.0
"""

VERSION_1 = """\
! dipole at the shack end, invented
# MHz S RI R 50
14.0 0.30 0.10
14.1 0.25 0.12
14.2 0.20 0.15
14.3 0.15 0.20
14.4 0.12 0.26
"""

VERSION_2 = """\
! dipole at the shack end, invented
[Version] 2.0
# MHz S RI R 50
[Number of Ports] 1
[Number of Frequencies] 5
[Reference] 50
[Network Data]
14.0 0.30 0.10
14.1 0.25 0.12
14.2 0.20 0.15
14.3 0.15 0.20
14.4 0.12 0.26
[End]
"""

TWO_PORT = """\
[Version] 2.0
# MHz S RI R 50
[Number of Ports] 2
[Two-Port Data Order] 21_12
[Number of Frequencies] 2
[Network Data]
14.0 0.30 0.10 0.5 0.1 0.5 0.1 0.2 0.2
14.1 0.25 0.12 0.5 0.1 0.5 0.1 0.2 0.2
[End]
"""

NO_DATA: Fragment = ("data", "point", "record", "frequenc")
OPTION_LINE: Fragment = ("option line", "'#", '"#')


def with_line(text: str, number: int, line: str | None) -> str:
    """Text with one line (counted from 1) replaced, or taken out where `line` is None."""
    lines = text.splitlines()
    lines[number - 1 : number] = [] if line is None else [line]
    return "\n".join(lines) + "\n"


def before_line(text: str, number: int, line: str) -> str:
    """Text with a line put in so that it becomes line `number`."""
    lines = text.splitlines()
    lines.insert(number - 1, line)
    return "\n".join(lines) + "\n"


# Defects of one line: (name, line put in its place, fragments); the message must name that line.
OPTION_DEFECTS = [
    ("unknown word", "# MHz S RI R 50 FAST", ("FAST",)),
    ("unit that the format does not have", "# THz S RI R 50", ("THz",)),
    ("unit by guess", "# Mega S RI R 50", ("Mega",)),
    ("two units", "# MHz GHz S RI R 50", ("GHz",)),
    ("two number formats", "# MHz S RI MA R 50", ("MA",)),
    ("two parameters", "# MHz S Z RI R 50", (word("Z"),)),
    ("hybrid parameters of a one-port", "# MHz H RI R 50", ((word("H"), "hybrid"),)),
    ("R without its number", "# MHz S RI R", (word("R"),)),
    ("R in words", "# MHz S RI R fifty", ("fifty",)),
    ("R of zero", "# MHz S RI R 0", (word("0"),)),
    ("R below zero", "# MHz S RI R -50", ("-50",)),
    ("R not a number", "# MHz S RI R nan", ("nan",)),
    ("R infinite", "# MHz S RI R inf", ("inf",)),
    ("R beyond double precision", "# MHz S RI R 1e400", (("1e400", "inf"),)),
    ("number without its R", "# MHz S RI 75", ("75",)),
    ("second number after R", "# MHz S RI R 50 75", ("75",)),
]

RECORD_DEFECTS = [
    ("two numbers", "14.2 0.20", (3,)),
    ("four numbers", "14.2 0.20 0.15 0.10", (3,)),
    ("five numbers", "14.2 0.20 0.15 0.10 0.05", (3,)),
    ("frequency alone", "14.2", (3,)),
    ("text for a number", "14.2 abc 0.15", ("abc",)),
    ("not a number", "14.2 nan 0.15", ("nan",)),
    ("infinite", "14.2 0.20 -inf", ("-inf",)),
    ("frequency not a number", "NaN 0.20 0.15", ("nan",)),
    ("beyond double precision", "14.2 1e400 0.15", (("1e400", "inf"),)),
    ("full-width digits", "14.2 \uff10.\uff12 0.15", (("\uff10.\uff12", "ascii"),)),
    ("Arabic-Indic digits", "\u0661\u0664.\u0662 0.20 0.15", (("\u0661\u0664.\u0662", "ascii"),)),
    ("typographic minus", "14.2 0.20 \u22120.15", (("\u22120.15", "ascii"),)),
    ("no-break space between numbers", "14.2\u00a00.20 0.15", ()),
    ("control character between numbers", "14.2\x1f0.20 0.15", ()),
    ("frequency beyond double precision", "1e400 0.20 0.15", ()),
    ("frequency that its unit takes beyond double precision", "1e305 0.20 0.15", ()),
    ("underscore in a number", "1_4.2 0.20 0.15", ("1_4.2",)),
    ("hexadecimal number", "14.2 0x1p-2 0.15", ("0x1p-2",)),
    ("imaginary unit", "14.2 0.20 0.15j", ("0.15j",)),
    ("decimal commas", "14,2 0,20 0,15", ("14,2",)),
    ("commas between numbers", "14.2,0.20,0.15", (("14.2,0.20,0.15", 3),)),
    ("negative frequency", "-14.2 0.20 0.15", ("-14.2",)),
    ("duplicate frequency that differs", "14.1 0.90 0.10", (("14.1", "14100000"),)),
    ("frequency out of order", "13.0 0.20 0.15", ("13",)),
    ("keyword in a version 1 file", "[Matrix Format] Full", (("Matrix Format", "[Version]"),)),
]

HEADER_DEFECTS = [
    ("unknown version", 2, "[Version] 3.0", ("3.0",)),
    ("version without its number", 2, "[Version]", ("version",)),
    ("version in words", 2, "[Version] two", ("two",)),
    ("misspelt keyword", 4, "[Number of Prts] 1", ("Number of Prts",)),
    ("keyword without its bracket", 4, "[Number of Ports 1", ("Number of Ports",)),
    ("ports in words", 4, "[Number of Ports] one", ("one",)),
    ("no ports", 4, "[Number of Ports] 0", (word("0"),)),
    ("part of a port", 4, "[Number of Ports] 1.5", ("1.5",)),
    ("ports without a number", 4, "[Number of Ports]", ("Number of Ports",)),
    ("frequencies in words", 5, "[Number of Frequencies] five", ("five",)),
    ("frequencies without a number", 5, "[Number of Frequencies]", ("Number of Frequencies",)),
    ("frequencies below zero", 5, "[Number of Frequencies] -5", ("-5",)),
    ("reference of zero", 6, "[Reference] 0", (word("0"),)),
    ("reference below zero", 6, "[Reference] -50", ("-50",)),
    ("reference in words", 6, "[Reference] fifty", ("fifty",)),
    ("reference not a number", 6, "[Reference] nan", ("nan",)),
    ("two references for one port", 6, "[Reference] 50 75", (("Reference", "75"),)),
    ("number that is not one", 10, "14.2 nan 0.15", ("nan",)),
    ("record cut short", 10, "14.2 0.20", (3,)),
    ("duplicate that differs", 10, "14.1 0.90 0.10", (("14.1", "14100000"),)),
]

# Defects that are not those of one line, or where the blame could lie on two: the file must be named.
WHOLE_FILE_DEFECTS = [
    ("no data", "dipole.s1p", "! nothing else\n# MHz S RI R 50\n", (NO_DATA,)),
    ("only a point at 0 Hz", "dipole.s1p", "# MHz S RI R 50\n0 0.1 0.1\n", (NO_DATA,)),
    ("only comments", "dipole.s1p", "! nothing\n! at all\n", ((NO_DATA, OPTION_LINE),)),
    ("no data in version 2", "dipole.ts", VERSION_2.split("14.0")[0] + "[End]\n", ((NO_DATA, 5),)),
    ("no [Number of Ports]", "dipole.ts", with_line(VERSION_2, 4, None), ("Number of Ports",)),
    ("no [Number of Frequencies]", "dipole.ts", with_line(VERSION_2, 5, None), ("Number of Frequencies",)),
    ("fewer records than said", "dipole.ts", with_line(VERSION_2, 5, "[Number of Frequencies] 6"), (6, 5)),
    ("more records than said", "dipole.ts", with_line(VERSION_2, 5, "[Number of Frequencies] 4"), (4,)),
    (
        "no [Network Data]",
        "dipole.ts",
        with_line(with_line(VERSION_2, 7, None), 6, None),
        (("Network Data", "keyword"),),
    ),
    ("no option line in version 2", "dipole.ts", with_line(VERSION_2, 3, None), (OPTION_LINE,)),
    ("[Version] not first", "dipole.ts", before_line(with_line(VERSION_2, 2, None), 3, "[Version] 2.0"), ("Version",)),
    ("reference swallowed by the next keyword", "dipole.ts", with_line(VERSION_2, 6, "[Reference]"), ("Reference",)),
    ("keyword twice", "dipole.ts", before_line(VERSION_2, 5, "[Number of Ports] 1"), ("Number of Ports",)),
    ("information without end", "dipole.ts", before_line(VERSION_2, 4, "[Begin Information]"), ("Information",)),
    ("unknown matrix format", "two.ts", before_line(TWO_PORT, 6, "[Matrix Format] Diagonal"), ("Diagonal",)),
    ("full records said to be lower", "two.ts", before_line(TWO_PORT, 6, "[Matrix Format] Lower"), (7,)),
    ("no [Two-Port Data Order]", "two.ts", with_line(TWO_PORT, 4, None), ("Two-Port Data Order",)),
    ("unknown data order", "two.ts", with_line(TWO_PORT, 4, "[Two-Port Data Order] 11_22"), ("11_22",)),
    ("one-port records in a two-port file", "dipole.s2p", VERSION_1, (9,)),
    ("two-port record cut short", "two.s2p", "# MHz S RI R 50\n14.0 0.3 0.1 0.5 0.1 0.5 0.1\n", (9,)),
    ("zero byte in a number", "dipole.s1p", with_line(VERSION_1, 5, "14.2 0.2\x000 0.15"), ()),
]


def deembed(directory: Path, name: str, text: str | bytes | None, *options: str):
    """Write a sweep (unless None) and the run sheet, and have the command de-embed it there."""
    (directory / "run.toml").write_text(RUN_SHEET, encoding="utf-8")
    if text is not None:
        (directory / name).write_bytes(text if isinstance(text, bytes) else text.encode())
    return run_feedpoint("deembed", name, "--run", "run.toml", *options, cwd=directory)


def test_the_files_that_the_defects_are_put_into_are_good(tmp_path):
    for name, text in (("dipole.s1p", VERSION_1), ("dipole.ts", VERSION_2), ("two.ts", TWO_PORT)):
        assert deembed(tmp_path, name, text).returncode == 0


@pytest.mark.parametrize(("line", "fragments"), [pytest.param(*d[1:], id=d[0]) for d in OPTION_DEFECTS])
def test_defect_of_the_option_line(tmp_path, line, fragments):
    process = deembed(tmp_path, "dipole.s1p", with_line(VERSION_1, 2, line))
    assert_refused(process, *fragments, place="dipole.s1p, line 2")


@pytest.mark.parametrize(("line", "fragments"), [pytest.param(*d[1:], id=d[0]) for d in RECORD_DEFECTS])
def test_defect_of_a_record(tmp_path, line, fragments):
    process = deembed(tmp_path, "dipole.s1p", with_line(VERSION_1, 5, line))
    assert_refused(process, *fragments, place="dipole.s1p, line 5")


@pytest.mark.parametrize(("number", "line", "fragments"), [pytest.param(*d[1:], id=d[0]) for d in HEADER_DEFECTS])
def test_defect_of_a_version_2_line(tmp_path, number, line, fragments):
    process = deembed(tmp_path, "dipole.ts", with_line(VERSION_2, number, line))
    assert_refused(process, *fragments, place=f"dipole.ts, line {number}")


@pytest.mark.parametrize(("name", "text", "fragments"), [pytest.param(*d[1:], id=d[0]) for d in WHOLE_FILE_DEFECTS])
def test_defect_of_the_whole_file(tmp_path, name, text, fragments):
    assert_refused(deembed(tmp_path, name, text), name, *fragments)


def test_records_without_an_option_line_are_not_taken_as_the_defaults(tmp_path):
    process = deembed(tmp_path, "dipole.s1p", with_line(VERSION_1, 2, None))
    assert_refused(process, OPTION_LINE, place="dipole.s1p, line 2")


def test_records_before_the_option_line(tmp_path):
    late = before_line(with_line(VERSION_1, 2, None), 4, "# MHz S RI R 50")
    assert_refused(deembed(tmp_path, "dipole.s1p", late), OPTION_LINE, place="dipole.s1p, line 2")


def test_last_record_cut_in_the_middle(tmp_path):
    process = deembed(tmp_path, "dipole.s1p", VERSION_1.removesuffix(" 0.26\n"))
    assert_refused(process, 3, place="dipole.s1p, line 7")


@pytest.mark.parametrize("text", ["# MHz Z RI R 50\n14 -1 0\n", "# MHz Y RI R 50\n14 -1 0\n"])
def test_impedance_of_minus_the_reference_has_no_reflection(tmp_path, text):
    assert_refused(deembed(tmp_path, "dipole.s1p", text), place="dipole.s1p, line 2")


def test_five_numbers_among_records_of_nine_do_not_turn_the_rest_into_noise(tmp_path):
    text = "# MHz S RI R 50\n14 0.1 0 0.5 0 0.5 0 0.2 0\n13 0 0 0 0\n15 0.1 0 0.5 0 0.5 0 0.2 0\n"
    assert_refused(deembed(tmp_path, "two.s2p", text), "two.s2p, line ")


def test_line_numbers_count_comments_blank_lines_and_both_kinds_of_line_end(tmp_path):
    text = "! one\r\n\r\n! three\n# MHz S RI R 50\r\n\n14.0 0.3 0.1\r\n   ! seven\n14.1 bad 0.1\n"
    assert_refused(deembed(tmp_path, "dipole.s1p", text), "bad", place="dipole.s1p, line 8")


def test_name_with_brackets_is_shown_as_it_is(tmp_path):
    process = deembed(tmp_path, "roof[old].s1p", with_line(VERSION_1, 5, "14.2 [bold]abc[/bold] 0.15"))
    assert_refused(process, "[bold]abc[/bold]", place="roof[old].s1p, line 5")


def test_terminal_codes_in_a_file_do_not_reach_the_terminal(tmp_path):
    process = deembed(tmp_path, "dipole.s1p", with_line(VERSION_1, 5, "14.2 \x1b[31mabc 0.15"))
    assert_refused(process, "dipole.s1p")


def test_long_line_gives_a_message_of_one_readable_line(tmp_path):
    process = deembed(tmp_path, "dipole.s1p", with_line(VERSION_1, 5, "14.2 " + "0.1 " * 20000))
    assert_refused(process, 3, place="dipole.s1p, line 5")
    # A screen of 80 columns and 24 lines holds 1920 characters; a message has to leave room on it.
    assert len(process.stderr) < 1000


def test_missing_file(tmp_path):
    process = deembed(tmp_path, "dipole.s1p", None)
    assert_refused(process, "dipole.s1p", ("no such", "not found", "not exist", "no file", "missing", "cannot find"))


def test_directory(tmp_path):
    (tmp_path / "dipole.s1p").mkdir()
    assert_refused(deembed(tmp_path, "dipole.s1p", None), "dipole.s1p", ("directory", "folder"))


@pytest.mark.parametrize("name", ["dipole.s1p", "dipole.ts"])
def test_empty_file(tmp_path, name):
    assert_refused(deembed(tmp_path, name, ""), name, ("empty", "no data"))


@pytest.mark.parametrize("name", ["dipole.s1p", "dipole.ts", "dipole.csv", "dipole.xlsx", "dipole"])
def test_binary_file(tmp_path, name):
    content = b"PK\x03\x04\x14\x00\x06\x00" + bytes(range(256)) * 8
    assert_refused(deembed(tmp_path, name, content), name)


def test_pickled_object_is_refused_and_never_loaded(tmp_path):
    class Trap:
        def __reduce__(self):
            return Path.touch, (tmp_path / "sprung",)

    assert_refused(deembed(tmp_path, "dipole.s1p", pickle.dumps(Trap())), "dipole.s1p")
    assert not (tmp_path / "sprung").exists()


def test_file_above_the_cap_of_64_megabytes_is_refused_unread(tmp_path):
    with (tmp_path / "huge.s1p").open("wb") as file:
        file.write(VERSION_1.encode())
        file.truncate(65 * 1024 * 1024)
    started = time.monotonic()
    assert_refused(deembed(tmp_path, "huge.s1p", None), "huge.s1p", "64")
    # Refused by its size alone; reading 65 MB line by line takes tens of seconds, starting Python at most a few.
    assert time.monotonic() - started < 8


@pytest.mark.parametrize("out", ["result.csv", "result.json", "result.s1p"])
def test_refused_sweep_leaves_no_output_and_is_left_as_it_was(tmp_path, out):
    bad = with_line(VERSION_1, 5, "14.2 abc 0.15").encode()
    assert_refused(deembed(tmp_path, "dipole.s1p", bad, "--out", out), "abc", place="dipole.s1p, line 5")
    assert sorted(path.name for path in tmp_path.iterdir()) == ["dipole.s1p", "run.toml"]
    assert hashlib.sha256((tmp_path / "dipole.s1p").read_bytes()).digest() == hashlib.sha256(bad).digest()


def test_refused_sweep_leaves_an_earlier_output_alone(tmp_path):
    (tmp_path / "result.csv").write_text("earlier\n", encoding="utf-8")
    bad = with_line(VERSION_1, 5, "14.2 abc 0.15")
    assert_refused(deembed(tmp_path, "dipole.s1p", bad, "--out", "result.csv"), "abc")
    assert (tmp_path / "result.csv").read_text(encoding="utf-8") == "earlier\n"


def test_one_bad_sweep_of_two_refuses_the_whole_command(tmp_path):
    (tmp_path / "good.s1p").write_text(VERSION_1, encoding="utf-8")
    (tmp_path / "bad.s1p").write_text(with_line(VERSION_1, 5, "14.2 abc 0.15"), encoding="utf-8")
    (tmp_path / "run.toml").write_text(RUN_SHEET, encoding="utf-8")
    sweeps = ("good.s1p", "bad.s1p")
    process = run_feedpoint("deembed", *sweeps, "--run", "run.toml", "--out", "result.csv", cwd=tmp_path)
    assert_refused(process, "abc", place="bad.s1p, line 5")
    assert not (tmp_path / "result.csv").exists()
