"""Resonances, minimum SWR, SWR <= 2 band and worst SWR of a band, on curves whose answers are known in closed form."""

import numpy as np
import pytest

from feedpoint import Sweep, deembed, embed, parse_run_sheet
from feedpoint.landmarks import landmarks_of, passages
from feedpoint.line.reflection import reflection_from_impedance
from feedpoint.run.record import Band

F0 = 14.1e6


def series_circuit(frequency_hz, resistance=40.0, quality=12.0):
    """R + jX of a series resonant circuit at F0."""
    return resistance * (1 + 1j * quality * (frequency_hz / F0 - F0 / frequency_hz))


def read(frequency_hz, impedance, reference=50.0, bands=()):
    gamma = reflection_from_impedance(impedance, reference)
    return landmarks_of(frequency_hz, gamma, reference, gamma, bands)


@pytest.mark.parametrize("points", [21, 201, 2001])
def test_series_resonance(points):
    frequency = np.linspace(13e6, 15.3e6, points)
    marks = read(frequency, series_circuit(frequency))
    (resonance,) = marks.resonances
    # A cubic through four points errs by h^4/24 of the fourth derivative: 100 Hz with 21 points, nothing with 201.
    assert resonance.frequency_hz.value == pytest.approx(F0, abs=200.0 if points == 21 else 1.0)
    assert resonance.resistance_ohm.value == pytest.approx(40.0, abs=0.01)
    assert resonance.kind == "series"
    assert marks.minimum_swr.value == pytest.approx(50.0 / 40.0, abs=1e-3)


def test_parallel_resonance():
    frequency = np.linspace(13e6, 15e6, 301)
    (resonance,) = read(frequency, 2500.0 / series_circuit(frequency, 20.0) * 4).resonances
    assert resonance.kind == "parallel"
    assert resonance.frequency_hz.value == pytest.approx(F0, abs=1.0)
    assert resonance.resistance_ohm.value == pytest.approx(500.0, rel=1e-5)


def test_swr_2_edges():
    frequency = np.linspace(12e6, 16e6, 401)
    marks = read(frequency, series_circuit(frequency, 50.0))
    # SWR 2 on 50 ohm with R = 50: |X| = 50 sqrt(2)/2 (|Gamma| = X/sqrt(4 R^2 + X^2) = 1/3), so f/F0 - F0/f = X/(50 Q).
    x = np.sqrt(0.5) / 12.0
    high = F0 * (x / 2 + np.sqrt(1 + x * x / 4))
    assert marks.swr2_high_hz.value == pytest.approx(high, abs=2.0)
    assert marks.swr2_low_hz.value == pytest.approx(F0 * F0 / high, abs=2.0)


def test_a_dip_between_two_points_is_found_with_its_band():
    frequency = F0 + np.array([-250e3, -150e3, -50e3, 50e3, 150e3, 250e3])
    marks = read(frequency, series_circuit(frequency, 50.0, 110.0))
    # Gamma = jx/(2 + jx), x = 2 Q df/F0 = 0.780 and 2.340 at the inner and outer points: |Gamma| >= 0.36, SWR above 2.
    # Half way, a cubic gives 9/8 of the inner minus 1/8 of the outer Re Gamma = x^2/(4 + x^2): 0.0763, an SWR of 1.165.
    assert marks.minimum_swr.value == pytest.approx(1.165, abs=2e-3)
    assert marks.minimum_swr_hz.value == pytest.approx(F0, abs=3e3)
    assert frequency[2] < marks.swr2_low_hz.value < marks.minimum_swr_hz.value < marks.swr2_high_hz.value < frequency[3]


def test_edges_on_points_of_the_sweep_are_found():
    # Gamma = 1/3 at two points exactly, less between them: SWR 2 there, to the last digit.
    frequency = np.array([1.0, 2.0, 3.0, 4.0, 5.0]) * 1e6
    gamma = np.array([0.6, 1.0 / 3.0, 0.1, 1.0 / 3.0, 0.6])
    marks = landmarks_of(frequency, gamma, 50.0, gamma, ())
    assert marks.swr2_low_hz.value == pytest.approx(2e6, abs=1.0)
    assert marks.swr2_high_hz.value == pytest.approx(4e6, abs=1.0)


def test_an_infinite_reflection_hurts_nothing_else():
    frequency = np.linspace(13e6, 15e6, 41)
    gamma = reflection_from_impedance(series_circuit(frequency), 50.0)
    gamma[3] = complex(np.inf, 0.0)
    marks = landmarks_of(frequency, gamma, 50.0, gamma, ())
    assert marks.minimum_swr.value == pytest.approx(1.25, abs=1e-3)


def test_what_lies_outside_the_sweep_is_null():
    frequency = np.linspace(14.0e6, 14.2e6, 51)
    bands = (Band("inside", 14.05e6, 14.15e6), Band("outside", 14.1e6, 14.35e6), Band("whole", 14.0e6, 14.2e6))
    marks = read(frequency, series_circuit(frequency, 50.0), bands=bands)
    assert marks.swr2_low_hz.value is None
    assert marks.swr2_high_hz.value is None
    assert [reading.worst_swr.value is None for reading in marks.bands] == [False, True, False]


def test_worst_swr_of_a_band_is_at_its_edge_between_points():
    frequency = np.linspace(13e6, 15e6, 41)
    edge = 14.337e6
    (reading,) = read(frequency, series_circuit(frequency), bands=(Band("b", 14.05e6, edge),)).bands
    gamma = reflection_from_impedance(series_circuit(np.array([edge])), 50.0)
    assert reading.worst_swr.value == pytest.approx((1 + abs(gamma[0])) / (1 - abs(gamma[0])), rel=1e-3)


@pytest.mark.parametrize("points", [1, 2, 3])
def test_few_points_are_read_as_they_are(points):
    frequency = np.linspace(14.0e6, 14.3e6, points) if points > 1 else np.array([14.0e6])
    marks = read(frequency, series_circuit(frequency))
    assert marks.minimum_swr.value is not None
    assert len(marks.resonances) == (0 if points == 1 else 1)


def test_noise_around_a_resistive_load_is_no_row_of_resonances():
    rng = np.random.default_rng(3)
    frequency = np.linspace(1e6, 30e6, 501)
    noise = 1e-3 * (rng.standard_normal(501) + 1j * rng.standard_normal(501))
    gamma = 0.2 + noise
    assert landmarks_of(frequency, gamma, 50.0, gamma, ()).resonances == ()


def test_noise_does_not_multiply_a_resonance():
    rng = np.random.default_rng(4)
    frequency = np.linspace(13.9e6, 14.3e6, 801)
    noise = 1e-3 * (rng.standard_normal(801) + 1j * rng.standard_normal(801))
    gamma = reflection_from_impedance(series_circuit(frequency), 50.0) + noise
    (resonance,) = landmarks_of(frequency, gamma, 50.0, gamma, ()).resonances
    assert resonance.frequency_hz.value == pytest.approx(F0, abs=2e3)


def test_passages_from_one_side_of_a_strip_to_the_other():
    values = np.array([-1.0, -0.2, 0.0, 0.1, -0.1, 0.3, 1.0, 0.2, -0.1, 0.2, 1.0, -1.0])
    assert passages(values, 0.5) == [(0, 6, True), (10, 11, False)]
    assert passages(np.zeros(5), 1e-12) == []
    assert passages(np.array([0.0, 0.3, 0.7, 0.2, 0.0]), 0.1) == [(0, 0, True), (4, 4, False)]


def test_kind_is_that_of_the_passage_not_of_a_noisy_step():
    frequency = np.arange(1.0, 7.0) * 1e6
    gamma = 0.1 + 1j * np.array([-0.1, -0.05, 0.001, -0.001, 0.05, 0.1])
    (resonance,) = landmarks_of(frequency, gamma, 50.0, gamma, ()).resonances
    assert resonance.kind == "series"
    assert resonance.frequency_hz.value == pytest.approx(3.5e6, abs=0.05e6)


def test_kind_and_place_survive_the_noise_of_an_analyzer():
    # 1,001 points, noise 1e-3: a dozen sign changes around the resonance of a low-Q antenna.
    frequency = np.linspace(14.0e6, 14.35e6, 1001)
    impedance = 62.0 + 110e-6j * (frequency - 14.15e6)
    clean = reflection_from_impedance(impedance, 50.0)
    for seed in range(60):
        rng = np.random.default_rng(seed)
        gamma = clean + 1e-3 * (rng.standard_normal(1001) + 1j * rng.standard_normal(1001))
        (resonance,) = landmarks_of(frequency, gamma, 50.0, gamma, ()).resonances
        assert resonance.kind == "series"
        # Im Gamma rises by 2 R dX/df/(Z + R)^2 = 8.8e-4 per kHz: one point places the zero to 1.1 kHz (1 sigma); five
        # times that holds for every seed.
        assert resonance.frequency_hz.value == pytest.approx(14.15e6, abs=5.5e3)


@pytest.mark.parametrize(("db_at_30_mhz", "points"), [(1.4, 1001), (4.9, 401), (10.0, 1001)])
def test_noise_that_the_run_has_amplified_makes_no_resonance(db_at_30_mhz, points):
    """A resistive load behind a lossy run: at its terminals the noise is exp(2 alpha l) times the analyzer's."""
    run = parse_run_sheet(
        f"[[section]]\nz0_ohm=50\nvelocity_factor=0.66\nlength_m=100\nconductor_loss={db_at_30_mhz / 30**0.5}\n"
    )
    frequency = np.linspace(1e6, 30e6, points)
    clean = embed(Sweep.from_impedance(frequency, np.full(points, 75.0)), run).planes.gamma[0]
    found = []
    for seed in range(20):
        rng = np.random.default_rng(seed)
        noise = 1e-3 * (rng.standard_normal(points) + 1j * rng.standard_normal(points))
        found += deembed(Sweep(frequency, clean + noise), run).landmarks.resonances
    # 4.5 sigma are exceeded once in 150,000 points: by one of these 20,000 in seven series, and a passage takes two.
    assert found == []


def test_resonance_on_the_first_point_is_found():
    frequency = np.linspace(12e6, 16e6, 101)
    impedance = 60 + 480j * (frequency / 12e6 - 12e6 / frequency)
    (resonance,) = read(frequency, impedance).resonances
    assert (resonance.frequency_hz.value, resonance.kind) == (12e6, "series")


def dipole_through_30_m(frequency):
    """Reflection at the shack end of 30 m of a nearly matched dipole: two resonances close to its minimum SWR."""
    impedance = 48.0 * (1 + 12j * (frequency / 14.0e6 - 14.0e6 / frequency))
    turn = np.exp(-4j * np.pi * frequency * 30 / (0.66 * 299_792_458.0))
    return reflection_from_impedance(impedance, 50.0) * turn


def test_a_coarse_clean_sweep_keeps_close_resonances():
    dense = np.linspace(12e6, 16e6, 40_001)
    truth = dense[:-1][np.diff(np.sign(dipole_through_30_m(dense).imag)) != 0]
    assert truth.size == 4
    assert np.diff(truth).min() < 200e3
    frequency = np.linspace(12e6, 16e6, 51)
    gamma = dipole_through_30_m(frequency)
    resonances = landmarks_of(frequency, gamma, 50.0, gamma, ()).resonances
    found = [resonance.frequency_hz.value for resonance in resonances]
    # The step is 80 kHz; a cubic places each zero to a few per cent of it.
    assert found == pytest.approx(truth, abs=5e3)


def test_swr_reference_leaves_resonances_alone():
    frequency = np.linspace(13e6, 15e6, 201)
    impedance = series_circuit(frequency)
    gamma, against_75 = (reflection_from_impedance(impedance, reference) for reference in (50.0, 75.0))
    marks = landmarks_of(frequency, gamma, 50.0, against_75, ())
    assert marks.resonances[0].resistance_ohm.value == pytest.approx(40.0, abs=1e-4)
    assert marks.minimum_swr.value == pytest.approx(75.0 / 40.0, abs=1e-3)
