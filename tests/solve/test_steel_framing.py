"""Steel framing by the rule set's coefficients: rows found, rows missing, sums by hand.

Coefficients are numbers of North American codes from memory: cavity factor .46 for R-13 at 16 in
(steel-stud table of the model codes), R-0.79 for an empty cavity (ANSI/ASHRAE/IES 90.1 Appendix A).
The walls are invented.
"""

from __future__ import annotations

import pytest

from envcheck.model.project import AirSpaceLayer, Fill, FramedLayer, Layer, Member, Profile
from envcheck.model.ruleset import Conventions, TableRow
from envcheck.read.rule_conventions import WEIGHTS as READ
from envcheck.solve.methods.weighted import WEIGHTS, bre_weight
from tests.changed import changed
from tests.solve.drawn import solved
from tests.solve.samples import (
    INCH,
    R_IP,
    STEEL,
    U_IP,
    WOOD,
    XPS,
    assert_recomputes,
    framed,
    plane,
    stated,
)

DEPTH, SPACING = 3.625 * INCH, 16 * INCH
C_STUD = Profile("C 3-5/8 in, 43 mil", DEPTH, 1.625 * INCH, 0.0451 * INCH, 0.5 * INCH)
MEMBER = Member(STEEL, 1.625 * INCH, SPACING, C_STUD)
LABELLED = Fill(label=13 * R_IP, source="label", evidence="label")
STUDS = framed("steel studs", DEPTH, MEMBER, LABELLED)
GYPSUM = stated("gypsum", 0.56 * R_IP)
FILMS = {"outside_film": 0.17 * R_IP, "inside_film": 0.68 * R_IP}


def row(table: str, value: float, **keys: float | str) -> TableRow:
    return TableRow(table, dict(keys), value, "", "Table 7")


FACTORS = Conventions(
    tables={
        "cavity_factors": (
            row("cavity_factors", 0.55, label=13 * R_IP, depth=DEPTH, spacing=24 * INCH),
            row("cavity_factors", 0.46, label=13 * R_IP, depth=DEPTH, spacing=SPACING),
        ),
        "effective_layers": (
            row("effective_layers", 0.79 * R_IP, label=0.0, depth=DEPTH, spacing=SPACING),
            row("effective_layers", 6.0 * R_IP, label=13 * R_IP, depth="", spacing=SPACING),
        ),
    }
)


# Hand sums: .17 + .56 + .46 x 13 + .56 + .68 = 7.95, and XPS of R-5 per inch.
@pytest.mark.parametrize(("xps", "printed"), [(0.0, 0.1258), (1.5, 0.0647), (2.5, 0.0489)])
def test_cavity_factor_by_hand(xps: float, printed: float) -> None:
    layers: list[Layer] = [GYPSUM, STUDS, GYPSUM]
    if xps:
        layers.insert(0, plane("XPS", XPS, xps * INCH))
    found = solved(layers, "cavity_factor", FACTORS, **FILMS)
    assert found.value is not None
    assert found.value / U_IP == pytest.approx(1 / (7.95 + 5 * xps))
    assert found.value / U_IP == pytest.approx(printed, abs=5e-5)
    assert_recomputes(found.steps)
    (step,) = (step for step in found.steps if "corrected for the steel" in step.title)
    assert step.source == "Table 7"
    said = "steel framing counted by the rule set's coefficient"
    assert [said in layer.note for layer in found.counted] == [False] * (2 if xps else 1) + [
        True,
        False,
    ]


def test_bracket_is_that_of_the_drawn_studs() -> None:
    found = solved([GYPSUM, STUDS, GYPSUM], "cavity_factor", FACTORS, **FILMS)
    drawn = solved([GYPSUM, STUDS, GYPSUM], "two_dimensional", **FILMS)
    assert (found.low, found.high) == (drawn.low, drawn.high)
    assert found.low is not None
    assert found.high is not None
    assert found.low < found.high
    assert not found.decided_by_bracket


def test_effective_layer_by_hand() -> None:
    found = solved([GYPSUM, STUDS, GYPSUM], "effective_layer", FACTORS, **FILMS)
    assert found.value is not None
    assert found.value / U_IP == pytest.approx(1 / (0.17 + 0.56 + 6.0 + 0.56 + 0.68))
    assert_recomputes(found.steps)


def test_empty_cavity_is_the_row_of_label_0() -> None:
    # Hand sum: .17 + .56 + .79 + .56 + .68 = 2.76.
    air = AirSpaceLayer("air-space", "air", 1, DEPTH, "unventilated", (0.9, 0.9))
    empty = framed("steel studs", DEPTH, MEMBER, Fill(air=air))
    found = solved([GYPSUM, empty, GYPSUM], "effective_layer", FACTORS, **FILMS)
    assert found.value is not None
    assert found.value / U_IP == pytest.approx(1 / 2.76)


@pytest.mark.parametrize("method", ["cavity_factor", "effective_layer"])
@pytest.mark.parametrize(
    ("layer", "words"),
    [
        (framed("studs", DEPTH, MEMBER, Fill(label=15 * R_IP)), ("label R-15", "spacing 16 in")),
        (framed("studs", DEPTH, MEMBER._replace(spacing=12 * INCH), LABELLED),
         ("label R-13", "2.29 m2 K/W", "spacing 12 in", "0.305 m")),
    ],
)  # fmt: skip
def test_missing_row_names_label_and_spacing(
    method: str, layer: FramedLayer, words: tuple[str, ...]
) -> None:
    found = solved([layer], method, FACTORS)
    assert found.value is None
    (missing,) = found.missing
    table = "cavity factors" if method == "cavity_factor" else "effective layers"
    assert table in missing
    assert "'studs'" in missing
    assert all(word in missing for word in words)
    assert found.low is not None


@pytest.mark.parametrize(
    ("changes", "found"),
    [
        ({"thickness": 3.5 * INCH}, True),  # nominal sizes: within 4 mm
        ({"thickness": 3.4 * INCH}, False),
        ({"fill": Fill(label=13.1 * R_IP)}, True),  # within 1 %
        ({"fill": Fill(label=13.2 * R_IP)}, False),
        ({"member": MEMBER._replace(spacing=0.408)}, True),  # within 2 mm
        ({"member": MEMBER._replace(spacing=0.409)}, False),
    ],
)
def test_how_near_a_row_must_be(changes: dict[str, object], found: bool) -> None:
    thin = C_STUD._replace(web=3.3 * INCH)
    layer = STUDS._replace(**{"member": MEMBER, **changes})
    layer = layer._replace(member=layer.member._replace(profile=thin))
    missing = solved([layer], "cavity_factor", FACTORS).missing
    assert bool(missing) is not found


def test_no_table_at_all() -> None:
    (missing,) = solved([STUDS], "cavity_factor").missing
    assert missing.startswith("a row of the rule set's cavity factors for 'steel studs'")


def test_without_steel_the_paths_decide_and_it_is_said() -> None:
    wood = framed("wood studs", 0.1, Member(WOOD, 0.045, 0.6), LABELLED)
    found = solved([wood], "cavity_factor", FACTORS)
    assert found.value == pytest.approx(found.low)
    assert "no steel framing found in this assembly: layers wired as parallel paths" in (
        found.assumptions
    )


def test_parallel_paths_are_no_result_for_steel() -> None:
    found = solved([GYPSUM, STUDS], "parallel_path")
    assert found.value is None
    assert found.missing == (
        "a method other than parallel paths, which are not accepted as a result for steel framing "
        "('steel studs')",
    )
    assert found.steps == ()
    assert found.low is not None


# ------------------------------------------------------------------------- weighted rules

WALL = [plane("XPS", XPS, INCH), STUDS, GYPSUM]
BARE = [GYPSUM, STUDS, GYPSUM]


def test_the_reader_knows_the_weights_that_are_computed() -> None:
    assert set(READ) == set(WEIGHTS)


def test_weight_of_bre_digest_465_by_hand() -> None:
    # From memory: p = 0.8 Rmin/Rmax + 0.44 - 0.1 (w/40) - 0.2 (600/s) - 0.04 (d/100). With
    # Rmin/Rmax = 0.5, w = 40, s = 600, d = 100 mm: 0.4 + 0.44 - 0.1 - 0.2 - 0.04 = 0.5.
    assert bre_weight(0.5, 0.040, 0.600, 0.100) == pytest.approx(0.5)
    # w = 50, s = 400, d = 150: 0.4 + 0.44 - 0.125 - 0.3 - 0.06 = 0.355.
    assert bre_weight(0.5, 0.050, 0.400, 0.150) == pytest.approx(0.355)


def test_steel_studs_by_bre_digest_465() -> None:
    found = solved(WALL, "weighted", **FILMS, weight="bre_465")
    assert found.low is not None and found.high is not None and found.value is not None
    upper, lower = 1 / found.low, 1 / found.high
    p = bre_weight(lower / upper, 1.625 * INCH, SPACING, DEPTH)
    assert 0 < p < 1
    assert 1 / found.value == pytest.approx(p * upper + (1 - p) * lower)
    assert_recomputes(found.steps)
    assert "BRE Digest 465" in next(s for s in found.steps if s.symbol == "p").source


def test_bre_digest_465_is_for_steel_studs_at_a_spacing() -> None:
    wood = framed("studs", DEPTH, Member(WOOD, 0.038, SPACING), LABELLED)
    found = solved([GYPSUM, wood], "weighted", weight="bre_465")
    assert found.value is None
    assert "one layer of steel studs at a spacing" in found.missing[0]


def test_a_weight_that_is_no_weight_is_not_decided() -> None:
    wide = changed(C_STUD, flange=0.15)
    member = changed(MEMBER, width=0.15, profile=wide)
    found = solved([framed("wide", DEPTH, member, LABELLED)], "weighted", weight="bre_465")
    assert found.value is None and "no weight between 0 and 1" in found.missing[0]


# Weights of Canada's National Building Code, 9.36, for steel framing (from memory): .33 without and
# .40 with insulating sheathing below 500 mm of spacing, .50 from 500 mm on.
NBC = Conventions(
    tables={
        "weights": (
            row("weights", 0.33, spacing_up_to=0.499, continuous_insulation="no"),
            row("weights", 0.40, spacing_up_to=0.499, continuous_insulation="yes"),
            row("weights", 0.50, spacing_over=0.499, continuous_insulation="yes"),
        )
    }
)


@pytest.mark.parametrize(
    ("layers", "spacing", "weight"),
    [(BARE, SPACING, 0.33), (WALL, SPACING, 0.40), (WALL, 24 * INCH, 0.50)],
)
def test_weights_by_build_up(layers: list[Layer], spacing: float, weight: float) -> None:
    studs = changed(STUDS, member=changed(MEMBER, spacing=spacing))
    found = solved([layers[0], studs, layers[2]], "weighted", NBC, **FILMS, weight="table")
    assert found.low is not None and found.high is not None and found.value is not None
    expected = weight / found.low + (1 - weight) / found.high
    assert 1 / found.value == pytest.approx(expected)
    assert_recomputes(found.steps)


def test_a_build_up_that_the_table_does_not_print_is_not_decided() -> None:
    studs = changed(STUDS, member=changed(MEMBER, spacing=24 * INCH))
    found = solved([GYPSUM, studs, GYPSUM], "weighted", NBC, weight="table")
    assert found.value is None
    assert "spacing 610 mm, without continuous insulation" in found.missing[0]
