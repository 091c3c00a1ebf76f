"""
Terms of the loss law from the points that a datasheet prints.

Printed losses mean the true loss, the real part of the propagation constant, so the fit is not linear in the terms. The
sum of squared relative deviations is minimised over terms >= 0 by trying every set of terms that may be positive: two
terms have three such sets, three have seven, so no general solver is needed.
"""

from collections.abc import Iterator, Sequence
from dataclasses import replace
from itertools import combinations

import numpy as np

from feedpoint.line import RealArray
from feedpoint.line.loss_law import DB_PER_100M_PER_NEPER_PER_M, LAW_TEMPERATURE_C, LossLaw
from feedpoint.line.propagation import normalised_immittances, true_loss_db_per_100m
from feedpoint.units import HZ_PER_MHZ

CONDUCTOR, DIELECTRIC, FLOOR = range(3)

# Gauss-Newton converges quadratically on residuals of a few per cent: 5 steps reach rounding, the rest is reserve.
_MOST_STEPS = 40
# Relative change of the terms below which a further step cannot change a true loss by 1e-12.
_SETTLED = 1e-13
# Sum of squared relative deviations that is rounding: no printed loss is known to 1e-10.
_EXACT = 1e-20


def fit_loss_law(
    frequency_hz: Sequence[float] | RealArray,
    loss_db_per_100m: Sequence[float] | RealArray,
    velocity_factor: float,
    *,
    with_floor: bool = False,
) -> LossLaw:
    """
    Loss law whose true losses lie closest, in relative terms, to printed points.

    Minimises sum((K Re gamma(f_i)/y_i - 1)^2) over terms >= 0. One point alone is all conductor term. The floor term
    joins only on request: it describes copper-clad-steel conductors and would follow rounding errors elsewhere.

    Parameters
    ----------
    frequency_hz, loss_db_per_100m : N >= 1 positive numbers each [Hz], [dB/100 m], at 20 C
    velocity_factor : float
        High-frequency velocity over c of the cable.

    Returns
    -------
    LossLaw with `valid_hz` and `fit_residual` of the points. The characteristic impedance does not matter: it cancels
    in gamma.
    """
    frequency = np.asarray(frequency_hz, dtype=float)
    printed = np.asarray(loss_db_per_100m, dtype=float)
    terms: tuple[int, ...] = (CONDUCTOR, DIELECTRIC, FLOOR) if with_floor else (CONDUCTOR, DIELECTRIC)
    if frequency.size == 1:
        terms = (CONDUCTOR,)
    # Several sets of terms fit too few points exactly: their sums of squares differ by rounding, and the first wins.
    fits = _local_fits(frequency, printed, velocity_factor, terms)
    best = min(fits, key=lambda fit: max(fit[0], _EXACT))[1]
    conductor, dielectric, floor = best.tolist()
    law = LossLaw(conductor, dielectric, floor)
    residual = true_loss_db_per_100m(frequency, velocity_factor, law) / printed - 1.0
    valid_hz = (float(frequency.min()), float(frequency.max()))
    return replace(law, valid_hz=valid_hz, fit_residual=float(np.abs(residual).max()))


def _local_fits(
    frequency: RealArray, printed: RealArray, velocity_factor: float, terms: Sequence[int]
) -> Iterator[tuple[float, RealArray]]:
    """Sum of squares and terms (3,) of the best fit with each set of positive terms, where that fit is admissible."""
    for count in range(1, min(len(terms), frequency.size) + 1):
        for chosen in combinations(terms, count):
            fit = _fit_chosen(frequency, printed, velocity_factor, list(chosen))
            if np.all(fit >= 0.0):
                deviation, _ = _deviation_and_slopes(frequency, printed, velocity_factor, fit)
                yield float(deviation @ deviation), fit


def _fit_chosen(frequency: RealArray, printed: RealArray, velocity_factor: float, chosen: list[int]) -> RealArray:
    megahertz = frequency / HZ_PER_MHZ
    basis = np.stack([np.sqrt(megahertz), megahertz, np.ones_like(megahertz)], axis=-1)[:, chosen]
    terms = np.zeros(3)
    # Start: the law itself, which is linear in the terms, on the printed losses.
    terms[chosen] = np.linalg.lstsq(basis / printed[:, None], np.ones_like(printed), rcond=None)[0]
    deviation, slopes = _deviation_and_slopes(frequency, printed, velocity_factor, terms)
    for _ in range(_MOST_STEPS):
        step = np.zeros(3)
        step[chosen] = np.linalg.lstsq(slopes[:, chosen], -deviation, rcond=None)[0]
        tried, tried_slopes = _deviation_and_slopes(frequency, printed, velocity_factor, terms + step)
        while tried @ tried > deviation @ deviation and np.abs(step).max() > _SETTLED * np.abs(terms).max():
            step /= 2.0
            tried, tried_slopes = _deviation_and_slopes(frequency, printed, velocity_factor, terms + step)
        terms, deviation, slopes = terms + step, tried, tried_slopes
        if np.abs(step).max() <= _SETTLED * np.abs(terms).max():
            break
    return terms


def _deviation_and_slopes(
    frequency: RealArray, printed: RealArray, velocity_factor: float, terms: RealArray
) -> tuple[RealArray, RealArray]:
    """
    Relative deviation of the true loss from the printed one (N,), and its derivatives with respect to the terms (N, 3).

    gamma^2 = series * shunt, so d gamma = (shunt d series + series d shunt)/(2 gamma), with d series = 2 + 2j per unit
    of a_c and 2 per unit of a_0, and d shunt = 2 per unit of a_d.
    """
    conductor, dielectric, floor = terms.tolist()
    law = LossLaw(conductor, dielectric, floor)
    series, shunt = normalised_immittances(frequency, velocity_factor, law, LAW_TEMPERATURE_C)
    gamma = np.sqrt(series * shunt)
    megahertz = frequency / HZ_PER_MHZ
    slopes = np.stack(
        [
            (shunt * (1.0 + 1.0j) / gamma).real * np.sqrt(megahertz),
            (series / gamma).real * megahertz,
            (shunt / gamma).real,
        ],
        axis=-1,
    )
    return DB_PER_100M_PER_NEPER_PER_M * gamma.real / printed - 1.0, slopes / printed[:, None]
