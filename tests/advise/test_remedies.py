"""Every remedy of the demos, applied to the project file, gives the verdict that it promises.

Figures of W3, W1 and R1 are worked by hand from the scenario's own R-values.
"""

from __future__ import annotations

import math
import shutil
from functools import cache
from pathlib import Path

import pytest

from envcheck import pipeline
from envcheck.model.advised import Advice, Change
from envcheck.units import convert

ROOT = Path(__file__).parents[2]
RULES = str(ROOT / "rules")
REVIEW = ROOT / "projects/quillhaven-library/review.yaml"
PERMIT = ROOT / "projects/quillhaven-library/permit.yaml"
RENOVATION = ROOT / "projects/brannvik-warehouse/renovation.yaml"
SPOILT = {
    "thin battens": ("S1", "thickness: 60 mm", "thickness: 50 mm"),
    "thin slab insulation": ("S6", "greatest: 200 mm", "greatest: 180 mm"),
    "plain glazing": ("S5", "u_glass: 1.1 W/(m2*K)", "u_glass: 1.6 W/(m2*K)"),
}
"""The renovation with one thing made worse, so that the assembly named is over its limit."""


@cache
def advice(path: Path) -> tuple[Advice, ...]:
    return pipeline.remedies(pipeline.run(str(path), (RULES,)))


def of(name: str, path: Path = REVIEW) -> Advice:
    return next(each for each in advice(path) if each.assembly == name)


def change(name: str, lever: str, basis: str) -> Change:
    found = [c for c in of(name).changes if (c.lever, c.basis) == (lever, basis)]
    assert len(found) == 1
    return found[0]


def ip(resistance: float | None) -> float:
    assert resistance is not None
    return convert(resistance, "h*ft2*degF/Btu")


# ------------------------------------------------------------------------------- by hand


def test_w3_to_the_limit_and_by_rounding() -> None:
    """1/0.1017 = 9.8323 holds R-7.5; 1/0.092 = 10.8696 asks for 8.5372, and clause 1.6 (below
    0.0925) for 1/0.0925 - 2.3323 = 8.4785; R-5 to the inch: 1.7074 and 1.6957 in."""
    to_limit, rounded = change("W3", "thickness", "limit"), change("W3", "thickness", "rounding")
    rest = 9.83227 - 7.5
    assert ip(to_limit.resistance) == pytest.approx(1 / 0.092 - rest, abs=2e-4)
    assert ip(rounded.resistance) == pytest.approx(1 / 0.0925 - rest, abs=2e-4)
    assert convert(to_limit.after, "in") == pytest.approx(1.7074, abs=2e-4)
    assert convert(rounded.after, "in") == pytest.approx(1.6957, abs=2e-4)
    assert f"{ip(to_limit.resistance):.2f} {ip(rounded.resistance):.2f}" == "8.54 8.48"


def test_w3_next_in_stock_is_two_inches() -> None:
    stock = change("W3", "thickness", "stock")
    assert convert(stock.after, "in") == pytest.approx(2.0)
    assert convert(stock.value, "Btu/(h*ft2*degF)") == pytest.approx(1 / 12.33227, rel=1e-5)


def test_w1_to_the_limit() -> None:
    """Base wall 7.95 and XPS: 1/0.060 - 7.95 = 8.7167, 1.7433 in."""
    found = change("W1", "thickness", "limit")
    assert ip(found.resistance) == pytest.approx(1 / 0.060 - 7.95, rel=1e-6)
    assert {verdict for _, _, verdict in found.verdicts} == {"pass"}
    assert {tag for _, tag, _ in found.verdicts} == {"N-W1", "S-W1", "W-W1"}


def test_r1_by_the_integral_of_its_taper() -> None:
    """U = ln(1 + Rt/R0)/Rt with Rt = 6 in x 5.7 = 34.2 and R0 = 0.78 + 5.7 d: U = 0.030 at
    R0 = Rt/(e^(0.03 Rt) - 1) = 19.1074, d = 3.2153 in."""
    found = change("R1", "taper", "limit")
    rest = 34.2 / (math.exp(0.030 * 34.2) - 1.0)
    assert convert(found.after, "in") == pytest.approx((rest - 0.78) / 5.7, rel=1e-6)
    assert [edit.path[-1] for edit in found.edits] == ["least", "greatest"]
    assert found.edits[1].value - found.edits[0].value == pytest.approx(6 * 0.0254)


def test_w2_has_no_cure_of_its_own_and_says_what_would_do() -> None:
    """The girts void the mineral wool: base wall 7.95, 1/0.060 - 7.95 = R-8.72 more."""
    found = of("W2")
    assert found.changes == ()
    assert ip(found.added) == pytest.approx(1 / 0.060 - 7.95, rel=1e-9)
    assert {(r.lever, r.why) for r in found.refused} == {
        ("label", "no value"),
        ("conductivity", "not enough"),
    }


def test_what_dominates_is_named_first() -> None:
    title, share = of("W1").dominant[0]
    assert title == "XPS"
    assert share == pytest.approx(7.5 / (7.5 + 0.56 + 0.56), rel=1e-6)


def test_structural_choices_are_no_changes() -> None:
    for each in advice(REVIEW):
        assert not {c.lever for c in each.changes} & {"spacing", "density", "psi", "chi"}


def test_nothing_is_advised_where_nothing_is_over() -> None:
    assert advice(PERMIT) == ()


def test_a_stock_size_has_its_cost_beyond_the_drawn_one(tmp_path: Path) -> None:
    """2 in against 1.5 in: 0.50 /ft2 on 1,398 ft2 of E-W3 are 699; on 3,266 ft2 of W1 1,633."""
    text = REVIEW.read_text("utf-8").replace(
        "options:\n",
        "options:\n  costs: {xps: [1.1 /ft2, 1.6 /ft2, 2.1 /ft2, 2.6 /ft2, 3.1 /ft2]}\n",
    )
    shutil.copytree(REVIEW.parent / "evidence", tmp_path / "evidence")
    project = tmp_path / "priced.yaml"
    project.write_text(text, encoding="utf-8")
    costs = {
        (each.assembly, found.basis): found.cost
        for each in advice(project)
        for found in each.changes
        if found.lever == "thickness"
    }
    assert costs["W3", "stock"] == pytest.approx(699.0)
    assert costs["W1", "stock"] == pytest.approx(1633.0)
    assert costs["W3", "limit"] is None


# ------------------------------------------------------------------------------- applied


def checked(text: str, folder: Path) -> dict[tuple[str, str, str], str]:
    for project in (REVIEW, RENOVATION):
        shutil.copytree(project.parent / "evidence", folder / "evidence", dirs_exist_ok=True)
    project = folder / "changed.yaml"
    project.write_text(text, encoding="utf-8")
    run = pipeline.run(str(project), (RULES,))
    return {(x.ruleset, x.element, x.metric): x.verdict for x in run.judged.lines}


CASES = [
    (each.assembly, place, each) for each in advice(REVIEW) for place in range(len(each.changes))
]


@pytest.mark.parametrize(("name", "place", "each"), CASES, ids=lambda x: str(x)[:12])
def test_each_change_of_the_review_applied_gives_its_verdict(
    name: str, place: int, each: Advice, tmp_path: Path
) -> None:
    chosen = each.changes[place]
    text = pipeline.applied(REVIEW.read_text("utf-8"), [chosen])
    verdicts = checked(text, tmp_path)
    for line in each.lines:
        assert verdicts[line.ruleset, line.element, line.metric] == "pass", (name, chosen.basis)


@pytest.mark.parametrize("name", SPOILT)
def test_each_change_of_the_renovation_applied_gives_its_verdict(name: str, tmp_path: Path) -> None:
    assembly, good, worse = SPOILT[name]
    text = RENOVATION.read_text("utf-8")
    assert good in text
    shutil.copytree(RENOVATION.parent / "evidence", tmp_path / "evidence")
    project = tmp_path / "spoilt.yaml"
    project.write_text(text.replace(good, worse), encoding="utf-8")
    found = of(assembly, project)
    assert found.changes
    for chosen in found.changes:
        verdicts = checked(pipeline.applied(project.read_text("utf-8"), [chosen]), tmp_path)
        for line in found.lines:
            assert verdicts[line.ruleset, line.element, line.metric] == "pass", chosen


def test_a_little_less_than_the_change_is_not_enough(tmp_path: Path) -> None:
    """The change is exact: a hundredth less thickness leaves the line over its limit."""
    exact = change("W3", "thickness", "rounding")
    less = tuple(e._replace(value=e.value * 0.99, up=False) for e in exact.edits)
    text = pipeline.applied(REVIEW.read_text("utf-8"), [exact._replace(edits=less)])
    verdicts = checked(text, tmp_path)
    assert verdicts["quillhaven-2025-3", "E-W3", "U_assembly"] == "fail"


def test_everything_but_the_value_stays_as_typed() -> None:
    text = REVIEW.read_text("utf-8")
    changed = pipeline.applied(text, [change("W3", "thickness", "stock")])
    pairs = [(a, b) for a, b in zip(text.splitlines(), changed.splitlines(), strict=True) if a != b]
    assert pairs == [
        (
            "      - {kind: material, title: XPS, material: xps, thickness: 1.5 in}",
            "      - {kind: material, title: XPS, material: xps, thickness: 2 in}",
        )
    ]
