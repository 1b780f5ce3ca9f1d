"""A project with ranges from file to verdict, and without them as before."""

from __future__ import annotations

from pathlib import Path

import pytest

from envcheck import pipeline
from envcheck.model.judged import Line

ROOT = Path(__file__).parent.parent.parent

STARTER = (ROOT / "projects" / "starter" / "starter.yaml").read_text(encoding="utf-8")
XPS_LAYER = "{kind: material, title: XPS, material: xps, thickness: 1 in}"


def wall(folder: Path, layer: str) -> Line:
    """The wall's line with its board typed so."""
    path = folder / "room.yaml"
    materials = (
        "materials:\n  foam: {title: Foam, conductivity: 0.030 +- 0.010 W/(m*K), "
        "class: insulation, source: label}\n  band: {title: Foam, conductivity: 0.030 W/(m*K), "
        "class: insulation, range: class_band, source: label}\nassemblies:\n"
    )
    text = STARTER.replace(XPS_LAYER, layer).replace("assemblies:\n", materials, 1)
    path.write_text(text, encoding="utf-8")
    run = pipeline.run(str(path), (str(ROOT / "rules"),))
    return next(line for line in run.judged.lines if line.element == "S-W1")


def board(material: str, thickness: str) -> str:
    return f"{{kind: material, title: XPS, material: {material}, thickness: {thickness}}}"


@pytest.mark.parametrize(
    ("layer", "verdict"),
    [
        (board("foam", "1 in"), "pass"),  # U 0.043 to 0.050 against 0.052
        (board("foam", "0.5 in"), "too_close"),  # U 0.049 to 0.054
        (board("foam", "0.25 in +- 1/16 in"), "fail"),
        (board("band", "0.5 in"), "too_close"),
    ],
)
def test_the_limit_inside_the_range_is_too_close(tmp_path: Path, layer: str, verdict: str) -> None:
    line = wall(tmp_path, layer)
    assert line.verdict == verdict
    assert line.range_low is not None and line.range_high is not None
    assert line.range_low.compared <= line.comparison.compared <= line.range_high.compared
    holds = (line.range_low.within, line.range_high.within)
    assert (
        holds == {"pass": (True, True), "too_close": (True, False), "fail": (False, False)}[verdict]
    )


def test_a_line_without_ranges_has_none(tmp_path: Path) -> None:
    line = wall(tmp_path, XPS_LAYER)
    assert line.range_low is None
    assert line.solved.ranged is None
