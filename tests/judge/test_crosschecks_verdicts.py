"""Verdicts that hang on the method or on rounding; editions; claims; the registry."""

from __future__ import annotations

from datetime import date

import pytest

from envcheck.judge.crosschecks import checks, findings
from envcheck.model.judged import PathResult
from envcheck.model.project import ExceptionClaim
from tests.changed import changed
from tests.judge import crosscheck_models as m


def hangs(*lines, refused=("parallel_path",)):
    elements = tuple(m.element(line.element) for line in lines)
    answer = m.solved(m.u(0.0647), setting=m.setting("cavity_factor", refused=refused))
    lines = tuple(changed(line, solved=answer) for line in lines)
    return m.run("hangs-on-method", m.facts((m.assembly(),), elements, lines=lines))


def flagged(tag="N-W1", verdict="fail", value=0.0647, low=0.0586, high=0.0587, **more):
    return m.line(
        tag,
        verdict,
        comparison=m.comparison(value),
        low=m.comparison(low),
        high=m.comparison(high),
        flags=("method",),
        **more,
    )


def test_the_verdict_hangs_on_the_method_said_once_for_an_assembly():
    (found,) = hangs(flagged("N-W1"), flagged("S-W1"))
    assert (found.severity, found.subject) == ("W", "W1")
    assert found.seen == (
        "N-W1 and S-W1: 0.0647 by cavity correction factors, over 0.060; the drawn pieces lie "
        "between 0.0586 and 0.0587, within it"
    )
    assert "cavity correction factors (Table 5); parallel paths not accepted" in found.suggests


def test_a_line_within_its_limit_by_the_prescribed_method_is_no_cause_for_alarm():
    (found,) = hangs(flagged("N-W1", "pass", 0.0590, 0.0500, 0.0700))
    assert found.severity == "N"
    assert found.suggests.startswith(
        "within its limit by cavity correction factors, the method of Table 5, which decides"
    )
    assert found.settles == "nothing, as long as that method stands"


@pytest.mark.parametrize(
    ("verdict", "value", "low", "high", "words"),
    [
        ("pass", 0.0590, 0.0610, 0.0700, "within 0.060; the drawn pieces lie between 0.0610"),
        ("fail", 0.0647, 0.0500, 0.0700, "on both sides of it"),
        ("pass", 0.0590, 0.0610, 0.0700, "beyond it"),
    ],
)
def test_on_which_side_the_bracket_lies(verdict, value, low, high, words):
    (found,) = hangs(flagged("N-W1", verdict, value, low, high))
    assert words in found.seen


def test_no_flag_no_settled_verdict_or_another_path_is_no_finding():
    by_labels = (PathResult("insulation", "pass", "13 + 9ci", "13+9ci", ""),)
    assert not hangs(changed(flagged(), flags=()))
    assert not hangs(flagged(verdict="official_decides"))
    assert not hangs(flagged(verdict="pass", paths=by_labels))
    assert not hangs(flagged(decides=False))


def rounding(value, verdict="pass", **more):
    line = m.line(verdict=verdict, comparison=m.comparison(value, "0.052", rounding=True), **more)
    given = m.facts((m.assembly(),), (m.element(),), lines=(line,))
    return m.run("within-by-rounding", given)


def test_within_by_rounding_only():
    (found,) = rounding(0.05209)
    assert (found.severity, found.subject) == ("N", "W1")
    assert found.seen == "N-W1: 0.05209 unrounded, over 0.052; 0.052 as compared"
    assert found.suggests == "rounded half-up by 1.6"
    assert not rounding(0.0519)
    assert not rounding(0.0520)
    assert not rounding(0.0526, "fail")
    assert not rounding(0.05209, group="mean")


def superseded(*chain, decides=True, on=date(2026, 3, 2)):
    rules = m.ruleset(chain=chain)
    choices = (m.RuleSetChoice("x", decides, 1),)
    given = m.facts(rules=rules, rule_sets=choices, permit_application_date=on)
    return m.run("edition-superseded", given)


def test_a_superseded_edition_and_one_to_come():
    old = m.edition("x", False, effective_until=date(2025, 7, 1))
    new = m.edition("x", False, effective_from=date(2027, 1, 1))
    (before,) = superseded(old)
    (after,) = superseded(new)
    assert (before.severity, before.subject) == ("E", "x")
    assert before.seen == (
        "permit application of 2026-03-02; Ordinance 2025 was in force until 2025-07-01"
    )
    assert after.seen.endswith("is in force only from 2027-01-01")


def test_an_amendment_or_a_draft_out_of_its_dates_is_a_note():
    late = m.edition("town", False, effective_from=date(2027, 1, 1))
    (found,) = superseded(m.edition(), late)
    assert (found.severity, found.subject) == ("N", "town")
    assert found.suggests == "the amendment is not applied"
    (draft,) = superseded(changed(late, id="x"), decides=False)
    assert draft.severity == "N"


def test_editions_in_force_or_without_a_date_to_test():
    assert not superseded(m.edition(), m.edition("town"))
    assert not superseded(m.edition("x", False), on=None)


def claimed(evidence, found):
    claim = ExceptionClaim("N-W1", "7.2", "owner", "protected", evidence, found, 1)
    given = m.facts((m.assembly(),), (m.element(),), exceptions=(claim,))
    return given, m.run("exception-without-evidence", given)


def test_a_claim_without_evidence():
    _, (none,) = claimed("", False)
    _, (gone,) = claimed("evidence/order.txt", False)
    assert (none.severity, none.subject, none.sheet) == ("E", "N-W1", "A-201")
    assert none.seen.endswith("claimed by owner: no evidence is named")
    assert gone.seen.endswith("evidence/order.txt is not in the project's folder")
    assert claimed("evidence/order.txt", True)[1] == []


def test_an_answer_goes_with_its_finding():
    given, _ = claimed("", False)
    answers = (("exception-without-evidence N-W1", "order follows by mail"),)
    answered = changed(given, project=changed(given.project, accepted=answers))
    (found,) = findings(answered)
    assert found.answered == "order follows by mail"


def test_every_check_has_an_id_of_its_own_and_a_title():
    ids = [check.id for check in checks()]
    assert len(set(ids)) == len(ids) > 0
    assert all(check.title for check in checks())


def test_nothing_is_found_in_a_clean_project():
    wall = m.assembly("W1", "0.049 Btu/(h*ft2*degF)", layers=(m.insulation(0.06), m.stud()))
    answer = m.solved(m.u(0.0489))
    line = m.line(verdict="pass", solved=answer, comparison=m.comparison(0.0489))
    elements = (m.element(surface="North"),)
    given = m.facts((wall,), elements, (m.surface(),), (line,), (answer,))
    assert findings(given) == ()
