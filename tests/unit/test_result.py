"""Results: open and short circuits, extension, references, selected rows, findings."""

import numpy as np
import pytest

import feedpoint
from feedpoint import (
    AnalyzerErrors,
    Assumed,
    CableSection,
    LossLaw,
    LumpedSection,
    Run,
    RunRefused,
    Sweep,
    SweepRefused,
    TransformerSection,
    WrongUsage,
    deembed,
    embed,
    parse_run_sheet,
)
from feedpoint.result import COLUMNS
from feedpoint.selection import RowChoice, chosen_rows, telling_points

RUN = parse_run_sheet('[[section]]\ncable = "RG-58C/U"\nlength_m = 20\n')
FREQUENCY = np.linspace(10e6, 20e6, 201)


def dipole(frequency=FREQUENCY):
    return Sweep.from_impedance(frequency, 70 * (1 + 10j * (frequency / 14.1e6 - 14.1e6 / frequency)), source="dipole")


def codes(result):
    return [finding.code for finding in result.findings]


def test_an_open_stays_open_and_a_short_stays_short():
    run = parse_run_sheet("[[section]]\nseries_resistance_ohm = 5\n[[section]]\nimpedance_ratio = 4\n")
    result = deembed(Sweep(np.array([1e6]), np.array([1.0])), run)
    assert result.impedance_ohm[0].real == np.inf
    assert result.impedance_ohm[0].imag == 0.0
    assert result.columns["feedpoint_swr"][0] == np.inf
    shorted = deembed(Sweep(np.array([1e6]), np.array([-1.0])), parse_run_sheet("[[section]]\nimpedance_ratio = 4\n"))
    assert shorted.impedance_ohm[0] == 0.0


def test_columns_are_the_fixed_ones_and_known_where_they_must_be():
    table = embed(dipole(), RUN).table()
    assert tuple(table.columns) == COLUMNS
    assert table.iloc[:, :14].notna().all().all()
    assert table.iloc[:, 14:].isna().all().all()


def test_port_extension_is_undone_first_and_put_on_again():
    extended = Run(RUN.sections, analyzer=AnalyzerErrors(extension_s=3e-9))
    there = embed(dipole(), extended)
    saved = there.saved_shack_gamma()
    turned = there.planes.gamma[0] * np.exp(2j * 2 * np.pi * FREQUENCY * 3e-9)
    assert saved == pytest.approx(turned, abs=1e-14)
    back = deembed(Sweep(FREQUENCY, saved), extended)
    assert back.impedance_ohm == pytest.approx(there.impedance_ohm, rel=1e-12)
    assert back.planes.gamma[0] == pytest.approx(there.planes.gamma[0], abs=1e-14)


def test_swr_reference_changes_swr_and_return_loss_alone():
    at_50, at_75 = embed(dipole(), RUN), embed(dipole(), RUN, swr_reference_ohm=75.0)
    for name in COLUMNS:
        same = np.array_equal(at_50.columns[name], at_75.columns[name], equal_nan=True)
        assert same is ("swr" not in name and "return_loss" not in name) or name in COLUMNS[14:]
    z = at_75.impedance_ohm
    rho = np.abs((z - 75) / (z + 75))
    assert at_75.columns["feedpoint_swr"] == pytest.approx((1 + rho) / (1 - rho), rel=1e-12)


def test_network_is_the_antenna():
    network = embed(dipole(), RUN).network()
    assert network.f == pytest.approx(FREQUENCY)
    assert network.z[:, 0, 0] == pytest.approx(dipole_impedance(), rel=1e-9)


def dipole_impedance():
    return 70 * (1 + 10j * (FREQUENCY / 14.1e6 - 14.1e6 / FREQUENCY))


def test_rows_between_points_are_interpolated_at_the_antenna():
    shack = embed(dipole(), RUN)
    result = deembed(Sweep(FREQUENCY, shack.saved_shack_gamma()), RUN)
    asked = 14.2213e6
    rows = chosen_rows(result, RowChoice(at_hz=(asked, 14.1e6)), thin=False)
    assert rows.columns["frequency_hz"].tolist() == [14.1e6, asked]
    truth = embed(dipole(np.array([asked])), RUN)
    for name in ("shack_resistance_ohm", "feedpoint_reactance_ohm", "total_loss_db"):
        assert rows.columns[name][1] == pytest.approx(truth.columns[name][0], rel=1e-4)
    assert [finding.code for finding in rows.findings] == ["interpolated-row"]


def test_a_row_does_not_depend_on_which_rows_are_shown():
    result = deembed(dipole(), RUN)
    whole = chosen_rows(result, RowChoice(), thin=False)
    for choice in (RowChoice(at_hz=(14.1e6,)), RowChoice(every=7), RowChoice(from_hz=14e6, to_hz=15e6)):
        part = chosen_rows(result, choice, thin=False)
        places = np.searchsorted(whole.columns["frequency_hz"], part.columns["frequency_hz"])
        for name, values in part.columns.items():
            assert np.array_equal(values, whole.columns[name][places], equal_nan=True)


def test_rows_between_points_are_refused_beside_an_infinite_reflection():
    run = parse_run_sheet("[[section]]\nseries_resistance_ohm=25\n")
    # -25 ohm at the shack end is -50 ohm behind 25 ohm in series: exactly minus the reference.
    result = deembed(Sweep(np.array([1e6, 2e6, 3e6, 4e6]), np.array([-3.0, -3.0, -3.0, 0.1 + 0.2j])), run)
    with pytest.raises(WrongUsage, match="infinite"):
        chosen_rows(result, RowChoice(at_hz=(1.5e6,)), thin=False)


def test_result_between_points_is_one_of_its_own():
    shack = embed(dipole(), RUN)
    result = deembed(Sweep(FREQUENCY, shack.saved_shack_gamma()), RUN)
    between = result.at(np.array([14.2213e6]))
    assert between.sweep.gamma == pytest.approx(between.planes.gamma[0], abs=1e-12)
    again = deembed(between.sweep, RUN)
    assert again.impedance_ohm == pytest.approx(between.impedance_ohm, rel=1e-9)


@pytest.mark.parametrize(
    "choice", [RowChoice(at_hz=(30e6,)), RowChoice(from_hz=21e6), RowChoice(from_hz=14.01e6, to_hz=14.02e6)]
)
def test_rows_outside_the_sweep_are_refused(choice):
    with pytest.raises(WrongUsage):
        chosen_rows(deembed(dipole(), RUN), choice, thin=False)


def test_telling_rows_hold_ends_landmarks_and_steps():
    result = deembed(dipole(), RUN)
    points = telling_points(result, np.arange(201))
    assert points[0] == 0
    assert points[-1] == 200
    minimum = result.landmarks.minimum_swr_hz.value
    assert np.abs(FREQUENCY[points] - minimum).min() <= 25e3
    assert 15 <= points.size <= 24


def test_rows_that_were_asked_for_are_never_thinned_away():
    result = deembed(dipole(), RUN)
    on_points = tuple(float(frequency) for frequency in FREQUENCY[3:63:2])
    assert chosen_rows(result, RowChoice(at_hz=on_points), thin=True).columns["frequency_hz"].size == 30
    with_range = chosen_rows(result, RowChoice(at_hz=(FREQUENCY[7], 14.2213e6), from_hz=10e6), thin=True)
    assert with_range.thinned
    assert {FREQUENCY[7], 14.2213e6} <= set(with_range.columns["frequency_hz"])


def test_single_point_sweep_works_and_says_where_it_cannot():
    result = deembed(Sweep(np.array([14.2e6]), np.array([0.2 + 0.1j])), RUN)
    assert result.landmarks.swr2_low_hz.value is None
    assert chosen_rows(result, RowChoice(at_hz=(14.2e6,)), thin=True).columns["frequency_hz"].size == 1
    with pytest.raises(WrongUsage):
        chosen_rows(result, RowChoice(at_hz=(14.3e6,)), thin=True)


def test_findings_about_passivity():
    over = Sweep(FREQUENCY, np.full(201, 1.02))
    assert "reflection-above-unity" in codes(deembed(over, RUN))
    assert "loss-above-ceiling" not in codes(deembed(over, RUN))
    almost = Sweep(FREQUENCY, np.full(201, 0.95))
    assert "loss-above-ceiling" in codes(deembed(almost, RUN))
    assert "reflection-above-unity" not in codes(deembed(almost, RUN))
    assert codes(deembed(Sweep(FREQUENCY, np.full(201, 0.3)), RUN)) == []
    assert "reflection-above-unity" in codes(embed(over, RUN))


def test_findings_about_the_described_run():
    coarse = deembed(Sweep(np.array([1e6, 30e6]), np.array([0.1, 0.1])), RUN)
    assert "coarse-step" in codes(coarse)
    # 20 m of velocity factor 0.66 turn 720 deg * 20 m * 29 MHz/(0.66 c) = 2110 deg between the two points.
    figures = next(finding.figures for finding in coarse.findings if finding.code == "coarse-step")
    assert figures["turn_deg"] == pytest.approx(2111, rel=0.01)
    assert "reference-mismatch" in codes(deembed(Sweep(FREQUENCY, np.zeros(201), 75.0), RUN))
    assert "reference-mismatch" not in codes(deembed(Sweep(FREQUENCY, np.zeros(201), 52.0), RUN))
    outside = "[[section]]\nz0_ohm=50\nvelocity_factor=0.66\nlength_m=1\nloss=[{mhz=100,db_per_100m=9}]\n"
    assert "outside-loss-data" in codes(deembed(dipole(), parse_run_sheet(outside)))
    flat = "{mhz=1,db_per_100m=6},{mhz=10,db_per_100m=8},{mhz=100,db_per_100m=9}"
    poor = outside.replace("{mhz=100,db_per_100m=9}", flat)
    assert "poor-loss-fit" in codes(deembed(dipole(), parse_run_sheet(poor)))


@pytest.mark.parametrize("reference_ohm", [0.0, -50.0, np.nan, np.inf])
def test_swr_refers_to_a_positive_resistance(reference_ohm):
    for computation in (deembed, embed):
        with pytest.raises(WrongUsage):
            computation(dipole(), RUN, swr_reference_ohm=reference_ohm)


def test_trials_are_refused_rather_than_ignored():
    with pytest.raises(WrongUsage, match="Monte Carlo"):
        deembed(dipole(), RUN, 2000)
    assert deembed(dipole(), RUN, trials=None, seed=0).frequency_hz.size == 201


@pytest.mark.parametrize(
    "build",
    [
        lambda: LumpedSection("x", "serial", resistance_ohm=Assumed(10.0)),
        lambda: LumpedSection("x", "shunt", inductance_h=Assumed(0.0)),
        lambda: LumpedSection("x", "series"),
        lambda: TransformerSection("x", Assumed(0.0)),
        lambda: CableSection("x", Assumed(-50.0), Assumed(0.66), Assumed(1.0), Assumed(LossLaw(1.0))),
        lambda: CableSection("x", Assumed(50.0), Assumed(0.66), Assumed(-1.0), Assumed(LossLaw(1.0))),
        lambda: CableSection("x", Assumed(50.0), Assumed(0.0), Assumed(1.0), Assumed(LossLaw(1.0))),
    ],
)
def test_sections_that_cannot_be_are_refused_in_python_too(build):
    with pytest.raises(RunRefused, match=r"^x: "):
        build()


@pytest.mark.parametrize(
    ("frequency", "gamma", "reference", "fragment"),
    [
        ([1e6, 2e6], [0.1], 50.0, "one of each"),
        ([], [], 50.0, "no points"),
        ([1e6], [np.nan], 50.0, "not finite"),
        ([1e6], [0.1], 0.0, "reference"),
        ([-1e6], [0.1], 50.0, "not positive"),
        ([2e6, 1e6], [0.1, 0.1], 50.0, "do not rise at point 2"),
        (["x"], [0.1], 50.0, "no numbers"),
        ([1e6], [0.1], None, "no numbers"),
        ([1e6], [1e200], 50.0, "a reflection of 1e\\+200 is none"),
    ],
)
def test_arrays_that_make_no_sweep_are_refused(frequency, gamma, reference, fragment):
    with pytest.raises(SweepRefused, match=fragment):
        Sweep(np.array(frequency), np.array(gamma), reference, "x")


def test_records_are_read_only():
    sweep = dipole()
    result = deembed(sweep, RUN)
    arrays = [sweep.gamma, result.impedance_ohm, result.gamma, result.planes.voltage, *result.columns.values()]
    for array in arrays:
        with pytest.raises(ValueError, match="read-only"):
            array[0] = 0.0
    with pytest.raises(AttributeError):
        sweep.reference_ohm = 75.0
    assert isinstance(feedpoint.deembed(sweep, RUN), feedpoint.FeedpointResult)
