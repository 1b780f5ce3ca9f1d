"""Names within the sections of a project file, by its lines alone: for a file being typed."""

from __future__ import annotations

import re
from collections.abc import Container

SECTION = re.compile(r"([a-z_]+)\s*:\s*(#.*)?$")
NAME = re.compile(
    r"""( +)(?:"([^"]+)"|'([^']+)'|([^\s"'#\[{,&*!|>%@`-][^:#]*?|-[^\s:]+))\s*:(?:\s|$)"""
)


def names_of(text: str, sections: Container[str]) -> list[str]:
    """Give the keys directly within the sections named, in the order of the file.

    The file need not be sound: it is looked at line by line, which costs next to nothing.
    """
    found: dict[str, None] = {}
    inside, indent = False, ""
    for line in text.splitlines():
        if line[:1] not in ("", " ", "#", "\t"):
            section = SECTION.match(line)
            inside, indent = section is not None and section[1] in sections, ""
            continue
        name = NAME.match(line) if inside else None
        if name is None:
            continue
        indent = indent or name[1]
        if name[1] == indent:
            found[name[2] or name[3] or name[4]] = None
    return list(found)
