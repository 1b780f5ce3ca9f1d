"""From a printed case to envcheck's own functions: one small function for each ``method``.

Each takes the case's inputs and its units by figure, and returns the figures in those units.
Inputs in inch-pound units are converted by ``envcheck.units`` on the way in and out.
"""

from __future__ import annotations

import csv
from collections.abc import Callable
from functools import cache
from itertools import product
from math import prod, sqrt
from pathlib import Path
from typing import Any

import envcheck
from envcheck.model import vapour
from envcheck.read.coefficient_tables import built_in
from envcheck.read.windows import corrected_ratio
from envcheck.solve import climate_zone, shells
from envcheck.solve.methods import air_space as air
from envcheck.solve.methods import iso13788_surface as surface
from envcheck.solve.methods.air_voids import void_correction
from envcheck.solve.methods.compressed import TABLE, installed_resistance
from envcheck.solve.methods.en673_glazing import Gas, glazing_u, mixture, space_resistances
from envcheck.solve.methods.fasteners import fastener_correction, penetration_factor
from envcheck.solve.methods.inverted_roof import rain_correction
from envcheck.solve.methods.iso10077_window import window_geometry, window_u
from envcheck.solve.methods.iso10456_conversion import design_conductivity
from envcheck.solve.methods.iso13370_basement import basement_wall_u, wall_thickness
from envcheck.solve.methods.iso13370_edge import edge_psi, edge_thickness
from envcheck.solve.methods.iso13370_slab import (
    characteristic_dimension,
    equivalent_thickness,
    slab_u,
)
from envcheck.solve.methods.steel_framing import effective_resistance
from envcheck.solve.methods.surface_films import convection_by_wind, surface_resistance
from envcheck.solve.methods.tapered import (
    tapered_rectangle,
    tapered_triangle_thickest_apex,
    tapered_triangle_thinnest_apex,
)
from envcheck.solve.methods.tapered_pieces import tapered_triangle
from envcheck.solve.methods.weighted import weighted
from envcheck.solve.methods.zone import zone_width
from envcheck.solve.network import parallel, plane_wall, series
from envcheck.solve.surface import plain_factor
from envcheck.units import convert, to_si
from tests.published import field_adapters

Inputs = dict[str, Any]
Figures = dict[str, float]
Units = dict[str, str]
DATA = Path(envcheck.__file__).parent / "data"


# ---------------------------------------------------------------------- layers and framed walls


def _printed(resistance: float, units: Units) -> Figures:
    """R and U of a resistance in SI, in the case's units."""
    return {"R": convert(resistance, units["R"]), "U": convert(1.0 / resistance, units["U"])}


def series_sum(inputs: Inputs, units: Units) -> Figures:
    parts = [*inputs["in_series"], inputs.get("added", 0.0)]
    return _printed(series(*(to_si(part, units["R"]) for part in parts)), units)


def parallel_path(inputs: Inputs, units: Units) -> Figures:
    plain = [to_si(part, units["R"]) for part in inputs["in_series"]]
    paths = [series(*plain, to_si(path["resistance"], units["R"])) for path in inputs["paths"]]
    return _printed(parallel([path["share"] for path in inputs["paths"]], paths), units)


def cavity_factor(inputs: Inputs, units: Units) -> Figures:
    label = to_si(inputs["label"], units["R"])
    return {"R": convert(effective_resistance(inputs["factor"], label), units["R"])}


def combined(inputs: Inputs, units: Units) -> Figures:
    layers = [
        [(part["share"], part["resistance"]) for part in layer["sections"]]
        if "sections" in layer
        else [(1.0, layer["resistance"])]
        for layer in inputs["layers"]
    ]
    films = (inputs["inside"], inputs["outside"])
    paths = list(product(*layers))
    shares = [prod(share for share, _ in path) for path in paths]
    upper = parallel(shares, [series(*films, *(r for _, r in path)) for path in paths])
    planes = [parallel([f for f, _ in layer], [r for _, r in layer]) for layer in layers]
    lower = series(*films, *planes)
    total = weighted(0.5, upper, lower)
    error = 100.0 * (upper - lower) / (2.0 * total)
    figures = {"R_upper": upper, "R_lower": lower, "R_total": total, "error_percent": error}
    return figures | {"U": 1.0 / total}


# ------------------------------------------------------------------------------------- ISO 6946


def air_space(inputs: Inputs, units: Units) -> Figures:
    emittances = (inputs["emittance_1"], inputs["emittance_2"])
    return {
        "R": air.air_space_iso6946(inputs["thickness_mm"] / 1000, inputs["direction"], *emittances)
    }


def radiative_coefficient(inputs: Inputs, units: Units) -> Figures:
    return {"h_r0": air.radiative_coefficient(inputs["temperature_c"])}


def fasteners(inputs: Inputs, units: Units) -> Figures:
    alpha = penetration_factor(inputs["penetration"], inputs["layer_thickness"])
    names = ("conductivity", "area", "density", "layer_thickness", "r1", "r_total")
    return {"dU": fastener_correction(alpha, *(inputs[name] for name in names))}


TAPERS: dict[str, Callable[[float, float], float]] = {
    "rectangle": tapered_rectangle,
    "tri_thickest_apex": tapered_triangle_thickest_apex,
    "tri_thinnest_apex": tapered_triangle_thinnest_apex,
}


def tapered(inputs: Inputs, units: Units) -> Figures:
    if inputs["shape"] == "tri_general":
        return {"U": tapered_triangle(inputs["r0"], inputs["r1"], inputs["r2"])}
    return {"U": TAPERS[inputs["shape"]](inputs["r0"], inputs["r1"])}


# --------------------------------------------------------------------------- ground and windows


def slab(inputs: Inputs, units: Units) -> Figures:
    dimension = characteristic_dimension(1.0, inputs["perimeter_per_area"])
    soil = inputs["soil_conductivity"]
    dt = equivalent_thickness(
        inputs["wall"], soil, inputs["inside"], inputs["floor_resistance"], inputs["outside"]
    )
    return {"U": slab_u(soil, dimension, dt)}


def perimeter_ratio(inputs: Inputs, units: Units) -> Figures:
    return {"ratio": 2.0 / characteristic_dimension(inputs["area"], inputs["perimeter"])}


def window(inputs: Inputs, units: Units) -> Figures:
    """A rectangle whose frame has one width and takes ``frame_fraction`` of the area."""
    width, height = inputs["width"], inputs["height"]
    half, glass = (width + height) / 2.0, (1.0 - inputs["frame_fraction"]) * width * height
    frame = (half - sqrt((width - height) ** 2 / 4.0 + glass)) / 2.0
    area_glass, area_frame, edge = window_geometry(width, height, frame)
    u_glass, u_frame = inputs["u_glass"], inputs["u_frame"]
    return {"U": window_u(area_glass, u_glass, area_frame, u_frame, edge, inputs["psi"])}


# ------------------------------------------------------------------------- data tables and units


@cache
def rows(name: str) -> tuple[dict[str, str], ...]:
    with (DATA / name).open(encoding="utf-8", newline="") as file:
        return tuple(csv.DictReader(file))


def films(inputs: Inputs, units: Units) -> Figures:
    asked = {key: inputs[key] for key in ("set", "side", "adjoins", "direction")}
    (row,) = (row for row in rows("films.csv") if asked.items() <= row.items())
    return {"R": convert(to_si(float(row["resistance"]), row["unit"]), units["R"])}


def materials(inputs: Inputs, units: Units) -> Figures:
    (row,) = (row for row in rows("materials.csv") if row["id"] == inputs["material"])
    return {"conductivity": float(row["conductivity"])}


def compressed(inputs: Inputs, units: Units) -> Figures:
    inch = to_si(1.0, "in")
    label, product = to_si(inputs["label"], units["R"]), inputs["product"] * inch
    found = installed_resistance(label, product, inputs["cavity"] * inch, rows=built_in(TABLE, ""))
    return {"R": convert(found.resistance, units["R"])}


def unit_factor(inputs: Inputs, units: Units) -> Figures:
    return {"value": convert(to_si(inputs["value"], inputs["unit"]), inputs["si_unit"])}


# ------------------------------------------------------------------- shells, contacts, networks


def _element(element: Inputs, inputs: Inputs) -> float:
    """Resistance of one element of a network, K/W."""
    area: float = inputs.get("area", 0.0)
    length: float = inputs.get("length", 1.0)
    match element["type"]:
        case "plane":
            return plane_wall(element["thickness"], element["conductivity"]) / area
        case "conv":
            return shells.convection_resistance(element["h"], area)
        case "cyl":
            return shells.cylinder_resistance(
                element["r1"], element["r2"], element["conductivity"], length
            )
        case "conv_cyl":
            mantle = shells.cylinder_area(element["r"], length)
            return shells.convection_resistance(element["h"], mantle)
        case "parallel":
            areas = [branch["area"] for branch in element["branches"]]
            walls = [plane_wall(b["thickness"], b["conductivity"]) for b in element["branches"]]
            whole: float = sum(areas)
            return parallel([part / whole for part in areas], walls) / whole
    raise KeyError(element["type"])


def network(inputs: Inputs, units: Units) -> Figures:
    """Heat flow from t1 to t2; ``T_n`` before and ``dT_n`` over element n, counted from 0."""
    resistances = [_element(element, inputs) for element in inputs["elements"]]
    total = series(*resistances)
    flow = (inputs["t1"] - inputs["t2"]) / total
    figures = {"R": total, "Q": flow, "Q_total": flow * inputs.get("scale", 1.0)}
    passed = 0.0
    for number, resistance in enumerate(resistances):
        figures[f"T_{number}"] = inputs["t1"] - flow * passed
        figures[f"dT_{number}"] = flow * resistance
        passed += resistance
    return figures


def contact_as_thickness(inputs: Inputs, units: Units) -> Figures:
    contact = 1.0 / inputs["conductance"]
    return {"L_equiv_cm": 100 * shells.equivalent_thickness(contact, inputs["conductivity"])}


def chip(inputs: Inputs, units: Units) -> Figures:
    """A chip cooled by air on one side, through joint and substrate on the other; 1 m2."""
    film = shells.convection_resistance(inputs["h"], 1.0)
    joint = shells.contact_resistance(inputs["contact"], 1.0)
    below = series(joint, plane_wall(inputs["thickness"], inputs["conductivity"]), film)
    both = 1.0 / (1.0 / film + 1.0 / below)
    return {"Tc": inputs["t_air"] + inputs["q"] * both}


def critical_radius(inputs: Inputs, units: Units) -> Figures:
    if "radius" in inputs:
        mantle = shells.cylinder_area(inputs["radius"])
        return {"R": shells.convection_resistance(inputs["h"], mantle)}
    return {"r_mm": 1000 * shells.critical_radius(inputs["conductivity"], inputs["h"])}


# ------------------------------------------------------------------------------- moisture


def saturation(inputs: Inputs, units: Units) -> Figures:
    return {"p_sat": vapour.saturation_pressure(inputs["T"])}


def critical_surface(inputs: Inputs, units: Units) -> Figures:
    pressure = inputs["humidity"] * vapour.saturation_pressure(inputs["T_i"])
    least = surface.least_surface_temperature(pressure)
    factor = surface.critical_factor(least, inputs["T_e"], inputs["T_i"])
    assert factor is not None
    return {"T_min": least, "f_min": factor}


def plain_surface(inputs: Inputs, units: Units) -> Figures:
    return {"f": plain_factor(inputs["R"])}


# ------------------------------------------------- glazing, ground, films: formulas of standards


def glazing(inputs: Inputs, units: Units) -> Figures:
    gas = mixture(_gases()[inputs["gas"]], _gases()["air"], inputs["gas_share"])
    gaps = [gap / 1000.0 for gap in inputs["gaps_mm"]]
    panes = [pane / 1000.0 for pane in inputs["panes_mm"]]
    value = glazing_u(
        panes,
        gaps,
        [gas] * len(gaps),
        [tuple(pair) for pair in inputs["emissivities"]],
        inputs["h_inside"],
        inputs["h_outside"],
    )
    return {"Ug": value}


def coated_glazing(inputs: Inputs, units: Units) -> Figures:
    """Equal spaces, one face of each coated; the other is uncoated glass of corrected 0.837."""
    gas = mixture(_gases()[inputs["gas"]], _gases()["air"], inputs["gas_share"])
    coated = inputs["normal"] * corrected_ratio(inputs["normal"])
    spaces = inputs["spaces"]
    panes = [inputs["pane_mm"] / 1000.0] * (spaces + 1)
    gaps = [inputs["gap_mm"] / 1000.0] * spaces
    return {"Ug": glazing_u(panes, gaps, [gas] * spaces, [(0.837, coated)] * spaces)}


def window_space(inputs: Inputs, units: Units) -> Figures:
    coated = inputs["normal"] * corrected_ratio(inputs["normal"])
    gap = inputs["thickness_mm"] / 1000.0
    (resistance,), _ = space_resistances([gap], [_gases()["air"]], [(0.837, coated)])
    return {"R": resistance}


@cache
def _gases() -> dict[str, Gas]:
    with (DATA / "gases.csv").open(encoding="utf-8", newline="") as file:
        return {
            row["id"]: Gas(
                float(row["density"]),
                float(row["viscosity"]),
                float(row["conductivity"]),
                float(row["specific_heat"]),
            )
            for row in csv.DictReader(file)
        }


def conversion(inputs: Inputs, units: Units) -> Figures:
    keys = ("declared", "per_kelvin", "kelvins", "per_moisture", "moisture")
    return {"k": design_conductivity(*(inputs[key] for key in keys))}


def basement_wall(inputs: Inputs, units: Units) -> Figures:
    soil = inputs["soil_conductivity"]
    wall = wall_thickness(soil, inputs["inside"], inputs["wall_resistance"], inputs["outside"])
    return {"U": basement_wall_u(inputs["depth"], wall, inputs["floor_thickness"], soil)}


def slab_edge(inputs: Inputs, units: Units) -> Figures:
    soil, size = inputs["soil_conductivity"], inputs["size"]
    reach = size if inputs["kind"] == "horizontal" else 2.0 * size
    added = edge_thickness(inputs["resistance"], inputs["thickness"], soil)
    return {"psi": edge_psi(soil, reach, inputs["floor_thickness"], added)}


def film_by_convection(inputs: Inputs, units: Units) -> Figures:
    keys = ("convective", "emittance", "temperature")
    return {"Rs": surface_resistance(*(inputs[key] for key in keys))}


def film_by_wind(inputs: Inputs, units: Units) -> Figures:
    convective = convection_by_wind(inputs["speed"])
    return {"Rs": surface_resistance(convective, inputs["emittance"], inputs["temperature"])}


def air_voids(inputs: Inputs, units: Units) -> Figures:
    keys = ("level_correction", "r1", "r_total")
    return {"dU": void_correction(*(inputs[key] for key in keys))}


def inverted_roof(inputs: Inputs, units: Units) -> Figures:
    keys = ("precipitation", "r1", "r_total", "drained")
    return {"dU": rain_correction(*(inputs[key] for key in keys))}


def metal_zone(inputs: Inputs, units: Units) -> Figures:
    width, distance, spacing = (
        to_si(inputs[key], units["W"]) for key in ("metal", "distance", "spacing")
    )
    zone = zone_width(width, distance)
    return {"W": convert(zone, units["W"]), "rest": convert(spacing - zone, units["rest"])}


# ------------------------------------------------------------------------------- climate zones


def degree_day_limit(inputs: Inputs, units: Units) -> Figures:
    """The limit where a zone begins, found by its own function and printed in both systems."""
    limit, zone = inputs["dd_si"], inputs["zone"]
    above = climate_zone.thermal_zone(0.0, limit + 1e-6)
    begins = above == zone != climate_zone.thermal_zone(0.0, limit)
    return {"dd_ip": convert(limit if begins else float("nan"), units["dd_ip"])}


def thermal_zone(inputs: Inputs, units: Units) -> Figures:
    heating, cooling = (to_si(inputs[key], "degF*d") for key in ("hdd65", "cdd50"))
    marine = inputs["marine"]
    return {"zone": climate_zone.thermal_zone(heating, cooling, marine=marine, hottest=1)}


def dryness(inputs: Inputs, units: Units) -> Figures:
    return {"dry": climate_zone.is_dry(inputs["precipitation_cm"], inputs["mean_temperature"])}


ADAPTERS: dict[str, Callable[[Inputs, Units], Figures]] = {
    "series": series_sum,
    "parallel_path": parallel_path,
    "cavity_factor": cavity_factor,
    "combined": combined,
    "air_space_iso6946": air_space,
    "radiative_coefficient": radiative_coefficient,
    "fastener_correction": fasteners,
    "tapered": tapered,
    "slab": slab,
    "perimeter_ratio": perimeter_ratio,
    "window": window,
    "films": films,
    "materials": materials,
    "compressed": compressed,
    "units": unit_factor,
    "network": network,
    "contact_as_thickness": contact_as_thickness,
    "chip": chip,
    "critical_radius": critical_radius,
    "saturation_pressure": saturation,
    "critical_surface": critical_surface,
    "plain_surface": plain_surface,
    "glazing": glazing,
    "coated_glazing": coated_glazing,
    "window_space": window_space,
    "design_conductivity": conversion,
    "basement_wall": basement_wall,
    "edge_psi": slab_edge,
    "film_by_convection": film_by_convection,
    "film_by_wind": film_by_wind,
    "air_voids": air_voids,
    "inverted_roof": inverted_roof,
    "metal_zone": metal_zone,
    "degree_day_limit": degree_day_limit,
    "thermal_zone": thermal_zone,
    "dryness": dryness,
    **field_adapters.ADAPTERS,
}
