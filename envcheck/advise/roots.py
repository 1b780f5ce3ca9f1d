"""Where a monotone function meets a target."""

from __future__ import annotations

from collections.abc import Callable

CLOSE = 1e-10
"""Relative width at which a root is found."""
MOST = 80


def root(
    function: Callable[[float], float], low: float, high: float, scale: float, close: float = CLOSE
) -> float:
    """Find x in [low, high] where ``function`` changes its sign, by false position with the
    Illinois step (Dowell and Jarratt 1971), which always keeps the root enclosed.

    scale: size of x against which closeness is measured; close: share of it.
    Errors: ValueError where the ends have the same sign.
    """
    at_low, at_high = function(low), function(high)
    if at_low == 0.0:
        return low
    if at_high == 0.0:
        return high
    if at_low * at_high > 0.0:
        raise ValueError("no change of sign")
    kept = 0
    for _ in range(MOST):
        if abs(high - low) <= close * scale:
            break
        x = (low * at_high - high * at_low) / (at_high - at_low)
        if not min(low, high) < x < max(low, high):
            x = (low + high) / 2.0
        y = function(x)
        if y == 0.0:
            return x
        if y * at_high > 0.0:
            high, at_high = x, y
            at_low = at_low / 2.0 if kept == 1 else at_low
            kept = 1
        else:
            low, at_low = x, y
            at_high = at_high / 2.0 if kept == -1 else at_high
            kept = -1
    return high
