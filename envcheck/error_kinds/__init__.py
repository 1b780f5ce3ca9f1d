"""The catalogue of input errors, by the part of the input that they are found in.

``what`` and ``fix`` are templates that the place of error fills in; ``about`` explains the kind in
the docs. Ids are stable: people look them up and scripts match them.
"""

from __future__ import annotations

from envcheck.error_kinds import drawings, files, projects, rule_sets, sheets
from envcheck.errors import Kind

_ALL = (*files.KINDS, *projects.KINDS, *drawings.KINDS, *rule_sets.KINDS, *sheets.KINDS)
KINDS: dict[str, Kind] = {kind.id: kind for kind in _ALL}
