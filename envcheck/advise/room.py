"""The reverse questions: how far a number may move the wrong way before a line is over its limit.

Every bound is solved by the prescribed method, up to the limit by the code's rounding, like a
remedy; a bound that another path makes meaningless says so.
"""

from __future__ import annotations

from collections.abc import Iterable, Sequence

from envcheck.advise.bench import Bench, lines_of
from envcheck.advise.levers import Lever, levers, turned
from envcheck.advise.targets import (
    SHY,
    NoValue,
    Target,
    has_target,
    labels_in_tables,
    met,
    short_of,
    targets_of,
)
from envcheck.model.advised import Edit
from envcheck.model.judged import Line
from envcheck.model.project import Assembly
from envcheck.model.solved import Parallel, Solved
from envcheck.model.sure import Bound, Room, Stuck
from envcheck.solve.why import flows

A_LITTLE = 0.01
"""Share beyond a bound at which it is seen whether another path carries the line."""
ENDLESS = {
    "thickness": 1e3, "taper": 1e3, "label": 1e6, "resistance": 1e6, "conductivity": 1e-7,
}  # fmt: skip
"""Where the value no longer depends on the insulation: m of thickness, m2 K/W, W/(m K)."""
FARTHEST = {"thickness": 1e-6, "taper": 1e-6, "label": 1e-6, "resistance": 1e-6}
"""Next to nothing, m and m2 K/W; a taper keeps its rise."""
AT_MOST = {"u_factor": 10.0, "linear_transmittance": 10.0, "point_transmittance": 10.0}
"""W/(m2 K), W/(m K), W/K; more than any product or bridge has."""
ADDED = "fasteners, points and lines"
TIMES = 1000.0
"""What a number of fasteners and a conductivity may be multiplied by in search of a bound."""


def rooms(bench: Bench, lines: Sequence[Line], wanted: Sequence[str] = ()) -> tuple[Room, ...]:
    """The room of every assembly that a deciding line with a verdict uses.

    wanted: tags and assemblies; all where nothing is.
    """
    by_assembly: dict[str, list[Line]] = {}
    for line in lines_of(bench.project, lines, wanted):
        if line.decides and line.verdict in ("pass", "fail", "too_close"):
            name = bench.project.elements[line.element].assembly
            by_assembly.setdefault(name, []).append(line)
    return tuple(
        _room(bench, bench.project.assemblies[name], own) for name, own in by_assembly.items()
    )


def _room(bench: Bench, assembly: Assembly, lines: Sequence[Line]) -> Room:
    skipped = dict.fromkeys(
        (line.element, line.metric, why) for line in lines if (why := _no_bound(line))
    )
    within = [line for line in lines if line.verdict == "pass" and not _no_bound(line)]
    targets = targets_of(bench, within, by_rounding=True)
    bounds: list[Bound] = []
    if targets:
        for lever in (*levers(assembly, bench.project.materials), *turned(assembly)):
            found = _bound(bench, lever, targets, within)
            if found is not None:
                bounds.append(found)
        bounds += _of_elements(bench, assembly, targets)
    over = targets_of(bench, [x for x in lines if x.verdict != "pass"], by_rounding=True)
    return Room(
        assembly.id, tuple(within), tuple(bounds), tuple(skipped),
        tuple(_stuck(bench, assembly, over)),
    )  # fmt: skip


def _no_bound(line: Line) -> str:
    """Why a line within its limit has no bound; empty where it has one, or is not within."""
    own = line.own or line.comparison
    if line.verdict != "pass":
        return ""
    if own is None:
        return "carried by the R-value path"
    if not has_target(line):
        return "a stated figure, which may go up to the limit itself"
    if line.group:
        return "the mean or sum that it stands in gives the verdict"
    return "" if own.within else "carried by another path"


# --------------------------------------------------------------------------------------- bounds


def _bound(
    bench: Bench, lever: Lever, targets: Sequence[Target], lines: Sequence[Line]
) -> Bound | None:
    """How far one lever may go; None where the method gives no value for another number."""
    far = _far(lever)
    found: list[tuple[float, str, Target]] = []
    for target in targets:
        short = short_of(bench, lever, target)
        try:
            if short(lever.now) > 0.0:
                return None
            if short(far) <= 0.0:
                found.append((far, "any", target))
                continue
            x = met(short, lever, far, target)
            found.append((x, "bound", target))
        except NoValue:
            return _last_row(bench, lever, targets)
    most, state, target = (max if lever.more else min)(found, key=lambda each: each[0])
    if state == "bound" and _other_path(bench, lever, most, lines):
        state = "other_path"
    tag, edits = target.line.element, lever.edits(most) if lever.paths else ()
    return Bound(
        lever.kind, lever.what, lever.now, most, lever.quantity, not lever.more, state, tag, edits
    )


def _far(lever: Lever) -> float:
    """The farthest value of a lever in the wrong direction."""
    if lever.kind == "share":
        return 1.0 - 1e-6
    if lever.kind == "spacing":
        return lever.now / 4.0
    if lever.quantity in AT_MOST:
        return max(AT_MOST[lever.quantity], 2.0 * lever.now)
    if lever.more:
        return FARTHEST[lever.kind]
    return TIMES * lever.now if lever.kind == "density" else 10.0 * lever.now


def _other_path(bench: Bench, lever: Lever, most: float, lines: Iterable[Line]) -> bool:
    """Whether the R-value path still carries every line a little beyond the bound."""
    if not _by_labels(lines):
        return False
    beyond = most * (1.0 + (-A_LITTLE if lever.more else A_LITTLE))
    wanted = {(x.ruleset, x.element, x.metric) for x in lines}
    after = bench.judged(lever.applied(beyond))
    own = [x.verdict for x in after if (x.ruleset, x.element, x.metric) in wanted]
    return all(verdict == "pass" for verdict in own)


def _by_labels(lines: Iterable[Line]) -> bool:
    """Whether a line passes by the R-value path too."""
    return any(x.path == "insulation" and x.state == "pass" for line in lines for x in line.paths)


def _last_row(bench: Bench, lever: Lever, targets: Sequence[Target]) -> Bound | None:
    """Of a method by table the least label whose row still passes."""
    if lever.kind != "label":
        return None
    for label in labels_in_tables(bench, targets):
        if label > lever.now * (1.0 + SHY):
            break
        values = [bench.value(target.line, lever.applied(label)) for target in targets]
        if all(v is not None and v <= t.value for v, t in zip(values, targets, strict=True)):
            return Bound(
                lever.kind, lever.what, lever.now, label, lever.quantity, False, "table",
                targets[0].line.element, lever.edits(label),
            )  # fmt: skip
    return None


def allowed(value: float, now: float, target: float, amount: float) -> float:
    """Largest transmittance of a bridge: psi = psi_now + (U_target - U) A / l.

    value, target: U, W/(m2 K). now: psi or chi, W/(m K) or W/K. amount: length or number on 1 m2
    of the element, 1/m or 1/m2. Any shape.
    Source: U = U_clear + sum(psi l + chi n) / A, ISO 14683:2017 and ISO 10211:2017, solved for psi.
    """
    return now + (target - value) / amount


def _of_elements(bench: Bench, assembly: Assembly, targets: Iterable[Target]) -> list[Bound]:
    """Bridges that an element states itself, each alone."""
    found = []
    for target in targets:
        element = bench.project.elements[target.line.element]
        value = bench.value(target.line, assembly)
        for place, bridge in enumerate(element.bridges):
            area = 1.0 if bridge.per_area else element.net_area
            if bridge.detail is not None or bridge.drawn is not None or not area or not value:
                continue
            amount = bridge.amount / area
            most = allowed(value, bridge.value, target.value, amount) if amount else bridge.value
            kind = "chi" if bridge.kind == "point" else "psi"
            quantity = "point_transmittance" if kind == "chi" else "linear_transmittance"
            state = "other_path" if _by_labels([target.line]) else "bound"
            edit = Edit(("elements", element.tag, "bridges", place, kind), most, quantity, False)
            found.append(
                Bound(kind, bridge.title, bridge.value, most, quantity, True, state,
                      element.tag, (edit,))
            )  # fmt: skip
    return found


# ------------------------------------------------------------------------- what cannot be cured


def _stuck(bench: Bench, assembly: Assembly, targets: Iterable[Target]) -> list[Stuck]:
    """Layers whose insulation alone cannot bring a line within, whatever its thickness."""
    own = levers(assembly, bench.project.materials)
    thick = {lever.material for lever in own if lever.kind in ("thickness", "taper")}
    found = []
    for target in targets:
        for lever in own:
            again = lever.kind == "conductivity" and lever.material in thick
            if lever.kind not in ENDLESS or again:
                continue
            solved = bench.solved(target.line, lever.applied(ENDLESS[lever.kind]))
            value = solved.high if solved.decided_by_bracket else solved.value
            if value is None or value <= target.value:
                continue
            holds, share = _holds(solved, value)
            tag = target.line.element
            found.append(Stuck(lever.kind, lever.what, tag, value, target.value, holds, share))
    return found


def _holds(solved: Solved, value: float) -> tuple[str, float]:
    """The path, or what is added to all of them, through which the most heat flows."""
    added = solved.added / value
    through = {ADDED: added}
    tree = solved.tree
    found = list(flows(tree))
    if isinstance(tree, Parallel):  # what follows lies within a branch
        found = found[: len(tree.branches)]
    for flow in found:
        through[flow.piece] = max(through.get(flow.piece, 0.0), (1.0 - added) * flow.heat)
    name = max(through, key=lambda each: through[each])
    return (name, through[name]) if through[name] > 0.0 else ("", 0.0)
