"""The page, the data and the table of a comparison: they say the same, in every format."""

from __future__ import annotations

import csv
import io
import json
import re
from functools import cache
from pathlib import Path

import pytest

from envcheck import pipeline
from envcheck.report import registry, revisions
from envcheck.report.answer import Answer
from envcheck.report.view import ViewOptions

LIBRARY = Path(__file__).parents[2] / "projects/quillhaven-library"


@cache
def made(units: str = "IP", turned: bool = False) -> Answer:
    files = [str(LIBRARY / name) for name in ("review.yaml", "permit.yaml")]
    old, new = pipeline.run_both(*(reversed(files) if turned else files))
    return revisions.build(
        revisions.Side(old.project, old.rulesets),
        revisions.Side(new.project, new.rulesets),
        pipeline.compared(old, new),
        ViewOptions(units=units),
    )


def written(name: str, units: str = "IP", turned: bool = False) -> str:
    answer = registry.format_named(name).answer
    assert answer is not None
    return answer(made(units, turned), 100)


def test_every_answering_format_writes_it() -> None:
    assert {"text", "markdown", "html", "json", "csv"} <= set(registry.answering())
    for name in registry.answering():
        assert "N-W5" in written(name)


def test_the_text_says_what_changed_and_why() -> None:
    page = written("text")
    assert "39 lines before, 39 now: 25 changed (21 of them their verdict), 13 unchanged" in page
    assert re.search(r"N-W1 +A-201 +U 0.0647 +0.0489 +<= 0.060 +over its limit +within\n", page)
    for sentence in (
        "W1, XPS: thickness 1.5 in -> 2.5 in",
        "W2: Mineral wool between Z-girts 3 in replaced by Mineral wool 4 in",
        "W2: Stainless brackets, chi 0.02 Btu/(h F), 0.375 1/ft2 added",
        "W4, 2x6 studs with R-21: labelled R 19 h ft2 F/Btu -> 21 h ft2 F/Btu",
        "insulated depth not stated -> 9 ft",
        "fact slab heated: not stated -> no",
        "exception of clause 7.2: claim by owner dropped",
        "skylights / gross roof: 5.25 % -> 3.5 %",
        "S-SP1: its 260 ft2 of South went to S-W1",
        "count 18 -> 12",
    ):
        assert sentence in page
    assert "it approves nothing" in " ".join(page.split())
    assert all(len(line) <= 100 for line in page.splitlines())


def test_lines_that_became_worse_stand_first() -> None:
    turned = written("text", turned=True).split("Lines that changed")[1].split("What caused")[0]
    assert turned.index("over its limit") < turned.index("R-R2")
    assert turned.index("row closed") < turned.index("C-W4")


def test_si_figures_are_the_same_wall() -> None:
    """1.5 in = 38.1 mm; 836 ft2 = 77.667 m2; 0.0647 Btu/(h ft2 F) = 0.368 W/(m2 K)."""
    page = written("text", "SI")
    assert "W1, XPS: thickness 38.1 mm -> 63.5 mm" in page
    assert "net area 77.667 m2" in page
    assert re.search(r"N-W1 +A-201 +U 0.368 +0.278 ", page)
    assert "limits as printed, in Btu/(h ft F), Btu/(h ft2 F)" in " ".join(page.split())


def test_json_holds_the_figures_of_the_text() -> None:
    found = json.loads(written("json"))
    assert found["schema_version"] == 1
    first = found["changed"][0]
    assert first["element"] == "N-W1"
    assert first["before"]["value"] == pytest.approx(0.06472 * 5.678263, rel=1e-4)
    assert {cause["field"] for cause in first["causes"]} == {"category_claimed", "thickness"}
    assert found["unchanged_lines"] == 13
    assert found["before"]["file"].endswith("review.yaml")


def test_csv_is_one_row_for_each_change_with_numbers_as_numbers() -> None:
    rows = list(csv.DictReader(io.StringIO(written("csv"))))
    (value,) = (r for r in rows if (r["name"], r["what"]) == ("N-W1", "value"))
    assert (value["before"], value["now"], value["unit"]) == ("0.0647", "0.0489", "Btu/(h ft2 F)")
    assert "thickness 1.5 in -> 2.5 in" in value["caused by"]
    (layer,) = (r for r in rows if (r["of"], r["name"], r["part"]) == ("assembly", "W1", "XPS"))
    assert (float(layer["before"]), float(layer["now"]), layer["unit"]) == (1.5, 2.5, "in")
    for cells in rows:
        for cell in cells.values():
            assert not cell.startswith(("=", "@"))
            assert not re.match(r"[+-](?!\d)", cell), cell
    found = json.loads(written("json"))
    lines = {(r["name"], r["part"]) for r in rows if r["of"] == "line"}
    assert len(lines) == len(found["changed"]) + len(found["added"]) + len(found["dropped"])


def test_a_title_with_markup_stays_inert() -> None:
    old, new = pipeline.run_both(*[str(LIBRARY / "permit.yaml")] * 2)
    from dataclasses import replace

    bad = replace(new.project, title="=1+1<script>\x1b[31m")
    page = revisions.build(
        revisions.Side(old.project, old.rulesets),
        revisions.Side(bad, new.rulesets),
        pipeline.compared(old, replace_project(new, bad)),
        ViewOptions(),
    )
    for name in ("html", "text", "csv"):
        answer = registry.format_named(name).answer
        assert answer is not None
        text = answer(page, 100)
        assert "\x1b" not in text
        assert name != "html" or "<script>" not in text
        assert name != "csv" or ",=1" not in text


def replace_project(run: pipeline.Run, project: object) -> pipeline.Run:
    return pipeline.Run(
        project,
        run.rulesets, run.judged, run.properties, run.solved, run.exit_status,
    )  # fmt: skip
