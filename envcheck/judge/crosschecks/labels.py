"""The label of the cavity insulation passed off as the resistance of the wall."""

from __future__ import annotations

from collections.abc import Iterator

from envcheck.judge.crosschecks import Check, Facts
from envcheck.judge.figures import disagreement
from envcheck.judge.words import lines_by_assembly, percent
from envcheck.model.judged import LIKELY, Finding
from envcheck.model.project import Assembly, FramedLayer

WITHIN = 0.02
"""Share by which a declared resistance may miss the label and still be it."""


def is_label(assembly: Assembly) -> FramedLayer | None:
    """The framed layer whose label is the declared resistance; None where there is none."""
    declared = assembly.declared
    if declared is None or declared.quantity not in ("resistance", "u_factor"):
        return None
    value = declared.value if declared.quantity == "resistance" else 1.0 / declared.value
    for layer in assembly.layers:
        if not isinstance(layer, FramedLayer) or layer.crosses_insulation:
            continue
        label = layer.fill.label
        if label is not None and abs(value - label) <= WITHIN * label:
            return layer
    return None


def label_as_wall(facts: Facts) -> Iterator[Finding]:
    """A declared resistance that is the label between the members, and not the computed one."""
    lines = lines_by_assembly(facts.lines, facts.project)
    for assembly in facts.project.assemblies.values():
        layer = is_label(assembly)
        if layer is None or assembly.declared is None:
            continue
        own = facts.solved.get(assembly.id)
        solved = [line.solved for line in lines.get(assembly.id, ()) if line.solved is not None]
        found = disagreement(assembly, solved if own is None else [own, *solved])
        if found is None:
            continue
        sheet = assembly.declared.sheet or assembly.sheet
        yield Finding(
            "label-as-wall",
            "E",
            assembly.id,
            sheet,
            f"{assembly.declared.text} on the drawing, {found.computed} computed "
            f"({percent(found.off)})",
            f"the drawn value is the label of the insulation in {layer.title!r}, not the value of "
            "the whole assembly with its framing",
            f"the computed value on {sheet or 'the drawing'}",
        )


CHECKS = (
    Check(
        "label-as-wall",
        "Cavity label passed off as the value of the assembly",
        label_as_wall,
        LIKELY,
    ),
)
