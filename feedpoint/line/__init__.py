"""
Physics of lines and two-ports: arrays in, arrays out.

Nothing here knows files, sweeps or runs. Frequencies are arrays of shape (F,), drawn parameters have shape (T, 1), and
results broadcast to (T, F) or (F,). The time factor is exp(+j w t): inductive reactance is positive.
"""

from typing import TypeAlias, TypeVar

import numpy as np
from numpy.typing import NDArray

RealArray: TypeAlias = NDArray[np.float64]
ComplexArray: TypeAlias = NDArray[np.complex128]
AnyArray = TypeVar("AnyArray", RealArray, ComplexArray)

# A parameter that is one number, or one number per trial with shape (T, 1).
RealLike: TypeAlias = float | RealArray


def read_only(array: AnyArray) -> AnyArray:
    """Return the array, which nobody can write to any more: records hand out their arrays, not copies."""
    array.setflags(write=False)
    return array
