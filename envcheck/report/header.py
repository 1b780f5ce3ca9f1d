"""Head of the report: the project, and each rule set with its status, zone and conventions."""

from __future__ import annotations

from collections.abc import Iterable, Mapping
from typing import NamedTuple

from envcheck.model.judged import Line
from envcheck.model.patterns import in_words
from envcheck.model.project import Project
from envcheck.model.ruleset import Conventions, RuleSet
from envcheck.report import numbers, wording
from envcheck.report.inert import clean
from envcheck.report.parts import Pair


class Convention(NamedTuple):
    """How this code counts one thing, and where that is said."""

    topic: str
    counted: str
    where: str


class RuleSetView(NamedTuple):
    """A rule set as the head names it."""

    id: str
    title: str
    decides: bool
    facts: tuple[Pair, ...]
    conventions: tuple[Convention, ...]
    units_note: str
    """Which unit stands behind each letter of the table."""
    printed_units: str
    """Units in which the table is printed and compared, where the report's are others."""
    rounding: str
    """How a value is rounded before it is compared, as the rule set names it."""


def title(project: Project) -> str:
    """Title and reference."""
    reference = f" ({project.reference})" if project.reference else ""
    return clean(project.title + reference)


def facts(project: Project, date: str) -> tuple[Pair, ...]:
    """Title block of the project; the report date is the project's or the one asked for."""
    report_date = date or (project.report_date.isoformat() if project.report_date else "")
    permit = project.permit_application_date
    pairs = (
        ("place", project.site.place),
        ("scope", wording.SCOPES.get(project.scope, wording.plain(project.scope))),
        ("permit application", permit.isoformat() if permit else ""),
        ("report date", report_date or "not stated"),
        ("prepared by", project.prepared_by or "not stated"),
        ("note", project.invented),
    )
    return tuple(Pair(label, clean(text)) for label, text in pairs if text)


def rule_set(ruleset: RuleSet, lines: Iterable[Line], project: Project, system: str) -> RuleSetView:
    """Head of one rule set; the zone comes from the trail of its lines."""
    own = [line for line in lines if line.ruleset == ruleset.id]
    printed = dict.fromkeys(clean(x.limit.unit) for x in own if x.limit and x.limit.unit)
    apart = any(numbers.system_of(unit) != system for unit in printed)
    pairs = (
        ("jurisdiction", ruleset.jurisdiction),
        ("status", status(ruleset)),
        ("lock", "; ".join(f"{e.id}: {e.lock}" for e in ruleset.chain if e.lock is not None)),
        ("documents", "; ".join(_documents(ruleset))),
        ("zone", _zone(ruleset, own, project)),
        ("path", _path(ruleset, project)),
        ("weight", "" if decides(ruleset, project) else "information only, decides nothing"),
    )
    return RuleSetView(
        id=clean(ruleset.id),
        title=clean(ruleset.title),
        decides=decides(ruleset, project),
        facts=tuple(Pair(label, clean(text)) for label, text in pairs if text),
        conventions=tuple(_conventions(ruleset, system)),
        units_note=_units_note(own, system),
        printed_units=", ".join(printed) if apart else "",
        rounding=ruleset.compare,
    )


def _path(ruleset: RuleSet, project: Project) -> str:
    """The path that the project elects, where it is not row by row."""
    elected = any(c.id == ruleset.id and c.path == "trade_off" for c in project.rule_sets)
    if not elected:
        return ""
    clause = ruleset.tradeoff.clause if ruleset.tradeoff is not None else ""
    return f"trade-off ({clause})" if clause else "trade-off"


def decides(ruleset: RuleSet, project: Project) -> bool:
    """Whether a rule set decides, or is held beside for information only."""
    return all(choice.decides for choice in project.rule_sets if choice.id == ruleset.id)


def lead(project: Project, rulesets: Iterable[RuleSet], lines: Iterable[Line]) -> tuple[str, ...]:
    """Place, rule set, zone and status: a line for each rule set."""
    zones: dict[str, str] = {}
    for line in lines:
        if line.ruleset not in zones:
            zone = next((chosen for step, chosen, _ in line.trail if step == "zone"), "")
            zones[line.ruleset] = zone
    found = []
    for ruleset in rulesets:
        word = wording.STATUS.get(ruleset.status, ruleset.status)
        zone = zones.get(ruleset.id, "")
        parts = (
            project.site.place,
            ruleset.title,
            _in_zone(zone, ruleset),
            f"invented {word}" if ruleset.invented else word,
            "" if decides(ruleset, project) else "information only",
            _changed(ruleset),
        )
        found.append(clean("; ".join(filter(None, parts))))
    return tuple(found)


def _changed(ruleset: RuleSet) -> str:
    """Say where files of the rule set, or of what it amends, are not as they were checked."""
    locks = [e.lock for e in ruleset.chain if e.lock is not None]
    files = ", ".join(name for lock in locks for name in lock.changed)
    return f"CHANGED since it was checked: {files}" if files else ""


def _in_zone(zone: str, ruleset: RuleSet) -> str:
    if zone:
        return f"zone {zone}"
    return "zone not found" if len(ruleset.zones.order) > 1 else ""


def status(ruleset: RuleSet) -> str:
    """Say what the limit tables are, and who checked them."""
    word = wording.STATUS.get(ruleset.status, ruleset.status)
    kind = f"invented {word}, no law anywhere" if ruleset.invented else word
    return f"{kind}; checked by: {ruleset.checked_by or 'nobody named'}"


def _documents(ruleset: RuleSet) -> Iterable[str]:
    for edition in ruleset.chain:
        words = " ".join(filter(None, (edition.title, edition.edition, edition.clause)))
        start, end = edition.effective_from, edition.effective_until
        dates = f"from {start.isoformat()}" if start else ""
        dates += f" until {end.isoformat()}" if end else ""
        force = "" if edition.in_force else "not in force on the date tested"
        notes = ", ".join(filter(None, (dates.strip(), force)))
        yield f"{words} ({notes})" if notes else words


def _zone(ruleset: RuleSet, lines: Iterable[Line], project: Project) -> str:
    for line in lines:
        for step, chosen, why in line.trail:
            if step == "zone":
                return f"{chosen}: {why}" if why else chosen
    for stated in project.site.zones:
        if stated.ruleset in ("", ruleset.id, *(edition.id for edition in ruleset.chain)):
            return f"{stated.zone} ({stated.source or 'stated by the project'})"
    return ""


def _units_note(lines: Iterable[Line], system: str) -> str:
    found: dict[str, list[str]] = {}
    for metric in dict.fromkeys(line.metric for line in lines):
        letters = found.setdefault(numbers.unit(metric, system), [])
        if numbers.symbol(metric) not in letters:
            letters.append(numbers.symbol(metric))
    return "; ".join(
        f"{' and '.join(letters)} in {unit}" for unit, letters in found.items() if unit
    )


def _conventions(ruleset: RuleSet, system: str) -> Iterable[Convention]:
    conv = ruleset.conventions
    yield _said(conv, "surface films", _films(conv), "films")
    for methods, clause in _methods(conv):
        yield Convention("method", clean(methods), clean(clause))
    spaces = wording.AIR_SPACES.get(conv.air_spaces, conv.air_spaces)
    yield _said(conv, "air spaces", spaces, "air_spaces")
    cladding = wording.CLADDING.get(conv.cladding, conv.cladding)
    yield _said(conv, "ventilated cladding", cladding, "cladding")
    fasteners = wording.FASTENERS.get(conv.fasteners, conv.fasteners)
    yield _said(conv, "fasteners", fasteners, "fasteners")
    for topic, key, counted in _wind_and_corrections(conv):
        yield _said(conv, topic, counted, key)
    yield _said(conv, "tapered layers", _tapered(conv, system), "tapered")
    crossed = wording.CROSSED.get(conv.crossed_insulation, conv.crossed_insulation)
    yield _said(conv, "crossed insulation", crossed, "crossed_insulation")
    for category, share, clause in conv.framing_shares:
        counted = f"{in_words(category)}: {numbers.percent(share)}"
        yield Convention("framing share", counted, clean(clause))
    if not conv.framing_shares:
        yield Convention("framing share", "none is built in: each as the project states", "project")
    for test in conv.class_tests:
        counted = f"{in_words(test.category)}: {wording.plain(test.measure)} {test.words}"
        if test.measure == "visible_transmittance":
            counted = f"{in_words(test.category)}: must let light through"
        elif test.measure in ("heat_capacity", "weight"):
            counted += f", counted {wording.plain(test.counted)}"
        yield Convention("class test", clean(counted), clean(test.clause))
    for space in conv.space_tests:
        counted = f"{wording.plain(space.fact)} {space.value}: {wording.plain(space.measure)} "
        yield Convention("space test", clean(counted + space.words), clean(space.clause))
    if conv.penetration_cap is not None:
        cap = f"continuous up to {conv.penetration_cap * 100:.3g} % of metal through it"
        yield _said(conv, "pierced insulation", cap, "penetration_cap")
    evidence: dict[tuple[str, ...], list[str]] = {}
    for category, kinds in conv.accepted_evidence.items():
        evidence.setdefault(kinds, []).append(in_words(category))
    for kinds, categories in evidence.items():
        counted = f"{', '.join(categories)}: {', '.join(kinds)}"
        yield _said(conv, "accepted evidence", counted, "accepted_evidence", "evidence")
    if conv.dimensions_measured:
        counted = f"{conv.dimensions_measured} dimensions"
        yield _said(conv, "areas", counted, "dimensions_measured", "measured")
    rule = wording.COMPARE.get(ruleset.compare, wording.plain(ruleset.compare))
    stated = ruleset.rounding_clause or "rule set"
    where = stated if ruleset.rounding_stated else wording.OUR_DEFAULT
    yield Convention("rounding", rule, clean(where))


def _wind_and_corrections(conv: Conventions) -> Iterable[tuple[str, str, str]]:
    """Topic, key and words of the film by wind, and of the corrections beside fasteners."""
    if conv.wind_speed is not None:
        counted = f"by a wind of {conv.wind_speed:g} m/s (ISO 6946)"
        yield "film outdoors", "wind_speed", counted
    yield "air voids", "air_voids", wording.CORRECTIONS[conv.air_voids]
    yield "rain on inverted roofs", "inverted_roofs", wording.CORRECTIONS[conv.inverted_roofs]
    if conv.corrections_from is not None:
        counted = f"from {numbers.percent(conv.corrections_from)} of U together"
        yield "corrections count", "corrections_from", counted


def _said(conv: Conventions, topic: str, counted: str, *keys: str) -> Convention:
    where = next((conv.where[key] for key in keys if key in conv.where), wording.OUR_DEFAULT)
    return Convention(topic, clean(counted), clean(where))


def _films(conv: Conventions) -> str:
    named = f"table {conv.film_set}" if conv.film_set else "table of the rule set"
    return wording.FILM_SETS.get(conv.film_set, named)


def _methods(conv: Conventions) -> Iterable[tuple[str, str]]:
    """Methods with their categories, those of one clause and method together."""
    found: dict[tuple[str, float | str | None, tuple[str, ...], str], list[str]] = {}
    for rule in conv.methods:
        key = (rule.method, rule.weight, rule.refused, rule.clause)
        found.setdefault(key, []).append(in_words(rule.category))
    for (method, weight, refused, clause), categories in found.items():
        text = wording.METHODS.get(method, wording.plain(method))
        if weight is not None:
            named = weight if isinstance(weight, str) else f"{weight:g}"
            text += f" (weight {wording.WEIGHTS.get(named, named)})"
        if refused:
            names = ", ".join(wording.METHODS.get(name, wording.plain(name)) for name in refused)
            text += f"; not accepted: {names}"
        yield f"{', '.join(categories)}: {text}", clause
    if not conv.methods:
        yield "none named: each line says what was assumed", wording.OUR_DEFAULT


def _tapered(conv: Conventions, system: str) -> str:
    text = wording.TAPERED.get(conv.tapered, conv.tapered)
    if conv.tapered_least is not None:
        text += f"; no thinner than {numbers.length(conv.tapered_least, system)}"
    if conv.tapered_mean_within is None:
        return text
    return f"{text}; the mean where it varies by no more than " + numbers.length(
        conv.tapered_mean_within, system
    )


def not_judged(rulesets: Mapping[str, RuleSet]) -> tuple[str, ...]:
    """What the rule sets say they do not cover, each once."""
    texts = (text for ruleset in rulesets.values() for text in ruleset.not_judged)
    return tuple(dict.fromkeys(map(clean, texts)))


def hashes(project: Project, rulesets: Mapping[str, RuleSet]) -> tuple[Pair, ...]:
    """SHA-256 of the project file and of every document of each rule set."""
    found = [Pair(clean(project.file), project.sha256)] if project.sha256 else []
    for ruleset in rulesets.values():
        for edition in ruleset.chain:
            pair = Pair(f"rule set {clean(edition.id)}", edition.sha256)
            if edition.sha256 and pair not in found:
                found.append(pair)
    return tuple(found)
