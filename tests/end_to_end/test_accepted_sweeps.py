"""
Odd but valid sweep files must be read, and read as the Touchstone standard says.

What the command shows at the shack end must be the impedance that was written, and its feed-point impedance must be the
same from every form of the same sweep.
"""

import csv
import io
import json
import warnings

import numpy as np
import pytest
from skrf.io.touchstone import Touchstone

from .command import assert_done, run_feedpoint
from .sweep_forms import FORMS, FREQUENCY_HZ, MHZ, OHMS, RI, SHACK_OHM, matrix_records, records, version_1, version_2

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

# Numbers are written with 12 digits (5e-12 of their size at worst). Z = R (1 + g)/(1 - g) and the 0.7 dB of the run
# make at most ten times that of the impedance; the rest up to 1e-9 is room for the readers' own unit conversions.
RELATIVE = 1e-9

# What the general library's Touchstone class does not read, or reads wrongly.
LIBRARY_FAILS = {
    "only the number format",
    "only the reference",
    "option words the other way round",
    "reference in the middle",
    "comments that begin with Gamma",
    "y1p, normalised",  # multiplied by R in place of divided
    "y1p, normalised to 75",
    "information",
    # These it reads as they stand: it does not merge, leave out or reverse.
    "duplicates that agree",
    "point at 0 Hz",
    "descending frequencies",
}


def deembed(directory, name: str, text: str | bytes, *options: str, output: str = "csv"):
    """Write the sweep and the run sheet, de-embed, and check that it was done."""
    (directory / "run.toml").write_text(RUN_SHEET, encoding="utf-8")
    (directory / name).write_bytes(text if isinstance(text, bytes) else text.encode())
    process = run_feedpoint("deembed", name, "--run", "run.toml", "--format", output, *options, cwd=directory)
    assert_done(process)
    return process


def impedances(table: str) -> tuple[list[float], list[complex], list[complex]]:
    """Frequencies, shack-end and feed-point impedances out of the command's CSV."""
    rows = list(csv.DictReader(io.StringIO(table)))
    ends = [
        [complex(float(row[f"{end}_resistance_ohm"]), float(row[f"{end}_reactance_ohm"])) for row in rows]
        for end in ("shack", "feedpoint")
    ]
    return [float(row["frequency_hz"]) for row in rows], ends[0], ends[1]


def findings(directory, name: str, text: str | bytes, *options: str) -> list[dict]:
    """The findings of a de-embedding."""
    return json.loads(deembed(directory, name, text, *options, output="json").stdout)["findings"]


def codes(found: list[dict]) -> list[str]:
    """Their codes."""
    return [finding["code"] for finding in found]


@pytest.fixture(scope="module")
def feedpoint_ohm(tmp_path_factory) -> list[complex]:
    """Feed-point impedance of the plainest form, in which nothing has to be converted but the reflection."""
    directory = tmp_path_factory.mktemp("plain")
    table = deembed(directory, "plain.s1p", version_1("# Hz S RI R 50", records(unit_hz=1.0))).stdout
    return impedances(table)[2]


def test_the_run_moves_the_impedance(feedpoint_ohm):
    # Otherwise nothing below could tell the shack end from the feed point. Near 50 ohms a 50-ohm run hardly turns it.
    moved = [abs(there - here) for there, here in zip(feedpoint_ohm, SHACK_OHM, strict=True)]
    assert min(moved) > 0.1
    assert max(moved) > 10


@pytest.mark.parametrize(("name", "text", "options"), [pytest.param(*form[1:], id=form[0]) for form in FORMS])
def test_every_form_gives_the_same_impedances(tmp_path, feedpoint_ohm, name, text, options):
    frequency_hz, shack, feedpoint = impedances(deembed(tmp_path, name, text, *options).stdout)
    assert frequency_hz == pytest.approx(FREQUENCY_HZ, rel=1e-12)
    assert shack == pytest.approx(SHACK_OHM, rel=RELATIVE)
    assert feedpoint == pytest.approx(feedpoint_ohm, rel=RELATIVE)


def test_the_general_library_reads_the_same_impedance_wherever_it_is_right(tmp_path):
    # A second reader, so that the forms above are not only what we believe the standard to say.
    assert {form[0] for form in FORMS} > LIBRARY_FAILS
    for form, name, text, options in FORMS:
        if form in LIBRARY_FAILS:
            continue
        (tmp_path / name).write_bytes(text.encode())
        with warnings.catch_warnings():
            warnings.simplefilter("ignore")
            library = Touchstone(str(tmp_path / name))
            _, matrices = library.get_sparameter_arrays()
        port = int(options[1]) - 1 if options else 0
        references = np.ravel(library.resistance)
        gamma = matrices[:, port, port]
        impedance = references[min(port, len(references) - 1)] * (1 + gamma) / (1 - gamma)
        assert impedance == pytest.approx(np.array(SHACK_OHM), rel=RELATIVE), form


def test_comment_in_latin_1(tmp_path):
    text = version_1(MHZ, RI, "! 23 °C, Füßchen").encode("latin-1")
    assert impedances(deembed(tmp_path, "a.s1p", text).stdout)[1] == pytest.approx(SHACK_OHM, rel=RELATIVE)


def test_exponents_and_bare_decimal_points(tmp_path):
    # The same two points in six spellings of numbers: Gamma = 0.5 j and 0.25 - 0.125 j.
    expected = [50 * (1 + g) / (1 - g) for g in (0.5j, 0.25 - 0.125j)]
    for lines in (
        ["14 0 0.5", "15 0.25 -0.125"],
        ["1.4E+01 0E0 5E-01", "1.5e1 2.5e-1 -12.5e-2"],
        ["14. .0 .5", "+15. +.25 -.125"],
        ["014.000 -0.0 +00.50", "15 .25000000000000000000 -1.25000e-01"],
    ):
        shack = impedances(deembed(tmp_path, "a.s1p", version_1(MHZ, lines)).stdout)[1]
        # Every number is exact in binary, so only the arithmetic of one division rounds.
        assert shack == pytest.approx(expected, rel=1e-12, abs=1e-12)


def test_a_plain_file_is_not_called_doubtful(tmp_path):
    assert "doubtful-file" not in codes(findings(tmp_path, "a.s1p", version_1(MHZ, RI)))
    assert "doubtful-file" not in codes(findings(tmp_path, "a.ts", version_2(RI)))
    normalised = version_1("# MHz Z RI R 50", records(parameter="Z"))
    assert "doubtful-file" not in codes(findings(tmp_path, "a.z1p", normalised))


@pytest.mark.parametrize(
    ("name", "text"),
    [
        pytest.param("a.ts", version_2(RI).removesuffix("[End]\n"), id="no [End]"),
        pytest.param("a.ts", version_2(RI) + "14.7 0.1 0.1\n", id="data after [End]"),
        pytest.param("a.s1p", version_1(MHZ, RI).removesuffix("\n"), id="last record without its line end"),
        pytest.param("a.s1p", version_1(MHZ, RI[::-1]), id="descending"),
        pytest.param("a.s1p", version_1(MHZ, [*RI, "14.7 1.06 0"]), id="reflection of 1.06"),
    ],
)
def test_readable_but_doubtful(tmp_path, name, text):
    process = deembed(tmp_path, name, text, output="json")
    doubtful = [f for f in json.loads(process.stdout)["findings"] if f["code"] == "doubtful-file"]
    assert len(doubtful) == 1
    assert doubtful[0]["severity"] == "warning"
    assert doubtful[0]["message"]
    # A user who asked for a file or a pipe sees it too.
    assert process.stderr.strip()


def test_version_1_impedances_that_look_like_plain_ohms_are_read_by_the_standard_and_doubted(tmp_path):
    text = version_1("# MHz Z RI R 50", OHMS)
    assert "doubtful-file" in codes(findings(tmp_path, "a.z1p", text))
    shack = impedances(deembed(tmp_path, "a.z1p", text).stdout)[1]
    assert shack == pytest.approx([50 * z for z in SHACK_OHM], rel=RELATIVE)


def test_data_after_the_end_are_not_read(tmp_path):
    frequency_hz, _, _ = impedances(deembed(tmp_path, "a.ts", version_2(RI) + "14.7 0.1 0.1\n").stdout)
    assert frequency_hz == pytest.approx(FREQUENCY_HZ, rel=1e-12)


@pytest.mark.parametrize("magnitude", [1.0, 1.005, 1.049])
def test_reflection_slightly_above_one_is_no_fault_of_the_file(tmp_path, magnitude):
    found = findings(tmp_path, "a.s1p", version_1(MHZ, [*RI, f"14.7 0 {magnitude}"]))
    assert "doubtful-file" not in codes(found)


def test_a_point_at_0_hz_is_left_out_with_a_note(tmp_path):
    before = codes(findings(tmp_path, "a.s1p", version_1(MHZ, RI)))
    found = findings(tmp_path, "a.s1p", version_1(MHZ, ["0 0.99 0", *RI]))
    added = [finding for finding in found if finding["code"] not in before]
    assert [finding["severity"] for finding in added] == ["note"]
    assert "0 Hz" in added[0]["message"]


def test_a_port_that_was_not_asked_for_is_noted(tmp_path):
    text = version_1(MHZ, matrix_records("full"))
    assumed = [f for f in findings(tmp_path, "a.s2p", text) if f["code"] == "port-assumed"]
    assert [finding["severity"] for finding in assumed] == ["note"]
    assert "port-assumed" not in codes(findings(tmp_path, "a.s2p", text, "--port", "1"))
    assert "port-assumed" not in codes(findings(tmp_path, "a.s1p", version_1(MHZ, RI)))


def test_the_port_taken_by_default_is_the_first(tmp_path):
    shack = impedances(deembed(tmp_path, "a.s2p", version_1(MHZ, matrix_records("full"))).stdout)[1]
    assert shack == pytest.approx(SHACK_OHM, rel=RELATIVE)


def test_a_run_of_no_length_leaves_the_sweep_as_it_is(tmp_path):
    # Anchors the feed point itself: with nothing between the ends both are the impedance that was written.
    (tmp_path / "none.toml").write_text(RUN_SHEET.replace("length_m = 12.0", "length_m = 0.0"), encoding="utf-8")
    (tmp_path / "a.s1p").write_text(version_1(MHZ, RI), encoding="utf-8")
    process = run_feedpoint("deembed", "a.s1p", "--run", "none.toml", "--format", "csv", cwd=tmp_path)
    assert_done(process)
    assert impedances(process.stdout)[2] == pytest.approx(SHACK_OHM, rel=RELATIVE)


@pytest.mark.parametrize("value", ["1 0", "-1 0", "0 1"])
def test_open_short_and_pure_reactance_are_legal_values(tmp_path, value):
    table = deembed(tmp_path, "a.s1p", version_1(MHZ, [f"14.0 {value}", "14.1 0.2 0.1"])).stdout
    assert len(table.splitlines()) == 3
    assert "nan" not in table.lower()


@pytest.mark.parametrize("value", ["1e300 0", "0 -1e300", "1e308 1e308", "1e-300 0", "0 0"])
def test_impedances_near_open_and_short_are_legal_values(tmp_path, value):
    table = deembed(tmp_path, "a.z1p", version_1("# MHz Z RI R 50", [f"14.0 {value}", "14.1 0.8 0.4"])).stdout
    assert len(table.splitlines()) == 3
    assert "nan" not in table.lower()
