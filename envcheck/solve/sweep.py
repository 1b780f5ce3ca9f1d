"""One function over many variants, in blocks that stay in the processor's cache.

A formula on arrays writes a temporary array for each of its operations. Over a million variants
these would travel to memory and back each time; over a block of some thousand they stay near.
"""

from __future__ import annotations

from collections.abc import Callable
from typing import TYPE_CHECKING, Any

if TYPE_CHECKING:
    import numpy.typing as npt

BLOCK = 4096
"""Variants of one block: an array of them takes 32 KiB, and some dozens fit in a core's cache."""


def sweep(
    function: Callable[..., float], *numbers: npt.ArrayLike, block: int = BLOCK
) -> npt.NDArray[Any]:
    """Apply a function of this room to many variants at once.

    function: of as many numbers as are given, on floats or arrays alike, such as those of
    ``network``, ``wiring`` and ``methods``. numbers: arrays that broadcast against each other, SI.
    block: variants computed at once. Returns an array of the shape that they broadcast to, equal
    to ``function(*numbers)``. Errors: ValueError for shapes that do not broadcast, and what the
    function raises.
    """
    import numpy as np

    arrays = np.broadcast_arrays(*numbers)
    shape = arrays[0].shape
    flat = [array.reshape(-1) if array.flags.c_contiguous else array.ravel() for array in arrays]
    found = np.empty(flat[0].size)
    for start in range(0, found.size, block):
        part = slice(start, start + block)
        found[part] = function(*(array[part] for array in flat))
    return found.reshape(shape)
