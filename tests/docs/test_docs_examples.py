"""The written pages: every example is read, every key is there, every printed block is current."""

from __future__ import annotations

import json
import re
from datetime import date
from pathlib import Path

import pytest

from envcheck import pipeline, units
from envcheck.error_kinds import rule_sets, sheets
from envcheck.model.metrics import METRICS
from envcheck.read.cells import CellError, Grammar, read_cell
from envcheck.read.coefficient_tables import FORMS
from envcheck.read.condition_text import read_condition
from envcheck.read.materials import categories
from envcheck.read.rule_conventions import KEYS
from envcheck.read.rulesets import read_ruleset
from envcheck.read.schema import schema_text
from envcheck.read.yaml_reader import read_yaml
from tests.docs.excerpts import BLOCK, PAGES, printed
from tests.docs.pages import (
    DOCS,
    PROJECT,
    RULES,
    blocks,
    complete_project,
    keys_of,
    table,
    ticked,
    with_layers,
    with_part,
    write_rule_sets,
)

DAY = date(2026, 3, 2)
PARTS = [text for _, text in blocks(PROJECT, "project part")]
LAYERS = [(found[1], text) for found, text in blocks(PROJECT, r"layers (\S+)")]


def run(folder: Path, text: str) -> pipeline.Run:
    path = folder / "project.yaml"
    path.write_text(text, encoding="utf-8")
    return pipeline.run(str(path))


# ------------------------------------------------------------------------------- rule sets


@pytest.mark.parametrize(("name", "limits"), [("my-town", 3), ("my-county", 69), ("my-city-1", 69)])
def test_rule_set_is_read(folder: Path, name: str, limits: int) -> None:
    found = read_ruleset(name, [folder / "rules"], DAY, pipeline.names())
    assert len(found.limits) == limits


def test_all_rule_sets_are_tried(tmp_path: Path) -> None:
    assert write_rule_sets(tmp_path) == ("my-town", "my-county", "my-city-1")


def test_smallest_rule_set_has_twelve_lines(folder: Path) -> None:
    text = (folder / "rules" / "my-town" / "ruleset.yaml").read_text(encoding="utf-8")
    assert len(text.splitlines()) == 12


def test_amendment_replaces_one_figure(folder: Path) -> None:
    found = read_ruleset("my-city-1", [folder / "rules"], DAY, pipeline.names())
    changed = {(x.row, x.zone, x.metric): x.cell for x in found.limits if x.replaced}
    assert changed == {
        ("roof.above_deck", "C2 and C1w", "U_assembly"): "0.030",
        ("roof.above_deck", "C2 and C1w", "R_insulation"): "32ci",
    }


def test_larger_rule_set_states_every_convention(folder: Path) -> None:
    found = read_ruleset("my-county", [folder / "rules"], DAY, pipeline.names())
    default = [key for key, where in found.conventions.where.items() if "my-county" not in where]
    assert not default


def _grammar(metric: str, states: str) -> Grammar:
    text = "\n".join(ticked(states)) or "{}"
    raw, problems = read_yaml(text.encode(), "x", text_only=True)
    assert raw is not None and not problems
    slash = raw.get("slash") or {}
    kind, sides = next(iter(slash.items()), ("", ()))
    roles = ("",) * len(sides) if kind == "when" else tuple(sides)
    return Grammar(
        metric,
        METRICS[metric].sense,
        plus=tuple(raw.get("plus") or ()),
        slash=kind,
        slash_roles=roles,
        extent=raw.get("extent", ""),
        metrics=tuple(raw.get("other_metrics") or ()),
        bands=tuple((name, tuple(found)) for name, found in (raw.get("bands") or {}).items()),
    )


@pytest.mark.parametrize("row", table(RULES, "cells read"), ids=lambda row: str(row[0]))
def test_cell_is_read(row: list[str]) -> None:
    cell, metric, states, _ = row
    read = read_cell(ticked(cell)[0], _grammar(ticked(metric)[0], states))
    kinds = {branch.kind for branch in read.branches}
    special = {"NR": "no_requirement", "-": "not_covered", "<": "refers", ".": "refers"}
    expected = "refers" if ticked(cell)[0].startswith("see ") else "number"
    assert kinds == {special.get(ticked(cell)[0], expected)}


@pytest.mark.parametrize("row", table(RULES, "cells refused"), ids=lambda row: str(row[3]))
def test_cell_is_refused(row: list[str]) -> None:
    cell, metric, states, error = row
    text = ticked(cell)[0] if cell else ""
    with pytest.raises(CellError) as caught:
        read_cell(text, _grammar(ticked(metric)[0], states))
    assert caught.value.kind == ticked(error)[0]


def test_conditions_on_the_page_are_read() -> None:
    for text in ("<=0.30", "(0.30,0.50]", ">3"):
        assert f"`{text}`" in RULES
        assert read_condition(text, "wwr", ()).text == text
    assert read_condition("N|E|W", "orientation", ("N", "E", "S", "W")).words == ("N", "E", "W")


def test_error_list_is_complete() -> None:
    listed = [ticked(row[0])[0] for row in table(RULES, "errors")]
    assert listed == sorted(kind.id for kind in (*rule_sets.KINDS, *sheets.KINDS))


def test_every_convention_and_coefficient_column_is_named() -> None:
    for key in KEYS:
        assert f"| `{key}` |" in RULES
    for name, form in FORMS.items():
        if name == "compressed_batts":  # comes with envcheck, no file of a rule set
            continue
        row = next(line for line in RULES.splitlines() if _is_columns(line, name))
        named = {*form.words, *(c for spec in (form.value, *form.numbers) for c in spec[:2])} - {""}
        assert named <= set(ticked(row))


def _is_columns(line: str, name: str) -> bool:
    return line.startswith(f"| `{name}` | `") and line.rstrip(" |").endswith("`src`")


# -------------------------------------------------------------------------------- projects


def test_complete_project_is_judged(folder: Path) -> None:
    found = run(folder, complete_project())
    assert [line.element for line in found.judged.lines] == ["S-W1", "S-WIN", "S-WIN"]
    assert all(line.limit is not None for line in found.judged.lines)


@pytest.mark.parametrize("part", PARTS, ids=lambda part: str(part).partition(":")[0])
def test_part_is_read(folder: Path, part: str) -> None:
    found = run(folder, with_part(part))
    assert found.judged.lines


def test_rule_set_for_information_decides_nothing(folder: Path) -> None:
    found = run(folder, with_part(PARTS[0]))
    decides = {line.ruleset: line.decides for line in found.judged.lines}
    assert decides == {"my-county": True, "my-town": False}


@pytest.mark.parametrize(("category", "layers"), LAYERS)
def test_layers_have_a_value(folder: Path, category: str, layers: str) -> None:
    found = run(folder, with_layers(layers, category))
    (line,) = [line for line in found.judged.lines if line.element == "X"]
    assert line.solved is not None
    assert line.solved.missing == ()
    assert line.solved.value is not None and 0 < line.solved.value < 10


def test_the_drawn_panel_is_bounded(folder: Path) -> None:
    (part,) = [text for text in PARTS if "kind: section" in text]
    solved = run(folder, with_part(part)).solved["P1"]
    assert not solved.missing
    assert solved.low is not None
    assert solved.value == solved.high
    assert solved.low < solved.high < 1.001 * solved.low


def test_every_kind_of_layer_and_assembly_is_shown() -> None:
    schema = json.loads(schema_text("project"))["$defs"]
    shown = "".join(text for _, text in LAYERS)
    for kind in schema["layer"]["properties"]["kind"]["enum"]:
        assert f"kind: {kind}" in shown
    shown = "".join(PARTS)
    for kind in schema["assembly"]["properties"]["kind"]["enum"]:
        assert f"kind: {kind}" in shown


def test_every_category_is_listed() -> None:
    listed = PROJECT[PROJECT.index("Categories:") :].partition("\n\n")[0]
    assert sorted(ticked(listed)) == sorted(categories())


@pytest.mark.parametrize(("schema", "page"), [("project", PROJECT), ("rules", RULES)])
def test_every_key_of_the_schema_is_on_its_page(schema: str, page: str) -> None:
    keys = set(keys_of(json.loads(schema_text(schema))))
    assert len(keys) > 60
    missing = [k for k in sorted(keys) if not re.search(rf"`{k}`|(?<![\w.]){k}: ", page)]
    assert not missing


# ----------------------------------------------------------------------------------- units


def test_every_spelling_is_listed_and_parses() -> None:
    listed = {row[0]: ticked(row[1]) for row in table(PROJECT, "units")}
    alike = {"thickness", "run", "number"}  # read as a length; no unit
    assert listed == {
        name: list(quantity.spellings)
        for name, quantity in units.UNITS.items()
        if name not in alike
    }
    for name, spellings in listed.items():
        for spelling in spellings:
            assert units.parse(f"2 {spelling}", name) == units.to_si(2.0, spelling, name)


@pytest.mark.parametrize("row", table(PROJECT, "other spellings"), ids=lambda row: str(row[0]))
def test_other_spelling_is_the_same_unit(row: list[str]) -> None:
    written, meant = ticked(row[0])[0], ticked(row[1])[0]
    quantity = units.quantity_of(meant)
    assert units.parse(f"2 {written}", quantity) == units.parse(f"2 {meant}", quantity)


@pytest.mark.parametrize("row", table(PROJECT, "refused quantities"), ids=lambda row: str(row[0]))
def test_quantity_is_refused(row: list[str]) -> None:
    with pytest.raises(units.UnitError) as caught:
        units.parse(ticked(row[0])[0], row[1])
    assert caught.value.kind == ticked(row[2])[0]


def test_fractions_and_prefixes() -> None:
    # exact: the inch is 25.4 mm; R-13 is 13 times 0.176110 m2 K/W (from the exact Btu and foot)
    assert units.parse("5-1/2 in", "length") == pytest.approx(0.1397)
    assert units.parse("R-13", "resistance") == pytest.approx(13 * 0.1761101838, rel=1e-9)
    assert units.parse("RSI 2.29", "resistance") == 2.29


# --------------------------------------------------------------------------------- printed


@pytest.mark.parametrize("page", PAGES)
def test_printed_blocks_are_current(page: str) -> None:
    found = BLOCK.findall((DOCS / page).read_text(encoding="utf-8"))
    assert found
    for _, asked, text, _ in found:
        assert text == printed(asked), f"{asked}: run python -m tests.docs.excerpts"


def test_hand_check_can_be_repeated() -> None:
    """Sum and reciprocal done here, from the printed digits alone."""
    page = (DOCS / "hand-check.md").read_text(encoding="utf-8")
    terms, total = re.search(r" R = ([\d. +]+) = ([\d.]+) h ft2", page).groups()
    assert sum(float(term) for term in terms.split("+")) == pytest.approx(float(total), abs=5e-6)
    value = re.search(rf"U = 1 / {total} = ([\d.]+)", page)
    assert value
    assert f"{1 / float(total):.6g}" == value[1]
    fc, label, r5 = re.search(r"R5 = ([\d.]+) \* ([\d.]+) = ([\d.]+)", page).groups()
    assert float(fc) * float(label) == pytest.approx(float(r5), abs=5e-6)
    assert f"{value[1]} rounded half-up to 3 decimals: {round(float(value[1]), 3):.3f}" in page
