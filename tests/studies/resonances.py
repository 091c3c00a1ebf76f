"""
Are the resonances of noisy de-embedded sweeps the antenna's own: as many, of the same kinds?

    python -m tests.studies.resonances [SEED] [SWEEPS]

Antennas of the method-of-moments tables and a resistive load, through runs of three losses simulated by
tests/simulated, with white noise on Re and Im of the shack-end reflection. A sweep scores when the kinds of its
resonances, in rising frequency, are those of the noise-free table. Results stand in docs/validation.md.
"""

import sys
from itertools import product

import numpy as np

import feedpoint
from tests.simulated.simulator import antenna_impedance, load_antenna, shack_reflection

POINTS = 401
NOISES = (3e-4, 1e-3)
# One-way matched loss in the middle of the sweep [dB].
LOSSES_DB = (0.2, 1.5, 5.0)
ENDS_HZ = {
    "dipole_20m": (12e6, 16e6),
    "vertical_40m": (6.4e6, 7.8e6),
    "offcentre_dipole": (1e6, 30e6),
    "beam_2m": (140e6, 150e6),
    "75 ohm": (1e6, 30e6),
}
Z0_OHM, VELOCITY_FACTOR, LENGTH_M = 50.0, 0.66, 30.0


def kinds_in_truth(name: str) -> list[str]:
    """Kinds of the resonances of a table, from a grid so dense that nothing is missed."""
    if name not in ENDS_HZ or name == "75 ohm":
        return []
    reactance = antenna_impedance(load_antenna(name), np.linspace(*ENDS_HZ[name], 100_001)).imag
    changes = np.flatnonzero(np.sign(reactance[1:]) != np.sign(reactance[:-1]))
    return ["series" if reactance[change + 1] > reactance[change] else "parallel" for change in changes]


def wilson(right: int, n: int) -> tuple[float, float]:
    """95 % bounds of a proportion (Wilson 1927)."""
    z = 1.959964
    middle, half = right / n + z * z / (2 * n), z * np.sqrt(right / n * (1 - right / n) / n + (z / (2 * n)) ** 2)
    return (middle - half) / (1 + z * z / n), (middle + half) / (1 + z * z / n)


def score(name: str, loss_db: float, noise: float, rng: np.random.Generator, sweeps: int) -> int:
    """Number of sweeps whose resonances have the kinds of the table's."""
    frequency = np.linspace(*ENDS_HZ[name], POINTS)
    conductor = loss_db / LENGTH_M * 100.0 / np.sqrt(frequency.mean() / 1e6)
    cable = {"z0_ohm": Z0_OHM, "velocity_factor": VELOCITY_FACTOR, "length_m": LENGTH_M, "conductor_loss": conductor}
    clean = shack_reflection(
        75.0 + 0j if name == "75 ohm" else load_antenna(name), [cable | {"dielectric_loss": 0.0}], frequency
    )
    sheet = "\n".join(f"{key} = {float(value)!r}" for key, value in cable.items())
    run = feedpoint.parse_run_sheet(f"[[section]]\n{sheet}\n")
    truth, right = kinds_in_truth(name), 0
    for _ in range(sweeps):
        gamma = clean + noise * (rng.standard_normal(POINTS) + 1j * rng.standard_normal(POINTS))
        resonances = feedpoint.deembed(feedpoint.Sweep(frequency, gamma), run).landmarks.resonances
        right += [resonance.kind for resonance in resonances] == truth
    return right


def main(seed: int, sweeps: int) -> None:
    rng = np.random.default_rng(seed)
    print(f"seed {seed}, {sweeps} sweeps of {POINTS} points in each class")
    for name, loss_db, noise in product(ENDS_HZ, LOSSES_DB, NOISES):
        right = score(name, loss_db, noise, rng, sweeps)
        low, high = wilson(right, sweeps)
        print(f"{name:<18}{loss_db:5.1f} dB  noise {noise:.0e}  right {right}/{sweeps}  ({low:.2f} to {high:.2f})")


if __name__ == "__main__":
    given = [int(word) for word in sys.argv[1:]]
    main(*(given + [1, 100][len(given) :]))
