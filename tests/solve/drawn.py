"""Random invented walls for hypothesis, and short ways to draw and solve them."""

from __future__ import annotations

from collections.abc import Sequence

from hypothesis import strategies as st

from envcheck.model.project import (
    Assembly,
    Extra,
    Fill,
    FramedLayer,
    Layer,
    MasonryLayer,
    Material,
    MaterialLayer,
    Member,
    Profile,
)
from envcheck.model.ruleset import Conventions
from envcheck.model.solved import Setting, Solved
from envcheck.solve.assembly import draw, solve
from envcheck.solve.registry import Wall
from tests.solve.samples import STEEL, WOOL, assembly, material, plane, setting

PLAIN = Conventions()
SPACINGS = (0.4, 0.4064, 0.6)


def wall_of(*layers: Layer, under: Conventions = PLAIN) -> Wall:
    return draw(assembly(*layers), setting(), under)[0]


def solved(
    of: Assembly | Sequence[Layer], method: str, under: Conventions = PLAIN, **more: object
) -> Solved:
    """Solve an assembly, or layers from outside to inside, by one method."""
    whole = of if isinstance(of, Assembly) else assembly(*of)
    weight = 0.5 if method == "weighted" else None  # stated, so that metal members are accepted
    by: Setting = setting(method=method)._replace(weight=weight)._replace(**more)
    return solve(whole, by, under)


def value(of: Assembly | Sequence[Layer], method: str, **more: object) -> float:
    found = solved(of, method, **more).value
    assert found is not None
    return found


def mm(low: float, high: float) -> st.SearchStrategy[float]:
    """Lengths in m, on a grid of a tenth of a millimetre, as drawings have them."""
    tenths = st.integers(round(low * 1e4), round(high * 1e4))
    return tenths.map(lambda number: number / 1e4)


def stuffs(least: float = 0.02, most: float = 2.5) -> st.SearchStrategy[Material]:
    return st.floats(least, most).map(lambda k: material("stuff", k))


def plain_layers() -> st.SearchStrategy[MaterialLayer]:
    return st.builds(lambda of, depth: plane("plane", of, depth), stuffs(), mm(0.005, 0.3))


fills = st.builds(lambda of: Fill(material=of), stuffs(0.02, 0.2))


@st.composite
def wood_layers(draw: st.DrawFn) -> FramedLayer:
    """Wood members at a spacing or by share, with or without plates."""
    extras = draw(
        st.lists(st.builds(lambda share: Extra("plates", share, WOOD, 0.09), st.floats(0.01, 0.1)),
                 max_size=1)
    )  # fmt: skip
    share = draw(st.none() | st.floats(0.05, 0.4))
    spacing = draw(st.sampled_from(SPACINGS)) if share is None or draw(st.booleans()) else None
    return FramedLayer(
        "framed", "wood", 1, draw(mm(0.03, 0.3)), Member(WOOD, draw(mm(0.03, 0.08)), spacing),
        draw(fills), share, "drawing", tuple(extras),
        draw(st.sampled_from(["vertical", "horizontal"])), False,
    )  # fmt: skip


WOOD = material("wood", 0.13, "wood")


@st.composite
def profiles(draw: st.DrawFn, deepest: float) -> Profile:
    """C, Z and hat profiles no deeper than their layer, with and without lips."""
    return Profile(
        "p",
        draw(mm(0.03, deepest)),
        draw(mm(0.02, 0.06)),
        draw(mm(0.0005, 0.003)),
        draw(st.just(0.0) | mm(0.004, 0.014)),
        draw(st.sampled_from(["C", "Z", "hat"])),
    )


@st.composite
def steel_layers(draw: st.DrawFn) -> FramedLayer:
    depth = draw(mm(0.05, 0.2))
    profile = draw(profiles(depth))
    member = Member(STEEL, profile.flange, draw(st.sampled_from(SPACINGS)), profile)
    way = draw(st.sampled_from(["vertical", "horizontal"]))
    return FramedLayer(
        "framed", "steel", 1, depth, member, draw(fills), None, "", (), way, False
    )  # fmt: skip


@st.composite
def masonry_layers(draw: st.DrawFn) -> MasonryLayer:
    """Hollow units, perhaps partly grouted, and solid units, with or without joints."""
    depth, unit = draw(mm(0.1, 0.3)), draw(stuffs(0.2, 2.0))
    hollow = draw(st.booleans())
    mortar = draw(st.none() | stuffs(0.5, 1.5))
    grout = draw(st.none() | stuffs(0.5, 2.0)) if hollow else None
    return MasonryLayer(
        "masonry", "units", 1, depth, unit,
        depth * draw(st.floats(0.1, 0.35)) if hollow else depth / 2,
        draw(st.floats(0.05, 0.5)) if hollow else 1.0,
        draw(fills) if hollow else Fill(material=unit),
        mortar, 0.0 if mortar is None else draw(st.floats(0.01, 0.2)),
        0.0 if grout is None else draw(st.floats(0.05, 0.9)), grout,
        draw(st.none() | st.floats(0.1, 2.0)) if hollow else None,
    )  # fmt: skip


def walls(least: int = 1) -> st.SearchStrategy[list[Layer]]:
    """One to three layers of any kind."""
    kinds = (plain_layers(), wood_layers(), steel_layers(), masonry_layers())
    return st.lists(st.one_of(*kinds), min_size=least, max_size=3)


def scaled(of: Layer, by: float) -> Layer:
    """A layer whose lengths and conductivities are all ``by`` times as large."""

    def stuff(one: Material) -> Material:
        return one._replace(conductivity=by * one.conductivity)

    def filled(one: Fill) -> Fill:
        return one if one.material is None else one._replace(material=stuff(one.material))

    match of:
        case MaterialLayer():
            return of._replace(material=stuff(of.material), thickness=by * of.thickness)
        case FramedLayer():
            old = of.member
            member = Member(
                stuff(old.material),
                by * old.width,
                old.spacing and by * old.spacing,
                old.profile
                and old.profile._replace(
                    web=by * old.profile.web,
                    flange=by * old.profile.flange,
                    thickness=by * old.profile.thickness,
                    lip=by * old.profile.lip,
                ),
            )
            extras = tuple(
                extra._replace(material=stuff(extra.material), thickness=by * extra.thickness)
                for extra in of.extras
            )
            return of._replace(
                thickness=by * of.thickness, member=member, fill=filled(of.fill), extras=extras
            )
        case MasonryLayer():
            return of._replace(
                thickness=by * of.thickness,
                shell=by * of.shell,
                material=stuff(of.material),
                fill=filled(of.fill),
                mortar=of.mortar and stuff(of.mortar),
                grout=of.grout and stuff(of.grout),
            )
    raise TypeError(of)


def with_members(of: Layer, by: float) -> Layer:
    """A layer whose members conduct ``by`` times as well."""
    if isinstance(of, FramedLayer):
        better = of.member.material._replace(conductivity=by * of.member.material.conductivity)
        return of._replace(member=of.member._replace(material=better))
    if isinstance(of, MasonryLayer):
        return of._replace(
            material=of.material._replace(conductivity=by * of.material.conductivity)
        )
    return of


def better_filled(of: Layer, by: float) -> Layer:
    """A layer whose infill, or itself, conducts ``by`` times less."""
    if isinstance(of, MaterialLayer):
        return of._replace(
            material=of.material._replace(conductivity=of.material.conductivity / by)
        )
    if isinstance(of, FramedLayer) and of.fill.material is not None:
        less = of.fill.material._replace(conductivity=of.fill.material.conductivity / by)
        return of._replace(fill=of.fill._replace(material=less))
    if isinstance(of, MasonryLayer) and of.cell_resistance is not None:
        return of._replace(cell_resistance=by * of.cell_resistance)
    return of


INSULATION = plane("added insulation", WOOL, 0.05)
few_walls = walls()
