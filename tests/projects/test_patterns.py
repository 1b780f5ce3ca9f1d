"""Twenty-five error patterns of submittals: each bad project is caught, each good one is not.

The patterns are common practice of plan review (no source); projects and rule sets are invented.
"""

from __future__ import annotations

from pathlib import Path
from typing import Any

import pytest

from envcheck.errors import InputError
from envcheck.judge import crosschecks
from envcheck.judge.crosschecks.plausible import INSULATION
from envcheck.model.judged import CERTAIN, LIKELY, LOOK
from envcheck.pipeline import run
from envcheck.read.materials import class_band
from tests.projects.patterns import FOLDER, judged, patterns, printed

BAD = [
    pytest.param(each.folder, name, expected, id=f"{each.number:02}-{name}")
    for each in patterns()
    for name, expected in each.bad.items()
]
GOOD = [
    pytest.param(each.folder, name, id=f"{each.number:02}-{name}")
    for each in patterns()
    for name in each.good
]


def test_every_pattern_has_a_good_and_a_bad_project_and_every_file_is_expected() -> None:
    assert [each.number for each in patterns()] == list(range(1, 26))
    for each in patterns():
        files = {path.stem for path in each.folder.glob("*.yaml")} - {"expect"}
        assert files == {*each.good, *each.bad}
        assert {"good", "bad"} <= files


@pytest.mark.parametrize(("folder", "name"), GOOD)
def test_good_projects_give_no_finding(folder: Path, name: str) -> None:
    done = judged(folder, name)
    assert done.judged.findings == ()
    assert done.exit_status == 0


@pytest.mark.parametrize(("folder", "name", "expected"), BAD)
def test_bad_projects_are_caught(folder: Path, name: str, expected: dict[str, Any]) -> None:
    assert printed(folder, name, expected), "check does not print it"
    if "error" in expected:
        with pytest.raises(InputError) as caught:
            judged(folder, name)
        assert [problem.kind.id for problem in caught.value.problems] == [expected["error"]]
        return
    done = judged(folder, name)
    if "line" in expected:
        line = next(x for x in done.judged.lines if x.element == expected["line"])
        assert line.verdict == expected["verdict"]
        assert any(expected["says"] in reason for reason in line.reasons), line.reasons
        assert done.exit_status in (1, 3)
        return
    (found,) = (f for f in done.judged.findings if f.check == expected["finding"])
    assert (found.subject, found.severity, found.sure) == (
        expected["subject"], expected["severity"], expected["sure"],
    )  # fmt: skip
    assert found.seen and found.suggests and found.settles and found.title
    assert done.exit_status in ((1, 3) if found.unsettled else (0, 1))


def test_no_bad_project_gives_a_finding_that_nobody_expects() -> None:
    for each in patterns():
        for name, expected in each.bad.items():
            if "error" not in expected:
                found = {finding.check for finding in judged(each.folder, name).judged.findings}
                assert found <= {expected.get("finding")}, (each.number, name)


def test_how_sure_a_finding_is_has_three_words() -> None:
    assert {check.sure for check in crosschecks.checks()} == {CERTAIN, LIKELY, LOOK}


def test_the_band_of_insulation_is_that_of_the_data() -> None:
    assert class_band("insulation") == INSULATION


def test_a_finding_never_changes_a_figure(monkeypatch: pytest.MonkeyPatch) -> None:
    projects = [
        (each.folder, name)
        for each in patterns()
        for name, expected in each.bad.items()
        if "error" not in expected
    ]
    before = [judged(*project) for project in projects]
    monkeypatch.setattr(crosschecks, "findings", lambda facts: ())
    for (folder, name), done in zip(projects, before, strict=True):
        again = run(str(folder / f"{name}.yaml"))
        assert again.judged.lines == done.judged.lines
        assert again.judged.groups == done.judged.groups
        assert again.judged.ratios == done.judged.ratios


def test_an_answer_settles_a_finding_and_stands_beside_it(tmp_path: Path) -> None:
    text = (FOLDER / "15-semi-heated-claimed" / "bad-missing.yaml").read_text("utf-8")
    text += "answers: [{finding: space-class-unproved, subject: N-W1, answer: see M-101}]\n"
    (tmp_path / "p.yaml").write_text(text, "utf-8")
    done = run(str(tmp_path / "p.yaml"), [str(FOLDER / "rules")])
    (found,) = done.judged.findings
    assert found.answered == "see M-101" and done.exit_status == 0
