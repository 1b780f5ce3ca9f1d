"""What holds for every wall: order of the wirings, splitting, reversing, scaling, monotony.

Rayleigh's monotonicity law (Doyle and Snell, Random Walks and Electric Networks, 1984, section
1.4): cutting a connection of a resistor network never lowers its resistance, shorting one never
raises it, and the whole never falls when a part rises. Edges of drawn pieces are rounded to a
nanometre, hence the tolerances of 1e-5 where sheets of half a millimetre are compared.
"""

from __future__ import annotations

import numpy as np
import pytest
from hypothesis import HealthCheck, given, settings
from hypothesis import strategies as st

from envcheck.model.project import FramedLayer, Layer, MaterialLayer, Profile
from envcheck.model.solved import Block, Resistor
from envcheck.solve.methods.framed import area_shares
from envcheck.solve.methods.masonry import column_shares
from envcheck.solve.registry import Wall
from envcheck.solve.section import grid, profile_pieces
from envcheck.solve.wiring import align, bounds, isothermal_planes, parallel_paths
from tests.solve.drawn import (
    INSULATION,
    better_filled,
    masonry_layers,
    mm,
    plain_layers,
    profiles,
    scaled,
    solved,
    steel_layers,
    stuffs,
    value,
    wall_of,
    walls,
    with_members,
    wood_layers,
)
from tests.solve.samples import assert_recomputes, plane

few = settings(deadline=None, max_examples=80, suppress_health_check=[HealthCheck.too_slow])
NANOMETRES = 1e-5
METHODS = ("isothermal_planes", "weighted", "two_dimensional")


# ------------------------------------------------------------------------------ two wirings


@few
@given(layers=walls(), weight=st.floats(0.0, 1.0))
def test_parallel_paths_below_weighted_below_planes(layers: list[Layer], weight: float) -> None:
    low, high = bounds(wall_of(*layers))
    between = value(layers, "weighted", weight=weight)
    assert low <= high * (1 + NANOMETRES)
    assert low * (1 - NANOMETRES) <= between <= high * (1 + NANOMETRES)


@few
@given(layers=walls())
def test_bounds_are_the_two_wirings(layers: list[Layer]) -> None:
    wall = wall_of(*layers)
    low, high = bounds(wall)
    assert low == pytest.approx(parallel_paths(wall).u_factor, rel=1e-9)
    assert high == pytest.approx(isothermal_planes(wall).u_factor, rel=NANOMETRES)


def u_of_whole_network(wall: Wall, across: float) -> float:
    """U of all columns joined between all rows: nodal analysis with numpy.

    The wall has one pattern at most. Between neighbouring columns lies a conductance ``across``
    (W/(m2 K), any number above 0) at every plane between rows: 0 is parallel paths, infinite
    isothermal planes.
    """
    blocks = align(wall.blocks)
    of_pattern = [block for block in blocks if block.pattern]
    widths = np.array(of_pattern[0].widths if of_pattern else (1.0,))
    shares = widths / widths.sum()
    levels = [[wall.outside.value] * len(shares)]
    for block in blocks:
        for row in block.cells:
            cells = row if block.pattern else row * len(shares)
            levels.append([cell.value for cell in cells])
    levels.append([wall.inside.value] * len(shares))
    number = (len(levels) - 1) * len(shares)
    matrix, flow = np.zeros((number, number)), np.zeros(number)

    def connect(a: int, b: int, conductance: float) -> None:
        for one, other in ((a, b), (b, a)):
            if 0 <= one < number:
                matrix[one, one] += conductance
                if 0 <= other < number:
                    matrix[one, other] -= conductance

    for level, across_wall in enumerate(levels):
        for column, resistance in enumerate(across_wall):
            above, below = (level - 1) * len(shares) + column, level * len(shares) + column
            conductance = shares[column] / resistance
            connect(above if level else -1, below if level < len(levels) - 1 else -1, conductance)
            if level == 0:
                flow[below] += conductance  # outside air at 1, inside air at 0
            if level < len(levels) - 1 and column:
                connect(below, below - 1, across)
    temperatures = np.linalg.solve(matrix, flow)
    return float(sum((1 - temperatures[: len(shares)]) * shares / levels[0]))


@few
@given(
    framing=steel_layers() | wood_layers() | masonry_layers(),
    plain=plain_layers(),
    across=st.sampled_from([1e-3, 0.1, 1.0, 10.0, 1e3]),
)
def test_any_joined_network_lies_between(
    framing: Layer, plain: MaterialLayer, across: float
) -> None:
    wall = wall_of(plain, framing)
    low, high = bounds(wall)
    joined = u_of_whole_network(wall, across)
    assert low * (1 - NANOMETRES) <= joined <= high * (1 + NANOMETRES)
    assert u_of_whole_network(wall, 1e-9) == pytest.approx(low, rel=1e-4)
    assert u_of_whole_network(wall, 1e8) == pytest.approx(high, rel=1e-4)


@few
@given(layers=walls(), method=st.sampled_from(METHODS))
def test_the_worksheet_gives_the_value(layers: list[Layer], method: str) -> None:
    found = solved(layers, method)
    assert_recomputes(found.steps)
    assert found.steps[-1].value == found.value
    assert found.steps[-len(found.hand_check) :] == found.hand_check


# --------------------------------------------------------------------------------- symmetry


@few
@given(layers=walls(), at=st.integers(0, 3), part=st.floats(0.1, 0.9), of=stuffs())
def test_splitting_a_plane_layer_changes_nothing(
    layers: list[Layer], at: int, part: float, of: object
) -> None:
    whole = plane("board", of, 0.1)
    first, rest = (whole._replace(thickness=0.1 * p) for p in (part, 1 - part))
    for method in METHODS:
        one = value([*layers[:at], whole, *layers[at:]], method)
        two = value([*layers[:at], first, rest, *layers[at:]], method)
        assert two == pytest.approx(one, rel=NANOMETRES)


def mirrored(wall: Wall) -> Wall:
    """The wall seen from the other side."""

    def turned(block: Block) -> Block:
        return block._replace(depths=block.depths[::-1], cells=block.cells[::-1])

    return wall._replace(
        outside=wall.inside, inside=wall.outside, blocks=tuple(map(turned, wall.blocks[::-1]))
    )


@few
@given(layers=walls())
def test_seen_from_the_other_side_nothing_changes(layers: list[Layer]) -> None:
    wall = wall_of(*layers)
    assert bounds(mirrored(wall)) == pytest.approx(bounds(wall), rel=NANOMETRES)


@few
@given(layers=st.lists(plain_layers() | wood_layers() | masonry_layers(), min_size=1, max_size=4))
def test_order_of_layers_reversed_and_films_exchanged(layers: list[Layer]) -> None:
    for method in METHODS:
        there = value(layers, method)
        back = value(layers[::-1], method, outside_film=0.13, inside_film=0.04)
        assert back == pytest.approx(there, rel=1e-9)


@few
@given(layers=walls(), by=st.sampled_from([0.5, 2.0, 4.0]))
def test_lengths_and_conductivities_scaled_together(layers: list[Layer], by: float) -> None:
    larger = [scaled(layer, by) for layer in layers]
    ends = bounds(wall_of(*larger))
    assert ends == pytest.approx(bounds(wall_of(*layers)), rel=NANOMETRES)


# --------------------------------------------------------------------------------- monotony


@few
@given(layers=walls(), by=st.floats(1.01, 5.0), at=st.integers(0, 3))
def test_more_insulation_never_raises_u(layers: list[Layer], by: float, at: int) -> None:
    before = bounds(wall_of(*layers))
    added = bounds(wall_of(*layers[:at], INSULATION, *layers[at:]))
    better = bounds(wall_of(*(better_filled(layer, by) for layer in layers)))
    for old, thicker, filled in zip(before, added, better, strict=True):
        assert thicker < old
        assert filled <= old * (1 + 1e-12)


@few
@given(layers=walls(), by=st.floats(1.01, 5.0))
def test_more_conductive_members_never_lower_u(layers: list[Layer], by: float) -> None:
    before = bounds(wall_of(*layers))
    after = bounds(wall_of(*(with_members(layer, by) for layer in layers)))
    for old, new in zip(before, after, strict=True):
        assert new >= old * (1 - 1e-12)


# -------------------------------------------------------------------------- geometry, shares


@few
@given(wood_layers(), masonry_layers())
def test_shares_sum_to_one(wood: FramedLayer, units: object) -> None:
    shares = area_shares(wood)
    assert shares.cavity + shares.member + sum(shares.extras) == pytest.approx(1.0)
    assert min(shares.cavity, shares.member) > 0
    assert sum(column_shares(units).values()) == pytest.approx(1.0)


@few
@given(layers=walls())
def test_cells_cover_their_layer(layers: list[Layer]) -> None:
    for layer, block in zip(layers, wall_of(*layers).blocks, strict=True):
        assert len(block.cells) == len(block.depths)
        assert {len(row) for row in block.cells} == {len(block.widths)}
        assert min(*block.widths, *block.depths) > 0
        assert sum(block.depths) == pytest.approx(layer.thickness)
        if block.repeat:
            assert isinstance(layer, FramedLayer)
            bays = sum(block.widths) / layer.member.spacing
            assert bays == pytest.approx(max(1, round(bays)))


@few
@given(layers=st.lists(wood_layers() | steel_layers(), min_size=2, max_size=3))
def test_alignment_keeps_the_share_of_every_piece(layers: list[Layer]) -> None:
    wall = wall_of(*layers)
    for drawn, cut in zip(wall.blocks, align(wall.blocks), strict=True):
        for before, after in zip(drawn.cells, cut.cells, strict=True):
            assert shares_of(drawn.widths, before) == pytest.approx(
                shares_of(cut.widths, after), abs=1e-7
            )
    tree = parallel_paths(wall).tree
    assert sum(getattr(tree, "shares", (1.0,))) == pytest.approx(1.0)


def shares_of(widths: tuple[float, ...], row: tuple[Resistor, ...]) -> dict[str, float]:
    found: dict[str, float] = {}
    for width, cell in zip(widths, row, strict=True):
        found[cell.symbol] = found.get(cell.symbol, 0.0) + width / sum(widths)
    return found


@few
@given(profile=profiles(0.15), depth=mm(0.15, 0.2))
def test_sheet_of_the_drawn_profile(profile: Profile, depth: float) -> None:
    # Area of a folded sheet in square corners: developed width, each corner counted once.
    sheet, repeat = profile.thickness, 0.6
    parts = {"hat": [profile.flange, *[profile.web - sheet] * 2]}.get(
        profile.shape, [profile.web, *[profile.flange - sheet] * 2]
    )
    parts += [max(profile.lip - sheet, 0.0)] * 2
    widths, depths, covered = grid(profile_pieces(profile, depth, repeat), repeat, depth)
    area = sum(
        width * height
        for height, row in zip(depths, covered, strict=True)
        for width, steel in zip(widths, row, strict=True)
        if steel
    )
    assert sum(widths) == pytest.approx(repeat)
    assert sum(depths) == pytest.approx(depth)
    assert area == pytest.approx(sheet * sum(parts), rel=1e-6)
