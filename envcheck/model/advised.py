"""What would settle a line: changes of an assembly with what each promises, all numbers SI."""

from typing import NamedTuple

from envcheck.model.judged import Line

Path = tuple[str | int, ...]
"""Where a value stands in the project file: ``("assemblies", "W3", "layers", 1, "thickness")``."""


class Edit(NamedTuple):
    """One value of the project file to be changed."""

    path: Path
    value: float
    quantity: str
    up: bool
    """Rounded up where it is typed, else down: the change must not fall short."""


class Change(NamedTuple):
    """One change of an assembly that brings its lines within their limits."""

    lever: str
    """``thickness``, ``taper``, ``conductivity``, ``label``, ``resistance``, ``share``,
    ``product``, ``glass``"""
    what: str
    """Title of the layer or product."""
    before: float
    after: float
    quantity: str
    resistance: float | None
    """Of the layer after the change, m2 K/W, where it has one."""
    basis: str
    """``limit`` (to the printed number), ``rounding`` (by the code's rounding), ``stock``,
    ``table`` (the next label for which the rule set prints a figure)."""
    value: float
    """U, C or F of the assembly after it, SI; of several lines the worst."""
    edits: tuple[Edit, ...]
    verdicts: tuple[tuple[str, str, str], ...]
    """(rule set, tag, verdict) of every line of the assembly after it."""
    breaks: tuple[str, ...] = ()
    """What it makes worse, in words."""
    cost: float | None = None
    """Beyond the drawn size, of all elements that use the assembly, in the project's currency."""


class Refused(NamedTuple):
    """A lever that cannot do it, and why."""

    lever: str
    what: str
    why: str
    """``not enough`` (at its farthest the lines are still over), ``no value`` (of the method),
    ``stated`` (the line is on a figure that the product states)."""
    best: float | None
    """Value of the assembly with the lever at its farthest, SI."""


class Structural(NamedTuple):
    """Up to where a structural choice would do, thermally: never a proposal."""

    lever: str
    """``spacing``, ``density``, ``psi``, ``chi``"""
    what: str
    now: float
    most: float
    quantity: str


class Advice(NamedTuple):
    """Everything for one assembly whose lines are over their limit or too close."""

    assembly: str
    lines: tuple[Line, ...]
    dominant: tuple[tuple[str, float], ...]
    """Layers by their share of the resistance, the largest first."""
    changes: tuple[Change, ...]
    refused: tuple[Refused, ...]
    structural: tuple[Structural, ...]
    added: float | None
    """Resistance of insulation that nothing crosses, added to what is drawn, that would do it,
    m2 K/W; None where it has no layers."""
