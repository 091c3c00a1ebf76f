"""
Run sheets that must not be taken: each defect is refused in one line that names the sheet, the place and the thing.

A misread run sheet gives a wrong impedance as surely as a misread sweep. The run and all figures are invented.
"""

from pathlib import Path

import pytest

from .command import Fragment, assert_done, assert_refused, run_feedpoint, word

SWEEP = """\
# MHz S RI R 50
14.0 0.30 0.10
14.1 0.25 0.12
14.2 0.20 0.15
14.3 0.15 0.20
14.4 0.12 0.26
"""

# A defect is put into the second section, so that a count from 0 would name the wrong one.
SHEET = """\
[run]
name = "invented run"
temperature_c = 18.0

[[section]]
name = "patch lead"
z0_ohm = 50.0
velocity_factor = 0.66
conductor_loss = 1.4
length_m = 1.5

[[section]]
name = "main run"
z0_ohm = 50.0
velocity_factor = 0.84
loss = [{mhz = 10, db_per_100m = 1.3}, {mhz = 100, db_per_100m = 4.3}]
length_m = 31.5

[[band]]
name = "20 m"
low_hz = 14.0e6
high_hz = 14.35e6
swr_limit = 2.0

[analyzer]
directivity_db = 40.0
noise = 0.001
"""

LENGTH = "length_m = 31.5\n"
VELOCITY = "velocity_factor = 0.84\n"
LOSS = "loss = [{mhz = 10, db_per_100m = 1.3}, {mhz = 100, db_per_100m = 4.3}]\n"
IMPEDANCE = 'name = "main run"\nz0_ohm = 50.0\n'
MAIN_RUN = '[[section]]\nname = "main run"\nz0_ohm = 50.0\n' + VELOCITY + LOSS + LENGTH


def spoilt(old: str, new: str) -> str:
    """The sheet with one passage, which must be there once, put another way."""
    assert SHEET.count(old) == 1, old
    return SHEET.replace(old, new)


def second(section: str) -> str:
    """The sheet with another second section."""
    return spoilt(MAIN_RUN, "[[section]]\n" + section)


def line_of(text: str, passage: str) -> int:
    """Line, counted from 1, on which a passage begins."""
    return text[: text.index(passage)].count("\n") + 1


# Defects of the second section: (name, sheet, fragments).
SECTION_DEFECTS: list[tuple[str, str, tuple[Fragment, ...]]] = [
    ("misspelt key", spoilt(LENGTH, "lenght_m = 31.5\n"), ("lenght_m", "length_m")),
    ("misspelt tolerance", spoilt(LENGTH, LENGTH + "length_tolerence_m = 0.1\n"), ("length_tolerance_m",)),
    ("no length", spoilt(LENGTH, ""), ("length_m",)),
    ("two lengths", spoilt(LENGTH, LENGTH + "length_ft = 103\n"), ("length_m", "length_ft")),
    ("length in words", spoilt(LENGTH, 'length_m = "thirty"\n'), ("length_m", "thirty")),
    ("length as text", spoilt(LENGTH, 'length_m = "31.5"\n'), ("length_m",)),
    ("length as yes", spoilt(LENGTH, "length_m = true\n"), ("length_m",)),
    ("length as a list", spoilt(LENGTH, "length_m = [31.5]\n"), ("length_m",)),
    ("length as a date", spoilt(LENGTH, "length_m = 2026-03-14\n"), ("length_m",)),
    ("length below zero", spoilt(LENGTH, "length_m = -31.5\n"), ("length_m", "-31.5")),
    ("length not a number", spoilt(LENGTH, "length_m = nan\n"), ("length_m", "nan")),
    ("length without end", spoilt(LENGTH, "length_m = inf\n"), ("length_m", "inf")),
    ("feet below zero", spoilt(LENGTH, "length_ft = -3\n"), ("length_ft", "-3")),
    ("z0 of zero", spoilt(IMPEDANCE, "z0_ohm = 0\n"), ("z0_ohm", word("0"))),
    ("z0 below zero", spoilt(IMPEDANCE, "z0_ohm = -50\n"), ("z0_ohm", "-50")),
    ("no z0", spoilt(IMPEDANCE, ""), ("z0_ohm",)),
    ("no phase information", spoilt(VELOCITY, ""), ("velocity_factor", "delay_ns")),
    ("faster than light", spoilt(VELOCITY, "velocity_factor = 1.5\n"), ("velocity_factor", "1.5")),
    ("velocity factor in percent", spoilt(VELOCITY, "velocity_factor = 84\n"), ("velocity_factor", "84")),
    ("velocity factor of zero", spoilt(VELOCITY, "velocity_factor = 0\n"), ("velocity_factor", word("0"))),
    ("velocity factor next to nothing", spoilt(VELOCITY, "velocity_factor = 1e-300\n"), ("velocity_factor", "1e-300")),
    ("tolerance above the value", spoilt(LENGTH, LENGTH + "velocity_factor_tolerance = 0.9\n"), ("velocity_factor",)),
    ("delay of zero", spoilt(VELOCITY, "delay_ns = 0\n"), ("delay_ns",)),
    ("delay below zero", spoilt(VELOCITY, "delay_ns = -125\n"), ("delay_ns", "-125")),
    ("delay that outruns light", spoilt(VELOCITY, "delay_ns = 50\n"), ("delay_ns",)),
    (
        "delay of no length",
        spoilt(VELOCITY + LOSS + LENGTH, "delay_ns = 125\n" + LOSS + "length_m = 0\n"),
        ("delay_ns", "length"),
    ),
    ("no loss", spoilt(LOSS, ""), ("loss",)),
    ("empty loss table", spoilt(LOSS, "loss = []\n"), ("loss",)),
    ("loss below zero", spoilt(LOSS, "loss = [{mhz = 10, db_per_100m = -1.3}]\n"), ("loss", "-1.3")),
    ("loss at no frequency", spoilt(LOSS, "loss = [{db_per_100m = 1.3}]\n"), ("loss", "mhz")),
    ("loss at 0 MHz", spoilt(LOSS, "loss = [{mhz = 0, db_per_100m = 1.3}]\n"), ("loss", "mhz")),
    ("loss point of no loss", spoilt(LOSS, "loss = [{mhz = 10}]\n"), ("loss", "db_per_100m")),
    (
        "loss per two lengths",
        spoilt(LOSS, "loss = [{mhz = 10, db_per_100m = 1.3, db_per_100ft = 0.4}]\n"),
        ("db_per_100m", "db_per_100ft"),
    ),
    ("misspelt loss unit", spoilt(LOSS, "loss = [{mhz = 10, db_per_100_m = 1.3}]\n"), ("db_per_100_m",)),
    (
        "loss beyond all sense",
        spoilt(LOSS, "loss = [{mhz = 1e300, db_per_100m = 1e300}]\n"),
        ("loss", ("1e+300", "1e300")),
    ),
    ("loss next to nothing", spoilt(LOSS, "loss = [{mhz = 1e-300, db_per_100m = 1e-300}]\n"), ("loss", "1e-300")),
    ("loss from which nothing comes back", spoilt(LOSS, "conductor_loss = 1e6\n"), ("loss",)),
    ("negative conductor loss", spoilt(LOSS, "conductor_loss = -1.4\n"), ("conductor_loss", "-1.4")),
    ("loss given twice", spoilt(LOSS, LOSS + "conductor_loss = 1.4\n"), ("loss", "conductor_loss")),
    ("negative tolerance", spoilt(LENGTH, LENGTH + "length_tolerance_m = -0.1\n"), ("length_tolerance_m", "-0.1")),
    (
        "tolerance in two units",
        spoilt(LENGTH, LENGTH + "length_tolerance_m = 0.1\nlength_tolerance_ft = 0.3\n"),
        ("length_tolerance_m", "length_tolerance_ft"),
    ),
    ("negative z0 tolerance", spoilt(LENGTH, LENGTH + "z0_tolerance_ohm = -1\n"), ("z0_tolerance_ohm", "-1")),
    ("name that is a number", spoilt(IMPEDANCE, "name = 5\nz0_ohm = 50.0\n"), ("name",)),
    ("nothing in it", second('name = "empty"\n'), ()),
    ("unknown cable", second('cable = "RG-213A/U"\nlength_m = 31.5\n'), ("RG-213A/U", "RG-213/U")),
    ("cable that is a number", second("cable = 213\nlength_m = 31.5\n"), ("cable",)),
    ("cable without length", second('cable = "RG-213/U"\n'), ("length_m",)),
    ("cable and two-port", second('cable = "RG-213/U"\nlength_m = 3\ntwo_port = "pad.s2p"\n'), ("two_port",)),
    ("two-port with a length", second('two_port = "pad.s2p"\nlength_m = 3\n'), ("length_m",)),
    (
        "both kinds of lumped element",
        second("series_inductance_h = 1e-6\nshunt_capacitance_f = 1e-11\n"),
        ("series", "shunt"),
    ),
    (
        "transformer and lumped element",
        second("impedance_ratio = 4\nseries_inductance_h = 1e-6\n"),
        ("impedance_ratio", "series_inductance_h"),
    ),
    ("misspelt lumped element", second("series_inductance_uh = 1\n"), ("series_inductance_uh", "series_inductance_h")),
    ("transformer ratio as text", second('impedance_ratio = "4:1"\n'), ("impedance_ratio", "4:1")),
    ("transformer ratio of zero", second("impedance_ratio = 0\n"), ("impedance_ratio",)),
    ("negative transformer ratio", second("impedance_ratio = -4\n"), ("impedance_ratio", "-4")),
]

# Defects elsewhere in the sheet: (name, sheet, fragments).
SHEET_DEFECTS: list[tuple[str, str, tuple[Fragment, ...]]] = [
    ("no sections", SHEET.split("[[section]]")[0], ("section",)),
    ("empty list of sections", "section = []\n" + SHEET.split("[[section]]")[0], ("section",)),
    ("empty sheet", "", ("section",)),
    ("section not in a list", SHEET.split("[[section]]")[0] + "[section]\nlength_m = 3\n", ("section",)),
    ("number of 5000 digits", spoilt(LENGTH, "length_m = " + "9" * 5000 + "\n"), ()),
    ("lists nested without end", "deep = " + "[" * 3000 + "]" * 3000 + "\n" + SHEET, ()),
    ("misspelt table", SHEET.replace("[[section]]", "[[sections]]"), ("sections", "section")),
    ("misspelt run key", spoilt("temperature_c", "temprature_c"), ("temprature_c", "temperature_c")),
    ("temperature in words", spoilt("temperature_c = 18.0", 'temperature_c = "warm"'), ("temperature_c", "warm")),
    ("colder than cold", spoilt("temperature_c = 18.0", "temperature_c = -400"), ("temperature_c", "-400")),
    ("temperature not a number", spoilt("temperature_c = 18.0", "temperature_c = nan"), ("temperature_c", "nan")),
    (
        "negative temperature tolerance",
        spoilt("temperature_c = 18.0", "temperature_tolerance_c = -5"),
        ("temperature_tolerance_c", "-5"),
    ),
    ("band upside down", spoilt("low_hz = 14.0e6", "low_hz = 14.5e6"), ("band", ("low_hz", "high_hz"))),
    ("band below zero", spoilt("low_hz = 14.0e6", "low_hz = -14.0e6"), ("band", "low_hz")),
    ("band without its end", spoilt("high_hz = 14.35e6\n", ""), ("band", "high_hz")),
    ("band in other units", spoilt("low_hz = 14.0e6", "low_mhz = 14.0"), ("low_mhz", "low_hz")),
    ("SWR limit below one", spoilt("swr_limit = 2.0", "swr_limit = 0.5"), ("swr_limit", "0.5")),
    ("misspelt analyzer key", spoilt("directivity_db", "directivty_db"), ("directivty_db", "directivity_db")),
    ("directivity in words", spoilt("directivity_db = 40.0", 'directivity_db = "good"'), ("directivity_db", "good")),
    ("negative noise", spoilt("noise = 0.001", "noise = -0.001"), ("noise", "-0.001")),
    ("negative tracking", spoilt("noise = 0.001", "tracking_db = -0.1"), ("tracking_db", "-0.1")),
    ("noise not a number", spoilt("noise = 0.001", "noise = nan"), ("noise", "nan")),
]

# Text that is not TOML: (name, passage, what it becomes); the message must name the passage's line.
SYNTAX_DEFECTS = [
    ("two equals signs", LENGTH, "length_m = = 31.5\n"),
    ("decimal comma", LENGTH, "length_m = 31,5\n"),
    ("unit behind the number", LENGTH, "length_m = 31.5 m\n"),
    ("text without quotes", 'name = "main run"', "name = main run"),
    ("text that does not end", 'name = "main run"', 'name = "main run'),
    ("key twice", VELOCITY, "z0_ohm = 75\n"),
    ("table without its bracket", "[analyzer]", "[analyzer"),
]


def two_port(through: complex, back: complex, low_mhz: float = 10.0, high_mhz: float = 20.0) -> str:
    """A two-port of S21 = through and S12 = back (real and imaginary part), without reflection, at five frequencies."""
    lines = ["# MHz S RI R 50"]
    for step in range(5):
        mhz = low_mhz + (high_mhz - low_mhz) * step / 4
        lines.append(f"{mhz:.6f} 0 0 {through.real} {through.imag} {back.real} {back.imag} 0 0")
    return "\n".join(lines) + "\n"


def deembed(directory: Path, sheet: str | bytes | None, *options: str):
    """Write the sweep and the sheet (unless None), and have the command de-embed."""
    (directory / "dipole.s1p").write_text(SWEEP, encoding="utf-8")
    if sheet is not None:
        (directory / "mast2.toml").write_bytes(sheet if isinstance(sheet, bytes) else sheet.encode())
    return run_feedpoint("deembed", "dipole.s1p", "--run", "mast2.toml", *options, cwd=directory)


def test_the_sheet_that_the_defects_are_put_into_is_good(tmp_path):
    assert_done(deembed(tmp_path, SHEET))


@pytest.mark.parametrize(("sheet", "fragments"), [pytest.param(*d[1:], id=d[0]) for d in SECTION_DEFECTS])
def test_defect_of_a_section(tmp_path, sheet, fragments):
    assert_refused(deembed(tmp_path, sheet), "mast2.toml", word("section 2"), *fragments)


@pytest.mark.parametrize(("sheet", "fragments"), [pytest.param(*d[1:], id=d[0]) for d in SHEET_DEFECTS])
def test_defect_of_the_sheet(tmp_path, sheet, fragments):
    assert_refused(deembed(tmp_path, sheet), "mast2.toml", *fragments)


@pytest.mark.parametrize(("passage", "becomes"), [pytest.param(*d[1:], id=d[0]) for d in SYNTAX_DEFECTS])
def test_text_that_is_not_toml(tmp_path, passage, becomes):
    line = line_of(SHEET, passage)
    assert_refused(deembed(tmp_path, spoilt(passage, becomes)), place=f"mast2.toml, line {line}")


@pytest.mark.parametrize(
    ("name", "content", "fragments"),
    [
        pytest.param("pad.s2p", None, (), id="missing"),
        pytest.param("pad.s2p", two_port(0.7, 0.7, 10, 14.2), (("band", "range", "cover", "outside"),), id="narrow"),
        pytest.param("pad.s2p", two_port(0.7, 0.7, 14.1, 20), (("band", "range", "cover", "outside"),), id="late"),
        # |S12 S21| = 0.003 and 0.0045: below 0.01 nothing of the antenna comes back.
        pytest.param("pad.s2p", two_port(3.0, 0.001), (("isolator", "amplifier"),), id="amplifier"),
        pytest.param("pad.s2p", two_port(0.9, 0.005), (("isolator", "amplifier"),), id="isolator"),
        # |S12 S21| = 0.54 passes; |S21 - S12| = 0.3 is above 0.1 * 0.9.
        pytest.param("pad.s2p", two_port(0.9, 0.6), (("isolator", "amplifier", "reciprocal"),), id="one way"),
        pytest.param("pad.s2p", two_port(0.8, -0.8), (("isolator", "amplifier", "reciprocal"),), id="gyrator"),
        pytest.param("pad.s1p", SWEEP, (("port", "S21"),), id="one-port"),
    ],
)
def test_two_port_that_cannot_be_removed(tmp_path, name, content, fragments):
    if content is not None:
        (tmp_path / name).write_text(content, encoding="utf-8")
    assert_refused(deembed(tmp_path, second(f'two_port = "{name}"\n')), name, *fragments)


def test_defect_inside_a_two_port_file_is_named_there(tmp_path):
    (tmp_path / "pad.s2p").write_text(two_port(0.7, 0.7).replace("15.0", "abc", 1), encoding="utf-8")
    assert_refused(deembed(tmp_path, second('two_port = "pad.s2p"\n')), "abc", "pad.s2p, line 4")


def test_missing_file_of_cables(tmp_path):
    # Which of the two files leads the message is left open; the one that is not there must be in it.
    assert_refused(deembed(tmp_path, spoilt("temperature_c = 18.0", 'cables_file = "ours.toml"')), "ours.toml")


def test_missing_sheet(tmp_path):
    assert_refused(deembed(tmp_path, None), "mast2.toml")


def test_sheet_that_is_a_directory(tmp_path):
    (tmp_path / "mast2.toml").mkdir()
    assert_refused(deembed(tmp_path, None), "mast2.toml", ("directory", "folder"))


@pytest.mark.parametrize("content", [b"\x89PNG\r\n\x1a\n\x00\x00", SHEET.encode("utf-16"), b'[run]\nname = "S\xfcd"\n'])
def test_sheet_that_is_not_utf_8(tmp_path, content):
    assert_refused(deembed(tmp_path, content), "mast2.toml")


def test_refused_sheet_leaves_no_output(tmp_path):
    process = deembed(tmp_path, spoilt(LENGTH, "lenght_m = 31.5\n"), "--out", "result.csv")
    assert_refused(process, "lenght_m")
    assert sorted(path.name for path in tmp_path.iterdir()) == ["dipole.s1p", "mast2.toml"]
