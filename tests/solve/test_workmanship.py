"""What voids and compression leave: hand sums."""

from __future__ import annotations

from functools import cache
from pathlib import Path

import pytest

from envcheck import pipeline
from envcheck.model.sure import Workmanship
from envcheck.solve.workmanship import compressed, with_voids
from envcheck.units import convert

ROOT = Path(__file__).parents[2]
REVIEW = ROOT / "projects/quillhaven-library/review.yaml"
R_IP = "h*ft2*degF/Btu"


def test_voids_by_hand() -> None:
    """5 % at R-1 in R-19: 1/(0.05 + 0.05) = R-10; 2 % in R-38: 1/(0.98/38 + 0.02) = R-21.84."""
    assert with_voids(19.0, 0.05, 1.0) == pytest.approx(10.0)
    assert with_voids(38.0, 0.02, 1.0) == pytest.approx(21.84, abs=0.005)
    assert with_voids(19.0, 0.0, 1.0) == pytest.approx(19.0)
    assert compressed(19.0, 0.2) == pytest.approx(15.2)


@cache
def dial(subject: str) -> tuple[Workmanship, ...]:
    run = pipeline.run(str(REVIEW), (str(ROOT / "rules"),))
    ((_, levels),) = pipeline.extras(run, subject).workmanship.items()
    return levels


def level(subject: str, kind: str, share: float) -> Workmanship:
    (found,) = (x for x in dial(subject) if (x.kind, x.share) == (kind, share))
    return found


def test_the_clerestory_with_voids_by_hand() -> None:
    """R-18 in place; an empty cavity is 0.18 m2 K/W (ISO 6946, horizontal, 25 mm and more; from
    memory), R-1.02. Studs 12.385 on 25 %, cavity 5.51 + the fill, side by side."""
    found = level("C-W4", "void", 0.02)
    left = 1 / (0.98 / 18 + 0.02 / (0.18 * 5.678263))
    assert convert(found.full, R_IP) == pytest.approx(18.0, rel=1e-4)
    assert convert(found.left, R_IP) == pytest.approx(left, rel=0.01)
    assert found.value is not None and found.whole is not None
    left = convert(found.left, R_IP)
    value = 0.25 / 12.385 + 0.75 / (5.51 + left)
    assert convert(found.value, "Btu/(h*ft2*degF)") == pytest.approx(value, rel=1e-4)
    whole = 0.25 / 12.385 + 0.75 / 23.51
    assert convert(found.whole, "Btu/(h*ft2*degF)") == pytest.approx(whole, rel=1e-4)


def test_compression_by_hand() -> None:
    """A fifth thinner: R-14.4, U = 0.25/12.385 + 0.75/19.91."""
    found = level("C-W4", "compression", 0.2)
    assert found.value is not None
    value = 0.25 / 12.385 + 0.75 / 19.91
    assert convert(found.value, "Btu/(h*ft2*degF)") == pytest.approx(value, rel=1e-4)


def test_a_table_by_labels_gives_no_value_but_the_layer() -> None:
    found = level("N-W1", "void", 0.05)
    assert found.value is None
    assert convert(found.left, R_IP) == pytest.approx(8.25, abs=0.03)


def test_other_assemblies_have_no_dial() -> None:
    assert dial("T-R4") == ()
