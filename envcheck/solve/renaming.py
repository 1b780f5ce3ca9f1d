"""Steps of a worksheet under other names, where one worksheet holds a wiring within a wiring."""

from __future__ import annotations

from collections.abc import Iterable, Mapping

from envcheck.model.solved import Step


def renamed(steps: Iterable[Step], names: Mapping[str, str]) -> tuple[Step, ...]:
    """Steps whose symbols and operands are called by new names; all others keep theirs."""
    found = []
    for step in steps:
        expression = step.expression
        operands = []
        for operand in step.operands:
            new = names.get(operand.name, operand.name)
            expression = expression.replace(f"{{{operand.name}}}", f"{{{new}}}")
            operands.append(operand._replace(name=new))
        symbol = names.get(step.symbol, step.symbol)
        found.append(step._replace(symbol=symbol, expression=expression, operands=tuple(operands)))
    return tuple(found)
