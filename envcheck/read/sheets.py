"""A CSV sheet, typed as the table is printed: heads, rows and cells, each with its line.

Reserved columns: ``row``, ``label``, any number of ``when:DIMENSION``, and last ``src``. All
others are printed columns under one to three rows of heads; a blank head repeats the head to its
left.
"""

from __future__ import annotations

import csv
import io
import re
from pathlib import Path
from typing import NamedTuple

from envcheck.errors import Problem, problem
from envcheck.read.cells import CellError, split_marks
from envcheck.read.yaml_text import check_bytes, control_characters

LARGEST = 2_000_000
"""Bytes; no printed table is larger."""
MOST_CELLS = 250_000
"""Cells of one sheet; the largest printed table has some thousands."""
MOST_COLUMNS = 1000
MOST_PROBLEMS = 200
"""Of one sheet; more are not looked for."""
WHEN = "when:"
_PLAIN = re.compile(r"[\w-][\w.-]*\.csv")


def is_plain(file: str) -> bool:
    """Whether a name is that of a CSV file, without any path."""
    return _PLAIN.fullmatch(file) is not None


class Column(NamedTuple):
    """A printed column: its heads from the top row down, and their footnote marks."""

    at: int
    """Position in the row, from 0."""
    heads: tuple[str, ...]
    marks: tuple[str, ...]

    @property
    def name(self) -> str:
        """Heads in words, for messages."""
        return " / ".join(self.heads)


class Row(NamedTuple):
    """A printed row."""

    line: int
    key: str
    label: str
    marks: tuple[str, ...]
    when: tuple[tuple[str, str], ...]
    """(dimension, condition as typed); empty conditions are left out."""
    cells: tuple[str, ...]
    """By position of :attr:`Sheet.columns`."""
    src: str


class Sheet(NamedTuple):
    """A table as typed."""

    file: str
    columns: tuple[Column, ...]
    rows: tuple[Row, ...]
    when: tuple[str, ...]
    """Dimensions of the ``when:`` columns."""


class _Line(NamedTuple):
    number: int
    cells: list[str]


def read_text(path: Path, shown: str, problems: list[Problem]) -> str | None:
    """Read a file as UTF-8, with or without a byte order mark; None after a problem."""
    if path.is_symlink() and path.resolve().parent != path.parent.resolve():
        problems.append(problem("sheet-outside", shown, None, found="a link to another folder"))
        return None
    try:
        data = path.read_bytes()
    except OSError as error:
        gone = isinstance(error, FileNotFoundError)
        fix = "put the sheet there, or correct the name in its table" if gone else ""
        found = error.strerror or "?"
        problems.append(problem("file-unreadable", shown, None, found=found, fix=fix))
        return None
    if len(data) > LARGEST:
        problems.append(problem("file-too-large", shown, None, found=f"{len(data)} bytes"))
        return None
    wrong = check_bytes(data, shown)
    text = "" if wrong else data.decode("utf-8-sig")
    wrong = wrong or control_characters(text, shown)
    problems += wrong
    return None if wrong else text


def read_lines(
    path: Path, shown: str, separator: str, problems: list[Problem]
) -> list[_Line] | None:
    """Read a CSV file as rows with the line on which each starts; blank rows are left out."""
    text = read_text(path, shown, problems)
    if text is None:
        return None
    lines: list[_Line] = []
    cells_left = MOST_CELLS
    reader = csv.reader(io.StringIO(text, newline=""), delimiter=separator, strict=True)
    start = 1
    try:
        for cells in reader:
            cells_left -= len(cells)
            if cells_left < 0:
                found, expected = f"more than {MOST_CELLS} cells", "one printed table"
                p = problem("file-too-large", shown, start, found=found, expected=expected)
                problems.append(p)
                return None
            if any(cells):
                lines.append(_Line(start, [cell.strip() for cell in cells]))
            start = reader.line_num + 1
    except csv.Error as error:
        problems.append(problem("broken-csv", shown, start, found=str(error)))
        return None
    return lines


def read_sheet(
    path: Path, shown: str, separator: str, header_rows: int, problems: list[Problem]
) -> Sheet | None:
    """Read a printed table; None where nothing of it can be used."""
    lines = read_lines(path, shown, separator, problems)
    if lines is None:
        return None
    if len(lines) <= header_rows:
        problems.append(problem("empty-sheet", shown, None, found=f"{len(lines)} rows"))
        return None
    heads, body = lines[:header_rows], lines[header_rows:]
    second = next((line for line in body if line.cells[:2] == ["row", "label"]), None)
    if second is not None:
        body = body[: body.index(second)]
        lines = heads + body
    width = len(heads[0].cells)
    if width > MOST_COLUMNS:
        found, expected = f"{width} columns", f"at most {MOST_COLUMNS}"
        problems.append(problem("file-too-large", shown, 1, found=found, expected=expected))
        return None
    ragged = {line.number: len(line.cells) for line in lines if len(line.cells) != width}
    for number, count in list(ragged.items())[:MOST_PROBLEMS]:
        found, expected = f"{count} columns", f"{width}, as in the first row"
        problems.append(problem("ragged-row", shown, number, found=found, expected=expected))
    if any(line.number in ragged for line in heads):
        return None
    dimensions = _reserved(heads[0], shown, separator, problems)
    if dimensions is None:
        return None
    if second is not None:
        fill = {"found": "row,label,... again", "expected": "one printed table"}
        problems.append(problem("second-table", shown, second.number, **fill))
    first = 2 + len(dimensions)
    columns = _columns(heads, first, width - 1, shown, problems)
    if len({column.heads for column in columns}) < len(columns):
        return None
    rows = (_row(line, dimensions, shown, problems) for line in body if line.number not in ragged)
    return Sheet(shown, columns, tuple(row for row in rows if row is not None), dimensions)


def _reserved(
    head: _Line, shown: str, separator: str, problems: list[Problem]
) -> tuple[str, ...] | None:
    """Check the reserved columns of the first row and give the ``when:`` dimensions."""
    cells = head.cells
    wrong = [
        (place, name, cells[at] if len(cells) > abs(at) else "")
        for place, name, at in (("first", "row", 0), ("second", "label", 1), ("last", "src", -1))
        if len(cells) < 4 or cells[at] != name
    ]
    if wrong:
        place, name, found = wrong[0]
        other = ";" if separator == "," else ","
        many = len(cells) == 1 and other in cells[0]
        fix = f"state `separator: {other!r}` in ruleset.yaml" if many else ""
        fill = {"place": place, "name": name}
        problems.append(problem("wrong-head", shown, head.number, found=found, fix=fix, **fill))
        return None
    names = [cell for cell in cells[2:-1] if cell.startswith(WHEN)]
    late = [n for n in names if cells.index(n) >= 2 + len(names)]
    if late:
        fix = f"move {late[0]!r} before the printed columns"
        fill = {"place": "third", "name": late[0]}
        problems.append(problem("wrong-head", shown, head.number, found=cells[2], fix=fix, **fill))
        return None
    return tuple(name.removeprefix(WHEN).strip() for name in names)


def _columns(
    heads: list[_Line], first: int, end: int, shown: str, problems: list[Problem]
) -> tuple[Column, ...]:
    """Stack the head rows; a blank head repeats the one to its left."""
    filled: list[list[tuple[str, tuple[str, ...]]]] = []
    for head in heads:
        row: list[tuple[str, tuple[str, ...]]] = []
        for cell in head.cells[first:end]:
            if not cell and not row:
                fill = {"place": "first printed", "name": "a head"}
                problems.append(problem("wrong-head", shown, head.number, found="a blank", **fill))
            row.append(_marked(cell, shown, head.number, problems) if cell or not row else row[-1])
        filled.append(row)
    columns = [
        Column(first + i, tuple(h for h, _ in stack), tuple(m for _, ms in stack for m in ms))
        for i, stack in enumerate(zip(*filled, strict=True))
    ]
    seen: dict[tuple[str, ...], int] = {}
    for column in columns:
        if column.heads in seen:
            problems.append(problem("repeated-head", shown, heads[0].number, found=column.name))
        seen[column.heads] = column.at
    return tuple(columns)


def _row(
    line: _Line, dimensions: tuple[str, ...], shown: str, problems: list[Problem]
) -> Row | None:
    cells = line.cells
    key, key_marks = _marked(cells[0], shown, line.number, problems)
    label, marks = _marked(cells[1], shown, line.number, problems)
    if not key:
        problems.append(problem("missing-row-key", shown, line.number, found=label))
        return None
    first = 2 + len(dimensions)
    when = tuple((d, c) for d, c in zip(dimensions, cells[2:first], strict=True) if c)
    body = tuple(cells[first:-1])
    return Row(line.number, key, label or key, key_marks + marks, when, body, cells[-1])


def _marked(
    text: str, shown: str, line: int, problems: list[Problem]
) -> tuple[str, tuple[str, ...]]:
    try:
        return split_marks(text)
    except CellError as error:
        where = "a head, key or label"
        problems.append(problem(error.kind, shown, line, found=text, where=where))
        return text, ()
