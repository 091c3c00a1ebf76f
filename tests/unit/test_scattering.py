"""Impedance and admittance matrices as scattering matrices, against scikit-rf's conversions."""

import numpy as np
import pytest
from skrf.network import s2a, y2s, z2s

from feedpoint.line.chain import scattering_chain
from feedpoint.line.scattering import (
    normalised_admittance,
    normalised_impedance,
    scattering_from_normalised_admittance,
    scattering_from_normalised_impedance,
)

REFERENCES = np.array([50.0, 75.0])
RNG = np.random.default_rng(11)
MATRICES = RNG.normal(size=(7, 2, 2)) * 40 + 1j * RNG.normal(size=(7, 2, 2)) * 40 + 60 * np.eye(2)


def test_impedance_matrices():
    ours = scattering_from_normalised_impedance(normalised_impedance(MATRICES, REFERENCES))
    assert ours == pytest.approx(z2s(MATRICES, REFERENCES), abs=1e-12)


def test_admittance_matrices():
    admittances = np.linalg.inv(MATRICES)
    ours = scattering_from_normalised_admittance(normalised_admittance(admittances, REFERENCES))
    assert ours == pytest.approx(y2s(admittances, REFERENCES), abs=1e-12)


def test_a_singular_matrix_has_an_infinite_result():
    singular = np.array([[[-1.0, 0.0], [0.0, 2.0]]], dtype=complex)
    assert np.isinf(scattering_from_normalised_impedance(singular)).all()


def test_chain_of_a_two_port_with_unequal_references():
    scattering = z2s(MATRICES, REFERENCES)
    chain = scattering_chain(scattering, *REFERENCES)
    matrices = s2a(scattering, REFERENCES)
    for place, element in (((0, 0), chain.a), ((0, 1), chain.b), ((1, 0), chain.c), ((1, 1), chain.d)):
        assert element == pytest.approx(matrices[:, place[0], place[1]], rel=1e-10)
