"""The grammar of a printed table's cells.

::

    cell  = special | alt { " or " alt }, with footnote marks in square brackets
    alt   = part { "/" part }      where the row says what its slash means
    part  = term { "+" term }      where the row says what its plus means, or each term says it
    term  = [prefix] [<=|>=] number [suffixes] [extent], or a rating scheme and its band

A cell is read for one metric at a time: :class:`Grammar` says what row and column allow.
"""

from __future__ import annotations

import re
from typing import NamedTuple

from envcheck import units
from envcheck.model.ruleset import Term

NO_REQUIREMENT = ("nr", "no requirement", "keine anforderung", "sans exigence", "uninsulated")
NOT_COVERED = ("-", "\u2013", "\u2014", "n/a")
REFERENCES = {"<": "left", "^": "above", ".": "unchanged"}
_RESISTANCES = (
    "R_insulation", "R_total", "R_construction", "RSI_effective", "R_without_framing",
    "R_old_and_new",
)  # fmt: skip
PREFIXES = {
    "U": ("U_assembly", "U_product", "U_glazing", "U_curtain_wall", "U_mean"),
    "Uw": ("U_product",),
    "Ud": ("U_product",),
    "Ug": ("U_glazing",),
    "Uc": ("U_curtain_wall", "U_product"),
    "Ucw": ("U_curtain_wall", "U_product"),
    "Um": ("U_mean",),
    "K": ("K_global",),
    "C": ("C_factor",),
    "F": ("F_factor",),
    "R": _RESISTANCES,
    "RSI": _RESISTANCES,
    "SHGC": ("SHGC",),
    "g": ("SHGC",),
    "VT": ("VT",),
    "VT/SHGC": ("VT_per_SHGC",),
}
"""Prefix -> the metrics that it may stand for."""
SUFFIXES = ("ci", "Ls", "FC", "std")
"""Suffixes that need no declaration: continuous insulation, liner system, filled cavity, standard
framing."""
EXTENT_WORDS = ("perimeter", "under", "full", "edge", "entire", "below", "above", "around")
"""Words with which an extent may begin."""
_MARKS = re.compile(r"\[([^\[\]]*)\]")
_OR = re.compile(r"\s+or\s+")
_TERM = re.compile(
    r"(?:(?P<prefix>[A-Za-z]+(?:/[A-Za-z]+)?)\s*[-=]?\s*)?(?P<relation><=|>=|\u2264|\u2265)?\s*"
    r"(?P<number>\d*[.,]?\d+)(?P<rest>.*)"
)
_SUFFIX = re.compile(r"\s*([A-Za-z][A-Za-z.]*)(?=[\s,]|$)")
_EXTENT = re.compile(r"(?:for\b|,)\s*(?P<length>.*\d.*?(?:in|ft|mm|cm|m)\b\.?)\s*(?P<words>.*)")
_BAND = re.compile(r"([A-Za-z]+)\s+([A-Z][+]*)")


class CellError(ValueError):
    """A cell, head or condition that cannot be read; ``kind`` is an id of ``error_kinds``."""

    def __init__(self, kind: str, expected: str = "", fix: str = "") -> None:
        super().__init__(kind)
        self.kind = kind
        self.expected = expected
        self.fix = fix


class Grammar(NamedTuple):
    """What row and column of a table allow in a cell."""

    metric: str = "U_assembly"
    sense: str = "max"
    si: bool = False
    """The printed unit is an SI unit."""
    decimal: str = "."
    plus: tuple[str, ...] = ()
    """Roles of the terms of a sum, in their order."""
    slash: str = ""
    """``when``, ``or``, ``and`` or empty: no slash."""
    slash_roles: tuple[str, ...] = ()
    """Roles of the sides of a slash (empty words with ``when``)."""
    extent: str = ""
    """What an extent measures (``depth``, ``perimeter``); empty: none allowed."""
    suffixes: tuple[str, ...] = ()
    no_requirement: tuple[str, ...] = ()
    """Further words for no requirement."""
    metrics: tuple[str, ...] = ()
    """Other metrics that a prefix may name."""
    bands: tuple[tuple[str, tuple[str, ...]], ...] = ()
    """Rating scheme -> its bands, best first."""


class Branch(NamedTuple):
    """One reading of a cell."""

    kind: str
    """``number``, ``no_requirement``, ``not_covered`` or ``refers``."""
    alternatives: tuple[tuple[Term, ...], ...] = ()


class Cell(NamedTuple):
    """A cell as read."""

    text: str
    """As printed, without footnote marks."""
    branches: tuple[Branch, ...]
    """One; where a slash states conditions, one for each of them."""
    marks: tuple[str, ...]
    refers: str = ""
    """``left``, ``above``, ``unchanged`` or ``see ROW``."""

    @property
    def plain(self) -> bool:
        """One reading, no footnotes, no other cell."""
        return not self.marks and not self.refers and len(self.branches) == 1


def split_marks(text: str) -> tuple[str, tuple[str, ...]]:
    """Take the footnote marks off a text: ``30[g]`` -> ``30``, ``(g,)``.

    Errors: CellError for a bracket without its partner.
    """
    if "[" not in text and "]" not in text:
        return text.strip(), ()
    marks = tuple(mark for group in _MARKS.findall(text) for mark in group.split())
    plain = _MARKS.sub("", text)
    if "[" in plain or "]" in plain or not marks:
        raise CellError("lost-bracket")
    return plain.strip(), tuple(dict.fromkeys(marks))


def known_cell(text: str, grammar: Grammar) -> Cell:
    """Read a cell, or give it as read before: printed tables repeat their figures."""
    known = _READ.get(grammar)
    if known is None:
        if len(_READ) >= MOST_KEPT:
            _READ.clear()
        known = _READ[grammar] = {}
    found = known.get(text)
    if found is None:
        if len(known) >= MOST_KEPT:
            known.clear()
        found = known[text] = read_cell(text, grammar)
    return found


LONGEST = 300
"""Characters of a cell; no printed one is longer."""
MOST_KEPT = 1000
_READ: dict[Grammar, dict[str, Cell]] = {}
"""Cells read so far; the same text means the same under the same grammar."""


def read_cell(text: str, grammar: Grammar) -> Cell:
    """Read a cell. Errors: CellError."""
    if len(text) > LONGEST:
        raise CellError("unreadable-cell", f"at most {LONGEST} characters")
    plain, marks = split_marks(text)
    plain = " ".join(plain.split())
    if not plain:
        raise CellError("blank-cell")
    if plain in REFERENCES:
        return Cell(plain, (Branch("refers"),), marks, REFERENCES[plain])
    if plain.startswith("see "):
        return Cell(plain, (Branch("refers"),), marks, plain)
    if grammar.slash == "when" and "/" in plain and not _special(plain, grammar):
        sides = len(grammar.slash_roles)
        return Cell(plain, tuple(_branch(plain, grammar, i) for i in range(sides)), marks)
    return Cell(plain, (_branch(plain, grammar, None),), marks)


def _special(text: str, grammar: Grammar) -> str:
    word = text.casefold()
    if word in NO_REQUIREMENT or word in (w.casefold() for w in grammar.no_requirement):
        return "no_requirement"
    return "not_covered" if word in NOT_COVERED else ""


def _branch(text: str, grammar: Grammar, side: int | None) -> Branch:
    """Read the whole cell, or its ``side``-th reading where a slash states conditions."""
    kind = _special(text, grammar)
    if kind:
        return Branch(kind)
    alternatives: list[tuple[Term, ...]] = []
    for alt in _OR.split(text):
        sides = _sides(alt, grammar)
        if side is None and grammar.slash == "and":
            alternatives.append(tuple(t for s, r in sides for t in _part(s, grammar, r)))
            continue
        chosen = sides if side is None or len(sides) == 1 else sides[side : side + 1]
        for part, role in chosen:
            kind = _special(part, grammar)
            if kind and len(alternatives) == 0 and " or " not in text:
                return Branch(kind)
            alternatives.append(_part(part, grammar, role))
    return Branch("number", tuple(alternatives))


def _sides(alt: str, grammar: Grammar) -> list[tuple[str, str]]:
    """Split at the slash, each side with its role; a prefix may hold a slash of its own."""
    match = _TERM.match(alt)
    head = match["prefix"] if match and match["prefix"] and "/" in match["prefix"] else ""
    parts = alt[len(head) :].split("/")
    parts[0] = head + parts[0]
    if len(parts) == 1:
        return [(alt, "")]
    if not grammar.slash:
        raise CellError("slash-without-rule")
    if len(parts) != len(grammar.slash_roles):
        expected = f"{len(grammar.slash_roles)} figures, as the row's slash has"
        raise CellError("unreadable-cell", expected, "give one figure for each meaning")
    return list(zip((p.strip() for p in parts), grammar.slash_roles, strict=True))


def _part(text: str, grammar: Grammar, role: str) -> tuple[Term, ...]:
    """Read a sum: each term says its role, or the row does by position."""
    terms = [_term(t.strip(), grammar) for t in text.split("+")]
    if len(terms) > 1 and not grammar.plus and not all(t.role for t in terms):
        raise CellError("plus-without-rule")
    if grammar.plus and len(terms) > len(grammar.plus):
        raise CellError("unreadable-cell", f"at most {len(grammar.plus)} figures in a sum")
    roles = grammar.plus or (role,) * len(terms)
    return tuple(
        t if t.role or t.metric else t._replace(role=role or r)
        for t, r in zip(terms, roles, strict=False)
    )


def _term(text: str, grammar: Grammar) -> Term:
    """Read one number with its prefix, suffixes and extent, or a band of a rating scheme."""
    match = _TERM.fullmatch(text)
    if match is None:
        return _band(text, grammar)
    digits = _digits(match["number"], grammar)
    _check_relation(match["relation"], grammar)
    metric = _metric(match["prefix"] or "", grammar)
    if not match["rest"]:
        return Term(float(digits), digits, metric=metric)
    suffixes, extent, where = _rest(match["rest"], grammar)
    role, also = (suffixes[0], suffixes[1:]) if suffixes else ("", ())
    return Term(float(digits), digits, role, extent, metric, where, also)


def _band(text: str, grammar: Grammar) -> Term:
    """Read ``WER B``: this band or a better one."""
    match = _BAND.fullmatch(text)
    if match is None or match[1] not in grammar.metrics:
        raise CellError("unreadable-cell", _example(grammar))
    known = dict(grammar.bands).get(match[1], ())
    if match[2] not in known:
        expected = "one of " + ", ".join(known) if known else f"bands: {{{match[1]}: [A, B, ...]}}"
        raise CellError("unknown-band", expected)
    return Term(float(known.index(match[2])), match[2], metric=match[1], band=match[2])


def _digits(number: str, grammar: Grammar) -> str:
    """Digits with a point, as printed otherwise; the other decimal mark is refused."""
    other = "," if grammar.decimal == "." else "."
    if other in number:
        right = number.replace(other, grammar.decimal)
        expected = f"the decimal mark {grammar.decimal!r}"
        raise CellError("cell-decimal-mark", expected, f"is it {right}?")
    return number.replace(",", ".")


def _check_relation(relation: str | None, grammar: Grammar) -> None:
    if relation and (relation in ("<=", "\u2264")) != (grammar.sense == "max"):
        raise CellError("sense-against-metric", f"a {grammar.sense}imum, as its row or column says")


def _rest(rest: str, grammar: Grammar) -> tuple[tuple[str, ...], float | None, str]:
    """Read what follows the number: suffixes, and an extent as a length, in words or both."""
    plain = rest.strip()
    allowed = {s.casefold(): s for s in (*SUFFIXES, *grammar.suffixes)}
    found: list[str] = []
    while match := _SUFFIX.match(plain):
        name = match[1].replace(".", "").casefold()
        if name not in allowed:
            break
        found.append(allowed[name])
        plain = plain[match.end() :].lstrip()
    if not plain:
        return tuple(found), None, ""
    extent = _EXTENT.fullmatch(plain)
    if extent is None and plain.lstrip(", ").split(" ")[0].casefold() not in EXTENT_WORDS:
        _refuse(plain, rest, allowed, grammar)
    if not grammar.extent:
        raise CellError("extent-without-rule")
    if extent is None:
        return tuple(found), None, plain.lstrip(", ")
    return tuple(found), _length(extent["length"], grammar), extent["words"]


def _refuse(plain: str, rest: str, allowed: dict[str, str], grammar: Grammar) -> None:
    """Say what is wrong with letters that no suffix and no extent explain."""
    word = re.fullmatch(r"[A-Za-z.]+", plain.split(" ")[0].rstrip(","))
    if word is not None and plain.split(" ")[0] not in ("for", ","):
        if len(word[0]) == 1 and rest[0] != " ":
            raise CellError("trailing-letter", fix=f"write [{word[0]}] where it is a footnote mark")
        if " " not in plain:
            raise CellError("unknown-suffix", "one of " + ", ".join(sorted(allowed.values())))
    raise CellError("unreadable-cell", _example(grammar))


def _length(text: str, grammar: Grammar) -> float:
    try:
        return units.parse(text.removesuffix("."), "length")
    except units.UnitError as error:
        raise CellError("unreadable-cell", error.expected, error.fix) from None


def _metric(prefix: str, grammar: Grammar) -> str:
    """Give the metric that a prefix names where it is not the row's own."""
    if not prefix:
        return ""
    names = [n for part in prefix.split("/") for n in PREFIXES.get(part, ())]
    if grammar.metric in names:
        if prefix == "RSI" and not grammar.si:
            raise CellError("prefix-against-metric", "an R-value in the printed unit, not RSI")
        return ""
    if prefix in PREFIXES and grammar.metric in PREFIXES[prefix]:
        return ""
    if prefix in grammar.metrics:
        return prefix
    if names:
        raise CellError("prefix-against-metric", f"a figure for {grammar.metric}")
    raise CellError("unreadable-cell", _example(grammar))


def _example(grammar: Grammar) -> str:
    number = f"0{grammar.decimal}060" if grammar.sense == "max" else "13"
    more = ", 13+9ci" if grammar.plus else ""
    return f"a figure such as {number}{more}, or NR or -"
