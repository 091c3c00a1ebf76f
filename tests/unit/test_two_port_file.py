"""A section that is known by its file: what is taken, what is noticed, what is refused."""

import numpy as np
import pytest

from feedpoint import RunRefused, Sweep, deembed, parse_run_sheet

SWEEP = Sweep(np.array([1e6, 2e6]), np.array([0.3, 0.2j]))


def through(tmp_path, text):
    (tmp_path / "a.s2p").write_text(text, encoding="ascii")
    return deembed(SWEEP, parse_run_sheet('[[section]]\nname = "box"\ntwo_port = "a.s2p"\n', folder=tmp_path))


@pytest.mark.parametrize(
    ("values", "fragment"),
    [
        ("0 0 3 0 3 0 0 0", "3 times what it receives"),  # an amplifier in both directions
        ("1 0 .5 0 .5 0 0 0", "times what it receives"),  # reflects all and lets half through
        ("0 0 .05 0 .05 0 0 0", "|S12 S21|"),
        ("0 0 1 0 .8 0 0 0", "differ by 20 %"),
    ],
)
def test_what_hides_the_antenna_is_refused(tmp_path, values, fragment):
    with pytest.raises(RunRefused) as refusal:
        through(tmp_path, f"# MHz S RI R 50\n1 {values}\n2 {values}\n")
    assert fragment in str(refusal.value)
    assert "a.s2p, box" in str(refusal.value)


def test_findings_about_the_file_are_kept(tmp_path):
    values = "0 0 .9 0 .9 0 0 0"
    result = through(tmp_path, f"# MHz S RI R 50\n2 {values}\n1 {values}")
    messages = [finding.message for finding in result.findings if finding.code == "doubtful-file"]
    assert any("descend" in message for message in messages)
    assert any("cut short" in message for message in messages)


def test_a_rest_of_calibration_leaves_the_matched_loss_unknown_not_nonsense(tmp_path):
    # |S11| = 1.01 and |S21| = 0.15: no loss between matched ends can be stated; the impedance still can.
    values = "1.01 0 .15 0 .15 0 -1.01 0"
    result = through(tmp_path, f"# MHz S RI R 50\n1 {values}\n2 {values}\n")
    assert np.isnan(result.columns["matched_loss_db"]).all()
    assert np.isfinite(result.impedance_ohm).all()


def test_a_little_gain_is_told(tmp_path):
    values = "0 0 1.02 0 1.02 0 0 0"
    result = through(tmp_path, f"# MHz S RI R 50\n1 {values}\n2 {values}\n")
    assert "two-port-gain" in [finding.code for finding in result.findings]
    values = "0 0 .98 0 .98 0 0 0"
    result = through(tmp_path, f"# MHz S RI R 50\n1 {values}\n2 {values}\n")
    assert result.findings == ()


def test_two_port_of_another_number_of_ports_is_refused(tmp_path):
    (tmp_path / "a.s1p").write_text("# MHz S RI R 50\n1 0 0\n", encoding="ascii")
    with pytest.raises(RunRefused, match=r"1 port\(s\); expected two"):
        parse_run_sheet('[[section]]\ntwo_port = "a.s1p"\n', folder=tmp_path)
