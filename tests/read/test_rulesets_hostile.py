"""A rule set cannot run code, reach outside its folder, or fill memory; it says so in words.

Times are processor seconds, far above what a healthy run takes (measured: 0.1 to 1 s).
"""

from __future__ import annotations

from pathlib import Path
from time import process_time

import pytest

from envcheck.errors import InputError, Problem
from envcheck.model.ruleset import RuleSet
from envcheck.read.rulesets import read_ruleset
from tests.read.names import NAMES

HEAD = """ruleset: town
document: {title: Invented, edition: "1"}
jurisdiction: nowhere
effective: {from: 2025-01-01, date_tested: permit application}
units: {U: W/(m2.K), R: (m2.K)/W}
decimal: "."
"""
TAIL = """tables:
  - {id: T1, file: t.csv, clause: Table 1, orientation: none, heads: {U: {}},
     rows: {"*": {metric: U_assembly}}}
sources: {P: {what: invented}}
"""
SLOW = 6.0


def town(folder: Path, sheet: str, more: str = "", tail: str = TAIL) -> Path:
    (folder / "town").mkdir(exist_ok=True)
    (folder / "town" / "t.csv").write_text(sheet, encoding="utf-8")
    (folder / "town" / "ruleset.yaml").write_text(HEAD + more + tail, encoding="utf-8")
    return folder


def read(folder: Path) -> RuleSet:
    start = process_time()
    try:
        return read_ruleset("town", [folder], None, NAMES)
    finally:
        assert process_time() - start < SLOW


def problems(folder: Path) -> tuple[Problem, ...]:
    with pytest.raises(InputError) as caught:
        read(folder)
    return caught.value.problems


def kinds(folder: Path) -> set[str]:
    return {p.kind.id for p in problems(folder)}


def test_a_sheet_of_ten_megabytes(tmp_path: Path) -> None:
    row = "wall.mass,Wall,0.30,P\n"
    town(tmp_path, "row,label,U,src\n" + row * (10_000_000 // len(row)))
    assert kinds(tmp_path) == {"file-too-large"}


def test_a_million_cells(tmp_path: Path) -> None:
    town(tmp_path, "row,label,U,src\n" + ("," * 999 + "\n") * 1000)
    assert kinds(tmp_path) == {"file-too-large"}


def test_a_wide_head(tmp_path: Path) -> None:
    town(tmp_path, "row,label," + ",".join(f"U{n}" for n in range(200_000)) + ",src\nx\n")
    assert kinds(tmp_path) == {"file-too-large"}


def test_forty_thousand_ragged_rows(tmp_path: Path) -> None:
    town(tmp_path, "row,label,U,src\n" + "wall.mass,Wall,0.3,P,x\n" * 40_000)
    assert kinds(tmp_path) == {"ragged-row"}


def test_a_condition_of_ten_thousand_words(tmp_path: Path) -> None:
    words = [f"w{n}" for n in range(10_000)]
    more = f"dimensions: {{use: {{values: [{', '.join(words)}]}}}}\n"
    rows = f"wall.mass,Wall,{'|'.join(words[:5000])},0.30,P\n"
    rows += f"wall.mass,Wall,{'|'.join(words[5000:])},0.40,P\n"
    town(tmp_path, "row,label,when:use,U,src\n" + rows, more)
    assert [len(x.when[0].words) for x in read(tmp_path).limits] == [5000, 5000]
    one = f"wall.mass,Wall,{'|'.join(words[4999:])},0.40,P\n"
    town(tmp_path, "row,label,when:use,U,src\n" + rows + one, more)
    assert kinds(tmp_path) == {"conditions-overlap"}


def test_ten_thousand_rows_of_one_element(tmp_path: Path) -> None:
    more = "dimensions: {height: {type: number}}\n"
    rows = [f'wall.mass,Wall,"[{n},{n + 1})",0.30,P' for n in range(10_000)]
    rows.append("wall.mass,Wall,>=10000,0.30,P")
    town(tmp_path, "row,label,when:height,U,src\n" + "\n".join(rows) + "\n", more)
    assert len(read(tmp_path).limits) == 10_001
    rows[5000] = 'wall.mass,Wall,"[4999.5,5001)",0.30,P'
    town(tmp_path, "row,label,when:height,U,src\n" + "\n".join(rows) + "\n", more)
    assert kinds(tmp_path) == {"conditions-overlap"}


def test_a_hundred_thousand_bad_cells_are_not_all_listed(tmp_path: Path) -> None:
    rows = "".join(f"wall.mass,Wall {n},about {n},P\n" for n in range(50_000))
    town(tmp_path, "row,label,U,src\n" + rows)
    found = problems(tmp_path)
    assert 100 < len(found) < 300


@pytest.mark.parametrize(
    "cell",
    [
        "__import__('os').system('true')",
        "=SUM(A1:A9)",
        "{{ 7*7 }}",
        "${HOME}",
        "1" * 100_000,
        ", 1" * 40_000,
        "10 for " + "1" * 50_000,
        "[" * 50_000,
        "U" * 50_000,
    ],
    ids=lambda cell: cell[:12],
)
def test_nothing_in_a_cell_runs_or_hangs(tmp_path: Path, cell: str) -> None:
    town(tmp_path, f'row,label,U,src\nwall.mass,Wall,"{cell}",P\n')
    assert kinds(tmp_path) <= {"unreadable-cell", "lost-bracket", "extent-without-rule"}


def test_a_long_condition_does_not_hang(tmp_path: Path) -> None:
    more = "dimensions: {height: {type: number}}\n"
    town(tmp_path, f'row,label,when:height,U,src\nwall.mass,Wall,"[{"1" * 90_000}",0.3,P\n', more)
    assert kinds(tmp_path) == {"unreadable-condition"}


def test_a_link_to_a_file_elsewhere_is_not_followed(tmp_path: Path) -> None:
    town(tmp_path, "row,label,U,src\nwall.mass,Wall,0.30,P\n")
    sheet = tmp_path / "town" / "t.csv"
    outside = tmp_path / "outside.csv"
    sheet.rename(outside)
    sheet.symlink_to(outside)
    assert kinds(tmp_path) == {"sheet-outside"}


def test_a_huge_ruleset_yaml(tmp_path: Path) -> None:
    town(tmp_path, "row,label,U,src\nwall.mass,Wall,0.30,P\n", "# " + "x" * 3_000_000 + "\n")
    assert kinds(tmp_path) == {"file-too-large"}


def test_all_faults_of_a_sheet_come_at_once(tmp_path: Path) -> None:
    sheet = (
        'row,label,U,src\nwall.mass,Wall,0.30g,P\nroof.attic,Roof,"0,2",P\nfloor.mass,Floor,P\n'
        "door.swinging,Door,0.4[z],P\nwall.mass,Wall,0.30,P\n"
    )
    town(tmp_path, sheet)
    assert kinds(tmp_path) == {
        "trailing-letter", "cell-decimal-mark", "ragged-row", "undefined-footnote", "repeated-row",
    }  # fmt: skip
