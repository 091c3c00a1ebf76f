"""The real command as people and scripts use it: outputs, files, exit codes."""

import csv
import io
import json
import math
import os
import signal
import subprocess
import sys
import time

import numpy as np
import pytest

from feedpoint.result import COLUMNS, INSPECT_COLUMNS
from tests.end_to_end.command import REPOSITORY, assert_refused, run_feedpoint, start_feedpoint

SHEET = """
[run]
name = "test feed"
[[section]]
name = "main run"
cable = "RG-213/U"
length_m = 31.5
[[band]]
name = "20 m"
low_hz = 14.0e6
high_hz = 14.35e6
swr_limit = 2.0
"""


@pytest.fixture
def place(tmp_path):
    """A folder with a sweep of 201 points and its run sheet."""
    frequency = np.linspace(13e6, 15e6, 201)
    gamma = 0.6 * np.exp(-2e-6j * frequency) + 0.1j
    rows = "".join(f"{f / 1e6:.4f} {g.real:.9f} {g.imag:.9f}\n" for f, g in zip(frequency, gamma, strict=True))
    (tmp_path / "a.s1p").write_text("! made up for a test\n# MHz S RI R 50\n" + rows, encoding="ascii")
    (tmp_path / "run.toml").write_text(SHEET, encoding="ascii")
    return tmp_path


def test_table_fits_80_columns_and_says_what_it_leaves_out(place):
    process = run_feedpoint("deembed", "a.s1p", "--run", "run.toml", cwd=place)
    assert process.returncode == 0
    lines = process.stdout.splitlines()
    assert max(map(len, lines)) <= 80
    assert "telling rows of 201 points" in lines[-1]
    assert "\x1b" not in process.stdout + process.stderr
    text = process.stdout
    for word in ("resonance", "minimum SWR", "SWR <= 2", "worst SWR 20 m", "(limit 2)", "matched loss", "no interval"):
        assert word in text


def test_all_shows_every_row(place):
    process = run_feedpoint("deembed", "a.s1p", "--run", "run.toml", "--all", cwd=place)
    assert len(process.stdout.splitlines()) > 201
    assert "telling" not in process.stdout


def test_csv_has_the_fixed_columns_all_points_and_full_precision(place):
    process = run_feedpoint("deembed", "a.s1p", "--run", "run.toml", "--format", "csv", cwd=place)
    rows = list(csv.reader(io.StringIO(process.stdout)))
    assert tuple(rows[0]) == COLUMNS
    assert len(rows) == 202
    assert rows[1][COLUMNS.index("feedpoint_swr_low")] == ""
    value = rows[1][COLUMNS.index("feedpoint_resistance_ohm")]
    assert len(value.replace(".", "").lstrip("-0")) >= 14


def no_nan(text):
    def refuse(name):
        raise AssertionError(name)

    return json.loads(text, parse_constant=refuse)


def test_json_is_the_envelope_and_equals_csv(place):
    arguments = ("deembed", "a.s1p", "--run", "run.toml", "--from", "14MHz", "--to", "14.1MHz")
    envelope = no_nan(run_feedpoint(*arguments, "--format", "json", cwd=place).stdout)
    rows = list(csv.DictReader(io.StringIO(run_feedpoint(*arguments, "--format", "csv", cwd=place).stdout)))
    assert list(envelope) == ["sweep", "run", "summary", "points", "findings"]
    assert len(rows) == len(envelope["points"]) == 11
    for row, point in zip(rows, envelope["points"], strict=True):
        assert list(point) == list(COLUMNS)
        assert {name: (float(value) if value else None) for name, value in row.items()} == point
    summary = envelope["summary"]
    assert set(summary) >= {"resonances", "minimum_swr", "minimum_swr_hz", "swr2_low_hz", "swr2_high_hz", "bands"}
    assert set(summary["bands"][0]) >= {"name", "shack_worst_swr", "feedpoint_worst_swr", "verdict"}
    assert set(summary["minimum_swr"]) == {"value", "low", "high"}
    figures = envelope["run"]["sections"][0]["figures"]
    assert figures["z0_ohm"] == {"value": 50.0, "origin": "catalogue", "where": "RG-213/U"}


def test_infinite_is_inf_in_csv_and_null_in_json(place):
    reading = ("deembed", "--reading", "open@14.2MHz", "--z0", "50ohm", "--velocity-factor", "0.66")
    line = (*reading, "--loss-at", "10MHz:2dB/100m", "--length", "0m")
    (row,) = csv.DictReader(io.StringIO(run_feedpoint(*line, "--format", "csv", cwd=place).stdout))
    assert row["feedpoint_resistance_ohm"] == "inf"
    assert row["feedpoint_reactance_ohm"] == "0.0"
    assert row["feedpoint_swr"] == "inf"
    assert row["total_loss_db"] == ""
    (point,) = no_nan(run_feedpoint(*line, "--format", "json", cwd=place).stdout)["points"]
    assert point["feedpoint_resistance_ohm"] is None
    assert point["feedpoint_swr"] is None


def test_several_sweeps(place):
    (place / "b.s1p").write_bytes((place / "a.s1p").read_bytes())
    both = ("deembed", "a.s1p", "b.s1p", "--run", "run.toml")
    rows = list(csv.reader(io.StringIO(run_feedpoint(*both, "--format", "csv", cwd=place).stdout)))
    assert rows[0] == ["sweep", *COLUMNS]
    assert [row[0] for row in rows[1:]] == ["a.s1p"] * 201 + ["b.s1p"] * 201
    envelopes = no_nan(run_feedpoint(*both, "--format", "json", cwd=place).stdout)
    assert [envelope["sweep"]["source"] for envelope in envelopes] == ["a.s1p", "b.s1p"]
    assert run_feedpoint(*both, cwd=place).stdout.count("telling rows") == 2


def test_inspect(place):
    process = run_feedpoint("inspect", "a.s1p", "--format", "csv", cwd=place)
    rows = list(csv.DictReader(io.StringIO(process.stdout)))
    assert tuple(rows[0]) == INSPECT_COLUMNS
    gamma = 0.6 * np.exp(-2e-6j * 13e6) + 0.1j
    assert float(rows[0]["shack_gamma_magnitude"]) == pytest.approx(abs(gamma), abs=1e-8)
    swr = (1 + abs(gamma)) / (1 - abs(gamma))
    assert float(rows[0]["shack_swr_db"]) == pytest.approx(20 * math.log10(swr), abs=1e-6)
    text = run_feedpoint("inspect", "a.s1p", cwd=place).stdout
    assert "Touchstone" in text
    assert "made up for a test" in text
    assert max(map(len, text.splitlines())) <= 80
    assert no_nan(run_feedpoint("inspect", "a.s1p", "--format", "json", cwd=place).stdout)["run"] is None


def test_embed_and_deembed_by_files_is_identity(place):
    embed = run_feedpoint("embed", "a.s1p", "--run", "run.toml", "--out", "shack.s1p", cwd=place)
    assert "wrote 201 rows to shack.s1p" in embed.stdout
    back = run_feedpoint("deembed", "shack.s1p", "--run", "run.toml", "--out", "back.csv", cwd=place)
    assert back.returncode == 0
    rows = list(csv.DictReader(io.StringIO((place / "back.csv").read_text(encoding="utf-8"))))
    frequency = np.array([float(row["frequency_hz"]) for row in rows])
    gamma = np.array([complex(float(row["feedpoint_gamma_re"]), float(row["feedpoint_gamma_im"])) for row in rows])
    # The file carries 17 digits; the first one has 9.
    assert gamma == pytest.approx(0.6 * np.exp(-2e-6j * frequency) + 0.1j, abs=1e-8)


def test_out_replaces_a_file_whole_and_leaves_no_temporary_one(place):
    (place / "x.json").write_text("old", encoding="ascii")
    before = set(os.listdir(place))
    assert run_feedpoint("deembed", "a.s1p", "--run", "run.toml", "--out", "x.json", cwd=place).returncode == 0
    assert len(no_nan((place / "x.json").read_text(encoding="utf-8"))["points"]) == 201
    assert set(os.listdir(place)) == before


def test_output_that_cannot_be_written_is_refused(place):
    process = run_feedpoint("deembed", "a.s1p", "--run", "run.toml", "--out", "no/such/folder.csv", cwd=place)
    assert_refused(process, "folder.csv", "cannot be written")


def test_strict_exits_with_4_on_an_error_and_prints_all_the_same(place):
    (place / "over.s1p").write_text("# MHz S RI R 50\n14 1.03 0\n", encoding="ascii")
    process = run_feedpoint("deembed", "over.s1p", "--run", "run.toml", "--strict", cwd=place)
    assert process.returncode == 4
    assert "minimum SWR" in process.stdout
    assert "error reflection-above-unity" in process.stderr
    assert run_feedpoint("deembed", "a.s1p", "--run", "run.toml", "--strict", cwd=place).returncode == 0
    assert run_feedpoint("deembed", "over.s1p", "--run", "run.toml", "--quiet", cwd=place).stderr == ""


def test_temperature_option_overrides_the_sheet_and_says_so(place):
    warm = run_feedpoint("deembed", "a.s1p", "--run", "run.toml", "--temperature", "95F", cwd=place).stdout
    assert "cable temperature 35 C [option]" in warm


def test_reference_of_readings_and_its_origin_are_said(place):
    line = ("deembed", "--reading", "30@14MHz", "--run", "run.toml")
    assert "reference of the readings 50 ohm [assumed]" in run_feedpoint(*line, cwd=place).stdout
    assert "readings 75 ohm [option]" in run_feedpoint(*line, "--reference", "75", cwd=place).stdout


def test_hostile_names_are_shown_as_they_are_on_one_line(place):
    name = "roof[old] \x1b[31m.s1p"
    (place / name).write_bytes((place / "a.s1p").read_bytes())
    process = run_feedpoint("deembed", name, "--run", "run.toml", cwd=place)
    assert "roof[old] \\x1b[31m.s1p" in process.stdout
    assert "\x1b" not in process.stdout
    assert_refused(run_feedpoint("deembed", "gone\n[x].s1p", "--run", "run.toml", cwd=place), "gone\\n[x].s1p")


@pytest.mark.parametrize("form", ["table", "csv", "json"])
def test_names_that_no_encoding_holds_are_escaped(place, form):
    os.rename(os.fsencode(place / "a.s1p"), os.fsencode(place) + b"/\xff\xce\xa9.s1p")
    name = os.fsdecode(b"\xff\xce\xa9.s1p")
    shell = [sys.executable, "-m", "feedpoint", "deembed", name, name, "--run", "run.toml", "--format", form]
    ascii_only = {"PATH": os.environ["PATH"], "PYTHONIOENCODING": "ascii", "PYTHONPATH": str(REPOSITORY)}
    process = subprocess.run(shell, cwd=place, capture_output=True, timeout=60, check=True, env=ascii_only)
    assert b"udcff" in process.stdout
    file = f"x.{form}".replace("table", "s1p")
    assert run_feedpoint("deembed", name, "--run", "run.toml", "--out", file, cwd=place).returncode == 0


def test_pipe_that_closes_early_is_no_traceback(place):
    command = f"'{sys.executable}' -m feedpoint deembed a.s1p --run run.toml --all | head -n 2"
    shell = ["bash", "-c", command]
    process = subprocess.run(shell, cwd=place, capture_output=True, text=True, timeout=60, check=False)
    assert len(process.stdout.splitlines()) == 2
    assert "Traceback" not in process.stderr
    assert "BrokenPipe" not in process.stderr


@pytest.mark.parametrize(
    ("redirection", "code", "said"),
    [
        (">/dev/full", 3, "cannot be written: No space left"),
        (">&-", 0, ""),
        ("2>&-", 0, ""),
        (">/dev/full 2>/dev/full", 3, ""),
    ],
)
def test_streams_that_cannot_be_written_to(place, redirection, code, said):
    command = f"'{sys.executable}' -m feedpoint deembed a.s1p --run run.toml --all {redirection}"
    shell = ["bash", "-c", command]
    process = subprocess.run(shell, cwd=place, capture_output=True, text=True, timeout=60, check=False)
    assert process.returncode == code
    assert said in process.stderr
    assert "Traceback" not in process.stderr
    assert "Exception" not in process.stderr


def test_out_keeps_permissions_follows_links_and_writes_to_pipes(place):
    (place / "target.csv").write_text("old", encoding="ascii")
    (place / "target.csv").chmod(0o600)
    (place / "link.csv").symlink_to("target.csv")
    arguments = ("deembed", "a.s1p", "--run", "run.toml", "--at", "14MHz", "--out")
    assert "wrote 1 row to" in run_feedpoint(*arguments, "link.csv", cwd=place).stdout
    assert (place / "link.csv").is_symlink()
    assert (place / "target.csv").stat().st_mode & 0o777 == 0o600
    assert (place / "target.csv").read_text(encoding="ascii").startswith("frequency_hz,")
    os.mkfifo(place / "pipe.csv")
    with subprocess.Popen(["cat", place / "pipe.csv"], stdout=subprocess.PIPE, text=True) as reader:
        assert run_feedpoint(*arguments, "pipe.csv", cwd=place).returncode == 0
        assert reader.communicate(timeout=30)[0].startswith("frequency_hz,")
    assert not (place / "pipe.csv").is_file()


def test_inspect_claims_nothing_about_the_antenna(place):
    arguments = ("inspect", "a.s1p", "--band", "14MHz-14.2MHz", "--at", "14.0033MHz")
    envelope = no_nan(run_feedpoint(*arguments, "--format", "json", cwd=place).stdout)
    (band,) = envelope["summary"]["bands"]
    assert band["feedpoint_worst_swr"] == {"value": None, "low": None, "high": None}
    assert band["shack_worst_swr"] > 1
    assert "antenna" not in json.dumps(envelope["findings"])
    assert "14.0033 " in run_feedpoint(*arguments, cwd=place).stdout


def test_huge_values_keep_their_columns(place):
    (place / "ends.s1p").write_text("# MHz S RI R 50\n3 0.9999999 0\n4 -0.9999999 0\n", encoding="ascii")
    for command in (("inspect", "ends.s1p"), ("deembed", "ends.s1p", "--run", "run.toml")):
        lines = run_feedpoint(*command, cwd=place).stdout.splitlines()
        rows = [line.split() for line in lines[-2:]]
        assert [row[0] for row in rows] == ["3.00", "4.00"]
        assert len(rows[0]) == len(rows[1]) == (7 if command[0] == "inspect" else 9)
        assert max(map(len, lines)) <= 80


def test_names_in_findings_stay_on_their_line(place):
    sheet = '[[section]]\nname = "a\\u001b[31mX\\nfake: line"\nz0_ohm = 80\nvelocity_factor = 0.66\n'
    (place / "odd.toml").write_text(sheet + "length_m = 1\nconductor_loss = 1\n", encoding="ascii")
    process = run_feedpoint("deembed", "a.s1p", "--run", "odd.toml", cwd=place)
    assert "\x1b" not in process.stdout + process.stderr
    assert [line.split()[1] for line in process.stderr.splitlines()] == ["reference-mismatch:"]


def test_analyzer_of_a_file_of_its_own(place):
    (place / "own.toml").write_text("[analyzer]\nextension_s = 1e-9\n", encoding="ascii")
    line = ("deembed", "a.s1p", "--cable", "RG-213/U", "--length", "0m", "--format", "csv")
    turned = list(csv.DictReader(io.StringIO(run_feedpoint(*line, "--analyzer", "own.toml", cwd=place).stdout)))
    gamma = complex(float(turned[0]["feedpoint_gamma_re"]), float(turned[0]["feedpoint_gamma_im"]))
    measured = 0.6 * np.exp(-2e-6j * 13e6) + 0.1j
    assert gamma == pytest.approx(measured * np.exp(-4j * np.pi * 13e6 * 1e-9), abs=1e-8)
    (place / "own.toml").write_text("[analyser]\n", encoding="ascii")
    assert_refused(run_feedpoint(*line, "--analyzer", "own.toml", cwd=place), "own.toml", "Did you mean 'analyzer'")


def test_nothing_that_was_read_is_written_over(place):
    (place / "cat.csv").write_text('[[cable]]\nname="x"\nz0_ohm=50\nvelocity_factor=0.7\nconductor_loss=1\n')
    (place / "own.toml").write_text('[run]\ncables_file="cat.csv"\n[[section]]\ncable="x"\nlength_m=1\n')
    before = (place / "cat.csv").read_bytes()
    process = run_feedpoint("deembed", "a.s1p", "--run", "own.toml", "--out", "cat.csv", cwd=place)
    assert process.returncode == 2
    assert (place / "cat.csv").read_bytes() == before
    (place / "l1.csv").symlink_to("l2.csv")
    (place / "l2.csv").symlink_to("l1.csv")
    # A link that leads nowhere but to itself loses nothing when a file takes its place.
    assert run_feedpoint("deembed", "a.s1p", "--run", "run.toml", "--out", "l1.csv", cwd=place).returncode == 0
    assert (place / "l1.csv").read_text(encoding="ascii").startswith("frequency_hz,")


@pytest.mark.parametrize(
    ("option", "value"),
    [
        ("--velocity-factor", "0"),
        ("--velocity-factor", "1.1"),
        ("--loss-tolerance", "200%"),
        ("--length-tolerance", "11m"),
        ("--temperature", "-300C"),
        ("--reference", "1e-300"),
    ],
)
def test_values_out_of_range_are_wrong_usage_and_name_their_option(place, option, value):
    line = {"--reading": "50@14MHz", "--z0": "50", "--velocity-factor": "0.66", "--loss-at": "10MHz:1dB/100m"}
    line |= {"--length": "10m", option: value}
    process = run_feedpoint("deembed", *(word for pair in line.items() for word in pair), cwd=place)
    assert process.returncode == 2, process.stderr
    assert option in process.stderr or "reference" in process.stderr
    assert process.stdout == ""


def test_interrupt_is_no_traceback(place):
    os.mkfifo(place / "slow.s1p")
    command = [sys.executable, "-m", "feedpoint", "deembed", "slow.s1p", "--run", "run.toml"]
    with subprocess.Popen(command, cwd=place, stdout=subprocess.PIPE, stderr=subprocess.PIPE, text=True) as process:
        # Opening the other end returns when the command has begun to read: from then on it can be interrupted.
        with (place / "slow.s1p").open("w", encoding="ascii") as pipe:
            time.sleep(0.2)
            process.send_signal(signal.SIGINT)
            process.wait(timeout=30)
            del pipe
        _, errors = process.communicate()
    assert process.returncode == 130
    assert "Traceback" not in errors


def test_help_and_version():
    assert "Exit codes" in start_feedpoint("--help").stdout
    assert start_feedpoint("--version").stdout.startswith("feedpoint ")


@pytest.mark.parametrize("form", ["table", "csv", "json"])
def test_started_by_a_shell_the_command_does_the_same(place, form):
    """Most tests fork the command; this one holds the fork against a real start."""
    arguments = ("deembed", "a.s1p", "--run", "run.toml", "--format", form)
    forked, started = run_feedpoint(*arguments, cwd=place), start_feedpoint(*arguments, cwd=place)
    assert (started.returncode, started.stdout, started.stderr) == (forked.returncode, forked.stdout, forked.stderr)


def test_refusal_of_a_started_command(place):
    assert_refused(start_feedpoint("deembed", "gone.s1p", "--run", "run.toml", cwd=place), "gone.s1p", "no such file")
