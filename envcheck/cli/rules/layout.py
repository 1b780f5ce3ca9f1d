"""The texts of a new rule-set folder, from direction, zones, metrics and rows."""

from __future__ import annotations

import csv
import io
import json
from collections.abc import Mapping, Sequence
from typing import NamedTuple

from envcheck import units
from envcheck.model.metrics import METRICS

OPENINGS = ("U_product", "U_glazing", "U_curtain_wall", "SHGC", "VT", "VT_per_SHGC")
"""Metrics of doors, windows and skylights, which get a sheet of their own."""
OPENING_ROWS = ("fenestration.", "door.")
ROWS = ("wall.wood_frame", "roof.attic", "floor.framed", "fenestration.fixed")
HEADS = {
    "U_assembly": "U-factor", "U_product": "U-factor", "U_glazing": "Glazing U-factor",
    "U_curtain_wall": "Curtain wall U-factor", "C_factor": "C-factor", "F_factor": "F-factor",
    "R_insulation": "R-value", "VT_per_SHGC": "VT/SHGC",
}  # fmt: skip
PATHS = {"R_insulation": "insulation"}
"""Metric -> its path, where a sheet holds both; all others are of the assembly."""


class Layout(NamedTuple):
    """What a new rule set is asked for."""

    direction: str
    zones: tuple[str, ...]
    metrics: tuple[str, ...]
    rows: tuple[str, ...]
    system: str
    decimal: str
    labels: Mapping[str, str]
    """Category -> how a label may begin."""

    @property
    def separator(self) -> str:
        """Between columns."""
        return ";" if self.decimal == "," else ","


class Part(NamedTuple):
    """Opaque elements or openings: their table, rows and metrics."""

    id: str
    file: str
    rows: tuple[str, ...]
    metrics: tuple[str, ...]


def texts(layout: Layout) -> tuple[dict[str, str], dict[str, str]]:
    """What the template leaves open, and the sheets by file name."""
    parts = _parts(layout)
    two_paths = any(len(_paths(part)) > 1 for part in parts)
    paths = (
        "paths:                         # either is enough\n"
        '  - {any_of: [assembly, insulation], per: component, clause: "1.2"}\n'
    )
    fields = {
        "units": ", ".join(_units(layout)),
        "decimal": layout.decimal,
        "separator": layout.separator,
        "zones": _zones(layout),
        "tables": "\n".join(line for part in parts for line in _tables(part, layout)),
        "paths": paths if two_paths else "",
    }
    sheets = {}
    for part in parts:
        for file in _files(part, layout):
            sheets[file] = _sheet(part, layout)
    return fields, sheets


def _parts(layout: Layout) -> list[Part]:
    opaque = tuple(m for m in layout.metrics if m not in OPENINGS)
    glazed = tuple(m for m in layout.metrics if m in OPENINGS)
    walls = tuple(r for r in layout.rows if not r.startswith(OPENING_ROWS))
    windows = tuple(r for r in layout.rows if r.startswith(OPENING_ROWS))
    found = []
    if opaque and walls:
        found.append(Part("T1", "table-1", walls, opaque))
    if glazed and windows:
        number = len(found) + 1
        found.append(Part(f"T{number}", f"table-{number}", windows, glazed))
    return found


def _paths(part: Part) -> set[str]:
    return {PATHS.get(metric, "assembly") for metric in part.metrics}


def _units(layout: Layout) -> list[str]:
    keys = {METRICS[m].key: METRICS[m].quantity for m in layout.metrics if METRICS[m].key}
    labels = {key: units.label(quantity, layout.system) for key, quantity in keys.items()}
    return [f"{key}: {label.replace(' ', '.')}" for key, label in labels.items()]


def quoted(text: str) -> str:
    """A text as YAML reads it back unchanged."""
    return json.dumps(text, ensure_ascii=False)


def _zones(layout: Layout) -> str:
    if layout.direction == "none":
        return "# no zones: every row holds for the whole place"
    order = ", ".join(map(quoted, layout.zones))
    return "\n".join(
        (
            "zones:",
            f"  scheme: {len(layout.zones)} zones",
            "  chosen_by: how the print finds the zone of a site",
            f"  order: [{order}]   # warm to cold; else add order_is_coldness: no",
            '  # members: {"Zone 2": ["2A", "2B"]}',
            '  # bounds: {hdd65: {"Zone 1": "<4000", "Zone 2": ">=4000"}}',
        )
    )


def _files(part: Part, layout: Layout) -> list[str]:
    if layout.direction != "one-sheet-per-zone":
        return [f"{part.file}.csv"]
    return [f"{part.file}-{i}.csv" for i, _ in enumerate(layout.zones, 1)]


def _tables(part: Part, layout: Layout) -> list[str]:
    number = part.id[1:]
    if layout.direction == "one-sheet-per-zone":
        lines = []
        for i, (zone, file) in enumerate(zip(layout.zones, _files(part, layout), strict=True), 1):
            name = f"{part.id}-{i}"
            if i == 1:
                lines += _table(part, layout, name, file, f"Table {number}, {zone}", zone)
            else:
                like, title = f"{part.id}-1", quoted(f"Table {number}, {zone}")
                entry = f"like: {like}, id: {name}, file: {file}, clause: {title}"
                lines.append(f"  - {{{entry}, zone: {quoted(zone)}}}")
        return lines
    return _table(part, layout, part.id, f"{part.file}.csv", f"Table {number}", "")


def _table(part: Part, layout: Layout, name: str, file: str, clause: str, zone: str) -> list[str]:
    orientation = {"zones-across": "zones_across", "zones-down": "zones_down"}
    lines = [
        f"  - id: {name}",
        f"    file: {file}",
        f"    clause: {quoted(clause)}",
        f"    orientation: {orientation.get(layout.direction, 'none')}",
        *([f"    zone: {quoted(zone)}"] if zone else []),
    ]
    if layout.direction == "zones-down":
        return [*lines, "    heads:", *_element_heads(part, layout)]
    meanings = [f"      {quoted(_head(m))}: {_meaning(m, part)}" for m in part.metrics]
    if layout.direction == "zones-across" and len(part.metrics) > 1:
        inner = ", ".join(f"{quoted(_head(m))}: {_meaning(m, part)}" for m in part.metrics)
        lines += ["    header_rows: 2", f"    head_levels: [zone, {{{inner}}}]"]
    elif layout.direction == "zones-across":
        lines.append(f"    metric: {part.metrics[0]}")
    else:
        lines += ["    heads:", *meanings]
    sums = ", plus: [cavity, ci]" if "R_insulation" in part.metrics else ""
    return [
        *lines,
        "    rows:                 # a row key that is an envcheck category needs no `element:`",
        f"      {quoted('*')}: {{applies_to: each_component{sums}}}",
    ]


def _meaning(metric: str, part: Part) -> str:
    path = f", path: {PATHS.get(metric, 'assembly')}" if len(_paths(part)) > 1 else ""
    return f"{{metric: {metric}{path}}}"


def _head(metric: str) -> str:
    return HEADS.get(metric, metric.replace("_", " "))


def _element_heads(part: Part, layout: Layout) -> list[str]:
    """Heads where each row is a zone: an element and a metric each."""
    lines = []
    for row in part.rows:
        for metric in part.metrics:
            meaning = _meaning(metric, part).strip("{}")
            sums = ", plus: [cavity, ci]" if metric == "R_insulation" else ""
            head = quoted(_element_head(row, metric, layout))
            lines.append(f"      {head}: {{element: {row}, {meaning}{sums}}}")
    return lines


def _element_head(row: str, metric: str, layout: Layout) -> str:
    return f"{layout.labels.get(row, row)}, {_head(metric)}"


def _sheet(part: Part, layout: Layout) -> str:
    heads: list[Sequence[str]]
    body: list[tuple[str, str]]
    if layout.direction == "zones-down":
        heads = [[_element_head(r, m, layout) for r in part.rows for m in part.metrics]]
        body = [(zone, zone) for zone in layout.zones]
    else:
        names = [_head(m) for m in part.metrics]
        body = [(row, layout.labels.get(row, row)) for row in part.rows]
        heads = [names]
        if layout.direction == "zones-across":
            zones = [z if i == 0 else "" for z in layout.zones for i, _ in enumerate(names)]
            heads = [zones, names * len(layout.zones)] if len(names) > 1 else [zones]
    out = io.StringIO(newline="")
    writer = csv.writer(out, delimiter=layout.separator, lineterminator="\n")
    writer.writerow(["row", "label", *heads[0], "src"])
    for level in heads[1:]:
        writer.writerow(["", "", *level, ""])
    for key, label in body:
        writer.writerow([key, label, *[""] * len(heads[0]), "P"])
    return out.getvalue()
