"""
Voltage and current at every plane of a run, from the reflection at one end of it.

A run of S sections has S + 1 planes, plane 0 at the shack end and plane S at the antenna terminals. Going from the
shack end to the antenna de-embeds, going the other way embeds; both keep open and short circuits exact.

References
----------
.. [1] D. M. Pozar, *Microwave Engineering*, 4th ed., Wiley 2012, section 2.7 and eq. 2.92 (power at a plane of a line
   with complex characteristic impedance is Re(V I*), not a difference of |Gamma|^2). Numbers from memory.
"""

from collections.abc import Callable, Sequence
from dataclasses import dataclass
from functools import cached_property
from typing import TypeAlias

import numpy as np

from feedpoint.errors import RunRefused
from feedpoint.line import ComplexArray, RealArray, read_only
from feedpoint.line.chain import Chain
from feedpoint.line.reflection import ratio
from feedpoint.run.record import Run
from feedpoint.run.sections import SectionTwoPort

Voltage: TypeAlias = ComplexArray
Current: TypeAlias = ComplexArray

# Re Z below this part of |Z| is rounding: numbers carry 16 digits, and a run's loss takes some of them.
_NO_POWER = 1e-13
# The reflection comes back through twice the loss: beyond this, less than the last of a number's 16 digits is left.
_MOST_LOSS_DB = 150.0


@dataclass(frozen=True, eq=False)
class Planes:
    """
    What stands at every plane of a run; S sections, F frequencies, perhaps T trials before them.

    `voltage` [V] and `current` [A], both (S + 1, ..., F), for a wave of 1 V towards the antenna at the end where the
    reflection is known; current flows towards the antenna. `matched_loss_db` and `electrical_length` (in wavelengths)
    are those of each section, (S, ..., F).
    """

    voltage: Voltage
    current: Current
    reference_ohm: float
    matched_loss_db: RealArray
    electrical_length: RealArray

    def gamma_against(self, reference_ohm: float) -> ComplexArray:
        """Reflection at every plane (S + 1, ..., F) against a resistance [ohm]; exactly 1 where no current flows."""
        drop = reference_ohm * self.current
        return ratio(self.voltage - drop, self.voltage + drop)

    @cached_property
    def gamma(self) -> ComplexArray:
        """Reflection at every plane (S + 1, ..., F) against the sweep's reference."""
        return read_only(self.gamma_against(self.reference_ohm))

    @cached_property
    def error_growth(self) -> RealArray:
        """
        By how much an error of the known reflection is larger at every plane (S + 1, ..., F).

        A reflection is a bilinear function of another; with a wave of 1 V at the known end its derivative has the
        magnitude of 1 V^2 over the square of the wave towards the antenna, for everything reciprocal.
        """
        wave = np.abs(self.voltage + self.reference_ohm * self.current) / 2.0
        return read_only(1.0 / np.maximum(wave, np.finfo(float).tiny ** 0.5) ** 2)

    @cached_property
    def impedance_ohm(self) -> ComplexArray:
        """Impedance seen towards the antenna at every plane (S + 1, ..., F) [ohm]; infinite at an open circuit."""
        return read_only(ratio(self.voltage, self.current))

    @cached_property
    def total_loss_db(self) -> RealArray:
        """
        Power into the run over power delivered to the antenna (..., F) [dB]; NaN where either is none.

        From Re(V I*) at both ends [1]_, which is right whatever the characteristic impedances are.
        """
        entering, delivered = (_power(self.voltage[end], self.current[end]) for end in (0, -1))
        both = (entering > 0.0) & (delivered > 0.0)
        quotient = np.divide(entering, delivered, out=np.full(entering.shape, np.nan), where=both)
        loss_db: RealArray = 10.0 * np.log10(quotient)
        return read_only(loss_db)


def deembedded(gamma: ComplexArray, frequency_hz: RealArray, run: Run, reference_ohm: float) -> Planes:
    """
    Planes of a run whose reflection `gamma` (..., F) at the shack end is known.

    Raises
    ------
    RunRefused
        If a section cannot be evaluated at the frequencies (F,) [Hz], or the run lets nothing back.
    """
    two_ports = _two_ports(run, frequency_hz, reference_ohm)
    states = _carried(gamma, reference_ohm, [two_port.chain for two_port in two_ports], Chain.towards_antenna)
    return _planes(states, two_ports, frequency_hz, reference_ohm)


def embedded(gamma: ComplexArray, frequency_hz: RealArray, run: Run, reference_ohm: float) -> Planes:
    """Planes of a run whose reflection `gamma` (..., F) at the antenna terminals is known; else as `deembedded`."""
    two_ports = _two_ports(run, frequency_hz, reference_ohm)
    chains = [two_port.chain for two_port in reversed(two_ports)]
    states = _carried(gamma, reference_ohm, chains, Chain.towards_shack)
    return _planes(states[::-1], two_ports, frequency_hz, reference_ohm)


def _carried(
    gamma: ComplexArray,
    reference_ohm: float,
    chains: Sequence[Chain],
    step: Callable[[Chain, Voltage, Current], tuple[Voltage, Current]],
) -> list[tuple[Voltage, Current]]:
    states = [(1.0 + gamma, (1.0 - gamma) / reference_ohm)]
    for chain in chains:
        states.append(step(chain, *states[-1]))
    return states


def _planes(
    states: Sequence[tuple[Voltage, Current]],
    two_ports: Sequence[SectionTwoPort],
    frequency_hz: RealArray,
    reference_ohm: float,
) -> Planes:
    nothing = np.zeros((0, frequency_hz.size))
    voltage, current = (np.stack(np.broadcast_arrays(*parts)) for parts in zip(*states, strict=True))
    matched_loss_db = np.stack([two_port.matched_loss_db for two_port in two_ports]) if two_ports else nothing
    electrical_length = np.stack([two_port.electrical_length for two_port in two_ports]) if two_ports else nothing
    return Planes(
        read_only(voltage), read_only(current), reference_ohm, read_only(matched_loss_db), read_only(electrical_length)
    )


def _two_ports(run: Run, frequency_hz: RealArray, reference_ohm: float) -> tuple[SectionTwoPort, ...]:
    # A loss that overflows is refused below, in words.
    with np.errstate(over="ignore", invalid="ignore"):
        two_ports = run.two_ports(frequency_hz, reference_ohm)
    for number, (section, two_port) in enumerate(zip(run.sections, two_ports, strict=True), start=1):
        if np.any(two_port.matched_loss_db > _MOST_LOSS_DB):
            at = int(np.nanargmax(two_port.matched_loss_db))
            label = f"section {number}"
            raise RunRefused(
                f"a matched loss of {two_port.matched_loss_db[at]:.4g} dB at {frequency_hz[at] / 1e6:g} MHz; expected "
                f"at most {_MOST_LOSS_DB:g} dB, beyond which no reflection comes back. Check its length and loss.",
                source=run.source,
                key=label if section.name == label else f"{label} ({section.name})",
            )
    return two_ports


def _power(voltage: Voltage, current: Current) -> RealArray:
    """Power [W] at a plane, 0 where it is no more than rounding."""
    power = (voltage * np.conj(current)).real
    return np.where(np.abs(power) > _NO_POWER * np.abs(voltage * current), power, 0.0)


def without_extension(gamma: ComplexArray, frequency_hz: RealArray, extension_s: float) -> ComplexArray:
    """
    Reflection (..., F) at the analyzer's own reference plane, from one saved with a port extension.

    The extension, a one-way delay [s], multiplied Gamma by exp(+j 2 w extension); this divides by it.
    """
    if extension_s == 0.0:
        return gamma
    turn: ComplexArray = np.exp(-4j * np.pi * frequency_hz * extension_s)
    return gamma * turn

