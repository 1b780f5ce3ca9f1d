"""Writes a project of many assemblies, framed layers included, for the benchmarks."""

from __future__ import annotations

import sys
from pathlib import Path

HEAD = """envcheck: 1
project: {title: "Generated project, invented", permit_application_date: 2026-03-02}
site:
  place: Nowhere
  zones: [{zone: V3, source: "invented"}]
facts: {space_category: conditioned, slab_heated: false}
rule_sets: [merrow-2025]
materials:
  board: {title: board, conductivity: 0.16 W/(m*K), density: 800 kg/m3,
          specific_heat: 1000 J/(kg*K), class: board, source: invented, evidence: assumed}
  foam: {title: foam, conductivity: 0.034 W/(m*K), density: 30 kg/m3, specific_heat: 1450 J/(kg*K),
         class: insulation, combustible: true, source: invented, evidence: assumed}
  wool: {title: wool, conductivity: 0.037 W/(m*K), density: 30 kg/m3, specific_heat: 1030 J/(kg*K),
         class: insulation, source: invented, evidence: assumed}
  wood: {title: wood, conductivity: 0.13 W/(m*K), density: 500 kg/m3, specific_heat: 1600 J/(kg*K),
         class: wood, source: invented, evidence: assumed}
assemblies:
"""

LAYERS = 10


def assembly(number: int) -> str:
    """One wood-framed wall of ten layers; thicknesses differ from wall to wall."""
    lines = [f"  W{number}:", f"    title: Wall {number}", f"    sheet: A-{number}", "    layers:"]
    for layer in range(LAYERS - 1):
        material = ("board", "foam", "wool")[layer % 3]
        thickness = 12 + (number * 7 + layer * 3) % 40
        lines += [
            "      - kind: material",
            f"        title: layer {layer} of {material}",
            f"        material: {material}",
            f"        thickness: {thickness} mm",
        ]
    lines += [
        "      - kind: framed",
        "        title: studs and wool",
        f"        thickness: {90 + number % 50} mm",
        "        member: {material: wood, width: 38 mm, spacing: 406 mm}",
        "        fill: {material: wool}",
    ]
    return "\n".join(lines)


def project(assemblies: int) -> str:
    """The whole file: one element for each assembly."""
    walls = "\n".join(assembly(n) for n in range(assemblies))
    elements = "\n".join(
        f"  E{n}: {{assembly: W{n}, category: wall.wood_frame, sheet: A-{n}, "
        f"net_area: {10 + n % 30} m2}}"
        for n in range(assemblies)
    )
    return f"{HEAD}{walls}\nelements:\n{elements}\n"


if __name__ == "__main__":
    Path(sys.argv[2]).write_text(project(int(sys.argv[1])), encoding="utf-8")
