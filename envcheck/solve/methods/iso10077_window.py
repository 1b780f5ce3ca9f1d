"""Windows from their parts: glass, frame and the edge between them (ISO 10077-1)."""

from __future__ import annotations

from typing import NamedTuple

from envcheck.model.project import Assembly, Window
from envcheck.model.ruleset import Conventions
from envcheck.model.solved import Operand, Setting, Step
from envcheck.solve.registry import Decision, Method, NotDecided

SOURCE = "ISO 10077-1:2017, equation 1"


class Geometry(NamedTuple):
    """Parts of a window with one pane of glass and a frame of one width all round."""

    area_glass: float
    """m2"""
    area_frame: float
    """m2"""
    edge_length: float
    """Visible perimeter of the glass, m."""


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
    """Solve a window of one light from its overall size and frame width.

    Errors: NotDecided where parts are missing or the frame leaves no glass.
    """
    window = assembly.window
    if window is None:
        raise NotDecided("size, glass, frame and edge of the window")
    if 2.0 * window.frame_width >= min(window.width, window.height):
        raise NotDecided("a frame width that leaves glass within the window's overall size")
    geometry = window_geometry(window.width, window.height, window.frame_width)
    value = window_u(
        geometry.area_glass,
        window.u_glass,
        geometry.area_frame,
        window.u_frame,
        geometry.edge_length,
        window.psi,
    )
    return Decision(value, steps=_steps(window, geometry, value))


def _steps(window: Window, geometry: Geometry, value: float) -> tuple[Step, ...]:
    source = "; ".join(window.sources)
    width, height = Operand("w", window.width, "run"), Operand("h", window.height, "run")
    size = (width, height, Operand("b", window.frame_width, "run"))
    glass = Operand("A_g", geometry.area_glass, "area")
    frame = Operand("A_f", geometry.area_frame, "area")
    edge = Operand("l_g", geometry.edge_length, "run")
    parts = (
        glass, Operand("U_g", window.u_glass, "u_factor"),
        frame, Operand("U_f", window.u_frame, "u_factor"),
        edge, Operand("psi", window.psi, "linear_transmittance"),
    )  # fmt: skip
    return (
        Step(
            "A_g", "area of the glass", "({w} - 2 * {b}) * ({h} - 2 * {b})", size,
            glass.value, "area",
        ),
        Step(
            "A_f", "area of the frame", "{w} * {h} - {A_g}", (width, height, glass),
            frame.value, "area",
        ),
        Step(
            "l_g", "edge of the glass", "2 * ({w} - 2 * {b} + {h} - 2 * {b})", size,
            edge.value, "run",
        ),
        Step(
            "U", "U-factor of the window",
            "({A_g} * {U_g} + {A_f} * {U_f} + {l_g} * {psi}) / ({A_g} + {A_f})", parts,
            value, "u_factor", f"{SOURCE}; {source}" if source else SOURCE,
        ),
    )  # fmt: skip


METHODS = (
    Method(
        name="iso10077_window",
        title="Window from glass, frame and edge",
        formula="U = (Ag Ug + Af Uf + lg psi) / (Ag + Af)",
        source=SOURCE,
        valid="one light, one frame width; glass, frame and edge values of the product",
        solves=(("window", solve_window),),
        metric="U_product",
    ),
)
