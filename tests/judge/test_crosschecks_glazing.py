"""Opaque panels entered as glazing, and glass taken for the whole product."""

from __future__ import annotations

import pytest

from envcheck.model.windows import Glazing, Infill, Light, Window
from tests.judge import crosscheck_models as m

SPANDREL = m.rated(0.085, shgc=None, visible_transmittance=0.0)


def opaque(rated=SPANDREL, category="fenestration.curtain_wall", lines=(), **more):
    panel = m.assembly("SP1", **({"kind": "rated", "rated": rated} | more))
    elements = (m.element("S-SP1", "SP1", category=category, host="S-W1"), m.element("S-W1"))
    return m.run("opaque-as-glazing", m.facts((panel, m.assembly()), elements, lines=lines))


def test_a_spandrel_entered_as_glazing():
    lines = (
        m.line("S-W1", limit=m.limit("0.060")),
        m.line("S-SP1", "pass", metric="U_product", solved=m.solved(m.u(0.085), "SP1")),
    )
    (found,) = opaque(lines=lines)
    assert (found.severity, found.subject) == ("E", "S-SP1")
    assert "a visible transmittance of 0" in found.seen
    assert found.suggests.endswith("held against the row of S-W1 it has 0.0850, over 0.060")


def test_opaque_layers_entered_as_glazing():
    (found,) = opaque(None, kind="layers", layers=(m.board("R-1"),))
    assert found.severity == "E" and "opaque layers" in found.seen


def test_nothing_said_of_light_is_an_error_for_a_spandrel_and_else_a_warning():
    silent = m.rated(0.085, shgc=None, visible_transmittance=None)
    (named,) = opaque(silent, title="Spandrel panel")
    (unnamed,) = opaque(silent, title="Panel")
    assert (named.severity, unnamed.severity) == ("E", "W")


@pytest.mark.parametrize(
    ("rated", "category"),
    [
        (m.rated(), "fenestration.fixed"),
        (m.rated(shgc=None), "fenestration.fixed"),
        (m.rated(visible_transmittance=None), "fenestration.fixed"),
        (SPANDREL, "door.swinging"),
        (SPANDREL, "wall.other"),
        (None, "fenestration.fixed"),
    ],
)
def test_glass_doors_and_walls_are_fine(rated, category):
    kind = "window" if rated is None else "rated"
    assert not opaque(rated, category, kind=kind)


def module(*opaque):
    lights = tuple(
        Light("a light", 1, dark, 1.0, 1.0, 1.0, 4.0, 1, 0.1, Infill(1.1)) for dark in opaque
    )
    return Window(1.0, 2.0, None, lights, ())


def test_panels_of_a_curtain_wall_are_found():
    (all_dark,) = opaque(None, kind="curtain-wall", window=module(True, True))
    assert all_dark.severity == "E" and "opaque panels only" in all_dark.seen
    (half,) = opaque(None, kind="curtain-wall", window=module(True, False))
    assert half.severity == "W" and "50 %" in half.seen
    assert not opaque(None, kind="curtain-wall", window=module(False, False))
    assert not opaque(None, kind="window", window=module(True, False))


def test_a_glazing_in_use_is_the_centre_of_glass():
    glazing = m.assembly("GL1", kind="glazing", glazing=Glazing((0.004,), ()))
    elements = (m.element("N-GL1", "GL1", category="fenestration.fixed"),)
    (found,) = m.run("centre-of-glass", m.facts((glazing,), elements))
    assert found.severity == "E" and "a glazing is stated" in found.seen


def centre(basis, used=True):
    window = m.assembly("WN1", kind="rated", rated=m.rated(0.29, basis=basis), sheet="A-602")
    tags = ("N-WN1", "S-WN1") if used else ()
    elements = tuple(m.element(tag, "WN1", category="fenestration.fixed") for tag in tags)
    return m.run("centre-of-glass", m.facts((window,), elements))


def test_centre_of_glass():
    (found,) = centre("centre_of_glass")
    assert (found.severity, found.subject, found.sheet) == ("E", "WN1", "A-602")
    assert found.seen == (
        "0.29 Btu/(h ft2 F) is stated for the centre of the glass; used by N-WN1 and S-WN1"
    )
    assert not centre("whole_product")
    assert not centre("default")
    assert not centre("centre_of_glass", used=False)
