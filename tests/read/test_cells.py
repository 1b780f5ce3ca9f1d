"""Cells and conditions as printed. The grammar is the project's own; forms are common practice."""

from __future__ import annotations

import pytest
from hypothesis import given
from hypothesis import strategies as st

from envcheck.model.ruleset import Term
from envcheck.read.cells import CellError, Grammar, read_cell, split_marks
from envcheck.read.condition_text import read_condition

U = Grammar()
R = Grammar(metric="R_insulation", sense="min", plus=("cavity", "ci"), extent="depth")
RATED = Grammar("U_product", metrics=("WER",), bands=(("WER", ("A", "B", "C")),))
FOOT = 0.3048


def terms(text: str, grammar: Grammar) -> list[list[tuple[float, str, float | None]]]:
    (branch,) = read_cell(text, grammar).branches
    return [[(t.number, t.role, t.extent) for t in alt] for alt in branch.alternatives]


def kind_of(text: str, grammar: Grammar = U) -> str:
    (branch,) = read_cell(text, grammar).branches
    return branch.kind


def test_a_number_keeps_its_printed_digits() -> None:
    (branch,) = read_cell("0.120", U).branches
    assert branch.alternatives == ((Term(0.12, "0.120"),),)
    assert branch.alternatives[0][0].decimals == 3


@pytest.mark.parametrize("text", ["0.057", "U-0.057", "U 0.057", "U = 0.057", "<=0.057", "U0.057"])
def test_prefix_and_sign_leave_the_number(text: str) -> None:
    assert terms(text, U) == [[(0.057, "", None)]]


@pytest.mark.parametrize(
    ("text", "kind"),
    [
        ("NR", "no_requirement"),
        ("nr", "no_requirement"),
        ("uninsulated", "no_requirement"),
        ("Keine Anforderung", "no_requirement"),
        ("-", "not_covered"),
        ("\u2013", "not_covered"),
        ("n/a", "not_covered"),
        ("0", "number"),
    ],
)
def test_special_words(text: str, kind: str) -> None:
    assert kind_of(text) == kind


def test_zero_stays_a_limit_of_zero() -> None:
    assert terms("0", R) == [[(0.0, "cavity", None)]]


def test_own_words_for_no_requirement() -> None:
    own = Grammar(no_requirement=("sans objet",))
    assert kind_of("Sans objet", own) == "no_requirement"
    with pytest.raises(CellError):
        read_cell("sans objet", U)


@pytest.mark.parametrize(
    ("text", "expected"),
    [
        ("20 or 13+5", [[(20, "cavity", None)], [(13, "cavity", None), (5, "ci", None)]]),
        (
            "30 or 20+5ci or 13+10ci",
            [
                [(30, "cavity", None)],
                [(20, "cavity", None), (5, "ci", None)],
                [(13, "cavity", None), (10, "ci", None)],
            ],
        ),
        ("0+15ci", [[(0, "cavity", None), (15, "ci", None)]]),
        ("R-13 + R-7.5 c.i.", [[(13, "cavity", None), (7.5, "ci", None)]]),
        ("30ci", [[(30, "ci", None)]]),
        ("R-10 for 24 in", [[(10, "cavity", 2 * FOOT)]]),
        ("10ci, 4 ft", [[(10, "ci", 4 * FOOT)]]),
    ],
)
def test_compound_cells(text: str, expected: list) -> None:
    found = terms(text, R)
    assert [[(n, r) for n, r, _ in alt] for alt in found] == [
        [(n, r) for n, r, _ in alt] for alt in expected
    ]
    for alt, wanted in zip(found, expected, strict=True):
        for (_, _, got), (_, _, want) in zip(alt, wanted, strict=True):
            assert (got is None) == (want is None)
            assert got is None or got == pytest.approx(want, rel=1e-12)


def test_a_sum_may_say_its_roles_itself() -> None:
    grammar = Grammar(metric="R_insulation", sense="min")
    found = terms("R-19ci + R-11 Ls", grammar)
    assert found == [[(19, "ci", None), (11, "Ls", None)]]


def test_slash_as_condition_gives_a_branch_for_each() -> None:
    grammar = R._replace(plus=(), slash="when", slash_roles=("", ""))
    first, second = read_cell("10 for 24 in / 15 for 24 in", grammar).branches
    assert (first.alternatives[0][0].number, second.alternatives[0][0].number) == (10, 15)
    first, second = read_cell("NR/0.66", U._replace(slash="when", slash_roles=("", ""))).branches
    assert (first.kind, second.kind) == ("no_requirement", "number")
    assert len(read_cell("NR", grammar).branches) == 1
    assert len(read_cell("n/a", grammar).branches) == 1


def test_slash_as_alternative_and_as_both() -> None:
    either = Grammar("R_insulation", "min", slash="or", slash_roles=("ci", "cavity"))
    assert terms("10/13", either) == [[(10, "ci", None)], [(13, "cavity", None)]]
    both = Grammar("R_insulation", "min", slash="and", slash_roles=("under", "edge"))
    assert terms("10/15", both) == [[(10, "under", None), (15, "edge", None)]]


def test_prefix_with_a_slash_of_its_own() -> None:
    grammar = Grammar("U_product", decimal=",", si=True, metrics=("Uw/Ug",))
    assert terms("Uw/Ug = 2,0", grammar) == [[(2.0, "", None)]]


def test_other_metric_as_an_alternative() -> None:
    grammar = Grammar("U_product", metrics=("ER",))
    (branch,) = read_cell("0.30 or ER 34", grammar).branches
    assert [t.metric for (t,) in branch.alternatives] == ["", "ER"]


def test_a_rating_band_has_its_rank() -> None:
    (branch,) = read_cell("1.4 or WER B", RATED).branches
    own, band = (alternative[0] for alternative in branch.alternatives)
    assert (own.number, own.band, band.metric, band.band, band.number) == (1.4, "", "WER", "B", 1)


def test_an_extent_in_words_and_two_suffixes() -> None:
    grammar = R._replace(plus=(), extent="perimeter", suffixes=("LS",))
    (branch,) = read_cell("R-10 perimeter & under entire slab", grammar).branches
    assert branch.alternatives[0][0].where == "perimeter & under entire slab"
    (branch,) = read_cell("R-10 for 24 in below", grammar).branches
    term = branch.alternatives[0][0]
    assert (term.extent, term.where) == (pytest.approx(2 * FOOT), "below")
    (branch,) = read_cell("R-13 + R-7.5ci std", R._replace(suffixes=("std",))).branches
    assert [(t.role, t.also) for t in branch.alternatives[0]] == [("cavity", ()), ("ci", ("std",))]


@pytest.mark.parametrize(
    ("text", "plain", "marks"),
    [
        ("30[g]", "30", ("g",)),
        ("U = 0,24[1 2]", "U = 0,24", ("1", "2")),
        ("20[f] or 13+5[g]", "20 or 13+5", ("f", "g")),
        ("Mass wall[i]", "Mass wall", ("i",)),
    ],
)
def test_footnote_marks(text: str, plain: str, marks: tuple[str, ...]) -> None:
    assert split_marks(text) == (plain, marks)


def test_references() -> None:
    assert read_cell("<", U).refers == "left"
    assert read_cell("^", U).refers == "above"
    assert read_cell(".", U).refers == "unchanged"
    assert read_cell("see wall.mass", U).refers == "see wall.mass"


@pytest.mark.parametrize(
    ("text", "grammar", "kind"),
    [
        ("", U, "blank-cell"),
        ("30g", R, "trailing-letter"),
        ("0,060", U, "cell-decimal-mark"),
        ("0.24", U._replace(decimal=","), "cell-decimal-mark"),
        ("13/17", R, "slash-without-rule"),
        ("13+5", U._replace(metric="R_insulation", sense="min"), "plus-without-rule"),
        ("10 for 24 in", U._replace(metric="R_insulation", sense="min"), "extent-without-rule"),
        ("R-13", U, "prefix-against-metric"),
        ("U-0.06", R, "prefix-against-metric"),
        ("RSI 2.3", R, "prefix-against-metric"),
        (">=0.06", U, "sense-against-metric"),
        ("<=13", R, "sense-against-metric"),
        ("30[g", R, "lost-bracket"),
        ("30 g]", R, "lost-bracket"),
        ("13+5+2", R, "unreadable-cell"),
        ("-0.06", U, "unreadable-cell"),
        ("0.06 0.07", U, "unreadable-cell"),
        ("20 13", R, "unreadable-cell"),
        ("nan", U, "unreadable-cell"),
        ("1e3", U, "unreadable-cell"),
        ("20xx", R, "unknown-suffix"),
        ("WER B", U._replace(metrics=("WER",)), "unknown-band"),
        ("WER H", RATED, "unknown-band"),
        ("DSER B", RATED, "unreadable-cell"),
        ("10 perimeter", R._replace(extent=""), "extent-without-rule"),
        ("10 for 24 parsec", R, "unreadable-cell"),
        ("=1+1", U, "unreadable-cell"),
    ],
)
def test_what_is_refused(text: str, grammar: Grammar, kind: str) -> None:
    with pytest.raises(CellError) as caught:
        read_cell(text, grammar)
    assert caught.value.kind == kind


@given(st.text(max_size=20))
def test_any_text_is_read_or_refused(text: str) -> None:
    for grammar in (U, R, R._replace(slash="or", slash_roles=("ci", "cavity"), plus=())):
        try:
            cell = read_cell(text, grammar)
        except CellError:
            continue
        assert cell.branches


@given(st.decimals(min_value=0, max_value=99, places=3))
def test_a_printed_number_comes_back_with_its_digits(number: object) -> None:
    (branch,) = read_cell(str(number), U).branches
    ((term,),) = branch.alternatives
    assert (term.text, term.number) == (str(number), float(str(number)))


# --------------------------------------------------------------------------------- conditions


@pytest.mark.parametrize(
    ("text", "inside", "outside"),
    [
        ("<=0.30", (0.0, 0.30), (0.31,)),
        ("<0.30", (0.29,), (0.30,)),
        (">3", (3.1,), (3.0,)),
        (">=6", (6.0,), (5.9,)),
        ("(0.30,0.50]", (0.31, 0.50), (0.30, 0.51)),
        ("[12,19)", (12.0, 18.9), (11.9, 19.0)),
        ("3", (3.0,), (2.9, 3.1)),
        ("[2,)", (2.0, 99.0), (1.9,)),
    ],
)
def test_intervals(text: str, inside: tuple, outside: tuple) -> None:
    condition = read_condition(text, "x", ())
    assert all(condition.holds(value) for value in inside)
    assert not any(condition.holds(value) for value in outside)
    assert condition.text == text


def test_bounds_become_si() -> None:
    # 6 Btu/(ft2 F) = 6 x 1055.05585262 J / (0.09290304 m2 x 5/9 K)
    condition = read_condition(">=6", "heat_capacity", (), "Btu/(ft2.F)")
    assert condition.low == pytest.approx(6 * 1055.05585262 / (0.09290304 * 5 / 9), rel=1e-12)


def test_words_are_the_declared_ones() -> None:
    condition = read_condition("e|S", "orientation", ("N", "E", "S", "W"))
    assert condition.words == ("E", "S")
    assert condition.holds("s") and not condition.holds("N")


@pytest.mark.parametrize(
    ("text", "words", "kind"),
    [
        ("NE", ("N", "E"), "unknown-word"),
        ("below 3", (), "unreadable-condition"),
        ("(3,2]", (), "unreadable-condition"),
        ("", (), "unreadable-condition"),
        ("(0.1.2,0.5]", (), "unreadable-condition"),
        ("[.,3000]", (), "unreadable-condition"),
        ("<=0,3", (), "cell-decimal-mark"),
    ],
)
def test_conditions_refused(text: str, words: tuple[str, ...], kind: str) -> None:
    with pytest.raises(CellError) as caught:
        read_condition(text, "x", words)
    assert caught.value.kind == kind
