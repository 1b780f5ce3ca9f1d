"""What a verdict hangs on: by hand where it is short, by random corners everywhere."""

from __future__ import annotations

import json
import random
from functools import cache, partial
from pathlib import Path

import pytest

from envcheck import pipeline
from envcheck.__main__ import main
from envcheck.advise.bench import Bench
from envcheck.advise.inputs import Stated, band_row, inputs
from envcheck.judge.compare import compare, own_term
from envcheck.model.judged import Line
from envcheck.model.project import Assembly
from envcheck.model.sure import Sureness
from envcheck.read.materials import rows
from envcheck.units import convert
from tests.advise.test_room import DEMOS, LIBRARY, RULES, changed

QUICK = [name for name in DEMOS if name != "renovation"]
"""Demos without a section in two dimensions, which takes its time for every corner."""
U_IP = "Btu/(h*ft2*degF)"


@cache
def found(path: Path) -> tuple[Sureness, ...]:
    return pipeline.sureness(pipeline.run(str(path), (RULES,)))


def of(tag: str, path: Path, metric: str = "U_assembly") -> Sureness:
    (each,) = (
        x for x in found(path) if any(y.element == tag and y.metric == metric for y in x.lines)
    )
    return each


def test_the_interval_of_the_store_roof_by_hand() -> None:
    """R-5.7 to the inch, 3 in, films 0.78. Conductivity -10 % to +12 %, thickness 5 % either way:
    R = 17.1 x 0.95/1.12 + 0.78 to 17.1 x 1.05/0.9 + 0.78; both ends within 0.060 and settled."""
    each = of("T-R4", LIBRARY / "review.yaml")
    assert each.low is not None and each.high is not None
    assert convert(each.high, U_IP) == pytest.approx(1 / (17.1 * 0.95 / 1.12 + 0.78), rel=1e-4)
    assert convert(each.low, U_IP) == pytest.approx(1 / (17.1 * 1.05 / 0.9 + 0.78), rel=1e-4)
    assert (each.state, each.deciding) == ("settled", ())


def test_the_brick_veneer_hangs_on_its_board_by_hand() -> None:
    """1/(7.95 + 7.5): the board at 0.9 k is R-8.333, U 0.0614, still over 0.0605; only with the
    thickness (5 %: R-8.75) and the boards (15 % of R-0.56 twice) is it 0.0592 and within."""
    each = of("N-W1", LIBRARY / "review.yaml")
    assert [x.what for x in each.deciding] == ["XPS board: conductivity"]
    (board,) = each.deciding
    assert board.effect == pytest.approx(15.45 / (7.95 + 7.5 / 0.9) - 1.0, rel=1e-6)
    assert not board.alone
    assert each.low is not None
    rest = 7.95 + 2 * 0.15 * 0.56 + 7.5 * 1.05
    assert 1 / rest > 0.0605 > convert(each.low, U_IP)
    assert convert(each.low, U_IP) == pytest.approx(1 / (rest + 7.5 * 1.05 / 9), rel=2e-3)
    assert [x.what for x in each.inputs if x.effect is None] == [
        "Steel studs with R-13: spacing",
        "Steel studs with R-13: labelled R",
    ]


@pytest.mark.parametrize("name", QUICK)
def test_with_the_deciding_inputs_as_stated_no_corner_turns_it(name: str) -> None:
    """The others at random ends of their bands never turn the verdict; with one deciding input
    fewer the worst corner does."""
    run = pipeline.run(str(DEMOS[name]), (RULES,))
    bench = pipeline.bench(run)
    rng = random.Random(6)
    tried = 0
    for each in found(DEMOS[name]):
        if each.state == "without":
            continue
        assembly = run.project.assemblies[each.assembly]
        stated = inputs(assembly, rows("evidence_bands"), rows("material_classes"))
        told = dict(zip(stated, each.inputs, strict=True))
        line = each.lines[0]

        within = partial(is_within, bench, line, assembly)
        now = within({})
        varied = [x for x in stated if told[x].effect is not None]
        others = [x for x in varied if told[x] not in each.deciding]
        for _ in range(25):
            assert within({x: rng.choice((x.low, x.now, x.high)) for x in others}) == now, each
        if each.deciding:
            weakest = min(each.deciding, key=lambda x: abs(x.effect or 0.0))
            free = [x for x in varied if told[x] in (*_but(told, each), weakest)]
            corners = [{x: end(x, now, bench, line, assembly) for x in free}]
            assert any(within(corner) != now for corner in corners), each
        tried += 1
    assert tried


def is_within(bench: Bench, line: Line, assembly: Assembly, ends: dict[Stated, float]) -> bool:
    """Whether the line is within its limit with these inputs at these ends."""
    for one, value in ends.items():
        assembly = one.put(assembly, value)
    found = bench.value(line, assembly)
    assert found is not None and line.limit is not None
    ruleset = bench.rulesets[line.ruleset]
    return compare(found, own_term(line.limit), line.limit, ruleset).within


def _but(told: dict[Stated, object], each: Sureness) -> list[object]:
    return [one for one in told.values() if one not in each.deciding]


def end(x: Stated, within: bool, bench: Bench, line: Line, assembly: Assembly) -> float:
    """The end that works against the verdict, found by its value."""
    values = {e: bench.value(line, x.put(assembly, e)) for e in (x.low, x.high)}
    return (max if within else min)(values, key=lambda e: values[e])


def test_stated_ranges_and_class_bands_come_first(tmp_path: Path) -> None:
    source = LIBRARY / "permit.yaml"
    ranged = changed(
        tmp_path,
        "thickness: 4 in}",
        "thickness: 4 +- 0.5 in}",
        source,
    )
    each = of("S-W2", ranged)
    (wool,) = (x for x in each.inputs if x.what == "Mineral wool: thickness")
    assert wool.basis == "stated range"
    assert convert(wool.low, "in") == pytest.approx(3.5)
    text = ranged.read_text("utf-8").replace(
        'source: "label, spec 07 21 13", evidence: label}', "evidence: assumed}"
    )
    ranged.write_text(text, encoding="utf-8")
    each = next(
        x for x in pipeline.sureness(pipeline.run(str(ranged), (RULES,))) if x.assembly == "W2"
    )
    (wool,) = (x for x in each.inputs if x.what == "Mineral wool board: conductivity")
    assert (wool.basis, wool.low, wool.high) == ("class band", 0.015, 0.065)


def test_what_nobody_says_counts_as_assumed() -> None:
    bands = rows("evidence_bands")
    assert band_row(bands, "resistance", "")["evidence"] == "assumed"
    assert band_row(bands, "length", "label")["evidence"] == "*"
    with pytest.raises(KeyError):
        band_row(bands, "colour", "label")


def test_lines_that_another_path_carries_are_left_out() -> None:
    assert of("R-HT1", LIBRARY / "permit.yaml").state == "without"
    assert of("S-E1", LIBRARY / "review.yaml", "SHGC").state == "without"


def test_the_page_and_its_data(capsys: pytest.CaptureFixture[str]) -> None:
    path = str(LIBRARY / "review.yaml")
    assert main(["sure", path, "W1", "N-D1"]) == 0
    page = capsys.readouterr().out
    assert "Decided by 1 of 12 inputs; only it needs a document." in page
    assert "XPS board: conductivity (A-501/1): label, spec 07 21 13" in page
    assert "N-D1 (A-201): within (1 input)" in " ".join(page.split()).replace(", E-D1 (A-203)", "")
    assert "common practice, no source" in page
    assert main(["sure", path, "W1", "--format", "json"]) == 0
    (data,) = json.loads(capsys.readouterr().out)["lines"]
    assert data["deciding"] == ["XPS board: conductivity"]
    assert len(data["inputs"]) == 12
