"""The library: generic materials, steel profiles and categories, from CSV files of the package.

Rows are held as text and turned into objects only when a project asks for them.
"""

from __future__ import annotations

import csv
from functools import lru_cache
from pathlib import Path
from typing import NamedTuple

from envcheck.model.project import Material, Profile

DATA = Path(__file__).parent.parent / "data"


class Category(NamedTuple):
    """One of envcheck's own categories of elements."""

    id: str
    title: str
    group: str
    metric: str


@lru_cache(maxsize=8)
def rows(name: str) -> dict[str, dict[str, str]]:
    """Rows of a data file by id, all text."""
    with (DATA / f"{name}.csv").open(encoding="utf-8", newline="") as lines:
        reader = csv.reader(lines)
        head = next(reader)
        return {row[0]: dict(zip(head, row, strict=True)) for row in reader if row}


def material_ids() -> tuple[str, ...]:
    """Ids of all materials of the library."""
    return tuple(rows("materials"))


@lru_cache(maxsize=512)
def library_material(name: str) -> Material | None:
    """Give a material of the library; None for an unknown id."""
    row = rows("materials").get(name)
    if row is None:
        return None
    stated = row["conductivity"]
    conductivity = float(stated) if stated else float(row["thickness"]) / float(row["resistance"])
    return Material(
        id=name,
        title=row["title"],
        conductivity=conductivity,
        density=_number(row["density"]),
        specific_heat=_number(row["specific_heat"]),
        material_class=row["class"],
        source=row["source"],
        evidence="table",
        combustible=row["combustible"] == "true",
        band=(float(row["low"]), float(row["high"])),
        mu=_number(row["mu"]),
        mu_source=row["mu_source"],
    )


@lru_cache(maxsize=32)
def class_band(name: str) -> tuple[float, float] | None:
    """Usual conductivities of a class of materials, W/(m K); None for a class without."""
    row = rows("material_classes").get(name)
    return None if row is None else (float(row["low"]), float(row["high"]))


def profile_ids() -> tuple[str, ...]:
    """Ids of all steel profiles of the library."""
    return tuple(rows("steel_profiles"))


@lru_cache(maxsize=256)
def library_profile(name: str) -> Profile | None:
    """Give a steel profile of the library; None for an unknown id."""
    row = rows("steel_profiles").get(name)
    if row is None:
        return None
    return Profile(
        id=name,
        web=float(row["web"]),
        flange=float(row["flange"]),
        thickness=float(row["thickness"]),
        lip=_number(row["lip"]) or 0.0,
        shape=row["shape"],
        source=row["source"],
    )


@lru_cache(maxsize=1)
def categories() -> dict[str, Category]:
    """All categories by id."""
    return {
        name: Category(name, row["title"], row["group"], row["metric"])
        for name, row in rows("categories").items()
    }


def _number(text: str) -> float | None:
    return float(text) if text else None
