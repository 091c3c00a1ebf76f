"""
Command lines that cannot be meant: exit code 2, nothing on stdout, and the offending thing in the message.

The sweep and the run sheet are good in every case, so that nothing else can be the cause.
"""

import pytest

from .command import assert_done, assert_plain, assert_refused, assert_says, assert_wrong_usage, run_feedpoint

SWEEP = "# MHz S RI R 50\n14.0 0.30 0.10\n14.1 0.25 0.12\n14.2 0.20 0.15\n14.3 0.15 0.20\n14.4 0.12 0.26\n"

SHEET = """\
[run]
name = "invented run"

[[section]]
z0_ohm = 50.0
velocity_factor = 0.66
conductor_loss = 1.4
length_m = 12.0
"""

RUN = ["--run", "run.toml"]
CABLE = ["--cable", "RG-213/U", "--length", "12m"]
LINE = ["--z0", "50ohm", "--velocity-factor", "0.66", "--loss-at", "10MHz:1.3dB/100m", "--length", "12m"]
READ = ["--reading", "17.8-22j@14.2MHz"]


def changed(arguments: list[str], option: str, value: str) -> list[str]:
    """The arguments with another value behind an option."""
    place = arguments.index(option) + 1
    return [*arguments[:place], value, *arguments[place + 1 :]]


# (name, arguments behind `deembed`, fragments)
CASES = [
    ("unknown option", ["dipole.s1p", *RUN, "--lenght", "12m"], ["--lenght"]),
    ("option without its value", ["dipole.s1p", "--run"], ["--run"]),
    ("no run at all", ["dipole.s1p"], [("--run", "--cable")]),
    ("sheet and cable", ["dipole.s1p", *RUN, *CABLE], ["--run", "cable"]),
    ("sheet and line", ["dipole.s1p", *RUN, *LINE], ["--run"]),
    ("sheet and length", ["dipole.s1p", *RUN, "--length", "12m"], ["--run", ("--length", "cable")]),
    ("cable without length", ["dipole.s1p", "--cable", "RG-213/U"], ["--length"]),
    ("length alone", ["dipole.s1p", "--length", "12m"], [("--cable", "--run", "--z0")]),
    ("line without velocity", ["dipole.s1p", *LINE[:2], *LINE[4:]], ["--velocity-factor"]),
    ("line without loss", ["dipole.s1p", *LINE[:4], *LINE[6:]], ["--loss-at"]),
    ("length without its unit", ["dipole.s1p", *changed(CABLE, "--length", "31.5")], ["31.5"]),
    ("length in kilograms", ["dipole.s1p", *changed(CABLE, "--length", "31.5kg")], ["31.5kg"]),
    ("length in hertz", ["dipole.s1p", *changed(CABLE, "--length", "31.5MHz")], ["31.5MHz"]),
    ("length in words", ["dipole.s1p", *changed(CABLE, "--length", "long")], ["long"]),
    ("length below zero", ["dipole.s1p", *changed(CABLE, "--length", "-12m")], ["12m"]),
    ("length not a number", ["dipole.s1p", *changed(CABLE, "--length", "nanm")], ["nanm"]),
    ("length without end", ["dipole.s1p", *changed(CABLE, "--length", "infm")], ["infm"]),
    ("z0 below zero", ["dipole.s1p", *changed(LINE, "--z0", "-50ohm")], ["50ohm"]),
    ("velocity factor in words", ["dipole.s1p", *changed(LINE, "--velocity-factor", "fast")], ["fast"]),
    ("loss without frequency", ["dipole.s1p", *changed(LINE, "--loss-at", "1.3dB/100m")], ["1.3dB/100m"]),
    ("loss without loss", ["dipole.s1p", *changed(LINE, "--loss-at", "10MHz")], ["10MHz"]),
    ("loss without units", ["dipole.s1p", *changed(LINE, "--loss-at", "10:1.3")], ["10"]),
    ("loss per nothing", ["dipole.s1p", *changed(LINE, "--loss-at", "10MHz:1.3dB")], ["1.3dB"]),
    ("loss below zero", ["dipole.s1p", *changed(LINE, "--loss-at", "10MHz:-1.3dB/100m")], ["-1.3dB/100m"]),
    ("tolerance without its unit", ["dipole.s1p", *CABLE, "--length-tolerance", "0.1"], ["0.1"]),
    ("loss tolerance without percent", ["dipole.s1p", *CABLE, "--loss-tolerance", "10"], ["10"]),
    ("temperature without its unit", ["dipole.s1p", *RUN, "--temperature", "35"], ["35"]),
    ("frequency without its unit", ["dipole.s1p", *RUN, "--at", "14.2"], ["14.2"]),
    ("frequency in words", ["dipole.s1p", *RUN, "--at", "twenty"], ["twenty"]),
    ("frequency in metres", ["dipole.s1p", *RUN, "--at", "20m"], ["20m"]),
    ("frequency outside the sweep", ["dipole.s1p", *RUN, "--at", "21.2MHz"], ["21.2"]),
    ("start behind the end", ["dipole.s1p", *RUN, "--from", "14.3MHz", "--to", "14.1MHz"], [("--from", "--to")]),
    ("start without its unit", ["dipole.s1p", *RUN, "--from", "14"], ["14"]),
    ("every 0th", ["dipole.s1p", *RUN, "--every", "0"], ["--every"]),
    ("every -2nd", ["dipole.s1p", *RUN, "--every", "-2"], ["--every"]),
    ("every second and a half", ["dipole.s1p", *RUN, "--every", "1.5"], ["--every"]),
    ("unknown format", ["dipole.s1p", *RUN, "--format", "xml"], ["xml"]),
    ("CSV into a JSON file", ["dipole.s1p", *RUN, "--format", "csv", "--out", "x.json"], [("x.json", "--out")]),
    ("JSON into a CSV file", ["dipole.s1p", *RUN, "--format", "json", "--out", "x.csv"], [("x.csv", "--out")]),
    ("CSV into a Touchstone file", ["dipole.s1p", *RUN, "--format", "csv", "--out", "x.s1p"], [("x.s1p", "--out")]),
    ("unknown kind of file", ["dipole.s1p", *RUN, "--out", "x.xlsx"], [("x.xlsx", "--out")]),
    ("no kind of file", ["dipole.s1p", *RUN, "--out", "x"], ["--out"]),
    ("one Touchstone file for two sweeps", ["dipole.s1p", "again.s1p", *RUN, "--out", "x.s1p"], ["s1p"]),
    ("neither sweep nor reading", RUN, [("--reading", "sweep")]),
    ("sweep and reading", ["dipole.s1p", *RUN, *READ], ["--reading"]),
    ("reading without frequency", [*RUN, "--reading", "17.8-22j"], ["17.8-22j"]),
    ("reading at a bare number", [*RUN, "--reading", "17.8-22j@14.2"], ["14.2"]),
    ("reading in words", [*RUN, "--reading", "fifty@14.2MHz"], ["fifty"]),
    ("reading not a number", [*RUN, "--reading", "nan-22j@14.2MHz"], ["nan-22j"]),
    ("reading of nothing", [*RUN, "--reading", ""], ["reading"]),
    ("port 0", ["dipole.s1p", *RUN, "--port", "0"], ["--port"]),
    ("port in words", ["dipole.s1p", *RUN, "--port", "first"], ["--port"]),
    ("SWR reference of zero", ["dipole.s1p", *RUN, "--swr-reference", "0"], [("reference", "resistance")]),
    ("band upside down", ["dipole.s1p", *RUN, "--band", "14.35MHz-14.0MHz"], ["14.35MHz-14.0MHz"]),
    ("band without units", ["dipole.s1p", *RUN, "--band", "14-14.35"], ["14-14.35"]),
]


@pytest.fixture
def place(tmp_path):
    """Directory with a good sweep, a second one, and a good run sheet."""
    for name in ("dipole.s1p", "again.s1p"):
        (tmp_path / name).write_text(SWEEP, encoding="utf-8")
    (tmp_path / "run.toml").write_text(SHEET, encoding="utf-8")
    return tmp_path


@pytest.mark.parametrize(
    "arguments",
    [
        ["dipole.s1p", *RUN],
        ["dipole.s1p", *CABLE],
        ["dipole.s1p", *LINE],
        ["dipole.s1p", "again.s1p", *RUN],
        [*RUN, *READ],
        ["dipole.s1p", *CABLE, "--length-tolerance", "0.1m", "--loss-tolerance", "10%"],
        ["dipole.s1p", *RUN, "--temperature", "35C", "--at", "14.2MHz"],
        ["dipole.s1p", *RUN, "--from", "14.1MHz", "--to", "14.3MHz", "--every", "2"],
        ["dipole.s1p", *RUN, "--band", "14.0MHz-14.35MHz", "--swr-reference", "75", "--port", "1"],
    ],
)
def test_the_right_usage_beside_the_wrong(place, arguments):
    # If one of these were refused, the case below that differs from it in one word would prove nothing.
    assert_done(run_feedpoint("deembed", *arguments, cwd=place))


@pytest.mark.parametrize(("arguments", "fragments"), [pytest.param(*case[1:], id=case[0]) for case in CASES])
def test_wrong_usage(place, arguments, fragments):
    assert_wrong_usage(run_feedpoint("deembed", *arguments, cwd=place), *fragments)
    assert sorted(path.name for path in place.iterdir()) == ["again.s1p", "dipole.s1p", "run.toml"]


def test_unknown_command(place):
    assert_wrong_usage(run_feedpoint("demebed", "dipole.s1p", *RUN, cwd=place), "demebed")


def test_unknown_cable_is_refused_input_and_not_wrong_usage(place):
    process = run_feedpoint("deembed", "dipole.s1p", "--cable", "RG-213A/U", "--length", "12m", cwd=place)
    assert_refused(process, "RG-213A/U", "RG-213/U")


@pytest.mark.parametrize(
    ("arguments", "fragments"),
    [
        (changed(LINE, "--velocity-factor", "66"), ["velocity", "66"]),
        ([*RUN, "--temperature", "-400C"], ["temperature", "-400"]),
    ],
)
def test_value_that_parses_but_cannot_be(place, arguments, fragments):
    # Whether that is wrong usage or refused input is left open; that it is refused, and named, is not.
    process = run_feedpoint("deembed", "dipole.s1p", *arguments, cwd=place)
    assert_plain(process)
    assert process.returncode in (2, 3)
    assert process.stdout == ""
    assert_says(process.stderr, fragments)


def test_port_that_the_file_does_not_have(place):
    # Whether that is the question's fault or the file's is left open.
    process = run_feedpoint("deembed", "dipole.s1p", *RUN, "--port", "2", cwd=place)
    assert_plain(process)
    assert process.returncode in (2, 3)
    assert process.stdout == ""
    assert "port" in process.stderr


def test_output_in_a_directory_that_is_not_there(place):
    process = run_feedpoint("deembed", "dipole.s1p", *RUN, "--out", "absent/x.csv", cwd=place)
    assert_plain(process)
    assert process.returncode in (2, 3)
    assert "absent" in process.stderr
    assert not (place / "absent").exists()


def test_question_is_never_asked_off_a_terminal(place):
    # An empty standard input that was waited for would run into the time limit of the process or fail in reading.
    assert_wrong_usage(run_feedpoint("deembed", cwd=place, stdin=""))


@pytest.mark.parametrize("out", ["dipole.s1p", "./dipole.s1p"])
def test_result_is_never_written_over_the_sweep_that_it_came_from(place, out):
    # What was measured up a mast last year cannot be measured again.
    process = run_feedpoint("deembed", "dipole.s1p", *RUN, "--out", out, cwd=place)
    assert (place / "dipole.s1p").read_text(encoding="utf-8") == SWEEP
    assert_plain(process)
    assert process.returncode in (2, 3)
    assert process.stdout == ""
    assert_says(process.stderr, ["dipole.s1p"])
