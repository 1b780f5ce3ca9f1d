"""Glazing by EN 673: the value of the centre of the glass, which never decides alone."""

from __future__ import annotations

from collections.abc import Sequence

from envcheck.model.project import Assembly
from envcheck.model.ruleset import Conventions
from envcheck.model.solved import Beside, Operand, Setting, Step
from envcheck.model.windows import Gas, Glazing, Space
from envcheck.solve.elementary import larger
from envcheck.solve.methods.air_space import STEFAN_BOLTZMANN
from envcheck.solve.registry import Decision, Method, NotDecided

SOURCE = "EN 673:2011"
MEAN = 283.0
"""K, mean temperature of the gas spaces."""
DIFFERENCE = 15.0
"""K, between the outermost and the innermost surfaces that face a gas space."""
GRAVITY = 9.81
GLASS = 1.0
"""W/(m K) of soda-lime glass."""
H_INSIDE, H_OUTSIDE = 7.7, 25.0
"""W/(m2 K), vertical glazing, faces to the room and to outdoors without a coating."""
ROUNDS = 30
"""Of sharing the difference between several spaces; each leaves less than a third of the error."""
CENTRE_ONLY = (
    "the whole product's U-factor: only the glazing is described; frame and edge are needed "
    "(kind window)"
)
INCLINED = "the glazing's U-factor at this tilt: EN 673 is used here for vertical glazing only"


def mixture(gas: Gas, air: Gas, share: float) -> Gas:
    """Properties of ``share`` (0..1) of a gas in air: linear. Source: EN 673:2011, 6.2."""
    return Gas(*(share * g + (1.0 - share) * a for g, a in zip(gas, air, strict=True)))


def gas_conductance(gas: Gas, gap: float, difference: float = DIFFERENCE) -> float:
    """Conductance of a vertical gas space by convection: hg = Nu k / s, Nu = 0.035 (Gr Pr)^0.38.

    gap: s, m. difference: K across the space. Any shape. Returns W/(m2 K); Nu is at least 1.
    Source: EN 673:2011, 5.3.2.
    """
    grashof, prandtl = grashof_number(gas, gap, difference), prandtl_number(gas)
    return nusselt_number(grashof, prandtl) * gas.conductivity / gap


def grashof_number(gas: Gas, gap: float, difference: float) -> float:
    """Gr = 9.81 s^3 dT rho^2 / (Tm mu^2). Source: EN 673:2011, 5.3.2."""
    return GRAVITY * gap**3 * difference * gas.density**2 / (MEAN * gas.viscosity**2)


def prandtl_number(gas: Gas) -> float:
    """Pr = mu c / k. Source: EN 673:2011, 5.3.2."""
    return gas.viscosity * gas.specific_heat / gas.conductivity


def nusselt_number(grashof: float, prandtl: float) -> float:
    """Nu = 0.035 (Gr Pr)^0.38, at least 1, of a vertical space. Source: EN 673:2011, 5.3.2."""
    return larger(0.035 * (grashof * prandtl) ** 0.38, 1.0)


def radiation_conductance(emissivity_1: float, emissivity_2: float) -> float:
    """Conductance by radiation: hr = 4 sigma Tm^3 / (1/e1 + 1/e2 - 1), W/(m2 K).

    emissivity: corrected emissivities of the two faces. Source: EN 673:2011, 5.3.1.
    """
    return 4.0 * STEFAN_BOLTZMANN * MEAN**3 / (1.0 / emissivity_1 + 1.0 / emissivity_2 - 1.0)


def space_resistances(
    gaps: Sequence[float], gases: Sequence[Gas], emissivities: Sequence[tuple[float, float]]
) -> tuple[list[float], list[float]]:
    """Resistances of gas spaces, m2 K/W, and the difference across each, K.

    The 15 K between the outermost surfaces are shared by the resistances. Any shape.
    Source: EN 673:2011, 5.3 and 7.
    """
    radiation = [radiation_conductance(*pair) for pair in emissivities]
    differences = [DIFFERENCE / len(gaps) for _ in gaps]
    resistances: list[float] = []
    for turn in range(ROUNDS if len(gaps) > 1 else 1):
        if turn:
            total = sum(resistances)
            differences = [DIFFERENCE * resistance / total for resistance in resistances]
        resistances = [
            1.0 / (gas_conductance(gas, gap, difference) + hr)
            for gas, gap, difference, hr in zip(gases, gaps, differences, radiation, strict=True)
        ]
    return resistances, differences


def glazing_u(
    panes: Sequence[float],
    gaps: Sequence[float],
    gases: Sequence[Gas],
    emissivities: Sequence[tuple[float, float]],
    h_inside: float = H_INSIDE,
    h_outside: float = H_OUTSIDE,
) -> float:
    """U of the centre of a glazing: 1/U = 1/he + sum 1/hs + sum d/k + 1/hi.

    panes: thicknesses, m. gaps, gases, emissivities: of the spaces between them, one fewer (none
    for a single pane). Numbers of any shape. Returns W/(m2 K). Source: EN 673:2011, 5.2 and 7.
    """
    resistances, _ = space_resistances(gaps, gases, emissivities)
    glass = sum(panes) / GLASS
    return 1.0 / (1.0 / h_outside + sum(resistances) + glass + 1.0 / h_inside)


def filling(space: Space) -> Gas:
    """What a space is filled with."""
    return mixture(space.gas, space.air, space.share) if space.share < 1.0 else space.gas


def solve_glazing(assembly: Assembly, setting: Setting, conventions: Conventions) -> Decision:
    """Compute the centre of a glazing and show it beside; it decides nothing.

    Errors: NotDecided where nothing is described, or where heat does not flow horizontally.
    """
    if assembly.glazing is None:
        raise NotDecided("panes and spaces of the glazing")
    steps = glazing_steps(assembly.glazing, "", setting)
    note = "centre of the glass by EN 673; frame and edge are not in it"
    beside = (Beside("centre_of_glass", steps[-1].value, note),)
    return Decision(None, steps=steps, missing=(CENTRE_ONLY,), beside=beside)


def glazing_steps(glazing: Glazing, tag: str, setting: Setting) -> tuple[Step, ...]:
    """The worksheet of a glazing; its last step is ``U_g`` with the tag behind it.

    Errors: NotDecided where heat does not flow horizontally.
    """
    if setting.direction != "horizontal":
        raise NotDecided(INCLINED)
    steps = spaces_steps(glazing.spaces, tag)
    closing = [step for step in steps if step.symbol.startswith("Rs")]
    panes = [
        Operand(f"d{tag}{n}", thickness, "run") for n, thickness in enumerate(glazing.panes, 1)
    ]
    glass = " + ".join(f"{{{pane.name}}}" for pane in panes)
    middle = "".join(f" + {{{step.symbol}}}" for step in closing)
    u_factor = 1.0 / (
        1.0 / H_OUTSIDE
        + sum(step.value for step in closing)
        + sum(glazing.panes) / GLASS
        + 1.0 / H_INSIDE
    )
    found = Step(
        f"U_g{tag}",
        "U-factor of the centre of the glass",
        f"1 / (1 / {H_OUTSIDE:g}{middle} + ({glass}) / {GLASS:g} + 1 / {H_INSIDE:g})",
        (*(Operand(s.symbol, s.value, "resistance") for s in closing), *panes),
        u_factor,
        "u_factor",
        SOURCE,
        si_only=True,
    )
    return (*steps, found)


def spaces_steps(spaces: Sequence[Space], tag: str) -> tuple[Step, ...]:
    """The worksheet of gas spaces that share 15 K: each closes with ``Rs`` and its number."""
    gases = [filling(space) for space in spaces]
    resistances, differences = space_resistances(
        [space.thickness for space in spaces], gases, [space.emissivities for space in spaces]
    )
    steps: list[Step] = []
    for number, (space, gas) in enumerate(zip(spaces, gases, strict=True)):
        mark = f"{tag}{number + 1}" if tag or len(spaces) > 1 else ""
        if len(spaces) > 1:
            said = "15 K shared by the resistances of the spaces, found in rounds (EN 673, 7)"
            steps.append(
                Step(
                    f"dT{mark}", f"difference across space {number + 1}, K", "", (),
                    differences[number], "number", said,
                )
            )  # fmt: skip
        steps += _space_steps(space, gas, mark, differences[number], resistances[number])
    return tuple(steps)


def _space_steps(
    space: Space, gas: Gas, mark: str, difference: float, resistance: float
) -> tuple[Step, ...]:
    """One space: numbers of Grashof, Prandtl and Nusselt, both conductances, the resistance."""
    gap = Operand("s" + mark, space.thickness, "length")
    rho = Operand("rho" + mark, gas.density, "density")
    mu = Operand("mu" + mark, gas.viscosity, "number")
    k = Operand("k" + mark, gas.conductivity, "conductivity")
    said = f"conductivity of {space.title}"
    made: list[Step] = [
        Step(gap.name, "thickness of the space", "", (), gap.value, gap.quantity),
        Step(k.name, said, "", (), k.value, k.quantity, space.source),
    ]
    c = Operand("c" + mark, gas.specific_heat, "specific_heat")
    first, second = (
        Operand(f"e{n}{mark}", e, "number") for n, e in enumerate(space.emissivities, 1)
    )
    grashof = grashof_number(gas, gap.value, difference)
    prandtl = prandtl_number(gas)
    nusselt = nusselt_number(grashof, prandtl)
    gained = nusselt * gas.conductivity / gap.value
    radiated = radiation_conductance(*space.emissivities)

    def add(name: str, title: str, form: str, operands: tuple[Operand, ...], value: float,
            quantity: str = "number", source: str = SOURCE) -> Operand:  # fmt: skip
        words = {
            o.name.removesuffix(mark) if mark else o.name: "{" + o.name + "}" for o in operands
        }
        expression = form.format(**words)
        made.append(Step(name + mark, title, expression, operands, value, quantity, source, True))
        return Operand(name + mark, value, quantity)

    across = Operand("dT" + mark, difference, "number")
    of = f"of {space.title}"
    gr = add("Gr", f"Grashof number {of}", "9.81 * {s}**3 * {dT} * {rho}**2 / (283 * {mu}**2)",
             (gap, across, rho, mu), grashof)  # fmt: skip
    pr = add("Pr", f"Prandtl number {of}", "{mu} * {c} / {k}", (mu, c, k), prandtl)  # fmt: skip
    nu = add("Nu", "Nusselt number", "max(0.035 * ({Gr} * {Pr})**0.38, 1)", (gr, pr), nusselt)
    hg = add("hg", "convection in the space", "{Nu} * {k} / {s}", (nu, k, gap), gained,
             "u_factor")  # fmt: skip
    hr = add("hr", "radiation across the space",
             f"4 * {STEFAN_BOLTZMANN:g} * 283**3 / (1 / {{e1}} + 1 / {{e2}} - 1)",
             (first, second), radiated, "u_factor")  # fmt: skip
    add("Rs", f"resistance of the space {of}", "1 / ({hg} + {hr})", (hg, hr), resistance,
        "resistance")  # fmt: skip
    return tuple(made)


METHODS = (
    Method(
        name="en673_glazing",
        title="Centre of a glazing",
        formula="1/U = 1/he + sum of 1/(hg + hr) + sum of d/k + 1/hi;  hg = Nu k / s, "
        "Nu = 0.035 (Gr Pr)^0.38, at least 1",
        source=SOURCE,
        valid="vertical glazing; the frame and the edge are not in it, so that it never decides "
        "alone",
        solves=(("glazing", solve_glazing),),
        metric="U_product",
    ),
)
