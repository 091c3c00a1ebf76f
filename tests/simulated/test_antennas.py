"""The antenna tables: shape, sense, and the changes that the variants stand for."""

import numpy as np
import pytest

from tests.simulated.antennas import make_antennas
from tests.simulated.simulator import TABLES, antenna_impedance, load_antenna, shack_reflection

NAMES = ("dipole_20m", "vertical_40m", "offcentre_dipole", "beam_2m")
VARIANTS = ("nominal", "longer", "iced", "wet_ground")
FIRST_RESONANCE_HZ = {
    "dipole_20m": (13e6, 15e6),
    "vertical_40m": (6.5e6, 7.6e6),
    "offcentre_dipole": (3.3e6, 3.8e6),
}


def resonance_hz(name: str, variant: str) -> float:
    """Where the reactance of the table goes through zero, by straight lines between its points."""
    frequency_hz = load_antenna(name, variant).frequency_hz
    low, high = FIRST_RESONANCE_HZ[name]
    frequency_hz = frequency_hz[(frequency_hz >= low * 0.95) & (frequency_hz <= high)]
    reactance = antenna_impedance(load_antenna(name, variant), frequency_hz).imag
    (rising,) = np.nonzero((reactance[:-1] < 0) & (reactance[1:] >= 0))
    k = rising[0]
    share = -reactance[k] / (reactance[k + 1] - reactance[k])
    return frequency_hz[k] + share * (frequency_hz[k + 1] - frequency_hz[k])


@pytest.mark.parametrize("name", NAMES)
@pytest.mark.parametrize("variant", VARIANTS)
def test_every_table_is_whole_passive_and_small(name, variant):
    path = TABLES / f"{name}_{variant}.csv"
    assert path.read_text().splitlines()[0] == "frequency_hz,resistance_ohm,reactance_ohm"
    assert path.stat().st_size < 60_000
    assert path.with_suffix(".nec").is_file()
    frequency_hz, resistance, _ = np.loadtxt(path, delimiter=",", skiprows=1).T
    assert np.ptp(np.diff(frequency_hz)) == 0
    assert resistance.min() > 0


@pytest.mark.parametrize("name", NAMES[:3])
def test_one_percent_longer_resonates_one_percent_lower(name):
    # The law of similitude, but for the wire's radius and the height, which were not scaled: 0.1 % of the frequency.
    ratio = resonance_hz(name, "longer") / resonance_hz(name, "nominal")
    assert ratio == pytest.approx(1 / 1.01, abs=0.001)


@pytest.mark.parametrize("name", NAMES[:3])
def test_ice_lowers_the_resonance(name):
    # 1 mm of ice on 1 mm of radius: the potential of a charge falls by 2 (1 - 1/3.17) ln 2 = 2 * 0.47, where the usual
    # estimate for a thin wire of half length h is 2 (ln(2h/a) - 1), about 16 here. The frequency takes half of that.
    ratio = resonance_hz(name, "iced") / resonance_hz(name, "nominal")
    expected = 1 - 0.47 * 2 / 16 / 2
    # The estimate is good to a third of the shift of 3 %.
    assert ratio == pytest.approx(expected, abs=0.01)


def test_ice_moves_the_beam_down_as_a_whole():
    # The beam has no resonance of its own in the band; its reflection is compared shifted. By the same estimate for
    # 4 mm of radius: 0.15 * 2/(2 (ln(240) - 1))/2 = 1.7 %.
    frequency_hz = np.linspace(142e6, 146e6, 81)
    iced = shack_reflection(load_antenna("beam_2m", "iced"), [], frequency_hz)
    nominal = load_antenna("beam_2m")
    shifts = np.linspace(0, 0.03, 61)
    misfits = [np.abs(shack_reflection(nominal, [], frequency_hz * (1 + s)) - iced).max() for s in shifts]
    assert shifts[np.argmin(misfits)] == pytest.approx(0.017, abs=0.006)
    # The shift explains nearly all of the change; the boom, which was not scaled, leaves a little.
    assert min(misfits) < misfits[0] / 5


def test_the_dipole_resonates_a_little_short_of_half_a_wave():
    # Induced-EMF theory of a wire of radius 5e-5 wavelengths in free space: 0.486 wavelengths, 67 ohm (from memory,
    # reproduced numerically); the ground at half a wave's distance moves that by a per cent or two.
    frequency_hz = resonance_hz("dipole_20m", "nominal")
    assert 2 * 5.14 * frequency_hz / 299_792_458 == pytest.approx(0.486, abs=0.01)
    resistance = antenna_impedance(load_antenna("dipole_20m"), np.array([frequency_hz])).real[0]
    assert resistance == pytest.approx(67, rel=0.15)


def test_ground_matters_to_the_wire_antennas_and_not_to_the_beam():
    for name, frequency_hz, least, most in (("dipole_20m", 14.1e6, 0.005, 0.1), ("beam_2m", 145e6, 0.0, 0.001)):
        at = np.array([frequency_hz])
        change = abs(shack_reflection(load_antenna(name, "wet_ground"), [], at) -
                     shack_reflection(load_antenna(name), [], at))[0]  # fmt: skip
        assert least <= change <= most


def test_a_frequency_outside_the_table_is_refused():
    with pytest.raises(ValueError, match="covers"):
        shack_reflection(load_antenna("beam_2m"), [], np.array([120e6]))


def test_every_deck_is_the_one_that_the_script_writes():
    # The tables were computed from the decks; a later change of the script must not leave them behind unnoticed.
    for antenna in make_antennas.ANTENNAS:
        for variant in make_antennas.VARIANTS:
            deck = make_antennas.deck_text(antenna, variant, antenna.start_mhz, antenna.step_mhz, antenna.points)
            assert (TABLES / f"{antenna.name}_{variant.name}.nec").read_text() == deck
            frequency_hz = load_antenna(antenna.name, variant.name).frequency_hz
            assert len(frequency_hz) == antenna.points
            assert frequency_hz[0] == pytest.approx(antenna.start_mhz * 1e6, abs=0.5)
            assert frequency_hz[1] - frequency_hz[0] == pytest.approx(antenna.step_mhz * 1e6, abs=0.5)
