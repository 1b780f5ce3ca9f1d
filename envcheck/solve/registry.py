"""What a method says of itself, and the one registry of methods, filled by being in the folder."""

from __future__ import annotations

from collections.abc import Callable, Mapping
from functools import cache
from importlib import import_module
from pkgutil import iter_modules
from types import MappingProxyType
from typing import TYPE_CHECKING, NamedTuple

if TYPE_CHECKING:
    from envcheck.model.project import Assembly, Layer
    from envcheck.model.ruleset import Conventions
    from envcheck.model.solved import Beside, Block, Caution, Counted, Node, Resistor, Setting, Step


class NotDecided(Exception):
    """What a method misses, in plain words that complete "missing: ..."; never the user's typo."""


class Context(NamedTuple):
    """What a layer may ask for while it is drawn."""

    symbol: str
    """Name of the layer's resistance in the worksheet: ``R3``."""
    setting: Setting
    conventions: Conventions


class Wall(NamedTuple):
    """A layered assembly between its two films, drawn as blocks, outside first."""

    assembly: Assembly
    setting: Setting
    conventions: Conventions
    outside: Resistor
    inside: Resistor
    blocks: tuple[Block, ...]
    layers: tuple[Layer, ...]
    """The layers that the blocks were drawn from, one for one."""


class Decision(NamedTuple):
    """What a method makes of an assembly; ``value`` None where something is missing."""

    value: float | None
    """U, C or F, SI"""
    tree: Node | None = None
    steps: tuple[Step, ...] = ()
    layer_steps: int = 0
    """How many of the steps lead to single layers; the rest is the hand check."""
    missing: tuple[str, ...] = ()
    assumptions: tuple[str, ...] = ()
    beside: tuple[Beside, ...] = ()
    cautions: tuple[Caution, ...] = ()
    replaced: Mapping[int, str] = MappingProxyType({})
    """Index of a layer -> what the method counts in its place, in words."""
    by_bracket: bool = False
    counted: tuple[Counted, ...] = ()
    """What each layer counts, of an assembly that is solved as a whole; empty = not resolved."""


class Method(NamedTuple):
    """One method: what it is, where it stands, where it holds, and the function that does it."""

    name: str
    title: str
    formula: str
    source: str
    valid: str
    """Range in which the source allows it."""
    draws: tuple[tuple[str, Callable[..., Block]], ...] = ()
    """Layer kinds that it draws: (kind, function(layer, context) -> Block)."""
    decides: Callable[[Wall], Decision] | None = None
    """A way to wire a layered assembly that a rule set may prescribe."""
    solves: tuple[tuple[str, Callable[..., Decision]], ...] = ()
    """Other kinds that it solves: (kind, function(assembly, setting, conventions))."""
    metric: str = "U_assembly"
    assumed: bool = True
    """Whether it may serve where the rule set names no method; else the rule set must name it."""


@cache
def methods() -> dict[str, Method]:
    """All methods by name, in alphabetical order of their files."""
    package = import_module("envcheck.solve.methods")
    found: dict[str, Method] = {}
    for module in sorted(info.name for info in iter_modules(package.__path__)):
        for method in import_module(f"envcheck.solve.methods.{module}").METHODS:
            if method.name in found:
                raise RuntimeError(f"two methods are called {method.name!r}")
            found[method.name] = method
    return found


@cache
def drawers() -> dict[str, Callable[..., Block]]:
    """Layer kind -> the function that draws it."""
    return {kind: draw for method in methods().values() for kind, draw in method.draws}


def prescribable() -> tuple[str, ...]:
    """Names that a rule set may prescribe."""
    return tuple(name for name, m in methods().items() if m.decides is not None or m.solves)
