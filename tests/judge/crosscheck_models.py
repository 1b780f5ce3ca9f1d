"""Small model objects for the cross-checks; places, tags and limits are invented."""

from __future__ import annotations

from datetime import date
from typing import Any

from envcheck.judge.crosschecks import Check, Facts, checks
from envcheck.model.judged import Comparison, Finding, Line
from envcheck.model.project import (
    Assembly,
    Declared,
    Element,
    Fill,
    FramedLayer,
    Material,
    MaterialLayer,
    Member,
    Opening,
    Options,
    Profile,
    Project,
    Rated,
    ResistanceLayer,
    RuleSetChoice,
    Site,
    Surface,
)
from envcheck.model.ruleset import Conventions, Edition, Limit, RuleSet, Term, Zones
from envcheck.model.solved import (
    Beside,
    Counted,
    Node,
    Parallel,
    Properties,
    Resistor,
    Series,
    Setting,
    Solved,
)
from envcheck.units import parse, to_si

U_IP = "Btu/(h*ft2*degF)"
WOOD = Material("wood", "Softwood", 0.115)
STEEL = Material("steel", "Steel", 50.0)
WOOL = Material("wool", "Mineral wool", 0.0343, material_class="insulation")
XPS = Material("xps", "XPS", 0.0288, material_class="insulation")


def r(text: str) -> float:
    """m2 K/W of ``R-13``."""
    return parse(text, "resistance")


def u(value: float) -> float:
    """W/(m2 K) of a value in Btu/(h ft2 F)."""
    return to_si(value, U_IP)


def stud(
    label: str = "R-13",
    depth: str = "3.5 in",
    *,
    product: str | None = None,
    material: Material = WOOD,
    crosses: bool = False,
    title: str = "Studs",
    in_place: str | None = None,
) -> FramedLayer:
    profile = None
    if material is STEEL:
        profile = Profile("z", parse(depth, "length"), 0.025, 0.00137, shape="Z")
    thickness = parse(product, "length") if product else None
    return FramedLayer(
        "framed",
        title,
        1,
        thickness=parse(depth, "length"),
        member=Member(material, 0.038, parse("16 in", "length"), profile),
        fill=Fill(
            label=r(label),
            product_thickness=thickness,
            installed_label=r(in_place) if in_place else None,
        ),
        share=None,
        share_from="",
        extras=(),
        orientation="vertical",
        crosses_insulation=crosses,
    )


def board(resistance: str, title: str = "Board") -> ResistanceLayer:
    return ResistanceLayer("resistance", title, 1, r(resistance), 0.0, None, "", "")


def insulation(thickness: float, title: str = "XPS") -> MaterialLayer:
    return MaterialLayer("material", title, 1, XPS, thickness)


def assembly(name: str = "W1", declared: str = "", quantity: str = "u_factor", **more: Any) -> Any:
    fields: dict[str, Any] = {
        "kind": "layers",
        "title": f"Assembly {name}",
        "sheet": "A-501/1",
        "line": 1,
    }
    if declared:
        value = parse(declared, quantity)
        fields["declared"] = Declared(value, quantity, declared, "A-501/1")
    return Assembly(name, **(fields | more))


def rated(u_factor: float | None = 0.32, **more: Any) -> Rated:
    fields: dict[str, Any] = {
        "shgc": 0.36,
        "visible_transmittance": 0.5,
        "basis": "whole_product",
        "evidence": "label",
        "standard": "",
        "document": "",
    }
    return Rated(u_factor=None if u_factor is None else u(u_factor), **(fields | more))


def element(tag: str = "N-W1", of: str = "W1", area: float | None = 100.0, **more: Any) -> Element:
    fields: dict[str, Any] = {
        "category": "wall.steel_frame",
        "sheet": "A-201",
        "surface": "",
        "line": 1,
        "gross_area": None,
        "perimeter": None,
        "count": None,
        "host": "",
        "adjoins": "outdoors",
        "facing": "N",
        "tilt": 90.0,
        "depth_below_grade": None,
        "insulated_depth": None,
        "renewed": None,
        "measured": "outside",
        "mean_with": "",
        "facts": (),
        "bridges": (),
    }
    return Element(tag, of, net_area=area, **(fields | more))


def surface(name: str = "North", gross: float = 100.0, **shows: float | Opening) -> Surface:
    marks = tuple(
        mark if isinstance(mark, Opening) else Opening(tag, mark) for tag, mark in shows.items()
    )
    return Surface(name, "A-201", gross, 0.0, "wall", marks, 1)


def setting(method: str = "parallel_path", metric: str = "U_assembly", **more: Any) -> Setting:
    fields: dict[str, Any] = {
        "method_from": "Table 5",
        "refused": (),
        "weight": None,
        "direction": "horizontal",
        "outside_film": r("R-0.17"),
        "outside_film_from": "",
        "inside_film": r("R-0.68"),
        "inside_film_from": "",
        "cladding_film": r("R-0.68"),
        "conventions": "x",
    }
    return Setting(metric=metric, method=method, **(fields | more))


def solved(value: float | None, name: str = "W1", **more: Any) -> Solved:
    """A solution; ``value`` in W/(m2 K)."""
    fields: dict[str, Any] = {
        "setting": setting(),
        "clear": value,
        "missing": (),
        "low": None,
        "high": None,
        "bracket_note": "",
        "decided_by_bracket": False,
        "ratio": None,
        "beside": (),
        "tree": None,
        "steps": (),
        "counted": (),
        "assumptions": (),
        "cautions": (),
    }
    return Solved(assembly=name, value=value, **(fields | more))


def properties(**more: Any) -> Properties:
    fields: dict[str, Any] = {
        "heat_capacity": None,
        "heat_capacity_indoor": None,
        "weight": None,
        "weight_indoor": None,
        "missing": (),
        "framing": "steel",
        "cavity_resistance": None,
        "continuous_resistance": 0.0,
        "crossed": (),
        "bracketed": (),
        "label_sum": None,
        "combustible": (),
    }
    return Properties(**(fields | more))


def limit(text: str = "0.060", row: str = "walls", **more: Any) -> Limit:
    fields: dict[str, Any] = {
        "id": f"x/t1/z/{row}/U",
        "ruleset": "x",
        "table": "t1",
        "clause": "",
        "zone": "*",
        "label": row,
        "categories": ("wall.*",),
        "metric": "U_assembly",
        "sense": "max",
        "unit": U_IP,
        "cell": text,
        "kind": "number",
        "alternatives": ((Term(float(text), text),),),
        "when": (),
        "path": "",
        "applies_to": "",
        "notes": (),
        "src": "",
        "file": "",
        "line": 1,
    }
    return Limit(row=row, **(fields | more))


def comparison(value: float, of: str = "0.060", *, rounding: bool = False) -> Comparison:
    """A comparison in the printed unit; ``rounding`` compares the rounded value."""
    bound, decimals = float(of), len(of.partition(".")[2])
    compared = round(value, decimals) if rounding else value
    within = compared <= bound
    return Comparison(
        value,
        compared,
        bound,
        decimals,
        U_IP,
        "max",
        within,
        within and value > bound,
        bound - value,
    )


def line(tag: str = "N-W1", verdict: str = "fail", **more: Any) -> Line:
    fields: dict[str, Any] = {
        "ruleset": "x",
        "decides": True,
        "category": "wall.steel_frame",
        "metric": "U_assembly",
        "reasons": (),
        "limit": limit(),
        "solved": None,
        "comparison": None,
    }
    return Line(element=tag, verdict=verdict, **(fields | more))


def edition(name: str = "x", in_force: bool = True, **more: Any) -> Edition:
    fields: dict[str, Any] = {
        "title": "Ordinance",
        "edition": "2025",
        "clause": "",
        "effective_from": None,
        "effective_until": None,
        "sha256": "",
    }
    return Edition(name, in_force=in_force, **(fields | more))


def ruleset(**more: Any) -> RuleSet:
    fields: dict[str, Any] = {
        "id": "x",
        "title": "Invented ordinance",
        "jurisdiction": "nowhere",
        "status": "example",
        "invented": True,
        "checked_by": "",
        "chain": (edition(),),
        "units": "IP",
        "zones": Zones((), {}, {}, ""),
        "dimensions": {},
        "limits": (),
        "paths_clause": "",
        "compare": "rounded_to_printed_decimals",
        "rounding_clause": "1.6",
        "rounding_stated": True,
        "conventions": Conventions(),
        "area_limits": (),
        "averaging": (),
        "tradeoff": None,
        "trigger": None,
        "exceptions": (),
        "not_judged": (),
        "folder": "",
    }
    return RuleSet(**(fields | more))


def facts(
    assemblies: tuple[Assembly, ...] = (),
    elements: tuple[Element, ...] = (),
    surfaces: tuple[Surface, ...] = (),
    lines: tuple[Line, ...] = (),
    solutions: tuple[Solved, ...] = (),
    made_of: dict[str, Properties] | None = None,
    closings: tuple[Any, ...] = (),
    rules: RuleSet | None = None,
    **project: Any,
) -> Facts:
    fields: dict[str, Any] = {
        "file": "p.yaml",
        "title": "Invented house",
        "reference": "",
        "prepared_by": "",
        "permit_application_date": date(2026, 3, 2),
        "report_date": None,
        "scope": "new",
        "invented": "All of it.",
        "units": "IP",
        "site": Site("nowhere"),
        "facts": (),
        "rule_sets": (RuleSetChoice("x", True, 1),),
        "materials": {},
        "assemblies": {a.id: a for a in assemblies},
        "surfaces": {s.name: s for s in surfaces},
        "elements": {e.tag: e for e in elements},
        "exceptions": (),
        "options": Options(),
    }
    made = Project(**(fields | project))
    return Facts(
        made,
        {"x": rules or ruleset()},
        lines,
        made_of or {},
        {s.assembly: s for s in solutions},
        closings,
        (),
        (),
    )


def check(name: str) -> Check:
    return next(check for check in checks() if check.id == name)


def run(name: str, given: Facts) -> list[Finding]:
    """Findings of one check, found in the registry by its id."""
    found = list(check(name).run(given))
    assert all(finding.check == name for finding in found)
    return found


def path(title: str, *parts: tuple[str, float]) -> Series:
    nodes = tuple(Resistor(symbol, symbol, value) for symbol, value in parts)
    return Series(title, nodes, sum(value for _, value in parts))


def beside_each_other(*branches: tuple[float, Series]) -> Parallel:
    value = 1.0 / sum(share / branch.value for share, branch in branches)
    return Parallel("paths", tuple(s for s, _ in branches), tuple(b for _, b in branches), value)


__all__ = [
    "STEEL", "WOOD", "WOOL", "XPS", "Beside", "Counted", "Node", "Opening", "RuleSetChoice",
    "assembly", "beside_each_other", "board", "check", "comparison", "edition", "element", "facts",
    "insulation", "limit", "line", "path", "properties", "r", "rated", "ruleset", "run",
    "setting", "solved", "stud", "surface", "u",
]  # fmt: skip
