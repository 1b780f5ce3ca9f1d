"""What is unknown never looks like a pass."""

from __future__ import annotations

import shutil
from pathlib import Path

from envcheck.pipeline import run

ROOT = Path(__file__).parent.parent.parent
PROJECT = ROOT / "projects/quillhaven-library/permit.yaml"
PERMIT = PROJECT.read_text(encoding="utf-8")


def findings(tmp_path: Path, old: str, new: str) -> tuple[dict[str, str], int]:
    assert old in PERMIT
    path = tmp_path / "p.yaml"
    path.write_text(PERMIT.replace(old, new, 1), encoding="utf-8")
    done = run(str(path), [str(ROOT / "rules")])
    return {f.check: f.severity for f in done.judged.findings}, done.exit_status


def test_no_date_of_application_is_open(tmp_path: Path) -> None:
    found, status = findings(tmp_path, "  permit_application_date: 2026-03-02\n", "")
    assert found["permit-date-missing"] == "E"
    assert status == 3


def test_an_area_cap_without_its_surfaces_is_open(tmp_path: Path) -> None:
    walls = PERMIT.replace("kind: wall", "kind: floor")
    path = tmp_path / "p.yaml"
    path.write_text(walls, encoding="utf-8")
    done = run(str(path), [str(ROOT / "rules")])
    assert ("area-cap-unknown", "E") in {(f.check, f.severity) for f in done.judged.findings}
    assert done.exit_status == 3


def spoilt_rules(tmp_path: Path, sheet: str, old: str, new: str) -> str:
    """A copy of the rule sets with one text of one sheet replaced."""
    shutil.copytree(ROOT / "rules", tmp_path / "rules")
    path = tmp_path / "rules" / sheet
    text = path.read_text(encoding="utf-8")
    assert old in text
    path.write_text(text.replace(old, new, 1), encoding="utf-8")
    return str(tmp_path / "rules")


def test_a_product_without_a_u_limit_is_open_though_its_shgc_has_one(tmp_path: Path) -> None:
    row = 'curtain_wall,"Curtain wall, U-factor",,0.50,0.44,0.38,0.32,E\n'
    rules = spoilt_rules(tmp_path, "merrow-2025/table-2.csv", row, "")
    done = run(str(PROJECT), [rules])
    found = {(n.metric, n.verdict) for n in done.judged.lines if n.element == "S-CW1"}
    assert found == {("U_product", "not_in_table"), ("SHGC", "pass")}
    assert done.exit_status == 3


def test_a_mean_leaves_a_row_without_a_requirement_alone(tmp_path: Path) -> None:
    rules = spoilt_rules(tmp_path, "merrow-2025/table-1.csv", "0.027,0.022,45", "0.027,NR,45")
    done = run(str(PROJECT), [rules])
    assert [group.kind for group in done.judged.groups] == ["trade_off"]
    verdicts = {n.element: n.verdict for n in done.judged.lines}
    assert verdicts["R-R2"] == verdicts["R-HT1"] == "no_requirement"


def test_a_mean_waits_for_a_member_that_the_official_decides(tmp_path: Path) -> None:
    claim = "exceptions:\n  - {element: R-HT1, clause: '9.9', claimed_by: owner, reason: a test}\n"
    path = tmp_path / "p.yaml"
    path.write_text(f"{PERMIT}\n{claim}", encoding="utf-8")
    done = run(str(path), [str(ROOT / "rules")])
    lines = {n.element: n for n in done.judged.lines}
    assert lines["R-HT1"].verdict == "official_decides"
    assert lines["R-R2"].open
    assert "waits for the decision on R-HT1" in lines["R-R2"].reasons[0]
    (mean, _) = done.judged.groups
    assert (mean.state, mean.waits) == ("not_decided", ("the decision on R-HT1",))
    assert done.exit_status == 3
