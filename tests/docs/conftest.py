"""A folder with the rule sets of the docs."""

from __future__ import annotations

from pathlib import Path

import pytest

from tests.docs.pages import write_rule_sets


@pytest.fixture
def folder(tmp_path: Path) -> Path:
    write_rule_sets(tmp_path / "rules")
    return tmp_path
