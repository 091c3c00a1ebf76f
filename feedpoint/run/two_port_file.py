"""A section that is known by its two-port file: an arrestor, a filter, a switch, a measured adapter."""

from dataclasses import dataclass
from typing import ClassVar

import numpy as np

from feedpoint.assumed import Assumed
from feedpoint.errors import RunRefused
from feedpoint.finding import Finding
from feedpoint.line import ComplexArray, RealArray
from feedpoint.line.chain import scattering_chain
from feedpoint.run.sections import Figures, Section, SectionTwoPort, Surroundings, lengthless

# Two frequencies are the same when they differ by less than any instrument resolves.
_SAME_FREQUENCY = 1e-9
# Below this, less than a hundredth of the wave comes back through the two-port: what is behind it is hidden.
_LEAST_THROUGH = 0.01
_MOST_ONE_WAY = 0.1
# Largest singular value of the S matrix: how much more amplitude comes out than goes in, at worst. Calibrated two-ports
# measure up to about 1.01; 1.05 is 0.4 dB of gain, which nothing passive has.
_MOST_GAIN = 1.05


@dataclass(frozen=True, eq=False)
class TwoPortSection(Section):
    """
    A section given by scattering parameters; port 1 is at the shack end.

    frequency_hz (N,) [Hz] rising, scattering (N, 2, 2) against reference_ohm (2,) [ohm], which may differ from the
    sweep's.
    """

    kind: ClassVar[str] = "two-port"
    name: str
    file: Assumed[str]
    frequency_hz: RealArray
    scattering: ComplexArray
    reference_ohm: RealArray
    findings: tuple[Finding, ...] = ()

    def figures(self) -> Figures:
        return {"two_port": self.file}

    def two_port(self, frequency_hz: RealArray, surroundings: Surroundings) -> SectionTwoPort:
        """
        Two-port at frequencies (F,) [Hz].

        Raises
        ------
        RunRefused
            If the file does not cover the frequencies, or lets too little back to say anything about the antenna.
        """
        self._check_band(frequency_hz)
        scattering = self._at(frequency_hz)
        self._check_through(frequency_hz, scattering)
        chain = scattering_chain(scattering, float(self.reference_ohm[0]), float(self.reference_ohm[1]))
        return lengthless(chain, frequency_hz, surroundings.reference_ohm)

    def _check_band(self, frequency_hz: RealArray) -> None:
        low, high = self.frequency_hz[0] * (1 - _SAME_FREQUENCY), self.frequency_hz[-1] * (1 + _SAME_FREQUENCY)
        if frequency_hz[0] < low or frequency_hz[-1] > high:
            raise RunRefused(
                f"the two-port covers {self.frequency_hz[0] / 1e6:g} to {self.frequency_hz[-1] / 1e6:g} MHz but the "
                f"sweep {frequency_hz[0] / 1e6:g} to {frequency_hz[-1] / 1e6:g} MHz; expected it to cover the sweep.",
                source=self.file.value,
                key=self.name,
            )

    def _at(self, frequency_hz: RealArray) -> ComplexArray:
        """
        Scattering parameters at the sweep's frequencies, (F, 2, 2).

        Cubic splines; the transmission in magnitude and unwrapped phase, which are smooth where real and imaginary part
        turn, the reflections in real and imaginary part.
        """
        nearest = np.searchsorted((self.frequency_hz[1:] + self.frequency_hz[:-1]) / 2.0, frequency_hz)
        if np.allclose(self.frequency_hz[nearest], frequency_hz, rtol=_SAME_FREQUENCY, atol=0.0):
            return self.scattering[nearest]
        from scipy.interpolate import CubicSpline  # 0.4 s to import

        scattering = np.empty((frequency_hz.size, 2, 2), dtype=complex)
        for i, j in ((0, 1), (1, 0)):
            magnitude = CubicSpline(self.frequency_hz, np.abs(self.scattering[:, i, j]))(frequency_hz)
            phase = CubicSpline(self.frequency_hz, np.unwrap(np.angle(self.scattering[:, i, j])))(frequency_hz)
            scattering[:, i, j] = magnitude * np.exp(1j * phase)
        for i in (0, 1):
            scattering[:, i, i] = CubicSpline(self.frequency_hz, self.scattering[:, i, i])(frequency_hz)
        return scattering

    def _check_through(self, frequency_hz: RealArray, scattering: ComplexArray) -> None:
        s12, s21 = scattering[:, 0, 1], scattering[:, 1, 0]
        back = np.abs(s12 * s21)
        one_way = np.abs(s21 - s12) / np.maximum(np.maximum(np.abs(s21), np.abs(s12)), np.finfo(float).tiny)
        if back.min() < _LEAST_THROUGH:
            where = f"at {frequency_hz[back.argmin()] / 1e6:g} MHz"
            what = f"|S12 S21| is {back.min():.2g} {where} (expected 0.01 at least)"
        elif one_way.max() > _MOST_ONE_WAY:
            where = f"at {frequency_hz[one_way.argmax()] / 1e6:g} MHz"
            what = f"S21 and S12 differ by {100 * one_way.max():.3g} % {where}"
        else:
            self._check_gain(frequency_hz, scattering)
            return
        raise RunRefused(
            f"{what}: an isolator, amplifier or stop band hides the antenna. Sweep from its antenna side.",
            source=self.file.value,
            key=self.name,
        )

    def _check_gain(self, frequency_hz: RealArray, scattering: ComplexArray) -> None:
        gain = np.linalg.norm(scattering, ord=2, axis=(1, 2))
        if gain.max() > _MOST_GAIN:
            raise RunRefused(
                f"the two-port gives {gain.max():.3g} times what it receives at "
                f"{frequency_hz[gain.argmax()] / 1e6:g} MHz; expected a passive one (at most {_MOST_GAIN}). Sweep from "
                "the antenna side of an amplifier.",
                source=self.file.value,
                key=self.name,
            )
