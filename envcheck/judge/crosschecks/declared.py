"""The value on the drawing against the computed one, and the slip that explains it."""

from __future__ import annotations

from collections.abc import Iterator, Sequence

from envcheck.judge.crosschecks import Check, Facts
from envcheck.judge.crosschecks.labels import is_label
from envcheck.judge.figures import disagreement
from envcheck.judge.readings import explain
from envcheck.judge.words import lines_by_assembly, percent
from envcheck.model.judged import CERTAIN, LIKELY, Finding, Line
from envcheck.model.solved import Solved


def solutions(assembly: str, facts: Facts, lines: Sequence[Line]) -> Iterator[Solved]:
    """The solutions of an assembly: the first one, then those of its lines."""
    if assembly in facts.solved:
        yield facts.solved[assembly]
    yield from (line.solved for line in lines if line.solved is not None)


def declared_differs(facts: Facts) -> Iterator[Finding]:
    """A declared value that is not the computed one."""
    lines = lines_by_assembly(facts.lines, facts.project)
    for assembly in facts.project.assemblies.values():
        declared = assembly.declared
        if declared is None:
            continue
        found = disagreement(assembly, solutions(assembly.id, facts, lines.get(assembly.id, ())))
        properties = facts.properties.get(assembly.id)
        if found is None or is_label(assembly):
            continue
        reading = explain(found, assembly, properties)
        suggests = "no way of counting the layers in the file gives the drawn value"
        if reading is not None:
            inverse = declared.quantity == "resistance"
            value = 1.0 / reading.value if inverse else reading.value
            suggests = f"{reading.words}: that gives {found.figure.show(value)}"
        sheet = declared.sheet or assembly.sheet
        yield Finding(
            "declared-differs",
            "E",
            assembly.id,
            sheet,
            f"{declared.text} on the drawing, {found.computed} computed ({percent(found.off)})",
            suggests,
            f"the computed value on {sheet or 'the drawing'}, or layers that give the drawn one",
            sure=CERTAIN if reading is None else LIKELY,
        )


CHECKS = (
    Check(
        "declared-differs",
        "Value on the drawing is not the computed value",
        declared_differs,
        CERTAIN,
    ),
)
