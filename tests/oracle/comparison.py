"""The package against the oracle: what it reports for a sweep, beside what it should, and what may differ."""

from dataclasses import dataclass
from functools import lru_cache

import feedpoint
from tests.oracle.files import as_read, write_run_sheet, write_sweep
from tests.oracle.run_at import RunAt
from tests.oracle.telegrapher import mp

ASKED = 1e-10
"""Agreement asked of the package. Relative; absolute for reflections, which are of the order of 1 by themselves."""

FILE_ROUNDING = 2 * 2.0**-53
"""
What a file of 17 digits and a reader in double precision leave of a reflection, relative to it: half a unit of the 17th
digit is at most 0.5e-16, the nearest double at most 1.1e-16 away; 2.2e-16 covers both.
"""
ROUNDINGS = 4  # file and reader once; turning Gamma into an impedance and back leaves a few more of the same size

QUANTITIES = {
    "feedpoint_ohm": ("feedpoint_resistance_ohm", "feedpoint_reactance_ohm"),
    "feedpoint_gamma": ("feedpoint_gamma_re", "feedpoint_gamma_im"),
    "feedpoint_swr": ("feedpoint_swr",),
    "feedpoint_return_loss_db": ("feedpoint_return_loss_db",),
    "matched_loss_db": ("matched_loss_db",),
    "total_loss_db": ("total_loss_db",),
    "electrical_length_wavelengths": ("electrical_length_wavelengths",),
    "shack_ohm": ("shack_resistance_ohm", "shack_reactance_ohm"),
    "shack_swr": ("shack_swr",),
    "shack_return_loss_db": ("shack_return_loss_db",),
}
"""The oracle's name of a quantity and the columns of the package's table that hold it."""


@dataclass(frozen=True)
class Deviation:
    """One quantity of one point: how far the package is off, what rounding alone allows it, and where it was."""

    quantity: str
    error: float
    rounding: float
    where: str

    @property
    def allowed(self):
        """The 1e-10 asked, or what rounding of the file's digits makes of itself, where that is more."""
        return max(ASKED, self.rounding)


def error_of(quantity, found, expected):
    """Relative error of a found value; absolute for a reflection."""
    distance = abs(mp.mpmathify(found) - expected)
    return float(distance if quantity.endswith("gamma") else distance / abs(expected))


def rounding_of(run_at, gamma):
    """
    Per quantity, what the rounding of a shack-end reflection amounts to at the antenna terminals.

    Exact de-embedding of the reflection moved by 1e-25 along each axis gives the slopes; rounding moves it by
    `ROUNDINGS` times `FILE_ROUNDING` of its magnitude.
    """
    here = run_at.from_shack(gamma)
    step = mp.mpf(10) ** -25
    moved = [run_at.from_shack(gamma + step * direction) for direction in (1, mp.mpc(0, 1))]
    size = ROUNDINGS * FILE_ROUNDING * abs(gamma)
    return {
        q: float(size * mp.hypot(*(error_of(q, getattr(m, q), getattr(here, q)) / step for m in moved)))
        for q in QUANTITIES
    }


def found_value(row, quantity):
    """A quantity out of a row of the package's table, complex where it has two columns."""
    columns = QUANTITIES[quantity]
    values = [float(row[column]) for column in columns]
    return complex(*values) if len(values) == 2 else values[0]


@lru_cache(maxsize=256)  # each case is asked for in both directions
def expectations(case, flaw=None):
    """Per point of a case the oracle's run and its readings."""
    runs = [RunAt(case.sections, f, case.temperature_c, case.reference_ohm, flaw) for f in case.frequency_hz]
    return runs, [run.from_antenna(z) for run, z in zip(runs, case.antenna_ohm, strict=True)]


def deviations(table, case, readings, roundings):
    """All deviations of a table from the oracle's readings."""
    rows = table.to_dict("records")
    assert [row["frequency_hz"] for row in rows] == list(case.frequency_hz)
    places = [f"{case.kind} {f:.0f} Hz {z:.1f}" for f, z in zip(case.frequency_hz, case.antenna_ohm, strict=True)]
    return [
        Deviation(q, error_of(q, found_value(row, q), getattr(reading, q)), rounding[q], place)
        for row, reading, rounding, place in zip(rows, readings, roundings, places, strict=True)
        for q in QUANTITIES
    ]


def compare_deembed(folder, case, flaw=None):
    """Write what the shack end shows for a case's antenna, let the package de-embed it, return all deviations."""
    runs, readings = expectations(case, flaw)
    gamma = [r.shack_gamma for r in readings]
    sweep = feedpoint.read_sweep(str(write_sweep(folder / "shack.s1p", case.frequency_hz, gamma, case.reference_ohm)))
    run = feedpoint.read_run_sheet(str(write_run_sheet(folder, case.sections, case.temperature_c)))
    roundings = [rounding_of(run_at, g) for run_at, g in zip(runs, gamma, strict=True)]
    return deviations(feedpoint.deembed(sweep, run).table(), case, readings, roundings)


def compare_embed(folder, case, flaw=None):
    """
    Write the antenna of a case, let the package embed it, return all deviations.

    The oracle starts from the very digits of the file, and a lossy run shrinks what rounding is left: nothing to allow.
    """
    runs, readings = expectations(case, flaw)
    gamma = [as_read(r.feedpoint_gamma) for r in readings]
    exact = [run.from_antenna(run.reference_ohm * (1 + g) / (1 - g)) for run, g in zip(runs, gamma, strict=True)]
    file = write_sweep(folder / "antenna.s1p", case.frequency_hz, gamma, case.reference_ohm)
    run_sheet = feedpoint.read_run_sheet(str(write_run_sheet(folder, case.sections, case.temperature_c)))
    table = feedpoint.embed(feedpoint.read_sweep(str(file)), run_sheet).table()
    return deviations(table, case, exact, [dict.fromkeys(QUANTITIES, 0.0)] * len(exact))


def worst(found, quantity):
    """The largest deviation of one quantity."""
    return max((d for d in found if d.quantity == quantity), key=lambda d: d.error)
