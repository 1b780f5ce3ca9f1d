"""What of an assembly can be changed to lower its heat flow, and how it is changed.

A lever turns one number of the project file. ``more`` lowers the heat flow where it is True, less
where it is False.
"""

from __future__ import annotations

from collections.abc import Callable, Iterable, Iterator
from functools import partial
from typing import Any, NamedTuple

from envcheck.model.advised import Edit, Path
from envcheck.model.layers import (
    FramedLayer,
    Layer,
    Material,
    MaterialLayer,
    ResistanceLayer,
    TaperedLayer,
)
from envcheck.model.project import Assembly

INSULATING = 0.1
"""W/(m K) below which a layer counts as insulation whose thickness may be asked for; common
practice, no source."""
THICKEST = 1.0
"""m up to which a layer is made thicker in search of a cure."""
BEST = 0.005
"""W/(m K) down to which another conductivity is looked for: below it no board is sold; common
practice, no source."""
LEAST_SHARE = 0.0


class Lever(NamedTuple):
    """One number that may be changed."""

    kind: str
    what: str
    now: float
    quantity: str
    more: bool
    most: float
    """The farthest value that is looked at."""
    applied: Callable[[float], Assembly]
    paths: tuple[Path, ...]
    shifts: tuple[float, ...] = (0.0,)
    """What each value of the file is more than the lever's: of a taper its greatest thickness."""
    material: Material | None = None
    structural: bool = False

    def edits(self, value: float) -> tuple[Edit, ...]:
        """What is typed into the project file for a value of the lever."""
        pairs = zip(self.paths, self.shifts, strict=True)
        return tuple(Edit(path, value + shift, self.quantity, self.more) for path, shift in pairs)

    def resistance(self, value: float) -> float | None:
        """Resistance of the layer at a value of the lever, m2 K/W."""
        if self.kind in ("label", "resistance"):
            return value
        if self.kind in ("thickness", "taper") and self.material is not None:
            return value / self.material.conductivity
        return None


def levers(assembly: Assembly, own_materials: Iterable[str]) -> tuple[Lever, ...]:
    """Levers of an assembly. own_materials: ids of those that the project file itself states."""
    found = [
        lever
        for place, layer in enumerate(assembly.layers)
        for lever in _of_layer(assembly, place, layer)
    ]
    return (*found, *_conductivities(assembly, set(own_materials)), *_products(assembly))


def _of_layer(assembly: Assembly, place: int, layer: Layer) -> Iterator[Lever]:
    at: Path = ("assemblies", assembly.id, "layers", place)
    if isinstance(layer, MaterialLayer) and layer.material.conductivity <= INSULATING:
        yield Lever(
            "thickness", layer.title, layer.thickness, "thickness", True, THICKEST,
            _setter(assembly, place, layer, "thickness"), ((*at, "thickness"),),
            material=layer.material,
        )  # fmt: skip
    elif isinstance(layer, TaperedLayer) and not layer.pieces:
        yield Lever(
            "taper", layer.title, layer.least, "thickness", True, THICKEST,
            _taper(assembly, place, layer), ((*at, "least"), (*at, "greatest")),
            (0.0, layer.greatest - layer.least), layer.material,
        )  # fmt: skip
    elif isinstance(layer, ResistanceLayer) and _insulates(layer):
        yield Lever(
            "resistance", layer.title, layer.resistance, "resistance", True, 20.0,
            _setter(assembly, place, layer, "resistance"), ((*at, "resistance"),),
        )  # fmt: skip
    elif isinstance(layer, FramedLayer):
        yield from _of_framing(assembly, place, layer, at)


def _insulates(layer: ResistanceLayer) -> bool:
    return layer.material is not None and layer.material.material_class == "insulation"


def _of_framing(assembly: Assembly, place: int, layer: FramedLayer, at: Path) -> Iterator[Lever]:
    fill = layer.fill
    if fill.label is not None and fill.installed_label is None:
        yield Lever(
            "label", layer.title, fill.label, "resistance", True, 4.0 * fill.label,
            lambda x: _with(assembly, place, layer._replace(fill=fill._replace(label=x))),
            ((*at, "fill", "label"),),
        )  # fmt: skip
    if fill.material is not None and layer.member.profile is None and not layer.extras:
        yield Lever(
            "thickness", layer.title, layer.thickness, "thickness", True, THICKEST,
            _setter(assembly, place, layer, "thickness"), ((*at, "thickness"),),
            material=fill.material,
        )  # fmt: skip
    if layer.share is not None:
        yield Lever(
            "share", layer.title, layer.share, "share", False, LEAST_SHARE,
            _setter(assembly, place, layer, "share"), ((*at, "share"),),
        )  # fmt: skip
    elif layer.member.spacing is not None:
        spacing = layer.member.spacing
        yield Lever(
            "spacing", layer.title, spacing, "thickness", True, 10.0 * spacing,
            lambda x: _with(
                assembly, place, layer._replace(member=layer.member._replace(spacing=x))
            ),
            ((*at, "member", "spacing"),), structural=True,
        )  # fmt: skip


def _conductivities(assembly: Assembly, own: set[str]) -> Iterator[Lever]:
    """Materials of insulating layers, each once: another one of less conductivity."""
    seen: dict[str, Material] = {}
    for layer in assembly.layers:
        material = _insulation_of(layer)
        if material is not None and material.id in own:
            seen.setdefault(material.id, material)
    for material in seen.values():
        yield Lever(
            "conductivity", material.title, material.conductivity, "conductivity", False, BEST,
            partial(conducting, assembly, material), (("materials", material.id, "conductivity"),),
            material=material,
        )  # fmt: skip


def _insulation_of(layer: Layer) -> Material | None:
    material = None
    if isinstance(layer, MaterialLayer | TaperedLayer):
        material = layer.material
    elif isinstance(layer, FramedLayer):
        material = layer.fill.material
    return material if material is not None and material.conductivity <= INSULATING else None


def _products(assembly: Assembly) -> Iterator[Lever]:
    rated, window = assembly.rated, assembly.window
    if rated is not None and rated.u_factor is not None:
        yield Lever(
            "product", assembly.title, rated.u_factor, "u_factor", False, 0.01,
            lambda x: assembly._replace(rated=rated._replace(u_factor=x)),
            (("assemblies", assembly.id, "u_factor"),),
        )  # fmt: skip
    if window is not None and window.frame_width is not None and window.u_glass is not None:
        light = window.lights[0]

        def glazed(x: float) -> Assembly:
            other = light._replace(infill=light.infill._replace(u=x))
            return assembly._replace(window=window._replace(lights=(other,)))

        yield Lever(
            "glass", assembly.title, window.u_glass, "u_factor", False, 0.01, glazed,
            (("assemblies", assembly.id, "u_glass"),),
        )  # fmt: skip


def turned(assembly: Assembly) -> tuple[Lever, ...]:
    """What may grow while the assembly stays within its limit: fasteners, bridges."""
    found = []
    for place, fasteners in enumerate(assembly.fasteners):
        changed = _listed(assembly, "fasteners", place)
        found.append(
            Lever("density", f"fasteners through {fasteners.layer}", fasteners.density, "per_area",
                  False, 0.0, _field(changed, fasteners, "density"),
                  (("assemblies", assembly.id, "fasteners", place, "density"),), structural=True)
        )  # fmt: skip
    for place, bridge in enumerate(assembly.bridges):
        if bridge.detail is None and bridge.drawn is None:
            changed = _listed(assembly, "bridges", place)
            kind, quantity = ("psi", "linear_transmittance")
            if bridge.kind == "point":
                kind, quantity = ("chi", "point_transmittance")
            found.append(
                Lever(kind, bridge.title, bridge.value, quantity, False, 0.0,
                      _field(changed, bridge, "value"),
                      (("assemblies", assembly.id, "bridges", place, kind),), structural=True)
            )  # fmt: skip
    return tuple(found)


# --------------------------------------------------------------------------- changed assemblies


def _with(assembly: Assembly, place: int, layer: Layer) -> Assembly:
    layers = assembly.layers
    return assembly._replace(layers=(*layers[:place], layer, *layers[place + 1 :]))


def _setter(assembly: Assembly, place: int, layer: Any, field: str) -> Callable[[float], Assembly]:
    return lambda x: _with(assembly, place, layer._replace(**{field: x}))


def _taper(assembly: Assembly, place: int, layer: TaperedLayer) -> Callable[[float], Assembly]:
    rise = layer.greatest - layer.least
    return lambda x: _with(assembly, place, layer._replace(least=x, greatest=x + rise))


def conducting(part: Any, material: Material, conductivity: float) -> Any:
    """The same assembly, or part of one, whose material conducts otherwise wherever it stands."""
    if isinstance(part, Material):
        return part._replace(conductivity=conductivity) if part == material else part
    if not isinstance(part, tuple):
        return part
    inner = [conducting(one, material, conductivity) for one in part]
    return type(part)(*inner) if hasattr(part, "_fields") else tuple(inner)


def _listed(assembly: Assembly, field: str, place: int) -> Callable[[object], Assembly]:
    whole: Any = assembly
    items = getattr(assembly, field)

    def changed(item: object) -> Assembly:
        made: Assembly = whole._replace(**{field: (*items[:place], item, *items[place + 1 :])})
        return made

    return changed


def _field(
    changed: Callable[[object], Assembly], item: Any, field: str
) -> Callable[[float], Assembly]:
    return lambda x: changed(item._replace(**{field: x}))
