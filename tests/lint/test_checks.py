"""Each check with a good and a bad sheet; sheets are invented, thresholds common practice."""

from __future__ import annotations

import json
from pathlib import Path

import pytest

from envcheck.lint import all_checks
from envcheck.lint.numbers import NUMBERS
from tests.lint.sets import MEANING, SHEET, faults, found, write

BAD = [
    # decimal mark lost: 0.064 -> 64
    ("L04", "0.064", "64", "T1/wall.wood_frame/B/U"),
    # 49 h ft2 F/Btu in the other system is 8.63 m2 K/W, below every attic
    ("L04", "49,P", "8.6,P", "T1/roof.attic/C/R"),
    # a factor ten, within the range of walls, apart from its neighbour
    ("L05", "0.084", "0.30", "T1/wall.wood_frame/A/U"),
    # alternatives of a cell that cannot both be meant
    ("L05", "20 or 13+5ci", "6 or 13+5ci", "T1/wall.wood_frame/B/R"),
    # zones swapped
    ("L06", "0.035,30,0.027", "0.027,30,0.035", "T1/roof.attic/B/U"),
    # no requirement after a limit
    ("L06", "0.021", "NR", "T1/roof.attic/C/U"),
    # source letter that nothing explains
    ("L07", "49,P", "49,Q", "T1/roof.attic"),
    # R x U = 13 x 0.160 = 2.08 is within, 13 x 0.165 = 2.15 is not
    ("L16", "0.084", "0.165", "T1/wall.wood_frame/A/R"),
]


def test_the_clean_sheet_has_no_finding(tmp_path: Path) -> None:
    assert found(tmp_path) == []


@pytest.mark.parametrize(("check", "old", "new", "place"), BAD)
def test_a_bad_figure_is_found_at_its_place(
    tmp_path: Path, check: str, old: str, new: str, place: str
) -> None:
    assert old in SHEET
    assert (check, place) in found(tmp_path, SHEET.replace(old, new, 1))


def test_one_odd_figure_is_one_finding(tmp_path: Path) -> None:
    """Far from both neighbours in the middle: the ends are not told, their neighbour is."""
    meaning = MEANING.replace('{"*": {metric', '{"*": {monotone: none, metric')
    row = "wall.mass,Wall,0.100,NR,0.300,NR,0.090,NR,P\n"
    assert found(tmp_path, SHEET + row, meaning) == [("L05", "T1/wall.mass/B/U")]


def test_just_within_is_no_finding(tmp_path: Path) -> None:
    """13 x 0.160 = 2.08 < 2.1, and 0.160 / 0.064 = 2.5 < 2.6."""
    assert found(tmp_path, SHEET.replace("0.084", "0.160", 1)) == []


def test_cavity_and_continuous_insulation_are_not_ordered(tmp_path: Path) -> None:
    assert found(tmp_path, SHEET.replace("13,0.064,20 or 13+5ci", "13,0.064,0+12ci")) == []


def test_sums_of_two_tables_are_held_wider(tmp_path: Path) -> None:
    """R x U = 5 x 0.080 = 0.40: too little in one table (0.5), not between two (0.35)."""
    one = "row,label,A,,B,,C,,src\n,,U,R,U,R,U,R,\nwall.mass,Mass wall,0.080,5ci,NR,NR,NR,NR,P\n"
    meaning = MEANING.replace('rows: {"*"', 'monotone: none\n    rows: {"*"')
    assert found(tmp_path / "one", one, meaning) == [("L16", "T1/wall.mass/A/R")]
    parts = """\
  - {id: T1, file: t.csv, clause: Table 1, orientation: zones_across, metric: U_assembly}
  - {id: T2, file: r.csv, clause: Table 2, orientation: zones_across, metric: R_insulation,
     monotone: none, rows: {"*": {plus: [cavity, ci]}}}
paths:
  - {any_of: [T1, T2], per: component, clause: "1.2"}
"""
    head, _, rest = MEANING.partition("  - id: T1")
    apart = head + parts + rest[rest.index("sources:") :]
    town = write(tmp_path / "two", "row,label,A,B,C,src\nwall.mass,Wall,0.080,0.07,0.06,P\n", apart)
    (town / "r.csv").write_text("row,label,A,B,C,src\nwall.mass,Wall,5ci,NR,NR,P\n")
    assert [f for f in faults(town) if f.severity == "error"] == []
    assert [f.check for f in faults(town)] == []
    (town / "r.csv").write_text("row,label,A,B,C,src\nwall.mass,Wall,4ci,NR,NR,P\n")
    assert [(f.check, f.place) for f in faults(town)] == [("L16", "T2/wall.mass/A")]


@pytest.mark.parametrize("off", ["order_is_coldness: no, order", "monotone"])
def test_order_may_be_switched_off(tmp_path: Path, off: str) -> None:
    """A U-factor that grows by less than 2.6 toward the cold: L06 alone sees it."""
    bad = SHEET.replace("0.035,30,0.027", "0.027,30,0.035")
    assert found(tmp_path, bad) == [("L06", "T1/roof.attic/B/U")]
    if off == "monotone":
        meaning = MEANING.replace('{"*": {metric', '{"*": {monotone: none, metric')
    else:
        meaning = MEANING.replace("map, order", f"map, {off}")
    assert meaning != MEANING
    assert found(tmp_path, bad, meaning) == []


def test_sun_is_not_ordered_by_cold(tmp_path: Path) -> None:
    meaning = MEANING.replace("U: {path: assembly}, R: {path: insulation}", "g: {metric: SHGC}")
    meaning = meaning.replace('rows: {"*": {metric: {assembly: U_assembly, insulation: '
                              'R_insulation}, plus: [cavity, ci]}}', "rows: {}")  # fmt: skip
    meaning = meaning.replace(
        'paths:\n  - {any_of: [assembly, insulation], per: component, clause: "1.2"}\n', ""
    )
    sheet = "row,label,A,B,C,src\n,,g,g,g,\nfenestration.fixed,Window,0.25,0.40,NR,P\n"
    assert found(tmp_path, sheet, meaning) == []
    assert found(tmp_path, sheet.replace("0.40", "4.0"), meaning) == [
        ("L04", "T1/fenestration.fixed/B/g"),
        ("L05", "T1/fenestration.fixed/B/g"),
    ]


def test_unused_footnote(tmp_path: Path) -> None:
    meaning = MEANING + "notes: {T1: {a: {effect: info, text: as printed}}}\n"
    assert found(tmp_path, SHEET, meaning) == [("L12", "T1/a")]
    assert found(tmp_path, SHEET.replace("0.035", "0.035[a]"), meaning) == []
    anywhere = meaning.replace("{T1: {a", '{"*": {a')
    assert found(tmp_path, SHEET.replace("Attic", "Attic[a]"), anywhere) == []
    assert found(tmp_path, SHEET, anywhere) == [("L12", "*/a")]


def test_footnote_mark_without_bracket(tmp_path: Path) -> None:
    meaning = MEANING + 'notes: {T1: {"1": {effect: info, text: as printed}}}\n'
    marked = SHEET.replace("0.035", "0.035[1]")
    assert found(tmp_path, marked, meaning) == []
    lost = marked.replace("0.027", "0.0271")
    assert found(tmp_path, lost, meaning) == [("L10", "T1/roof.attic/B/U")]
    assert found(tmp_path, marked.replace("0.027", "0.0272"), meaning) == []


DOWN = """\
ruleset: town
document: {title: Town table (invented), edition: "2025"}
jurisdiction: nowhere (invented)
effective: {from: 2025-01-01, date_tested: permit application}
units: {U: W/(m2.K)}
decimal: ","
separator: ";"
zones: {scheme: two zones, chosen_by: map, order: ["1", "2"]}
dimensions: {use: {values: [day, night]}}
tables:
  - id: T1
    file: t.csv
    clause: Table 1
    orientation: zones_down
    heads: {Wall: {element: "wall.*", metric: U_assembly}}
sources: {P: {what: invented}}
"""


def test_a_zone_without_a_row_under_one_condition(tmp_path: Path) -> None:
    rows = ["1;1;day;0,40;P", "2;2;day;0,30;P", "1;1;night;0,35;P", "2;2;night;0,25;P"]
    head = "row;label;when:use;Wall;src\n"
    assert found(tmp_path, head + "\n".join(rows), DOWN) == []
    assert found(tmp_path, head + "\n".join(rows[:3]), DOWN) == [("L01", "T1/1[use=night]/Wall")]


def test_a_sheet_of_a_spreadsheet_reads_alike(tmp_path: Path) -> None:
    """Semicolons, decimal commas, a byte order mark, lines ending in CR LF, quoted cells."""
    text = '\ufeffrow;label;when:use;Wall;src\r\n1;1;;"0,40";P\r\n2;"2; cold";;0,30;P\r\n'
    town = write(tmp_path, "", DOWN)
    (town / "t.csv").write_bytes(text.encode("utf-8"))
    assert faults(town) == ()
    (town / "t.csv").write_bytes(text.replace("0,30", "0.30").encode("utf-8"))
    assert [(f.check, f.severity, f.line) for f in faults(town)] == [("L10", "error", 3)]


def test_one_sheet_per_zone_is_one_run(tmp_path: Path) -> None:
    meaning = MEANING.replace("order: [A, B, C]", "order: [A, B]").replace(
        "orientation: zones_across\n    header_rows: 2\n    head_levels: [zone, ",
        "orientation: none\n    zone: A\n    head_levels: [",
    )
    meaning = meaning.replace("paths:", "  - {like: T1, id: T2, file: u.csv, clause: Table 2, "
                              "zone: B}\npaths:")  # fmt: skip
    sheet = "row,label,U,R,src\nwall.wood_frame,Wall,{},{},P\n"
    town = write(tmp_path, sheet.format("0.064", "20"), meaning)
    (town / "u.csv").write_text(sheet.format("0.051", "20+5ci"))
    assert faults(town) == ()
    (town / "u.csv").write_text(sheet.format("0.071", "20+5ci"))
    assert [(f.check, f.place) for f in faults(town)] == [("L06", "T2/wall.wood_frame/U")]


AMENDS = """\
ruleset: hill
document: {title: Hill (invented), edition: "2026"}
jurisdiction: nowhere (invented)
overlay: {base: town, replaces: cells, kind: amendment, clause: s. 1}
effective: {from: 2026-01-01, date_tested: permit application}
decimal: "."
tables:
  - {id: T1, file: t.csv, clause: ordinance 1}
sources: {O: {what: invented}}
"""


def test_amendments(tmp_path: Path) -> None:
    write(tmp_path)
    hill = tmp_path / "hill"
    hill.mkdir()
    (hill / "ruleset.yaml").write_text(AMENDS)
    head = "".join(SHEET.splitlines(keepends=True)[:2])

    def amended(cells: str) -> list[tuple[str, str]]:
        (hill / "t.csv").write_text(f"{head}roof.attic,Attic,{cells},O\n")
        return [(f.check, f.place) for f in faults(hill)]

    assert amended(".,.,.,.,0.020,.") == []
    assert amended(".,.,.,.,0.021,.") == [("L23", "T1/roof.attic/C/U")]
    assert amended(".,.,.,.,0.012,.") == [
        ("L04", "T1/roof.attic/C/U"),
        ("L24", "T1/roof.attic/C/U"),
    ]
    (hill / "ruleset.yaml").write_text(AMENDS.replace("kind:", "restates: yes, kind:"))
    assert amended(".,.,.,.,0.021,.") == []


def test_a_confirmed_remark_keeps_its_reason(tmp_path: Path) -> None:
    bad = SHEET.replace("0.021", "NR")
    for place in ("T1/roof.attic/C/U", "T1/roof.attic", "T1/"):
        meaning = MEANING + f'confirmed: {{"L06 {place}": printed so}}\n'
        (fault,) = faults(write(tmp_path, bad, meaning))
        assert (fault.check, fault.confirmed, fault.severity) == ("L06", "printed so", "remark")
    for place in ("T1/roof.att", "T1/roof.attic/A", "T2"):
        meaning = MEANING + f'confirmed: {{"L06 {place}": printed so}}\n'
        checks = [(f.check, f.confirmed) for f in faults(write(tmp_path, bad, meaning))]
        assert sorted(checks) == [("L06", ""), ("L26", "")]


def test_an_error_is_never_confirmed(tmp_path: Path) -> None:
    meaning = MEANING + 'confirmed: {"L01 T1/roof.attic/C/U": printed so}\n'
    own = faults(write(tmp_path, SHEET.replace("0.021", ""), meaning))
    assert [(f.check, f.severity, f.confirmed) for f in own] == [("L01", "error", "")]


def test_what_changed_since_the_lock(tmp_path: Path) -> None:
    from envcheck.read.locks import digests, lock_text

    town = write(tmp_path)
    (town / "ruleset.lock").write_text(
        lock_text("town", "two readers", "2026-01-02", digests(town))
    )
    assert faults(town) == ()
    (town / "t.csv").write_text(SHEET.replace("0.021", "0.022"))
    (fault,) = faults(town)
    assert (fault.check, fault.found, fault.severity) == ("L27", "t.csv", "remark")
    assert "two readers" in fault.what and "2026-01-02" in fault.what


def test_every_number_of_the_reader_is_an_error_that_it_knows() -> None:
    from envcheck.error_kinds import KINDS

    assert set(NUMBERS) <= set(KINDS)


def test_checks_are_found_in_order() -> None:
    ids = [check.id for check in all_checks()]
    assert ids == sorted(ids)
    assert {"L04", "L05", "L06", "L07", "L12", "L16", "L23", "L24", "L27"} <= set(ids)


def test_faults_are_plain_data(tmp_path: Path) -> None:
    (fault,) = faults(write(tmp_path, SHEET.replace("0.021", "NR")))
    told = json.loads(json.dumps(fault._asdict()))
    assert (told["line"], told["row"], told["column"]) == (4, "roof.attic", "C / U")


def test_a_target_is_stricter_than_its_threshold(tmp_path: Path) -> None:
    meaning = (
        MEANING[: MEANING.index("zones:")]
        + """\
tables:
  - id: T1
    file: t.csv
    clause: Table 1
    orientation: none
    metric: U_assembly
    heads: {If worse than: {role: trigger, then: Then at most}, Then at most: {}}
sources: {P: {what: invented}}
"""
    )
    sheet = "row,label,If worse than,Then at most,src\nroof.attic,Attic,0.062,{},P\n"
    assert found(tmp_path, sheet.format("0.028"), meaning) == []
    assert found(tmp_path, sheet.format("0.082"), meaning) == [
        ("L06", "T1/roof.attic/Then at most")
    ]
