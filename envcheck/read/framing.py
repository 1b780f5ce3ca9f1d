"""Framed layers: members at a spacing or a share, extras, and the insulation that they cross."""

from __future__ import annotations

from envcheck.model.project import Extra, FramedLayer, Layer, Material, Member, Profile
from envcheck.read.context import MATCHES, NAN, Context
from envcheck.read.fills import read_fill
from envcheck.read.materials import library_profile, profile_ids
from envcheck.read.yaml_reader import Entry

INSULATING = 0.065
"""W/(m K); a fill that conducts less is insulation whatever its class."""
METAL = 1.0
"""W/(m K) above which framing counts as metal, for wood conducts 0.1-0.2."""


def read_framed(context: Context, entry: Entry) -> Layer:
    """Read members with infill between them."""
    thickness = context.positive(entry, "thickness", "length")
    share = context.share(entry, "share") if "share" in entry else None
    member = _member(context, entry["member"], thickness, share)
    extras = tuple(_extra(context, extra) for extra in entry.get("extras", ()))
    framing = member.width / member.spacing if share is None and member.spacing else share or 0.0
    total = framing + sum(extra.share for extra in extras)
    if total >= 1 and framing < 1:
        line = entry.lines["extras" if extras else "share"]
        context.add("shares-over-one", line, total=f"{100 * total:.4g} %")
    return FramedLayer(
        "framed",
        entry.get("title", "framing"),
        entry.line,
        thickness,
        member,
        read_fill(context, entry["fill"], "the fill of the framed layer", thickness),
        share,
        entry.get("share_from", ""),
        extras,
        entry.get("orientation", "vertical"),
        False,
    )


def _member(context: Context, entry: Entry, thickness: float, share: float | None) -> Member:
    spacing = context.optional(entry, "spacing", "length")
    profile = _profile(context, entry, thickness) if "profile" in entry else None
    if profile is not None:
        width = profile.flange
        if "width" in entry:
            context.exactly_one(entry, ("profile", "width"), "the member")
    elif "width" in entry:
        width = context.positive(entry, "width", "length")
    else:
        width = share * (spacing or 1.0) if share is not None else NAN
    for key, missing in (
        ("width", width != width and "width" not in entry and profile is None),
        ("spacing", spacing is None and (share is None or profile is not None)),
    ):
        if missing:
            hint = ", or state the framing share" if profile is None else ""
            context.add("missing-key", entry.line, key=key, where="the member", hint=hint)
    if spacing is not None and width >= spacing:
        found = f"{entry.get('width', 'the flange')} at {entry['spacing']}"
        context.add("framing-too-wide", entry.lines["spacing"], found=found)
        spacing = NAN
    elif profile is not None and spacing is not None and _reach(profile) > spacing:
        found = f"{_reach(profile) * 1000:.4g} mm from edge to edge at {entry['spacing']}"
        context.add("framing-too-wide", entry.lines["spacing"], found=found)
    if "material" in entry:
        material = context.material(entry)
    elif profile is not None:
        material = _steel(context)
    else:
        material = Material("", "", NAN)
        context.exactly_one(entry, ("profile", "material"), "the member")
    return Member(material, width, spacing, profile)


def _reach(profile: Profile) -> float:
    """Width along the wall that a profile needs, centred on its inner flange or crown, m."""
    if profile.shape == "Z":
        return 3 * profile.flange - 2 * profile.thickness
    if profile.shape == "hat":
        return profile.flange + 2 * max(profile.lip - profile.thickness, 0.0)
    return profile.flange


def _steel(context: Context) -> Material:
    steel = Entry(0)
    steel["material"] = "steel"
    return context.material(steel)


def _profile(context: Context, member: Entry, thickness: float) -> Profile:
    stated, line = member["profile"], member.lines["profile"]
    if isinstance(stated, str):
        found = library_profile(stated)
        if found is None:
            context.unknown("unknown-profile", line, stated, profile_ids())
            return Profile(stated, NAN, NAN, NAN)
        profile = found
    else:
        profile = Profile(
            id="as described",
            web=context.positive(stated, "web", "length"),
            flange=context.positive(stated, "flange", "length"),
            thickness=context.positive(stated, "thickness", "length"),
            lip=context.optional(stated, "lip", "length") or 0.0,
            shape=stated.get("shape", "C"),
            source=stated.get("source", ""),
        )
    for key, size, limit, words in (
        ("web", profile.web, thickness, "the thickness of the layer"),
        ("thickness", 2 * profile.thickness, min(profile.web, profile.flange), "half the profile"),
        ("lip", 0.0 if profile.shape == "hat" else 2 * profile.lip, profile.web, "half the web"),
    ):
        if size > limit + MATCHES:
            found_size = f"{size * 1000:.4g} mm against {limit * 1000:.4g} mm"
            context.add("too-thick", line, found=found_size, key=key, limit=words)
    return profile


def _extra(context: Context, entry: Entry) -> Extra:
    return Extra(
        entry["title"],
        context.share(entry, "share"),
        context.material(entry),
        context.positive(entry, "thickness", "length"),
    )


def with_crossed_insulation(layers: list[Layer]) -> tuple[Layer, ...]:
    """Mark insulation that metal members interrupt outside (or inside) the main framing.

    Z and hat profiles carry cladding or lining, so what lies between them is never the main
    framing; of all other framed layers the main one is the thickest, the innermost of equals.
    """
    carrying = [
        (layer.thickness, place)
        for place, layer in enumerate(layers)
        if isinstance(layer, FramedLayer) and not _carries_cladding(layer)
    ]
    main = max(carrying)[1] if carrying else -1
    return tuple(
        layer._replace(crosses_insulation=True)
        if isinstance(layer, FramedLayer) and place != main and _interrupts(layer)
        else layer
        for place, layer in enumerate(layers)
    )


def _carries_cladding(layer: FramedLayer) -> bool:
    return layer.member.profile is not None and layer.member.profile.shape in ("Z", "hat")


def _interrupts(layer: FramedLayer) -> bool:
    metal = layer.member.profile is not None or layer.member.material.conductivity > METAL
    fill = layer.fill.material
    insulates = layer.fill.label is not None or (
        fill is not None and (fill.material_class == "insulation" or fill.conductivity < INSULATING)
    )
    return metal and insulates
