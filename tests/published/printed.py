"""What a source prints, with the precision that its digits carry."""

import pytest


def printed(text):
    """A printed number, rounded: known to half a unit of its last digit."""
    return pytest.approx(float(text), abs=_unit(text) / 2.0 * (1.0 + 1e-9))


def _unit(text):
    _, _, decimals = text.partition(".")
    return 10.0 ** -len(decimals)
