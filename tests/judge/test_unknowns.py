"""What is unknown never looks like a pass."""

from __future__ import annotations

from pathlib import Path

import pytest

from envcheck.pipeline import run

ROOT = Path(__file__).parent.parent.parent
PERMIT = (ROOT / "projects/quillhaven-library/permit.yaml").read_text(encoding="utf-8")


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


@pytest.mark.parametrize("check", ["permit-date-missing", "area-cap-unknown"])
def test_a_complete_set_has_none(check: str) -> None:
    done = run(str(ROOT / "projects/quillhaven-library/permit.yaml"))
    assert check not in {f.check for f in done.judged.findings}
