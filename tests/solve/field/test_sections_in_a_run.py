"""A drawn section from the file to the verdict, by an invented rule set."""

from __future__ import annotations

from pathlib import Path

import pytest

from envcheck.model.judged import Line
from envcheck.pipeline import Run, run
from envcheck.solve.bracket import CLOSE, TOLERANCE

PROJECT = """
envcheck: 1
project: {title: Invented hall, permit_application_date: 2026-03-02, report_date: 2026-03-02}
site: {place: Nowhere, zones: [{zone: Z, source: invented}]}
rule_sets: [invented]
assemblies:
  P1:
    kind: section
    title: Metal panel
    repeat: 1000 mm
    outside_film: 0.04 m2*K/W
    inside_film: 0.13 m2*K/W
    layers:
      - {kind: material, title: Outer sheet, material: steel, thickness: 0.6 mm}
      - {kind: material, title: Core, material: mineral_wool_board, thickness: 98.8 mm}
      - {kind: material, title: Inner sheet, material: steel, thickness: 0.6 mm}
    pieces:
      - {title: Edge profile, material: steel, x: [0 mm, 1.5 mm]}
elements:
  W: {assembly: P1, category: wall.metal_building, net_area: 40 m2}
"""
RULES = """
ruleset: invented
document: {title: Invented limits, edition: "1"}
jurisdiction: Nowhere (invented)
status: example
invented: yes
effective: {from: 2025-01-01, until: null, date_tested: permit application}
decimal: "."
units: {U: W/(m2.K)}
zones: {scheme: one zone, chosen_by: nobody, order: [Z]}
tables:
  - {id: T1, file: table.csv, clause: Table 1, orientation: zones_across,
     rows: {"*": {metric: U_assembly}}}
sources: {P: {document: invented, page: "1", read: 2025-03-01}}
conventions: {methods: [{category: "*", method: METHOD, clause: Table 2}]}
"""


def judged(folder: Path, limit: str, method: str = "series", project: str = PROJECT) -> Run:
    rules = folder / "rules" / "invented"
    rules.mkdir(parents=True)
    (rules / "ruleset.yaml").write_text(RULES.replace("METHOD", method))
    (rules / "table.csv").write_text(
        f"row,label,Z,src\nwall.metal_building,Metal walls,{limit},P\n"
    )
    (folder / "project.yaml").write_text(project)
    return run(str(folder / "project.yaml"))


def line_of(found: Run) -> Line:
    (line,) = found.judged.lines
    return line


# The panel by quadratic triangles of scikit-fem 12.0.2 (half of it between planes of symmetry, on a
# mesh of its own, falling with refinement): .6410, .6398, .6395 W/(m2 K).
INDEPENDENT = 0.63949


@pytest.mark.parametrize(("limit", "verdict"), [("0.70", "pass"), ("0.60", "fail")])
def test_the_bracket_decides_whatever_method_the_class_has(
    tmp_path: Path, limit: str, verdict: str
) -> None:
    found = line_of(judged(tmp_path, limit)).solved
    assert found is not None
    assert found.decided_by_bracket
    assert found.setting.method == "two_dimensional"
    assert found.low is not None
    assert found.high is not None
    assert found.high / found.low - 1 <= TOLERANCE
    assert found.value == found.high
    assert found.value == pytest.approx(INDEPENDENT, rel=TOLERANCE)


@pytest.mark.parametrize("limit", ["0.99", "0.30"])
def test_a_drawn_section_is_solved_also_where_the_wirings_decide(
    tmp_path: Path, limit: str
) -> None:
    found = line_of(judged(tmp_path, limit)).solved
    assert found is not None
    assert found.low is not None
    assert found.high is not None
    assert found.high / found.low - 1 <= TOLERANCE


def test_a_limit_inside_the_bracket_is_asked_for_once_more(tmp_path: Path) -> None:
    coarse = line_of(judged(tmp_path / "first", "0.70")).solved
    assert coarse is not None
    assert coarse.low is not None
    assert coarse.high is not None
    inside = f"{(coarse.low + 2 * coarse.high) / 3:.5f}"
    closer = line_of(judged(tmp_path / "again", inside))
    assert closer.solved is not None
    assert closer.solved.low is not None
    assert closer.solved.high is not None
    assert closer.solved.high / closer.solved.low - 1 <= CLOSE
    assert closer.verdict in ("pass", "fail")


def test_values_beside_say_that_the_combined_method_is_excluded(tmp_path: Path) -> None:
    found = line_of(judged(tmp_path, "0.70")).solved
    assert found is not None
    notes = {beside.name: beside.note for beside in found.beside}
    assert "ISO 6946, which excludes it here" in notes["combined"]
    assert found.ratio is not None
    assert f"by a factor of {found.ratio:.2f}" in notes["combined"]


def test_a_refused_method_stays_refused(tmp_path: Path) -> None:
    rules = "series, refused: [two_dimensional]"
    found = line_of(judged(tmp_path, "0.70", rules)).solved
    assert found is not None
    assert found.value is None
    assert found.missing[0].startswith("another method: Table 2 does not accept conduction of")


def test_what_a_drawing_weighs_and_warns_of(tmp_path: Path) -> None:
    """Steel 1.2 mm + 98.8 x 1.5/500 mm of 7800 kg/m3, wool 98.8 x .997 mm of 70 kg/m3, by hand."""
    from envcheck.solve.properties import properties

    narrow = PROJECT.replace("1000 mm", "500 mm")
    found = judged(tmp_path, "0.70", project=narrow)
    weight = properties(found.project.assemblies["P1"]).weight
    assert weight == pytest.approx(7800 * (0.0012 + 0.0988 * 0.003) + 70 * 0.0988 * 0.997)
    solved = line_of(found).solved
    assert solved is not None
    assert any(caution.topic == "moisture" for caution in solved.cautions)


def test_the_report_lists_every_piece_with_its_place(tmp_path: Path) -> None:
    from envcheck.report.details import assembly_view

    found = judged(tmp_path, "0.70")
    solved = line_of(found).solved
    assert solved is not None
    rows = assembly_view(found.project.assemblies["P1"], solved, ["W"], "SI").layers
    assert [row.title for row in rows] == [
        "Metal panel", "- Outer sheet", "- Core", "- Inner sheet", "- Edge profile",
    ]  # fmt: skip
    assert rows[-1].note == "x 0 mm to 1.5 mm, y 0 mm to 100 mm"
    assert rows[0].note == "drawing, 1000 mm wide; 4 pieces, periodic"
