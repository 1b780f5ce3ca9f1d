"""The names that registries would hand to the reader."""

from __future__ import annotations

from envcheck.model.names import Names
from envcheck.read.materials import categories

NAMES = Names(
    methods=("series", "parallel_path", "isothermal_planes"),
    categories=tuple(categories()),
    film_sets=("iso6946", "handbook"),
    findings=("drawn-not-entered", "declared-differs"),
)
