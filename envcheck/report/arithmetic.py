"""A formula with named operands, evaluated the way a pocket calculator would.

Only numbers, ``+ - * / **``, parentheses and a few functions of numbers are known; anything else
is refused, and nothing of a formula is ever run as Python code.
"""

from __future__ import annotations

import ast
import math
import operator
import re
from collections.abc import Callable, Mapping
from functools import lru_cache

Evaluate = Callable[[Mapping[str, float]], float]
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
_OPERAND = re.compile(r"\{([^{}]+)\}")


def fill(expression: str, values: Mapping[str, str]) -> str:
    """Write the formula with its operands' printed values in place of their names.

    A negative value gets parentheses, so that the written formula means the same.
    """

    def put(match: re.Match[str]) -> str:
        text = values[match[1]]
        return f"({text})" if text.startswith("-") else text

    return _OPERAND.sub(put, expression)


def named(expression: str) -> str:
    """Write the formula with plain operand names."""
    return expression.replace("{", "").replace("}", "")


@lru_cache(maxsize=4096)
def compiled(expression: str) -> Evaluate:
    """Turn a formula with operands in braces into a function of their values.

    Errors: ValueError for anything that is no formula; the function raises ArithmeticError or
    ValueError where the numbers have no result.
    """
    names: list[str] = []

    def number(match: re.Match[str]) -> str:
        names.append(match[1])
        return f" operand_{len(names) - 1} "

    try:
        tree = ast.parse(_OPERAND.sub(number, expression).strip(), mode="eval").body
    except SyntaxError as error:
        raise ValueError(f"no formula: {expression!r}") from error
    return _node(tree, names)


def evaluate(expression: str, values: Mapping[str, float]) -> float:
    """Evaluate a formula; ``values`` by the operand names in braces."""
    return compiled(expression)(values)


def _node(node: ast.expr, names: list[str]) -> Evaluate:
    match node:
        case ast.Constant(value=int() | float() as constant) if not isinstance(constant, bool):
            fixed = float(constant)
            return lambda values: fixed
        case ast.Name(id=name) if name.startswith("operand_"):
            key = names[int(name.removeprefix("operand_"))]
            return lambda values: values[key]
        case ast.BinOp(op=ast.Add()):
            return _sum([_node(term, names) for term in _terms(node)])
        case ast.BinOp(left=left, op=op, right=right) if type(op) in _BINARY:
            first, second, apply = _node(left, names), _node(right, names), _BINARY[type(op)]
            return lambda values: apply(first(values), second(values))
        case ast.UnaryOp(op=ast.USub(), operand=operand):
            inner = _node(operand, names)
            return lambda values: -inner(values)
        case ast.Call(func=ast.Name(id=name), args=args, keywords=[]) if name in _FUNCTIONS:
            function, inputs = _FUNCTIONS[name], [_node(arg, names) for arg in args]
            return lambda values: function(*(each(values) for each in inputs))
    raise ValueError(f"not allowed in a formula: {ast.unparse(node)!r}")


def _terms(node: ast.expr) -> list[ast.expr]:
    """The terms of a chain of additions, first term first."""
    terms: list[ast.expr] = []
    while isinstance(node, ast.BinOp) and isinstance(node.op, ast.Add):
        terms.append(node.right)
        node = node.left
    return [node, *reversed(terms)]


def _sum(terms: list[Evaluate]) -> Evaluate:
    return lambda values: sum(term(values) for term in terms)
