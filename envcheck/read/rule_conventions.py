"""How a code counts: films, methods, coefficient tables, class tests; and where it says so."""

from __future__ import annotations

from collections.abc import Mapping
from typing import Any, NamedTuple

from envcheck.errors import Problem, did_you_mean, one_of, problem
from envcheck.model.names import Names
from envcheck.model.patterns import fits_any
from envcheck.model.ruleset import ClassTest, Conventions, FilmRow, MethodRule, SpaceTest, TableRow
from envcheck.read.coefficient_tables import built_in, film_sets, own_table
from envcheck.read.rule_documents import Document

DEFAULT = "default of envcheck"
NOT_STATED = "not stated"
WITHOUT_DEFAULT = (
    "methods", "framing_shares", "class_tests", "evidence", "measured", "cavity_factors",
    "effective_layers", "f_factors", "weights", "corrections_from", "wind_speed",
    "penetration_cap", "space_tests",
)  # fmt: skip
"""Conventions that envcheck has no value of its own for."""
WEIGHTS = ("bre_465", "table")
"""What may stand for the weight of the weighted rule."""
MEASURED = {
    "heat_capacity": "heat_capacity",
    "weight": "area_weight",
    "visible_transmittance": "share",
    "tilt": "angle",
    "below_grade_share": "share",
    "continuous_share": "share",
}
"""What a class test measures, and the quantity of its threshold."""
KEYS = (
    "films", "air_spaces", "methods", "cladding", "fasteners", "tapered", "crossed_insulation",
    "framing_shares", "class_tests", "evidence", "measured", "cavity_factors",
    "effective_layers", "f_factors", "weights", "air_voids", "inverted_roofs", "corrections_from",
    "wind_speed", "penetration_cap", "space_tests",
)  # fmt: skip


class Source(NamedTuple):
    """The conventions as stated, each key with the document that states it."""

    stated: Mapping[str, Any]
    origin: Mapping[str, Document]
    names: Names


def read_conventions(source: Source, problems: list[Problem]) -> Conventions:
    """Build the conventions of a rule set; what it does not state is our default, and said so."""
    stated = source.stated
    tapered = stated.get("tapered") or {}
    if isinstance(tapered, str):
        tapered = {"use": tapered}
    film_set, films = _films(source, problems)
    air_spaces, tables = _tables(source, problems)
    return Conventions(
        films=films,
        film_set=film_set,
        methods=_methods(source, problems),
        air_spaces=air_spaces,
        cladding=stated.get("cladding", "iso6946"),
        fasteners=stated.get("fasteners", "ignored"),
        air_voids=stated.get("air_voids", "ignored"),
        inverted_roofs=stated.get("inverted_roofs", "ignored"),
        corrections_from=_stated(source, "corrections_from", "share", problems),
        wind_speed=_stated(source, "wind_speed", "speed", problems),
        tapered=tapered.get("use", "integral"),
        tapered_mean_within=_quantity(
            source, tapered, "tapered", "mean_within", "length", problems
        ),
        tapered_least=_quantity(source, tapered, "tapered", "least", "length", problems),
        penetration_cap=_penetration_cap(source, problems),
        space_tests=_space_tests(source, problems),
        crossed_insulation=stated.get("crossed_insulation", "zero"),
        framing_shares=_shares(source, problems),
        tables=tables,
        class_tests=_class_tests(source, problems),
        accepted_evidence={
            pattern: (kinds,) if isinstance(kinds, str) else tuple(kinds)
            for pattern, kinds in (stated.get("evidence") or {}).items()
            if _pattern(source, "evidence", pattern, problems)
        },
        dimensions_measured=stated.get("measured", ""),
        where={key: _where(source, key) for key in KEYS},
    )


def _where(source: Source, key: str) -> str:
    """Say where a convention comes from."""
    if source.stated.get(key) is None:
        return NOT_STATED if key in WITHOUT_DEFAULT else DEFAULT
    document = source.origin[key]
    clause = (source.stated.get("clauses") or {}).get(key)
    value = source.stated[key]
    if clause is None and isinstance(value, Mapping):
        clause = value.get("clause")
    if clause is None and isinstance(value, list):
        clauses = dict.fromkeys(item["clause"] for item in value if item.get("clause"))
        clause = ", ".join(clauses) or None
    return f"{clause} of {document.id}" if clause else f"conventions of {document.id}"


# --------------------------------------------------------------------------------------- rules


def _methods(source: Source, problems: list[Problem]) -> tuple[MethodRule, ...]:
    rules = []
    for i, rule in enumerate(source.stated.get("methods") or ()):
        names = [rule["method"], *rule.get("refused", ())]
        for name in names:
            _known(source, ("methods", i), name, source.names.methods, "unknown-method", problems)
        if not _pattern(source, "methods", rule["category"], problems, i):
            continue
        stated = rule.get("weight")
        weight = stated if stated in WEIGHTS else _number(source, stated, ("methods", i), problems)
        clause, refused = rule.get("clause", ""), tuple(rule.get("refused", ()))
        rules.append(MethodRule(rule["category"], rule["method"], clause, refused, weight))
    return tuple(rules)


def _penetration_cap(source: Source, problems: list[Problem]) -> float | None:
    """Share of the area that metal may take through continuous insulation, 0..1."""
    text = source.stated.get("penetration_cap")
    return None if text is None else _parse(source, text, "share", ("penetration_cap",), problems)


def _space_tests(source: Source, problems: list[Problem]) -> tuple[SpaceTest, ...]:
    """Outputs that must bear out how a space is conditioned; a bound may be left out."""
    tests = []
    for i, test in enumerate(source.stated.get("space_tests") or ()):
        ends = [
            _parse(source, test[key], "power_density", ("space_tests", i, key), problems)
            if key in test
            else None
            for key in ("at_least", "below")
        ]
        bounds = [(word, test[word]) for word in ("at_least", "below") if word in test]
        words = " and ".join(f"{word.replace('_', ' ')} {text}" for word, text in bounds)
        names = (test["fact"], test["value"], test["measure"])
        tests.append(SpaceTest(*names, ends[0], ends[1], words, test.get("clause", "")))
    return tuple(tests)


def _class_tests(source: Source, problems: list[Problem]) -> tuple[ClassTest, ...]:
    tests = []
    for i, test in enumerate(source.stated.get("class_tests") or ()):
        quantity = MEASURED.get(str(test["measure"]))
        if quantity is None:  # refused by the schema already
            continue
        key = "below" if "below" in test else "at_least"
        if ("at_least" in test) == ("below" in test):
            found = "both" if key in test else "neither"
            hint = "keep the one that the code prints"
            _incomplete(source, i, found, "exactly one of at_least, below", hint, problems)
            continue
        if quantity in ("angle", "share") and not test.get("otherwise"):
            what = "'otherwise', the class of an element that fails"
            _incomplete(source, i, "none", what, "add a category, such as wall.other", problems)
            continue
        value = _parse(source, test[key], quantity, ("class_tests", i, key), problems)
        if value is None or not _pattern(source, "class_tests", test["category"], problems, i):
            continue
        counted, arguable = test.get("counted", "whole"), test.get("arguable") == "yes"
        otherwise = test.get("otherwise", "")
        if otherwise and not _pattern(source, "class_tests", otherwise, problems, i):
            continue
        tests.append(
            ClassTest(
                test["category"],
                test["measure"],
                value,
                test[key],
                counted,
                test.get("clause", ""),
                arguable,
                otherwise,
                key == "below",
            )
        )
    return tuple(tests)


def _incomplete(
    source: Source, test: int, found: str, what: str, hint: str, problems: list[Problem]
) -> None:
    document = source.origin["class_tests"]
    line = document.line("conventions", "class_tests", test)
    fill = {"found": found, "what": what, "hint": hint}
    problems.append(problem("class-test-incomplete", document.name, line, **fill))


def _shares(source: Source, problems: list[Problem]) -> tuple[tuple[str, float, str], ...]:
    shares = []
    for i, share in enumerate(source.stated.get("framing_shares") or ()):
        value = _parse(source, share["share"], "share", ("framing_shares", i, "share"), problems)
        if value is not None and _pattern(source, "framing_shares", share["category"], problems, i):
            shares.append((share["category"], value, share.get("clause", "")))
    return tuple(shares)


def _pattern(
    source: Source, key: str, pattern: str, problems: list[Problem], at: int | None = None
) -> bool:
    """Whether a category pattern fits at least one category."""
    known = source.names.categories
    if fits_any(pattern, known):
        return True
    where = (key, pattern) if at is None else (key, at)
    _known(source, where, pattern, known, "unknown-category", problems)
    return False


def _known(
    source: Source,
    at: tuple[str | int, ...],
    name: str,
    known: tuple[str, ...],
    kind: str,
    problems: list[Problem],
) -> None:
    if name in known:
        return
    document = source.origin[str(at[0])]
    file, line = document.name, document.line("conventions", *at)
    fix = did_you_mean(name, known)
    fill = {"found": name, "expected": one_of(known), "fix": fix, "name": name}
    fill["hint"] = fix or "use one of the known names"
    problems.append(problem(kind, file, line, **fill))


# -------------------------------------------------------------------------------------- tables


def _films(source: Source, problems: list[Problem]) -> tuple[str, tuple[FilmRow, ...]]:
    stated = source.stated.get("films") or "iso6946"
    if stated.endswith(".csv"):
        rows, name = own_table(source.origin["films"], "films", stated, problems), stated
    else:
        rows, name = built_in("films", stated), stated
        if not rows:
            _known(source, ("films",), stated, film_sets(), "unknown-film-set", problems)
    films = tuple(
        FilmRow(
            str(r.keys["side"]), str(r.keys["adjoins"]), str(r.keys["direction"]), r.value, r.text,
            r.source,
        )
        for r in rows
    )  # fmt: skip
    return name, films


def _tables(source: Source, problems: list[Problem]) -> tuple[str, dict[str, tuple[TableRow, ...]]]:
    """Coefficient tables by name; air spaces are a formula, a built-in table or an own one."""
    tables = {
        key: own_table(source.origin[key], key, str(source.stated[key]), problems)
        for key in ("cavity_factors", "effective_layers", "f_factors", "weights")
        if source.stated.get(key) is not None
    }
    tables["compressed_batts"] = built_in("compressed_batts", "")
    air = source.stated.get("air_spaces") or "iso6946"
    if air == "iso6946":
        return air, tables
    own = air.endswith(".csv")
    tables["air_spaces"] = (
        own_table(source.origin["air_spaces"], "air_spaces", air, problems)
        if own
        else built_in("air_spaces", "")
    )
    return "table", tables


# ------------------------------------------------------------------------------------- figures


def _quantity(
    source: Source,
    stated: Mapping[str, Any],
    key: str,
    name: str,
    quantity: str,
    problems: list[Problem],
) -> float | None:
    text = stated.get(name)
    return None if text is None else _parse(source, text, quantity, (key, name), problems)


def _stated(source: Source, key: str, quantity: str, problems: list[Problem]) -> float | None:
    text = source.stated.get(key)
    return None if text is None else _parse(source, text, quantity, (key,), problems)


def _number(
    source: Source, text: str | None, at: tuple[str | int, ...], problems: list[Problem]
) -> float | None:
    return None if text is None else _parse(source, text, "number", at, problems)


def _parse(
    source: Source, text: str, quantity: str, at: tuple[str | int, ...], problems: list[Problem]
) -> float | None:
    document = source.origin[str(at[0])]
    return document.figure(text, quantity, ("conventions", *at), problems)
