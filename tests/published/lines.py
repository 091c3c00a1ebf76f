"""
The lines of textbooks, as the package's own cable sections, and what is read at their two ends.

A textbook states a line in one of three ways: lossless, with a length in wavelengths; by its propagation constant and
characteristic impedance; by its series and shunt constants. Each is put into the figures of a `CableSection` here, so
that the examples run through the public `embed` and `deembed`. Everything is at one frequency, where the choice of the
terms is free: the floor term is a series resistance without reactance, the dielectric term a shunt conductance.
"""

from math import log, pi, sqrt

import numpy as np

import feedpoint
from feedpoint.assumed import Assumed
from feedpoint.line.propagation import propagation_and_impedance

SPEED_OF_LIGHT = 299_792_458.0
NEPER_PER_METRE = 100.0 * 20.0 / log(10.0)  # dB/100 m of 1 Np/m
DECIBELS_PER_NEPER = 20.0 / log(10.0)
FREQUENCY_HZ = 10e6
"""Where an example names none; nothing depends on it."""


def lossless_line(z0_ohm, wavelengths):
    """Section without loss, so many wavelengths long."""
    velocity_factor = 0.66
    length_m = wavelengths * velocity_factor * SPEED_OF_LIGHT / FREQUENCY_HZ
    return _cable(z0_ohm, velocity_factor, length_m, feedpoint.LossLaw(0.0))


def distortionless_line(z0_ohm, loss_db, wavelengths=0.37):
    """Section with a real characteristic impedance: conductor and dielectric take half of the loss [dB] each."""
    velocity_factor = 0.66
    length_m = wavelengths * velocity_factor * SPEED_OF_LIGHT / FREQUENCY_HZ
    half = loss_db / length_m * 100.0 / 2.0
    return _cable(z0_ohm, velocity_factor, length_m, feedpoint.LossLaw(0.0, half / (FREQUENCY_HZ / 1e6), half))


def line_of_constants(r, inductance_h, g, c, length_m, frequency_hz=FREQUENCY_HZ):
    """Section with R [ohm/m], L [H/m], G [S/m] and C [F/m]."""
    high_frequency_ohm = sqrt(inductance_h / c)
    velocity_factor = 1.0 / (SPEED_OF_LIGHT * sqrt(inductance_h * c))
    floor = NEPER_PER_METRE * r / (2.0 * high_frequency_ohm)
    dielectric = NEPER_PER_METRE * g * high_frequency_ohm / 2.0 / (frequency_hz / 1e6)
    return _cable(high_frequency_ohm, velocity_factor, length_m, feedpoint.LossLaw(0.0, dielectric, floor))


def line_of_propagation(gamma_per_m, z0_ohm, length_m, frequency_hz=FREQUENCY_HZ):
    """Section with propagation constant [Np/m + j rad/m] and complex characteristic impedance [ohm]."""
    series, shunt = gamma_per_m * z0_ohm, gamma_per_m / z0_ohm
    angular = 2.0 * pi * frequency_hz
    return line_of_constants(
        series.real, series.imag / angular, shunt.real, shunt.imag / angular, length_m, frequency_hz
    )


def propagation_of(section, frequency_hz=FREQUENCY_HZ):
    """Propagation constant [Np/m + j rad/m] and characteristic impedance [ohm] that the package finds for a section."""
    gamma, z0 = propagation_and_impedance(
        np.array([frequency_hz]), section.z0_ohm.value, section.velocity_factor.value, section.loss.value, 20.0
    )
    return complex(gamma[0]), complex(z0[0])


def carried_to_shack(load_ohm, *sections, frequency_hz=FREQUENCY_HZ, reference_ohm=50.0):
    """Result of `embed` for an impedance [ohm] at the antenna terminals of sections, shack end first."""
    sweep = feedpoint.Sweep.from_impedance([frequency_hz], [load_ohm], reference_ohm=reference_ohm)
    return feedpoint.embed(sweep, feedpoint.Run(sections))


def carried_to_antenna(input_ohm, *sections, frequency_hz=FREQUENCY_HZ, reference_ohm=50.0):
    """Result of `deembed` for an impedance [ohm] at the shack end of sections, shack end first."""
    sweep = feedpoint.Sweep.from_impedance([frequency_hz], [input_ohm], reference_ohm=reference_ohm)
    return feedpoint.deembed(sweep, feedpoint.Run(sections))


def input_ohm(load_ohm, *sections, **at):
    """Impedance [ohm] at the shack end."""
    return complex(carried_to_shack(load_ohm, *sections, **at).planes.impedance_ohm[0, 0])


def load_ohm(seen_ohm, *sections, **at):
    """Impedance [ohm] at the antenna terminals, from the one at the shack end."""
    return complex(carried_to_antenna(seen_ohm, *sections, **at).impedance_ohm[0])


def total_loss_db(load_ohm, *sections, **at):
    """Total loss [dB] of sections with a load [ohm]."""
    return float(carried_to_shack(load_ohm, *sections, **at).columns["total_loss_db"][0])


def polar(magnitude, angle_deg):
    """Complex number of a magnitude and an angle [degrees]."""
    return magnitude * np.exp(1j * np.deg2rad(angle_deg))


def degrees(value):
    """Angle of a complex number [degrees]."""
    return float(np.degrees(np.angle(value)))


def _cable(z0_ohm, velocity_factor, length_m, law):
    return feedpoint.CableSection(
        "line", Assumed(float(z0_ohm)), Assumed(velocity_factor), Assumed(float(length_m)), Assumed(law)
    )
