"""Why a value is what it is, in words and columns."""

from __future__ import annotations

from collections.abc import Iterator, Sequence

from envcheck import units
from envcheck.model.project import Assembly
from envcheck.model.solved import Counted, Drawn, Flow, Influence, Reasons, Weight
from envcheck.report import numbers
from envcheck.report.inert import clean
from envcheck.report.parts import Block, Entry, Grid, Items, Paragraph

TOGETHER = {"conductivity": 1.0, "resistance": -1.0, "u_factor": 1.0,
            "linear_transmittance": 1.0, "point_transmittance": 1.0}  # fmt: skip
"""Sense in which a quantity conducts: U is of the first degree in all of them together."""
CLOSE = 5e-4
NOTICED = 1.05
"""From this ratio of its share of the heat to its share of the area a piece is named."""
NAMED = {"conductivity": "conductivity of", "resistance": "resistance of", "length": "thickness of"}
WORDS = {"u_factor": "U-factor"}
"""Quantities whose name is no plain word."""


def blocks(
    assembly: Assembly,
    found: Reasons,
    u_factor: float | None,
    system: str,
    counted: Sequence[Counted] = (),
    added: float = 0.0,
) -> tuple[Block, ...]:
    """Lines in plain words, then the shares and the influences as tables.

    u_factor: W/(m2 K), for the resistance that each share stands for; None where the value is no
    U-factor. counted: what each layer counts, for the reason where one counts nothing.
    added: share of the heat that points, lines and fasteners carry.
    """
    said = tuple(Entry(line) for line in _lines(assembly, found, u_factor, system, counted, added))
    made: list[Block] = [Items(said)] if said else []
    if found.section is not None and len(found.section.widths) <= MOST_COLUMNS:
        length, conductivity = (units.label(q, system) for q in ("thickness", "conductivity"))
        words = f"{_SECTION}; lengths in {length}, conductivities in {conductivity}."
        made += [Paragraph(words), _section_grid(found.section, system)]
    if found.section is not None:
        made.append(Paragraph(_CROWDS))
    if found.flows:
        made.append(_flow_grid(found.flows, system))
    if found.weights:
        made.append(_weight_grid(assembly, found.weights, u_factor, system))
    if found.influences:
        made.append(_influence_grid(assembly, found.influences, system))
        if (
            abs(sum(TOGETHER.get(i.quantity, 0.0) * i.elasticity for i in found.influences) - 1)
            < CLOSE
        ):
            made.append(Paragraph(_SUM))
    return tuple(made)


FEW_COLUMNS, MOST_COLUMNS = 6, 10
"""Columns of a section up to which widths have four digits, and up to which they are printed."""
_SECTION = (
    "The section, which repeats along the wall, outside first: conductivities under the width of "
    "their column"
)
_CROWDS = (
    "Heat crowds at what conducts best and spreads in the layers beside it, so that a layer or "
    "film may count for more than its own R. The shares below are of the solved field; unlike U "
    "they are not bounded."
)
_SUM = (
    "Check: the effects of conductivities and other conductances, less those of resistances, sum "
    "to 1 %, as theory says: all of them 1 % more conductive make U 1 % higher."
)


def _lines(
    assembly: Assembly,
    found: Reasons,
    u_factor: float | None,
    system: str,
    counted: Sequence[Counted],
    added: float,
) -> Iterator[str]:
    """The largest resistance and the smallest; what carries more heat than its area."""
    counting = [weight for weight in found.weights if weight.share > 0]
    if len(counting) > 1:
        ordered = sorted(counting, key=lambda weight: weight.share)
        for word, weight in (("largest", ordered[-1]), ("smallest", ordered[0])):
            whole = f"{numbers.percent(weight.share)} of the whole"
            title = _title(assembly, weight.symbol, weight.title)
            yield f"{word} resistance: {title}, {_part(weight, u_factor, system)}{whole}"
    for weight in found.weights:
        if weight.share == 0:
            number = _number(assembly, weight.symbol)
            note = counted[number].note if number is not None and counted else ""
            why = f": {clean(note)}" if note else ""
            yield f"{_title(assembly, weight.symbol, weight.title)} adds nothing{why}"
    if added > CLOSE:
        yield f"points, lines and fasteners: {numbers.percent(added)} of the heat"
    for flow in sorted(found.flows, key=lambda flow: -flow.heat):
        if flow.heat > NOTICED * flow.area:
            yield (
                f"{clean(flow.among)}: {_piece(flow)}, {_share(flow.area)} of the area, "
                f"carries {numbers.percent(flow.heat)} of the heat"
            )


def _piece(flow: Flow) -> str:
    """The piece without the layer that is named beside it."""
    return clean(flow.piece.removesuffix(f" of {flow.among}"))


def _share(share: float) -> str:
    return numbers.percent(share, 2 if share < 0.01 else 1)


def _part(weight: Weight, u_factor: float | None, system: str) -> str:
    if not u_factor:
        return ""
    unit = units.label("resistance", system)
    return f"R {numbers.resistance(weight.share / u_factor, system)} {unit}, "


def _number(assembly: Assembly, symbol: str) -> int | None:
    """Place of the layer that a symbol such as ``R3`` names."""
    number = symbol.removeprefix("R")
    known = number.isdigit() and 0 < int(number) <= len(assembly.layers)
    return int(number) - 1 if known else None


def _title(assembly: Assembly, symbol: str, title: str) -> str:
    """The layer's own title where the symbol is that of a layer."""
    number = _number(assembly, symbol)
    return clean(title if number is None else assembly.layers[number].title)


def _section_grid(drawn: Drawn, system: str) -> Grid:
    """The section row by row, conductivities under the width of their column."""
    digits = 4 if len(drawn.widths) <= FEW_COLUMNS else 3
    widths = [_length(width, digits, system) for width in drawn.widths]
    rows = tuple(
        (
            symbol,
            _length(depth, 4, system),
            *(numbers.significant(numbers.in_system(k, "conductivity", system), 3) for k in each),
        )
        for symbol, depth, each in drawn.rows
    )
    heads = ("", "depth", *widths)
    return Grid(heads, rows, tuple(range(1, len(heads))))


def _length(value: float, digits: int, system: str) -> str:
    return numbers.significant(numbers.in_system(value, "thickness", system), digits)


def _flow_grid(flows: Sequence[Flow], system: str) -> Grid:
    """Shares of area and heat, with the resistance of each path where it has one."""
    rows = [
        (clean(flow.among), _piece(flow), _share(flow.area), numbers.percent(flow.heat))
        for flow in flows
    ]
    heads = ("side by side in", "path or piece", "area", "heat")
    if all(flow.resistance is None for flow in flows):
        return Grid(heads, tuple(rows), (2, 3), (1, 0))
    along = [numbers.resistance(flow.resistance, system) for flow in flows]
    wide = tuple((*row, r) for row, r in zip(rows, along, strict=True))
    return Grid((*heads, f"R, {units.label('resistance', system)}"), wide, (2, 3, 4), (1, 0))


def _weight_grid(
    assembly: Assembly, weights: Sequence[Weight], u_factor: float | None, system: str
) -> Grid:
    rows = tuple(
        (
            weight.symbol,
            _title(assembly, weight.symbol, weight.title),
            numbers.resistance(weight.share / u_factor, system) if u_factor else "",
            numbers.percent(weight.share),
        )
        for weight in weights
    )
    heads = ("", "resistance", f"R as it counts, {units.label('resistance', system)}", "share")
    return Grid(heads, rows, (2, 3), (1,))


def _influence_grid(assembly: Assembly, influences: Sequence[Influence], system: str) -> Grid:
    """The strongest first."""
    ordered = sorted(influences, key=lambda each: -abs(each.elasticity))
    rows = tuple(
        (
            each.symbol,
            _named(assembly, each),
            _value(each, system),
            f"{numbers.signed(each.elasticity, 3)} %",
        )
        for each in ordered
    )
    return Grid(("", "1 % more of", "now", "changes U by"), rows, (2, 3), (1,))


def _named(assembly: Assembly, each: Influence) -> str:
    """What changes: of a layer's own in words, else the title of the step that it enters."""
    if _number(assembly, each.symbol) is None and each.symbol not in ("Ro", "Ri"):
        word = WORDS.get(each.quantity, each.quantity.replace("_", " "))
        return f"{word} in: {clean(each.title)}"
    layer = _title(assembly, each.symbol, each.symbol)
    title = each.title.removesuffix(f" of {layer}") or layer
    return f"{NAMED.get(each.quantity, '')} {clean(title)}".strip()


def _value(each: Influence, system: str) -> str:
    if each.value is None:
        return ""
    quantity = "thickness" if each.quantity == "length" else each.quantity
    shown = numbers.significant(numbers.in_system(each.value, quantity, system), 4)
    return f"{shown} {units.label(quantity, system)}"
