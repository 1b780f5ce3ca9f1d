"""CSV sheets typed as printed: heads, marks, lines, encodings, and what is refused."""

from __future__ import annotations

from pathlib import Path

import pytest

from envcheck.errors import Problem
from envcheck.read.sheets import Sheet, read_sheet

PRINTED = (
    "row,label,when:work,Zone 1,,Zone 2,,src\n"
    ",,,U-factor,R-value[d],U-factor,R-value,\n"
    'wall.mass[c],"Wall, mass[i]",new,0.1,8,0.09,13,P\n'
    "\n"
    "roof.attic,Attic,,0.03,38,0.02,49,P\n"
)


def read(
    path: Path, text: str | bytes, separator: str = ",", head_rows: int = 2
) -> tuple[Sheet | None, list[Problem]]:
    file = path / "sheet.csv"
    file.write_bytes(text if isinstance(text, bytes) else text.encode())
    problems: list[Problem] = []
    return read_sheet(file, "sheet.csv", separator, head_rows, problems), problems


def test_stacked_heads_repeat_to_the_right(tmp_path: Path) -> None:
    sheet, problems = read(tmp_path, PRINTED)
    assert sheet is not None and not problems
    assert [c.heads for c in sheet.columns] == [
        ("Zone 1", "U-factor"), ("Zone 1", "R-value"),
        ("Zone 2", "U-factor"), ("Zone 2", "R-value"),
    ]  # fmt: skip
    assert sheet.columns[1].marks == ("d",)
    assert sheet.columns[3].name == "Zone 2 / R-value"
    assert sheet.when == ("work",)


def test_rows_keep_line_label_marks_and_conditions(tmp_path: Path) -> None:
    sheet, _ = read(tmp_path, PRINTED)
    assert sheet is not None
    first, second = sheet.rows
    assert (first.line, second.line) == (3, 5)
    assert (first.key, first.label, first.marks) == ("wall.mass", "Wall, mass", ("c", "i"))
    assert first.when == (("work", "new"),) and second.when == ()
    assert second.cells == ("0.03", "38", "0.02", "49") and second.src == "P"


@pytest.mark.parametrize("mark", [b"", b"\xef\xbb\xbf"])
@pytest.mark.parametrize("end", ["\n", "\r\n"])
def test_byte_order_mark_and_line_ends(tmp_path: Path, mark: bytes, end: str) -> None:
    sheet, problems = read(tmp_path, mark + PRINTED.replace("\n", end).encode())
    assert sheet is not None and not problems
    assert [row.line for row in sheet.rows] == [3, 5]


def test_semicolons_and_a_quoted_line_break(tmp_path: Path) -> None:
    text = 'row;label;A;src\n1;"two\nlines";0,28;S\n2;b;0,30;S\n'
    sheet, problems = read(tmp_path, text, ";", 1)
    assert sheet is not None and not problems
    assert [(row.line, row.cells) for row in sheet.rows] == [(2, ("0,28",)), (4, ("0,30",))]


@pytest.mark.parametrize(
    ("text", "kind", "line"),
    [
        (PRINTED.replace("0.09,13,P", "0.09,13"), "ragged-row", 3),
        (PRINTED.replace("row,label", "key,label"), "wrong-head", 1),
        (PRINTED.replace(",,src", ",,source"), "wrong-head", 1),
        (PRINTED.replace("when:work,Zone 1", "Zone 1,when:work"), "wrong-head", 1),
        (PRINTED.replace("Zone 1,", ",", 1), "wrong-head", 1),
        (PRINTED.replace("roof.attic,", ",", 1), "missing-row-key", 5),
        (PRINTED.replace("Wall, mass[i]", "Wall, mass[i"), "lost-bracket", 3),
        (PRINTED.replace("R-value,\n", "U-factor,\n"), "repeated-head", 1),
        (PRINTED.replace('"Wall', 'Wa"ll"'), "ragged-row", 3),
        (PRINTED.replace("Attic", '"Attic'), "broken-csv", 5),
        (PRINTED.encode().replace(b"Attic", b"Att\xe9c"), "wrong-encoding", 5),
        (PRINTED.encode().replace(b"Attic", b"Att\0c"), "control-character", 5),
        (PRINTED.replace("Attic", "Att\u202ec"), "control-character", 5),
        (PRINTED.encode("utf-16"), "wrong-encoding", 1),
        ("", "empty-sheet", None),
        ("\n".join(PRINTED.split("\n")[:2]), "empty-sheet", None),
        ("row,label,src\na,b,c\n" * 2, "wrong-head", 1),
    ],
)
def test_refused(tmp_path: Path, text: str | bytes, kind: str, line: int | None) -> None:
    _, problems = read(tmp_path, text)
    assert [(p.kind.id, p.line) for p in problems] == [(kind, line)], problems


def test_a_missing_sheet_and_a_folder(tmp_path: Path) -> None:
    for path in (tmp_path / "none.csv", tmp_path):
        problems: list[Problem] = []
        assert read_sheet(path, "sheet.csv", ",", 1, problems) is None
        assert [p.kind.id for p in problems] == ["file-unreadable"]


def test_a_huge_sheet_is_refused(tmp_path: Path) -> None:
    _, problems = read(tmp_path, b"a" * 2_000_001)
    assert [p.kind.id for p in problems] == ["file-too-large"]


def test_formulas_and_markup_are_plain_text(tmp_path: Path) -> None:
    sheet, problems = read(tmp_path, PRINTED.replace("Attic", "=cmd()<b>"))
    assert sheet is not None and not problems
    assert sheet.rows[1].label == "=cmd()<b>"
