"""Touchstone texts at the edges of the rules, beside what tests/end_to_end and tests/published cover."""

import numpy as np
import pytest

from feedpoint import SweepRefused
from feedpoint.sweep.touchstone import parse_touchstone

VERSION_2 = """\
[Version] 2.0
# MHz S RI R 50
[Number of Ports] 2
[Two-Port Data Order] 12_21
[Number of Frequencies] 2
[Network Data]
1 .1 0 .9 0 .8 0 .2 0
2 .1 0 .9 0 .8 0 .2 0
[End]
"""


def codes(network):
    return [finding.code for finding in network.findings]


def test_short_at_180_degrees_is_exact():
    for text in ("# MHz S MA R 50\n1 1 180\n2 1 -180\n3 1 540\n", "# MHz S DB R 50\n1 0 180\n2 0 -180\n3 0 540\n"):
        network = parse_touchstone(text, source="x.s1p", ports=1)
        assert network.points.values.ravel().tolist() == [-1.0, -1.0, -1.0]


@pytest.mark.parametrize(
    ("line", "instead", "fragment"),
    [
        (6, "[Network Data] 1 .1 0", "line 6: '[Network Data] 1 .1 0': expected nothing after"),
        (9, "[End] of it", "line 9"),
        (4, "[Two-Port Data Order] 12_21\n[Two-Port Data Order] 12_21", "line 5"),
        (4, "[Mixed-Mode Order] D2,1", "line 4: mixed-mode"),
        (3, "[Number of Ports] 999999999", "line 3"),
        (3, "[Number of Ports] 0", "line 3"),
        (5, "[Number of Frequencies] two", "line 5"),
        (7, "1 .1 0 .9 0 .8 0", "line 7: expected 9 numbers"),
        (6, "", "line 6: '1 .1 0 .9 0 .8 0 .2 0' before [Network Data]"),
        (2, "", "before the option line"),
    ],
)
def test_version_2_defect_is_refused_with_its_line(line, instead, fragment):
    lines = VERSION_2.split("\n")
    if instead:
        lines[line - 1] = instead
    else:
        del lines[line - 1]
    with pytest.raises(SweepRefused) as refusal:
        parse_touchstone("\n".join(lines), source="x.ts", ports=None)
    assert fragment in str(refusal.value)


def test_two_port_record_over_two_lines_is_version_2_only():
    broken = VERSION_2.replace("1 .1 0 .9 0 .8 0 .2 0", "1 .1 0 .9 0\n.8 0 .2 0")
    network = parse_touchstone(broken, source="x.ts", ports=None)
    assert network.points.values[0].tolist() == [[0.1, 0.9], [0.8, 0.2]]
    with pytest.raises(SweepRefused, match="line 2: expected 9 numbers"):
        parse_touchstone("# MHz S RI R 50\n1 .1 0 .9 0\n.8 0 .2 0\n", source="x.s2p", ports=2)


def test_noise_data_come_after_a_rising_sweep_only():
    record = ".1 0 .9 0 .9 0 .1 0"
    rising = f"# MHz S RI R 50\n1 {record}\n2 {record}\n1 3 .1 0 .5\n"
    assert "noise-data-skipped" in codes(parse_touchstone(rising, source="x.s2p", ports=2))
    falling = f"# MHz S RI R 50\n3 {record}\n2 {record}\n1 .1 0 .9 0\n"
    with pytest.raises(SweepRefused, match="line 4: expected 9 numbers"):
        parse_touchstone(falling, source="x.s2p", ports=2)
    version_2 = VERSION_2.replace("[End]", "[Noise Data]\n1 3 .1 0 .5\n[End]")
    assert "noise-data-skipped" in codes(parse_touchstone(version_2, source="x.ts", ports=None))


@pytest.mark.parametrize(
    ("option", "values", "doubted"),
    [
        ("# MHz Z RI R 50", "50 0", True),
        ("# MHz Z RI R 50", "5 -400", True),
        ("# MHz Z MA R 50", "60 89.9", True),
        ("# MHz Z RI R 50", "1.2 -3", False),
        ("# MHz Z RI R 1", "50 0", False),
        ("# MHz Y RI R 50", "0.02 0", True),
        ("# MHz Y RI R 50", "0.8 0.1", False),
    ],
)
def test_plain_ohms_and_siemens_in_version_1_are_doubted(option, values, doubted):
    network = parse_touchstone(f"{option}\n1 {values}\n2 {values}\n", source="x.z1p", ports=1)
    assert ("doubtful-file" in codes(network)) is doubted


def test_huge_values_do_no_harm():
    network = parse_touchstone("# MHz Y RI R 50\n1 1e308 1e308\n", source="x.s1p", ports=1)
    assert np.all(np.isfinite(network.points.values))


@pytest.mark.parametrize(
    ("text", "place"),
    [
        ("# MHz S RI R 1e-300\n1 0 0\n", "line 1"),
        ("# MHz S RI R 1e300\n1 0 0\n", "line 1"),
        ("# GHz S RI R 50\n1 0 0\n14200 0 0\n", "line 3"),  # MHz taken for GHz
    ],
)
def test_figures_beyond_all_sense_are_refused(text, place):
    with pytest.raises(SweepRefused, match=place):
        parse_touchstone(text, source="x.s1p", ports=1)


@pytest.mark.parametrize("option", ["# S RI R 50", "# MHz S R 50"])
def test_what_the_option_line_leaves_to_the_standard_is_doubted(option):
    assert "doubtful-file" in codes(parse_touchstone(f"{option}\n1 0.1 0\n", source="x.s1p", ports=1))
