"""A project as read: SI numbers, resolved references, defaults, files."""

from __future__ import annotations

import io
import sys
from datetime import date
from hashlib import sha256
from pathlib import Path
from typing import Any

import pytest

from envcheck.errors import InputError
from envcheck.model.project import (
    AirSpaceLayer,
    FramedLayer,
    MasonryLayer,
    MaterialLayer,
    Project,
    TaperedLayer,
)
from envcheck.read.files import LARGEST
from envcheck.read.materials import categories, library_material, library_profile, rows
from envcheck.read.project import project_from_bytes, read_project
from tests.read.names import NAMES

SOUND = Path(__file__).parent.parent / "cases" / "sound"
R_IP = 0.1761101838  # m2 K/W in one h ft2 F/Btu (SI 10, from memory: 0.176110)

HEAD = "envcheck: 1\nproject: {title: T}\nrule_sets: [any]\nassemblies:\n"


def read(text: str, folder: Path = SOUND) -> Project:
    return project_from_bytes(text.encode(), "p.yaml", folder, NAMES)


def layers(*lines: str) -> tuple[Any, ...]:
    body = "".join(f"      - {line}\n" for line in lines)
    return read(f"{HEAD}  W:\n    title: W\n    layers:\n{body}").assemblies["W"].layers


@pytest.fixture(scope="module")
def shed() -> Project:
    return read_project(str(SOUND / "shed.yaml"), NAMES)


def converted(conversion: str, declared: str = "0.035 W/(m*K)") -> tuple[Any, Any]:
    wool = f"{{declared: {declared}, source: label, conversion: {conversion}}}"
    project = read(f"{HEAD}  D: {{kind: rated, title: D}}\nmaterials:\n  wool: {wool}\n")
    return project.materials["wool"], project.materials["wool"].conversion


def test_declared_conductivity_is_converted_by_its_class() -> None:
    # ISO 10456:2007, annex A and table 4 (from memory): boards of 0.034 and 0.036 have 0.0043 and
    # 0.0048 per K, mineral wool 4 per share of volume. 0.035: halfway, 0.00455.
    # 0.035 x exp(0.00455 x 10) = 0.036629; with 2 % of moisture x exp(0.08) = 0.039680.
    wool, conversion = converted("{class: mineral_wool_board, temperature: 20 degC}")
    assert conversion.per_kelvin == pytest.approx(0.00455)
    assert wool.conductivity == pytest.approx(0.036629, abs=5e-7)
    assert "annex A" in conversion.source
    wet, _ = converted("{class: mineral_wool_board, temperature: 20 degC, moisture: 2 %}")
    assert wet.conductivity == pytest.approx(0.039680, abs=5e-7)


def test_stated_coefficients_stand_above_the_class() -> None:
    wool, _ = converted(
        "{class: eps, temperature_coefficient: 0.0043, temperature: 68 degF, source: a report}"
    )
    # Recomputed from the printed formula: 0.035 x exp(0.0043 x 10) = 0.0365378.
    assert wool.conductivity == pytest.approx(0.0365378, abs=1e-7)
    assert wool.conversion.source == "a report"


@pytest.mark.parametrize("declared", ["0.032", "0.038"])
def test_ends_of_the_printed_range_belong_to_it(declared: str) -> None:
    _, conversion = converted(
        "{class: mineral_wool_board, temperature: 0 degC}", f"{declared} W/(m*K)"
    )
    assert conversion.per_kelvin == {"0.032": 0.0038, "0.038": 0.0053}[declared]
    assert conversion.conductivity < conversion.declared


def test_head_and_site(shed: Project) -> None:
    assert shed.title == "Shed at Saltmarsh"
    assert shed.permit_application_date == date(2026, 3, 2)
    assert shed.sha256 == sha256((SOUND / "shed.yaml").read_bytes()).hexdigest()
    ((name, days),) = shed.site.measures
    assert name == "hdd65" and days == pytest.approx(4870 / 1.8)
    assert shed.site.indoor_temperature == pytest.approx(21.1111, abs=1e-4)
    assert shed.site.zones[0].zone == "V3"
    assert [(r.id, r.decides) for r in shed.rule_sets] == [("saltmarsh-2025", True)]
    assert [(f.name, f.value, f.sheet) for f in shed.facts] == [
        ("space_category", "conditioned", "G-001")
    ]


def test_layers_in_si(shed: Project) -> None:
    siding, space, foam, studs, _ = shed.assemblies["W1"].layers
    assert isinstance(siding, MaterialLayer) and siding.thickness == pytest.approx(0.0127)
    assert isinstance(space, AirSpaceLayer) and space.emittances == (0.9, 0.9)
    assert space.ventilation == "unventilated"
    assert isinstance(foam, MaterialLayer)
    # R-5 for 1 in: k = 0.0254 / (5 x 0.17611)
    assert foam.material.conductivity == pytest.approx(0.0254 / (5 * R_IP))
    assert isinstance(studs, FramedLayer)
    assert (studs.member.width, studs.member.spacing) == pytest.approx((0.0381, 0.4064))
    assert studs.fill.label == pytest.approx(21 * R_IP)
    assert studs.extras[0].share == pytest.approx(0.04)
    assert (studs.orientation, studs.crosses_insulation) == ("vertical", False)
    declared = shed.assemblies["W1"].declared
    assert declared is not None and declared.text == "0.050 Btu/(h*ft2*degF)"
    assert declared.value == pytest.approx(0.050 * 5.678263, rel=1e-6)


def test_other_kinds(shed: Project) -> None:
    block = shed.assemblies["W2"].layers[0]
    assert isinstance(block, MasonryLayer)
    assert block.cell_resistance == pytest.approx(0.97 * R_IP)
    assert (block.shell, block.web_share) == pytest.approx((0.03175, 0.2))
    rated = shed.assemblies["CW"].rated
    assert rated is not None and (rated.evidence, rated.basis) == ("rating", "whole_product")
    slab = shed.assemblies["G1"].slab
    assert slab is not None
    assert (slab.insulation, slab.heated) == ("vertical", None)
    assert slab.extent == pytest.approx(0.6096)


def test_amounts(shed: Project) -> None:
    wall, window = shed.elements["N-W1"], shed.elements["N-WIN"]
    assert window.net_area == pytest.approx(2 * 1.2 * 1.5)
    assert wall.gross_area == pytest.approx(500 * 0.09290304)
    assert wall.net_area == pytest.approx(500 * 0.09290304 - 3.6)
    assert shed.elements["G1"].perimeter == pytest.approx(27.432)
    assert (wall.tilt, shed.elements["G1"].tilt) == (90.0, 180.0)
    assert wall.adjoins == "outdoors"
    assert shed.exceptions[0].evidence_found is False


def test_markup_in_titles_is_plain_text() -> None:
    project = read_project(str(SOUND / "markup.yaml"), NAMES)
    assert project.title == "<script>alert(1)</script> *bold* [red]x[/red] =1+1 {{7*7}} %s"


def test_byte_order_mark_and_windows_line_ends_change_nothing(shed: Project) -> None:
    other = read_project(str(SOUND / "bom-crlf.yaml"), NAMES)
    assert other.assemblies == shed.assemblies and other.elements == shed.elements


GIRT = (
    "{kind: framed, title: girts, thickness: 3 in, member: {profile: {shape: Z, web: 3 in,"
    " flange: 1.5 in, thickness: 0.0538 in}, spacing: 16 in}, fill: {material: mineral_wool_board}}"
)
STUD = (
    "{kind: framed, title: studs, thickness: 3-5/8 in, member: {profile:"
    " c_3-5/8_x_1-5/8_43mil, spacing: 16 in}, fill: {label: R-13}}"
)


def test_metal_through_outer_insulation_is_seen() -> None:
    girts, studs = layers(GIRT, STUD)
    assert girts.crosses_insulation and not studs.crosses_insulation
    assert girts.member.material.id == "steel"
    assert studs.member.width == pytest.approx(0.041275)
    (alone,) = layers(GIRT)
    assert alone.crosses_insulation
    (stud,) = layers(STUD)
    assert not stud.crosses_insulation


def test_wood_battens_cross_no_insulation() -> None:
    wood = (
        "{kind: framed, title: t, thickness: %s, member: {material: softwood, width: 45 mm,"
        " spacing: 600 mm}, fill: {material: mineral_wool}}"
    )
    assert not any(x.crosses_insulation for x in layers(wood % "60 mm", wood % "200 mm"))


def test_framing_by_share_alone() -> None:
    (layer,) = layers(
        "{kind: framed, title: t, thickness: 90 mm, member: {material: softwood}, share: 25 %,"
        " fill: {air_space: {thickness: 90 mm, ventilation: unventilated}}}"
    )
    assert (layer.share, layer.member.spacing) == (0.25, None)
    assert layer.fill.air is not None and layer.fill.air.thickness == pytest.approx(0.09)


def test_solid_masonry_and_tapered() -> None:
    brick, taper = layers(
        "{kind: masonry, title: brick, thickness: 100 mm, material: solid_brick,"
        " mortar: {material: mortar, share: 15 %}}",
        "{kind: tapered, title: slope, material: polyiso, least: 0 mm, greatest: 8 in}",
    )
    assert (brick.web_share, brick.joint_share, 2 * brick.shell) == pytest.approx((1, 0.15, 0.1))
    assert isinstance(taper, TaperedLayer) and taper.shape == "rectangle"


def test_facts_words_numbers_and_quantities() -> None:
    text = (
        HEAD.replace(
            "assemblies",
            "facts: {a: true, b: no, c: 3, d: 6 Btu/(h*ft2), e: 5A, f: nan m2, g: 1e400 m2}\n"
            "assemblies",
        )
        + "  W: {title: W, layers: [{kind: contact, resistance: 0.1 m2*K/W}]}\n"
    )
    facts = {f.name: f.value for f in read(text).facts}
    assert facts["a"] == "yes" and facts["b"] == "no" and facts["c"] == 3.0 and facts["e"] == "5A"
    # 1 Btu/(h ft2) = 3.154591 W/m2 (SI 10, from memory)
    assert facts["f"] == "nan m2" and facts["g"] == "1e400 m2"  # no numbers of the grammar
    assert facts["d"] == pytest.approx(6 * 3.154591, rel=1e-6)


def test_a_layer_of_no_resistance_may_be_listed() -> None:
    (deck,) = layers("{kind: resistance, title: steel deck, resistance: R-0}")
    assert (deck.resistance, deck.evidence) == (0.0, "assumed")


# ------------------------------------------------------------------------------------- files


def problem_of(path: str) -> tuple[str, str, int | None]:
    with pytest.raises(InputError) as caught:
        read_project(path, NAMES)
    (only,) = caught.value.problems
    return only.kind.id, only.file, only.line


def test_files_that_cannot_be_read(tmp_path: Path) -> None:
    assert problem_of(str(tmp_path)) == ("file-is-folder", str(tmp_path), None)
    missing = str(tmp_path / "none.yaml")
    assert problem_of(missing) == ("file-missing", missing, None)
    assert problem_of("a\0b")[0] == "file-unreadable"
    assert problem_of("x" * 5000)[0] == "file-unreadable"
    assert problem_of(str(SOUND / "shed.yaml" / "below"))[0] == "file-unreadable"


def test_a_file_that_is_too_large(tmp_path: Path) -> None:
    large = tmp_path / "large.yaml"
    with large.open("wb") as file:
        file.truncate(LARGEST + 1)
    assert problem_of(str(large))[0] == "file-too-large"


def test_standard_input(monkeypatch: pytest.MonkeyPatch, shed: Project) -> None:
    raw = (SOUND / "shed.yaml").read_bytes()
    monkeypatch.setattr(sys, "stdin", io.TextIOWrapper(io.BytesIO(raw)))
    project = read_project("-", NAMES)
    assert project.file == "<stdin>" and project.assemblies == shed.assemblies
    monkeypatch.setattr(sys, "stdin", io.TextIOWrapper(io.BytesIO(b"- a")))
    assert problem_of("-") == ("root-not-mapping", "<stdin>", 1)


CLAIM = (
    HEAD
    + "  W: {title: W, layers: [{kind: contact, resistance: 0.1 m2*K/W}]}\n"
    + "elements: {E: {assembly: W, category: wall.other, net_area: 1 m2}}\n"
    + "exceptions: [{element: E, clause: '1', evidence: %s}]\n"
)


def test_evidence_lies_in_the_folder(tmp_path: Path) -> None:
    inside, outside = tmp_path / "project", tmp_path / "secret.txt"
    inside.mkdir()
    outside.write_text("x", encoding="utf-8")
    (inside / "letter.txt").write_text("x", encoding="utf-8")
    (inside / "link.txt").symlink_to(outside)
    assert read(CLAIM % "letter.txt", inside).exceptions[0].evidence_found
    assert not read(CLAIM % "other.txt", inside).exceptions[0].evidence_found
    assert not read(CLAIM % ".", inside).exceptions[0].evidence_found
    for path in ("link.txt", "../secret.txt", str(outside)):
        with pytest.raises(InputError, match=r"\[evidence-outside\]"):
            read(CLAIM % path, inside)


# ------------------------------------------------------------------------------------- library


def test_every_row_of_the_library_reads() -> None:
    for name in rows("materials"):
        material = library_material(name)
        assert material is not None and material.conductivity > 0 and material.source
    for name in rows("steel_profiles"):
        profile = library_profile(name)
        assert profile is not None
        assert 0 < 2 * profile.thickness < min(profile.web, profile.flange)
        assert 2 * profile.lip <= profile.web or profile.shape == "hat"
    assert {c.metric for c in categories().values()} == {
        "U_assembly",
        "U_product",
        "C_factor",
        "F_factor",
    }
    assert library_material("nothing") is None and library_profile("nothing") is None
