"""What stands behind the lines: why over, and each limit in print with a sum to repeat."""

from __future__ import annotations

from collections.abc import Container, Iterable

from envcheck.report import numbers, wording
from envcheck.report.main_table import between
from envcheck.report.parts import Entry, Items
from envcheck.report.rows import Row

MOST_PLACES = 24
ON_METHOD = (wording.ON_METHOD, wording.WITHIN_BY_METHOD)


def place(subject: str, sheet: str) -> str:
    """A tag, surface or assembly with the sheet where it belongs."""
    return f"{subject} ({sheet})" if sheet else subject


def grouped(found: Iterable[tuple[str, str, tuple[str, ...]]]) -> tuple[Entry, ...]:
    """(place, what, lines) as entries, those that say the same of several places together."""
    places: dict[tuple[str, tuple[str, ...]], dict[str, None]] = {}
    for where, what, lines in found:
        places.setdefault((what, lines), {})[where] = None
    return tuple(
        Entry(f"{wording.listed(list(where), MOST_PLACES)}: {what}", lines)
        for (what, lines), where in places.items()
    )


def over(rows: Iterable[Row], told: Container[str]) -> Items:
    """Why lines are over their limits.

    told: assemblies of which a finding says how the verdict hangs on the method.
    """
    return Items(
        grouped(
            (
                place(row.tag, row.sheet),
                f"{row.verdict_text}{_by(row)}",
                (*row.reasons, *notes(row, told), *(() if row.assembly in told else bounds(row))),
            )
            for row in rows
            if row.verdict == "fail"
        )
    )


def notes(row: Row, told: Container[str]) -> tuple[str, ...]:
    """Notes beside a verdict, less the one that a finding says in full."""
    if row.assembly not in told:
        return row.notes
    return tuple(note for note in row.notes if note not in ON_METHOD)


def _by(row: Row) -> str:
    if not row.room.text.startswith("-"):  # within by itself: its group is over
        return ""
    share = row.room_share.lstrip("+-")
    text = f" by {row.room.text.lstrip('+-')} {row.room.unit}".rstrip()
    return f"{text} ({share})" if share else text


def bounds(row: Row) -> tuple[str, ...]:
    """Bounds of the drawn model, where they are more than the value itself."""
    if not row.low.text or (row.low == row.high and row.low.text == row.value.text):
        return ()
    return (f"bounds of the drawn model: {between(row)} {row.low.unit}",)


def said_once(rows: Iterable[Row], told: Container[str]) -> Items:
    """Each limit in print with its sum; lines that read the same are said once, by their tags."""
    members: dict[tuple[str, tuple[str, ...], str], list[Row]] = {}
    for row in rows:
        limit = f"{row.symbol} {row.limit}" if row.limit else row.symbol
        head = f"{limit}; {row.limit_source or 'no limit found'}"
        lines = [_path(*path) for path in row.paths] if row.paths else []
        if not row.open and row.verdict != "fail":
            lines += _beside(row, told)
        if row.verdict != "fail":
            lines += bounds(row)
        members.setdefault((head, tuple(lines), row.hand_check), []).append(row)
    return Items(
        tuple(
            Entry(f"{_tags(group)}{_size(group)}: {head}", lines, (hand,) if hand else ())
            for (head, lines, hand), group in members.items()
        )
    )


def _beside(row: Row, told: Container[str]) -> list[str]:
    """Reasons and notes of a settled line, but for a path that is printed anyway."""
    if not (row.reasons or row.notes):
        return []
    printed = row.against and not row.against.startswith(("<", ">"))  # the cell says so itself
    reasons = [] if row.verdict == "no_requirement" and printed else row.reasons
    said = ("R-value path", "by the R-value path") if row.paths else ()
    return [*(text for text in reasons if not text.startswith(said)), *notes(row, told)]


def _path(path: str, state: str, value: str, limit: str, why: str) -> str:
    figures = " against ".join(filter(None, (value, limit)))
    text = f"{path}: {state}, {figures}" if figures else f"{path}: {state}"
    return f"{text}; {why}" if why else text


def _tags(group: list[Row]) -> str:
    return group[0].tag if len(group) == 1 else wording.listed([r.tag for r in group], MOST_PLACES)


def _size(group: list[Row]) -> str:
    """Areas of the group as a sum: ``1818 + 836 + 612 = 3266 ft2``."""
    first = group[0].amount
    if len(group) == 1:
        return f" ({first.text} {first.unit})" if first.text else ""
    amounts = [row.amount for row in group if row.amount.text]
    if len(amounts) != len(group) or len({amount.unit for amount in amounts}) > 1:
        return ""
    total = numbers.total([amount.text for amount in amounts])
    if len(amounts) > MOST_PLACES:
        return f" ({total} {first.unit} in all)"
    return f" ({' + '.join(amount.text for amount in amounts)} = {total} {first.unit})"
