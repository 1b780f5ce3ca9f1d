"""Two editions cell by cell: what was added, removed or changed, and by what factor."""

from __future__ import annotations

from collections import defaultdict
from collections.abc import Iterable, Mapping

from envcheck import units
from envcheck.model.editions import CellChange
from envcheck.model.metrics import METRICS
from envcheck.model.ruleset import Limit

Key = tuple[str, tuple[str, ...], str, str, tuple[str, ...]]


def compare(old: Iterable[Limit], new: Iterable[Limit]) -> tuple[CellChange, ...]:
    """Every cell that differs, in the order of the new edition, those removed last."""
    before, after = _by_cell(old), _by_cell(new)
    found: list[CellChange] = []
    for key, limits in after.items():
        earlier = before.get(key, [])
        found += [_change(a, b) for a, b in zip(earlier, limits, strict=False) if not _same(a, b)]
        found += [CellChange("added", None, b, None, "") for b in limits[len(earlier) :]]
    for key, limits in before.items():
        later = len(after.get(key, ()))
        found += [CellChange("removed", a, None, None, "") for a in limits[later:]]
    return tuple(found)


def _by_cell(limits: Iterable[Limit]) -> Mapping[Key, list[Limit]]:
    """Limits by what they hold for; the table's name is left aside, editions number anew."""
    found: dict[Key, list[Limit]] = defaultdict(list)
    for x in limits:
        conditions = tuple(sorted(f"{c.dimension} {c.text}" for c in x.when))
        row = x.categories if x.row == x.zone else (x.row,)  # zones may stand down the sheet
        found[(x.zone, row, x.metric, x.path, conditions)].append(x)
    return found


def _same(a: Limit, b: Limit) -> bool:
    if _plain(a) != _plain(b):
        return False
    kept = ("kind", "unit", "sense", "applies_to", "threshold", "categories")
    return all(getattr(a, name) == getattr(b, name) for name in kept)


def _plain(limit: Limit) -> list[list[object]]:
    """Alternatives, a bare figure as one of the cavity."""
    return [
        [t._replace(role="") if t.role == "cavity" else t for t in alternative]
        for alternative in limit.alternatives
    ]


def _change(a: Limit, b: Limit) -> CellChange:
    first, second = _figure(a), _figure(b)
    if first is not None and second is not None and _roles(a) != _roles(b):
        return CellChange("changed", a, b, None, "")  # cavity and continuous are not one figure
    if first is None or second is None:
        if a.kind == b.kind:
            return CellChange("changed", a, b, None, "")
        words = {("no_requirement", "number"): "stricter", ("number", "no_requirement"): "weaker"}
        return CellChange("changed", a, b, None, words.get((a.kind, b.kind), ""))
    factor = second / first if first else None
    if second == first:
        return CellChange("changed", a, b, factor, "same figure")
    stricter = (second < first) == (b.sense == "max")
    return CellChange("changed", a, b, factor, "stricter" if stricter else "weaker")


def _roles(limit: Limit) -> set[str]:
    """What figures speak of beside the cavity, which is what a bare figure means."""
    return {t.role for a in limit.alternatives for t in a if t.number} - {"", "cavity"}


def _figure(limit: Limit) -> float | None:
    """The mildest alternative in SI; None where the cell holds no figure of its metric."""
    sums = [
        sum(term.number for term in alternative if not term.metric)
        for alternative in limit.alternatives
        if not any(term.band or term.metric for term in alternative)
    ]
    if limit.kind != "number" or not sums:
        return None
    value = min(sums) if limit.sense == "min" else max(sums)
    if not limit.unit:
        return value
    return units.to_si(value, limit.unit, METRICS[limit.metric].quantity)
