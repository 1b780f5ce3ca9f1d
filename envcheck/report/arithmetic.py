"""A formula with named operands, evaluated the way a pocket calculator would.

Only numbers, ``+ - * / **``, parentheses and a few functions of numbers are known; anything else
is refused, and nothing of a formula is ever run as Python code.
"""

from __future__ import annotations

import ast
import math
import operator
import re
from collections.abc import Callable, Mapping, Sequence
from functools import lru_cache
from operator import itemgetter
from typing import NamedTuple

Evaluate = Callable[[Sequence[float]], float]
_BINARY: dict[type[ast.operator], Callable[[float, float], float]] = {
    ast.Add: operator.add,
    ast.Sub: operator.sub,
    ast.Mult: operator.mul,
    ast.Div: operator.truediv,
    ast.Pow: operator.pow,
}
_FUNCTIONS: dict[str, Callable[..., float]] = {
    "ln": math.log,
    "exp": math.exp,
    "sqrt": math.sqrt,
    "min": min,
    "max": max,
}
_NAME = "operand_"
_OPERAND = re.compile(r"\{([^{}]+)\}")


def fill(expression: str, values: Mapping[str, str]) -> str:
    """Write the formula with its operands' printed values in place of their names."""
    formula = compiled(expression)
    return filled(formula, [values[name] for name in formula.names])


def filled(formula: Formula, texts: Sequence[str]) -> str:
    """Write the formula with a text at each place.

    A negative value gets parentheses, so that the written formula means the same.
    """
    return formula.form % tuple(f"({text})" if text[0] == "-" else text for text in texts)


def named(expression: str) -> str:
    """Write the formula with plain operand names."""
    return expression.replace("{", "").replace("}", "")


class Formula(NamedTuple):
    """A formula taken apart once, however often it is filled in."""

    names: tuple[str, ...]
    """Names of the operands as they stand, one of each place."""
    form: str
    """The formula with ``%s`` at each place of an operand."""
    evaluate: Evaluate


@lru_cache(maxsize=4096)
def compiled(expression: str) -> Formula:
    """Turn a formula with operands in braces into a function of their values, by place.

    Errors: ValueError for anything that is no formula; the function raises ArithmeticError or
    ValueError where the numbers have no result.
    """
    pieces = _OPERAND.split(expression)
    names = tuple(pieces[1::2])
    numbered = "".join(
        f" {_NAME}{place // 2} " if place % 2 else text for place, text in enumerate(pieces)
    )
    try:
        tree = ast.parse(numbered.strip(), mode="eval").body
    except SyntaxError as error:
        raise ValueError(f"no formula: {expression!r}") from error
    form = "%s".join(text.replace("%", "%%") for text in pieces[::2])
    return Formula(names, form, _node(tree))


def evaluate(expression: str, values: Mapping[str, float]) -> float:
    """Evaluate a formula; ``values`` by the operand names in braces."""
    formula = compiled(expression)
    return formula.evaluate([values[name] for name in formula.names])


def _node(node: ast.expr) -> Evaluate:
    match node:
        case ast.Constant(value=int() | float() as constant) if not isinstance(constant, bool):
            fixed = float(constant)
            return lambda values: fixed
        case ast.Name(id=name) if name.startswith(_NAME):
            return itemgetter(int(name.removeprefix(_NAME)))
        case ast.BinOp(op=ast.Add()):
            return _sum(_terms(node))
        case ast.BinOp(left=left, op=op, right=right) if type(op) in _BINARY:
            first, second, apply = _node(left), _node(right), _BINARY[type(op)]
            return lambda values: apply(first(values), second(values))
        case ast.UnaryOp(op=ast.USub(), operand=operand):
            inner = _node(operand)
            return lambda values: -inner(values)
        case ast.Call(func=ast.Name(id=name), args=args, keywords=[]) if name in _FUNCTIONS:
            function, inputs = _FUNCTIONS[name], [_node(arg) for arg in args]
            return lambda values: function(*(each(values) for each in inputs))
    raise ValueError(f"not allowed in a formula: {ast.unparse(node)!r}")


def _terms(node: ast.expr) -> list[ast.expr]:
    """The terms of a chain of additions, first term first."""
    terms: list[ast.expr] = []
    while isinstance(node, ast.BinOp) and isinstance(node.op, ast.Add):
        terms.append(node.right)
        node = node.left
    return [node, *reversed(terms)]


def _sum(terms: list[ast.expr]) -> Evaluate:
    names = [term.id for term in terms if isinstance(term, ast.Name)]
    places = [int(name.removeprefix(_NAME)) for name in names if name.startswith(_NAME)]
    if len(places) == len(terms):
        pick = itemgetter(*places)
        return lambda values: sum(pick(values))
    parts = [_node(term) for term in terms]
    return lambda values: sum(part(values) for part in parts)
