"""What a cure makes worse, and labels that are found in a table."""

from __future__ import annotations

import shutil
from pathlib import Path

import pytest

from envcheck import pipeline
from envcheck.advise.breaks import Before, breaks, implied_conductivity
from envcheck.advise.levers import levers
from envcheck.model.judged import Line, PathResult
from envcheck.units import convert, to_si
from tests.advise.test_room import LIBRARY, RULES, changed, verdicts

LEAST = 0.015


def line(verdict: str, labels: str, ruleset: str = "a") -> Line:
    paths = (PathResult("insulation", labels, "", "", ""),)
    return Line(ruleset, True, "N-W7", "", "U_assembly", verdict, (), None, None, None, paths=paths)


def said(before: Line, after: Line) -> tuple[str, ...]:
    project = pipeline.run(str(LIBRARY / "permit.yaml"), (RULES,)).project
    assembly = project.assemblies["W7"]
    lever = next(x for x in levers(assembly, ()) if x.kind == "share")
    known = Before({(before.ruleset, before.element, before.metric): before}, LEAST)
    return breaks(project, lever, assembly, [after], known)


def test_lines_rule_sets_and_paths_that_a_change_breaks() -> None:
    assert said(line("fail", "fail"), line("pass", "fail")) == ()
    assert said(line("pass", "fail", "b"), line("fail", "fail", "b")) == ("N-W7 by b: fail",)
    lost = ("N-W7 by a: the R-value path no longer passes",)
    assert said(line("pass", "pass"), line("pass", "fail")) == lost


def test_a_label_that_no_cavity_of_that_depth_holds(tmp_path: Path) -> None:
    """2x4 at 36 % framing: what the cavity needs at 0.015 W/(m K) may be deeper than 3.5 in."""
    project = changed(tmp_path, "share: 25 %", "share: 36 %")
    run = pipeline.run(str(project), (RULES,))
    each = next(x for x in pipeline.remedies(run) if x.assembly == "W7")
    labels = [x for x in each.changes if x.lever == "label"]
    deep = to_si(3.5, "in")
    for change in labels:
        too_thick = implied_conductivity(deep, change.after) < LEAST
        assert any("cavity of 2x4 studs" in text for text in change.breaks) == too_thick, change
    assert implied_conductivity(0.089, 89.0 / 15.0) == pytest.approx(LEAST)
    assert labels


@pytest.mark.parametrize("label", [30, 34, 36, 60])
def test_the_cavity_is_spoken_of_from_the_class_band_on(label: int) -> None:
    """3.5 in at 0.015 W/(m K): 5.927 m2 K/W = R-33.65."""
    project = pipeline.run(str(LIBRARY / "permit.yaml"), (RULES,)).project
    assembly = project.assemblies["W7"]
    lever = next(x for x in levers(assembly, ()) if x.kind == "label")
    made = lever.applied(to_si(label, "h*ft2*degF/Btu"))
    found = breaks(project, lever, made, [], Before({}, LEAST))
    assert bool(found) == (label > 33.65)


@pytest.fixture
def rows_of_labels(tmp_path: Path) -> Path:
    """The rules with two more labels: R-15 too weak a factor, R-21 enough (invented)."""
    rules = tmp_path / "rules"
    shutil.copytree(RULES, rules)
    table = rules / "merrow-2025/cavity_factors.csv"
    text = table.read_text("utf-8")
    text += '15,h*ft2*degF/Btu,3-5/8 in,16 in,0.43,"Table 7, invented row"\n'
    text += '21,h*ft2*degF/Btu,3-5/8 in,16 in,0.40,"Table 7, invented row"\n'
    table.write_text(text, encoding="utf-8")
    return rules


def test_labels_of_a_table_are_tried_row_by_row(rows_of_labels: Path, tmp_path: Path) -> None:
    """W1 without its fill: 7.95 - 5.98 = 1.97, XPS 7.5. R-15: 9.47 + 6.45 gives 0.0628, over
    0.060; R-21: 9.47 + 8.40 gives 0.0560."""
    run = pipeline.run(str(LIBRARY / "review.yaml"), (str(rows_of_labels),))
    each = next(x for x in pipeline.remedies(run) if x.assembly == "W1")
    (change,) = (x for x in each.changes if x.lever == "label")
    assert change.basis == "table"
    assert convert(change.after, "h*ft2*degF/Btu") == pytest.approx(21.0)
    assert convert(change.value, "Btu/(h*ft2*degF)") == pytest.approx(1 / 17.87, rel=2e-4)
    text = pipeline.applied((LIBRARY / "review.yaml").read_text("utf-8"), [change])
    assert (
        text.count("fill: {label: R-21")
        == (LIBRARY / "review.yaml").read_text().count("fill: {label: R-21") + 1
    )
    shutil.copytree(LIBRARY / "evidence", tmp_path / "evidence")
    (tmp_path / "changed.yaml").write_text(text, encoding="utf-8")
    again = pipeline.run(str(tmp_path / "changed.yaml"), (str(rows_of_labels),))
    after = {x.element: x.verdict for x in again.judged.lines if x.metric == "U_assembly"}
    assert {after[tag] for tag in ("N-W1", "S-W1", "W-W1")} == {"pass"}


def test_the_last_row_that_passes_is_the_bound(rows_of_labels: Path) -> None:
    """As W1 of the permit set with R-21: R-13 is enough there, and the least row printed."""
    run = pipeline.run(str(LIBRARY / "permit.yaml"), (str(rows_of_labels),))
    each = next(x for x in pipeline.rooms(run) if x.assembly == "W1")
    (bound,) = (x for x in each.bounds if x.lever == "label")
    assert bound.state == "table"
    assert convert(bound.most, "h*ft2*degF/Btu") == pytest.approx(13.0)


def test_a_line_on_a_stated_figure_says_so(tmp_path: Path) -> None:
    """An SHGC over its limit has no cure among layers: another product."""
    source = LIBRARY / "permit.yaml"
    text = source.read_text("utf-8").replace("shgc: 0.35", "shgc: 0.80")
    assert verdicts(text, source, tmp_path)["quillhaven-2025-3", "R-SK1", "SHGC"] == "fail"
    run = pipeline.run(str(tmp_path / "moved.yaml"), (RULES,))
    (each,) = (x for x in pipeline.remedies(run) if x.assembly == "SK1")
    assert [(x.what, x.why) for x in each.refused] == [("R-SK1, SHGC", "stated")]
