"""From a run sheet to the figures that count, with where each came from."""

from pathlib import Path

import numpy as np
import pytest

from feedpoint import RunRefused, deembed, parse_run_sheet
from feedpoint.line.propagation import true_loss_db_per_100m
from feedpoint.run.catalogue import built_in_catalogue
from feedpoint.sweep.record import Sweep

CABLE = '[[section]]\nz0_ohm = 50\nvelocity_factor = 0.84\nlength_m = 31.5\nconductor_loss = 0.4\n'


def section(text):
    return parse_run_sheet("[[section]]\n" + text).sections[0]


def test_figures_of_a_catalogue_cable_say_so():
    cable = section('cable = "rg 213 u"\nlength_ft = 100\nz0_ohm = 51\n')
    origins = {key: figure.origin for key, figure in cable.figures().items()}
    assert origins["length_m"] == "sheet"
    assert origins["z0_ohm"] == "sheet"
    assert origins["velocity_factor"] == "catalogue"
    assert origins["conductor_loss"] == "catalogue"
    assert cable.length_m.value == pytest.approx(30.48)
    assert cable.name == "rg 213 u"
    assert cable.figures()["cable"].value == "RG-213/U"


def test_delay_fixes_the_phase_and_length_the_loss():
    cable = section("z0_ohm = 50\nlength_m = 30\ndelay_ns = 150\nconductor_loss = 1.0\n")
    assert cable.velocity_factor.value == pytest.approx(30 / (299_792_458 * 150e-9))
    assert cable.figures()["delay_ns"].value == pytest.approx(150.0)


def test_loss_points_in_feet_and_metres_are_one_and_the_same():
    in_metres = section("z0_ohm=50\nvelocity_factor=0.66\nlength_m=1\nloss=[{mhz=10, db_per_100m=10}]\n")
    in_feet = section("z0_ohm=50\nvelocity_factor=0.66\nlength_m=1\nloss=[{mhz=10, db_per_100ft=3.048}]\n")
    assert in_feet.loss.value.conductor == pytest.approx(in_metres.loss.value.conductor, rel=1e-12)


@pytest.mark.parametrize("term", ["conductor_loss = 0.6", "dielectric_loss = 0.008", "floor_loss = 0.05"])
def test_one_loss_term_beside_a_catalogue_cable_is_refused(term):
    with pytest.raises(RunRefused, match="beside a cable of the catalogue"):
        section(f'cable = "RG-213/U"\nlength_m = 100\n{term}\n')


def test_both_loss_terms_replace_the_catalogue_law():
    cable = section('cable = "RG-213/U"\nlength_m = 100\nconductor_loss = 0.7\ndielectric_loss = 0.01\n')
    law = cable.loss.value
    assert (law.conductor, law.dielectric, law.floor) == (0.7, 0.01, 0.0)
    assert cable.loss.origin == "sheet"


def test_steel_core_of_a_section_counts_for_the_points_of_the_catalogue(tmp_path):
    (tmp_path / "own.toml").write_text(
        '[[cable]]\nname = "thin"\nz0_ohm = 50\nvelocity_factor = 0.66\n'
        "loss = [{mhz=1,db_per_100m=6.2},{mhz=10,db_per_100m=10.8},{mhz=100,db_per_100m=27.6}]\n",
        encoding="ascii",
    )
    text = '[run]\ncables_file = "own.toml"\n[[section]]\ncable = "thin"\nlength_m = 1\n'
    plain, steel = (parse_run_sheet(text + more, folder=tmp_path) for more in ("", "steel_core = true\n"))
    assert plain.sections[0].loss.value.floor == 0.0
    assert steel.sections[0].loss.value.floor > 1.0


@pytest.mark.parametrize(
    ("text", "fragment"),
    [
        ("loss=[{mhz=1,db_per_100meter=3}]", "Did you mean 'db_per_100m'"),
        ("loss=[{mhz=1,db_per_100m=3}]\nmax_power_w=[{mhz=1,watt=3}]", "Did you mean 'w'"),
        ("loss=[]", "expected at least one entry"),
        ("loss=[3]", "expected a table in braces"),
        ('loss="3 dB"', "expected a list in brackets"),
    ],
)
def test_nested_keys_are_checked_in_words(text, fragment):
    with pytest.raises(RunRefused) as refusal:
        section(f"z0_ohm=50\nvelocity_factor=0.66\nlength_m=1\n{text}\n")
    assert fragment in str(refusal.value)


def test_floor_term_joins_only_for_steel_cores():
    points = "z0_ohm=75\nvelocity_factor=0.66\nlength_m=1\nloss=[{mhz=1,db_per_100m=2.0},{mhz=10,db_per_100m=3.6},"
    points += "{mhz=100,db_per_100m=11.2}]\n"
    assert section(points).loss.value.floor == 0.0
    steel = section(points + "steel_core = true\n").loss.value
    assert steel.floor > 0.1
    assert steel.fit_residual < section(points).loss.value.fit_residual


def test_temperature_and_its_origin():
    assert parse_run_sheet(CABLE).temperature_c.origin == "default"
    run = parse_run_sheet("[run]\ntemperature_c = 5\n" + CABLE)
    assert (run.temperature_c.value, run.temperature_c.origin) == (5.0, "sheet")
    assert run.at_temperature(35.0).temperature_c.origin == "call"


def test_warm_copper_loses_more_and_a_warm_dielectric_is_slower_if_said_so():
    f = np.array([10e6])
    cold, warm = (parse_run_sheet(f"[run]\ntemperature_c={t}\n{CABLE}").two_ports(f, 50.0)[0] for t in (20, 45))
    # Skin-effect resistance goes with the root of resistivity: sqrt(1 + 0.00393 * 25) = 1.04798 (IEC 60028).
    assert warm.matched_loss_db / cold.matched_loss_db == pytest.approx(1.04798, abs=2e-3)
    tempco = CABLE.replace("conductor_loss = 0.4", "conductor_loss = 0") + "delay_tempco_ppm_per_k = 100\n"
    fast, slow = (parse_run_sheet(f"[run]\ntemperature_c={t}\n{tempco}").two_ports(f, 50.0)[0] for t in (20, 45))
    # 100 ppm/K over 25 K is 0.25 % of the delay.
    assert slow.electrical_length / fast.electrical_length == pytest.approx(1.0025, abs=1e-12)


def test_tolerances_ratings_bands_and_analyzer_are_read():
    run = parse_run_sheet(
        CABLE + "length_tolerance_ft = 1\nloss_tolerance_percent = 10\nz0_tolerance_ohm = 1\nmax_voltage_rms_v = 1400\n"
        "max_power_w = [{mhz = 30, w = 1000}]\n"
        '[[band]]\nname = "20 m"\nlow_hz = 14.0e6\nhigh_hz = 14.35e6\nswr_limit = 2\n'
        '[analyzer]\ndirectivity_db = 40\nnoise = 0.001\ncalibration = "a"\n'
    )
    cable = run.sections[0]
    assert cable.tolerances.length_m == pytest.approx(0.3048)
    assert cable.tolerances.loss_percent == 10
    assert cable.ratings.max_power_w == ((30e6, 1000.0),)
    assert run.bands[0].swr_limit == 2
    assert run.analyzer.calibration == "a"
    assert run.states_tolerances
    assert not parse_run_sheet(CABLE).states_tolerances


def test_own_catalogue_is_found_beside_the_sheet_and_shadows_the_built_in_one(tmp_path):
    (tmp_path / "own.toml").write_text(
        '[[cable]]\nname = "RG-213/U"\nz0_ohm = 52\nvelocity_factor = 0.66\nconductor_loss = 0.6\n'
        'sources = ["measured"]\n',
        encoding="utf-8",
    )
    text = '[run]\ncables_file = "own.toml"\n[[section]]\ncable = "RG-213/U"\nlength_m = 10\n'
    assert parse_run_sheet(text, folder=tmp_path).sections[0].z0_ohm.value == 52


@pytest.mark.parametrize(
    ("catalogue", "fragment"),
    [
        ("", "no [[cable]]"),
        ("[[cables]]\n", "Did you mean 'cable'"),
        ('[[cable]]\nname = "x"\nz0_ohm = 50\nvelocity_factor = 0.66\n', "no loss"),
        ('[[cable]]\nname = "x"\nz0_ohm = 50\nvelocity_factor = 1.2\nconductor_loss = 1\n', "velocity_factor"),
        (
            2 * '[[cable]]\nname = "X-1"\nz0_ohm = 50\nvelocity_factor = 0.66\nconductor_loss = 1\n',
            "cable 2: 'X-1' is the name of cable 1",
        ),
    ],
)
def test_bad_catalogue_is_refused(tmp_path, catalogue, fragment):
    (tmp_path / "own.toml").write_text(catalogue, encoding="utf-8")
    with pytest.raises(RunRefused) as refusal:
        parse_run_sheet('[run]\ncables_file = "own.toml"\n' + CABLE, folder=tmp_path)
    assert fragment in str(refusal.value)
    assert "own.toml" in str(refusal.value)


def test_every_catalogue_entry_has_sources_and_consistent_figures():
    for entry in built_in_catalogue().entries.values():
        assert entry.sources
        law = entry.loss_law(entry.velocity_factor)
        assert law.fit_residual < 0.05
        if entry.capacitance_pf_per_m is not None:
            # C = 1/(Z_n v c), an identity of the line; printed values are rounded to 1 %.
            capacitance = 1e12 / (entry.z0_ohm * entry.velocity_factor * 299_792_458.0)
            assert capacitance == pytest.approx(entry.capacitance_pf_per_m, rel=0.02)


def test_a_run_that_lets_nothing_back_is_refused():
    run = parse_run_sheet("[[section]]\nz0_ohm=50\nvelocity_factor=0.66\nlength_m=5000\nconductor_loss=10\n")
    with pytest.raises(RunRefused, match="no reflection comes back"):
        deembed(Sweep(np.array([10e6]), np.array([0.1])), run)


def write_two_port(path: Path, frequency_mhz, phase_per_mhz=0.01, through=0.98):
    rows = []
    for f in frequency_mhz:
        s21 = through * np.exp(-1j * phase_per_mhz * f)
        s11 = 0.05 * np.exp(-0.02j * f)
        rows.append(" ".join(f"{x:.17g}" for z in (s11, s21, s21, s11) for x in (z.real, z.imag)))
    lines = [f"{f:.17g} {row}" for f, row in zip(frequency_mhz, rows, strict=True)]
    path.write_text("# MHz S RI R 50\n" + "\n".join(lines) + "\n", encoding="ascii")


def test_two_port_is_interpolated_smoothly(tmp_path):
    fine, coarse = np.linspace(1, 30, 291), np.linspace(1, 30, 30)
    write_two_port(tmp_path / "fine.s2p", fine)
    write_two_port(tmp_path / "coarse.s2p", coarse)
    sweep = Sweep(fine * 1e6, 0.3 * np.exp(1j * fine))
    results = []
    for name in ("fine", "coarse"):
        run = parse_run_sheet(f'[[section]]\ntwo_port = "{name}.s2p"\n', folder=tmp_path)
        results.append(deembed(sweep, run).gamma)
    # Cubic splines of arcs that turn by 0.02 rad between points err by 0.02^4/384, far below this.
    assert results[1] == pytest.approx(results[0], abs=1e-8)


def test_lossless_analog_of_every_lumped_element():
    f = np.array([14.2e6])
    w = 2 * np.pi * f[0]
    for text, impedance in [
        ("series_resistance_ohm = 10\nseries_inductance_h = 1e-6", 100 + 10 + 1j * w * 1e-6),
        ("series_capacitance_f = 220e-12", 100 + 1 / (1j * w * 220e-12)),
        ("shunt_resistance_ohm = 300", 75.0),
        ("shunt_inductance_h = 1e-6\nshunt_capacitance_f = 50e-12", 1 / (0.01 + 1 / (1j * w * 1e-6) + 1j * w * 50e-12)),
        ("impedance_ratio = 4", 25.0),
    ]:
        from feedpoint import embed

        result = embed(Sweep.from_impedance(f, [100.0]), parse_run_sheet("[[section]]\n" + text))
        assert result.planes.impedance_ohm[0][0] == pytest.approx(impedance, rel=1e-12)


def test_true_loss_of_a_fit_goes_through_a_single_point():
    cable = section("z0_ohm=50\nvelocity_factor=0.66\nlength_m=1\nloss=[{mhz=10, db_per_100m=4.5}]\n")
    assert cable.loss.value.dielectric == 0.0
    assert true_loss_db_per_100m(np.array([10e6]), 0.66, cable.loss.value)[0] == pytest.approx(4.5, rel=1e-9)
