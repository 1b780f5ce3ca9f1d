"""What an assembly says beside its layers: voids, rain, how it is bent. All numbers SI."""

from typing import NamedTuple


class Voids(NamedTuple):
    """Air voids in an insulating layer."""

    layer: str
    """Title of the layer."""
    level: int
    """0, 1 or 2 in the sense of ISO 6946."""
    line: int


class Inverted(NamedTuple):
    """Insulation above the waterproofing, which rain can pass."""

    layer: str
    """Title of the layer."""
    precipitation: float
    """Mean over the heating season, m/d."""
    drainage: float | None
    """f: share of the rain that reaches the waterproofing; None = by the standard's f x."""
    heat_loss: float | None
    """x, W d/(m2 K mm)"""
    source: str
    line: int


class Curved(NamedTuple):
    """How layers are bent; one of the radii is stated, the other follows."""

    shape: str
    """``cylinder`` or ``sphere``"""
    face: str
    """``inner`` or ``outer``: whose area the U-factor is of."""
    inner_radius: float
    """m, to the inner face of the innermost layer"""
    outer_radius: float
    """m, to the outer face of the outermost layer"""
    by_inner: bool
    """The inner radius is the stated one."""
