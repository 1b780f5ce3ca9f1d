"""``envcheck rules``: a table typed from a template, linted, printed, compared, locked, checked."""

from __future__ import annotations

import csv
import io
import json
from itertools import product
from pathlib import Path
from time import perf_counter

import pytest
from click.testing import CliRunner

from envcheck.__main__ import main
from envcheck.cli import envcheck
from envcheck.cli.rules import COMMANDS
from tests.lint.sets import MEANING, SHEET, write

ROOT = Path(__file__).parent.parent.parent
EXAMPLES = ROOT / "tests" / "cases" / "rules"
Captured = pytest.CaptureFixture[str]
DIRECTIONS = ("zones-across", "zones-down", "one-sheet-per-zone", "none")
METRICS = ("U_assembly", "U_assembly,R_insulation,U_product", "C_factor,F_factor,SHGC")


def said(capsys: Captured, *arguments: str, status: int = 0) -> str:
    assert main(["rules", *arguments]) == status
    return capsys.readouterr().out


@pytest.mark.parametrize("name", COMMANDS)
def test_every_command_shows_one_worked_line(name: str) -> None:
    made = CliRunner().invoke(envcheck, ["rules", name, "--help"], prog_name="envcheck")
    assert made.exit_code == 0
    assert made.output.count("A worked line:") == 1
    assert f"\n    envcheck rules {name} " in made.output
    assert made.output.count(COMMANDS[name][1]) <= 1


def test_an_unknown_command_is_named(capsys: Captured) -> None:
    assert main(["rules", "lnit"]) == 2
    assert "did you mean 'lint'?" in capsys.readouterr().err


# ------------------------------------------------------------------------------------------ new


@pytest.mark.parametrize(("direction", "metrics"), list(product(DIRECTIONS, METRICS)))
@pytest.mark.parametrize("decimal", [".", ","])
def test_a_new_set_waits_for_its_cells_and_nothing_else(
    tmp_path: Path, capsys: Captured, direction: str, metrics: str, decimal: str
) -> None:
    folder = tmp_path / "rules" / "my-town"
    asked = ["--direction", direction, "--metrics", metrics, "--decimal", decimal, "--units", "SI"]
    said(capsys, "new", "my-town", "--in", str(folder.parent), *asked)
    data = json.loads(said(capsys, "lint", str(folder), "--format", "json", status=2))
    (entry,) = data["rule_sets"]
    assert entry["cells"] > 0
    assert len(entry["findings"]) == entry["cells"]
    assert {(f["check"], "blank" in f["what"]) for f in entry["findings"]} == {("L01", True)}
    for sheet in folder.glob("*.csv"):  # typed, it has no error
        separator = ";" if decimal == "," else ","
        rows = list(csv.reader(io.StringIO(sheet.read_text()), delimiter=separator))
        for row in rows:
            if row[-1] == "P":
                row[2:-1] = ["NR" for _ in row[2:-1]]
        text = "\n".join(separator.join(f'"{c}"' for c in row) for row in rows)
        sheet.write_text(text + "\n")
    said(capsys, "lint", str(folder))


def test_nothing_is_overwritten(tmp_path: Path, capsys: Captured) -> None:
    inside = ["new", "my-town", "--in", str(tmp_path)]
    said(capsys, *inside)
    before = {p.name: p.read_bytes() for p in (tmp_path / "my-town").iterdir()}
    assert main(["rules", *inside]) == 2
    assert "exists already" in capsys.readouterr().err
    assert {p.name: p.read_bytes() for p in (tmp_path / "my-town").iterdir()} == before


@pytest.mark.parametrize(
    "wrong",
    [
        ["My Town"],
        ["../up"],
        ["town", "--zones", "A,,B"],
        ["town", "--zones", "A,A"],
        ["town", "--metrics", "U_asembly"],
        ["town", "--rows", "wall.wodd_frame"],
        ["town", "--metrics", "SHGC", "--rows", "wall.mass"],
    ],
)
def test_a_wrong_option_writes_nothing(tmp_path: Path, capsys: Captured, wrong: list[str]) -> None:
    assert main(["rules", "new", "--in", str(tmp_path / "rules"), *wrong]) == 2
    assert capsys.readouterr().err
    assert not (tmp_path / "rules").exists()


def test_zones_with_odd_names_stay_text(tmp_path: Path, capsys: Captured) -> None:
    said(capsys, "new", "t", "--in", str(tmp_path), "--zones", 'yes,4,5 "M": #x')
    data = json.loads(said(capsys, "lint", str(tmp_path), "--format", "json", status=2))
    assert {f["check"] for f in data["rule_sets"][0]["findings"]} == {"L01"}


# ----------------------------------------------------------------------------------------- lint


def test_remarks_do_not_fail_and_errors_do(tmp_path: Path, capsys: Captured) -> None:
    town = write(tmp_path, SHEET.replace("0.021", "NR"))
    page = said(capsys, "lint", str(town))
    assert "1 rule set: 0 errors, 1 remark, 0 confirmed" in page
    assert 'confirm with: "L06 T1/roof.attic/C/U": reason' in page
    assert "t.csv:4: row 'roof.attic', column 'C / U'" in " ".join(page.split())
    write(tmp_path, SHEET.replace("0.021", "NR"), MEANING + 'confirmed: {"L06 T1": printed so}\n')
    page = said(capsys, "lint", str(town))
    assert "0 remarks, 1 confirmed" in page
    assert "confirmed: printed so" in page
    write(tmp_path, SHEET.replace("0.021", "0,021"))
    assert "1 error, 0 remarks" in said(capsys, "lint", str(town), status=2)
    assert main(["rules", "lint", str(tmp_path / "nowhere")]) == 2


def test_check_stops_at_errors_and_never_at_remarks(tmp_path: Path, capsys: Captured) -> None:
    """The starter's wall limit made a hundredfold: implausible, and checked all the same."""
    project = tmp_path / "room.yaml"
    assert main(["new", str(project), "--with-rules"]) == 0
    sheet = tmp_path / "rules" / "example-town" / "table-1.csv"
    before = sheet.read_text()
    row = next(line for line in before.splitlines() if line.startswith("wall.wood_frame"))
    figure = row.split(",")[-3]
    sheet.write_text(before.replace(figure, f"{float(figure) * 100:g}", 1))
    assert "L04" in said(capsys, "lint", str(sheet.parent))
    assert main(["check", str(project)]) == 0
    sheet.write_text(before.replace(figure, "", 1))
    assert main(["check", str(project)]) == 2


def test_every_set_of_a_folder_is_linted(capsys: Captured) -> None:
    data = json.loads(said(capsys, "lint", str(EXAMPLES), "--format", "json"))
    assert [Path(x["folder"]).name for x in data["rule_sets"]] == [
        "example-2024",
        "example-2024-hilltown",
    ]
    assert data["errors"] == data["remarks"] == 0


# ----------------------------------------------------------------------------------------- show


def test_the_sheet_comes_back_as_typed(tmp_path: Path, capsys: Captured) -> None:
    notes = MEANING + "notes: {T1: {a: {effect: info, text: as printed}}}\n"
    town = write(tmp_path, SHEET.replace("0.035", "0.035[a]").replace("Attic", "Attic[a]"), notes)
    page = said(capsys, "show", str(town))
    for words in ("Town table (invented), 2025", "Table 1", "A / U", "0.035[a]", "Attic[a]",
                  "20+5ci or 13+10ci", "[a] as printed", "checked by, on", "....."):  # fmt: skip
        assert " ".join(words.split()) in " ".join(page.split()), words
    data = json.loads(said(capsys, "show", str(town), "--format", "json"))
    (table,) = data["tables"]
    assert table["heads"] == [["A", "A", "B", "B", "C", "C"], ["U", "R", "U", "R", "U", "R"]]
    assert table["rows"][1]["cells"] == ["0.035[a]", "30", "0.027", "38", "0.021", "49"]


def test_one_zone_on_a_page(capsys: Captured) -> None:
    page = said(capsys, "show", "merrow-2025", "--rules", str(ROOT / "rules"), "--zone", "V2w")
    assert "(printed as V3 and V2w)" in page
    assert "0.033" in page and "0.046" not in page
    asked = ["rules", "show", "merrow-2025", "--rules", str(ROOT / "rules"), "--zone", "V9"]
    assert main(asked) == 2
    assert "is no zone of the rule set" in capsys.readouterr().err


def test_long_form_has_a_record_for_each_limit(capsys: Captured) -> None:
    text = said(capsys, "show", str(EXAMPLES / "example-2024"), "--long")
    records = list(csv.DictReader(io.StringIO(text)))
    by_id = {record["id"]: record for record in records}
    wood = by_id[
        "example-2024/T1/Zone 2/wall.wood_frame/R_insulation[work=new,space_category=heated]"
    ]
    assert wood["cell"] == "30 or 20+5ci or 13+10ci"
    assert wood["alternatives"] == "30 cavity or 20 cavity + 5 ci or 13 cavity + 10 ci"
    assert (wood["document"], wood["edition"]) == ("Invented example code", "2024")
    assert (wood["clause"], wood["zone"], wood["path"]) == ("Table 1", "Zone 2", "insulation")
    assert wood["place"] == "example-2024/opaque.csv:4"
    data = json.loads(
        said(capsys, "show", str(EXAMPLES / "example-2024"), "--long", "--format", "json")
    )
    assert len(data["limits"]) == len(records)


def test_formulas_of_a_sheet_are_inert_in_csv(tmp_path: Path, capsys: Captured) -> None:
    town = write(tmp_path, SHEET.replace("Attic", '"=HYPERLINK(""x"")"'))
    assert "\"'=HYPERLINK" in said(capsys, "show", str(town), "--long")


# ----------------------------------------------------------------------------------------- diff


def test_two_editions_cell_by_cell(tmp_path: Path, capsys: Captured) -> None:
    """Factors by hand: 0.060/0.064 = 0.9375; 25/20 = 1.25; C moved to no requirement."""
    old = write(tmp_path / "old")
    sheet = (
        SHEET.replace("0.064", "0.060")
        .replace("0.021", "NR")
        .replace("13,0.060,20 or", "13,0.060,25 or")
    )
    sheet = (
        sheet.replace("0.035,30,", "0.035,30,") + "floor.framed,Floor,0.05,19,0.04,25,0.03,30,P\n"
    )
    new = write(tmp_path / "new", sheet, MEANING.replace("T1", "T9"))
    text = said(capsys, "diff", str(old), str(new), "--format", "csv")
    records = list(csv.DictReader(io.StringIO(text)))
    told = {(r["zone"], r["row"], r["metric"]): r for r in records}
    wall = told["B", "wall.wood_frame", "U_assembly"]
    assert (wall["old"], wall["new"], wall["factor"], wall["direction"]) == (
        "0.064", "0.060", "0.9375", "stricter",
    )  # fmt: skip
    assert told["C", "roof.attic", "U_assembly"]["direction"] == "weaker"
    assert told["B", "wall.wood_frame", "R_insulation"]["direction"] == "same figure"
    assert {r["change"] for r in records if r["row"] == "floor.framed"} == {"added"}
    assert len(records) == 3 + 6
    data = json.loads(said(capsys, "diff", str(new), str(old), "--format", "json"))
    assert {c["change"] for c in data["changes"] if c["row"] == "floor.framed"} == {"removed"}
    assert "No cell differs." in said(capsys, "diff", str(old), str(old))


def test_an_edition_in_other_units_is_the_same(tmp_path: Path, capsys: Captured) -> None:
    """0.064 Btu/(h ft2 F) x 5.678263 = 0.36341 W/(m2 K)."""
    head = SHEET.splitlines(keepends=True)[:2]
    row = "wall.wood_frame,Wall,NR,NR,{},NR,NR,NR,P\n"
    old = write(tmp_path / "old", "".join(head) + row.format("0.064"))
    si = MEANING.replace("Btu/(h.ft2.F)", "W/(m2.K)").replace("h.ft2.F/Btu", "(m2.K)/W")
    new = write(tmp_path / "new", "".join(head) + row.format("0.36341"), si)
    data = json.loads(said(capsys, "diff", str(old), str(new), "--format", "json"))
    (factor,) = (c["factor"] for c in data["changes"] if c["new"] == "0.36341")
    assert factor == pytest.approx(1.0, abs=1e-5)


def test_an_amendment_against_its_base(capsys: Captured) -> None:
    base, hill = EXAMPLES / "example-2024", EXAMPLES / "example-2024-hilltown"
    page = said(capsys, "diff", str(base), str(hill))
    assert "0 added, 0 removed, 2 changed" in page
    assert "2 stricter" in page


def test_zones_down_the_sheet_are_matched_by_element(tmp_path: Path, capsys: Captured) -> None:
    """0.32 / 0.30 = 1.0667; 20 in the cavity and 10 over it have no factor."""
    meaning = (
        MEANING[: MEANING.index("  - id: T1")]
        + """\
  - id: T1
    file: t.csv
    clause: Table 1
    orientation: zones_down
    gaps_allowed: [B, C]
    heads:
      Window: {element: fenestration.fixed, metric: U_product}
      Floor: {element: floor.framed, metric: R_insulation}
      Wall: {element: wall.wood_frame, metric: R_insulation, plus: [cavity, ci]}
sources: {P: {what: invented}}
"""
    )
    head = "row,label,Window,Floor,Wall,src\n"
    old = write(tmp_path / "old", head + "A,Zone A,0.30,19,20,P\n", meaning)
    new = write(tmp_path / "new", head + "A,Zone A,0.32,19,0+10ci,P\n", meaning)
    data = json.loads(said(capsys, "diff", str(old), str(new), "--format", "json"))
    told = [(c["element"], c["factor"], c["direction"]) for c in data["changes"]]
    assert told == [("fenestration.fixed", 1.06667, "weaker"), ("wall.wood_frame", None, None)]


# ----------------------------------------------------------------------------------------- lock


def test_a_locked_set_says_so_and_a_changed_one_too(tmp_path: Path, capsys: Captured) -> None:
    project = tmp_path / "room.yaml"
    assert main(["new", str(project), "--with-rules"]) == 0
    town = tmp_path / "rules" / "example-town"
    assert main(["rules", "lock", str(town), "--checked-by", "A, B", "--on", "2026-11-30"]) == 0
    capsys.readouterr()
    assert main(["check", str(project), "--format", "json"]) == 0
    facts = json.loads(capsys.readouterr().out)["rule_sets"][0]["facts"]
    locks = [f["text"] for f in facts if f["label"] == "lock"]
    assert locks == ["example-town: checked by A, B on 2026-11-30, unchanged since"]
    sheet = town / "table-1.csv"
    sheet.write_text(sheet.read_text() + "\n")
    assert main(["check", str(project)]) == 0
    page = " ".join(capsys.readouterr().out.split())
    assert "CHANGED since it was checked: table-1.csv" in page
    assert main(["check", str(project), "--format", "json"]) == 0
    facts = json.loads(capsys.readouterr().out)["rule_sets"][0]["facts"]
    (lock,) = (f["text"] for f in facts if f["label"] == "lock")
    assert lock == "example-town: CHANGED since it was checked by A, B on 2026-11-30: table-1.csv"
    assert "L27" in said(capsys, "lint", str(town))
    assert main(["rules", "lock", str(town), "--checked-by", "A, B", "--on", "2026-12-01"]) == 0
    assert "L27" not in said(capsys, "lint", str(town))


def test_a_set_with_errors_is_not_locked(tmp_path: Path, capsys: Captured) -> None:
    town = write(tmp_path, SHEET.replace("0.021", ""))
    asked = ["rules", "lock", str(town), "--checked-by", "A", "--on", "2026-11-30"]
    assert main(asked) == 2
    assert "the cell is blank" in capsys.readouterr().err
    assert not (town / "ruleset.lock").exists()
    assert main([*asked[:-1], "30 November"]) == 2
    assert main([*asked[:-3], " \t", *asked[-2:]]) == 2


@pytest.mark.parametrize("text", ["", "[]", "{}", "[" * 100_000, '{"files": 3}', "\x00", "null"])
def test_a_hostile_lock_is_an_error(tmp_path: Path, capsys: Captured, text: str) -> None:
    town = write(tmp_path)
    (town / "ruleset.lock").write_text(text)
    data = json.loads(said(capsys, "lint", str(town), "--format", "json", status=2))
    assert [f["check"] for f in data["rule_sets"][0]["findings"]] == ["broken-lock"]


# -------------------------------------------------------------------------------------- hostile


def test_a_sheet_of_ten_megabytes_is_refused(tmp_path: Path, capsys: Captured) -> None:
    town = write(tmp_path, SHEET + "x" * 10_000_000)
    assert "file-too-large" in said(capsys, "lint", str(town), status=2)


def test_a_sheet_of_a_million_cells_is_refused(tmp_path: Path, capsys: Captured) -> None:
    town = write(tmp_path, SHEET + ("," * 1000 + "\n") * 1000)
    assert "file-too-large" in said(capsys, "lint", str(town), status=2)


def test_ten_thousand_values_of_a_condition(tmp_path: Path, capsys: Captured) -> None:
    words = [f"w{i}" for i in range(10_000)]
    meaning = MEANING + "dimensions: {use: {values: [" + ", ".join(words) + "]}}\n"
    lines = SHEET.splitlines()
    sheet = "\n".join(
        [
            lines[0].replace("label,", "label,when:use,"),
            lines[1].replace(",,U", ",,,U"),
            lines[2].replace("Wall,", f"Wall,{'|'.join(words)},"),
            lines[3].replace("Attic,", "Attic,,"),
        ]
    )
    town = write(tmp_path, sheet, meaning)
    assert main(["rules", "lint", str(town)]) in (0, 2)
    assert "Traceback" not in capsys.readouterr().err


def test_eighteen_thousand_bad_cells_stay_readable(tmp_path: Path, capsys: Captured) -> None:
    rows = [f"r{i},Row {i},{','.join(['9.9'] * 6)},P" for i in range(3_000)]
    meaning = MEANING.replace('"*": {metric', '"*": {element: "wall.*", metric')
    town = write(tmp_path, "\n".join([*SHEET.splitlines()[:2], *rows]), meaning)
    start = perf_counter()
    page = said(capsys, "lint", str(town), status=2)
    assert "more; the JSON format lists all" in page
    assert len(page) < 200_000
    assert perf_counter() - start < 30.0  # some 3 s; quadratic work would be minutes
