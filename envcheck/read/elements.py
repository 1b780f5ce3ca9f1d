"""Surfaces and elements: amounts, hosts and openings, and what refers to elements."""

from __future__ import annotations

from collections import defaultdict
from collections.abc import Iterable, Mapping
from typing import Any

from envcheck.model.project import Bridge, Element, ExceptionClaim, Fact, Opening, Surface
from envcheck.read.assemblies import bridge, linear, read_declared
from envcheck.read.context import Context
from envcheck.read.materials import categories
from envcheck.read.yaml_reader import Entry
from envcheck.units import UnitError, parse, quantity_of

TILTS = {
    "wall": 90.0,
    "door": 90.0,
    "fenestration": 90.0,
    "roof": 0.0,
    "floor": 180.0,
    "slab": 180.0,
}
SKYLIGHT = "fenestration.skylight"


def read_surface(
    context: Context, name: str, entry: Entry, elements: Mapping[str, Entry]
) -> Surface:
    """Read a facade, roof or floor as drawn."""
    gross = context.positive(entry, "gross_area", "area")
    below = 0.0
    if "below_grade_area" in entry:
        below = context.not_negative(entry, "below_grade_area", "area")
    if below > gross:
        found = f"{entry['below_grade_area']} of {entry['gross_area']}"
        context.add("below-grade-over-gross", entry.lines["below_grade_area"], found=found)
    return Surface(
        name=name,
        sheet=entry.get("sheet", ""),
        gross_area=gross,
        below_grade_area=below,
        kind=entry["kind"],
        shows=tuple(
            _opening(context, tag, shown, elements) for tag, shown in entry.get("shows", {}).items()
        ),
        line=entry.line,
        adjoins=entry.get("adjoins", "outdoors"),
        space_category=entry.get("space_category", ""),
    )


def _opening(context: Context, tag: str, shown: Any, elements: Mapping[str, Entry]) -> Opening:
    if not isinstance(shown, Entry):
        return Opening(tag, float(shown))
    host = shown.get("host", "")
    if host and host not in elements:
        context.unknown("unknown-element", shown.lines["host"], host, elements)
    area = context.optional(shown, "area", "area")
    return Opening(tag, float(shown["count"]), area, host)


def read_facts(entry: Entry) -> tuple[Fact, ...]:
    """Read facts: true and false become the words yes and no, quantities SI numbers."""
    facts = []
    for name, stated in entry.items():
        whole = isinstance(stated, Entry)
        value = stated["value"] if whole else stated
        sheet = stated.get("sheet", "") if whole else ""
        facts.append(Fact(name, _fact_value(value), sheet, entry.lines[name]))
    return tuple(facts)


def _fact_value(value: Any) -> str | float:
    if isinstance(value, bool):
        return "yes" if value else "no"
    if isinstance(value, (int, float)):
        return float(value)
    quantity = quantity_of(value.partition(" ")[2])
    try:
        if quantity:
            return parse(value, quantity)
    except UnitError:
        pass
    return str(value)


# ------------------------------------------------------------------------------------ elements


def read_element(
    context: Context, tag: str, entry: Entry, assemblies: Iterable[str], surfaces: Iterable[str]
) -> Element:
    """Read one element; net areas that follow from openings come in :func:`with_openings`."""
    _refer(context, entry, "assembly", assemblies)
    _refer(context, entry, "surface", surfaces)
    category = entry["category"]
    if category not in context.names.categories:
        known = context.names.categories
        context.unknown("unknown-category", entry.lines["category"], category, known)
    net, gross, perimeter, count = _amount(context, entry, category)
    return Element(
        tag=tag,
        assembly=entry["assembly"],
        category=category,
        sheet=entry.get("sheet", ""),
        surface=entry.get("surface", ""),
        line=entry.line,
        net_area=net,
        gross_area=gross,
        perimeter=perimeter,
        count=count,
        host=entry.get("host", ""),
        adjoins=entry.get("adjoins", "outdoors"),
        facing=entry.get("facing", ""),
        tilt=_tilt(context, entry, category),
        depth_below_grade=context.optional(entry, "depth_below_grade", "length"),
        insulated_depth=_depth(context, entry),
        renewed=context.share(entry, "renewed", whole=True) if "renewed" in entry else None,
        measured=entry.get("measured", "outside"),
        mean_with=entry.get("mean", ""),
        facts=read_facts(entry["facts"]) if "facts" in entry else (),
        bridges=tuple(_bridge(context, item) for item in entry.get("bridges", ())),
        note=entry.get("note", ""),
        wall_height=_wall_height(context, entry),
        existing=read_declared(context, entry["existing"]) if "existing" in entry else None,
    )


def _wall_height(context: Context, entry: Entry) -> float | None:
    """The height of a wall, no less than its depth below grade."""
    height = context.optional(entry, "wall_height", "length")
    deep = entry.get("depth_below_grade")
    if (
        height is not None
        and deep
        and context.number(entry, "depth_below_grade", "length") > height
    ):
        context.add(
            "too-thick",
            entry.lines["depth_below_grade"],
            found=deep,
            expected=f"at most {entry['wall_height']}",
            key="depth_below_grade",
            limit="the height of the wall",
        )
    return height


def _refer(context: Context, entry: Entry, key: str, known: Iterable[str]) -> None:
    name = entry.get(key)
    if name is not None and name not in known:
        context.unknown(f"unknown-{key}", entry.lines[key], name, known)


def _depth(context: Context, entry: Entry) -> float | None:
    depth = context.optional(entry, "insulated_depth", "length")
    whole = entry.get("depth_below_grade")
    if depth is not None and whole and depth > context.number(entry, "depth_below_grade", "length"):
        context.add(
            "too-thick",
            entry.lines["insulated_depth"],
            found=f"{entry['insulated_depth']} against {whole}",
            key="insulated_depth",
            limit="the depth below grade",
        )
    return depth


def _tilt(context: Context, entry: Entry, category: str) -> float:
    if "tilt" not in entry:
        return 0.0 if category == SKYLIGHT else TILTS.get(category.partition(".")[0], 90.0)
    tilt = context.number(entry, "tilt", "angle")
    if not 0 <= tilt <= 180 and tilt == tilt:
        hint = "0 deg is a flat roof, 90 deg a wall"
        context.out_of_range(entry, "tilt", "0 deg to 180 deg", hint)
    return tilt


_Amount = tuple[float | None, float | None, float | None, float | None]


def _amount(context: Context, entry: Entry, category: str) -> _Amount:
    """Give net area, gross area, perimeter and count; exactly one way of stating is allowed."""
    net = context.optional(entry, "net_area", "area")
    gross = context.optional(entry, "gross_area", "area")
    perimeter = context.optional(entry, "perimeter", "length")
    count = float(entry["count"]) if "count" in entry else None
    sized = [key for key in ("width", "height") if key in entry]
    ways = [key for key in ("net_area", "gross_area", "perimeter") if key in entry]
    if net is not None and gross is not None and net > gross:
        found = f"{entry['net_area']} net, {entry['gross_area']} gross"
        context.add("net-over-gross", entry.lines["net_area"], found=found)
    elif (
        len(ways) > 1 or (ways and sized) or (count is not None and ways not in ([], ["net_area"]))
    ):
        there = [*ways, *sized] if sized or len(ways) > 1 else [*ways, "count"]
        context.add("two-amounts", entry.lines[there[1]], found=" and ".join(there))
    elif not ways and not (len(sized) == 2 and count is not None):
        found = " and ".join([*sized, *(["count"] if count is not None else [])]) or "none"
        context.add("no-amount", entry.line, found=found)
    elif sized:
        width = context.positive(entry, "width", "length")
        net = (count or 0.0) * width * context.positive(entry, "height", "length")
    _check_measure(context, entry, category, ways)
    return net, gross, perimeter, count


def _check_measure(context: Context, entry: Entry, category: str, ways: list[str]) -> None:
    """Slab edges go by their length, everything else by area."""
    known = categories().get(category)
    if known is None or len(ways) != 1:
        return
    by_length = known.metric == "F_factor"
    if by_length != (ways == ["perimeter"]):
        context.add(
            "wrong-amount",
            entry.lines[ways[0]],
            found=ways[0],
            category=category,
            measure="perimeter" if by_length else "area",
            hint="give the perimeter" if by_length else "give net_area or gross_area",
        )


def _bridge(context: Context, entry: Entry) -> Bridge:
    """Read a bridge of one element: psi and a length, or chi and a count."""
    if entry["kind"] == "point":
        value = context.positive(entry, "chi", "point_transmittance")
        return bridge(context, entry, value, float(entry["count"]), per_area=False)
    value = linear(context, entry)
    length = context.positive(entry, "length", "length")
    return bridge(context, entry, value, length, per_area=False)


def with_openings(
    context: Context, elements: dict[str, Element], entries: dict[str, Any]
) -> dict[str, Element]:
    """Check hosts and take the openings off the gross area of the elements that hold them."""
    openings: dict[str, list[Element]] = defaultdict(list)
    for tag, element in elements.items():
        if not element.host:
            continue
        line = entries[tag].lines["host"]
        if element.host == tag:
            context.add("own-host", line, found=tag)
        elif element.host not in entries:
            context.unknown("unknown-element", line, element.host, entries)
        openings[element.host].append(element)
    done = dict(elements)
    for tag, element in elements.items():
        if element.gross_area is None or element.net_area is not None:
            continue
        held = sum(o.net_area or o.gross_area or 0.0 for o in openings[tag])
        net = element.gross_area - held
        if net <= 0:
            context.add(
                "openings-over-host",
                entries[tag].lines["gross_area"],
                found=f"{held:.4g} m2 of openings in {element.gross_area:.4g} m2",
                openings=", ".join(o.tag for o in openings[tag]),
            )
        done[tag] = element._replace(net_area=net)
    return done


def read_exception(context: Context, entry: Entry, elements: Iterable[str]) -> ExceptionClaim:
    """Read a claimed exception; a missing evidence file is for the judge to say."""
    _refer(context, entry, "element", elements)
    return ExceptionClaim(
        element=entry["element"],
        clause=entry["clause"],
        claimed_by=entry.get("claimed_by", ""),
        reason=entry.get("reason", ""),
        evidence=entry.get("evidence", ""),
        evidence_found="evidence" in entry and context.inside_folder(entry, "evidence"),
        line=entry.line,
    )
