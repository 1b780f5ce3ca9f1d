"""The docs say what the code does."""

from __future__ import annotations

import pytest

from tests.generated import DOCS, PAGES


@pytest.mark.parametrize("page", PAGES)
def test_generated_pages_are_current(page: str) -> None:
    written = (DOCS / page).read_text(encoding="utf-8")
    assert written == PAGES[page](), "run: python -m tests.generated"
