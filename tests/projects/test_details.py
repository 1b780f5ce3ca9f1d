"""A drawn detail in a whole run: value, verdict between its bounds, findings, pages; invented."""

from __future__ import annotations

import json
from pathlib import Path

import pytest
from jsonschema import Draft202012Validator

from envcheck.__main__ import main
from envcheck.pipeline import Run, run
from envcheck.report import explain
from envcheck.solve.detail import solve_detail

ROOT = Path(__file__).parent.parent.parent
CORNER = (ROOT / "tests" / "cases" / "sound" / "corner.yaml").read_text(encoding="utf-8")
RULES = [str(ROOT / "rules")]
U = 1.0 / (0.04 + 0.1 / 0.035 + 0.2 / 0.8 + 0.13)


def ran(folder: Path, *changes: tuple[str, str]) -> Run:
    text = CORNER
    for old, new in changes:
        assert text.count(old) >= 1
        text = text.replace(old, new, 1)
    file = folder / "project.yaml"
    file.write_text(text, encoding="utf-8")
    return run(str(file), RULES)


def test_psi_times_length_enters_the_value(tmp_path: Path) -> None:
    made = ran(tmp_path)
    solved = made.solved["W1"]
    assert solved.value is not None and solved.low is not None
    psi = (solved.value - U) * 40.0 / 6.0
    detail = solve_detail(made.project.details["D1"])
    assert psi == pytest.approx(detail.psi_high, rel=1e-6)  # the high end, which is less negative
    assert -0.0708 < detail.psi_low < detail.psi_high < -0.0704
    assert solved.high == pytest.approx(solved.value)
    assert 0 < solved.value - solved.low < 1e-4
    assert solved.value - solved.low == pytest.approx(solved.unsure)
    assert made.exit_status == 0


def test_a_limit_between_the_bounds_of_psi_is_too_close(tmp_path: Path) -> None:
    """The by-law rounds to two decimals: .305 is the least that is over .30."""
    solved = ran(tmp_path).solved["W1"]
    assert solved.value is not None
    per_metre = (solved.value - solved.unsure / 2.0 - U) / 6.0
    length = (0.305 - U) / per_metre
    for factor, verdict, status in ((1.0, "too_close", 3), (0.98, "fail", 1), (1.02, "pass", 0)):
        made = ran(tmp_path, ("length: 6 m", f"length: {length * factor:.9f} m"))
        (line,) = made.judged.lines
        assert (line.verdict, made.exit_status) == (verdict, status)
        assert ("between the bounds of its bridges" in " ".join(line.reasons)) is (factor == 1.0)


def checks(made: Run) -> list[str]:
    return [finding.check for finding in made.judged.findings]


def test_findings_of_a_detail(tmp_path: Path) -> None:
    assert not set(checks(ran(tmp_path))) & {"flank-differs", "flank-length", "cut-too-near"}
    thin = ran(tmp_path, ("thickness: 100 mm", "thickness: 120 mm"))
    (finding,) = [f for f in thin.judged.findings if f.check == "flank-differs"][:1]
    # .1 / .035 + .25 = 3.107 drawn; .12 / .035 + .25 = 3.679 in the assembly: 15.5 % less
    assert finding.subject == "D1 W1"
    assert "3.11" in finding.seen and "3.68" in finding.seen and "-16 %" in finding.seen
    inside = ran(tmp_path, ("cut: right, length: 1.7 m", "cut: right, length: 1.4 m"))
    assert checks(inside).count("flank-length") == 1
    near = CORNER.replace("2 m]", "700 mm]").replace("length: 1.7 m", "length: 0.4 m")
    (tmp_path / "near.yaml").write_text(near, encoding="utf-8")
    found = run(str(tmp_path / "near.yaml"), RULES).judged.findings
    assert [f.check for f in found if f.check == "cut-too-near"] == ["cut-too-near"]


def test_a_psi_that_cannot_be_solved_leaves_the_line_open(
    tmp_path: Path, monkeypatch: pytest.MonkeyPatch
) -> None:
    from envcheck.solve import detail

    def refuse(of: object, surfaces: bool = False) -> None:
        raise detail.NotSolved("the heat balance does not close")

    monkeypatch.setattr(detail, "solve_detail", refuse)
    (line,) = ran(tmp_path).judged.lines
    assert line.verdict == "not_decided"
    assert "psi of the detail 'D1': the heat balance does not close" in line.reasons[0]


def explained(folder: Path, capsys: pytest.CaptureFixture[str], subject: str, *more: str) -> str:
    (folder / "p.yaml").write_text(CORNER, encoding="utf-8")
    path = str(folder / "p.yaml")
    assert main(["explain", path, subject, "--rules", RULES[0], *more]) == 0
    return " ".join(capsys.readouterr().out.split())


def test_the_page_of_a_detail(tmp_path: Path, capsys: pytest.CaptureFixture[str]) -> None:
    text = explained(tmp_path, capsys, "D1")
    for words in (
        "L2D 0.997",
        "psi -0.070",
        "by outside dimensions",
        "f_Rsi = (Tsi - Te) / (Ti - Te) = 0.860",
        "x = 600 mm, y = 600 mm",
        "0.25 m2 K/W inside",
        "15.8 degC between air of -10.0 degC and 20.0 degC",
        "not bounded",
        "W1 right 3.107 0.30514 1.7 1.7 1.4 100",
    ):
        assert words in text, (words, text)
    given = json.loads(explained(tmp_path, capsys, "D1", "--format", "json"))
    schema = Path(explain.__file__).parent / "schemas" / "explain.schema.json"
    validator = Draft202012Validator(json.loads(schema.read_text(encoding="utf-8")))
    assert list(validator.iter_errors(given)) == []
    assert given["detail"]["psi_low"] < given["detail"]["psi_high"] < -0.0704
    assert given["detail"]["coldest"]["factor"] == pytest.approx(0.860, abs=5e-4)
    assert "Btu/(h ft F)" in explained(tmp_path, capsys, "D1", "--units", "IP")


def test_the_page_of_a_plain_wall_has_its_factor(
    tmp_path: Path, capsys: pytest.CaptureFixture[str]
) -> None:
    """ISO 13788: f = 1 - U Rsi with Rsi .25: R = .04 + 2.857 + .25 = 3.147, f = .9264."""
    text = explained(tmp_path, capsys, "N-W1")
    (wall,) = json.loads(explained(tmp_path, capsys, "N-W1", "--format", "json"))["assemblies"]
    assert wall["coldest"]["factor"] == pytest.approx(1 - 0.25 / (0.04 + 0.1 / 0.035 + 0.5))
    assert wall["coldest"]["x"] is None
    assert "f_Rsi = (Tsi - Te) / (Ti - Te) = 0.926" in text
    assert "layers in series" in text


def test_the_list_of_bridges_names_the_detail(
    tmp_path: Path, capsys: pytest.CaptureFixture[str]
) -> None:
    (tmp_path / "p.yaml").write_text(CORNER, encoding="utf-8")
    main(["check", str(tmp_path / "p.yaml"), "--rules", RULES[0], "--format", "html"])
    text = capsys.readouterr().out
    assert "psi of the detail D1, in the worksheet" in text
    assert "psi 0 W" not in text


def test_framed_and_other_assemblies_say_what_they_can(
    capsys: pytest.CaptureFixture[str],
) -> None:
    project = str(ROOT / "projects/brannvik-warehouse/renovation.yaml")
    assert main(["explain", project, "S7"]) == 0
    cheek = capsys.readouterr().out
    assert "f_Rsi" in cheek and "x = " in cheek
    assert main(["explain", str(ROOT / "projects/starter/starter.yaml"), "G1"]) == 0
    assert "f_Rsi" not in capsys.readouterr().out
