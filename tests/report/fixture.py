"""A small judged project made by hand, one line for every verdict. Everything in it is invented."""

from __future__ import annotations

from datetime import date

from envcheck.model.judged import (
    Charge,
    Choice,
    Closing,
    Comparison,
    Finding,
    Group,
    Judged,
    Line,
    Part,
    PathResult,
    Ratio,
)
from envcheck.model.layers import (
    Fill,
    FramedLayer,
    Material,
    MaterialLayer,
    Member,
    Profile,
    ResistanceLayer,
)
from envcheck.model.project import (
    Assembly,
    Declared,
    Element,
    ExceptionClaim,
    Options,
    Project,
    RuleSetChoice,
    Site,
    Surface,
    ZoneStated,
)
from envcheck.model.ruleset import (
    ClassTest,
    Condition,
    Conventions,
    Edition,
    Limit,
    MethodRule,
    RuleSet,
    Term,
    Zones,
)
from envcheck.model.solved import (
    Beside,
    Caution,
    Counted,
    Operand,
    Parallel,
    Resistor,
    Series,
    Setting,
    Solved,
    Step,
)
from envcheck.units import to_si
from tests.changed import changed

R_UNIT = "h*ft2*degF/Btu"
U_UNIT = "Btu/(h ft2 F)"


def r(value: float) -> float:
    return to_si(value, R_UNIT)


def u(value: float) -> float:
    return to_si(value, "Btu/(h*ft2*degF)")


def ft2(value: float) -> float:
    return to_si(value, "ft2")


def part(tag: str, assembly: str, area: float, value: float, limit: float, verdict: str) -> Part:
    """Area in m2; value and limit in Btu/(h ft2 F)."""
    unit = "Btu/(h*ft2*degF)"
    return Part(
        tag, assembly, "U_assembly", area, u(value), u(limit), verdict, f"{limit:.3f}", unit
    )


# ------------------------------------------------------------------------------------ project


def assembly(name: str, title: str, sheet: str, declared: float | None = None) -> Assembly:
    stated = None
    if declared is not None:
        stated = Declared(u(declared), "u_factor", f"{declared} Btu/(h*ft2*degF)", sheet)
    return Assembly(name, "layers", title, sheet, 1, declared=stated)


def brick_wall() -> Assembly:
    """XPS, steel studs, gypsum board."""
    xps = Material("xps", "XPS", 0.0288, source="label")
    steel = Material("steel", "Steel", 50.0)
    stud = Profile("c_stud", to_si(3.625, "in"), to_si(1.625, "in"), to_si(0.0451, "in"))
    member = Member(steel, stud.flange, to_si(16, "in"), stud)
    fill = Fill(label=r(13.0), source="label")
    layers = (
        MaterialLayer("material", "XPS", 2, xps, to_si(1.5, "in")),
        FramedLayer(
            "framed", "steel studs with R-13", 3, stud.web, member, fill, None, "", (), "vertical",
            False,
        ),
        ResistanceLayer(
            "resistance", "gypsum board", 4, r(0.56), to_si(0.625, "in"), None, "", ""
        ),
    )  # fmt: skip
    made = assembly("W1", "Brick veneer on steel studs", "A-501", 0.049)
    return changed(made, layers=layers)


def element(tag: str, name: str, category: str, area: float, **more: object) -> Element:
    made = Element(
        tag=tag, assembly=name, category=category, sheet="A-201", surface="North", line=1,
        net_area=ft2(area), gross_area=None, perimeter=None, count=None, host="",
        adjoins="outdoors", facing="N", tilt=90.0, depth_below_grade=None, insulated_depth=None,
        renewed=None, measured="outside", mean_with="", facts=(), bridges=(),
    )  # fmt: skip
    return changed(made, **more)


ASSEMBLIES = (
    brick_wall(),
    assembly("W2", "Wood 2x6 wall", "A-502"),
    assembly("W3", "Basement wall", "A-503"),
    assembly("W4", "Dormer cheek, steel studs", "A-504"),
    assembly("SK", "Skylight", "A-601"),
    assembly("W5", "Stone wall", "A-505"),
    assembly("G1", "Slab edge", "S-101"),
    assembly("X1", "Garden gate", "A-901"),
)
ELEMENTS = (
    element("N-1", "W1", "wall.steel_frame", 1818.0),
    element("N-2", "W2", "wall.wood_frame", 480.0),
    element("N-3", "W3", "wall.below_grade", 720.0),
    element("N-4", "W4", "wall.steel_frame", 60.0),
    element("R-1", "SK", "fenestration.skylight", 504.0, sheet="A-105", surface="Roof"),
    element("N-5", "W5", "wall.mass", 420.0),
    element("G-1", "G1", "slab.edge", 0.0, net_area=None, perimeter=to_si(280.0, "ft")),
    element("N-6", "X1", "door.other", 21.0),
)

PROJECT = Project(
    file="hall.yaml",
    title="Village Hall",
    reference="VH-1",
    prepared_by="",
    permit_application_date=date(2026, 3, 2),
    report_date=date(2026, 3, 9),
    scope="alteration",
    invented="The hall, the place and its rules are invented.",
    units="",
    site=Site(
        "Anywhere",
        zones=(ZoneStated("", "Z2", "map on G-001", 4),),
        indoor_temperature=20.0,
        outdoor_temperature=-10.0,
    ),
    facts=(),
    rule_sets=(RuleSetChoice("anywhere-2025", True, 8),),
    materials={},
    assemblies={each.id: each for each in ASSEMBLIES},
    surfaces={"North": Surface("North", "A-201", ft2(3600.0), 0.0, "wall", (), 20)},
    elements={each.tag: each for each in ELEMENTS},
    exceptions=(ExceptionClaim("N-5", "7.2", "owner", "listed wall", "order.txt", False, 60),),
    options=Options(),
    sha256="a" * 64,
)

# ----------------------------------------------------------------------------------- rule set


def limit(row: str, label: str, cell: str, metric: str = "U_assembly", **more: object) -> Limit:
    number = cell.removeprefix("F-")
    made = Limit(
        id=f"anywhere-2025/T1/Z2/{row}/{metric}", ruleset="anywhere-2025", table="T1",
        clause="Table 1", zone="Z2", row=row, label=label, categories=(row,), metric=metric,
        sense="max", unit="Btu/(h ft F)" if metric == "F_factor" else U_UNIT, cell=cell,
        kind="no_requirement" if cell == "NR" else "number",
        alternatives=() if cell == "NR" else ((Term(float(number), number),),),
        when=(), path="assembly", applies_to="each_component", notes=(), src="E",
        file="table-1.csv", line=3,
    )  # fmt: skip
    return changed(made, **more)


CONVENTIONS = Conventions(
    film_set="iso6946",
    methods=(
        MethodRule("wall.steel_frame", "cavity_factor", "Table 5", ("parallel_path",)),
        MethodRule("wall.wood_frame", "parallel_path", "Table 5"),
        MethodRule("wall.mass", "weighted", "Table 5", (), 0.5),
    ),
    cladding="film_stays",
    framing_shares=(("wall.wood_frame", 0.25, "Table 6"),),
    class_tests=(
        ClassTest(
            "wall.mass", "heat_capacity", 122_650.0, "6 Btu/(ft2*degF)", "whole", "clause 2.4"
        ),
    ),
    accepted_evidence={"door.*": ("label",), "fenestration.*": ("label",)},
    tapered_mean_within=0.0254,
    where={"films": "Table 4", "cladding": "Table 4"},
)
RULESET = RuleSet(
    id="anywhere-2025",
    title="Anywhere Ordinance",
    jurisdiction="Anywhere (invented)",
    status="example",
    invented=True,
    checked_by="",
    chain=(
        Edition(
            "anywhere-2025",
            "Anywhere Ordinance",
            "2025",
            "",
            date(2025, 1, 1),
            None,
            True,
            "b" * 64,
        ),
    ),
    units="IP",
    zones=Zones(("Z1", "Z2"), {}, {}, "map"),
    dimensions={},
    limits=(),
    paths_clause="clause 1.2",
    compare="rounded_to_printed_decimals",
    rounding_clause="clause 1.6",
    rounding_stated=True,
    conventions=CONVENTIONS,
    area_limits=(),
    averaging=(),
    tradeoff=None,
    trigger=None,
    exceptions=(),
    not_judged=("air leakage",),
    folder="rules/anywhere-2025",
)

# ------------------------------------------------------------------------------------- solved


def setting(metric: str, method: str) -> Setting:
    return Setting(
        metric=metric, method=method, method_from="Table 5", refused=(), weight=None,
        direction="horizontal", outside_film=r(0.17), outside_film_from="Table 4",
        inside_film=r(0.68), inside_film_from="Table 4", cladding_film=r(0.68),
        conventions="anywhere-2025",
    )  # fmt: skip


def solved(name: str, metric: str, method: str, value: float | None, **more: object) -> Solved:
    made = Solved(
        assembly=name, setting=setting(metric, method), value=value, clear=value, missing=(),
        low=None, high=None, bracket_note="", decided_by_bracket=False, ratio=None, beside=(),
        tree=None, steps=(), counted=(), assumptions=(), cautions=(),
    )  # fmt: skip
    return changed(made, **more)


def resistance(symbol: str, title: str, value: float, source: str) -> Step:
    return Step(symbol, title, "", (), r(value), "resistance", source)


def ohm(name: str, value: float) -> Operand:
    return Operand(name, value, "resistance")


def _steel() -> Solved:
    """R = 0.17 + 7.5 + 0.56 + 0.46 x 13 + 0.56 + 0.68 = 15.45: U 0.0647."""
    stud = Step(
        "R3", "steel studs with R-13", "{Fc} * {R_label}",
        (Operand("Fc", 0.46, "number"), ohm("R_label", r(13.0))), r(5.98), "resistance", "Table 7",
    )  # fmt: skip
    foam = Step(
        "R1", "XPS", "{L} / {k}",
        (
            Operand("L", to_si(1.5, "in"), "length"),
            Operand("k", to_si(0.2, "Btu*in/(h*ft2*degF)"), "conductivity"),
        ),
        r(7.5), "resistance", "label",
    )  # fmt: skip
    values = {"Ro": 0.17, "R1": 7.5, "R2": 0.56, "R3": 5.98, "R4": 0.56, "Ri": 0.68}
    total = r(sum(values.values()))
    names = "{" + "} + {".join(values) + "}"
    parts = tuple(ohm(name, r(value)) for name, value in values.items())
    steps = (
        resistance("Ro", "outside film", 0.17, "Table 4"),
        foam,
        resistance("R2", "sheathing", 0.56, "handbook, from memory"),
        stud,
        resistance("R4", "gypsum board", 0.56, "handbook, from memory"),
        resistance("Ri", "inside film", 0.68, "Table 4"),
        Step("R", "sum of resistances", names, parts, total, "resistance"),
        Step("U", "U-factor", "1 / {R}", (ohm("R", total),), 1 / total, "u_factor"),
    )
    hand = Step("U", "U-factor", f"1 / ({names})", parts, 1 / total, "u_factor")
    return solved(
        "W1", "U_assembly", "cavity_factor", 1 / total,
        low=u(0.04481), high=u(0.08352), bracket_note="of the same drawn pieces",
        beside=(
            Beside("parallel_path", u(0.04481), "refused as a result"),
            Beside("sum_of_labels", u(1 / 20.5), "labels added up"),
        ),
        steps=steps, hand_check=(hand,),
        counted=(Counted(r(7.5)), Counted(None, "bridged"), Counted(r(0.56))),
        cautions=(
            Caution("moisture", "W1: insulation outside the studs"),
            Caution("fire", "W1: combustible XPS"),
        ),
    )  # fmt: skip


def _wood() -> Solved:
    """Two paths, R 23.51 over 75 % and 12.385 over 25 %: U 0.05209, the limit by rounding."""
    paths = (23.51, 12.385)
    total = 1.0 / (0.75 / paths[0] + 0.25 / paths[1])
    operands = (
        Operand("f1", 0.75, "number"), ohm("R_path1", r(paths[0])),
        Operand("f2", 0.25, "number"), ohm("R_path2", r(paths[1])),
    )  # fmt: skip
    hand = Step("U", "U", "{f1} / {R_path1} + {f2} / {R_path2}", operands, u(1 / total), "u_factor")
    branches = tuple(
        Series(
            title,
            (
                Resistor("Ro", "outside film", r(0.17)),
                Resistor("R", title, r(path - 0.85)),
                Resistor("Ri", "inside film", r(0.68)),
            ),
            r(path),
        )
        for title, path in zip(("batt", "studs"), paths, strict=True)
    )
    return solved(
        "W2", "U_assembly", "parallel_path", u(1 / total),
        low=u(1 / total), high=u(0.0546), bracket_note="of the same drawn pieces",
        hand_check=(hand,), steps=(hand,),
        tree=Parallel("paths", (0.75, 0.25), branches, r(total)),
        assumptions=("framing share 25 % as the rule set states",),
        cautions=(Caution("fire", "W2: combustible siding"),),
    )  # fmt: skip


STEEL, WOOD = _steel(), _wood()
BASEMENT = solved("W3", "C_factor", "c_factor", None, missing=("insulated depth of N-3, on A-503",))
DORMER = solved(
    "W4", "U_assembly", "two_dimensional", u(0.0671), low=u(0.0380), high=u(0.0671),
    decided_by_bracket=True, bracket_note="decides",
)  # fmt: skip
SKYLIGHT = solved(
    "SK", "U_product", "rated", u(0.47), cautions=(),
    hand_check=(Step("U", "rated", "", (), u(0.47), "u_factor", "label"),),
)  # fmt: skip
STONE = solved("W5", "U_assembly", "weighted", u(0.4753))

# ------------------------------------------------------------------------------------- judged


def compared(value: float, rounded: float, bound: float, **more: object) -> Comparison:
    made = Comparison(
        value=value, compared=rounded, limit=bound, decimals=3, unit=U_UNIT, sense="max",
        within=rounded <= bound, by_rounding=rounded <= bound < value, margin=bound - value,
    )  # fmt: skip
    return changed(made, **more)


def line(tag: str, category: str, verdict: str, **more: object) -> Line:
    made = Line(
        ruleset="anywhere-2025", decides=True, element=tag, category=category,
        metric="U_assembly", verdict=verdict, reasons=(), limit=None, solved=None,
        comparison=None,
        trail=(
            Choice("zone", "Z2", "stated Z2, map on G-001"),
            Choice("row", category, "Table 1 covers the category"),
        ),
    )  # fmt: skip
    return changed(made, **more)


LINES = (
    line(
        "N-2", "wall.wood_frame", "pass", solved=WOOD,
        limit=limit("wall.wood_frame", "Wood-framed wall", "0.052"),
        comparison=compared(0.0520870, 0.052, 0.052), flags=("rounding", "at_limit"),
        paths=(
            PathResult("assembly", "pass", "0.052", "0.052", ""),
            PathResult("insulation", "fail", "R-18 + 3ci", "20+3ci", "cavity R-18 is below R-20"),
        ),
    ),
    line(
        "N-1", "wall.steel_frame", "fail", solved=STEEL,
        limit=limit("wall.steel_frame", "Steel-framed wall", "0.060"),
        comparison=compared(1 / 15.45, 0.065, 0.060), flags=("method",),
        reasons=("continuous R-7.5 is below R-9",),
    ),
    line(
        "N-3", "wall.below_grade", "not_decided", metric="C_factor", solved=BASEMENT,
        limit=limit("wall.below_grade", "Wall below grade", "0.095", "C_factor"),
        reasons=("missing: the insulated depth of N-3, on A-503",),
    ),
    line(
        "N-4", "wall.steel_frame", "too_close", solved=DORMER,
        limit=limit("wall.steel_frame", "Steel-framed wall", "0.060"),
        comparison=compared(0.0671, 0.067, 0.060),
        low=compared(0.0380, 0.038, 0.060), high=compared(0.0671, 0.067, 0.060),
        reasons=("the limit lies inside the bounds, which decide here",),
    ),
    line(
        "R-1", "fenestration.skylight", "path_closed", metric="U_product", solved=SKYLIGHT,
        limit=limit("fenestration.skylight", "Skylight", "0.50", "U_product"),
        reasons=("Table 3: 4.67 % is above 4 %",),
    ),
    line(
        "N-5", "wall.mass", "official_decides", solved=STONE,
        limit=limit(
            "wall.mass", "Mass wall", "0.092",
            when=(Condition("space_category", ("conditioned",), text="conditioned"),),
        ),
        comparison=compared(0.4753, 0.475, 0.092),
        reasons=("exception 7.2 claimed by the owner",),
        with_exception="with it waived if the official agrees, without it over its limit",
    ),
    line(
        "G-1", "slab.edge", "no_requirement", metric="F_factor",
        limit=limit("slab.edge", "Slab edge", "NR", "F_factor"),
    ),
    line("N-6", "door.other", "not_in_table", reasons=("no row covers door.other",)),
)  # fmt: skip

JUDGED = Judged(
    lines=LINES,
    findings=(
        Finding("unused-assembly", "N", "W9", "A-509", "no element uses it", "delete it", ""),
        Finding(
            "declared-differs", "E", "W1", "A-501", "the drawing says 0.049, computed 0.0647",
            "the labels were added up", "the drawing and the report with one value", sure="likely",
        ),
        Finding("areas-open", "W", "North", "A-201", "81 ft2 missing", "", "", "soffit, see A-203"),
    ),
    ratios=(
        Ratio("window_wall_ratio", ft2(2704.0), ft2(10720.0), 2704 / 10720, 0.30, "Table 3", False),
        Ratio("skylight_roof_ratio", ft2(504.0), ft2(10800.0), 504 / 10800, 0.04, "Table 3", True),
    ),
    groups=(
        Group(
            "mean", "attic", "anywhere-2025", True, "clause 4.1", True, "fail",
            (
                part("R-2", "R2", ft2(3185.0), 0.0211, 0.022, "pass"),
                part("HATCH", "HT1", ft2(15.0), 0.498, 0.022, "fail"),
            ),
            ft2(3185.0) * u(0.0211) + ft2(15.0) * u(0.498), ft2(3200.0) * u(0.022),
            cap="no part above 1.25 x",
        ),
        Group(
            "trade_off", "conditioned", "anywhere-2025", True, "4.5", False, "not_decided",
            (
                part("N-1", "W1", ft2(1818.0), 0.0647, 0.060, "fail"),
                part("N-2", "W4", ft2(480.0), 0.0417, 0.052, "pass"),
            ),
            ft2(1818.0) * u(0.0647) + ft2(480.0) * u(0.0417),
            ft2(1818.0) * u(0.060) + ft2(480.0) * u(0.052),
            waits=("the value of N-3", "the value of N-5", "the area of N-6"),
            left_out=(("G-1", "the table prints NR"),),
            charges=(
                Charge(
                    "skylight_roof_ratio", ft2(72.0), u(0.47), u(0.03), ft2(72.0) * u(0.44), "drawn"
                ),
            ),
            rule="the sum of the design is at most that of the table",
        ),
    ),
    closings=(
        Closing(
            "North", "A-201", ft2(3600.0),
            (("N-1", ft2(1818.0)), ("N-2", ft2(480.0)), ("N-3", ft2(720.0)), ("N-5", ft2(501.0))),
            ft2(81.0),
        ),
    ),
    remarks=("the ordinance also offers a trade-off, which is not computed",),
)  # fmt: skip
RULESETS = {"anywhere-2025": RULESET}
