"""The language of printed tables, one feature at a time, on small invented sheets."""

from __future__ import annotations

from datetime import date
from pathlib import Path

import pytest

from envcheck.errors import InputError
from envcheck.judge.select import select, select_envelope
from envcheck.judge.selection import Selection
from envcheck.model.ruleset import Limit, RuleSet
from envcheck.read.rulesets import read_ruleset
from tests.judge.test_selections import element, project
from tests.read.names import NAMES

HEAD = """ruleset: {name}
document: {{title: Invented, edition: "1"}}
jurisdiction: nowhere
effective: {{from: 2010-01-01, date_tested: permit application}}
decimal: "."
sources: {{P: {{what: invented}}}}
"""
UNITS = "units: {U: W/(m2.K), R: (m2.K)/W}\n"


def write(folder: Path, meaning: str, sheet: str, name: str = "town", units: str = UNITS) -> None:
    (folder / name).mkdir(exist_ok=True)
    (folder / name / "t.csv").write_text(sheet, encoding="utf-8")
    text = HEAD.format(name=name) + units + meaning
    (folder / name / "ruleset.yaml").write_text(text, encoding="utf-8")


def read(folder: Path, name: str = "town", on: date | None = None) -> RuleSet:
    return read_ruleset(name, [folder], on, NAMES)


def town(folder: Path, meaning: str, sheet: str) -> RuleSet:
    write(folder, meaning, sheet)
    return read(folder)


def chosen(ruleset: RuleSet, category: str, on: str = "2020-06-01", **facts: object) -> Selection:
    case = {"category": category, "date": on, "facts": facts}
    return select(element(case), category, ruleset, project(case))


def one(ruleset: RuleSet, category: str, metric: str = "U_assembly", **facts: object) -> Limit:
    selection = chosen(ruleset, category, **facts)
    found = selection.limit(metric)
    assert found is not None, selection.reason_of(metric)
    return found


TABLE = """tables:
  - {id: T1, file: t.csv, clause: Table 1, orientation: none, heads: {U: {}},
     rows: {"*": {metric: U_assembly}}}
"""
SHEET = "row,label,U,src\nwall.mass,Mass wall,0.30[a],P\nroof.attic,Attic,0.20,P\n"
YES = "dimensions: {ducts: {values: [yes, no]}, share: {type: number}}\n"


def noted(folder: Path, note: str, sheet: str = SHEET, units: str = UNITS) -> RuleSet:
    write(folder, TABLE + YES + f"notes: {{T1: {{a: {{{note}}}}}}}\n", sheet, units=units)
    return read(folder)


@pytest.mark.parametrize(
    ("note", "with_ducts", "without"),
    [
        ('effect: replace, when: {ducts: yes}, cell: "0.25"', "0.25", "0.30"),
        ("effect: exempt, when: {ducts: yes}", "NR", "0.30"),
        ('effect: add, when: {ducts: yes}, add: "0.05"', "0.35", "0.30"),
        ('effect: scale, when: {ducts: yes}, factor: "1.5"', "0.450", "0.30"),
        ('effect: alternative, when: {ducts: yes}, cell: "0.33"', "0.30 or 0.33", "0.30"),
        ("effect: info, text: as printed", "0.30", "0.30"),
        ("effect: define, text: as printed, flow: upward", "0.30", "0.30"),
    ],
)
def test_a_footnote_acts_where_its_condition_holds(
    tmp_path: Path, note: str, with_ducts: str, without: str
) -> None:
    ruleset = noted(tmp_path, note)
    for ducts, expected in (("yes", with_ducts), ("no", without)):
        found = one(ruleset, "wall.mass", ducts=ducts)
        if expected == "NR":
            assert found.kind == "no_requirement"
        else:
            assert " or ".join(t.text for (t,) in found.alternatives) == expected
        assert not any(n.by_official for n in found.notes)


def test_a_footnote_without_its_fact_leaves_the_line_open(tmp_path: Path) -> None:
    ruleset = noted(tmp_path, 'effect: replace, when: {ducts: yes}, cell: "0.25"')
    outcome = chosen(ruleset, "wall.mass").outcome("U_assembly")
    assert outcome is not None and outcome.state == "missing_fact"
    assert [m.name for m in outcome.missing] == ["ducts"]
    assert sorted(x.cell for x in outcome.candidates) == ["0.25", "0.30"]


def test_what_a_footnote_requires_and_is_not_met_is_for_the_official(tmp_path: Path) -> None:
    ruleset = noted(tmp_path, "effect: require, when: {ducts: yes}, text: ducts inside")
    assert not one(ruleset, "wall.mass", ducts="yes").notes[0].by_official
    unmet = one(ruleset, "wall.mass", ducts="no").notes[0]
    assert unmet.by_official and unmet.text == "ducts inside"


def test_a_footnote_converts_to_another_metric(tmp_path: Path) -> None:
    note = "effect: convert, metric: R_total, when: {ducts: yes}"
    ruleset = noted(tmp_path, note, SHEET.replace("0.30", "0.25"))
    assert one(ruleset, "wall.mass", ducts="no").alternatives[0][0].text == "0.25"
    found = one(ruleset, "wall.mass", "R_total", ducts="yes")
    assert (found.sense, found.alternatives[0][0].number) == ("min", 4.0)  # 1 / 0.25
    note = "effect: convert, metric: R_total, cell: 3.5, when: {ducts: yes}"
    found = one(noted(tmp_path, note), "wall.mass", "R_total", ducts="yes")
    assert found.alternatives[0][0].text == "3.5"


def test_a_footnote_exchanges_a_figure_by_interval(tmp_path: Path) -> None:
    note = 'effect: exchange, by: share, cells: {"<=0.25": "0.35", "(0.25,0.30]": "0.32"}'
    ruleset = noted(tmp_path, note)
    for share, figure in ((0.20, "0.35"), (0.25, "0.35"), (0.28, "0.32"), (0.31, "0.30")):
        assert one(ruleset, "wall.mass", share=share).alternatives[0][0].text == figure


def test_a_footnote_may_concern_some_cells_only(tmp_path: Path) -> None:
    sheet = SHEET.replace("U,src", "U[a],src").replace("0.30[a]", "0.30")
    for only, changed in (
        ("element: roof.attic", {"roof.attic"}),
        ('only_for_cell: "0.30"', {"wall.mass"}),
        ("metric: SHGC", set()),
        ("zones: [north]", set()),
        ("text: all", {"roof.attic", "wall.mass"}),
    ):
        ruleset = noted(tmp_path, f'effect: replace, cell: "0.99", {only}', sheet)
        assert {x.row for x in ruleset.limits if x.cell == "0.99"} == changed, only


def test_any_one_of_several_conditions(tmp_path: Path) -> None:
    note = 'effect: replace, when_any: [{share: ">0.4"}, {ducts: yes}], cell: "0.32"'
    ruleset = noted(tmp_path, note)
    for ducts, share, figure in (
        ("no", 0.4, "0.30"), ("no", 0.5, "0.32"), ("yes", 0.4, "0.32"), ("yes", 0.5, "0.32"),
    ):  # fmt: skip
        assert one(ruleset, "wall.mass", ducts=ducts, share=share).cell == figure


# ---------------------------------------------------------------------------- rows and columns


def test_columns_by_date_and_three_rows_of_heads(tmp_path: Path) -> None:
    meaning = """zones: {scheme: two, chosen_by: map, order: [A, B]}
tables:
  - id: T1
    file: t.csv
    clause: Table 1
    header_rows: 3
    head_levels: [zone, in_force, check_only]
    in_force: {"2015": 2015-10-01, "2021": 2021-01-01}
    rows: {"*": {metric: U_assembly}}
"""
    sheet = (
        "row,label,A,,B,,src\n,,2015,2021,2015,2021,\n,,public,all,public,all,\n"
        "wall.mass,Walls,0.45,0.43,0.34,0.29,P\n"
    )
    write(tmp_path, meaning, sheet)
    ruleset = read(tmp_path)
    for on, figure in (("2015-10-01", "0.34"), ("2020-12-31", "0.34"), ("2021-01-01", "0.29")):
        case = {"category": "wall.mass", "date": on, "facts": {}, "zone": "B"}
        found = select(element(case), "wall.mass", ruleset, project(case)).limit("U_assembly")
        assert found is not None and found.cell == figure
    case["date"] = "2015-09-30"
    early = select(element(case), "wall.mass", ruleset, project(case))
    assert early.verdict_of("U_assembly") == "not_in_table"


def test_a_row_for_all_other_cases(tmp_path: Path) -> None:
    meaning = """tables:
  - {id: T1, file: t.csv, clause: Table 1, orientation: none, heads: {U: {}}, otherwise_row: rest,
     rows: {rest: {element: [wall.mass, "*"], metric: U_assembly},
            "*": {metric: U_assembly, when: {ducts: yes}}}}
"""
    sheet = "row,label,U,src\nwall.mass,Mass wall,0.30,P\nrest,All others,0.20,P\n"
    ruleset = town(tmp_path, meaning + YES, sheet)
    assert one(ruleset, "wall.mass", ducts="yes").cell == "0.30"
    assert one(ruleset, "wall.mass", ducts="no").cell == "0.20"
    assert one(ruleset, "roof.attic", ducts="yes").cell == "0.20"


def test_a_mean_and_each_part_at_once(tmp_path: Path) -> None:
    meaning = """tables:
  - id: T1
    file: t.csv
    clause: Table 1
    orientation: none
    applies_to: by_head
    heads: {Mean: {applies_to: area_weighted_mean}, Each: {applies_to: each_component}}
    rows: {"*": {metric: U_assembly}}
    weights: [{for: toward unheated, factor: "0.5", when: {adjoins: unheated}}]
dimensions: {adjoins: {values: [outdoors, unheated]}}
"""
    ruleset = town(tmp_path, meaning, "row,label,Mean,Each,src\nwall.mass,Walls,0.18,0.60,P\n")
    selection = chosen(ruleset, "wall.mass")
    assert selection.held == (
        ("U_assembly", "area_weighted_mean"), ("U_assembly", "each_component"),
    )  # fmt: skip
    parts = {o.applies_to: o.limit for o in selection.outcomes}
    assert {k: x.cell for k, x in parts.items() if x is not None} == {
        "area_weighted_mean": "0.18", "each_component": "0.60",
    }  # fmt: skip
    mean = parts["area_weighted_mean"]
    assert mean is not None and [(w.factor, w.when[0].text) for w in mean.weights] == [
        (0.5, "unheated")
    ]
    assert selection.of_scope("U_assembly", "each_component").limit("U_assembly") != mean


def test_interpolation_can_end_at_the_printed_rows(tmp_path: Path) -> None:
    meaning = """tables:
  - {id: T1, file: t.csv, clause: Table 1, orientation: none, heads: {K: {}},
     applies_to: whole_envelope, rows: {"*": {element: envelope, metric: K_global}}}
dimensions: {shape: {type: number, interpolate: linear, between: [0.2, 0.8], outside: error}}
"""
    sheet = (
        "row,label,when:shape,K,src\nk1,low,0.2,0.40,P\nk2,middle,0.5,0.55,P\nk3,high,0.8,0.60,P\n"
    )
    ruleset = town(tmp_path, meaning, sheet)

    def at(shape: float) -> str | None:
        case = {"category": "envelope", "facts": {"shape": shape}}
        limit = select_envelope(ruleset, project(case)).limit("K_global")
        return None if limit is None else limit.alternatives[0][0].text

    # 0.40 + 0.15 x 0.1 / 0.3 = 0.45; 0.55 + 0.05 x 0.15 / 0.3 = 0.575, half up 0.58
    assert [at(x) for x in (0.2, 0.3, 0.5, 0.65, 0.8)] == ["0.40", "0.45", "0.55", "0.58", "0.60"]
    assert at(0.1) is None and at(0.9) is None


def test_see_takes_the_figure_of_another_row(tmp_path: Path) -> None:
    meaning = """tables:
  - id: T1
    file: t.csv
    clause: Table 1
    orientation: none
    heads: {U: {}}
    rows:
      wall.below_grade:
        metric: U_assembly
        see: {by: above, rows: {mass: wall.mass, wood: wall.wood_frame}}
      "*": {metric: U_assembly}
dimensions: {above: {values: [mass, wood]}}
"""
    sheet = (
        "row,label,U,src\nwall.mass,Mass,0.30,P\nwall.wood_frame,Wood,see wall.mass,P\n"
        "wall.steel_frame,Steel,0.25,P\nwall.below_grade,Below grade,see wall.*,P\n"
    )
    ruleset = town(tmp_path, meaning, sheet)
    assert one(ruleset, "wall.wood_frame").cell == "0.30 (see Mass)"
    for above in ("mass", "wood"):
        assert one(ruleset, "wall.below_grade", above=above).alternatives[0][0].text == "0.30"
    circle = sheet.replace("wall.mass,Mass,0.30", "wall.mass,Mass,see wall.wood_frame")
    with pytest.raises(InputError) as caught:
        town(tmp_path, meaning, circle)
    assert {p.kind.id for p in caught.value.problems} == {"unknown-reference"}


# --------------------------------------------------------------------- clauses and amendments


def test_clauses_beside_the_tables(tmp_path: Path) -> None:
    meaning = (
        TABLE
        + YES
        + """notes: {T1: {a: {effect: info, text: as printed}}}
single_limits:
  - {clause: "5.1", element: floor.other, metric: U_assembly, max: "0.22", when: {ducts: yes}}
exemptions: [{clause: "5.2", element: roof.attic, when: {ducts: yes}, text: warm roofs}]
thresholds: [{clause: "5.3", dimension: share, applies_if: ">0.10"}]
adjustments: [{clause: "5.4", of: SHGC, factors: [{factor: "0.8", when: {ducts: yes}}]}]
relaxations: [{clause: "5.5", text: eaves may taper, check: reviewer}]
"""
    )
    ruleset = town(tmp_path, meaning, SHEET)
    assert one(ruleset, "floor.other", ducts="yes", share=0.5).clause == "5.1"
    assert one(ruleset, "roof.attic", ducts="yes", share=0.5).kind == "no_requirement"
    assert one(ruleset, "roof.attic", ducts="no", share=0.5).cell == "0.20"
    below = one(ruleset, "wall.mass", ducts="no", share=0.10)
    assert (below.kind, below.cell) == ("no_requirement", "NR (5.3)")
    assert [(a.metric, a.factor, a.when[0].text) for a in ruleset.adjustments] == [
        ("SHGC", 0.8, "yes")
    ]
    (said,) = [r for r in ruleset.remarks if "official" in r]
    assert "5.5 (eaves may taper)" in said and "5.2" not in said


def test_an_amendment_replaces_a_whole_table_in_other_units(tmp_path: Path) -> None:
    write(tmp_path, TABLE + YES, SHEET.replace("[a]", ""))
    over = """overlay: {base: town, replaces: table, kind: amendment, table_map: {B: T1}}
tables:
  - {id: B, file: t.csv, clause: Table B, orientation: none, heads: {R: {}},
     rows: {"*": {metric: R_total}}}
"""
    ip = "units: {R: h.ft2.F/Btu}\n"
    write(tmp_path, over, "row,label,R,src\nwall.mass,Mass wall,20,P\n", "city", ip)
    ruleset = read(tmp_path, "city")
    (limit,) = ruleset.limits
    assert (limit.metric, limit.unit, limit.clause) == ("R_total", "h ft2 F/Btu", "Table B")
    assert limit.replaced == "the whole of Table 1 (town)"
    assert ruleset.units == "IP"
    write(tmp_path, over.replace("{B: T1}", "{B: T9}"), "row,label,R,src\nwall.mass,W,20,P\n",
          "city", ip)  # fmt: skip
    with pytest.raises(InputError, match=r"unknown-base-table"):
        read(tmp_path, "city")


def test_footnotes_of_heads_and_labels_stay_in_an_amendment(tmp_path: Path) -> None:
    sheet = "row,label,U[a],src\nwall.mass,Mass wall[b],0.30,P\n"
    notes = "notes: {T1: {a: {effect: info, text: head}, b: {effect: info, text: row}}}\n"
    write(tmp_path, TABLE + YES + notes, sheet)
    over = """overlay: {base: town, replaces: cells, kind: amendment}
tables: [{id: T1, file: t.csv, clause: Amendment}]
"""
    write(tmp_path, over, "row,label,U,src\nwall.mass,Mass wall,0.28,P\n", "city", "")
    (limit,) = read(tmp_path, "city").limits
    assert limit.cell == "0.28" and {n.text for n in limit.notes} == {"head", "row"}


def test_a_table_may_hold_for_a_time(tmp_path: Path) -> None:
    dated = TABLE.replace("clause: Table 1,", "clause: Table 1, when: {date_tested: 2020-01-01},")
    ruleset = town(tmp_path, dated + YES, SHEET.replace("[a]", ""))
    assert chosen(ruleset, "wall.mass", "2019-12-31").verdict_of("U_assembly") == "not_in_table"
    assert one(ruleset, "wall.mass").cell == "0.30"


@pytest.mark.parametrize(
    ("second", "gap"),
    [("[12,19)", "what lies below [12,19)"), ("[0,18)", "what lies between [0,18) and >=19"),
     ("<19", "")],
)  # fmt: skip
def test_heads_may_leave_no_gap_either(tmp_path: Path, second: str, gap: str) -> None:
    meaning = f"""tables:
  - id: T1
    file: t.csv
    clause: Table 1
    orientation: none
    heads: {{Warm: {{room: ">=19"}}, Cool: {{room: "{second}"}}}}
    rows: {{"*": {{metric: U_assembly}}}}
dimensions: {{room: {{type: number, unit: C}}}}
"""
    sheet = "row,label,Warm,Cool,src\nwall.mass,Walls,0.24,0.35,P\n"
    if not gap:
        assert one(town(tmp_path, meaning, sheet), "wall.mass", room=19.0).cell == "0.24"
        return
    with pytest.raises(InputError) as caught:
        town(tmp_path, meaning, sheet)
    assert [p.found for p in caught.value.problems] == [gap]
    allowed = meaning.replace("    rows:", "    uncovered_allowed: {room: as printed}\n    rows:")
    assert len(town(tmp_path, allowed, sheet).limits) == 2
