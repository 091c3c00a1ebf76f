"""Runs, sweeps and antennas drawn by a fixed seed, for the package to be held against the oracle."""

import cmath
import math
import random
from dataclasses import dataclass

from tests.oracle.described import Cable, Series, Shunt, Transformer, TwoPort

SEED = 20260314
POINTS_PER_SWEEP = 8
LONGEST_TURN_RAD = 200.0
"""
Largest one-way phase of one cable. A program in double precision knows w l / v to four roundings at worst, 4.4e-16 of
it, and an error of the phase is up to |Zc / Z - Z / Zc| times as large in the impedance: 90 for 5 ohm on 450 ohm.
200 rad * 4.4e-16 * 90 = 8e-12, a tenth of the 1e-10 that is asked of the package.
"""

KINDS = [
    "one cable", "one cable", "two cables", "three cables", "cable to 450 ohm", "75 ohm between 50",
    "series then cable", "cable then shunt", "cable then transformer", "transformer then 450 ohm",
    "two-port then cable", "cable then two-port", "cable by delay", "two cables by delay",
    "lumped between cables", "two-port between cables",
]  # fmt: skip


@dataclass(frozen=True)
class Case:
    """A run at a temperature, the grid and reference of its sweep, and the antenna's impedance at each point."""

    kind: str
    sections: tuple
    temperature_c: float
    reference_ohm: float
    frequency_hz: tuple
    antenna_ohm: tuple


def log_uniform(draw, low, high):
    """A number between two limits, evenly spread over its logarithm."""
    return math.exp(draw.uniform(math.log(low), math.log(high)))


def draw_grid(draw):
    """Rising frequencies [Hz] of one sweep, within 0.1-500 MHz and within a factor 1.5 of each other."""
    low = log_uniform(draw, 0.1e6, 500e6 / 1.5)
    return tuple(sorted(draw.uniform(low, 1.5 * low) for _ in range(POINTS_PER_SWEEP)))


def draw_cable(draw, z0_ohm, loss_db, frequency_hz, by_delay=False):
    """A cable that loses about `loss_db` at a frequency, unless its phase or 2 km forbid such a length."""
    open_wire = z0_ohm > 200
    conductor = log_uniform(draw, 0.05, 0.2) if open_wire else log_uniform(draw, 0.3, 4.0)
    dielectric = draw.choice([0.0, log_uniform(draw, 0.001, 0.03)])
    floor = draw.choice([0.0, 0.0, log_uniform(draw, 0.05, 3.0)])
    velocity = draw.uniform(0.85, 0.95) if open_wire else draw.uniform(0.64, 0.88)
    f_mhz = frequency_hz / 1e6
    length = 100 * loss_db / (conductor * math.sqrt(f_mhz) + dielectric * f_mhz + floor)
    length = min(length, 2000.0, LONGEST_TURN_RAD * velocity * 299792458 / (2 * math.pi * 1.5 * frequency_hz))
    delay_ns = length / (velocity * 0.299792458) if by_delay else None
    return Cable(
        z0_ohm=z0_ohm, length_m=length, velocity_factor=None if by_delay else velocity, delay_ns=delay_ns,
        conductor_loss=conductor, dielectric_loss=dielectric, floor_loss=floor,
        delay_tempco_ppm_per_k=draw.choice([0.0, draw.uniform(-200, 200)]),
    )  # fmt: skip


def draw_series(draw, frequency_hz):
    """Series elements of a few to a hundred ohm each."""
    omega = 2 * math.pi * frequency_hz
    return Series(
        resistance_ohm=log_uniform(draw, 1, 50),
        inductance_h=draw.choice([None, log_uniform(draw, 5, 100) / omega]),
        capacitance_f=draw.choice([None, 1 / (log_uniform(draw, 5, 100) * omega)]),
    )


def draw_shunt(draw, frequency_hz):
    """Shunt elements of some tens of ohm to a kilohm each."""
    omega = 2 * math.pi * frequency_hz
    return Shunt(
        resistance_ohm=log_uniform(draw, 100, 5000),
        inductance_h=draw.choice([None, log_uniform(draw, 50, 1000) / omega]),
        capacitance_f=draw.choice([None, 1 / (log_uniform(draw, 50, 1000) * omega)]),
    )


def draw_two_port(draw, grid):
    """
    A lossy two-port on the sweep's grid that differs from end to end and, slightly, from direction to direction.

    |S11|, |S22| <= 0.3, |S21| <= 0.9 and |S12| within 5 % of |S21|: no port reflects and passes on more than arrives.
    """
    s11, s22, s21 = draw.uniform(0.05, 0.3), draw.uniform(0.05, 0.3), draw.uniform(0.6, 0.9)
    unequal = 1 + draw.uniform(-0.05, 0.05)
    delays = [draw.uniform(0, 0.3) / grid[0] for _ in range(3)]
    angles = [draw.uniform(-math.pi, math.pi) for _ in range(3)]
    s_at = {}
    for f in grid:
        turned = [angle - 2 * math.pi * f * delay for angle, delay in zip(angles, delays, strict=True)]
        a, b, c = (cmath.exp(1j * angle) for angle in turned)
        s_at[f] = ((s11 * a, s21 * unequal * c), (s21 * c, s22 * b))
    return TwoPort(reference_ohm=draw.choice([50.0, 75.0]), s_at=s_at)


def draw_sections(draw, kind, grid):
    """The sections of a run of one kind; its cables lose 0.4-23 dB at mid-grid unless that takes too much length."""
    f = grid[POINTS_PER_SWEEP // 2]
    total = log_uniform(draw, 0.4, 23)
    share = draw.uniform(0.2, 0.8)
    first, second = total * share, total * (1 - share)

    def cable(z0_ohm, loss_db, by_delay=False):
        return draw_cable(draw, z0_ohm, loss_db, f, by_delay)

    either = draw.choice([50.0, 75.0])
    return {
        "one cable": lambda: (cable(either, total),),
        "two cables": lambda: (cable(50.0, first), cable(75.0, second)),
        "three cables": lambda: (cable(75.0, first), cable(50.0, second / 2), cable(450.0, second / 2)),
        "cable to 450 ohm": lambda: (cable(either, first), cable(450.0, second)),
        "75 ohm between 50": lambda: (cable(50.0, first), cable(75.0, second / 2), cable(50.0, second / 2)),
        "series then cable": lambda: (draw_series(draw, f), cable(either, total)),
        "cable then shunt": lambda: (cable(either, total), draw_shunt(draw, f)),
        "cable then transformer": lambda: (cable(either, total), Transformer(log_uniform(draw, 0.2, 9.0))),
        "transformer then 450 ohm": lambda: (cable(50.0, first), Transformer(9.0), cable(450.0, second)),
        "two-port then cable": lambda: (draw_two_port(draw, grid), cable(either, total)),
        "cable then two-port": lambda: (cable(either, total), draw_two_port(draw, grid)),
        "cable by delay": lambda: (cable(either, total, by_delay=True),),
        "two cables by delay": lambda: (cable(50.0, first, by_delay=True), cable(either, second, by_delay=True)),
        "lumped between cables": lambda: (
            cable(50.0, first),
            draw.choice([draw_series, draw_shunt])(draw, f),
            cable(either, second),
        ),
        "two-port between cables": lambda: (cable(50.0, first), draw_two_port(draw, grid), cable(either, second)),
    }[kind]()


def described_loss_db(sections, frequency_hz):
    """Loss of the cables by their law's asymptote, in doubles: enough to choose cases by."""
    f_mhz = frequency_hz / 1e6
    return sum(
        s.length_m / 100 * (s.conductor_loss * math.sqrt(f_mhz) + s.dielectric_loss * f_mhz + s.floor_loss)
        for s in sections
        if isinstance(s, Cable)
    )


def draw_antenna(draw):
    """An antenna impedance of 5 to 2,000 ohm, up to 85 degrees away from a resistance."""
    return cmath.rect(log_uniform(draw, 5, 2000), math.radians(draw.uniform(-85, 85)))


def draw_case(draw, kind):
    """A case of one kind, drawn again until its cables lose 0.35 dB or more at every point."""
    while True:
        grid = draw_grid(draw)
        sections = draw_sections(draw, kind, grid)
        if described_loss_db(sections, grid[0]) > 0.35:
            break
    return Case(
        kind, sections, draw.choice([20.0, draw.uniform(-25, 45), draw.uniform(-25, 45)]),
        draw.choice([50.0, 50.0, 75.0]), grid, tuple(draw_antenna(draw) for _ in grid),
    )  # fmt: skip


def draw_cases(rounds=5, seed=SEED):
    """All cases: each kind `rounds` times."""
    draw = random.Random(seed)
    return [draw_case(draw, kind) for _ in range(rounds) for kind in KINDS]
