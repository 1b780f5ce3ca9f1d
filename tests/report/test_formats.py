"""Every format, letter by letter, over the shared fixture, and the same figures in all."""

from __future__ import annotations

import csv
import io
import json
import re
from pathlib import Path

import pytest
from jsonschema import Draft202012Validator

from envcheck.report import registry, view
from envcheck.report.view import View, ViewOptions
from tests.report.fixture import JUDGED, PROJECT, RULESETS

EXPECTED = Path(__file__).parent / "expected"
SCHEMA = Path(view.__file__).parent / "schemas" / "report.schema.json"


def made(name: str = "text", **options: object) -> View:
    details = registry.format_named(name).details
    asked = ViewOptions(**{"details": details, **options})
    return view.build(PROJECT, RULESETS, JUDGED, asked)


def written(name: str, **options: object) -> str:
    return registry.format_named(name).render(made(name, **options))


@pytest.mark.parametrize(
    ("name", "file", "options"),
    [
        ("text", "report.txt", {}),
        ("text", "report-details.txt", {"details": True}),
        ("text", "report-si.txt", {"units": "SI", "bounds": True}),
        ("markdown", "report.md", {"details": True}),
        ("csv", "report.csv", {}),
        ("json", "report.json", {}),
    ],
)
def test_exact_text(name: str, file: str, options: dict[str, object]) -> None:
    assert written(name, **options) == (EXPECTED / file).read_text(encoding="utf-8")


@pytest.mark.parametrize("name", registry.names())
def test_every_format_says_what_it_is(name: str) -> None:
    form = registry.format_named(name)
    assert form.name == name
    assert form.title and form.extension


def test_an_unknown_format_is_refused() -> None:
    with pytest.raises(KeyError, match="papyrus"):
        registry.format_named("papyrus")


@pytest.mark.parametrize("units", ["SI", "IP"])
def test_all_formats_carry_the_same_figures(units: str) -> None:
    from_json = json.loads(written("json", units=units))["rows"]
    from_csv = list(csv.DictReader(io.StringIO(written("csv", units=units))))
    text, markdown = written("text", units=units), written("markdown", units=units)
    assert len(from_json) == len(from_csv) == len(JUDGED.lines)
    table = markdown.replace("\\", "")
    for row, cells in zip(from_json, from_csv, strict=True):
        assert row["tag"] == cells["tag"]
        assert row["verdict"] == cells["verdict"]
        values = [v for head, v in cells.items() if v and re.match(r"(U or C|F|R|SHGC).* \[", head)]
        assert values == ([row["value"]["text"]] if row["value"]["text"] else [])
        assert cells["room left [printed unit]"] == row["room"]["text"].removeprefix("+")
        assert cells["compared [printed unit]"] == row["compared"]["text"]
        for page in (text, table):
            if row["verdict"] != "too_close" and row["value"]["text"]:
                assert re.search(
                    rf"{row['tag']}\b.*{row['symbol']} {re.escape(row['value']['text'])}\b", page
                )
            assert row["room"]["text"] in page
            assert row["limit"] in page
        (own,) = re.findall(rf"^\| {row['tag']} .*\| +{row['symbol']} .*$", table, re.M)
        assert row["room"]["text"] in own and row["limit"] in own


def test_json_is_what_the_schema_says() -> None:
    schema = json.loads(SCHEMA.read_text(encoding="utf-8"))
    Draft202012Validator.check_schema(schema)
    report = json.loads(written("json"))
    assert list(Draft202012Validator(schema).iter_errors(report)) == []
    assert report["schema_version"] == 1
    report["rows"][0]["verdict"] = "approved"
    del report["summary"]
    assert len(list(Draft202012Validator(schema).iter_errors(report))) == 2


def test_csv_has_numbers_as_numbers_with_units_in_the_heads() -> None:
    rows = list(csv.DictReader(io.StringIO(written("csv"))))
    first = rows[0]
    assert float(first["U or C [Btu/(h ft2 F)]"]) == 0.0647
    assert float(first["area [ft2]"]) == 1818
    assert float(first["room left [printed unit]"]) == -0.0047
    assert first["U or C [W/(m2 K)]"] == ""
    assert list(rows[0]) == written("csv", units="SI").splitlines()[0].split(",")


def test_text_fits_its_width_and_breaks_no_number() -> None:
    for width in (72, 80, 100):
        lines = written("text", details=True, width=width).splitlines()
        for line in lines:
            assert len(line) <= width or "  " in line.strip() or len(line.split()) == 1, line
    narrow = written("text", width=72)
    for row in made().rows:
        for figure in (row.value, row.room, row.low, row.high):
            assert figure.text in narrow


def test_colour_stands_beside_the_words_and_never_in_their_place() -> None:
    plain, coloured = written("text"), written("text", colour=True)
    assert "\x1b[" not in plain
    assert "\x1b[31mover its limit\x1b[0m" in coloured
    assert re.sub(r"\x1b\[\d*m", "", coloured) == plain


def test_lines_over_their_limit_come_first_then_the_open_ones_in_file_order() -> None:
    tags = [row.tag for row in made().rows]
    assert tags == ["N-1", "N-3", "N-4", "R-1", "N-5", "N-6", "N-2", "G-1"]


def test_nothing_reads_as_an_approval() -> None:
    for name in ("text", "markdown", "json"):
        words = written(name)
        assert "approves nothing. The code official decides." in words
        assert not re.search(r"\b(approved|complies|compliant|certified)\b", words, re.IGNORECASE)


def test_the_date_is_the_projects_or_the_one_asked_for() -> None:
    assert "2026-03-09" in written("text")
    other = written("text", date="2026-05-01")
    assert "2026-05-01" in other
    assert "2026-03-09" not in other
