"""The simulator against arithmetic that is not its own: 40 digits, limits known on paper, a flow graph by hand."""

import numpy as np
import pytest

from tests.simulated.cables import CABLES, fitted_terms, true_loss_db_per_100m
from tests.simulated.simulator import (
    DB_PER_100M_PER_NEPER_PER_M,
    SPEED_OF_LIGHT,
    Analyzer,
    draw_analyzer,
    load_antenna,
    matrix,
    matrix_exponential,
    measured,
    run_chain,
    scattering,
    shack_reflection,
)

MHZ = np.array([1e6])
LOSSLESS = {"z0_ohm": 50.0, "velocity_factor": 0.66, "conductor_loss": 0.0, "dielectric_loss": 0.0}


def impedance_of(gamma: np.ndarray, reference_ohm: float = 50.0) -> np.ndarray:
    return reference_ohm * (1 + gamma) / (1 - gamma)


# A line of 0.5 ohm, 250 nH, 10 uS and 100 pF per metre, 30 m, 10 MHz; input impedance computed with 40-digit arithmetic
# from Z0 (ZL + Z0 tanh gl)/(Z0 + ZL tanh gl), printed to 14 digits.
BENCHMARK = [
    (73.13 + 42.5j, 69.069660919257 + 26.867265562565j),
    (10 - 200j, 96.842627749472 - 133.65867925191j),
    (500, 198.23550111786 - 2.6651616071746j),
    ("short", 7.8115287780424 - 0.06552361484838j),
    ("open", 320.11384381041 - 6.9926632568677j),
]


@pytest.mark.parametrize(("load", "input_impedance"), BENCHMARK)
def test_five_terminations_agree_with_40_digit_arithmetic(load, input_impedance):
    # In the law: the resistance is all floor (which has no reactance), the conductance all dielectric term at 10 MHz.
    line = {
        "z0_ohm": 50.0,
        "velocity_factor": 1 / (SPEED_OF_LIGHT * 5e-9),
        "length_m": 30.0,
        "conductor_loss": 0.0,
        "floor_loss": DB_PER_100M_PER_NEPER_PER_M * 0.5 / 100,
        "dielectric_loss": DB_PER_100M_PER_NEPER_PER_M * 10e-6 * 25 / 10,
    }
    gamma = shack_reflection(load, [line], 10 * MHZ)
    # Fourteen digits are given; six squarings cost 64 roundings of 1e-16, and near an open ten times more.
    assert impedance_of(gamma)[0] == pytest.approx(input_impedance, rel=1e-12)


def test_a_line_with_complex_z0_agrees_with_a_published_example():
    # Sadiku, Elements of Electromagnetics, example 11.3 (from memory, reproduced numerically): 2 m, 8 dB/m, 1 rad/m,
    # 60+j40 ohm, load 20+j50 ohm; input 60.25+j38.79 ohm, printed to 0.01 ohm.
    gamma, z0, load = 8 / (20 / np.log(10)) + 1j, 60 + 40j, 20 + 50j
    (a, b), (c, d) = matrix_exponential(matrix(0, gamma * z0 * 2, gamma / z0 * 2, 0))
    found = (a * load + b) / (c * load + d)
    assert found.real == pytest.approx(60.25, abs=0.005)
    assert found.imag == pytest.approx(38.79, abs=0.005)


def test_matched_loss_is_the_stated_decibels_on_a_distortionless_line():
    # R/L = G/C makes Z0 real and the attenuation exactly the law's sum. 1.5 dB/100 m of floor becomes 2 dB/100 m where
    # copper's resistivity has grown by a third, and meets 2 dB/100 m of dielectric: 4 dB there and back on 50 m.
    temperature_c = 20 + 1 / 3 / 0.00393
    line = LOSSLESS | {"length_m": 50.0, "floor_loss": 1.5, "dielectric_loss": 2.0}
    gamma = shack_reflection("open", [line], MHZ, temperature_c)
    assert abs(gamma[0]) == pytest.approx(10 ** (-4 / 20), rel=1e-12)
    # The round-trip delay of 100 m; phases compared as unit numbers.
    expected = np.exp(-2j * np.pi * 1e6 * 100 / (0.66 * SPEED_OF_LIGHT))
    phase = gamma[0] / abs(gamma[0])
    # The phase is that of w sqrt(LC) exactly, since the line is distortionless.
    assert phase == pytest.approx(expected, abs=1e-12)


def test_skin_effect_slows_the_line_as_much_as_it_attenuates_it():
    # Field theory of a good conductor: surface impedance proportional to 1 + j, so that to first order the phase
    # constant grows by the attenuation constant. Second order is (a/beta)^2 = 2e-6 of beta here.
    frequency_hz, length_m = np.array([100e6]), 0.25
    line = LOSSLESS | {"length_m": length_m, "conductor_loss": 2.0}
    chain = run_chain(frequency_hz, [line])[0]
    propagation = np.arccosh((chain[0, 0] + chain[1, 1]) / 2)
    attenuation = 2.0 * np.sqrt(100) * np.log(10) / 20 / 100 * length_m
    ideal_phase = 2 * np.pi * 100e6 * length_m / (0.66 * SPEED_OF_LIGHT)
    second_order = 3 * attenuation**2 / ideal_phase
    assert propagation.real == pytest.approx(attenuation, abs=second_order)
    assert propagation.imag - ideal_phase == pytest.approx(attenuation, abs=second_order)


def test_skin_effect_resistance_goes_with_the_root_of_resistivity():
    hot_c = 20 + (1.21 - 1) / 0.00393  # resistivity 1.21 times, its root 1.1 times
    cable = CABLES["RG-213/U"].section(1.0, dielectric_loss=0.0)
    high = np.array([50e9])  # the true loss differs from the law by less than 1e-4 here
    ratio = true_loss_db_per_100m(high, cable, hot_c) / true_loss_db_per_100m(high, cable)
    assert ratio[0] == pytest.approx(1.1, rel=1e-4)


def test_a_delay_tempco_lengthens_the_delay():
    line = LOSSLESS | {"length_m": 100.0, "delay_tempco_ppm_per_k": -200.0}
    warm = shack_reflection("open", [line], MHZ, 45.0)
    shorter = shack_reflection("open", [LOSSLESS | {"length_m": 99.5}], MHZ)  # -200e-6 * 25 K = -0.5 %
    assert warm == pytest.approx(shorter, abs=1e-12)


def test_lossless_quarter_and_half_waves():
    wavelength = 0.66 * SPEED_OF_LIGHT / 1e6
    load = 30 - 70j
    quarter = shack_reflection(load, [LOSSLESS | {"length_m": wavelength / 4}], MHZ)
    assert impedance_of(quarter)[0] == pytest.approx(2500 / load, rel=1e-12)
    half = shack_reflection(load, [LOSSLESS | {"length_m": wavelength / 2}], MHZ)
    assert impedance_of(half)[0] == pytest.approx(load, rel=1e-12)
    none = shack_reflection(load, [LOSSLESS | {"length_m": 0.0}], MHZ)
    assert impedance_of(none)[0] == pytest.approx(load, rel=1e-14)


def test_sections_work_in_their_order_and_direction():
    # By hand at w = 1e6 rad/s: 100 ohm through 4:1 (antenna side four times the shack side) is 25 ohm; in parallel
    # with 1 uF (-j1 ohm) Z = 25(-j)/(25-j); then 2 uH (+j2 ohm) in series towards the shack.
    frequency_hz = np.array([1e6 / (2 * np.pi)])
    run = [{"series_inductance_h": 2e-6}, {"shunt_capacitance_f": 1e-6, "name": "x"}, {"impedance_ratio": 4.0}]
    expected = 25 * -1j / (25 - 1j) + 2j
    assert impedance_of(shack_reflection(100.0, run, frequency_hz))[0] == pytest.approx(expected, rel=1e-12)
    # Elements of one section: 5 ohm, 1 uH, 1 uF in series resonate; so do 1 uH and 1 uF across.
    series = {"series_resistance_ohm": 5.0, "series_inductance_h": 1e-6, "series_capacitance_f": 1e-6}
    shunt = {"shunt_resistance_ohm": 50.0, "shunt_inductance_h": 1e-6, "shunt_capacitance_f": 1e-6}
    assert impedance_of(shack_reflection(50.0, [series, shunt], frequency_hz))[0] == pytest.approx(30.0, rel=1e-12)
    # A contact of 2 ohm bridged by 0.5 uF (-j2 ohm): 2 parallel -j2 = 1 - j; with 1 uH in series 1.
    contact = {"contact_resistance_ohm": 2.0, "contact_capacitance_f": 0.5e-6, "contact_inductance_h": 1e-6}
    assert impedance_of(shack_reflection("short", [contact], frequency_hz))[0] == pytest.approx(1.0, rel=1e-12)


@pytest.mark.parametrize(
    "section",
    [
        {"series_resistance_ohm": 1.0, "shunt_capacitance_f": 1e-12},
        {"impedance_ratio": 4.0, "lenght_m": 1.0},
        {"z0_ohm": 50.0, "length_m": 1.0},
        {"name": "nothing"},
    ],
)
def test_a_section_of_no_kind_is_refused(section):
    with pytest.raises(ValueError, match="keys"):
        run_chain(MHZ, [section])


def test_scattering_of_a_lossless_run_keeps_power_and_terminates_right():
    run = [{"series_inductance_h": 1e-6}, LOSSLESS | {"length_m": 20.0, "z0_ohm": 75.0}, {"shunt_capacitance_f": 1e-9}]
    s = scattering(run_chain(MHZ, run))[0]
    assert s.conj().T @ s == pytest.approx(np.eye(2), abs=1e-12)
    load = (30 - 50) / (30 + 50)
    through = s[0, 0] + s[0, 1] * s[1, 0] * load / (1 - s[1, 1] * load)
    assert through == pytest.approx(shack_reflection(30.0, run, MHZ)[0], abs=1e-12)


def test_arrays_of_trials_give_the_rows_of_single_runs():
    frequency_hz, lengths = np.linspace(3e6, 30e6, 7), np.array([[10.0], [31.5]])
    cable = CABLES["RG-58C/U"].section(1.0)
    rows = shack_reflection(load_antenna("dipole_20m"), [cable | {"length_m": lengths}], frequency_hz)
    for row, length in zip(rows, lengths[:, 0], strict=True):
        single = shack_reflection(load_antenna("dipole_20m"), [cable | {"length_m": length}], frequency_hz)
        # The two may be halved a different number of times before squaring.
        assert row == pytest.approx(single, abs=1e-12)


def test_the_analyzer_follows_its_flow_graph():
    analyzer, gamma = Analyzer(0.02 + 0.01j, 0.05j, -0.03), np.array([0.6 - 0.5j])
    wave = 0j
    for _ in range(60):  # waves going round between source match and load: 0.04 of each passes, 60 rounds are enough
        wave = gamma * (1 + analyzer.source_match * wave)
    expected = analyzer.directivity + (1 + analyzer.tracking) * wave
    assert measured(gamma, MHZ, analyzer) == pytest.approx(expected, abs=1e-14)
    # Moving the shown plane by a quarter of a wavelength turns the reflection by half a turn.
    extended = measured(gamma, MHZ, Analyzer(extension_s=0.25e-6))
    assert extended == pytest.approx(-gamma, abs=1e-12)


def test_drawn_errors_stay_within_their_limits_in_95_percent():
    rng = np.random.RandomState(11)
    draws = [draw_analyzer(rng, 40.0, 30.0, 0.2) for _ in range(2000)]
    for name, limit in (("directivity", 0.01), ("source_match", 10**-1.5), ("tracking", 10**0.01 - 1)):
        inside = sum(abs(getattr(draw, name)) <= limit for draw in draws)
        # Binomial, n = 2000, p = 0.95: mean 1900, standard deviation 9.75; four of them.
        assert abs(inside - 1900) < 39


def test_noise_has_the_stated_standard_deviation():
    shown = measured(np.zeros(20000, complex), np.full(20000, 1e6), Analyzer(noise=0.01), np.random.RandomState(3))
    # Relative standard error of a standard deviation, 1/sqrt(2 n) = 0.5 %; four of them.
    assert np.std(shown.real) == pytest.approx(0.01, rel=0.02)
    assert np.std(shown.imag) == pytest.approx(0.01, rel=0.02)


@pytest.mark.parametrize("name", CABLES)
def test_kept_terms_are_the_fitted_ones(name):
    cable = CABLES[name]
    # Kept to six figures; the dielectric term is worth a tenth of the loss and is known ten times worse.
    assert (cable.conductor_loss, cable.dielectric_loss) == pytest.approx(fitted_terms(cable), rel=2e-5)
    frequency_hz, printed = np.array(cable.points).T * np.array([[1e6], [1.0]])
    # Worst misfit of these printed tables by a plain two-term law: 3.5 %, rounding of their figures.
    assert true_loss_db_per_100m(frequency_hz, cable.section(1.0)) == pytest.approx(printed, rel=0.045)
