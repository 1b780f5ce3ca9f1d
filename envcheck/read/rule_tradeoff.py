"""The trade-off that a code offers in place of its rows."""

from __future__ import annotations

from collections.abc import Mapping
from typing import Any

from envcheck.errors import Problem, did_you_mean, one_of, problem
from envcheck.model.ruleset import Dimension, TradeOff
from envcheck.read.rule_documents import Document
from envcheck.read.rule_parts import check_patterns, own_names


def read_tradeoff(
    document: Document,
    categories: tuple[str, ...],
    dimensions: Mapping[str, Dimension],
    problems: list[Problem],
) -> TradeOff | None:
    """Read a trade-off; without ``terms`` it is said and not taken."""
    stated: Mapping[str, Any] = document.get("tradeoff") or {}
    if not stated:
        return None
    rows, left_out = (own_names(document, tuple(stated.get(k) or ())) for k in ("rows", "left_out"))
    check_patterns(document, rows, categories, ("tradeoff", "rows"), problems)
    check_patterns(document, left_out, categories, ("tradeoff", "left_out"), problems)
    per, classes = stated.get("per", ""), tuple(stated.get("classes") or ())
    _check_classes(document, per, classes, dimensions, problems)
    supported = stated.get("supported", "yes" if stated.get("terms") else "no")
    return TradeOff(
        kind=stated["kind"],
        clause=stated.get("clause", ""),
        rule=stated.get("rule", ""),
        supported=supported.partition(" ")[0],
        say=stated.get("say", ""),
        terms=tuple(stated.get("terms") or ()),
        rows=rows,
        left_out=left_out,
        per=per,
        classes=classes,
        glazing=stated.get("glazing", "closes"),
    )


def _check_classes(
    document: Document,
    per: str,
    classes: tuple[str, ...],
    dimensions: Mapping[str, Dimension],
    problems: list[Problem],
) -> None:
    """The classes are words of a declared dimension."""
    if not per and not classes:
        return
    words = [name for name, dimension in dimensions.items() if dimension.values]
    if per not in words:
        line = document.line("tradeoff", "per" if per else "classes")
        fix = did_you_mean(per, words) or f"declare {per or 'per'!r} under `dimensions:`"
        problems.append(
            problem("undeclared-condition", document.name, line, found=per or "no `per`", fix=fix)
        )
        return
    known = dimensions[per].values
    for word in classes:
        if word not in known:
            line = document.line("tradeoff", "classes")
            fill = {"found": word, "expected": one_of(known), "name": per}
            fill["fix"] = did_you_mean(word, known)
            problems.append(problem("unknown-condition-word", document.name, line, **fill))
