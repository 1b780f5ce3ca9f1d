"""Two records held against each other field by field: numbers by value, not by their spelling."""

from __future__ import annotations

import math
from collections.abc import Iterator, Mapping, Sequence
from itertools import pairwise

from envcheck.model.compared import Difference
from envcheck.model.details import Detail
from envcheck.model.layers import Bridge, Fasteners, Layer, Material
from envcheck.model.project import Declared

SAME = 1e-9
"""Share by which two numbers may differ and still be one number typed in two units."""
PASSED_OVER = frozenset({"line", "text", "columns", "rows", "seen", "quantity", "sha256"})
"""Places in the file, and what follows from other fields."""
STACKS = frozenset({"layers", "walls", "floor"})
"""Fields whose parts stand in order, outside first."""
QUANTITIES = {
    **dict.fromkeys(
        ("thickness", "web", "flange", "lip", "product_thickness", "width", "spacing", "shell",
         "least", "greatest", "diameter", "penetration", "frame_width", "left", "right", "bottom",
         "top", "panes", "stock", "wall_thickness", "along", "up", "through", "inner_radius",
         "outer_radius", "middle"), "thickness",
    ),
    **dict.fromkeys(
        ("perimeter", "depth_below_grade", "insulated_depth", "wall_height", "extent", "edge",
         "length", "altitude", "elevation", "height", "depth", "run"), "run",
    ),
    **dict.fromkeys(("net_area", "gross_area", "below_grade_area", "area"), "area"),
    **dict.fromkeys(
        ("resistance", "label", "installed_label", "cell_resistance", "outside_film",
         "inside_film", "film", "ground_resistance"), "resistance",
    ),
    **dict.fromkeys(
        ("share", "web_share", "joint_share", "grouted_share", "renewed", "framing_share"),
        "share",
    ),
    **dict.fromkeys(("u_factor", "u", "wall_u"), "u_factor"),
    **dict.fromkeys(
        ("indoor_temperature", "outdoor_temperature", "mean_temperature"), "temperature"
    ),
    "conductivity": "conductivity", "soil_conductivity": "conductivity", "density": "density",
    "specific_heat": "specific_heat", "weight": "area_weight", "psi": "linear_transmittance",
    "tilt": "angle", "hdd18": "degree_days", "hdd65": "degree_days", "hdd17": "degree_days",
    "hdd20": "degree_days", "cdd10": "degree_days", "cdd50": "degree_days",
}  # fmt: skip
"""Field -> quantity of its number."""


def same(one: object, other: object) -> bool:
    """Whether two values are the same; numbers within :data:`SAME`."""
    if isinstance(one, bool) or isinstance(other, bool):
        return one is other
    if isinstance(one, int | float) and isinstance(other, int | float):
        return math.isclose(one, other, rel_tol=SAME, abs_tol=1e-12) or (
            one != one and other != other
        )
    if isinstance(one, tuple) and isinstance(other, tuple):
        if getattr(one, "_fields", None) != getattr(other, "_fields", None):
            return False
        return not any(True for _ in _pairs_that_differ(one, other))
    return one == other


def _pairs_that_differ(one: tuple[object, ...], other: tuple[object, ...]) -> Iterator[str]:
    names = getattr(one, "_fields", None)
    if names is None:
        if len(one) != len(other) or not all(map(same, one, other)):
            yield ""
        return
    for name, a, b in zip(names, one, other, strict=True):
        if name not in PASSED_OVER and not same(a, b):
            yield name


def of_records(
    kind: str, name: str, before: object, after: object, where: tuple[str, ...] = ()
) -> Iterator[Difference]:
    """Give every field of a record in which two of the same kind differ.

    kind, name, where: of the :class:`Difference`. A material and a detail within an assembly
    differ here only where another one is named; their own fields are compared where they stand.
    """
    names: Sequence[str] = getattr(before, "_fields", ())
    for field in names:
        a, b = getattr(before, field), getattr(after, field)
        if field in PASSED_OVER or same(a, b):
            continue
        yield from _of_field(kind, name, before, field, a, b, where)


def _of_field(
    kind: str, name: str, owner: object, field: str, a: object, b: object, where: tuple[str, ...]
) -> Iterator[Difference]:
    if isinstance(a, Material | Detail) or isinstance(b, Material | Detail):
        if getattr(a, "id", None) != getattr(b, "id", None):
            yield Difference(kind, name, where, field, "changed", a, b)
        return
    if _is_record(a) and type(a) is type(b):
        yield from of_records(kind, name, a, b, (*where, field))
        return
    if _holds_records(a) or _holds_records(b):
        assert isinstance(a, tuple)
        assert isinstance(b, tuple)
        aligned = in_order if field in STACKS else by_name
        for one, other in aligned(a, b):
            yield from _of_parts(kind, name, where, field, one, other)
        return
    quantity = _quantity(owner, field)
    what = "added" if a in (None, "") else "dropped" if b in (None, "") else "changed"
    yield Difference(kind, name, where, field, what, a, b, quantity)


def _of_parts(
    kind: str, name: str, where: tuple[str, ...], field: str, one: object, other: object
) -> Iterator[Difference]:
    """Differences of two parts that stand for each other; one of them may be missing."""
    if one is None or other is None:
        what = "added" if one is None else "dropped"
        yield Difference(kind, name, (*where, label(one or other)), "", what, one, other)
    elif type(one) is not type(other):
        yield Difference(kind, name, (*where, label(one)), "", "replaced", one, other)
    elif field in STACKS and same(one, other):
        yield Difference(kind, name, (*where, label(one)), "", "moved", one, other)
    else:
        yield from of_records(kind, name, one, other, (*where, label(other)))


def label(part: object) -> str:
    """What a part is called within its record."""
    for field in ("title", "tag", "name", "layer", "id", "ruleset", "clause", "assembly"):
        found = getattr(part, field, None)
        if isinstance(found, str) and found:
            return found
    return ""


def _quantity(owner: object, field: str) -> str:
    if isinstance(owner, Declared) and field == "value":
        return owner.quantity
    if isinstance(owner, Bridge):
        return {"value": owner.value_quantity, "amount": owner.amount_quantity}.get(field, "")
    if isinstance(owner, Fasteners) and field == "density":
        return "per_area"
    return QUANTITIES.get(field, "")


def _is_record(value: object) -> bool:
    return hasattr(value, "_fields")


def _holds_records(value: object) -> bool:
    return isinstance(value, tuple) and not _is_record(value) and any(map(_is_record, value))


# ------------------------------------------------------------------------------------ alignment

Pairs = list[tuple[object, object]]


def by_name(one: Sequence[object], other: Sequence[object]) -> Pairs:
    """Pair parts of the same name, those of one name in their order; give pairs that differ."""
    waiting: dict[str, list[object]] = {}
    for part in other:
        waiting.setdefault(label(part), []).append(part)
    pairs: Pairs = []
    for part in one:
        found = waiting.get(label(part))
        pairs.append((part, found.pop(0) if found else None))
    kept = {id(b) for _, b in pairs}
    pairs += [(None, part) for part in other if id(part) not in kept]
    return [(a, b) for a, b in pairs if a is None or b is None or not same(a, b)]


def in_order(one: Sequence[Layer], other: Sequence[Layer]) -> Pairs:
    """Pair layers so that their order is kept and most alike stand together.

    Layers that are left between the same neighbours replace each other; one that is only left at
    another place has moved. Gives pairs that differ.
    """
    matched = [(-1, -1), *_alignment(one, other), (len(one), len(other))]
    found: Pairs = []
    for (i, j), (k, m) in pairwise(matched):
        left, right = list(one[i + 1 : k]), list(other[j + 1 : m])
        both = min(len(left), len(right))
        found += zip(left[:both], right[:both], strict=True)
        found += [(layer, None) for layer in left[both:]]
        found += [(None, layer) for layer in right[both:]]
        if k < len(one) and m < len(other) and not same(one[k], other[m]):
            found.append((one[k], other[m]))
    return _with_moves(found)


def _with_moves(pairs: Pairs) -> Pairs:
    """Make one pair of a layer that was dropped here and added there."""
    added = [b for a, b in pairs if a is None]
    found: Pairs = []
    moved: list[object] = []
    for a, b in pairs:
        twin = next((x for x in added if b is None and same(a, x)), None)
        if twin is not None:
            added.remove(twin)
            moved.append(twin)
        found.append((a, twin) if twin is not None else (a, b))
    return [(a, b) for a, b in found if a is not None or not any(b is x for x in moved)]


def _alignment(one: Sequence[Layer], other: Sequence[Layer]) -> list[tuple[int, int]]:
    """Pairs of places in order with the greatest sum of likeness (dynamic programming)."""
    best = [[0] * (len(other) + 1) for _ in range(len(one) + 1)]
    for i in range(len(one) - 1, -1, -1):
        for j in range(len(other) - 1, -1, -1):
            alike = _alike(one[i], other[j])
            together = alike + best[i + 1][j + 1] if alike else 0
            best[i][j] = max(together, best[i + 1][j], best[i][j + 1])
    pairs, i, j = [], 0, 0
    while i < len(one) and j < len(other):
        alike = _alike(one[i], other[j])
        if alike and best[i][j] == alike + best[i + 1][j + 1]:
            pairs.append((i, j))
            i, j = i + 1, j + 1
        elif best[i][j] == best[i + 1][j]:
            i += 1
        else:
            j += 1
    return pairs


def _alike(one: Layer, other: Layer) -> int:
    """Likeness of two layers; 0 where they cannot be the same one."""
    if same(one, other):
        return 9
    if type(one) is not type(other):
        return 0
    first, second = getattr(one, "material", None), getattr(other, "material", None)
    material = first is not None and second is not None and first.id == second.id
    return 1 + 4 * (one.title == other.title) + 3 * material


def of_tables(
    kind: str, before: Mapping[str, object], after: Mapping[str, object]
) -> Iterator[Difference]:
    """Records by name: those added, dropped, and the fields of those in both that differ."""
    for name, record in before.items():
        if name not in after:
            yield Difference(kind, name, (), "", "dropped", record, None)
        else:
            yield from of_records(kind, name, record, after[name])
    for name, record in after.items():
        if name not in before:
            yield Difference(kind, name, (), "", "added", None, record)
