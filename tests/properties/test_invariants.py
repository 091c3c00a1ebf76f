"""What holds for every run, whatever its figures: found by trying to break it."""

import numpy as np
import pytest
from hypothesis import assume, given, settings
from hypothesis import strategies as st

from feedpoint import (
    CableSection,
    LossLaw,
    LumpedSection,
    Run,
    Sweep,
    TransformerSection,
    deembed,
    embed,
)
from feedpoint.assumed import Assumed
from feedpoint.run.sections import Surroundings

FREQUENCY_HZ = np.array([0.3e6, 1.9e6, 7.05e6, 14.2e6, 50.1e6, 145e6])

positive = st.floats(min_value=0.05, max_value=1.0)
terms = st.floats(min_value=0.0, max_value=3.0)


@st.composite
def cables(draw, lossless=False, longest_m=60.0):
    law = LossLaw(0.0) if lossless else LossLaw(draw(terms), draw(terms) / 50.0, draw(terms) / 3.0)
    return CableSection(
        "cable",
        Assumed(draw(st.floats(min_value=10.0, max_value=600.0))),
        Assumed(draw(st.floats(min_value=0.4, max_value=1.0))),
        Assumed(draw(st.floats(min_value=0.0, max_value=longest_m))),
        Assumed(law),
    )


@st.composite
def lumped(draw):
    value = draw(st.floats(min_value=0.1, max_value=500.0))
    return LumpedSection(
        "element",
        draw(st.sampled_from(["series", "shunt"])),
        resistance_ohm=draw(st.none() | st.just(Assumed(value))),
        inductance_h=Assumed(value * 1e-9),
        capacitance_f=draw(st.none() | st.just(Assumed(value * 1e-12))),
    )


transformers = st.floats(min_value=0.1, max_value=10.0).map(lambda ratio: TransformerSection("t", Assumed(ratio)))
sections = cables() | lumped() | transformers
runs = st.builds(
    lambda chain, temperature: Run(tuple(chain), temperature_c=Assumed(temperature)),
    st.lists(sections, min_size=0, max_size=4),
    st.floats(min_value=-40.0, max_value=80.0),
)
impedances = st.builds(
    complex, st.floats(min_value=0.5, max_value=2000.0), st.floats(min_value=-2000.0, max_value=2000.0)
)


def antenna(impedance_ohm, reference_ohm=50.0):
    return Sweep.from_impedance(FREQUENCY_HZ, np.full(FREQUENCY_HZ.size, impedance_ohm), reference_ohm=reference_ohm)


def shack_sweep(result):
    return Sweep(result.frequency_hz, result.saved_shack_gamma(), result.sweep.reference_ohm)


def growth(run):
    """By how much the run amplifies rounding of the shack-end reflection, a bound over all frequencies."""
    product = np.eye(2)[None]
    for two_port in run.two_ports(FREQUENCY_HZ, 50.0):
        chain = two_port.chain
        matrix = np.empty((FREQUENCY_HZ.size, 2, 2), dtype=complex)
        matrix[:, 0, 0], matrix[:, 0, 1] = chain.a, chain.b / 50.0
        matrix[:, 1, 0], matrix[:, 1, 1] = chain.c * 50.0, chain.d
        product = product @ matrix
    return float(np.linalg.norm(product, axis=(-2, -1)).max()) ** 2


@settings(deadline=None)
@given(runs, impedances, st.sampled_from([50.0, 75.0]))
def test_embedding_then_deembedding_is_identity(run, impedance_ohm, reference_ohm):
    # Rounding (1e-16) grows by at most the square of the chain's norm each way; beyond 1e7 nothing can be asserted.
    assume(growth(run) < 1e7)
    there = embed(antenna(impedance_ohm, reference_ohm), run)
    back = deembed(shack_sweep(there), run)
    assert back.gamma == pytest.approx(there.sweep.gamma, abs=1e-14 * growth(run) + 1e-12)


@settings(deadline=None)
@given(cables(), st.floats(min_value=0.0, max_value=1.0), impedances)
def test_cutting_a_cable_in_two_changes_nothing(cable, share, impedance_ohm):
    from dataclasses import replace

    length = cable.length_m.value
    parts = [replace(cable, length_m=Assumed(length * part)) for part in (share, 1.0 - share)]
    whole, cut = (embed(antenna(impedance_ohm), Run(tuple(chain))) for chain in ([cable], parts))
    assert growth(Run((cable,))) >= 0.99
    # Rounding: a phase of up to 300 rad is known to 300 eps = 7e-14 rad.
    assert cut.planes.gamma[0] == pytest.approx(whole.planes.gamma[0], abs=1e-11)
    assert cut.columns["matched_loss_db"] == pytest.approx(whole.columns["matched_loss_db"], rel=1e-12, abs=1e-12)
    total = whole.columns["total_loss_db"]
    assert cut.columns["total_loss_db"] == pytest.approx(total, rel=1e-9, abs=1e-9, nan_ok=True)


@settings(deadline=None)
@given(cables(longest_m=0.0), impedances)
def test_zero_length_changes_nothing(cable, impedance_ohm):
    result = embed(antenna(impedance_ohm), Run((cable,)))
    assert np.array_equal(result.impedance_ohm, result.planes.impedance_ohm[0])
    assert result.columns["matched_loss_db"] == pytest.approx(0.0, abs=0.0)


@settings(deadline=None)
@given(cables(lossless=True), st.sampled_from(list(FREQUENCY_HZ)), st.integers(1, 5), impedances)
def test_a_lossless_half_wave_changes_nothing(cable, frequency_hz, halves, impedance_ohm):
    from dataclasses import replace

    half_wave = 299_792_458.0 * cable.velocity_factor.value / frequency_hz / 2.0
    run = Run((replace(cable, length_m=Assumed(halves * half_wave)),))
    sweep = Sweep.from_impedance([frequency_hz], [impedance_ohm])
    assert deembed(sweep, run).gamma == pytest.approx(sweep.gamma, abs=1e-11)


@settings(deadline=None)
@given(sections)
def test_every_section_is_reciprocal_and_passive(section):
    two_port = section.two_port(FREQUENCY_HZ, Surroundings(20.0, 50.0))
    chain = two_port.chain
    size = np.abs(chain.a * chain.d) + np.abs(chain.b * chain.c)
    determinant = chain.a * chain.d - chain.b * chain.c
    assert np.all(np.abs(determinant - 1.0) <= 1e-12 * (1.0 + size))
    assert np.all(two_port.matched_loss_db >= -1e-12)
    for gamma in (0.0, 0.7, -0.7j, 1.0, -1.0):
        voltage, current = chain.towards_shack(
            np.full(FREQUENCY_HZ.size, 1.0 + gamma + 0j), np.full(FREQUENCY_HZ.size, (1.0 - gamma) / 50.0 + 0j)
        )
        delivered = (1.0 - abs(gamma) ** 2) / 50.0
        entering = (voltage * current.conj()).real
        assert np.all(entering >= delivered - 1e-12 * np.abs(voltage * current) - 1e-15)


@settings(deadline=None)
@given(cables(), impedances)
def test_a_uniform_line_hides_part_of_the_reflection(cable, impedance_ohm):
    """Relative to Zc the antenna reflects at least as much as the shack end shows."""
    from feedpoint.line.propagation import propagation_and_impedance

    values = cable.nominal()
    _, z0 = propagation_and_impedance(FREQUENCY_HZ, values.z0_ohm, values.velocity_factor, values.loss, 20.0)
    result = embed(antenna(impedance_ohm), Run((cable,)))
    shack, feedpoint = result.planes.impedance_ohm
    at_shack, at_antenna = (np.abs((z - z0) / (z + z0)) for z in (shack, feedpoint))
    assert np.all(at_shack <= at_antenna * (1 + 1e-9) + 1e-12)


@settings(deadline=None)
@given(runs, st.sampled_from([1.0, -1.0]))
def test_no_power_reaches_an_open_or_a_short(run, gamma):
    assume(growth(run) < 1e7)
    sweep = Sweep(FREQUENCY_HZ, np.full(FREQUENCY_HZ.size, gamma))
    assert np.all(np.isnan(embed(sweep, run).columns["total_loss_db"]))


def test_drawn_parameters_give_each_trial_its_own_row():
    rng = np.random.default_rng(7)
    nominal = CableSection("c", Assumed(50.0), Assumed(0.66), Assumed(30.0), Assumed(LossLaw(1.4, 0.02)))
    drawn = {
        "z0_ohm": rng.uniform(48, 52, (5, 1)),
        "velocity_factor": rng.uniform(0.65, 0.67, (5, 1)),
        "length_m": rng.uniform(29, 31, (5, 1)),
        "delay_tempco_ppm_per_k": rng.uniform(-100, 100, (5, 1)),
    }
    factor = rng.uniform(0.9, 1.1, (5, 1))
    surroundings = Surroundings(rng.uniform(-10, 35, (5, 1)), 50.0)
    together = nominal.two_port(
        FREQUENCY_HZ, surroundings, nominal.nominal()._replace(loss=nominal.loss.value.scaled(factor), **drawn)
    )
    assert together.chain.a.shape == (5, FREQUENCY_HZ.size)
    for trial in range(5):
        one = {name: float(values[trial, 0]) for name, values in drawn.items()}
        law = nominal.loss.value.scaled(float(factor[trial, 0]))
        alone = nominal.two_port(
            FREQUENCY_HZ,
            Surroundings(float(surroundings.temperature_c[trial, 0]), 50.0),
            nominal.nominal()._replace(loss=law, **one),
        )
        for element in ("a", "b", "c", "d"):
            assert getattr(together.chain, element)[trial] == pytest.approx(getattr(alone.chain, element), rel=1e-13)
        assert together.matched_loss_db[trial] == pytest.approx(alone.matched_loss_db, rel=1e-13)
