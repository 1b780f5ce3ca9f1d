"""What differs between two editions of a rule set, cell by cell."""

from typing import NamedTuple

from envcheck.model.ruleset import Limit


class CellChange(NamedTuple):
    """One cell in two editions."""

    kind: str
    """``added``, ``removed`` or ``changed``"""
    old: Limit | None
    new: Limit | None
    factor: float | None
    """New figure over old one, in the same unit; None where one of them is none."""
    direction: str
    """``stricter``, ``weaker``, ``same figure`` or empty"""

    @property
    def limit(self) -> Limit:
        """The limit that names the cell."""
        found = self.new or self.old
        assert found is not None
        return found
