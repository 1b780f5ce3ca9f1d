"""A stated climate zone against the criteria that the rule set names."""

from __future__ import annotations

from collections.abc import Iterator

from envcheck.judge.crosschecks import Check, Facts
from envcheck.judge.zones import contradicted
from envcheck.model.judged import LOOK, Finding


def zone_differs(facts: Facts) -> Iterator[Finding]:
    """A stated zone is used, even where the site's own facts give another one."""
    for ruleset in facts.rulesets.values():
        found = contradicted(ruleset, facts.project.site)
        if found is not None:
            stated, criteria = found
            yield Finding(
                "zone-differs",
                "W",
                ruleset.id,
                "",
                f"the project's zone is {stated}; {criteria.criteria} gives {criteria.zone}: "
                f"{criteria.why}",
                "a published list of places stands above the criteria, and some places disagree "
                "with them; the stated zone is used",
                "the list of places that names the zone, or the degree days and rain of the site",
            )


CHECKS = (Check("zone-differs", "Stated zone and climate criteria disagree", zone_differs, LOOK),)
