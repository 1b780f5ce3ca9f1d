"""The public call, for people who work in notebooks."""

from __future__ import annotations

from dataclasses import FrozenInstanceError
from pathlib import Path

import pytest

import envcheck
from envcheck.errors import InputError

ROOT = Path(__file__).parent.parent
PERMIT = ROOT / "projects" / "quillhaven-library" / "permit.yaml"


def test_check_returns_frozen_lines_and_a_frame() -> None:
    run = envcheck.check(PERMIT, rules=[ROOT / "rules"])
    assert run.exit_status == 0
    with pytest.raises(FrozenInstanceError):
        run.exit_status = 1
    frame = run.to_frame()
    assert len(frame) == len(run.judged.lines)
    row = frame[(frame.element == "N-W1") & (frame.metric == "U_assembly")].iloc[0]
    # Invented worked example: 1 / 20.45 h ft2 F/Btu, held against 0.060.
    assert row.value_si == pytest.approx(5.678263 / 20.45, rel=1e-6)
    assert (row.compared, row.limit, row.verdict) == (0.049, 0.06, "pass")
    assert set(frame.verdict) == {"pass", "no_requirement"}


def test_rule_sets_are_found_above_the_project() -> None:
    assert envcheck.check(str(PERMIT)).exit_status == 0


def test_a_wrong_file_raises_all_problems() -> None:
    with pytest.raises(InputError) as error:
        envcheck.check(ROOT / "projects")
    assert "projects" in str(error.value)
