"""The oracle itself: against figures from another solution, the closed form at other digits, and laws of physics."""

import pytest
from mpmath import MPContext

from tests.oracle.described import FLAWS, Cable, Series, Shunt, Transformer, TwoPort
from tests.oracle.run_at import RunAt, power
from tests.oracle.telegrapher import apply, line_constants, mp

# R 0.5 ohm/m, L 250 nH/m, G 10 uS/m, C 100 pF/m, 10 MHz, 30 m; worked out with the tanh form in 40-digit arithmetic,
# printed to the digits below (computed, not published). R has no reactance of its own: it is all floor term.
NEPER_PER_100M = 2000 / mp.ln(10)
BENCHMARK = Cable(
    z0_ohm=50.0, length_m=30.0, delay_ns=150.0,
    floor_loss=mp.mpf("0.5") / 100 * NEPER_PER_100M, dielectric_loss=mp.mpf("1e-5") * 25 / 10 * NEPER_PER_100M,
)  # fmt: skip
BENCHMARK_HZ = 10e6
BENCHMARK_ANSWERS = [  # antenna, shack impedance, shack reflection in 50 ohm, total loss in dB
    (73.13 + 42.5j, "69.069660919257", "26.867265562565", ".200844407658", ".180324067101", "1.679519607"),
    (10 - 200j, "96.842627749472", "-133.65867925191", ".627561979088", "-.338999476795", "11.67308674"),
    (500, "198.23550111786", "-2.6651616071746", ".597203164744", "-.00432459763402", "4.259012266"),
    (0, "7.8115287780424", "-0.06552361484838", "-.729756566799", "-.00196050693452", None),
    (None, "320.11384381041", "-6.9926632568677", None, None, None),
]

LOSSY = Cable(z0_ohm=75.0, length_m=41.3, velocity_factor=0.78, conductor_loss=2.1, dielectric_loss=0.013,
              floor_loss=1.7, delay_tempco_ppm_per_k=-85.0)  # fmt: skip


def close_to_printed(found, printed):
    """Whether a number rounds to a printed one: within half a unit of its last digit (a tenth more for ties)."""
    places = len(printed.partition(".")[2])
    return abs(found - mp.mpf(printed)) <= mp.mpf("0.55") * mp.mpf(10) ** -places


@pytest.mark.parametrize("answer", BENCHMARK_ANSWERS, ids=["inductive", "capacitive", "high", "short", "open"])
def test_benchmark_line_is_reproduced_to_the_printed_digits(answer):
    antenna, resistance, reactance, gamma_re, gamma_im, loss = answer
    readings = RunAt((BENCHMARK,), BENCHMARK_HZ).from_antenna(antenna)
    assert close_to_printed(mp.re(readings.shack_ohm), resistance)
    assert close_to_printed(mp.im(readings.shack_ohm), reactance)
    if gamma_re is not None:
        assert close_to_printed(mp.re(readings.shack_gamma), gamma_re)
        assert close_to_printed(mp.im(readings.shack_gamma), gamma_im)
    assert (readings.total_loss_db is None) if loss is None else close_to_printed(readings.total_loss_db, loss)


def test_benchmark_attenuation_and_phase():
    run = RunAt((BENCHMARK,), BENCHMARK_HZ)
    assert close_to_printed(run.matched_loss_db, "1.367871319")
    # gamma = 0.00524940017977 + j 0.314195162619 per metre.
    assert close_to_printed(run.electrical_length * 2 * mp.pi / 30, "0.314195162619")


@pytest.mark.parametrize("frequency_hz", [0.1e6, 7.05e6, 500e6])
def test_stepping_gives_the_closed_form_to_fifty_digits(frequency_hz):
    closed = MPContext()
    closed.dps = 80
    series, shunt = (closed.mpc(mp.re(x), mp.im(x)) for x in line_constants(LOSSY, frequency_hz, 35.0))
    gamma_l = closed.sqrt(series * shunt) * closed.mpf(LOSSY.length_m)
    z_c = closed.sqrt(series / shunt)
    load = closed.mpc(31, -77)
    expected = z_c * (load + z_c * closed.tanh(gamma_l)) / (z_c + load * closed.tanh(gamma_l))
    run = RunAt((LOSSY,), frequency_hz, 35.0)
    digits = mp.mpf(10) ** -50
    assert abs(run.from_antenna(mp.mpc(31, -77)).shack_ohm - expected) < abs(expected) * digits
    assert abs(run.matched_loss_db - closed.re(gamma_l) * 20 / closed.ln(10)) < run.matched_loss_db * digits
    assert abs(run.electrical_length - closed.im(gamma_l) / (2 * closed.pi)) < run.electrical_length * digits


def test_de_embedding_returns_the_antenna():
    run = RunAt((Shunt(capacitance_f=33e-12), LOSSY, Transformer(4.0)), 14.2e6, -10.0, 75.0)
    there = run.from_antenna(mp.mpc(20, -150))
    back = run.from_shack(there.shack_gamma)
    assert abs(back.feedpoint_ohm - mp.mpc(20, -150)) < mp.mpf(10) ** -48
    assert abs(back.total_loss_db - there.total_loss_db) < mp.mpf(10) ** -48


def test_two_port_of_a_series_element_acts_as_the_element():
    # S11 = z / (z + 2), S21 = 2 / (z + 2) for a series impedance of z times the reference; here z = 1 + 2j.
    reference = 75.0
    s11, s21 = mp.mpc(1, 2) / mp.mpc(3, 2), 2 / mp.mpc(3, 2)
    two_port = TwoPort(reference, {10e6: ((s11, s21), (s21, s11))})
    found = RunAt((two_port,), 10e6).from_antenna(mp.mpc(40, 5)).shack_ohm
    assert abs(found - mp.mpc(40 + 75, 5 + 150)) < mp.mpf(10) ** -50
    # In 50 ohm: power into 75 + 150j + 50 over power into 50.
    assert abs(RunAt((two_port,), 10e6).matched_loss_db - 10 * mp.log10(mp.mpf(125) / 50)) < mp.mpf(10) ** -50


def test_transformer_raises_towards_the_antenna_and_lumped_parts_have_their_signs():
    assert RunAt((Transformer(9.0),), 10e6).from_antenna(450).shack_ohm == 50
    omega = 2 * mp.pi * 10**7
    coil = RunAt((Series(inductance_h=1e-6),), 10e6).from_antenna(0).shack_ohm
    assert abs(coil - mp.mpc(0, omega * mp.mpf(1e-6))) < mp.mpf(10) ** -50
    capacitor = RunAt((Shunt(capacitance_f=1e-10),), 10e6).from_antenna(None).shack_ohm
    assert mp.im(capacitor) < 0
    assert abs(abs(capacitor) * omega * mp.mpf(1e-10) - 1) < mp.mpf(10) ** -50


def test_power_lost_in_a_line_is_what_its_resistance_and_conductance_take():
    # Integral of R |I|^2 + G |V|^2 over the line by Gauss-Legendre panels: a check that no equation of a wave enters.
    cable = Cable(z0_ohm=50.0, length_m=6.0, velocity_factor=0.66, conductor_loss=1.4, dielectric_loss=0.02)
    series, shunt = line_constants(cable, 20e6, 20.0)
    antenna = mp.mpc(25, -60), mp.mpc(1)

    def taken(s):
        piece = Cable(z0_ohm=50.0, length_m=s, velocity_factor=0.66, conductor_loss=1.4, dielectric_loss=0.02)
        voltage, current = apply(RunAt((piece,), 20e6).chain, *antenna)
        return mp.re(series) * abs(current) ** 2 + mp.re(shunt) * abs(voltage) ** 2

    lost = mp.quad(taken, [0, 6], maxdegree=4)
    end = apply(RunAt((cable,), 20e6).chain, *antenna)
    assert abs(lost / (power(*end) - power(*antenna)) - 1) < mp.mpf(10) ** -12  # what this many nodes resolve


def test_short_line_can_lose_less_than_matched():
    # R 0.3 ohm/m, L 250 nH/m, G 1 uS/m, C 100 pF/m, 10 MHz, 1 m; computed with another 40-digit program.
    cable = Cable(z0_ohm=50.0, length_m=1.0, delay_ns=5.0, floor_loss=mp.mpf("0.003") * NEPER_PER_100M,
                  dielectric_loss=mp.mpf("2.5e-6") * NEPER_PER_100M)  # fmt: skip
    run = RunAt((cable,), 10e6)
    assert close_to_printed(run.matched_loss_db, "0.026273638")
    assert close_to_printed(run.from_antenna(200).total_loss_db, "0.010501012")
    assert close_to_printed(run.from_antenna(12.5).total_loss_db, "0.10000421")


def test_every_flaw_has_its_own_name_in_the_code():
    # A misspelt flaw would change nothing and its test would blame the package.
    cable = Cable(z0_ohm=50.0, length_m=18.0, velocity_factor=0.66, conductor_loss=1.4, dielectric_loss=0.02,
                  floor_loss=0.5, delay_tempco_ppm_per_k=-150.0)  # fmt: skip
    s = ((0.2 + 0.1j, 0.7j), (0.72j, -0.15 + 0.2j))
    two_port = TwoPort(75.0, {7e6: s})
    sections = (Shunt(capacitance_f=4e-11), cable, two_port, Series(capacitance_f=2e-10), Transformer(4.0))
    right = RunAt(sections, 7e6, 38.0).from_antenna(mp.mpc(30, -60))
    for flaw in FLAWS:
        wrong = RunAt(sections, 7e6, 38.0, flaw=flaw).from_antenna(mp.mpc(30, -60))
        assert wrong != right, flaw
