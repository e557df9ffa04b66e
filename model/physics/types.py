"""The one number type of the formulas: a float, or a numpy array of floats, and the functions that keep it so."""

from __future__ import annotations

from typing import Any, TypeAlias

import numpy as np
from numpy.typing import NDArray

Real: TypeAlias = float | NDArray[np.float64]
"""What every formula takes and gives. A result for floats may be a ``numpy.float64``, which is a float."""


def real(value: Any) -> Real:
    """Give the result of a numpy function its type; numpy's own annotations lose it.

    Args:
        value: What a numpy function returned for `Real` arguments.

    Returns:
        The same object.
    """
    result: Real = value
    return result
