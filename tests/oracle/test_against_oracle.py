"""
The package against 50-digit physics, through files only: 80 drawn runs, 640 points, both directions.

What was measured is printed by `python -m tests.oracle.report`.
"""

import pytest

import feedpoint
from tests.oracle.cases import Case, draw_cases
from tests.oracle.comparison import (
    ASKED,
    QUANTITIES,
    compare_deembed,
    compare_embed,
    expectations,
    rounding_of,
    worst,
)
from tests.oracle.described import Cable, Series, Shunt, Transformer, TwoPort
from tests.oracle.files import write_run_sheet, write_sweep
from tests.oracle.run_at import RunAt
from tests.oracle.telegrapher import mp

CASES = draw_cases()
IDS = [f"{number}-{case.kind.replace(' ', '-')}" for number, case in enumerate(CASES)]

LINE = Cable(z0_ohm=50.0, length_m=23.0, velocity_factor=0.66, conductor_loss=1.4, dielectric_loss=0.02, floor_loss=0.4)
LADDER = Cable(z0_ohm=450.0, length_m=17.0, velocity_factor=0.91, conductor_loss=0.1)
GRID_HZ = (1.9e6, 7.1e6, 29.2e6)
LIMIT_RUNS = {
    "cable": (LINE,),
    "cable and ladder": (LINE, Transformer(9.0), LADDER),
    "lumped": (Shunt(capacitance_f=47e-12), LINE, Series(resistance_ohm=3.0, inductance_h=0.4e-6)),
    "two-port": (TwoPort(75.0, dict.fromkeys(GRID_HZ, ((0.2 + 0.1j, 0.7j), (0.72j, -0.15 + 0.2j)))), LINE),
}


def describe(deviation):
    """A deviation in words, for a failing test."""
    return f"{deviation.quantity}: off by {deviation.error:.2e}, allowed {deviation.allowed:.2e} ({deviation.where})"


def assert_all_within(found, record_property):
    """Every deviation within what is allowed; the worst of each quantity is kept with the test's record."""
    for quantity in QUANTITIES:
        record_property(quantity, worst(found, quantity).error)
    beyond = [describe(d) for d in found if not d.error <= d.allowed]
    assert not beyond, "\n".join(beyond[:10])


@pytest.mark.parametrize("case", CASES, ids=IDS)
def test_deembedded_sweep_is_the_antenna(tmp_path, record_property, case):
    assert_all_within(compare_deembed(tmp_path, case), record_property)


@pytest.mark.parametrize("case", CASES, ids=IDS)
def test_embedded_antenna_is_what_the_shack_sees(tmp_path, record_property, case):
    assert_all_within(compare_embed(tmp_path, case), record_property)


def test_the_agreement_asked_is_not_excused_by_rounding():
    # exp(2 alpha l) is at most 316 at 25 dB, so the file's 17 digits rarely count: no more than 1 point in 100 may need
    # more than 1e-10 in any quantity, else the comparison above would be softer than it says.
    relaxed = total = 0
    for case in CASES:
        runs, readings = expectations(case)
        for run, reading in zip(runs, readings, strict=True):
            relaxed += any(value > ASKED for value in rounding_of(run, reading.shack_gamma).values())
            total += 1
    assert relaxed <= total / 100


def test_the_cases_cover_what_they_claim():
    frequencies = [f for case in CASES for f in case.frequency_hz]
    losses = [run.matched_loss_db for case in CASES for run in expectations(case)[0]]
    assert len(frequencies) >= 500
    assert 0.1e6 <= min(frequencies) < 0.2e6
    assert 300e6 < max(frequencies) <= 500e6
    assert 0.3 <= min(losses) < 0.5
    assert 20 < max(losses) <= 25
    assert {s.z0_ohm for case in CASES for s in case.sections if isinstance(s, Cable)} == {50.0, 75.0, 450.0}
    assert {case.reference_ohm for case in CASES} == {50.0, 75.0}
    assert {s.reference_ohm for case in CASES for s in case.sections if isinstance(s, TwoPort)} == {50.0, 75.0}
    assert {len(case.sections) for case in CASES} == {1, 2, 3}
    assert sum(case.temperature_c != 20.0 for case in CASES) > len(CASES) / 3


@pytest.mark.parametrize("name", LIMIT_RUNS)
@pytest.mark.parametrize(("antenna_ohm", "gamma"), [(0, -1), (None, 1)], ids=["short", "open"])
def test_short_and_open_at_the_antenna_come_back(tmp_path, name, antenna_ohm, gamma):
    # |Z| is 0 or infinite there, so the reflection is compared. 17 digits times exp(2 alpha l) < 10: 1e-12 is ample.
    runs = [RunAt(LIMIT_RUNS[name], f, 35.0) for f in GRID_HZ]
    seen = [run.from_antenna(antenna_ohm).shack_gamma for run in runs]
    sweep = feedpoint.read_sweep(str(write_sweep(tmp_path / "shack.s1p", GRID_HZ, seen, 50.0)))
    run = feedpoint.read_run_sheet(str(write_run_sheet(tmp_path, LIMIT_RUNS[name], 35.0)))
    table = feedpoint.deembed(sweep, run).table()
    assert table["feedpoint_gamma_re"].tolist() == pytest.approx([gamma] * 3, abs=1e-12)
    assert table["feedpoint_gamma_im"].tolist() == pytest.approx([0.0] * 3, abs=1e-12)


@pytest.mark.parametrize("name", LIMIT_RUNS)
@pytest.mark.parametrize(("antenna_ohm", "gamma"), [(0, -1), (None, 1)], ids=["short", "open"])
def test_exact_short_and_open_are_embedded(tmp_path, name, antenna_ohm, gamma):
    # The file says exactly -1 or 1: an impedance of zero or infinity is a legal value, not an error.
    sweep = feedpoint.read_sweep(str(write_sweep(tmp_path / "antenna.s1p", GRID_HZ, [mp.mpc(gamma)] * 3, 50.0)))
    run = feedpoint.read_run_sheet(str(write_run_sheet(tmp_path, LIMIT_RUNS[name], 35.0)))
    table = feedpoint.embed(sweep, run).table()
    expected = [complex(RunAt(LIMIT_RUNS[name], f, 35.0).from_antenna(antenna_ohm).shack_ohm) for f in GRID_HZ]
    found = [complex(r, x) for r, x in zip(table["shack_resistance_ohm"], table["shack_reactance_ohm"], strict=True)]
    assert found == pytest.approx(expected, rel=ASKED)


def test_a_cable_without_length_changes_nothing(tmp_path):
    nothing = Cable(z0_ohm=75.0, length_m=0.0, velocity_factor=0.8, conductor_loss=1.0)
    case = Case("zero length", (nothing, LINE), 20.0, 50.0, GRID_HZ, (30 - 40j, 80 + 10j, 300 + 200j))
    assert all(d.error <= d.allowed for d in compare_deembed(tmp_path, case))
