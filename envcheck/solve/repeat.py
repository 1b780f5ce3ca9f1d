"""Members that run the same way at different spacings, drawn over their common repeat."""

from __future__ import annotations

from collections.abc import Sequence

from envcheck.model.solved import Block

MOST_BAYS = 12
"""Bays of one layer in a common repeat; beyond, the spacings are taken to share none."""
SAME = 1e-6
"""m; repeats closer than this are one."""


def on_one_repeat(blocks: tuple[Block, ...]) -> tuple[Block, ...]:
    """Set blocks that run the same way side by side over their common repeat.

    The first member of each layer stays centred in its first bay. Blocks whose spacings have no
    common repeat of up to ``MOST_BAYS`` bays are left as they are.
    """
    spacings: dict[str, dict[str, float]] = {}
    for block in blocks:
        if block.pattern and block.repeat:
            way = block.pattern.partition("@")[0]
            spacings.setdefault(way, {})[block.pattern] = sum(block.widths)
    times: dict[str, tuple[int, str]] = {}
    for way, found in spacings.items():
        bays = common_repeat(list(found.values())) if len(found) > 1 else None
        if bays is not None:
            repeat = bays[0] * next(iter(found.values()))
            name = f"{way}@{repeat:.6f}"
            times |= {pattern: (n, name) for pattern, n in zip(found, bays, strict=True)}
    if not times:
        return blocks
    return tuple(_repeated(b, *times[b.pattern]) if b.pattern in times else b for b in blocks)


def common_repeat(spacings: Sequence[float]) -> list[int] | None:
    """How many bays of each spacing, m, make the least repeat that they share; None for none."""
    for number in range(1, MOST_BAYS + 1):
        whole = number * spacings[0]
        bays = [round(whole / spacing) for spacing in spacings]
        fits = (abs(n * s - whole) < SAME for n, s in zip(bays, spacings, strict=True))
        if all(0 < n <= MOST_BAYS for n in bays) and all(fits):
            return bays
    return None


def _repeated(block: Block, times: int, pattern: str) -> Block:
    cells = tuple(row * times if len(row) > 1 else row for row in block.cells)
    return block._replace(widths=block.widths * times, cells=cells, pattern=pattern)
