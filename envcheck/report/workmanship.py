"""What voids and compression would leave of cavity insulation, as a table of ``explain``."""

from __future__ import annotations

from collections.abc import Sequence

from envcheck import units
from envcheck.model.sure import Workmanship
from envcheck.report import numbers
from envcheck.report.inert import clean
from envcheck.report.parts import Grid, Paragraph, Section

LEAD = (
    "Information, held against no limit. Voids: paths of full insulation and of an empty cavity "
    "side by side, without flow between them; compression: the thickness that is left, the gap not "
    "counted. A dash: the prescribed method gives no value for it, or a bracket decides."
)
KINDS = {"void": "of the area void", "compression": "of the thickness compressed"}


def sections(levels: Sequence[Workmanship], system: str) -> list[Section]:
    """One section, or none where nothing stands between members."""
    if not levels:
        return []
    unit = units.label("resistance", system)
    letter, of_value = numbers.symbol("U_assembly"), numbers.unit("U_assembly", system)
    heads = ("insulation", "workmanship", f"R, {unit}", f"{letter}, {of_value}", "change")
    rows = []
    for title in dict.fromkeys(level.layer for level in levels):
        own = [level for level in levels if level.layer == title]
        rows.append(
            (clean(title), "as stated", _r(own[0].full, system), *_u(own[0].whole, None, system))
        )
        rows += [
            (
                "",
                f"{numbers.percent(each.share, 0)} {KINDS[each.kind]}",
                _r(each.left, system),
                *_u(each.value, each.whole, system),
            )
            for each in own
        ]
    sources = dict.fromkeys(
        f"{numbers.percent(each.share, 0)} {KINDS[each.kind]}: {each.source}" for each in levels
    )
    blocks = (
        Paragraph(LEAD),
        Grid(heads, tuple(rows), (2, 3, 4), (0,)),
        Paragraph(clean("; ".join(sources) + ".")),
    )
    return [Section("Workmanship", blocks)]


def _r(resistance: float, system: str) -> str:
    return numbers.fixed(numbers.in_system(resistance, "resistance", system), 2)


def _u(value: float | None, before: float | None, system: str) -> tuple[str, str]:
    if value is None:
        return "-", "-"
    shown = numbers.in_system(value, "u_factor", system)
    change = f"{numbers.signed(100.0 * (value / before - 1.0), 1)} %" if before else ""
    return numbers.fixed(shown, numbers.decimals("U_assembly", system)), change
