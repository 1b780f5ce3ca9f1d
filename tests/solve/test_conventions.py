"""From element and rule set to a setting: direction, films, method, and the words for each."""

from __future__ import annotations

import pytest
from hypothesis import given
from hypothesis import strategies as st

from envcheck.model.project import AirSpaceLayer, Assembly, Element, Fill, Layer, MasonryLayer
from envcheck.model.ruleset import Conventions, FilmRow, MethodRule
from envcheck.model.solved import Setting
from envcheck.solve.conventions import (
    Resolver,
    assumed_method,
    direction_of_flow,
    method_rule,
    ventilated_at,
)
from envcheck.solve.registry import methods, prescribable
from tests.changed import changed
from tests.solve.drawn import solved
from tests.solve.samples import WOOD, WOOL, assembly, framed, material, plane
from tests.solve.test_assembly import BOARD, STEEL_STUDS, STUDS, TILES, VENTED

# ISO 6946:2017, table of surface resistances, from memory; the second outside row is invented.
INSIDE = {"up": 0.10, "horizontal": 0.13, "down": 0.17}
FILMS = (
    *(FilmRow("inside", "*", way, r, str(r), f"inside {way}") for way, r in INSIDE.items()),
    FilmRow("outside", "outdoors", "*", 0.04, "0.04", "outdoors"),
    *(
        FilmRow("outside", "ventilated_cladding", way, r, str(r), f"cladding {way}")
        for way, r in INSIDE.items()
    ),
    FilmRow("outside", "vented_attic", "*", 0.09, "0.09", "attic, any direction"),
    FilmRow("outside", "vented_attic", "up", 0.11, "0.11", "attic, up"),
)
WALL = Element(
    "N-W1", "T1", "wall.wood_frame", "A-1", "N", 1, 10.0, None, None, None, "", "outdoors", "N",
    90.0, None, None, None, "outside", "", (), (),
)  # fmt: skip


def rule(category: str, method: str, clause: str = "Table 5") -> MethodRule:
    return MethodRule(category, method, clause)


def resolve(
    of: Assembly, element: Element = WALL, metric: str = "U_assembly", **under: object
) -> Setting:
    conventions = changed(Conventions(films=FILMS), **under)
    return Resolver(conventions, "test").resolve(element, of, element.category, metric)


# --------------------------------------------------------------------------------- direction


# ISO 6946:2017, 6.8, from memory: horizontal holds up to 30 degrees off the horizontal plane, so
# from 60 to 120 degrees of tilt.
@pytest.mark.parametrize(
    ("tilt", "direction"),
    [(0, "up"), (45, "up"), (59.9, "up"), (60, "horizontal"), (90, "horizontal"),
     (120, "horizontal"), (120.1, "down"), (180, "down")],
)  # fmt: skip
def test_direction_of_flow(tilt: float, direction: str) -> None:
    assert direction_of_flow(tilt) == direction


# ------------------------------------------------------------------------------------- films


@pytest.mark.parametrize(
    ("tilt", "adjoins", "outside", "source", "inside"),
    [
        (90, "outdoors", 0.04, "outdoors", 0.13),
        (0, "outdoors", 0.04, "outdoors", 0.10),
        (180, "outdoors", 0.04, "outdoors", 0.17),
        (0, "vented_attic", 0.11, "attic, up", 0.10),
        (180, "vented_attic", 0.09, "attic, any direction", 0.17),
        (90, "garage", 0.04, "outdoors", 0.13),
    ],
)
def test_films_by_what_lies_beyond_and_direction(
    tilt: float, adjoins: str, outside: float, source: str, inside: float
) -> None:
    found = resolve(assembly(BOARD), changed(WALL, tilt=tilt, adjoins=adjoins))
    assert (found.outside_film, found.outside_film_from) == (outside, source)
    assert found.inside_film == inside
    assert found.cladding_film == inside
    assert found.inside_film_from == f"inside {found.direction}"


def test_films_that_the_project_states_stand_first() -> None:
    found = resolve(assembly(BOARD, outside_film=0.02, inside_film=0.0))
    assert (found.outside_film, found.inside_film) == (0.02, 0.0)
    assert (found.outside_film_from, found.inside_film_from) == ("stated in the project",) * 2


@pytest.mark.parametrize(
    ("speed", "printed"),
    [(1, 0.08), (2, 0.06), (3, 0.05), (4, 0.04), (5, 0.04), (7, 0.03), (10, 0.02)],
)
def test_film_outdoors_by_the_wind_that_the_rule_set_states(speed: float, printed: float) -> None:
    # ISO 6946, annex C, table of Rse by wind speed, from memory: two decimals.
    found = resolve(assembly(BOARD), wind_speed=speed)
    assert found.outside_film == pytest.approx(printed, abs=0.005)
    assert f"wind of {speed:g} m/s" in found.outside_film_from
    assert found.inside_film == 0.13
    attic = resolve(assembly(BOARD), changed(WALL, adjoins="vented_attic"), wind_speed=speed)
    assert attic.outside_film == 0.09
    assert resolve(assembly(BOARD, outside_film=0.02), wind_speed=speed).outside_film == 0.02


def test_a_set_with_outdoor_rows_alone_serves_every_neighbour() -> None:
    plain = tuple(film for film in FILMS if film.adjoins in ("*", "outdoors"))
    found = resolve(assembly(BOARD), changed(WALL, adjoins="garage"), films=plain)
    assert (found.outside_film, found.cladding_film) == (0.04, 0.04)


@given(st.sampled_from(["outdoors", "vented_attic", "garage"]), st.floats(0.0, 180.0))
def test_resolver_remembers_what_it_would_find_anew(adjoins: str, tilt: float) -> None:
    element = changed(WALL, adjoins=adjoins, tilt=tilt)
    used = Resolver(Conventions(films=FILMS), "test")
    used.resolve(WALL, assembly(BOARD), "wall.other", "U_assembly")
    again = used.resolve(element, assembly(BOARD), "wall.wood_frame", "U_assembly")
    assert again == resolve(assembly(BOARD), element)


def test_settings_of_two_rule_sets_never_mix() -> None:
    one, other = (
        Resolver(Conventions(films=FILMS), key).resolve(WALL, assembly(BOARD), "wall", "U_assembly")
        for key in ("this year", "next year")
    )
    assert one != other
    assert one._replace(conventions="") == other._replace(conventions="")


# ------------------------------------------------------------------------------------ method


def test_the_most_specific_rule_wins() -> None:
    rules = (
        rule("*", "series"),
        rule("wall.*", "parallel_path"),
        rule("wall.wood_frame", "weighted"),
    )
    for order in (rules, rules[::-1]):
        under = Conventions(methods=order)
        found = [
            method_rule(under, category, "layers", "U_assembly")
            for category in ("wall.wood_frame", "wall.mass", "roof.attic")
        ]
        assert [one and one.method for one in found] == ["weighted", "parallel_path", "series"]


@pytest.mark.parametrize(
    ("method", "kind", "metric", "serves"),
    [
        ("parallel_path", "layers", "U_assembly", True),
        ("parallel_path", "rated", "U_product", False),
        ("rated", "rated", "U_product", True),
        ("rated", "rated", "U_assembly", True),
        ("rated", "layers", "U_assembly", False),
        ("f_factor", "slab-on-grade", "F_factor", True),
        ("f_factor", "slab-on-grade", "U_assembly", False),
        ("iso13370_slab", "slab-on-grade", "U_assembly", True),
        ("c_factor", "below-grade-wall", "C_factor", True),
    ],
)
def test_a_rule_holds_only_where_its_method_serves(
    method: str, kind: str, metric: str, serves: bool
) -> None:
    found = method_rule(Conventions(methods=(rule("*", method),)), "wall.other", kind, metric)
    assert (found is not None) is serves


def test_a_rule_brings_clause_refusals_and_weight() -> None:
    stated = MethodRule("wall.*", "weighted", "Table 5", ("parallel_path",), 0.4)
    found = resolve(assembly(STUDS), methods=(stated,))
    assert (found.method, found.method_from) == ("weighted", "Table 5")
    assert (found.refused, found.weight) == (("parallel_path",), 0.4)


BLOCK = MasonryLayer(
    "masonry", "block", 1, 0.2, WOOD, 0.03, 0.2, Fill(WOOL), None, 0.0, 0.0, None, None
)


@pytest.mark.parametrize(
    ("layers", "method", "words"),
    [
        ((BOARD,), "series", "assumed: the rule set names no method (layers in series)"),
        ((BOARD, STUDS), "parallel_path", "assumed: the rule set names no method (wood framing)"),
        ((BLOCK, STUDS), "isothermal_planes", "assumed: the rule set names no method (masonry)"),
        ((BLOCK, STEEL_STUDS), "",
         "the rule set names no method for steel framing, and none is assumed"),
    ],
)  # fmt: skip
def test_method_assumed_in_words(layers: tuple[Layer, ...], method: str, words: str) -> None:
    found = resolve(assembly(*layers))
    assert (found.method, found.method_from) == (method, words)
    answer = solved(assembly(*layers), method, method_from=words)
    assert (answer.value is None) == (method == "")
    assert answer.missing == (() if method else (words,))


@pytest.mark.parametrize(
    ("kind", "metric", "method"),
    [
        ("rated", "U_product", "rated"),
        ("window", "U_product", "iso10077_window"),
        ("window", "U_assembly", "iso10077_window"),
        ("curtain-wall", "U_product", "iso12631_curtain_wall"),
        ("glazing", "U_product", "en673_glazing"),
        ("slab-on-grade", "F_factor", "f_factor"),
        ("below-grade-wall", "C_factor", "c_factor"),
    ],
)
def test_kinds_that_one_method_serves(kind: str, metric: str, method: str) -> None:
    assert assumed_method(assembly(kind=kind), metric) == (method, "the only method for this kind")


@pytest.mark.parametrize(
    ("kind", "method"),
    [
        ("slab-on-grade", "iso13370_slab"),
        ("suspended-floor", "iso13370_suspended"),
        ("heated-basement", "iso13370_basement or iso13370_basement_floor"),
        ("unheated-basement", "iso13370_unheated"),
    ],
)
def test_the_ground_is_counted_only_where_the_rule_set_names_the_method(
    kind: str, method: str
) -> None:
    name, words = assumed_method(assembly(kind=kind), "U_assembly")
    assert name == ""
    assert f"does not name {method}" in words


def test_no_method_gives_that_metric() -> None:
    assert assumed_method(assembly(kind="rated"), "F_factor") == (
        "",
        "no method gives F_factor for an assembly of kind 'rated'",
    )


def test_every_prescribable_method_is_known_to_the_rules() -> None:
    kinds = {"layers", *(kind for method in methods().values() for kind, _ in method.solves)}
    for name in prescribable():
        under = Conventions(methods=(rule("*", name),))
        metric = methods()[name].metric
        assert any(method_rule(under, "wall.other", kind, metric) for kind in kinds), name


# ------------------------------------------------------------------------ ventilated cavities


def test_innermost_well_ventilated_space() -> None:

    def closed(how: str) -> AirSpaceLayer:
        return VENTED._replace(ventilation=how)

    assert ventilated_at((TILES, BOARD)) is None
    assert ventilated_at((TILES, closed("slightly"), BOARD, closed("unventilated"))) is None
    assert ventilated_at((TILES, VENTED, BOARD)) == 1
    assert ventilated_at((TILES, VENTED, BOARD, VENTED, closed("slightly"))) == 3


def test_metal_between_wood_counts_as_steel_framing() -> None:
    rails = framed("rails", 0.05, STUDS.member._replace(material=material("aluminium", 160.0)),
                   Fill(WOOL))  # fmt: skip
    found = assumed_method(assembly(STUDS, rails, plane("gypsum", WOOD, 0.01)), "U_assembly")
    assert found[0] == ""
