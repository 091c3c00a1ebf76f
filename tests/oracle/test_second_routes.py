"""
The package against lines that others solve: a circuit library's distributed line, its coax from field theory, and
figures worked out elsewhere.

`python -m tests.oracle.coax_figures` prints how well a two-term loss law describes the coax from field theory.
"""

import numpy as np
import pytest
import skrf
from skrf.media import DistributedCircuit

import feedpoint
from tests.oracle.coax import (
    FIT_HZ,
    LOADS_OHM,
    PROBE_HZ,
    best_two_term_losses,
    coax,
    compare_impedances,
    compare_line,
    two_term_bounds,
)
from tests.oracle.described import Cable
from tests.oracle.files import write_run_sheet, write_sweep
from tests.oracle.run_at import RunAt
from tests.oracle.telegrapher import line_constants, mp
from tests.oracle.test_telegrapher import BENCHMARK_ANSWERS, NEPER_PER_100M, close_to_printed

LINES = {
    "RG-58 size": Cable(z0_ohm=50.0, length_m=30.0, velocity_factor=0.66, conductor_loss=1.38, dielectric_loss=0.021),
    "steel core, warm": Cable(z0_ohm=75.0, length_m=22.0, velocity_factor=0.82, conductor_loss=0.77,
                              dielectric_loss=0.003, floor_loss=1.1, delay_tempco_ppm_per_k=-60.0),
    "ladder": Cable(z0_ohm=450.0, length_m=40.0, velocity_factor=0.91, conductor_loss=0.09),
}  # fmt: skip
GRID_HZ = (0.5e6, 1.9e6, 7.1e6, 29.2e6, 145e6)
ANTENNAS_OHM = (8 - 400j, 25 - 110j, 73 + 42j, 180 - 320j, 34 + 5j)
WARM_C = 35.0


def distributed_line(cable, temperature_c, reference_ohm):
    """A cable as the circuit library's two-port; R(f), L(f), G(f), C from Z' and Y', skin reactance within L."""
    omega = 2 * np.pi * np.array(GRID_HZ)
    constants = [line_constants(cable, f, temperature_c) for f in GRID_HZ]
    series, shunt = (np.array([complex(c[k]) for c in constants]) for k in (0, 1))
    line = DistributedCircuit(
        skrf.Frequency.from_f(GRID_HZ, unit="Hz"), z0_port=reference_ohm,
        R=series.real, L=series.imag / omega, G=shunt.real, C=shunt.imag / omega,
    )  # fmt: skip
    return line.line(cable.length_m, "m").s


def read_run(folder, sections, temperature_c=20.0):
    """Write a run sheet and let the package read it."""
    return feedpoint.read_run_sheet(str(write_run_sheet(folder, sections, temperature_c)))


def read_sweep(folder, frequency_hz, gamma, reference_ohm=50.0):
    """Write a sweep and let the package read it."""
    gamma = [mp.mpmathify(g) for g in gamma]
    return feedpoint.read_sweep(str(write_sweep(folder / "sweep.s1p", frequency_hz, gamma, reference_ohm)))


def column_pair(table, real, imaginary):
    """Two columns as one complex array."""
    return table[real].to_numpy(float) + 1j * table[imaginary].to_numpy(float)


@pytest.mark.parametrize("reference_ohm", [50.0, 75.0])
@pytest.mark.parametrize("name", LINES)
def test_distributed_line_of_the_circuit_library(tmp_path, name, reference_ohm):
    # Both in double precision; 6 dB at most and 90 rad leave about 1e-12 of rounding.
    cable = LINES[name]
    s = distributed_line(cable, WARM_C, reference_ohm)
    antenna = np.array(ANTENNAS_OHM)
    gamma = (antenna - reference_ohm) / (antenna + reference_ohm)
    seen = s[:, 0, 0] + s[:, 0, 1] * s[:, 1, 0] * gamma / (1 - s[:, 1, 1] * gamma)
    run = read_run(tmp_path, (cable,), WARM_C)

    table = feedpoint.embed(read_sweep(tmp_path, GRID_HZ, gamma, reference_ohm), run).table()
    shack = column_pair(table, "shack_resistance_ohm", "shack_reactance_ohm")
    assert shack == pytest.approx(reference_ohm * (1 + seen) / (1 - seen), rel=1e-10)

    table = feedpoint.deembed(read_sweep(tmp_path, GRID_HZ, seen, reference_ohm), run).table()
    found = column_pair(table, "feedpoint_resistance_ohm", "feedpoint_reactance_ohm")
    assert found == pytest.approx(antenna, rel=1e-10)


def test_two_term_law_describes_solid_coax_as_well_as_such_a_law_can(tmp_path):
    found, bounds = compare_line(tmp_path, FIT_HZ), two_term_bounds(FIT_HZ)
    # The fit has the smallest sum of squares of all such laws, so no larger one than the field theory's own asymptote.
    assert np.sqrt(np.mean(found["loss"] ** 2)) <= bounds["loss_rms"]
    assert np.all(np.abs(found["loss"]) <= bounds["loss"])
    assert np.all(np.abs(found["velocity"]) <= bounds["velocity"])
    assert np.all(found["z_c"] <= bounds["z_c"])


def test_fit_of_the_two_terms_is_the_least_squares_optimum(tmp_path):
    # A general solver on the same sum of squares; 1e-6 is what the fit is promised to keep of the true losses.
    true = coax(FIT_HZ).gamma.real * 2000 / np.log(10)
    assert compare_line(tmp_path, FIT_HZ)["loss"] == pytest.approx(best_two_term_losses() / true - 1, rel=0, abs=1e-6)


def test_velocity_of_the_coax_is_not_its_high_frequency_one(tmp_path):
    # At 1 MHz field theory has 1.6 % less: the line's inductance inside the conductors. A constant velocity factor
    # would miss all of it; the law leaves less than a tenth.
    found = compare_line(tmp_path, FIT_HZ[:1])
    assert found["slowness"][0] > 0.015
    assert abs(found["velocity"][0]) < found["slowness"][0] / 10


def test_known_loads_come_back_through_solid_coax(tmp_path):
    found, bounds = compare_impedances(tmp_path, PROBE_HZ)
    assert found.shape == (len(LOADS_OHM), len(PROBE_HZ))
    assert np.all(found <= bounds)


# The line of test_telegrapher's benchmark, in keys of a run sheet.
BENCHMARK_LINE = Cable(
    z0_ohm=50.0, length_m=30.0, delay_ns=150.0,
    floor_loss=float(mp.mpf("0.005") * NEPER_PER_100M), dielectric_loss=float(mp.mpf("25e-6") * NEPER_PER_100M),
)  # fmt: skip
TERMINATED = [answer for answer in BENCHMARK_ANSWERS if answer[0] is not None]


def half_digit(printed):
    """Half a unit of a printed number's last digit."""
    return 0.5 * 10.0 ** -len(printed.partition(".")[2])


@pytest.mark.parametrize("answer", TERMINATED, ids=["inductive", "capacitive", "high", "short"])
def test_benchmark_line_embedded(tmp_path, answer):
    antenna, resistance, reactance, _, _, loss = answer
    sweep = read_sweep(tmp_path, [10e6], [(antenna - 50) / (antenna + 50)])
    row = feedpoint.embed(sweep, read_run(tmp_path, (BENCHMARK_LINE,))).table().iloc[0]
    # Printed to 1e-12 ohm or finer; double precision has 3e-14 of up to 200 ohm times a few.
    assert row["shack_resistance_ohm"] == pytest.approx(float(resistance), rel=0, abs=half_digit(resistance) + 1e-11)
    assert row["shack_reactance_ohm"] == pytest.approx(float(reactance), rel=0, abs=half_digit(reactance) + 1e-11)
    assert row["matched_loss_db"] == pytest.approx(1.367871319, rel=0, abs=0.6e-9)
    if loss is not None:
        assert row["total_loss_db"] == pytest.approx(float(loss), rel=0, abs=1.1 * half_digit(loss))


@pytest.mark.parametrize("answer", TERMINATED, ids=["inductive", "capacitive", "high", "short"])
def test_benchmark_line_deembedded_from_the_printed_impedance(tmp_path, answer):
    antenna, resistance, reactance, *_ = answer
    shack = mp.mpc(resistance, reactance)
    sweep = read_sweep(tmp_path, [10e6], [(shack - 50) / (shack + 50)])
    row = feedpoint.deembed(sweep, read_run(tmp_path, (BENCHMARK_LINE,))).table().iloc[0]
    # |dZ_antenna / dZ_shack| is below 20 for each of the four; 20 * 1e-12 ohm of printing, as much again of rounding.
    assert row["feedpoint_resistance_ohm"] == pytest.approx(complex(antenna).real, rel=0, abs=4e-11)
    assert row["feedpoint_reactance_ohm"] == pytest.approx(complex(antenna).imag, rel=0, abs=4e-11)


def test_open_end_of_the_benchmark_line(tmp_path):
    row = feedpoint.embed(read_sweep(tmp_path, [10e6], [1]), read_run(tmp_path, (BENCHMARK_LINE,))).table().iloc[0]
    assert row["shack_resistance_ohm"] == pytest.approx(320.11384381041, rel=0, abs=3e-11)
    assert row["shack_reactance_ohm"] == pytest.approx(-6.9926632568677, rel=0, abs=1e-11)


def ladder_example():
    """
    100 ft of 450-ohm-class line at 1.83 MHz with Zc = 402.75 (1 - j alpha / beta), 0.095 dB/100 ft, velocity 0.915.

    Such a Zc is that of a line without conductance, Z' = gamma Zc = R0 (2 alpha + j (beta - alpha^2 / beta)),
    Y' = gamma / Zc = j beta / R0, so that its high-frequency z0 is R0 sqrt(1 - (alpha/beta)^2) and its resistance,
    which has no reactance of its own, is a floor term.
    """
    feet = mp.mpf("30.48")
    alpha = mp.mpf("0.095") / feet * mp.ln(10) / 20
    beta = 2 * mp.pi * 1830000 / (mp.mpf("0.915") * 299792458)
    r0 = mp.mpf("402.75")
    z_n = r0 * mp.sqrt(1 - (alpha / beta) ** 2)
    velocity = 2 * mp.pi * 1830000 / mp.sqrt(beta**2 - alpha**2) / 299792458
    return Cable(z0_ohm=float(z_n), length_m=float(feet), velocity_factor=float(velocity),
                 floor_loss=float(r0 * alpha / z_n * NEPER_PER_100M))  # fmt: skip


def test_reactive_antenna_on_a_line_with_complex_characteristic_impedance(tmp_path):
    # Data of an example in the documentation of scikit-rf ("Transmission Line Losses"), which has them from S. Stearns'
    # talk of 2014; it stores no answers. These were computed with the tanh form in 40-digit arithmetic.
    # Taking Zc as real gives 12.7581 dB, taking the loss from the reflections 7.2206 dB.
    antenna = mp.mpc("4.5", -1673)
    run = RunAt((ladder_example(),), 1.83e6)
    assert close_to_printed(run.from_antenna(antenna).total_loss_db, "13.2754")
    sweep = read_sweep(tmp_path, [1.83e6], [(antenna - 50) / (antenna + 50)])
    row = feedpoint.embed(sweep, read_run(tmp_path, (ladder_example(),))).table().iloc[0]
    assert row["shack_resistance_ohm"] == pytest.approx(5.25688, rel=0, abs=0.6e-5)
    assert row["shack_reactance_ohm"] == pytest.approx(-22.99766, rel=0, abs=0.6e-5)
    assert row["total_loss_db"] == pytest.approx(13.2754, rel=0, abs=0.6e-4)
    assert row["matched_loss_db"] == pytest.approx(0.095, rel=1e-12)
