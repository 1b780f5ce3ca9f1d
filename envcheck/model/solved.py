"""What an assembly's network gives: value, bracket, tree and worksheet, all numbers SI."""

from typing import NamedTuple


class Operand(NamedTuple):
    """A number that enters a step."""

    name: str
    value: float
    quantity: str
    """A quantity of ``units``: ``length``, ``conductivity``, ``resistance``, ``number`` ..."""


class Step(NamedTuple):
    """One line of the worksheet.

    ``symbol`` names the result (``R3``, ``R3_web``, ``U``) and is unique within a worksheet; an
    operand of that name is that result. ``expression`` names the operands in braces and uses only
    ``+ - * / **``, parentheses and the functions ``ln exp sqrt min max``: ``{L} / {k}``. An empty
    expression is a value taken from a source. With ``si_only`` the formula holds constants that
    are true in SI alone.
    """

    symbol: str
    title: str
    expression: str
    operands: tuple[Operand, ...]
    value: float
    quantity: str
    source: str = ""
    si_only: bool = False


class Resistor(NamedTuple):
    """A resistance with its worksheet symbol and the steps that lead to it."""

    symbol: str
    title: str
    value: float
    """m2 K/W"""
    steps: tuple[Step, ...] = ()


class Series(NamedTuple):
    """Parts one behind another."""

    title: str
    parts: tuple["Node", ...]
    value: float


class Parallel(NamedTuple):
    """Branches side by side, each with its share of the area."""

    title: str
    shares: tuple[float, ...]
    branches: tuple["Node", ...]
    value: float


Node = Resistor | Series | Parallel


class Block(NamedTuple):
    """A layer drawn as rectangles on a grid: rows across the wall, columns along it.

    ``cells[row][column]`` is the resistance of that rectangle in the direction of heat flow. A
    homogeneous layer has one row and one column. Cells with the same symbol are the same piece.
    """

    symbol: str
    title: str
    widths: tuple[float, ...]
    """Column widths, m; their sum is the repeat width (or 1 where only shares are known)."""
    depths: tuple[float, ...]
    """Row depths from outside to inside, m."""
    cells: tuple[tuple[Resistor, ...], ...]
    pattern: str = ""
    """Blocks of one pattern stand in line with each other; different patterns cross. A
    homogeneous block has none."""
    repeat: bool = False
    """``widths`` are real dimensions, not shares."""


class Beside(NamedTuple):
    """A value by another route, printed beside the one that decides."""

    name: str
    """``parallel_path``, ``isothermal_planes``, ``sum_of_labels``, ``mean_thickness`` ..."""
    value: float
    """In the same metric as the solved value, SI."""
    note: str


class Counted(NamedTuple):
    """What a layer of the assembly counts in the value."""

    resistance: float | None
    """m2 K/W; None where the layer is bridged or not resolved by itself."""
    note: str = ""
    """What was done to it, in words."""


class Flow(NamedTuple):
    """Heat through one of several pieces or paths that stand side by side."""

    among: str
    """What they make up together: a layer, or all paths."""
    piece: str
    area: float
    """Share of the area, 0..1."""
    heat: float
    """Share of the heat that crosses there, 0..1."""
    resistance: float | None = None
    """m2 K/W along it; None where heat also moves sideways."""


class Weight(NamedTuple):
    """How much of the whole resistance a layer or film is."""

    symbol: str
    """Of the layer in the worksheet: ``R3``, ``Ro``, ``Ri``."""
    title: str
    share: float
    """-d ln U / d ln R of all that the layer is made of, 0..1; of layers in series R_i/R."""


class Influence(NamedTuple):
    """How U answers to one number."""

    symbol: str
    """Of the layer that it belongs to."""
    title: str
    quantity: str
    """``conductivity``, ``resistance``, ``length``, ``u_factor`` ..."""
    value: float | None
    """SI; None where one number stands for several."""
    elasticity: float
    """d ln U / d ln x: per cent of U for one per cent of it."""


class Face(NamedTuple):
    """Temperatures behind a layer, 0 outdoors and 1 indoors."""

    title: str
    least: float
    greatest: float


class Drawn(NamedTuple):
    """The section that was solved."""

    widths: tuple[float, ...]
    """m, along the wall; neighbours of the same conductivities are one"""
    rows: tuple[tuple[str, float, tuple[float, ...]], ...]
    """Outside first: symbol of the layer, depth in m, conductivity of each column in W/(m K)."""


class Reasons(NamedTuple):
    """Why a value is what it is."""

    flows: tuple[Flow, ...]
    weights: tuple[Weight, ...]
    """By layer, outside first; films included."""
    influences: tuple[Influence, ...]
    faces: tuple[Face, ...] = ()
    """Of a drawn section, outside first."""
    section: Drawn | None = None


class Caution(NamedTuple):
    """A caution that the assembly triggers: topic of ``needs`` and the reason."""

    topic: str
    """``moisture``, ``solid_masonry``, ``fire``, ``structure``, ``ground`` ..."""
    reason: str


class Setting(NamedTuple):
    """Everything that fixes the value of an assembly beside its own description.

    Hashable: an assembly is solved once per distinct setting. Resolved from the element and the
    rule set's conventions.
    """

    metric: str
    """U, C, F, or SHGC-less product U: ``U_assembly``, ``U_product``, ``C_factor``, ``F_factor``"""
    method: str
    method_from: str
    """Clause, or "assumed: the rule set names no method"."""
    refused: tuple[str, ...]
    weight: float | str | None
    direction: str
    """``up``, ``horizontal`` or ``down``"""
    outside_film: float
    """m2 K/W"""
    outside_film_from: str
    inside_film: float
    inside_film_from: str
    cladding_film: float
    """Film outside a well-ventilated cavity, where the convention drops the layers beyond it."""
    conventions: str
    """Key of the rule set whose Conventions apply."""
    framing_share: float | None = None
    """Of wood framing whose share the project does not state, 0..1."""
    framing_share_from: str = ""


class RangedInput(NamedTuple):
    """A number that is stated with a range, SI."""

    quantity: str
    """``conductivity``, ``length`` (a thickness) or ``resistance``"""
    title: str
    low: float
    high: float


class RangedValue(NamedTuple):
    """The interval of the value that follows from stated ranges, SI."""

    low: float
    high: float
    inputs: tuple[RangedInput, ...]
    proven: bool
    """Whether both ends enclose every choice in between; see ``solve.ranges``."""


class Solved(NamedTuple):
    """The answer for one assembly under one setting."""

    assembly: str
    setting: Setting
    value: float | None
    """By the prescribed method, corrections included; None where something is missing."""
    clear: float | None
    """Before fasteners, points and lines."""
    missing: tuple[str, ...]
    """What is missing, in plain words; the verdict becomes ``not_decided``."""
    low: float | None
    """Bracket of the drawn model, corrections included; None where it is not drawn."""
    high: float | None
    bracket_note: str
    """What the bracket is of, or why there is none."""
    decided_by_bracket: bool
    ratio: float | None
    """Isothermal planes over parallel path, of U."""
    beside: tuple[Beside, ...]
    tree: Node | None
    steps: tuple[Step, ...]
    """The whole worksheet from layers to value."""
    counted: tuple[Counted, ...]
    """One for each layer of the assembly, outside first."""
    assumptions: tuple[str, ...]
    cautions: tuple[Caution, ...]
    hand_check: tuple[Step, ...] = ()
    """The shortest sum that a reviewer can repeat; usually one step."""
    added: float = 0.0
    """What fasteners, points and lines add, as far as it is known, W/(m2 K)."""
    ranged: RangedValue | None = None
    """Where the assembly states ranges: the value at both ends."""
    drawn: Reasons | None = None
    """Of the drawn section, where it was solved in two dimensions."""
    unsure: float = 0.0
    """How much less that may be: bridges from drawn details stand at their high bound, W/(m2 K)."""


class Properties(NamedTuple):
    """What an assembly is before any method: class tests, insulation path, what it is made of."""

    heat_capacity: float | None
    """J/(m2 K), all layers; None where a density or specific heat is missing."""
    heat_capacity_indoor: float | None
    """From the indoor face to the first continuous insulation."""
    weight: float | None
    """kg/m2"""
    weight_indoor: float | None
    missing: tuple[str, ...]
    """Materials without density or specific heat."""
    framing: str
    """``steel``, ``wood``, ``none``"""
    cavity_resistance: float | None
    """Labelled insulation between members, at installed thickness, m2 K/W; None without."""
    continuous_resistance: float
    """Insulation that no metal crosses, m2 K/W; of a tapered layer at its least thickness."""
    crossed: tuple[str, ...]
    """Layers of insulation that members interrupt, with what crosses them."""
    bracketed: tuple[str, ...]
    """Point bridges through the continuous insulation (not mere fasteners)."""
    label_sum: float | None
    """Sum of all labels as if nothing bridged them, films excluded, m2 K/W."""
    combustible: tuple[str, ...]
    """Titles of combustible layers."""
