"""One difference between two revisions in words, with figures in the units of the report."""

from __future__ import annotations

from collections.abc import Mapping
from datetime import date
from math import isnan

from envcheck import units
from envcheck.model.compared import Difference
from envcheck.model.layers import (
    AirSpaceLayer,
    Bridge,
    FramedLayer,
    MasonryLayer,
    MaterialLayer,
    ResistanceLayer,
    TaperedLayer,
)
from envcheck.model.patterns import in_words
from envcheck.model.project import Declared, Element, ExceptionClaim, Fact, Opening
from envcheck.model.ruleset import Dimension, Edition
from envcheck.report import numbers, wording
from envcheck.report.inert import clean

DIGITS = 5
NONE = "-"
ARROW = " -> "
FIELDS = {
    "u_factor": "U-factor",
    "shgc": "SHGC",
    "label": "labelled R",
    "installed_label": "R stated in place",
    "fill": "",
    "rated": "rating",
    "mean_with": "mean asked for",
    "category_claimed": "category as claimed (judged the same)",
    "least": "least thickness",
    "greatest": "greatest thickness",
    "document_found": "document in the folder",
    "evidence_found": "evidence in the folder",
}
"""Fields whose name says it badly; every other is written as words."""
KINDS = {
    "project": "project",
    "site": "site",
    "fact": "facts",
    "rule_set": "rule sets",
    "material": "materials",
    "assembly": "assemblies",
    "detail": "details",
    "surface": "surfaces",
    "element": "elements",
    "exception": "exceptions",
    "options": "options",
}
"""Kind -> the part of a project file."""


class Words:
    """Writes differences in one unit system; facts in the units that the rule sets ask for."""

    def __init__(self, system: str, dimensions: Mapping[str, Dimension]) -> None:
        self.system = system
        self._dimensions = dimensions

    def subject(self, each: Difference) -> str:
        """What it is of: ``W1, XPS``."""
        name = wording.plain(each.name) if each.kind in ("fact", "ratio") else each.name
        parts = [name, *(FIELDS.get(part, wording.plain(part)) for part in each.where)]
        return clean(", ".join(filter(None, parts)))

    def field(self, each: Difference) -> str:
        """What of it: ``thickness``; for a whole part whether it was added, dropped, replaced."""
        if not each.field:
            return each.what
        return clean(FIELDS.get(each.field, wording.plain(each.field)))

    def before(self, each: Difference) -> str:
        """What it was."""
        return self.value(each.before, each)

    def after(self, each: Difference) -> str:
        """What it is now."""
        return self.value(each.after, each)

    def sentence(self, each: Difference, own: frozenset[str] = frozenset()) -> str:
        """The whole difference; names in ``own`` need not be said."""
        before, after = self.before(each), self.after(each)
        name = each.name if each.name not in own else ""
        if each.kind == "fact":
            return f"fact {wording.plain(each.name)}: {before}{ARROW}{after}"
        if each.kind == "ratio":
            ratio = wording.RATIOS.get(each.name, wording.plain(each.name))
            return clean(f"{ratio}: {before}{ARROW}{after}")
        if each.kind == "exception":
            return clean(f"exception of clause {each.name.partition(' ')[2]}: {self._change(each)}")
        if each.kind == "group":
            return f"judged: {before}{ARROW}{after}"
        if each.kind == "class":
            return f"judged as {before}{ARROW}{after}"
        if each.kind == "setting":
            return clean(f"solved with {self._change(each)}")
        kind = "rule set" if each.kind == "rule_set" else ""
        subject = self.subject(each._replace(name=name))
        if not each.field and each.where:
            subject = self.subject(each._replace(name=name, where=each.where[:-1]))
        lead = f"{kind} {subject}".strip()
        return clean(f"{lead}: {self._change(each)}" if lead else self._change(each))

    def _change(self, each: Difference) -> str:
        before, after = self.before(each), self.after(each)
        if not each.field:
            match each.what:
                case "added":
                    return f"{after} added"
                case "dropped":
                    return f"{before} dropped"
                case "moved":
                    return f"{after} stands at another place"
                case "renamed":
                    return f"renamed from {before}"
            return f"{before} replaced by {after}"
        return f"{self.field(each)} {before}{ARROW}{after}"

    def value(self, value: object, each: Difference) -> str:
        """A number with its unit, a word, or a record by what tells it."""
        if value is None or value == "" or value == ():
            return "alone" if each.kind == "group" else "not stated"
        if isinstance(value, bool):
            return "yes" if value else "no"
        if isinstance(value, int | float):
            return self.number(float(value), each)
        if isinstance(value, tuple) and not hasattr(value, "_fields"):
            return ", ".join(self.value(part, each) for part in value)
        if isinstance(value, date):
            return value.isoformat()
        if isinstance(value, str):
            return clean(self._word(value, each))
        return clean(self.record(value))

    def _word(self, text: str, each: Difference) -> str:
        if each.kind == "class" or each.field.startswith("category"):
            return in_words(text)
        if each.field == "method":
            return wording.METHODS.get(text, wording.plain(text))
        if each.field in ("basis", "adjoins", "ventilation", "scope", "shape"):
            return wording.plain(text)
        return text

    def number(self, value: float, each: Difference) -> str:
        """A number with its unit; of a fact in the unit that the rule set asks for."""
        dimension = self._dimensions.get(each.name) if each.kind == "fact" else None
        if dimension is not None and dimension.unit:
            shown = numbers.significant(units.convert(value, dimension.unit), DIGITS)
            return f"{shown} {dimension.unit}"
        return quantity(value, each.quantity, self.system)

    def record(self, record: object) -> str:
        """A part by its title and its size."""
        title = str(getattr(record, "title", "") or getattr(record, "id", ""))
        match record:
            case MaterialLayer() | FramedLayer() | MasonryLayer() | AirSpaceLayer():
                return f"{title} {numbers.length(record.thickness, self.system)}"
            case ResistanceLayer():
                return f"{title} R {numbers.resistance(record.resistance, self.system)}"
            case TaperedLayer():
                ends = (numbers.length(x, self.system) for x in (record.least, record.greatest))
                return f"{title} {' to '.join(ends)}"
            case Bridge():
                return self._bridge(record)
            case Fact():
                return self.value(record.value, Difference("fact", record.name, (), "", "", 0, 0))
            case Declared():
                return record.text
            case Opening():
                return f"{record.tag} x {numbers.trimmed(record.count, 2)}"
            case Element():
                return f"{record.assembly} {self.amount(record)}".strip()
            case ExceptionClaim():
                return f"claim by {record.claimed_by}" if record.claimed_by else "claim"
            case Edition():
                return f"{record.title} ({record.id})"
        return title or str(getattr(record, "zone", "") or getattr(record, "name", "")) or "stated"

    def amount(self, element: Element) -> str:
        """Area, perimeter or count of an element with its unit."""
        from envcheck.report.rows import amount

        figure = amount(element, self.system)
        return f"{figure.text} {figure.unit}".strip()

    def _bridge(self, bridge: Bridge) -> str:
        letter = "psi" if bridge.kind == "line" else "chi"
        value = quantity(bridge.value, bridge.value_quantity, self.system)
        amount = quantity(bridge.amount, bridge.amount_quantity, self.system)
        if bridge.detail is not None:
            value = f"from detail {bridge.detail.id}"
        elif isnan(bridge.value):
            value = "from its drawing"
        return f"{bridge.title}, {letter} {value}, {amount}"


def quantity(value: float, name: str, system: str) -> str:
    """An SI number in the units of the report, to five digits."""
    if name == "share":
        return numbers.percent(value, 2)
    if name == "temperature":
        return numbers.temperature(value, system)
    if not name or isnan(value):
        return "not stated" if isnan(value) else numbers.significant(value, DIGITS)
    shown = numbers.significant(numbers.in_system(value, name, system), DIGITS)
    return f"{shown} {units.label(name, system)}".rstrip()
