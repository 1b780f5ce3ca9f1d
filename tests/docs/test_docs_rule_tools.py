"""docs/rule-tools.md: the worked example prints what the page says; every number is explained."""

from __future__ import annotations

import re

from envcheck.lint import all_checks
from envcheck.lint.numbers import NUMBERS
from tests.docs.pages import blocks
from tests.docs.walk import PAGE, steps

TEXT = PAGE.read_text(encoding="utf-8")


def test_every_step_prints_what_the_page_shows() -> None:
    shown = {found[1]: text for found, text in blocks(TEXT, r"walk output (\w+)")}
    done = list(steps(TEXT))
    assert [name for name, _, _ in done] == list(shown)
    for name, status, output in done:
        assert output.split() == shown[name].split(), name
        assert status == {"empty": 2, "check": 1, "changed": 1}.get(name, 0), name


def test_every_number_is_explained() -> None:
    told = set(re.findall(r"\bL\d\d\b", TEXT))
    for first, last in re.findall(r"(L\d\d), (L\d\d)", TEXT):
        told |= {first, last}
    assert {check.id for check in all_checks()} | set(NUMBERS.values()) | {"L26"} <= told


def test_nine_in_ten_seeded_faults_were_found() -> None:
    found = re.search(r"all but the control\*\* \| \*\*(\d+) of (\d+)", TEXT)
    assert found is not None
    assert int(found[1]) >= 0.9 * int(found[2]) > 900
