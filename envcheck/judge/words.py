"""Small words that cross-checks share: areas, resistances, lists of tags, lines by assembly."""

from __future__ import annotations

from collections.abc import Iterable, Mapping, Sequence
from functools import lru_cache

from envcheck.judge.compare import rounded
from envcheck.model.judged import Line
from envcheck.model.project import Project
from envcheck.model.ruleset import RuleSet
from envcheck.units import in_system, label

MOST_TAGS = 6
METHODS = {
    "series": "layers in series",
    "parallel_path": "parallel paths",
    "isothermal_planes": "isothermal planes",
    "weighted": "a weighted mean of parallel paths and isothermal planes",
    "cavity_factor": "cavity correction factors",
    "effective_layer": "effective layers",
    "zone": "the zone method",
    "two_dimensional": "a two-dimensional solution",
}
"""Methods in words; any other is its own name."""


def system(project: Project, rulesets: Mapping[str, RuleSet]) -> str:
    """``SI`` or ``IP``: the project's units, or those of its first rule set."""
    return project.units or next((ruleset.units for ruleset in rulesets.values()), "SI")


def area(value: float, units: str) -> str:
    """Write an area given in m2: ``2,240 ft2`` or ``208.1 m2``."""
    shown = in_system(value, "area", units)
    decimals = 0 if units == "IP" and abs(shown) >= 1.0 else 1
    return f"{rounded(shown, decimals):,} {label('area', units)}"


def resistance(value: float, units: str) -> str:
    """Write a resistance given in m2 K/W: ``R-12.6`` or ``2.22 m2 K/W``."""
    shown = in_system(value, "resistance", units)
    if units == "IP":
        return f"R-{trimmed(shown, 1)}"
    return f"{rounded(shown, 2)} {label('resistance', units)}"


def u_factor(value: float, units: str) -> str:
    """Write a U-factor given in W/(m2 K), without its unit."""
    return str(rounded(in_system(value, "u_factor", units), 4 if units == "IP" else 3))


def length(value: float, units: str) -> str:
    """Write a thickness given in m: ``6.25 in`` or ``140 mm``."""
    return f"{trimmed(in_system(value, 'thickness', units), 3)} {label('thickness', units)}"


def trimmed(value: float, decimals: int) -> str:
    """Round half-up and cut trailing zeros behind the point."""
    text = str(rounded(value, decimals))
    return text.rstrip("0").rstrip(".") if "." in text else text


def percent(value: float) -> str:
    """Write a share with its sign: ``+32 %``, ``-2.1 %``."""
    return f"{value * 100:+.{0 if abs(value) >= 0.0995 else 1}f} %"


def listed(names: Sequence[str]) -> str:
    """Write names in a row: ``a, b and c``, cut where there are many."""
    if len(names) > MOST_TAGS:
        return f"{', '.join(names[:MOST_TAGS])} and {len(names) - MOST_TAGS} more"
    return " and ".join(filter(None, (", ".join(names[:-1]), names[-1] if names else "")))


def method(name: str) -> str:
    """Name a method in words."""
    return METHODS.get(name, name.replace("_", " "))


def thermal(line: Line) -> bool:
    """Whether a line holds a U-, C- or F-factor (not SHGC or the like) of one element."""
    return line.decides and line.metric.startswith(("U_", "C_", "F_"))


def lines_by_assembly(lines: Iterable[Line], project: Project) -> dict[str, list[Line]]:
    """Thermal lines of the rule sets that decide, by the assembly of their element."""
    found: dict[str, list[Line]] = {}
    for line in lines:
        element = project.elements.get(line.element)
        if element is not None and thermal(line):
            found.setdefault(element.assembly, []).append(line)
    return found


@lru_cache(maxsize=4096)  # titles repeat from wall to wall
def names(title: str, *words: str) -> bool:
    """Whether a title holds one of these words or groups of words, whole and in any case."""
    plain = "".join(letter if letter.isalnum() else " " for letter in title.casefold())
    padded = f" {' '.join(plain.split())} "
    return any(f" {word} " in padded for word in words)


def tags(lines: Iterable[Line]) -> str:
    """Tags of the lines, each once."""
    return listed(list(dict.fromkeys(line.element for line in lines)))
