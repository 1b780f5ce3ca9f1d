"""The names that registries would hand to the reader."""

from __future__ import annotations

from envcheck.model.names import Names
from envcheck.read.materials import categories

NAMES = Names(
    methods=("series", "parallel_path", "isothermal_planes"),
    categories=tuple(categories()),
    findings=("drawn-not-entered", "declared-differs"),
)
