"""Materials and assemblies of a project: layers, slabs, windows, rated products."""

from __future__ import annotations

from envcheck.errors import did_you_mean, one_of
from envcheck.model.layers import Span
from envcheck.model.project import (
    Assembly,
    Bridge,
    Declared,
    Fasteners,
    Glazing,
    Layer,
    Material,
    Rated,
    Window,
)
from envcheck.read.additions import read_curved, read_inverted, read_voids
from envcheck.read.context import MATCHES, NAN, Context
from envcheck.read.ground import read_basement, read_slab, read_suspended
from envcheck.read.layers import read_layers
from envcheck.read.materials import class_band
from envcheck.read.yaml_reader import Entry

_BY_PARTS = ("window", "curtain-wall")
_DECLARED = {
    "u_factor": "u_factor",
    "resistance": "resistance",
    "c_factor": "u_factor",
    "f_factor": "linear_transmittance",
}


def read_material(context: Context, name: str, entry: Entry) -> Material:
    """Read a material: a conductivity, a declared one to convert, or R for a thickness."""
    where = f"material {name!r}"
    kind = context.exactly_one(entry, ("conductivity", "resistance", "declared"), where)
    conductivity, conversion, span = NAN, None, None
    if kind != "declared":
        hint = "it belongs beside 'declared'"
        context.out_of_place(entry, ("conversion",), f"{where} without a declared value", hint)
    if kind == "conductivity":
        conductivity, span = context.ranged(entry, "conductivity", "conductivity")
        conductivity = context.conducts(entry, "conductivity", conductivity)
        hint = "it belongs beside 'resistance'"
        context.out_of_place(entry, ("thickness",), f"{where} with a conductivity", hint)
    elif kind == "declared":
        from envcheck.read.conversions import read_conversion  # few projects convert

        conversion = read_conversion(context, entry, where)
        conductivity = conversion.conductivity if conversion is not None else NAN
        hint = "it belongs beside 'resistance'"
        context.out_of_place(entry, ("thickness",), f"{where} with a declared value", hint)
    elif kind == "resistance":
        resistance = context.positive(entry, "resistance", "resistance")
        if "thickness" in entry:
            thickness = context.positive(entry, "thickness", "length")
            conductivity = context.conducts(entry, "thickness", thickness / resistance)
        else:
            hint = ", the thickness that the resistance is stated for"
            context.add("missing-key", entry.line, key="thickness", where=where, hint=hint)
    if "range" in entry:
        span = _class_band(context, name, entry, conductivity, span)
    return Material(
        id=name,
        title=entry.get("title", name),
        conductivity=conductivity,
        density=context.optional(entry, "density", "density"),
        specific_heat=context.optional(entry, "specific_heat", "specific_heat"),
        material_class=entry.get("class", ""),
        source=entry.get("source", "assumed"),
        evidence=context.evidence(entry),
        combustible=entry.get("combustible", False),
        conversion=conversion,
        span=span,
        band=class_band(entry["class"]) if "class" in entry else None,
        mu=entry.get("mu"),
        mu_source=entry.get("mu_source", entry.get("source", "assumed")) if "mu" in entry else "",
    )


def _class_band(
    context: Context, name: str, entry: Entry, conductivity: float, stated: Span | None
) -> Span | None:
    """The band of the material's class as its range, W/(m K)."""
    from envcheck.read.materials import rows  # few projects ask for it

    context.ranges = True
    row = rows("material_classes").get(entry.get("class", ""))
    line = entry.lines["range"]
    if stated is not None:
        found, expected = "both +- and range", "one of them"
        hint = "keep the range that the source states, and leave out 'range'"
    elif row is None:
        stands = entry.get("class", "")
        found, expected = stands or "no class", one_of(rows("material_classes"))
        meant = did_you_mean(stands, rows("material_classes")) if stands else ""
        hint = meant or "add the 'class' of the material"
    else:
        low, high = float(row["low"]), float(row["high"])
        if not conductivity < low and not conductivity > high:
            return low, high
        found = f"{conductivity:.4g} W/(m*K)"
        expected = f"{low:g} to {high:g} W/(m*K), the band of class {entry['class']!r}"
        hint = "check conductivity and class, or state the range with +-"
    context.add("no-class-band", line, name=name, found=found, expected=expected, hint=hint)
    return None


def read_assembly(context: Context, name: str, entry: Entry) -> Assembly:
    """Read one construction of any kind."""
    kind = entry.get("kind", "layers")
    layers = read_layers(context, entry["layers"]) if "layers" in entry else ()
    if kind == "section":  # one drawn layer, and from here on layers like all others
        from envcheck.read.drawn import read_section

        kind, layers = "layers", (read_section(context, entry, layers),)
    films = {key: _film(context, entry, key) for key in ("outside_film", "inside_film")}
    drawn = kind == "layers" and any(layer.kind == "section" for layer in layers)
    if drawn:
        from envcheck.read.drawn_checks import check_films

        check_films(context, entry, films)
    return Assembly(
        id=name,
        kind=kind,
        title=entry["title"],
        sheet=entry.get("sheet", ""),
        line=entry.line,
        declared=read_declared(context, entry["declared"]) if "declared" in entry else None,
        layers=layers,
        fasteners=tuple(_fasteners(context, f, layers) for f in entry.get("fasteners", ())),
        bridges=tuple(_bridge(context, b, kind, layers) for b in entry.get("bridges", ())),
        window=_window(context, entry) if kind in _BY_PARTS else None,
        rated=_rated(context, entry) if kind == "rated" else None,
        slab=read_slab(context, entry) if kind == "slab-on-grade" else None,
        outside_film=films["outside_film"],
        inside_film=films["inside_film"],
        shgc=_plain(entry, "shgc") if kind in _BY_PARTS else None,
        glazing=_glazing(context, entry) if kind == "glazing" else None,
        voids=tuple(read_voids(context, void, layers) for void in entry.get("voids", ())),
        inverted=read_inverted(context, entry["inverted"], layers) if "inverted" in entry else None,
        curved=read_curved(context, entry, layers) if kind == "curved" else None,
        suspended=read_suspended(context, entry) if kind == "suspended-floor" else None,
        basement=read_basement(context, entry) if kind.endswith("-basement") else None,
        drawn=drawn,
    )


def _window(context: Context, entry: Entry) -> Window:
    from envcheck.read.windows import read_window  # most projects state rated products

    return read_window(context, entry)


def _glazing(context: Context, entry: Entry) -> Glazing:
    from envcheck.read.windows import read_glazing

    return read_glazing(context, entry)


def _film(context: Context, entry: Entry, key: str) -> float | None:
    return context.not_negative(entry, key, "resistance") if key in entry else None


def _plain(entry: Entry, key: str) -> float | None:
    return float(entry[key]) if key in entry else None


def read_declared(context: Context, entry: Entry) -> Declared | None:
    """Read a value as a drawing prints it: exactly one quantity, and its sheet."""
    key = context.exactly_one(entry, tuple(_DECLARED), "the declared value")
    if not key:
        return None
    quantity = _DECLARED[key]
    value = context.positive(entry, key, quantity)
    return Declared(value, quantity, entry[key], entry.get("sheet", ""))


def _fasteners(context: Context, entry: Entry, layers: tuple[Layer, ...]) -> Fasteners:
    titles = [layer.title for layer in layers]
    title = entry["layer"]
    penetration = context.optional(entry, "penetration", "length")
    if title not in titles:
        context.unknown("unknown-layer", entry.lines["layer"], title, titles)
    elif penetration is not None:
        layer = layers[titles.index(title)]
        thickness = getattr(layer, "greatest", getattr(layer, "thickness", NAN))
        if penetration > thickness + MATCHES:
            context.add(
                "too-thick",
                entry.lines["penetration"],
                found=entry["penetration"],
                expected=f"at most {thickness * 1000:.4g} mm",
                key="penetration",
                limit=f"the layer {title!r}",
            )
    return Fasteners(
        layer=title,
        material=context.material(entry),
        diameter=context.positive(entry, "diameter", "length"),
        density=context.positive(entry, "density", "per_area"),
        penetration=penetration,
        line=entry.line,
    )


def _bridge(context: Context, entry: Entry, kind: str, layers: tuple[Layer, ...]) -> Bridge:
    """Read a bridge spread over the area of the assembly."""
    if entry["kind"] != "point":
        value = linear(context, entry)
        amount = context.positive(entry, "length_per_area", "per_length")
        return bridge(context, entry, value, amount, per_area=True)
    if "drawn" not in entry:
        for key in ("chi", "density"):
            if key not in entry:
                hint = ", or draw the point"
                context.add("missing-key", entry.line, key=key, where="the bridge", hint=hint)
        chi = context.optional(entry, "chi", "point_transmittance")
        density = context.optional(entry, "density", "per_area")
        return bridge(context, entry, chi or NAN, density or NAN, per_area=True)
    if kind != "layers":
        context.out_of_place(
            entry, ("drawn",), f"a bridge of kind {kind!r}", "give chi and density instead"
        )
    hint = "the spacing of the drawn point says how many there are"
    context.out_of_place(entry, ("density",), "a drawn point bridge", hint)
    from envcheck.read.points import read_point  # few projects draw clips

    drawn = read_point(context, entry["drawn"], layers)
    per_area = 1.0 / (drawn.along * drawn.up) if drawn and drawn.along and drawn.up else NAN
    chi = context.optional(entry, "chi", "point_transmittance")
    found = bridge(context, entry, NAN if chi is None else chi, per_area, per_area=True)
    return found._replace(drawn=drawn)


def linear(context: Context, entry: Entry) -> float:
    """Read psi of a linear bridge, W/(m K); 0 where a drawn detail gives it."""
    key = context.exactly_one(entry, ("psi", "detail"), "the linear bridge")
    if key == "psi":
        return context.number(entry, "psi", "linear_transmittance")
    if key:
        if entry["detail"] not in context.detail_ids:
            line, name = entry.lines["detail"], entry["detail"]
            context.unknown("unknown-detail", line, name, context.detail_ids)
        hint = "delete it: the drawing is the source"
        context.out_of_place(entry, ("source", "evidence"), "a bridge with a detail", hint)
    return 0.0


def bridge(
    context: Context, entry: Entry, value: float, amount: float, *, per_area: bool
) -> Bridge:
    """Put together a bridge whose value, W/(m K) or W/K, and amount are read."""
    detail = context.details.get(entry.get("detail", ""))
    if detail is not None:
        title = entry.get("title", detail.title)
        source = f"detail {detail.id}" + (f", {detail.sheet}" if detail.sheet else "")
        line = entry.line
        return Bridge("line", title, 0.0, amount, per_area, source, "calculation", line, detail)
    return Bridge(
        kind=entry["kind"],
        title=entry.get("title", f"{entry['kind']} bridge"),
        value=value,
        amount=amount,
        per_area=per_area,
        source=entry.get("source", ""),
        evidence=context.evidence(entry),
        line=entry.line,
    )


def _rated(context: Context, entry: Entry) -> Rated:
    stated = entry.get("evidence", "assumed")
    evidence = {"kind": stated} if isinstance(stated, str) else stated
    found = True
    if isinstance(evidence, Entry) and "document" in evidence:
        is_file = "/" in evidence["document"] or "." in evidence["document"]
        found = context.inside_folder(evidence, "document") or not is_file
    return Rated(
        u_factor=context.optional(entry, "u_factor", "u_factor"),
        shgc=_plain(entry, "shgc"),
        visible_transmittance=_plain(entry, "visible_transmittance"),
        basis=entry.get("basis", "whole_product"),
        evidence=evidence["kind"],
        standard=evidence.get("standard", ""),
        document=evidence.get("document", ""),
        document_found=found,
    )
