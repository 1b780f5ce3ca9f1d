"""Small rule sets written for one test each; all figures are invented."""

from __future__ import annotations

from pathlib import Path

from envcheck.lint import Sheets, lint
from envcheck.model.typed import Fault
from envcheck.pipeline import names
from envcheck.read.typed import plausible_ranges, read_typed

MEANING = """\
ruleset: town
document: {title: Town table (invented), edition: "2025"}
jurisdiction: nowhere (invented)
status: example
invented: yes
effective: {from: 2025-01-01, until: null, date_tested: permit application}
units: {U: Btu/(h.ft2.F), R: h.ft2.F/Btu}
decimal: "."
zones: {scheme: three zones, chosen_by: map, order: [A, B, C]}
tables:
  - id: T1
    file: t.csv
    clause: Table 1
    orientation: zones_across
    header_rows: 2
    head_levels: [zone, {U: {path: assembly}, R: {path: insulation}}]
    rows: {"*": {metric: {assembly: U_assembly, insulation: R_insulation}, plus: [cavity, ci]}}
paths:
  - {any_of: [assembly, insulation], per: component, clause: "1.2"}
sources: {P: {what: invented}}
"""
SHEET = """\
row,label,A,,B,,C,,src
,,U,R,U,R,U,R,
wall.wood_frame,Wall,0.084,13,0.064,20 or 13+5ci,0.051,20+5ci or 13+10ci,P
roof.attic,Attic,0.035,30,0.027,38,0.021,49,P
"""


def write(folder: Path, sheet: str = SHEET, meaning: str = MEANING) -> Path:
    """Write the set ``town`` into a folder; give its own folder."""
    town = folder / "town"
    town.mkdir(parents=True, exist_ok=True)
    (town / "ruleset.yaml").write_text(meaning, encoding="utf-8")
    (town / "t.csv").write_text(sheet, encoding="utf-8")
    return town


def faults(folder: Path) -> tuple[Fault, ...]:
    """Every finding on a folder."""
    typed = read_typed(folder, names())
    assert typed.set is not None, typed.problems
    return lint(Sheets(typed.set, plausible_ranges()), typed.problems)


def found(folder: Path, sheet: str = SHEET, meaning: str = MEANING) -> list[tuple[str, str]]:
    """(check, place) of every finding on a set that is not confirmed."""
    own = faults(write(folder, sheet, meaning))
    return [(fault.check, fault.place) for fault in own if not fault.confirmed]
