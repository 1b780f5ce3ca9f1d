"""From an assembly and its setting to the value, the bracket and the worksheet."""

from __future__ import annotations

from collections.abc import Sequence
from typing import NamedTuple

from envcheck.model.layers import DrawnPoint
from envcheck.model.project import Assembly, Bridge, FramedLayer, Layer, TaperedLayer
from envcheck.model.ruleset import Conventions
from envcheck.model.solved import Beside, Counted, Operand, Setting, Solved, Step
from envcheck.solve.cautions import cautions
from envcheck.solve.cells import stated_cell
from envcheck.solve.conventions import ventilated_at
from envcheck.solve.corrections import corrections as iso6946_corrections
from envcheck.solve.corrections import counted_from
from envcheck.solve.counted import counted_layers, drawing_assumptions
from envcheck.solve.methods.bridges import correct_for_bridges, total_step
from envcheck.solve.methods.crossed import count_crossed
from envcheck.solve.methods.fasteners import Correction
from envcheck.solve.methods.framed import is_metal
from envcheck.solve.methods.slightly_ventilated import (
    INTERPOLATED,
    Pair,
    interpolated,
    pair_of,
)
from envcheck.solve.methods.weighted import HIGHEST_RATIO, weighted
from envcheck.solve.registry import (
    Context,
    Decision,
    NotDecided,
    Wall,
    drawers,
    methods,
)
from envcheck.solve.repeat import on_one_repeat
from envcheck.solve.taper import taper
from envcheck.solve.wiring import bounds

NOT_DRAWN = "no bracket: the value comes from a table, a rating or a formula of the whole"
UNSURE = "the psi of drawn details from its low to its high bound"
TAPERED = "no bracket: a tapered layer is not drawn as rectangles"


def solve(
    assembly: Assembly,
    setting: Setting,
    conventions: Conventions,
    bridges: Sequence[Bridge] = (),
    area: float | None = None,
) -> Solved:
    """Solve one assembly by the method of its setting.

    bridges, area: linear and point bridges of one element and its area (m2), added to those of
    the assembly. What is missing is said in ``Solved.missing``; nothing is raised for it.
    """
    if assembly.kind == "layers":
        return _solve_layers(assembly, setting, conventions, (*assembly.bridges, *bridges), area)
    return _solve_whole(assembly, setting, conventions, (*assembly.bridges, *bridges), area)


def _solve_layers(
    assembly: Assembly,
    setting: Setting,
    conventions: Conventions,
    bridges: tuple[Bridge, ...],
    area: float | None,
) -> Solved:
    try:
        pair = pair_of(assembly, setting)
        wall, notes = draw(pair.closed if pair else assembly, setting, conventions)
    except NotDecided as need:
        return _missing(assembly, setting, str(need))
    decision, corrections = _decide(wall, pair)
    points = drawn_points(assembly)
    undrawn = tuple(bridge for bridge in bridges if bridge.drawn is None)
    to_bracket = (*corrections, correct_for_bridges(undrawn, area))
    added = sum(correction.value for correction in to_bracket)
    unsure = sum(correction.unsure for correction in to_bracket)
    low, high, note, beside = (
        (None, None, INTERPOLATED, ()) if pair else _bracket(wall, points, added)
    )
    if points and decision.by_bracket:
        decision, corrections = _by_box(decision, high, added, note), to_bracket
    else:
        corrections = (*corrections, correct_for_bridges(bridges, area))
    whole = sum(correction.value for correction in corrections)
    value = None if decision.value is None else decision.value + whole
    if low is not None and unsure:
        low, note = low - unsure, f"{note}; {UNSURE}"
    steps = _closed(decision, corrections)
    missing = (*decision.missing, *(m for c in corrections for m in c.missing))
    assumptions = (a for c in corrections for a in c.assumptions)
    return Solved(
        assembly=assembly.id,
        setting=setting,
        value=None if missing else value,
        clear=decision.value,
        missing=missing,
        low=low,
        high=high,
        bracket_note=note,
        decided_by_bracket=decision.by_bracket,
        ratio=high / low if low and high else None,
        beside=(*beside, *(b._replace(value=b.value + whole) for b in decision.beside)),
        tree=decision.tree,
        steps=steps,
        counted=counted_layers(wall, decision.replaced, notes.outside),
        assumptions=(*notes.assumptions, *decision.assumptions, *assumptions),
        cautions=(*cautions(assembly), *decision.cautions),
        hand_check=steps[decision.layer_steps :],
        added=added,
        unsure=unsure,
    )


def _solve_whole(
    assembly: Assembly,
    setting: Setting,
    conventions: Conventions,
    bridges: tuple[Bridge, ...],
    area: float | None,
) -> Solved:
    """Solve an assembly that one method takes as a whole: product, window, slab, ground wall."""
    method = methods().get(setting.method)
    solver = dict(method.solves).get(assembly.kind) if method else None
    if solver is None:
        return _missing(assembly, setting, setting.method_from or f"method {setting.method!r}")
    try:
        decision = solver(assembly, setting, conventions)
    except NotDecided as missing:
        return _missing(assembly, setting, str(missing))
    correction = correct_for_bridges(bridges, area)
    value = None if decision.value is None else decision.value + correction.value
    closed = _closed(decision, (correction,))
    gone = (*decision.missing, *correction.missing)
    return Solved(
        assembly=assembly.id,
        setting=setting,
        value=None if gone else value,
        clear=decision.value,
        missing=gone,
        low=None,
        high=None,
        bracket_note=NOT_DRAWN,
        decided_by_bracket=False,
        ratio=None,
        beside=decision.beside,
        tree=decision.tree,
        steps=closed,
        counted=decision.counted or tuple([Counted(None)] * len(assembly.layers)),
        assumptions=decision.assumptions,
        cautions=(*cautions(assembly), *decision.cautions),
        hand_check=closed[decision.layer_steps :],
        unsure=correction.unsure,
    )


class Notes(NamedTuple):
    """What was done to the layers before they were wired."""

    outside: int
    """How many layers lie outside a well-ventilated cavity and are no part of the wall."""
    assumptions: tuple[str, ...]


def draw(assembly: Assembly, setting: Setting, conventions: Conventions) -> tuple[Wall, Notes]:
    """Draw the layers between their films.

    Layers outside a well-ventilated air space are left out, with the outer film that the rule
    set's convention puts there. Errors: NotDecided where a layer cannot be drawn.
    """
    first, film, film_from = _outer_side(assembly, setting, conventions)
    layers = assembly.layers[first:]
    if setting.framing_share is not None:
        layers = tuple(with_share(layer, setting) for layer in layers)
    blocks = tuple(
        drawers()[layer.kind](layer, Context(f"R{number}", setting, conventions))
        for number, layer in enumerate(layers, first + 1)
    )
    wall = Wall(
        assembly,
        setting,
        conventions,
        stated_cell("Ro", "outside film", film, film_from),
        stated_cell("Ri", "inside film", setting.inside_film, setting.inside_film_from),
        on_one_repeat(blocks),
        layers,
    )
    if film + setting.inside_film == 0 and not any(r.value for b in blocks for r in b.cells[0]):
        raise NotDecided("a resistance: films and layers are stated as none at all")
    return wall, Notes(first, drawing_assumptions(wall))


def with_share(layer: Layer, setting: Setting) -> Layer:
    """Give wood framing whose share nobody states the share of the rule set."""
    if (
        isinstance(layer, FramedLayer)
        and layer.share is None
        and not layer.crosses_insulation
        and not is_metal(layer)
    ):
        return layer._replace(share=setting.framing_share, share_from=setting.framing_share_from)
    return layer


def _outer_side(
    assembly: Assembly, setting: Setting, conventions: Conventions
) -> tuple[int, float, str]:
    """First layer that counts, and the film outside of it."""
    at = ventilated_at(assembly.layers)
    if at is None:
        return 0, setting.outside_film, setting.outside_film_from
    if conventions.cladding == "iso6946":
        said = "still-air film outside a well-ventilated cavity (ISO 6946:2017, 6.9.4)"
        stated = assembly.outside_film is not None
        return at + 1, setting.cladding_film, setting.outside_film_from if stated else said
    return at + 1, setting.outside_film, setting.outside_film_from


def _decide(wall: Wall, pair: Pair | None) -> tuple[Decision, tuple[Correction, ...]]:
    """The clear field by the prescribed method, and what corrections add to it."""
    setting, conventions = wall.setting, wall.conventions
    method = methods().get(setting.method)
    if method is None or method.decides is None:
        return Decision(None, missing=(setting.method_from or f"method {setting.method!r}",)), ()
    if setting.method in setting.refused:
        words = f"another method: {setting.method_from} does not accept {method.title.lower()}"
        return Decision(None, missing=(words,)), ()
    two_dimensional = setting.method == "two_dimensional"
    outside = len(wall.assembly.layers) - len(wall.layers)
    try:
        counted, changed = (wall, {}) if two_dimensional else count_crossed(wall)
        decision = method.decides(counted)
        if pair is not None:
            opened, _ = draw(pair.opened, setting, conventions)
            decision = interpolated(pair, decision, method.decides(count_crossed(opened)[0]))
        found: tuple[Correction, ...] = ()
        if decision.value is not None:
            total = 1.0 / decision.value
            found = iso6946_corrections(wall.assembly, total, conventions, outside)
        tapered = [layer for layer in wall.layers if isinstance(layer, TaperedLayer)]
        if len(tapered) > 1:
            titles = " and ".join(repr(layer.title) for layer in tapered)
            raise NotDecided(f"one tapered layer: {titles} together have no closed formula here")
        for layer in tapered:
            decision = taper(decision, layer, conventions)
        if decision.value is not None:
            found = counted_from(found, decision.value, conventions)
    except NotDecided as missing:
        return Decision(None, missing=(str(missing),)), ()
    if changed:
        decision = decision._replace(replaced={**changed, **decision.replaced})
    return decision, found


def _closed(decision: Decision, corrections: Sequence[Correction]) -> tuple[Step, ...]:
    """The worksheet with its corrections, and the sum of both."""
    steps = tuple(step for correction in corrections for step in correction.steps)
    additions = [step for correction in corrections for step in correction.addends]
    if not additions or decision.value is None:
        return (*decision.steps, *steps)
    clear = Operand(decision.steps[-1].symbol, decision.value, "u_factor")
    return (*decision.steps, *steps, total_step("U_total", clear, additions))


def drawn_points(assembly: Assembly) -> tuple[DrawnPoint, ...]:
    """Clips and brackets that are drawn as boxes."""
    return tuple([bridge.drawn for bridge in assembly.bridges if bridge.drawn is not None])


def _by_box(decision: Decision, high: float | None, added: float, note: str) -> Decision:
    """The upper bound of the drawn box in place of that of the wall without its points."""
    if high is None:
        return Decision(None, missing=(f"the drawn box ({note})",))
    step = Step("U_high", "isothermal planes of the drawn box", "", (), high - added, "u_factor",
                note)  # fmt: skip
    return decision._replace(value=high - added, steps=(*decision.steps, step))


def _bracket(
    wall: Wall, points: Sequence[DrawnPoint], added: float
) -> tuple[float | None, float | None, str, tuple[Beside, ...]]:
    """Both wirings of the drawn pieces, corrections included, and the values beside them."""
    if any(isinstance(layer, TaperedLayer) for layer in wall.layers):
        return None, None, TAPERED, ()
    if points:
        return _box_bracket(wall, points, added)
    low, high = bounds(wall)
    if not any(block.pattern for block in wall.blocks):
        return low + added, low + added, "layers in series: both ends are one", ()
    combined = 1.0 / weighted(0.5, 1.0 / low, 1.0 / high)
    beside = (
        Beside("parallel_path", low + added, "parallel paths of the drawn pieces"),
        Beside("isothermal_planes", high + added, "isothermal planes of the drawn pieces"),
        Beside("combined", combined + added, _on_mean(high / low)),
    )
    note = "parallel paths to isothermal planes of the same drawn pieces"
    return low + added, high + added, note, beside


def _on_mean(ratio: float) -> str:
    """What stands beside the mean of both wirings; ISO 6946:2017, 6.7.2.1 limits their ratio."""
    words = "mean of both resistances (ISO 6946"
    if ratio <= HIGHEST_RATIO:
        return f"{words})"
    return f"{words}, which excludes it here: the wirings differ by a factor of {ratio:.2f})"


def _box_bracket(
    wall: Wall, points: Sequence[DrawnPoint], added: float
) -> tuple[float | None, float | None, str, tuple[Beside, ...]]:
    """Both wirings of the wall with its points drawn in. Loads numpy."""
    from envcheck.solve.box import wirings
    from envcheck.solve.field.box_drawing import box_of
    from envcheck.solve.field.drawing import NotDrawn

    try:
        low, high = wirings(box_of(wall, points))
    except NotDrawn as why:
        return None, None, f"no bracket: {why}", ()
    beside = (
        Beside("parallel_path", low + added, "parallel paths of the drawn box, points included"),
        Beside("isothermal_planes", high + added, "isothermal planes of the drawn box likewise"),
    )
    note = "parallel paths to isothermal planes of the drawn box, points included"
    return low + added, high + added, note, beside


def _missing(assembly: Assembly, setting: Setting, words: str) -> Solved:
    return Solved(
        assembly=assembly.id,
        setting=setting,
        value=None,
        clear=None,
        missing=(words,),
        low=None,
        high=None,
        bracket_note=NOT_DRAWN,
        decided_by_bracket=False,
        ratio=None,
        beside=(),
        tree=None,
        steps=(),
        counted=tuple([Counted(None)] * len(assembly.layers)),
        assumptions=(),
        cautions=cautions(assembly),
    )
