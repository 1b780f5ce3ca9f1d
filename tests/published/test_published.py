"""Printed figures against envcheck's own functions; each file names its source."""

from __future__ import annotations

import pytest

from tests.published.adapters import ADAPTERS
from tests.published.cases import FOLDER, Case, Figure, cases, count, figures

SLACK = 1e-9
"""Relative; for figures that lie half a printed digit off, to the last bit."""


@pytest.mark.parametrize("figure", list(figures()), ids=lambda figure: figure.id)
def test_figure(figure: Figure) -> None:
    computed = ADAPTERS[figure.case["method"]](figure.inputs, figure.case["units"])[figure.name]
    assert abs(computed - figure.expected) <= figure.tolerance + SLACK * abs(figure.expected)


def test_no_tolerance_hides_the_figure() -> None:
    """Within a few per cent of the figure, or else by the standard's own criterion."""
    own = [figure for figure in figures() if "criterion" not in figure.case]
    wide = [f.id for f in own if not 0 < f.tolerance <= 0.06 * max(abs(f.expected), 0.09)]
    assert wide == []
    assert all("the standard asks for" in c["criterion"] for c in cases() if "criterion" in c)


@pytest.mark.parametrize("case", cases(), ids=lambda case: case["id"])
def test_every_case_says_where_it_comes_from(case: Case) -> None:
    assert (FOLDER / f"{case['id']}.yaml").is_file()
    assert all(case["source"][key] for key in ("document", "edition", "locator"))
    assert set(case["from_memory"]) <= {"inputs", "figures", "formula"}
    assert case["seen"] or case["from_memory"]


def test_every_adapter_has_a_case_and_every_case_an_adapter() -> None:
    assert {case["method"] for case in cases()} == set(ADAPTERS)


def test_ids_are_unique() -> None:
    ids = [figure.id for figure in figures()]
    assert len(ids) == len(set(ids))


def test_there_are_enough_printed_figures() -> None:
    assert sum(count().values()) >= 150
    assert min(count().values()) >= 10
