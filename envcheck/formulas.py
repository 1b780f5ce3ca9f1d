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
from functools import lru_cache, partial
from operator import itemgetter
from typing import NamedTuple, cast

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


Slopes = Callable[[Sequence[float]], tuple[float, dict[int, float]]]


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


def spreadsheet(expression: str, cells: Mapping[str, str]) -> str:
    """Write the formula as a spreadsheet reads it; ``cells`` gives what stands for each operand.

    Every part is set in parentheses: spreadsheets bind a leading minus closer than a power.
    """
    names = compiled(expression).names
    pieces = _OPERAND.split(expression)
    numbered = "".join(
        f" {_NAME}{place // 2} " if place % 2 else text for place, text in enumerate(pieces)
    )
    texts = [cells[name] for name in names]
    return _cell_formula(ast.parse(numbered.strip(), mode="eval").body, texts)


_SIGNS: dict[type[ast.operator], str] = {
    ast.Add: "+",
    ast.Sub: "-",
    ast.Mult: "*",
    ast.Div: "/",
    ast.Pow: "^",
}


def _cell_formula(node: ast.expr, texts: Sequence[str]) -> str:
    match node:
        case ast.Constant(value=constant):
            return repr(constant)
        case ast.Name(id=name):
            return texts[int(name.removeprefix(_NAME))]
        case ast.BinOp(left=left, op=op, right=right):
            return f"{_part(left, texts)}{_SIGNS[type(op)]}{_part(right, texts)}"
        case ast.UnaryOp(operand=operand):
            return f"-{_part(operand, texts)}"
        case ast.Call(func=ast.Name(id=name), args=args):
            return f"{name.upper()}({','.join(_cell_formula(arg, texts) for arg in args)})"
    raise ValueError(f"not allowed in a formula: {ast.unparse(node)!r}")


def _part(node: ast.expr, texts: Sequence[str]) -> str:
    text = _cell_formula(node, texts)
    return text if isinstance(node, ast.Constant | ast.Name | ast.Call) else f"({text})"


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


@lru_cache(maxsize=1024)
def slopes(expression: str) -> Slopes:
    """Turn a formula into a function of its value and its partial derivatives.

    The function takes the operands' values by place and gives the value and, by place, the
    derivative, exact but for rounding. At a kink of ``min`` and ``max`` the derivative is that
    of the first argument that is chosen. Errors: as :func:`compiled`.
    Source: sum, product, quotient, power and chain rules.
    """
    pieces = _OPERAND.split(expression)
    numbered = "".join(
        f" {_NAME}{place // 2} " if place % 2 else text for place, text in enumerate(pieces)
    )
    compiled(expression)  # refuses what is no formula
    return partial(_slope, ast.parse(numbered.strip(), mode="eval").body)


def _slope(node: ast.expr, values: Sequence[float]) -> tuple[float, dict[int, float]]:
    match node:
        case ast.Name(id=name):
            place = int(name.removeprefix(_NAME))
            return values[place], {place: 1.0}
        case ast.BinOp(left=left, op=op, right=right):
            a, b = _slope(left, values), _slope(right, values)
            value = _BINARY[type(op)](a[0], b[0])
            return value, _chained(_by_operands(op, a[0], b[0], value), (a[1], b[1]))
        case ast.UnaryOp(operand=operand):
            value, inner = _slope(operand, values)
            return -value, _chained((-1.0,), (inner,))
        case ast.Call(func=ast.Name(id=name), args=args):
            inputs = [_slope(arg, values) for arg in args]
            numbers = [number for number, _ in inputs]
            value = _FUNCTIONS[name](*numbers)
            outer = _by_arguments(name, numbers, value)
            return value, _chained(outer, [inner for _, inner in inputs])
    assert isinstance(node, ast.Constant), "compiled() knows no other node"
    return float(cast(float, node.value)), {}


def _by_operands(op: ast.operator, a: float, b: float, value: float) -> tuple[float, float]:
    match op:
        case ast.Add():
            return 1.0, 1.0
        case ast.Sub():
            return 1.0, -1.0
        case ast.Mult():
            return b, a
        case ast.Div():
            return 1.0 / b, -value / b
    return b * a ** (b - 1.0), value * math.log(a) if a > 0 else 0.0


def _by_arguments(name: str, numbers: Sequence[float], value: float) -> Sequence[float]:
    if name in ("min", "max"):
        chosen = numbers.index(value)
        return [float(place == chosen) for place in range(len(numbers))]
    if name == "exp":
        return (value,)
    return (1.0 / numbers[0] if name == "ln" else 0.5 / value,)


def _chained(outer: Sequence[float], inner: Sequence[dict[int, float]]) -> dict[int, float]:
    """Chain rule: the outer derivatives times those of each argument, added by place."""
    found: dict[int, float] = {}
    for factor, slopes_of in zip(outer, inner, strict=True):
        for place, slope in slopes_of.items():
            found[place] = found.get(place, 0.0) + factor * slope
    return found
