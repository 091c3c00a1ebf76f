"""
A run at one frequency, worked out a second time: sections of all kinds, losses from powers, and what both ends show.

Sections in order, first = at the shack end. Two-ports are taken at their waves. Each function takes the name of one
deliberate `flaw` (see `described.FLAWS`), so that a comparison can be shown to notice it.
"""

from dataclasses import dataclass
from functools import reduce

from tests.oracle.described import Cable, Series, Transformer, TwoPort
from tests.oracle.telegrapher import (
    apply,
    chain_of_cable,
    line_constants,
    mp,
    multiply,
    seconds_per_metre,
    solve,
    wave_over_cable,
)


@dataclass(frozen=True)
class Readings:
    """What one frequency shows: impedances in ohm (None where infinite), losses in dB (None where no power flows)."""

    shack_ohm: object
    shack_gamma: object
    shack_swr: object
    shack_return_loss_db: object
    feedpoint_ohm: object
    feedpoint_gamma: object
    feedpoint_swr: object
    feedpoint_return_loss_db: object
    matched_loss_db: object
    total_loss_db: object
    electrical_length_wavelengths: object


def chain_of_lumped(section, frequency_hz, flaw=None):
    """Chain matrix of lumped series or shunt elements."""
    omega = 2 * mp.pi * mp.mpf(frequency_hz) * (-1 if flaw == "wrong time factor" else 1)
    resistance, inductance, capacitance = section.resistance_ohm, section.inductance_h, section.capacitance_f
    total = mp.mpc(0)
    if isinstance(section, Series):
        total += resistance or 0
        total += mp.mpc(0, omega * inductance) if inductance else 0
        sign = 1 if flaw == "series capacitor sign" else -1
        total += mp.mpc(0, sign / (omega * capacitance)) if capacitance else 0
        return mp.mpf(1), total, mp.mpf(0), mp.mpf(1)
    total += 1 / mp.mpf(resistance) if resistance else 0
    total += mp.mpc(0, -1 / (omega * inductance)) if inductance else 0
    sign = -1 if flaw == "shunt capacitor sign" else 1
    total += mp.mpc(0, sign * omega * capacitance) if capacitance else 0
    return mp.mpf(1), mp.mpf(0), total, mp.mpf(1)


def chain_of_two_port(section, frequency_hz, reference_ohm, flaw=None):
    """
    Chain matrix of a two-port, from its waves.

    A voltage and a current at the antenna side fix the waves there (incident a2, leaving b2); the scattering equations
    then give the waves at the shack side. Done once for one volt, once for one ampere.
    """
    (s11, s12), (s21, s22) = section.s_at[frequency_hz]
    if flaw == "two-port reversed":
        s11, s12, s21, s22 = s22, s21, s12, s11
    s11, s12, s21, s22 = (mp.mpc(s) for s in (s11, s12, s21, s22))
    r = mp.mpf(reference_ohm if flaw == "two-port reference ignored" else section.reference_ohm)
    columns = []
    for voltage, current in ((1, 0), (0, 1)):
        a2, b2 = (voltage - r * current) / 2, (voltage + r * current) / 2
        a1 = (b2 - s22 * a2) / s21
        b1 = s11 * a1 + s12 * a2
        columns.append((a1 + b1, (a1 - b1) / r))
    (a, c), (b, d) = columns
    return a, b, c, d


def chain_of(section, frequency_hz, temperature_c, reference_ohm, flaw=None):
    """Chain matrix (a, b, c, d) of one section: shack side = matrix times antenna side, current towards the antenna."""
    if isinstance(section, Cable):
        return chain_of_cable(section, frequency_hz, temperature_c, flaw)
    if isinstance(section, TwoPort):
        return chain_of_two_port(section, frequency_hz, reference_ohm, flaw)
    if isinstance(section, Transformer):
        turns = mp.sqrt(mp.mpf(section.impedance_ratio))  # antenna side : shack side
        turns = 1 / turns if flaw == "transformer upside down" else turns
        return 1 / turns, mp.mpf(0), mp.mpf(0), turns
    return chain_of_lumped(section, frequency_hz, flaw)


def power(voltage, current):
    """Power [W] carried by a voltage and a current (rms)."""
    return mp.re(voltage * mp.conj(current))


def loss_db(power_in, power_out):
    """10 log10 (power in / power out) [dB], None where no power enters or none arrives."""
    if power_in <= 0 or power_out <= 0:
        return None
    return 10 * mp.log10(power_in / power_out)


def matched_loss_db(section, chain, frequency_hz, temperature_c, reference_ohm, flaw=None):
    """
    Attenuation of one section between matched ends [dB].

    A cable's is that of its travelling wave; of everything else the power that enters over the power that reaches a
    resistor of the sweep's reference, which is (1 - |S11|^2) / |S21|^2 there.
    """
    if isinstance(section, Transformer):
        return mp.mpf(0)
    if not isinstance(section, Cable):
        resistor = mp.mpf(reference_ohm)
        return loss_db(power(*apply(chain, resistor, 1)), resistor)
    if flaw == "matched loss from the law":
        series, shunt = line_constants(section, frequency_hz, temperature_c)
        nepers = section.length_m * (mp.re(series) / section.z0_ohm + mp.re(shunt) * section.z0_ohm) / 2
    else:
        nepers, _ = wave_over_cable(section, frequency_hz, temperature_c, flaw)
    return nepers * (mp.mpf("8.686") if flaw == "rounded neper" else 20 / mp.ln(10))


def electrical_length(section, frequency_hz, temperature_c, flaw=None):
    """Wavelengths along a section; only cables have any."""
    if not isinstance(section, Cable):
        return mp.mpf(0)
    if flaw == "electrical length from velocity":
        delay = seconds_per_metre(section, mp.mpf(temperature_c) - 20)
        return frequency_hz * delay * section.length_m
    return wave_over_cable(section, frequency_hz, temperature_c, flaw)[1] / (2 * mp.pi)


class RunAt:
    """A run at one frequency and temperature: its chain matrix, matched loss and electrical length."""

    def __init__(self, sections, frequency_hz, temperature_c=20.0, reference_ohm=50.0, flaw=None):
        ordered = sections[::-1] if flaw == "sections reversed" else sections
        chains = [chain_of(s, frequency_hz, temperature_c, reference_ohm, flaw) for s in ordered]
        self.flaw = flaw
        self.reference_ohm = mp.mpf(reference_ohm)
        self.chain = reduce(multiply, chains)
        self.matched_loss_db = sum(
            matched_loss_db(s, m, frequency_hz, temperature_c, reference_ohm, flaw)
            for s, m in zip(ordered, chains, strict=True)
        )
        self.electrical_length = sum(electrical_length(s, frequency_hz, temperature_c, flaw) for s in ordered)

    def from_antenna(self, antenna_ohm):
        """Readings with an impedance [ohm, None for an open circuit] at the antenna terminals."""
        voltage, current = (mp.mpc(1), mp.mpc(0)) if antenna_ohm is None else (mp.mpc(antenna_ohm), mp.mpc(1))
        return self._readings(apply(self.chain, voltage, current), (voltage, current))

    def from_shack(self, shack_gamma):
        """Readings with a reflection seen at the shack end, in the run's reference."""
        shack = 1 + mp.mpc(shack_gamma), (1 - mp.mpc(shack_gamma)) / self.reference_ohm
        return self._readings(shack, solve(self.chain, *shack))

    def _readings(self, shack, antenna):
        shack_gamma, antenna_gamma = self._gamma(*shack), self._gamma(*antenna)
        total = loss_db(power(*shack), power(*antenna))
        if self.flaw == "total loss from reflections" and total is not None:
            total = self.matched_loss_db + 10 * mp.log10((1 - abs(shack_gamma) ** 2) / (1 - abs(antenna_gamma) ** 2))
        return Readings(
            _impedance(*shack), shack_gamma, swr(shack_gamma), return_loss_db(shack_gamma),
            _impedance(*antenna), antenna_gamma, swr(antenna_gamma), return_loss_db(antenna_gamma),
            self.matched_loss_db, total, self.electrical_length,
        )  # fmt: skip

    def _gamma(self, voltage, current):
        return (voltage - self.reference_ohm * current) / (voltage + self.reference_ohm * current)


def _impedance(voltage, current):
    return None if current == 0 else voltage / current


def swr(gamma):
    """Standing-wave ratio of a reflection; infinite from |gamma| = 1 on."""
    magnitude = abs(gamma)
    return mp.inf if magnitude >= 1 else (1 + magnitude) / (1 - magnitude)


def return_loss_db(gamma):
    """Return loss of a reflection [dB], infinite without any reflection."""
    return mp.inf if gamma == 0 else -20 * mp.log10(abs(gamma))
