"""Sections typed as a person types them into a project file, read, and drawn."""

from __future__ import annotations

from pathlib import Path

from envcheck.model.project import Assembly
from envcheck.model.ruleset import Conventions
from envcheck.model.solved import Setting
from envcheck.read.project import project_from_bytes
from envcheck.solve.assembly import draw
from envcheck.solve.field.drawing import section_of
from envcheck.solve.field.section import Section
from envcheck.solve.registry import Wall
from tests.read.names import NAMES
from tests.solve.samples import setting

HEAD = """
envcheck: 1
project: {title: Typed sections}
site: {place: Nowhere}
rule_sets: [none]
materials:
"""
STUFFS = (0.034, 0.035, 0.04, 0.043, 0.05, 0.12, 0.13, 0.16, 0.25, 1.0, 50.0)
MATERIALS = "".join(f"  k{k}: {{conductivity: {k} W/(m*K), source: test}}\n" for k in STUFFS)


def read_assembly(text: str) -> Assembly:
    """The one assembly of a text that stands below ``assemblies:``, two spaces in."""
    whole = f"{HEAD}{MATERIALS}assemblies:\n{text}"
    project = project_from_bytes(whole.encode(), "typed.yaml", Path(), NAMES)
    (found,) = project.assemblies.values()
    return found


def wall_of(text: str, outside: float = 0.04, inside: float = 0.13) -> Wall:
    by: Setting = setting(method="two_dimensional")._replace(
        outside_film=outside, inside_film=inside
    )
    return draw(read_assembly(text), by, Conventions())[0]


def typed(text: str, outside: float = 0.04, inside: float = 0.13) -> Section:
    return section_of(wall_of(text, outside, inside))


def drawing(
    width: str, layers: list[tuple[str, str]], pieces: list[tuple[str, str, str]], more: str = ""
) -> str:
    """layers: (material, thickness). pieces: (material, x, y), as typed."""
    lines = [
        "  S:",
        "    kind: section",
        "    title: drawing",
        f"    repeat: {width}",
        *([f"    {more}"] if more else []),
    ]
    if layers:
        lines.append("    layers:")
        lines += [f"      - {{kind: material, material: {m}, thickness: {t}}}" for m, t in layers]
    lines.append("    pieces:")
    lines += [f"      - {{material: {m}, x: [{x}], y: [{y}]}}" for m, x, y in pieces]
    return "\n".join(lines) + "\n"
