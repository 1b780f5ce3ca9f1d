"""Elementary functions that take floats and numpy arrays alike.

A float never loads numpy: an array brings it along.
"""

from __future__ import annotations

import math
from typing import Any, cast


def ln_of_one_plus(x: float) -> float:
    """Natural logarithm ln(1 + x), exact for small x too. x: above -1, any shape."""
    if isinstance(x, (int, float)):
        return math.log1p(x)
    import numpy as np

    return cast(float, np.log1p(x))


def ln(x: float) -> float:
    """Natural logarithm. x: above 0, any shape."""
    if isinstance(x, (int, float)):
        return math.log(x)
    import numpy as np

    return cast(float, np.log(x))


def least(x: float) -> float:
    """The least of all elements; a number is its own least."""
    return x if isinstance(x, (int, float)) else cast(float, cast(Any, x).min())


def greatest(x: float) -> float:
    """The greatest of all elements; a number is its own greatest."""
    return x if isinstance(x, (int, float)) else cast(float, cast(Any, x).max())


def larger(a: float, b: float) -> float:
    """The larger of two numbers, element by element."""
    return a * (a >= b) + b * (a < b)


def smaller(a: float, b: float) -> float:
    """The smaller of two numbers, element by element."""
    return a * (a <= b) + b * (b < a)
