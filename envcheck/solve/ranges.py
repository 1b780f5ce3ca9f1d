"""What stated ranges make of a value: both ends solved, each by the prescribed method.

U never falls where a conductivity rises and never rises where a resistance does: of a network by
Rayleigh's monotonicity law, of a section since U is the least energy, which every conductivity
can only raise. Both ends together therefore enclose U for every choice within the ranges. The
same holds for the thickness of a layer in a one-dimensional wiring; in a section a thicker layer
may also spread heat along it, so there its ends are solved and nothing is proven between them.
"""

from __future__ import annotations

from collections.abc import Callable, Iterator
from typing import Any

from envcheck.model.layers import ContactLayer, Material, MaterialLayer, ResistanceLayer
from envcheck.model.project import Assembly
from envcheck.model.solved import RangedInput, RangedValue, Solved

LEAST, MOST = 0, 1
"""End with the least heat flow, and with the most."""


def with_range(assembly: Assembly, solved: Solved, again: Callable[[Assembly], Solved]) -> Solved:
    """Add the interval that follows from the stated ranges of an assembly; as it is without any.

    again: solves the assembly with other numbers as ``solved`` was solved. A value at an end that
    is missing makes the whole undecided.
    """
    inputs = tuple(dict.fromkeys(stated(assembly)))
    if not inputs or solved.value is None:
        return solved
    ends = []
    for end, words in ((LEAST, "least"), (MOST, "most")):
        found = again(at_end(assembly, end))
        value = found.value if end == MOST else _low(found)
        if value is None:
            why = f"a value at the end of the stated ranges with the {words} heat flow: "
            return solved._replace(value=None, missing=(why + "; ".join(found.missing),))
        ends.append(value)
    low, high = min(ends), max(ends)
    proven = not (solved.decided_by_bracket and any(i.quantity == "length" for i in inputs))
    return solved._replace(ranged=RangedValue(low, high, inputs, proven))


def _low(found: Solved) -> float | None:
    """The low bound of a value: of a bracket that decides, and of bridges from drawn details."""
    if found.decided_by_bracket:
        return found.low
    return None if found.value is None else found.value - found.unsure


def stated(part: Any) -> Iterator[RangedInput]:
    """Every range that an assembly or a part of it states, outside first."""
    if isinstance(part, Material):
        if part.span is not None:
            yield RangedInput("conductivity", part.title, *part.span)
        return
    if isinstance(part, MaterialLayer) and part.span is not None:
        yield RangedInput("length", part.title, *part.span)
    if isinstance(part, ResistanceLayer | ContactLayer) and part.span is not None:
        yield RangedInput("resistance", part.title, *part.span)
    if isinstance(part, tuple):
        for inner in part:
            yield from stated(inner)


def at_end(part: Any, end: int) -> Any:
    """The same assembly, or part of one, with every range at one end."""
    if isinstance(part, Material):
        return part if part.span is None else part._replace(conductivity=part.span[end], span=None)
    if not isinstance(part, tuple):
        return part
    inner = [at_end(one, end) for one in part]
    made: Any = type(part)(*inner) if hasattr(part, "_fields") else tuple(inner)
    if isinstance(part, MaterialLayer) and part.span is not None:
        return made._replace(thickness=part.span[MOST - end], span=None)
    if isinstance(part, ResistanceLayer | ContactLayer) and part.span is not None:
        return made._replace(resistance=part.span[MOST - end], span=None)
    return made
