"""Surfaces, marks and assemblies that nobody assigned. Areas are in m2 and made up."""

from __future__ import annotations

import pytest

from envcheck.judge.building import closings
from tests.changed import changed
from tests.judge import crosscheck_models as m

FT2 = 0.09290304


def given(elements, surfaces, assemblies=(), **more):
    made = m.facts(tuple(assemblies), tuple(elements), tuple(surfaces), **more)
    return changed(made, closings=closings(made.project))


def test_a_surface_that_does_not_close():
    # 420 + 1,120 + 612 = 2,152 of 2,240 ft2: 88 ft2, 3.9 %
    parts = [("WN", 420), ("W2", 1120), ("W1", 612)]
    elements = [m.element(tag, area=ft2 * FT2, surface="West") for tag, ft2 in parts]
    (found,) = m.run("surface-does-not-close", given(elements, [m.surface("West", 2240 * FT2)]))
    assert (found.severity, found.subject, found.sheet) == ("E", "West", "A-201")
    assert "gross 2,240 ft2 on A-201, entered 2,152 ft2" in found.seen
    assert found.seen.endswith("88 ft2 (3.9 %) missing")


def test_too_much_area_in_si():
    elements = [m.element(area=101.0, surface="North")]
    (found,) = m.run("surface-does-not-close", given(elements, [m.surface()], units="SI"))
    assert found.seen.endswith("1.0 m2 (1.0 %) too much")


@pytest.mark.parametrize("area", [99.5, 100.0, 100.5])
def test_half_a_percent_closes(area):
    elements = [m.element(area=area, surface="North")]
    assert not m.run("surface-does-not-close", given(elements, [m.surface()]))


def test_a_surface_without_elements_is_said_once():
    surfaces = [m.surface("North", 100.0, WN1=6), m.surface("South")]
    made = given([m.element(surface="South")], surfaces)
    (found,) = m.run("surface-without-element", made)
    assert (found.severity, found.subject) == ("E", "North")
    assert "it shows WN1 x 6" in found.seen
    assert not m.run("surface-does-not-close", made)
    assert not m.run("drawn-not-entered", made)


def test_an_element_on_no_surface_is_a_note_where_surfaces_of_its_kind_are_drawn():
    wall, roof = m.element("W"), m.element("R", category="roof.attic")
    window = m.element("O", host="H", category="fenestration.fixed")
    slab = m.element("G", area=None, category="slab.edge")
    elements = [wall, roof, window, slab, m.element("H", surface="North")]
    found = m.run("element-without-surface", given(elements, [m.surface()]))
    assert [(f.severity, f.subject) for f in found] == [("N", "W")]
    assert not m.run("element-without-surface", given(elements, []))


def test_a_mark_without_element():
    elements = [m.element(surface="North")]
    (found,) = m.run("drawn-not-entered", given(elements, [m.surface(D1=2)]))
    assert (found.severity, found.subject) == ("E", "North D1")
    assert found.seen == "D1: shown 2 on A-201, no element entered"


@pytest.mark.parametrize("entered", [12.0, 20.0])
def test_counts_that_differ(entered):
    sky = m.element("R-SK1", "SK1", count=entered, surface="North")
    (found,) = m.run("drawn-not-entered", given([sky], [m.surface(SK1=18)]))
    assert found.seen == f"SK1: shown 18 on A-201, entered {entered:g}"


def test_marks_that_are_entered_by_assembly_by_tag_or_without_count():
    elements = [
        m.element("N-D1", "D1", count=1.0, surface="North"),
        m.element("N-D1b", "D1", count=1.0, host="N-D1"),
        m.element("WN7", "WN", count=3.0, surface="North"),
        m.element("HATCH", "HT", surface="North"),
    ]
    surface = m.surface(D1=2, WN7=3, HT=1)
    assert not m.run("drawn-not-entered", given(elements, [surface]))


def hatch_roof(mark, **more):
    """3,185 ft2 of attic at 0.0211 and a hatch of R-0.94 between films of R-0.61 and R-0.46."""
    films = m.setting(inside_film=m.r("R-0.61"), outside_film=m.r("R-0.46"))
    field = m.solved(m.u(0.0211), "R2", setting=films)
    attic = m.element("R-R2", "R2", 3185 * FT2, category="roof.attic", surface="Roof")
    other = m.element("R-R1", "R1", 5000 * FT2, category="roof.above_deck", surface="Roof")
    lines = (
        m.line("R-R2", "pass", solved=field, limit=m.limit("0.022", "attic")),
        m.line("R-R1", "pass", solved=m.solved(m.u(0.03), "R1"), limit=m.limit("0.033", "deck")),
    )
    assemblies = (
        m.assembly("R1", sheet="A-521/1"),
        m.assembly("R2", sheet="A-522/1"),
        m.assembly("HT1", sheet="A-522/4", layers=(m.board("R-0.94"),), **more),
    )
    surface = m.surface("Roof", 8200 * FT2, HT1=mark)
    return given([attic, other], [changed(surface, kind="roof")], assemblies, lines=lines)


@pytest.mark.parametrize(
    "mark", [m.Opening("HT1", 1), m.Opening("HT1", 1, 15 * FT2), m.Opening("HT1", 1, host="R-R2")]
)
def test_a_hatch_left_out_turns_the_mean(mark):
    # (3185 x 0.0211 + 15 / 2.01) / 3200 = 0.0233
    (found,) = m.run("drawn-not-entered", hatch_roof(mark))
    assert "15 ft2" in found.suggests
    assert found.suggests.endswith(
        "with it the mean of R-R2 is 0.0233, over 0.022, although R-R2 alone is 0.0211"
    )


def test_no_mean_where_nobody_can_tell_the_area_or_the_field():
    made = hatch_roof(m.Opening("HT1", 1))
    closed = tuple(changed(c, missing=0.0) for c in made.closings)
    (found,) = m.run("drawn-not-entered", changed(made, closings=closed))
    assert found.suggests == "the element is left out"
    (other,) = m.run("drawn-not-entered", hatch_roof(m.Opening("HT1", 1, 1.0, host="elsewhere")))
    assert "mean" not in other.suggests


def test_an_unused_assembly():
    assemblies = [m.assembly(name) for name in ("W1", "W9", "HT1")]
    made = given([m.element(of="W1", surface="North")], [m.surface(HT1=1)], assemblies)
    assert [(f.severity, f.subject) for f in m.run("assembly-unused", made)] == [("W", "W9")]
