"""Ratings beside a figure, several figures, factors on the design's value, labelled values alone.

The rule set and the project are invented.
"""

from __future__ import annotations

from pathlib import Path

import pytest

from envcheck import pipeline
from envcheck.model.judged import Line

RULES = """ruleset: town
document: {title: Invented, edition: "1"}
jurisdiction: nowhere
effective: {from: 2020-01-01, date_tested: permit application}
units: {U: W/(m2.K), R: (m2.K)/W}
decimal: "."
dimensions: {overhang: {values: [yes, no]}, light: {values: [yes, no], default: no}}
other_metrics: {WER: {limit: band_or_better}, ER: {limit: min}}
bands: {WER: [A+, A, B, C]}
tables:
  - {id: T1, file: t.csv, clause: Table 1, orientation: none, heads: {Limit: {}}, rows: {
     fixed: {element: fenestration.fixed, metric: U_product},
     operable: {element: fenestration.operable, metric: U_product},
     shgc: {element: fenestration.fixed, metric: SHGC},
     door.swinging: {metric: U_product},
     wall.mass: {metric: R_total},
     wall.wood_frame: {metric: R_insulation, plus: [cavity, ci]}}}
notes: {T1: {a: {effect: alternative, cell: "1.6", text: as printed}}}
adjustments: [{clause: "7", of: SHGC, factors: [{factor: "0.8", when: {overhang: yes}}]}]
sources: {P: {what: invented}}
"""
SHEET = """row,label,Limit,src
fixed,Fixed,1.4 or WER B,P
operable,Operable,1.4 or ER 34,P
shgc,Gain,0.40,P
door.swinging,Door,1.4[a],P
wall.mass,Mass wall,2.0,P
wall.wood_frame,Wood-framed wall,2.5,P
"""
PROJECT = """envcheck: 1
project: {title: Invented, permit_application_date: 2025-03-02}
site: {place: Nowhere}
rule_sets: [town]
materials:
  wool: {title: wool, conductivity: 0.040 W/(m*K), density: 30 kg/m3, specific_heat: 1030 J/(kg*K),
         class: insulation, source: invented, evidence: assumed}
assemblies:
  G: {title: Glass, sheet: A-1, kind: rated, u_factor: UFACTOR W/(m2*K), shgc: 0.45,
      basis: whole_product, evidence: label}
  W: {title: Wall, sheet: A-1, layers: [
      {kind: material, title: wool, material: wool, thickness: 100 mm}]}
elements:
  E1: {assembly: ASSEMBLY, category: CATEGORY, sheet: A-2, net_area: 10 m2, facts: {FACTS}}
"""


def lines(
    folder: Path, category: str, assembly: str = "G", u: str = "1.50", facts: str = ""
) -> dict[str, Line]:
    town = folder / "rules" / "town"
    town.mkdir(parents=True, exist_ok=True)
    (town / "ruleset.yaml").write_text(RULES, encoding="utf-8")
    (town / "t.csv").write_text(SHEET, encoding="utf-8")
    text = PROJECT.replace("UFACTOR", u).replace("ASSEMBLY", assembly)
    text = text.replace("CATEGORY", category).replace("FACTS", facts)
    if not facts:
        text = text.replace(", facts: {}", "")
    path = folder / "project.yaml"
    path.write_text(text, encoding="utf-8")
    return {line.metric: line for line in pipeline.run(str(path)).judged.lines}


@pytest.mark.parametrize(
    ("category", "facts", "verdict", "words"),
    [
        ("fenestration.fixed", "WER: A", "pass", "by WER A, which meets WER B"),
        ("fenestration.fixed", "WER: B", "pass", "by WER B"),
        ("fenestration.fixed", "WER: C", "fail", "WER C is short of WER B"),
        ("fenestration.fixed", "WER: Z", "not_decided", "missing: the WER of E1"),
        ("fenestration.fixed", "", "not_decided", "the cell also offers WER B"),
        ("fenestration.operable", "ER: 34", "pass", "by ER 34"),
        ("fenestration.operable", "ER: 33", "fail", "short of ER 34"),
    ],
)
def test_a_rating_beside_a_figure(
    tmp_path: Path, category: str, facts: str, verdict: str, words: str
) -> None:
    line = lines(tmp_path, category, facts=facts)["U_product"]
    assert line.verdict == verdict and words in "; ".join(line.reasons)


def test_the_figure_itself_comes_first(tmp_path: Path) -> None:
    assert lines(tmp_path, "fenestration.fixed", u="1.40", facts="WER: C")["U_product"].verdict == (
        "pass"
    )


@pytest.mark.parametrize(("u", "verdict"), [("1.5", "pass"), ("1.6", "pass"), ("1.7", "fail")])
def test_of_two_figures_the_easier_is_enough(tmp_path: Path, u: str, verdict: str) -> None:
    line = lines(tmp_path, "door.swinging", u=u)["U_product"]
    assert line.verdict == verdict and line.limit is not None
    assert line.limit.cell == "1.4 or 1.6"


@pytest.mark.parametrize(
    ("facts", "verdict"), [("overhang: yes", "pass"), ("overhang: no", "fail"), ("", "fail")]
)
def test_a_factor_on_the_design_s_own_value(tmp_path: Path, facts: str, verdict: str) -> None:
    line = lines(tmp_path, "fenestration.fixed", facts=facts)["SHGC"]  # 0.45 x 0.8 = 0.36
    assert line.verdict == verdict
    assert line.comparison is not None
    assert line.comparison.value == pytest.approx(0.36 if facts == "overhang: yes" else 0.45)


def test_a_total_resistance_is_one_over_the_u_factor(tmp_path: Path) -> None:
    # 0.100 / 0.040 = 2.5 and ISO 6946 films 0.13 + 0.04: 2.67 m2 K/W, at least 2.0
    line = lines(tmp_path, "wall.mass", "W")["R_total"]
    assert line.verdict == "pass" and line.comparison is not None
    assert line.comparison.value == pytest.approx(2.67, abs=1e-9)
    assert line.comparison.sense == "min"


def test_a_table_of_labelled_values_alone_is_judged(tmp_path: Path) -> None:
    (line,) = lines(tmp_path, "wall.wood_frame", "W").values()
    assert line.metric == "R_insulation" and line.verdict in ("pass", "fail")


MEAN = """averaging:
  - {clause: "8", scope: ["wall.*"], metric: R_total, permits: area_weighted_mean}
"""
TWO = """  E1: {assembly: W, category: wall.mass, sheet: A-2, net_area: 10 m2, mean: all}
  E2: {assembly: W2, category: wall.mass, sheet: A-2, net_area: 30 m2, mean: all, adjoins: ADJOINS}
"""
THIN = """  W2: {title: Thin, sheet: A-1, layers: [
      {kind: material, title: wool, material: wool, thickness: 40 mm}]}
elements:
"""


@pytest.mark.parametrize(
    ("weights", "adjoins", "mean"),
    [
        # U = 1 / 2.67 = 0.374532 and 1 / (0.04 / 0.04 + 0.17) = 0.854701; 10 and 30 m2:
        # R = 1 / ((3.74532 + 25.64103) / 40) = 1.361176
        ("", "outdoors", 1.361176),
        # toward the unheated: inner film on both sides, U2 = 1 / 1.26 = 0.793651, weight 0.5:
        # R = 1 / ((3.74532 + 11.904762) / 25) = 1.597436
        ("[{factor: \"0.5\", for: unheated, when: {adjoins: unheated}}]", "unheated", 1.597436),
        ("[{factor: \"0.5\", for: within 5 m of the edge}]", "outdoors", None),
    ],
)  # fmt: skip
def test_a_mean_of_resistances_is_a_mean_of_heat_flows(
    tmp_path: Path, weights: str, adjoins: str, mean: float | None
) -> None:
    town = tmp_path / "rules" / "town"
    town.mkdir(parents=True)
    rules = RULES + MEAN
    if weights:
        rules = rules.replace("heads: {Limit: {}},", f"heads: {{Limit: {{}}}}, weights: {weights},")
        rules = rules.replace("light: {", "adjoins: {values: [outdoors, unheated]}, light: {")
    (town / "ruleset.yaml").write_text(rules, encoding="utf-8")
    (town / "t.csv").write_text(SHEET, encoding="utf-8")
    head = PROJECT.replace("UFACTOR", "1.5")
    head = head[: head.index("elements:\n")]
    path = tmp_path / "project.yaml"
    path.write_text(head + THIN + TWO.replace("ADJOINS", adjoins), encoding="utf-8")
    found = pipeline.run(str(path)).judged.lines
    if mean is None:
        assert {line.verdict for line in found} == {"not_decided"}
        return
    assert [line.comparison.value for line in found if line.comparison] == pytest.approx([mean] * 2)
