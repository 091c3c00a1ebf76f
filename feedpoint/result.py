"""
The results of the main job: what stands at both ends of a run.

`deembed` and `embed` are the package's public computations; a `FeedpointResult` holds their outcome and every column
that the commands print.
"""

from __future__ import annotations

from dataclasses import dataclass, replace
from functools import cached_property
from typing import TYPE_CHECKING, Literal

import numpy as np

from feedpoint.audit.described_run import coarse_step, loss_data, reference_mismatch, two_port_gain
from feedpoint.audit.passivity import loss_above_ceiling, reflection_above_unity
from feedpoint.errors import WrongUsage
from feedpoint.finding import Finding
from feedpoint.landmarks import Landmarks, landmarks_of
from feedpoint.line import ComplexArray, RealArray, read_only
from feedpoint.line.reflection import return_loss_db, swr_from_reflection
from feedpoint.planes import Planes, deembedded, embedded, without_extension
from feedpoint.run.record import Run
from feedpoint.sweep.record import Sweep

if TYPE_CHECKING:
    import pandas as pd
    import skrf

Direction = Literal["deembed", "embed"]
Columns = dict[str, RealArray]

# The columns of `deembed` and `embed`, in order: scripts depend on them.
COLUMNS = (
    "frequency_hz",
    "shack_resistance_ohm",
    "shack_reactance_ohm",
    "shack_swr",
    "shack_return_loss_db",
    "feedpoint_resistance_ohm",
    "feedpoint_reactance_ohm",
    "feedpoint_swr",
    "feedpoint_return_loss_db",
    "feedpoint_gamma_re",
    "feedpoint_gamma_im",
    "matched_loss_db",
    "total_loss_db",
    "electrical_length_wavelengths",
    "feedpoint_resistance_low_ohm",
    "feedpoint_resistance_high_ohm",
    "feedpoint_reactance_low_ohm",
    "feedpoint_reactance_high_ohm",
    "feedpoint_swr_low",
    "feedpoint_swr_high",
)
INTERVAL_COLUMNS = COLUMNS[14:]
INSPECT_COLUMNS = (
    *COLUMNS[:5],
    "shack_gamma_magnitude",
    "shack_gamma_angle_deg",
    "shack_power_reflected_percent",
    "shack_swr_db",
)


_CALIBRATE = (
    "Repeat the calibration at the plane where the run begins; look for another transmitter on the air."
)
_CHECK_MODEL = "Check the file: its format, its reference, and whether it is the impedance of an antenna."


@dataclass(frozen=True, eq=False)
class FeedpointResult:
    """
    A sweep carried through a run.

    `sweep` is what was given: the reflection at the shack end (`direction` "deembed") or at the antenna terminals
    ("embed"). `swr_reference_ohm` [ohm] is what SWR and return loss refer to. Arrays have the shape (F,) of the sweep.
    """

    sweep: Sweep
    run: Run
    planes: Planes
    direction: Direction
    swr_reference_ohm: float
    findings: tuple[Finding, ...]

    @property
    def frequency_hz(self) -> RealArray:
        """Frequencies (F,) [Hz]."""
        return self.sweep.frequency_hz

    @property
    def impedance_ohm(self) -> ComplexArray:
        """Impedance at the antenna terminals (F,) [ohm]; `inf+0j` at an open circuit."""
        antenna: ComplexArray = self.planes.impedance_ohm[-1]
        return antenna

    @property
    def gamma(self) -> ComplexArray:
        """Reflection at the antenna terminals (F,), against the sweep's reference."""
        antenna: ComplexArray = self.planes.gamma[-1]
        return antenna

    @cached_property
    def _swr_gamma(self) -> ComplexArray:
        return self.planes.gamma_against(self.swr_reference_ohm)

    @cached_property
    def landmarks(self) -> Landmarks:
        """Readings at the antenna terminals."""
        return self._landmarks(-1)

    @cached_property
    def shack_landmarks(self) -> Landmarks:
        """Readings at the shack end."""
        return self._landmarks(0)

    def _landmarks(self, plane: int) -> Landmarks:
        return landmarks_of(
            self.frequency_hz,
            self.planes.gamma[plane],
            self.sweep.reference_ohm,
            self._swr_gamma[plane],
            self.run.bands,
            self.planes.error_growth[plane],
        )

    @cached_property
    def columns(self) -> Columns:
        """
        Every column of the commands (F,), by its name; NaN where a value is not known, infinite where it is infinite.
        """
        planes = self.planes
        shack, feedpoint = planes.impedance_ohm[0], planes.impedance_ohm[-1]
        values = (
            self.frequency_hz,
            shack.real,
            shack.imag,
            swr_from_reflection(self._swr_gamma[0]),
            return_loss_db(self._swr_gamma[0]),
            feedpoint.real,
            feedpoint.imag,
            swr_from_reflection(self._swr_gamma[-1]),
            return_loss_db(self._swr_gamma[-1]),
            self.gamma.real,
            self.gamma.imag,
            planes.matched_loss_db.sum(axis=0),
            planes.total_loss_db,
            planes.electrical_length.sum(axis=0),
        )
        unknown = np.full(self.frequency_hz.size, np.nan)
        columns = dict(zip(COLUMNS, (*values, *(unknown for _ in INTERVAL_COLUMNS)), strict=True))
        columns |= dict(zip(INSPECT_COLUMNS[5:], _of_reflection(planes.gamma[0], values[3]), strict=True))
        return {name: read_only(column) for name, column in columns.items()}

    def table(self) -> pd.DataFrame:
        """Return the columns as a table; NaN where a value is not known."""
        import pandas as pd  # 0.3 s to import, and the command line needs no table

        return pd.DataFrame({name: self.columns[name] for name in COLUMNS})

    def network(self) -> skrf.Network:
        """Return the antenna terminals as a one-port network of scikit-rf, against the sweep's reference."""
        import skrf  # 0.4 s to import

        frequency = skrf.Frequency.from_f(self.frequency_hz, unit="hz")
        return skrf.Network(frequency=frequency, s=self.gamma[:, None, None], z0=self.sweep.reference_ohm)

    def saved_shack_gamma(self) -> ComplexArray:
        """
        Reflection (F,) at the shack end as the analyzer of the run saves it: with its port extension, where one is set.

        Embedding and saving this, then de-embedding through the same run, gives the antenna again.
        """
        return without_extension(self.planes.gamma[0], self.frequency_hz, -self.run.analyzer.extension_s)

    def at(self, frequency_hz: RealArray) -> FeedpointResult:
        """
        Return the result at other frequencies (N,) [Hz], rising, within the sweep.

        The reflection at the antenna terminals is interpolated (cubic spline through all points, real and imaginary
        part), and the shack end computed from it: the antenna is smooth where the run turns.

        Raises
        ------
        WrongUsage
            For frequencies outside the sweep, or between the points of a sweep that has only one.
        """
        inside = (frequency_hz >= self.frequency_hz[0]) & (frequency_hz <= self.frequency_hz[-1])
        if not np.all(inside):
            raise WrongUsage(
                f"{frequency_hz[np.argmin(inside)] / 1e6:.9g} MHz lies outside the sweep, which reaches from "
                f"{self.frequency_hz[0] / 1e6:.9g} to {self.frequency_hz[-1] / 1e6:.9g} MHz.",
                source=self.sweep.source,
            )
        if not np.all(np.isfinite(self.gamma)):
            raise WrongUsage(
                "the antenna's reflection is infinite at a point of the sweep; nothing can be interpolated.",
                source=self.sweep.source,
            )
        from scipy.interpolate import CubicSpline  # 0.4 s to import

        gamma = CubicSpline(self.frequency_hz, self.gamma)(frequency_hz) if self.frequency_hz.size > 1 else self.gamma
        planes = embedded(gamma, frequency_hz, self.run, self.sweep.reference_ohm)
        sweep = replace(self.sweep, frequency_hz=frequency_hz, gamma=gamma, sha256="")
        there = replace(self, sweep=sweep, planes=planes)
        if self.direction == "embed":
            return there
        # What is given in a de-embedding is the shack end.
        return replace(there, sweep=replace(sweep, gamma=there.saved_shack_gamma()))


def deembed(
    sweep: Sweep,
    run: Run,
    trials: int | None = None,
    seed: int = 0,  # noqa: ARG001
    *,
    swr_reference_ohm: float | None = None,
) -> FeedpointResult:
    """
    Impedance at the antenna terminals, from a sweep at the shack end of a run.

    Parameters
    ----------
    sweep : Sweep
    run : Run
    trials, seed : int
        Reserved for Monte Carlo intervals, which this version does not have: any number of trials is refused.
    swr_reference_ohm : float, optional [ohm]
        What SWR and return loss refer to; the sweep's reference without it.

    Raises
    ------
    RunRefused
        If a section cannot be evaluated at the sweep's frequencies, or the run lets nothing back.
    WrongUsage
        For trials, and for a reference that is not positive.
    """
    if trials is not None:
        raise WrongUsage("trials: this version has no Monte Carlo intervals; leave it out.")
    frequency_hz, reference_ohm = sweep.frequency_hz, sweep.reference_ohm
    gamma = without_extension(sweep.gamma, frequency_hz, run.analyzer.extension_s)
    planes = deembedded(gamma, frequency_hz, run, reference_ohm)
    findings = (
        *sweep.findings,
        *reflection_above_unity(frequency_hz, gamma, "the shack end", _CALIBRATE),
        *loss_above_ceiling(frequency_hz, gamma, planes.gamma[-1]),
        *_findings_about_run(sweep, run, planes),
    )
    return FeedpointResult(sweep, run, planes, "deembed", _swr_reference(swr_reference_ohm, sweep), findings)


def embed(sweep: Sweep, run: Run, *, swr_reference_ohm: float | None = None) -> FeedpointResult:
    """
    What the shack end of a run shows of an antenna whose reflection at its terminals is known.

    Parameters and refusals as for `deembed`; `sweep` is at the antenna terminals, and no port extension applies to it.
    """
    planes = embedded(sweep.gamma, sweep.frequency_hz, run, sweep.reference_ohm)
    findings = (
        *sweep.findings,
        *reflection_above_unity(sweep.frequency_hz, sweep.gamma, "the antenna terminals", _CHECK_MODEL),
        *_findings_about_run(sweep, run, planes),
    )
    return FeedpointResult(sweep, run, planes, "embed", _swr_reference(swr_reference_ohm, sweep), findings)


def _of_reflection(gamma: ComplexArray, swr: RealArray) -> tuple[RealArray, ...]:
    """Magnitude, angle [degrees], reflected power [%] of a reflection (F,), and its SWR in dB."""
    magnitude = np.abs(gamma)
    return magnitude, np.rad2deg(np.angle(gamma)), 100.0 * magnitude**2, 20.0 * np.log10(swr)


def _swr_reference(stated_ohm: float | None, sweep: Sweep) -> float:
    if stated_ohm is None:
        return sweep.reference_ohm
    if not 0.0 < stated_ohm < np.inf:
        raise WrongUsage(f"SWR cannot refer to {stated_ohm} ohm; expected a positive resistance.")
    return stated_ohm


def _findings_about_run(sweep: Sweep, run: Run, planes: Planes) -> list[Finding]:
    return [
        *(finding for section in run.sections for finding in section.findings),
        *coarse_step(sweep.frequency_hz, planes.electrical_length),
        *reference_mismatch(run, sweep.reference_ohm),
        *loss_data(run, sweep.frequency_hz),
        *two_port_gain(run, planes.matched_loss_db),
    ]
