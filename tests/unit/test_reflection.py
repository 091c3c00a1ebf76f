"""Reflection, impedance, SWR and return loss at the ends of their ranges."""

import numpy as np
import pytest

from feedpoint.line.reflection import (
    impedance_from_reflection,
    reflection_from_impedance,
    return_loss_db,
    swr_from_reflection,
)


def test_open_and_short_are_exact_in_both_directions():
    gamma = reflection_from_impedance(np.array([np.inf, complex(0, np.inf), 0.0]), 50.0)
    assert gamma.tolist() == [1.0, 1.0, -1.0]
    impedance = impedance_from_reflection(np.array([1.0, -1.0]), 50.0)
    assert impedance[0].real == np.inf
    assert impedance[0].imag == 0.0
    assert impedance[1] == 0.0


def test_minus_the_reference_has_an_infinite_reflection():
    gamma = reflection_from_impedance(np.array([-50.0]), 50.0)
    assert np.isinf(gamma.real[0])
    assert impedance_from_reflection(gamma, 50.0).tolist() == [-50.0]


def test_swr_and_return_loss_beyond_full_reflection():
    gamma = np.array([0.0, 1.0, 1.2, -1.0])
    assert swr_from_reflection(gamma).tolist() == [1.0, np.inf, np.inf, np.inf]
    loss = return_loss_db(gamma)
    assert loss[0] == np.inf
    assert loss[1] == 0.0
    assert not np.signbit(loss[1])
    assert loss[2] == pytest.approx(-1.5836, abs=5e-5)  # 20 log10 1.2 = 1.5836
