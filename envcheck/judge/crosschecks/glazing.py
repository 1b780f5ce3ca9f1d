"""Opaque panels entered as glazing, and glass passed off as the whole product."""

from __future__ import annotations

from collections.abc import Iterator

from envcheck.judge.compare import compare, own_term, rounded
from envcheck.judge.crosschecks import Check, Facts
from envcheck.judge.words import listed, system, trimmed
from envcheck.model.judged import CERTAIN, LIKELY, Finding, Line
from envcheck.model.patterns import in_words
from envcheck.model.project import Assembly, Element, Window
from envcheck.units import in_system, label

OPAQUE_WORDS = ("spandrel", "opaque")


def opaque_as_glazing(facts: Facts) -> Iterator[Finding]:
    """Fenestration that lets no light pass; a warning where nobody says whether it does."""
    for element in facts.project.elements.values():
        if not element.category.startswith("fenestration."):
            continue
        assembly = facts.project.assemblies.get(element.assembly)
        found = _opaque(assembly) if assembly is not None else None
        if found is not None:
            severity, why = found
            yield Finding(
                "opaque-as-glazing",
                severity,
                element.tag,
                element.sheet,
                f"entered as {in_words(element.category)}; {element.assembly} {why}",
                "a spandrel or another opaque panel counts as opaque wall, in no area of glass"
                + _as_host(facts, element),
                "its category as an opaque wall, or its SHGC and visible transmittance",
            )


def _opaque(assembly: Assembly) -> tuple[str, str] | None:
    """Severity and what shows that no light passes; None where light does."""
    if assembly.kind == "layers":
        return "E", "is built of opaque layers"
    if assembly.window is not None:
        return _panels(assembly, assembly.window)
    rated = assembly.rated
    if rated is None or rated.shgc:
        return None
    if rated.visible_transmittance == 0:
        return "E", "has no SHGC and a visible transmittance of 0"
    if rated.visible_transmittance is not None:
        return None
    named = any(word in assembly.title.casefold() for word in OPAQUE_WORDS)
    why = "states no SHGC and no visible transmittance"
    return ("E", f"({assembly.title}) {why}") if named else ("W", why)


def _panels(assembly: Assembly, window: Window) -> tuple[str, str] | None:
    """Opaque panels among the lights: all of them, or a part of a curtain wall."""
    if window.opaque:
        return "E", "has opaque panels only"
    if assembly.kind == "curtain-wall" and window.opaque_area:
        share = window.opaque_area / (window.width * window.height)
        return "W", f"has opaque panels over {share * 100:.0f} % of its module"
    return None


def _as_host(facts: Facts, element: Element) -> str:
    """How it stands against the limit of the wall that it is cut from."""
    host, own = _line(facts, element.host), _line(facts, element.tag)
    if host is None or host.limit is None or own is None or own.solved is None:
        return ""
    limit, value = host.limit, own.solved.value
    if limit.kind != "number" or not limit.metric.startswith("U_") or value is None:
        return ""
    term = own_term(limit)
    comparison = compare(value, term, limit, facts.rulesets[host.ruleset])
    state = "within" if comparison.within else "over"
    return (
        f"; held against the row of {element.host} it has "
        f"{rounded(comparison.value, comparison.decimals + 1)}, {state} {term.text}"
    )


def _line(facts: Facts, tag: str) -> Line | None:
    return next(
        (x for x in facts.lines if x.element == tag and x.decides and x.metric.startswith("U_")),
        None,
    )


def centre_of_glass(facts: Facts) -> Iterator[Finding]:
    """A product in use whose U-factor is that of the glass alone."""
    units = system(facts.project, facts.rulesets)
    uses: dict[str, list[str]] = {}
    for element in facts.project.elements.values():
        uses.setdefault(element.assembly, []).append(element.tag)
    for assembly in facts.project.assemblies.values():
        rated = assembly.rated
        alone = assembly.glazing is not None or (
            rated is not None and rated.basis == "centre_of_glass"
        )
        if not alone or assembly.id not in uses:
            continue
        value, stated = "a value", rated.u_factor if rated is not None else None
        if assembly.glazing is not None:
            value, stated = "a glazing", _centre(facts, assembly.id)
        if stated is not None:
            shown = trimmed(in_system(stated, "u_factor", units), 4)
            value = f"{shown} {label('u_factor', units)}"
        yield Finding(
            "centre-of-glass",
            "E",
            assembly.id,
            assembly.sheet,
            f"{value} is stated for the centre of the glass; used by {listed(uses[assembly.id])}",
            "frame and edge of the glass are left out; they mostly raise the value",
            "the rating of the whole product, frame included",
        )


def _centre(facts: Facts, name: str) -> float | None:
    """U-factor of the centre of a computed glazing."""
    solved = facts.solved.get(name)
    return solved.beside[0].value if solved is not None and solved.beside else None


CHECKS = (
    Check("opaque-as-glazing", "Opaque panel entered as glazing", opaque_as_glazing, LIKELY),
    Check("centre-of-glass", "Centre of glass for the whole product", centre_of_glass, CERTAIN),
)
