"""Windows and doors from their parts: glass, panels, frame and edges (ISO 10077-1)."""

from __future__ import annotations

from typing import NamedTuple

from envcheck.model.project import Assembly, Window
from envcheck.model.ruleset import Conventions
from envcheck.model.solved import Operand, Setting, Step
from envcheck.model.windows import Light
from envcheck.solve.lights import between_steps, light_u, series_step
from envcheck.solve.registry import Context, Decision, Method, NotDecided

SOURCE = "ISO 10077-1:2017, equation 1"


class Geometry(NamedTuple):
    """Parts of a window with one pane of glass and a frame of one width all round."""

    area_glass: float
    """m2"""
    area_frame: float
    """m2"""
    edge_length: float
    """Visible perimeter of the glass, m."""


class Part(NamedTuple):
    """An area with its U-factor, or a length with its psi, and the steps that lead to both."""

    amount: Operand
    value: Operand
    measured: tuple[Step, ...] = ()
    """Steps to the amount."""
    found: tuple[Step, ...] = ()
    """Steps to the value."""
    assumptions: tuple[str, ...] = ()


class Weighed(NamedTuple):
    """One window: the steps to its parts' values, then those of the weighting, closing last."""

    found: tuple[Step, ...]
    steps: tuple[Step, ...]
    assumptions: tuple[str, ...]

    @property
    def closing(self) -> Operand:
        """The U-factor of the whole."""
        last = self.steps[-1]
        return Operand(last.symbol, last.value, last.quantity)


def window_geometry(width: float, height: float, frame_width: float) -> Geometry:
    """Areas and glass edge of a single-light window.

    width, height: overall, m. frame_width: visible, m, any shape.
    Source: ISO 10077-1:2017, 6.3 (glazed area, frame area, perimeter of the glazing).
    """
    glass_width, glass_height = width - 2.0 * frame_width, height - 2.0 * frame_width
    glass = glass_width * glass_height
    return Geometry(glass, width * height - glass, 2.0 * (glass_width + glass_height))


def window_u(
    area_glass: float,
    u_glass: float,
    area_frame: float,
    u_frame: float,
    edge_length: float,
    psi: float,
) -> float:
    """U of a window: (Ag Ug + Af Uf + lg psi) / (Ag + Af).

    area_glass, area_frame: m2. u_glass, u_frame: W/(m2 K). edge_length: m. psi: of the edge with
    its spacer, W/(m K). Any shape. Returns W/(m2 K).
    Source: ISO 10077-1:2017, equation 1.
    """
    flow = area_glass * u_glass + area_frame * u_frame + edge_length * psi
    return flow / (area_glass + area_frame)


def solve_window(assembly: Assembly, setting: Setting, conventions: Conventions) -> Decision:
    """Solve a window or door from its overall size and its parts.

    Errors: NotDecided where parts are missing, the frame leaves no glass, or a part lies outside
    the range of its standard.
    """
    if assembly.window is None:
        raise NotDecided("size, glass, frame and edge of the window")
    return solve_parts(assembly.window, Context("R", setting, conventions), SOURCE)


def solve_parts(window: Window, context: Context, source: str) -> Decision:
    """Solve a window, or two of them in series, by area and length weighting."""
    outer = weigh(window, context, source, *("U", "") if window.inner is None else ("U_outer", "o"))
    if window.inner is None or window.between is None:
        steps = (*outer.found, *outer.steps)
        said, before = outer.assumptions, len(outer.found)
        return Decision(steps[-1].value, None, steps, before, assumptions=said)
    inner = weigh(window.inner, context, source, "U_inner", "i")
    space, assumptions = between_steps(window.between, "b")
    between = Operand(space[-1].symbol, space[-1].value, "resistance")
    title = "U-factor of two windows in series"
    closing = series_step("U", title, outer.closing, inner.closing, between)
    found = (*outer.found, *inner.found, *space)
    said = tuple(dict.fromkeys((*outer.assumptions, *inner.assumptions, *assumptions)))
    steps = (*found, *outer.steps, *inner.steps, closing)
    return Decision(closing.value, None, steps, len(found), assumptions=said)


def weigh(window: Window, context: Context, source: str, symbol: str, tag: str) -> Weighed:
    """Weigh the parts of one window by area and length.

    symbol: of the result. tag: behind the symbols of its parts, so that two windows differ.
    """
    if window.frame_width is not None:
        areas, lines = _single_light(window, window.frame_width, context, tag)
    else:
        areas, lines = _own_sizes(window, context, tag)
    whole = sum(part.amount.value for part in areas)
    parts = (*areas, *lines)
    value = sum(part.amount.value * part.value.value for part in parts) / whole
    above = " + ".join(f"{{{p.amount.name}}} * {{{p.value.name}}}" for p in parts)
    below = " + ".join(f"{{{part.amount.name}}}" for part in areas)
    stated = "; ".join(window.sources)
    closing = Step(
        symbol,
        "U-factor of the window" if not tag else f"U-factor of the {symbol[2:]} window",
        f"({above}) / ({below})",
        tuple(operand for part in parts for operand in (part.amount, part.value)),
        value,
        "u_factor",
        f"{source}; {stated}" if stated else source,
    )
    said = dict.fromkeys(words for part in parts for words in part.assumptions)
    return Weighed(
        tuple(step for part in parts for step in part.found),
        (*(step for part in parts for step in part.measured), closing),
        tuple(said),
    )


def _single_light(
    window: Window, frame_width: float, context: Context, tag: str
) -> tuple[list[Part], list[Part]]:
    """One light within a frame of one width all round."""
    if 2.0 * frame_width >= min(window.width, window.height):
        raise NotDecided("a frame width that leaves glass within the window's overall size")
    geometry = window_geometry(window.width, window.height, frame_width)
    (light,), (frame_part,) = window.lights, window.frames
    letter = "p" if light.opaque else "g"
    width, height = Operand("w", window.width, "run"), Operand("h", window.height, "run")
    size = (width, height, Operand("b" + tag, frame_width, "run"))
    glass = Operand(f"A_{letter}{tag}", geometry.area_glass, "area")
    frame = Operand(f"A_f{tag}", geometry.area_frame, "area")
    edge = Operand(f"l_{letter}{tag}", geometry.edge_length, "run")
    inner = f"({{w}} - 2 * {{b{tag}}})", f"({{h}} - 2 * {{b{tag}}})"
    what = "panel" if light.opaque else "glass"
    areas = (
        Step(glass.name, f"area of the {what}", " * ".join(inner), size, glass.value, "area"),
        Step(
            frame.name, "area of the frame", f"{{w}} * {{h}} - {{{glass.name}}}",
            (width, height, glass), frame.value, "area",
        ),
        Step(
            edge.name, f"edge of the {what}",
            f"2 * ({{w}} - 2 * {{b{tag}}} + {{h}} - 2 * {{b{tag}}})", size, edge.value, "run",
        ),
    )  # fmt: skip
    value, steps, said = light_u(light, context, letter + tag)
    psi = Operand(f"psi_{tag}" if tag else "psi", light.psi, "linear_transmittance")
    return (
        [
            Part(glass, value, areas, steps, said),
            Part(frame, Operand(f"U_f{tag}", frame_part.u, "u_factor")),
        ],
        [Part(edge, psi), *_joints(window, tag)],
    )


def _own_sizes(window: Window, context: Context, tag: str) -> tuple[list[Part], list[Part]]:
    """Lights that state their own size; frames that state theirs, or take the rest."""
    areas: list[Part] = []
    lines: list[Part] = []
    for number, light in enumerate(window.lights, 1):
        mark = f"{'p' if light.opaque else 'g'}{tag}{number}"
        value, steps, said = light_u(light, context, mark)
        area, edge = _amounts(light, mark)
        amount = Operand(area.symbol, area.value, "area")
        areas.append(Part(amount, value, (area,), steps, said))
        psi = Operand(f"psi_{mark}", light.psi, "linear_transmittance")
        lines.append(Part(Operand(edge.symbol, edge.value, "run"), psi, (edge,)))
    filled = tuple(part.amount for part in areas)
    stated = tuple(
        Operand(f"A_f{tag}{number}", frame.area, "area")
        for number, frame in enumerate(window.frames, 1)
        if frame.area is not None
    )
    for number, frame in enumerate(window.frames, 1):
        mark = f"f{tag}{number}"
        u_frame = Operand(f"U_{mark}", frame.u, "u_factor")
        if frame.area is not None:
            areas.append(Part(Operand(f"A_{mark}", frame.area, "area"), u_frame))
            continue
        taken = (*filled, *stated)
        rest = window.width * window.height - sum(operand.value for operand in taken)
        form = "{w} * {h}" + "".join(f" - {{{operand.name}}}" for operand in taken)
        size = (Operand("w", window.width, "run"), Operand("h", window.height, "run"))
        title = f"area of {frame.title}, all that is left"
        step = Step(f"A_{mark}", title, form, (*size, *taken), rest, "area")
        areas.append(Part(Operand(f"A_{mark}", rest, "area"), u_frame, (step,)))
    return areas, [*lines, *_joints(window, tag)]


def _amounts(light: Light, mark: str) -> tuple[Step, Step]:
    """Area and edge of all lights of one kind."""
    count = Operand("n_" + mark, light.count, "number")
    if light.width is not None and light.height is not None:
        size = (Operand("w_" + mark, light.width, "run"), Operand("h_" + mark, light.height, "run"))
        area = f"{{n_{mark}}} * {{w_{mark}}} * {{h_{mark}}}"
        edge = f"{{n_{mark}}} * 2 * ({{w_{mark}}} + {{h_{mark}}})"
        of_area: tuple[Operand, ...] = (count, *size)
        of_edge = of_area
    else:
        area, edge = f"{{n_{mark}}} * {{a_{mark}}}", f"{{n_{mark}}} * {{e_{mark}}}"
        of_area = (count, Operand("a_" + mark, light.area, "area"))
        of_edge = (count, Operand("e_" + mark, light.edge, "run"))
    return (
        Step(
            "A_" + mark, f"area of {light.title}", area, of_area, light.count * light.area, "area"
        ),
        Step("l_" + mark, f"edge of {light.title}", edge, of_edge, light.count * light.edge, "run"),
    )


def _joints(window: Window, tag: str) -> list[Part]:
    return [
        Part(
            Operand(f"l_j{tag}{number}", joint.length, "run"),
            Operand(f"psi_j{tag}{number}", joint.psi, "linear_transmittance"),
        )
        for number, joint in enumerate(window.joints, 1)
    ]


METHODS = (
    Method(
        name="iso10077_window",
        title="Window or door from glass, panels, frame and edges; two windows in series",
        formula="U = (sum of Ag Ug + Ap Up + Af Uf + l psi) / (sum of Ag + Ap + Af);  in series "
        "1/U = 1/U1 - Rsi + Rs - Rse + 1/U2",
        source=SOURCE,
        valid="vertical windows and pedestrian doors; glass, panel, frame and edge values of the "
        "product; two in series only where neither has gaps wider than 3 mm",
        solves=(("window", solve_window),),
        metric="U_product",
    ),
)
