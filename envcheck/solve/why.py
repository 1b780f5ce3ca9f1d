"""Why a value is what it is: heat by path, resistance by layer, and what U hangs on.

One sweep backwards through the worksheet gives the exact derivative of the value by every number
that enters it, whatever the method; nothing is changed and solved again.
"""

from __future__ import annotations

from collections.abc import Iterator, Mapping, Sequence

from envcheck.formulas import compiled, slopes
from envcheck.model.solved import (
    Flow,
    Influence,
    Node,
    Operand,
    Parallel,
    Reasons,
    Series,
    Solved,
    Step,
    Weight,
)

Found = dict[tuple[str, str, str], Influence]
"""Influences by layer, title and quantity."""
COUNTED = frozenset(
    {
        "conductivity",
        "resistance",
        "length",
        "u_factor",
        "linear_transmittance",
        "point_transmittance",
    }
)
"""Quantities whose influence is told; shares, factors, areas and temperatures are left out."""


def reasons(solved: Solved) -> Reasons | None:
    """Why the value by the prescribed method is what it is; None without a worksheet of it."""
    if solved.value is None or solved.decided_by_bracket:
        return None
    last = next(
        (
            n
            for n in reversed(range(len(solved.steps)))
            if _same(solved.steps[n].value, solved.value)
        ),
        None,
    )
    if last is None or solved.value == 0:
        return None
    steps = solved.steps[: last + 1]
    layers = len(solved.steps) - len(solved.hand_check)
    adjoint, leaves = sweep(steps)
    return Reasons(
        tuple(flows(solved.tree)),
        _weights(steps, layers, adjoint),
        _influences(steps[:layers], leaves),
    )


def sweep(
    steps: Sequence[Step],
) -> tuple[dict[str, float], list[tuple[Step, Operand | None, float]]]:
    """Derivatives of the last step by every step before it, and by every number put in.

    Returns d ln(last) / d ln(step) by symbol, and (step, operand, d ln(last) / d ln(operand)) for
    every operand that no earlier step gave; a step without a formula stands with None for its
    operand. Errors: ValueError, ArithmeticError where a step holds no formula.
    Source: chain rule, from the last step to the first (reverse accumulation).
    """
    value = steps[-1].value
    slope_of = {steps[-1].symbol: 1.0}
    leaves: list[tuple[Step, Operand | None, float]] = []
    for index in reversed(range(len(steps))):
        step = steps[index]
        slope = slope_of.get(step.symbol, 0.0)
        if slope == 0.0:
            continue
        if not step.expression:
            leaves.append((step, None, slope * step.value / value))
            continue
        given = {earlier.symbol: earlier.value for earlier in steps[:index]}
        for operand, partial in _partials(step):
            source = _giver(operand, given)
            if source:
                slope_of[source] = slope_of.get(source, 0.0) + slope * partial
            else:
                leaves.append((step, operand, slope * partial * operand.value / value))
    values = {step.symbol: step.value for step in steps}
    relative = {symbol: slope * values[symbol] / value for symbol, slope in slope_of.items()}
    return relative, leaves[::-1]


def _partials(step: Step) -> Iterator[tuple[Operand, float]]:
    by_name = {operand.name: operand for operand in step.operands}
    names = compiled(step.expression).names
    _, found = slopes(step.expression)([by_name[name].value for name in names])
    for place, partial in found.items():
        yield by_name[names[place]], partial


def _giver(operand: Operand, given: Mapping[str, float]) -> str:
    """Symbol of the earlier step that gave an operand: of its name, else of its very value."""
    if operand.name not in given:
        return ""
    if _same(given[operand.name], operand.value):
        return operand.name
    return next((symbol for symbol, value in given.items() if value == operand.value), "")


def _same(one: float, other: float) -> bool:
    return abs(one - other) <= 1e-9 * abs(other)


def flows(tree: Node | None) -> Iterator[Flow]:
    """Shares of area and heat wherever a network has branches."""
    if isinstance(tree, Parallel):
        for share, branch in zip(tree.shares, tree.branches, strict=True):
            if branch.value:
                heat = share / branch.value * tree.value
                yield Flow(tree.title, branch.title, share, heat, branch.value)
        for branch in tree.branches:
            yield from flows(branch)
    elif isinstance(tree, Series):
        for part in tree.parts:
            yield from flows(part)


def layer_of(symbol: str) -> str:
    """The layer's symbol in that of a piece: ``R3`` of ``R3_fill``."""
    return symbol.partition("_")[0]


def _weights(
    steps: Sequence[Step], layers: int, adjoint: Mapping[str, float]
) -> tuple[Weight, ...]:
    """Of every resistance that the wiring takes up, the pieces of a layer together."""
    later = {operand.name for step in steps[layers:] for operand in step.operands}
    symbols = {step.symbol for step in steps}
    found: dict[str, Weight] = {}
    for number, step in enumerate(steps):
        if step.quantity != "resistance":
            continue
        symbol = step.symbol
        if number < layers:
            symbol = layer_of(symbol)
            taken_up = step.symbol in later or step.value == 0
        else:  # what a method adds to the layers, such as the rest of a taper
            taken_up = not any(operand.name in symbols for operand in step.operands)
        if taken_up:
            known = found.get(symbol, Weight(symbol, step.title, 0.0))
            share = known.share - adjoint.get(step.symbol, 0.0)
            found[symbol] = known._replace(share=share)
    return tuple(found.values())


def _influences(
    layer_steps: Sequence[Step], leaves: Sequence[tuple[Step, Operand | None, float]]
) -> tuple[Influence, ...]:
    """Numbers put in, those that stand for the same thing together.

    A conductivity counts once for each material of a layer, and all lengths in the steps of a
    layer are its thickness: they grow together. Numbers that enter behind the layers stand under
    their own name.
    """
    of_layers = {step.symbol for step in layer_steps}
    found: Found = {}
    for step, operand, elasticity in leaves:
        quantity = step.quantity if operand is None else operand.quantity
        if quantity not in COUNTED:
            continue
        value = step.value if operand is None else operand.value
        symbol, title = layer_of(step.symbol), step.title
        if operand is not None and step.symbol not in of_layers:
            symbol, title = operand.name, _first_title(found, operand, step)
        elif quantity == "length" and operand is not None:
            title = ""
        add(found, Influence(symbol, title, quantity, value, elasticity))
    return tuple(found.values())


def _first_title(found: Found, operand: Operand, step: Step) -> str:
    """Title of the step where a number of that name and value enters first."""
    number = (operand.name, operand.quantity, operand.value)
    for known in found.values():
        if (known.symbol, known.quantity, known.value) == number:
            return known.title
    return step.title


def add(found: Found, new: Influence) -> None:
    """Add the influence of a number to what stands for the same thing already."""
    key = (new.symbol, new.title, new.quantity)
    known = found.get(key)
    if known is not None:
        value = known.value if known.value == new.value else None
        new = new._replace(value=value, elasticity=known.elasticity + new.elasticity)
    found[key] = new
