"""The workbook recalculated by an office suite gives the check's own figures, and follows a change.

Independent of envcheck: every formula is evaluated by LibreOffice.
"""

from __future__ import annotations

import json
from pathlib import Path

import openpyxl
import pytest

from envcheck.__main__ import main
from tests.e2e.office import recalculated

ROOT = Path(__file__).parents[2]
PROJECTS = {
    "review": ROOT / "projects/quillhaven-library/review.yaml",
    "permit": ROOT / "projects/quillhaven-library/permit.yaml",
    "renovation": ROOT / "projects/brannvik-warehouse/renovation.yaml",
}
CLOSE = 1e-9


def written(name: str, form: str, folder: Path, *more: str) -> Path:
    target = folder / f"{name}.{form}"
    main(["check", str(PROJECTS[name]), "--format", form, "--output", str(target), *more])
    return target


def lines(book: Path) -> list[dict[str, object]]:
    sheet = openpyxl.load_workbook(book, data_only=True)["Lines"]
    heads, *rows = sheet.iter_rows(values_only=True)
    return [dict(zip(heads, row, strict=True)) for row in rows]


@pytest.mark.parametrize("units", ["SI", "IP"])
@pytest.mark.parametrize("name", PROJECTS)
def test_recalculated_figures_are_those_of_the_json(name: str, units: str, tmp_path: Path) -> None:
    report = json.loads(written(name, "json", tmp_path, "--units", units).read_text("utf-8"))
    book = written(name, "xlsx", tmp_path, "--units", units)
    found = lines(recalculated(book, tmp_path))
    assert len(found) == len(report["rows"])
    compared = 0
    for cells, row in zip(found, report["rows"], strict=True):
        assert (cells["tag"], cells["verdict of the check"]) == (row["tag"], row["verdict_text"])
        own = row["comparison"]
        if own is None:
            continue
        compared += 1
        assert cells["value, printed unit"] == pytest.approx(own["value"], rel=CLOSE)
        assert cells["as compared"] == pytest.approx(own["compared"], rel=CLOSE)
        assert cells["room left"] == pytest.approx(own["margin"], abs=1e-9)
        if row["verdict"] in ("pass", "fail"):
            first = str(cells["verdict of this sheet"]).split(",")[0]
            assert row["verdict_text"].startswith(first)
    assert compared > 8


@pytest.mark.parametrize("name", PROJECTS)
def test_every_worksheet_comes_to_the_value_of_its_assembly(name: str, tmp_path: Path) -> None:
    report = json.loads(written(name, "json", tmp_path).read_text("utf-8"))
    book = recalculated(written(name, "xlsx", tmp_path), tmp_path)
    rows = list(
        openpyxl.load_workbook(book, data_only=True)["Assemblies"].iter_rows(values_only=True)
    )
    results: dict[str, object] = {}
    title = ""
    for row in rows:
        if str(row[0] or "").startswith("Assembly "):
            title = str(row[0])
        elif title and isinstance(row[2], float | int) and row[0]:
            results[title] = row[2]
    wanted = {
        f"Assembly {each['assembly']}: {each['title']}": each["unrounded"]
        for each in report["assemblies"]
        if each["unrounded"] is not None
    }
    assert len(wanted) > 5
    for title, value in wanted.items():
        assert results[title] == pytest.approx(value, rel=CLOSE), title


def test_a_changed_thickness_moves_the_verdict(tmp_path: Path) -> None:
    """W3 with 2 in of XPS in place of 1.5 in: R 9.832 + 2.5 = 12.332, U 0.0811, within 0.092."""
    book = written("review", "xlsx", tmp_path)
    changed = openpyxl.load_workbook(book)
    sheet = changed["Assemblies"]
    start = next(r[0].row for r in sheet.iter_rows() if str(r[0].value).startswith("Assembly W3:"))
    cell = next(
        sheet.cell(row, 3)
        for row in range(start, start + 20)
        if sheet.cell(row, 2).value == "L" and sheet.cell(row, 3).value == pytest.approx(1.5)
    )
    cell.value = 2.0
    moved = tmp_path / "moved.xlsx"
    changed.save(moved)
    before = next(r for r in lines(recalculated(book, tmp_path)) if r["tag"] == "E-W3")
    after = next(r for r in lines(recalculated(moved, tmp_path)) if r["tag"] == "E-W3")
    assert before["verdict of this sheet"] == "over its limit"
    assert after["verdict of this sheet"] == "within"
    assert after["value"] == pytest.approx(1 / (1 / before["value"] + 2.5), rel=1e-9)
    assert after["value"] == pytest.approx(0.0811, abs=5e-5)
