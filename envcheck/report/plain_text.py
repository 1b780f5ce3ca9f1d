"""Blocks as lines of text of a given width; numbers and words are never broken."""

from __future__ import annotations

import re
from collections.abc import Collection, Iterable

from envcheck.report.parts import Block, Entry, Facts, Grid, Items, Page, Pair, Paragraph, Picture

COLOURS = {"bad": "\x1b[31m", "open": "\x1b[33m", "good": "\x1b[32m"}
PLAIN = "\x1b[0m"
LABEL = 22
GAP = 2
"""Spaces between columns."""
NARROWEST = 12
FLOORS = (24, 18, 14, 12, 8)
"""Widths to which columns give way, round by round."""
_PIECES = re.compile(r"[0-9a-f]{64}|[+-]?\d[\d.,]*|[^\W\d_]|\W|_")


def write(page: Page, width: int, colour: bool) -> str:
    """Write a page; ends with a line feed."""
    lines = [page.title, "=" * min(len(page.title), width)]
    for section in page.sections:
        lines.append("")
        if section.heading:
            lines += [*wrap(section.heading, width), "-" * min(len(section.heading), width)]
        for number, block in enumerate(section.blocks):
            if number:
                lines.append("")
            lines += _block(block, width, colour)
    return "\n".join(line.rstrip() for line in lines) + "\n"


def _block(block: Block, width: int, colour: bool) -> list[str]:
    match block:
        case Paragraph(text):
            return wrap(text, width)
        case Facts(pairs):
            return [line for pair in pairs for line in _fact(pair, width)]
        case Items(entries, numbered):
            return _items(entries, numbered, width)
        case Grid():
            return grid(block, width, colour)
        case Picture():
            return []


def _fact(pair: Pair, width: int) -> list[str]:
    lead = f"{pair.label:<{LABEL}}"
    if len(pair.label) < LABEL:
        return hang(lead, pair.text, width)
    return [*wrap(pair.label, width), *hang(" " * LABEL, pair.text, width)]


def _items(entries: Iterable[Entry], numbered: bool, width: int) -> list[str]:
    found: list[str] = []
    for number, entry in enumerate(entries, 1):
        lead = f"{number:>3}. " if numbered else "  - "
        found += hang(lead, entry.head, width)
        indent = " " * (len(lead) + 2)
        for line in entry.lines:
            found += hang(indent, line, width)
        for line in entry.sums:
            found += hang(indent, line, width)
    return found


def hang(lead: str, text: str, width: int) -> list[str]:
    """Write a text behind a lead, further lines indented as far as the lead is wide."""
    if len(lead) + len(text) <= width:
        return [lead + text]
    first, *rest = wrap(text, max(width - len(lead), NARROWEST))
    indent = " " * len(lead)
    return [lead + first, *(indent + line for line in rest)]


def wrap(text: str, width: int) -> list[str]:
    """Break at spaces; a word that is longer than the line breaks between its letters or signs,
    never within a number."""
    if len(text) <= width:
        return [text]
    lines: list[str] = []
    start = 0
    while len(text) - start > width:
        cut = text.rfind(" ", start, start + width + 1)
        if cut <= start:
            return [*lines, *_long_words(text[start:], width)]
        lines.append(text[start:cut])
        start = cut + 1
    return [*lines, text[start:]]


def _long_words(text: str, width: int) -> list[str]:
    lines: list[str] = []
    line = ""
    for word in text.split(" "):
        if line and len(line) + 1 + len(word) <= width:
            line += " " + word
            continue
        if line:
            lines.append(line)
        *full, line = _pieces(word, width) if len(word) > width else [word]
        lines += full
    return [*lines, line]


def _pieces(word: str, width: int) -> list[str]:
    """Cut a long word into pieces of at most ``width``, numbers whole."""
    pieces = [""]
    for piece in _PIECES.findall(word):
        if pieces[-1] and len(pieces[-1]) + len(piece) > width:
            pieces.append("")
        pieces[-1] += piece
    return pieces


def grid(block: Grid, width: int, colour: bool) -> list[str]:
    """Set a table; columns named in ``wrap`` give way until it fits."""
    widths = [len(head) for head in block.heads]
    for row in block.rows:
        for column, cell in enumerate(row):
            if len(cell) > widths[column]:
                widths[column] = len(cell)
    _narrow(widths, block, width)
    lines = [*_physical(block.heads, widths), ["-" * width for width in widths]]
    tones = [""] * len(lines)
    for number, row in enumerate(block.rows):
        made = _physical(row, widths)
        lines += made
        tone = COLOURS.get(block.tones[number], "") if colour and block.tones else ""
        tones += [tone] * len(made)
    return _set(lines, tones, block.right)


def _set(lines: list[list[str]], tones: list[str], right: Collection[int]) -> list[str]:
    """Set the cells of each line flush; a tone colours the last of them."""
    columns = enumerate(zip(*lines, strict=True))
    flush = [
        f"{{:{'>' if number in right else '<'}{max(map(len, cells))}}}" for number, cells in columns
    ]
    form = (" " * GAP).join(flush).format
    found = []
    for cells, tone in zip(lines, tones, strict=True):
        line, last = form(*cells).rstrip(), cells[-1]
        coloured = tone and last
        found.append(f"{line[: -len(last)]}{tone}{last}{PLAIN}" if coloured else line)
    return found


def _physical(row: tuple[str, ...], widths: list[int]) -> list[list[str]]:
    """One table row as lines of cells, broken where a cell is wider than its column."""
    if all(len(cell) <= width for cell, width in zip(row, widths, strict=True)):
        return [[cell.strip() for cell in row]]
    columns = [wrap(cell, width) for cell, width in zip(row, widths, strict=True)]
    deep = max(map(len, columns))
    return [[c[n].strip() if n < len(c) else "" for c in columns] for n in range(deep)]


def _narrow(widths: list[int], block: Grid, width: int) -> None:
    """Take the excess from the columns that may wrap, the first named ones first."""
    excess = sum(widths) + GAP * (len(widths) - 1) - width
    for floor in FLOORS:
        for column in block.wrap:
            if excess <= 0:
                return
            longest = max(len(word) for word in block.heads[column].split(" "))
            give = min(excess, max(0, widths[column] - max(floor, longest)))
            widths[column] -= give
            excess -= give
