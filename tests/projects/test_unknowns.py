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


WINDOW = """  WX: {kind: window, title: Computed window, width: 5 ft, height: 4 ft,
       frame_width: 3 in, u_glass: 0.2 Btu/(h*ft2*degF), u_frame: 0.3 Btu/(h*ft2*degF),
       psi: 0.03 Btu/(h*ft*degF), shgc: 0.30}
"""


def computed_window(tmp_path: Path, evidence: str) -> tuple[str, str]:
    """Verdict and reason of a window from its parts, under rules that accept this evidence."""
    rules = spoilt_rules(
        tmp_path,
        "merrow-2025/ruleset.yaml",
        '"fenestration.*": [label, rating, test]',
        f'"fenestration.*": {evidence}',
    )
    path = tmp_path / "p.yaml"
    text = PERMIT.replace("assemblies:\n", f"assemblies:\n{WINDOW}", 1)
    assert "assembly: CW1" in text
    path.write_text(text.replace("assembly: CW1", "assembly: WX"), encoding="utf-8")
    done = run(str(path), [rules])
    line = next(n for n in done.judged.lines if n.element == "S-CW1" and n.metric == "U_product")
    return line.verdict, " ".join(line.reasons)


def test_a_computed_window_never_passes_where_a_rating_is_asked_for(tmp_path: Path) -> None:
    verdict, why = computed_window(tmp_path / "a", "[label, rating]")
    assert verdict == "not_decided" and "a calculation to ISO 10077-1" in why
    verdict, why = computed_window(tmp_path / "b", '[calculation, "standard:NFRC 100"]')
    assert verdict == "not_decided" and "computed to ISO 10077-1" in why
    verdict, _ = computed_window(tmp_path / "c", '[calculation, "standard:ISO 10077-1:2017"]')
    assert verdict == "pass"


def test_a_rating_to_another_standard_never_passes_for_iso_10077(tmp_path: Path) -> None:
    rules = spoilt_rules(
        tmp_path,
        "merrow-2025/ruleset.yaml",
        '"fenestration.*": [label, rating, test]',
        '"fenestration.*": [label, rating, test, "standard:ISO 10077-1"]',
    )
    done = run(str(PROJECT), [rules])
    verdicts = {n.verdict for n in done.judged.lines if n.element == "S-CW1"}
    assert verdicts == {"not_decided"}
