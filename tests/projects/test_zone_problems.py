"""A zone that no rule set knows is a slip of the file, said with its line."""

from __future__ import annotations

from pathlib import Path

import pytest

from envcheck.errors import InputError
from envcheck.pipeline import run
from tests.projects.test_unknowns import PERMIT, ROOT, spoilt_rules


@pytest.mark.parametrize(
    ("old", "new", "words"),
    [
        ("zone: V3w", "zone: V33", "the zone of the site is not known"),
        ("rule_set: quill", "rule_set: quil", "did you mean 'quillhaven-2025-3'?"),
    ],
)
def test_unknown_zone(tmp_path: Path, old: str, new: str, words: str) -> None:
    path = tmp_path / "p.yaml"
    path.write_text(PERMIT.replace(old, new, 1), encoding="utf-8")
    line = next(n for n, text in enumerate(PERMIT.splitlines(), 1) if old in text)
    with pytest.raises(InputError) as error:
        run(str(path), [str(ROOT / "rules")])
    (found,) = error.value.problems
    assert (found.kind.id, found.line) == ("unknown-zone", line)
    assert words in str(found)


def test_the_zone_follows_from_the_site_by_criteria_and_its_trail_says_how(tmp_path: Path) -> None:
    rules = spoilt_rules(
        tmp_path,
        "merrow-2025/ruleset.yaml",
        "members: {V3 and V2w: [V3, V2w]}",
        "members: {V3 and V2w: [V3, V2w, 5A]}\n  criteria: ashrae_169_2006",
    )
    path = tmp_path / "p.yaml"
    stated = next(line for line in PERMIT.splitlines() if line.strip().startswith("zones:"))
    facts = "  climate: {source: airport, mean_temperature: 9 degC, annual_precipitation: 900 mm,"
    facts += " marine: false}\n  cdd50: 2900"
    assert "hdd65: 4870" in PERMIT
    text = PERMIT.replace("hdd65: 4870", "hdd65: 6000")
    path.write_text(text.replace(stated, facts), encoding="utf-8")
    done = run(str(path), [rules])
    (why,) = {w for n in done.judged.lines for step, _, w in n.trail if step == "zone"}
    assert why.startswith("5A by ashrae_169_2006 from HDD18 3333 and CDD10 1611 K d: zone 5, moist")
    path.write_text(text.replace(stated, f"  zones: [{{zone: V4}}]\n{facts}"), encoding="utf-8")
    done = run(str(path), [rules])
    (found,) = [f for f in done.judged.findings if f.check == "zone-differs"]
    assert found.severity == "W" and "V4; ashrae_169_2006 gives 5A" in found.seen
