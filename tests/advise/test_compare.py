"""Two revisions held against each other.

The changes from the review set to the permit set of the library are written by hand, from what
the scenario says of each assembly and element (figures in inches, R-values, square feet); every
one must be found, and nothing else. No outside source: the scenario is invented.
"""

from __future__ import annotations

import shutil
from functools import cache
from pathlib import Path
from typing import Any

import pytest

from envcheck import pipeline
from envcheck.advise.differences import in_order, same
from envcheck.model.compared import Compared, Difference, LineChange
from envcheck.model.layers import ResistanceLayer
from envcheck.units import convert

ROOT = Path(__file__).parents[2]
RULES = ROOT / "rules"
LIBRARY = ROOT / "projects/quillhaven-library"
REVIEW, PERMIT = LIBRARY / "review.yaml", LIBRARY / "permit.yaml"
UNITS = {
    "thickness": "in", "area": "ft2", "resistance": "h*ft2*degF/Btu", "run": "ft",
    "u_factor": "Btu/(h*ft2*degF)",
}  # fmt: skip

BY_HAND = """
project | | reference | QPL-1, design review set | QPL-1, permit set
project | | report_date | 2026-01-19 | 2026-03-02
fact slab_heated | | added | - | no
assembly W1 | XPS | thickness | 1.5 | 2.5
assembly W2 | declared | value | 0.049 | 0.048
assembly W2 | Mineral wool between Z-girts | replaced | Mineral wool between Z-girts | Mineral wool
assembly W2 | Stainless brackets | added | - | Stainless brackets
assembly W3 | declared | value | 0.102 | 0.081
assembly W3 | XPS | thickness | 1.5 | 2
assembly W4 | declared | value | 0.051 | 0.042
assembly W4 | Polyiso | thickness | 0.5 | 1
assembly W4 | 2x6 studs with R-21 | title | 2x6 studs with R-19 | 2x6 studs with R-21
assembly W4 | 2x6 studs with R-21, fill | label | 19 | 21
assembly W4 | 2x6 studs with R-21, fill | product_thickness | 6.25 | 5.5
assembly W4 | 2x6 studs with R-21, fill | installed_label | 18 | -
assembly W4 | 2x6 studs with R-21, fill | source | label, with the maker's table of compressed batts | label, spec 07 21 16
assembly W5 | declared | value | 0.123 | 0.094
assembly W5 | XPS | thickness | 1.5 | 2
assembly W6 | declared | value | 0.129 | 0.096
assembly W6 | XPS | added | - | XPS
assembly W7 | | title | Retained stone wall, bare | Retained stone wall, lined inside
assembly W7 | declared | value | 0.475 | 0.083
assembly W7 | 2x4 studs with R-15 | added | - | 2x4 studs with R-15
assembly W7 | Gypsum board | added | - | Gypsum board
assembly W9 | | dropped | Brick veneer, wood 2x6 | -
assembly R1 | declared | value | 0.0286 | 0.027
assembly R1 | Polyiso | least | 3 | 5
assembly R1 | Polyiso | greatest | 9 | 8
assembly R2 | declared | value | 0.021 | 0.02
assembly R2 | Loose fill over chords | thickness | 9.5 | 10.5
assembly HT1 | | title | Attic hatch, plywood | Attic hatch, insulated
assembly HT1 | | declared | - | 0.026 Btu/(h*ft2*degF)
assembly HT1 | Hatch insulation | added | - | Hatch insulation
assembly G1 | slab | heated | - | no
assembly CW1 | rated | u_factor | 0.42 | 0.36
assembly CW1 | rated | document | evidence/cw1-rating-review.txt | evidence/cw1-rating-permit.txt
assembly WN1 | rated | u_factor | 0.29 | 0.32
assembly WN1 | rated | basis | centre_of_glass | whole_product
assembly WN1 | rated | evidence | calculation | label
assembly WN1 | rated | standard | data sheet of the glass | NFRC 100
assembly SP1 | | dropped | Opaque spandrel panel | -
surface South | SP1 | dropped | SP1 | -
surface Roof | SK1 | count | 18 | 12
surface Roof | HT1 | area | 15 | -
surface Roof | HT1 | host | R-R2 | -
element N-W1 | | category | wall.mass | wall.steel_frame
element N-W5 | | insulated_depth | - | 9
element N-W5 | | note | insulated depth not stated; section A-511/3 shows the insulation down to 4 ft | -
element S-SP1 | | dropped | SP1 | -
element S-W1 | | category | wall.mass | wall.steel_frame
element S-W1 | | net_area | 836 | 1096
element W-W1 | | category | wall.mass | wall.steel_frame
element W-W1 | | net_area | 612 | 700
element R-R1 | | net_area | 4696 | 4864
element R-SK1 | | net_area | 504 | 336
element R-SK1 | | count | 18 | 12
element R-R2 | | mean_with | - | attic
element R-HT1 | | added | - | HT1
exception N-W7 7.2 | | dropped | owner | -
"""  # noqa: E501

CAUSES = {
    "N-W1": {"N-W1 category_claimed", "W1 XPS thickness"},
    "S-W1": {"S-W1 category_claimed", "S-W1 net_area", "W1 XPS thickness"},
    "W-W1": {"W-W1 category_claimed", "W-W1 net_area", "W1 XPS thickness"},
    "S-W2": {"W2 Mineral wool between Z-girts replaced", "W2 Stainless brackets added"},
    "W-W2": {"W2 Mineral wool between Z-girts replaced", "W2 Stainless brackets added"},
    "E-W3": {"W3 XPS thickness"},
    "N-W5": {"N-W5 insulated_depth", "W5 XPS thickness"},
    "T-W6": {"W6 XPS added"},
    "N-W7": {"W7 2x4 studs with R-15 added", "W7 Gypsum board added", "N-W7 7.2 dropped"},
    "R-R1": {"R-R1 net_area", "R1 Polyiso least", "R1 Polyiso greatest", "R-SK1 net_area",
             "R-SK1 count"},
    "R-SK1": {"R-SK1 net_area", "R-SK1 count", "skylight_roof_ratio changed"},
    "R-R2": {"R-R2 mean_with", "R2 Loose fill over chords thickness", "R-R2 changed"},
    "F-G1": {"G1 slab heated", "slab_heated added"},
    "S-CW1": {"CW1 rated u_factor", "CW1 rated document"},
    "E-WN1": {"WN1 rated u_factor", "WN1 rated basis", "WN1 rated evidence",
              "WN1 rated standard"},
    "C-W4": {"W4 Polyiso thickness", "W4 2x6 studs with R-21 fill label",
             "W4 2x6 studs with R-21 fill product_thickness",
             "W4 2x6 studs with R-21 fill installed_label",
             "W4 2x6 studs with R-21 fill source"},
}  # fmt: skip
"""What the scenario changed on the U-, C- or F-line of an element."""


def compared(old: Path, new: Path, rules: Path = RULES) -> Compared:
    return pipeline.compared(*pipeline.run_both(str(old), str(new), (str(rules),)))


@cache
def library() -> Compared:
    return compared(REVIEW, PERMIT)


def cell(value: object, quantity: str) -> str:
    """A value as a person would type it in the table above."""
    if value in (None, "", ()):
        return "-"
    if isinstance(value, bool):
        return "yes" if value else "no"
    if isinstance(value, float):
        return f"{convert(value, UNITS[quantity]) if quantity in UNITS else value:.6g}"
    if not hasattr(value, "_fields"):
        return str(value)
    for field in ("text", "title", "value", "claimed_by", "assembly", "tag"):
        if hasattr(value, field):
            return str(getattr(value, field))
    return str(value)


def row(each: Difference) -> str:
    name = f"{each.kind} {each.name}".strip()
    cells = (cell(each.before, each.quantity), cell(each.after, each.quantity))
    parts = (name, ", ".join(each.where), each.field or each.what, *cells)
    return " | ".join(parts).replace("|  |", "| |")


def short(each: Difference) -> str:
    return " ".join((each.name, *each.where, each.field or each.what))


def change(found: Compared, tag: str, metric: str = "") -> LineChange:
    (only,) = (
        c
        for c in found.changed
        if c.after.element == tag and (c.after.metric == metric or not metric)
    )
    return only


# ------------------------------------------------------------------------ review against permit


def test_every_change_of_the_scenario_is_found_and_none_invented() -> None:
    assert sorted(map(row, library().differences)) == sorted(BY_HAND.strip().splitlines())


def test_each_line_names_what_changed_it_and_nothing_else() -> None:
    thermal = [c for c in library().changed if c.after.metric not in ("SHGC", "VT")]
    found = {c.after.element: {short(d) for d in c.causes} for c in thermal}
    for tag in ("N-WN1", "S-WN1", "W-WN1"):
        assert found.pop(tag) == CAUSES["E-WN1"]
    assert found == CAUSES


def test_lines_that_stay_the_same_are_counted() -> None:
    """N-D1, S-E1 (2), E-D1, E-W8, C-WN2 (2), T-D2, T-D1, R-R3, T-R4, F-F1, T-G2 change nothing."""
    found = library()
    assert found.unchanged == 13
    assert len(found.changed) + found.unchanged + len(found.dropped) == 39
    assert [line.element for line in found.added] == ["R-HT1"]
    assert [line.element for line in found.dropped] == ["S-SP1"]
    assert dict(found.same)["element"] == 31 - 8


def test_the_dropped_panel_went_to_the_wall_beside_it() -> None:
    (moved,) = library().moved
    assert (moved.dropped, moved.gained, moved.surface) == (("S-SP1",), ("S-W1",), "South")
    assert convert(moved.area, "ft2") == pytest.approx(260)


def test_verdicts_before_and_now() -> None:
    verdicts = {
        (c.after.element, c.after.metric): (c.before.verdict, c.after.verdict)
        for c in library().changed
        if "verdict" in c.aspects
    }
    assert len(verdicts) == 21
    assert {after for _, after in verdicts.values()} == {"pass"}
    assert verdicts["N-W7", "U_assembly"] == ("official_decides", "pass")
    assert verdicts["R-SK1", "SHGC"] == ("path_closed", "pass")
    assert ("C-W4", "U_assembly") not in verdicts


def test_a_label_of_heat_does_not_explain_the_line_of_the_sun() -> None:
    sun = change(library(), "E-WN1", "SHGC")
    assert "WN1 rated u_factor" not in {short(d) for d in sun.causes}
    assert "WN1 rated basis" in {short(d) for d in sun.causes}


def test_findings_ratios_and_means() -> None:
    found = library()
    assert len(found.settled) == 18
    assert found.new == ()
    ((before, now),) = found.ratios
    assert before is not None
    assert now is not None
    assert (before.passed, now.passed) == (True, False)
    assert {(b or a).name for a, b in found.groups if (b or a)} == {"attic", "conditioned"}


def test_backwards_is_the_mirror() -> None:
    back = compared(PERMIT, REVIEW)
    assert len(back.changed) == len(library().changed)
    assert len(back.differences) == len(library().differences)
    assert [line.element for line in back.added] == ["S-SP1"]


# ------------------------------------------------------------------------------ other revisions


@pytest.fixture
def revise(tmp_path: Path) -> object:
    """Compare the permit set with a copy in which texts are replaced."""

    def revised(*edits: tuple[str, str], rules: bool = False) -> Compared:
        shutil.copytree(LIBRARY, tmp_path / "new", dirs_exist_ok=True)
        text = PERMIT.read_text(encoding="utf-8")
        for old, new in edits:
            assert old in text, old
            text = text.replace(old, new)
        path = tmp_path / "new/permit.yaml"
        path.write_text(text, encoding="utf-8")
        return compared(PERMIT, path)

    return revised


def test_the_same_file_changes_nothing() -> None:
    found = compared(PERMIT, PERMIT)
    assert (found.changed, found.differences, found.unchanged) == ((), (), 39)


@pytest.mark.parametrize("name", ["cap-beside-a-mean", "mean-over-cap", "weights", "threshold"])
def test_lines_of_one_element_on_one_metric_are_told_apart(name: str) -> None:
    """A component's own line and that of a mean stand side by side."""
    path = ROOT / f"tests/cases/building/{name}.yaml"
    run = pipeline.run(str(path))
    found = pipeline.compared(run, run)
    assert (found.changed, found.added, found.dropped) == ((), (), ())


def test_another_spelling_changes_nothing(revise: Any) -> None:
    found = revise(
        ("thickness: 2.5 in", "thickness: 63.5 mm"),
        ("net_area: 900 ft2", "net_area: 83.6127360 m2"),
        ("count: 12, width: 4 ft", "count: 12, width: 48 in"),
        ("layers:\n", "layers:    # outside first\n"),
    )
    assert found.differences == ()
    assert found.unchanged == 39


def test_a_renamed_element_and_assembly_are_the_same_pieces(revise: Any) -> None:
    found = revise(
        ("  W3:\n", "  W-BLOCK:\n"), ("assembly: W3,", "assembly: W-BLOCK,"),
        ("  E-W3: ", "  E-99: "), ("host: E-W3", "host: E-99"),
    )  # fmt: skip
    assert {(d.kind, d.what, d.before, d.name) for d in found.differences} == {
        ("assembly", "renamed", "W3", "W-BLOCK"), ("element", "renamed", "E-W3", "E-99"),
    }  # fmt: skip
    assert (found.changed, found.added, found.dropped) == ((), (), ())


def test_an_element_of_another_assembly(revise: Any) -> None:
    found = revise(("S-W2:  {assembly: W2,", "S-W2:  {assembly: W1,"))
    (only,) = found.changed
    assert {"assembly", "value"} <= set(only.aspects)
    assert [short(d) for d in only.causes] == ["S-W2 assembly"]


def test_a_zone_changes_every_limit_that_hangs_on_it(revise: Any) -> None:
    found = revise(("zone: V3w", "zone: V4"))
    lines = [c for c in found.changed if "limit" in c.aspects]
    assert len(lines) > 20
    for line in lines:
        assert "zone" in {d.field for d in line.causes}, line.after.element
        assert "value" not in line.aspects


def test_a_material_is_a_cause_where_it_is_used(revise: Any) -> None:
    found = revise(("{title: XPS board, resistance: R-5,", "{title: XPS board, resistance: R-4.5,"))
    assert {c.after.element for c in found.changed} == {
        "N-W1", "S-W1", "W-W1", "E-W3", "T-W6", "N-W5",
    }  # fmt: skip
    for line in found.changed:
        assert [short(d) for d in line.causes] == ["xps conductivity"]


def test_lines_of_several_rule_sets_are_compared_each_with_its_own(revise: Any) -> None:
    found = revise(
        ("rule_sets: [quillhaven-2025-3]", "rule_sets: [quillhaven-2025-3, merrow-2025]"),
        ("thickness: 2.5 in", "thickness: 1.5 in"),
    )
    assert {c.after.ruleset for c in found.changed} == {"quillhaven-2025-3"}
    assert {line.ruleset for line in found.added} == {"merrow-2025"}
    assert [(d.name, d.what) for d in found.differences if d.kind == "rule_set"] == [
        ("merrow-2025", "added")
    ]


def test_a_fact_touches_only_lines_that_ask_for_it(revise: Any) -> None:
    found = revise(
        ("slab_heated:    {value: no,", "slab_heated:    {value: yes,"),
        ("    heated: false\n", "    heated: true\n"),
    )
    assert [c.after.element for c in found.changed] == ["F-G1", "T-G2"]
    assert "slab_heated value" in {short(d) for d in found.changed[0].causes}


def test_layers_that_change_places_have_moved(revise: Any) -> None:
    lines = PERMIT.read_text(encoding="utf-8").splitlines()
    first = next(n for n, x in enumerate(lines) if "title: Soffit" in x)
    start = lines.index("  W6:")
    xps = next(n for n in range(start, start + 12) if "title: XPS" in lines[n])
    block = "\n".join(lines[xps + 1 : xps + 3])
    assert first
    assert "masonry" in block
    found = revise((f"{lines[xps]}\n{block}", f"{block}\n{lines[xps]}"))
    assert {d.what for d in found.differences} == {"moved"}


def test_a_changed_edition_is_the_cause_of_a_changed_limit(tmp_path: Path) -> None:
    for side in ("old", "new"):
        shutil.copytree(RULES, tmp_path / side / "rules")
        shutil.copytree(LIBRARY, tmp_path / side / "library")
    table = tmp_path / "new/rules/merrow-2025/table-1.csv"
    text = table.read_text(encoding="utf-8")
    lowered = text.replace("0.092", "0.081")
    assert lowered != text
    table.write_text(lowered, encoding="utf-8")
    pair = (str(tmp_path / side / "library/permit.yaml") for side in ("old", "new"))
    found = pipeline.compared(*pipeline.run_both(*pair))
    assert {c.after.element for c in found.changed} == {"E-W3", "N-W7"}
    for line in found.changed:
        assert "limit" in line.aspects
        assert [short(d) for d in line.causes] == ["quillhaven-2025-3 merrow-2025 files"]
    assert change(found, "N-W7").after.verdict == "fail"


# ------------------------------------------------------------------------------------ alignment


def test_numbers_are_the_same_whatever_their_last_binary_digit() -> None:
    assert same(0.1 + 0.2, 0.3)
    assert not same(0.3, 0.3001)
    assert not same(1, True)
    assert same(float("nan"), float("nan"))
    assert not same(float("nan"), 0.0)
    assert same((1.0, ("a",)), (1, ("a",)))


def test_equal_layers_are_paired_in_order() -> None:
    def board(title: str, r: float) -> ResistanceLayer:
        return ResistanceLayer("resistance", title, 1, r, 0.0, None, "", "")

    a, b, c = board("A", 1.0), board("B", 2.0), board("C", 3.0)
    assert in_order((a, b, c), (a, b, c)) == []
    assert in_order((a, c), (a, b, c)) == [(None, b)]
    assert in_order((a, b, c), (a, c)) == [(b, None)]
    assert in_order((a, a), (a,)) == [(a, None)]
    assert in_order((b, a), (a, b)) in ([(b, b)], [(a, a)])
    thicker = b._replace(resistance=2.5)
    assert in_order((a, b, c), (a, thicker, c)) == [(b, thicker)]
