"""A zone that no rule set knows is a slip of the file, said with its line."""

from __future__ import annotations

from pathlib import Path

import pytest

from envcheck.errors import InputError
from envcheck.pipeline import run
from tests.projects.test_unknowns import PERMIT, ROOT


@pytest.mark.parametrize(
    ("old", "new", "words"),
    [
        ("zone: V3w", "zone: V33", "the zone of the site is not known"),
        ("rule_set: quill", "rule_set: quil", "did you mean 'quillhaven-2025-3'?"),
    ],
)
def test_unknown_zone(tmp_path: Path, old: str, new: str, words: str) -> None:
    path = tmp_path / "p.yaml"
    path.write_text(PERMIT.replace(old, new, 1), encoding="utf-8")
    line = next(n for n, text in enumerate(PERMIT.splitlines(), 1) if old in text)
    with pytest.raises(InputError) as error:
        run(str(path), [str(ROOT / "rules")])
    (found,) = error.value.problems
    assert (found.kind.id, found.line) == ("unknown-zone", line)
    assert words in str(found)
