"""Rule sets: found by id, folded by date, expanded to limits, with conventions and remarks.

The sets under ``tests/cases/rules`` and ``rules`` are invented. Conversions: exact definitions of
inch, pound and Btu (the International Table Btu of 1055.05585262 J).
"""

from __future__ import annotations

import json
import shutil
from datetime import date
from pathlib import Path

import pytest
from jsonschema import Draft202012Validator

from envcheck.errors import InputError
from envcheck.model.ruleset import Limit, RuleSet
from envcheck.read.rule_documents import known_ids
from envcheck.read.rulesets import default_folders, find, read_ruleset
from envcheck.read.schema import schema_text
from envcheck.read.yaml_reader import read_yaml
from tests.changed import changed
from tests.read.names import NAMES as FEW

HERE = Path(__file__).parent.parent
CASES = HERE / "cases" / "rules"
SHIPPED = HERE.parent / "rules"
METHODS = (
    "series", "parallel_path", "isothermal_planes", "weighted", "cavity_factor", "effective_layer",
    "two_dimensional", "c_factor", "f_factor", "iso13370_slab", "iso10077_window", "rated",
)  # fmt: skip
NAMES = changed(FEW, methods=METHODS)
DAY = date(2026, 3, 2)
R_IP = 3600 * 0.3048**2 * (5 / 9) / 1055.05585262


def shipped(name: str, on: date | None = DAY) -> RuleSet:
    return read_ruleset(name, [SHIPPED], on, NAMES)


def cell(ruleset: RuleSet, zone: str, row: str, metric: str, **when: str) -> Limit:
    found = [
        x
        for x in ruleset.limits
        if (x.zone, x.row, x.metric) == (zone, row, metric)
        and when.items() <= {c.dimension: c.text for c in x.when}.items()
    ]
    (limit,) = found
    return limit


# ------------------------------------------------------------------------------- finding


def test_known_ids_leave_other_folders_out(tmp_path: Path) -> None:
    (tmp_path / "empty").mkdir()
    shutil.copytree(CASES / "example-2024", tmp_path / "example-2024")
    assert known_ids([tmp_path]) == ("example-2024",)
    assert "template" in known_ids([SHIPPED])


@pytest.mark.parametrize("name", ["../rules/merrow-2025", "/etc", "a/b", "", "Merrow", "..", "."])
def test_paths_are_no_ids(name: str) -> None:
    folder, problem = find(name, [SHIPPED], ("project.yaml", 7))
    assert folder is None and problem is not None
    assert (problem.kind.id, problem.file, problem.line) == ("rule-set-not-id", "project.yaml", 7)


def test_unknown_id_suggests_a_known_one() -> None:
    with pytest.raises(InputError, match=r"did you mean 'merrow-2025'"):
        read_ruleset("merow-2025", [SHIPPED], DAY, NAMES, ("project.yaml", 7))
    with pytest.raises(InputError, match=r"no folder named rules"):
        read_ruleset("merrow-2025", [], DAY, NAMES)


def test_folders_given_or_nearest(tmp_path: Path) -> None:
    (tmp_path / "rules").mkdir()
    (tmp_path / "a" / "b").mkdir(parents=True)
    project = tmp_path / "a" / "b" / "project.yaml"
    assert default_folders(str(project)) == (tmp_path / "rules",)
    assert default_folders(str(project), ["x", "y"]) == (Path("x"), Path("y"))


def test_the_template_names_every_blank_cell() -> None:
    with pytest.raises(InputError) as caught:
        shipped("template")
    assert {p.kind.id for p in caught.value.problems} == {"blank-cell"}
    assert len(caught.value.problems) == 6


def test_the_template_filled_in_is_a_rule_set(tmp_path: Path) -> None:
    shutil.copytree(SHIPPED / "template", tmp_path / "template")
    sheet = tmp_path / "template" / "table-1.csv"
    sheet.write_text(sheet.read_text().replace(",,,P", ",0.060,0.050,P"))
    ruleset = read_ruleset("template", [tmp_path], DAY, NAMES)
    assert [x.cell for x in ruleset.limits] == ["0.060", "0.050"] * 3
    assert set(ruleset.conventions.where.values()) == {"default of envcheck", "not stated"}


def test_a_rule_set_of_fifteen_lines_and_one_sheet(tmp_path: Path) -> None:
    folder = tmp_path / "small"
    folder.mkdir()
    (folder / "t.csv").write_text("row,label,A,B,src\nwall.mass,Wall,0.5,0.4,P\n")
    (folder / "ruleset.yaml").write_text(
        "ruleset: small\n"
        'document: {title: Small, edition: "1"}\n'
        "jurisdiction: nowhere\n"
        "effective: {from: 2025-01-01, date_tested: permit}\n"
        "units: {U: W/(m2.K)}\n"
        'decimal: "."\n'
        "zones: {scheme: two, chosen_by: map, order: [A, B]}\n"
        "tables:\n"
        "  - {id: T, file: t.csv, clause: Table 1, metric: U_assembly}\n"
        "sources: {P: {what: invented}}\n"
    )
    ruleset = read_ruleset("small", [tmp_path], DAY, NAMES)
    assert [(x.zone, x.cell, x.unit) for x in ruleset.limits] == [
        ("A", "0.5", "W/(m2 K)"), ("B", "0.4", "W/(m2 K)"),
    ]  # fmt: skip
    assert (ruleset.units, ruleset.status, ruleset.rounding_stated) == ("SI", "transcribed", False)


# ------------------------------------------------------------------------------- long form


def test_a_cell_with_everything_about_it() -> None:
    limit = cell(shipped("merrow-2025"), "V3 and V2w", "wall.steel_frame", "R_insulation")
    assert limit.id == (
        "merrow-2025/T1/V3 and V2w/wall.steel_frame/R_insulation[space_category=conditioned]"
    )
    assert (limit.clause, limit.label) == ("Table 1", "Wall, steel-framed")
    assert (limit.cell, limit.sense, limit.unit) == ("13+9ci or 0+15ci", "min", "h ft2 F/Btu")
    assert [[(t.number, t.role) for t in alt] for alt in limit.alternatives] == [
        [(13, "cavity"), (9, "ci")], [(0, "cavity"), (15, "ci")],
    ]  # fmt: skip
    assert (limit.path, limit.applies_to) == ("insulation", "each_component")
    assert (limit.file, limit.line, limit.src) == ("merrow-2025/table-1.csv", 6, "E")


def test_slash_of_the_slab_row_becomes_two_conditions() -> None:
    ruleset = shipped("merrow-2025")
    cold = cell(ruleset, "V3 and V2w", "slab.edge", "F_factor", slab_heated="no")
    warm = cell(ruleset, "V3 and V2w", "slab.edge", "F_factor", slab_heated="yes")
    assert [x.alternatives[0][0].text for x in (cold, warm)] == ["0.54", "0.58"]
    r_value = cell(ruleset, "V3 and V2w", "slab.edge", "R_insulation", slab_heated="yes")
    term = r_value.alternatives[0][0]
    assert term.number == 15 and term.extent == pytest.approx(24 * 0.0254, rel=1e-12)
    assert cell(ruleset, "V1", "slab.edge", "F_factor", slab_heated="no").kind == "no_requirement"
    store = cell(ruleset, "V3 and V2w", "slab.edge", "F_factor", space_category="semiheated")
    assert [c.dimension for c in store.when] == ["space_category"]


def test_what_the_code_has_no_case_for() -> None:
    ruleset = shipped("merrow-2025")
    assert cell(ruleset, "V3 and V2w", "door.swinging", "R_insulation").kind == "not_covered"


def test_every_limit_has_its_own_id() -> None:
    for name in ("merrow-2025", "quillhaven-2025-3", "brannvik-2025"):
        ids = [limit.id for limit in shipped(name).limits]
        assert len(ids) == len(set(ids))


def test_footnotes_that_act_and_that_wait_for_the_official() -> None:
    ruleset = read_ruleset("example-2024", [CASES], DAY, NAMES)
    inside = {"mass_wall_insulation": "more_than_half_interior"}
    mass = cell(ruleset, "Zone 1", "wall.mass", "U_assembly", **inside)
    assert (mass.cell, mass.alternatives[0][0].text) == ("0.120", "0.120")
    assert [(n.mark, n.by_official, n.did) for n in mass.notes] == [
        ("a", False, "0.120 instead of 0.098")
    ]
    outside = {"mass_wall_insulation": "less_than_half_interior"}
    mass = cell(ruleset, "Zone 1", "wall.mass", "U_assembly", **outside)
    assert (mass.cell, mass.notes[0].did) == ("0.098", "does not apply")
    altered = cell(ruleset, "Zone 1", "wall.any", "U_assembly", work="alteration")
    assert altered.notes[0].text == "cavity filled to its full depth also complies"
    assert altered.notes[0].by_official


def test_an_alternative_in_another_metric() -> None:
    ruleset = read_ruleset("example-2024", [CASES], DAY, NAMES)
    limit = cell(ruleset, "Zone 3", "U", "U_product", wwr="<=0.30")
    assert [t.metric for (t,) in limit.alternatives] == ["", "ER"]
    assert limit.categories == ("fenestration.fixed", "fenestration.operable")


def test_zones_down_with_decimal_commas(tmp_path: Path) -> None:
    folder = tmp_path / "komma"
    folder.mkdir()
    (folder / "t.csv").write_text(
        "row;label;Wand U;Fenster Uw;src\nA;Zone A;0,28;Uw = 1,3[1];P\nB;Zone B;<;^;P\n"
    )
    (folder / "ruleset.yaml").write_text(
        "ruleset: komma\n"
        'document: {title: Invented, edition: "1"}\n'
        "jurisdiction: nowhere\n"
        "effective: {from: 2025-01-01, date_tested: permit}\n"
        "units: {U: W/(m2.K)}\n"
        'decimal: ","\n'
        'separator: ";"\n'
        "zones: {scheme: two, chosen_by: map, order: [A, B]}\n"
        "tables:\n"
        "  - id: T\n"
        "    file: t.csv\n"
        "    clause: Table 1\n"
        "    orientation: zones_down\n"
        "    heads:\n"
        "      Wand U: {element: [wall.mass, wall.other], metric: U_assembly}\n"
        "      Fenster Uw: {element: fenestration.fixed, metric: U_product, when: {work: new}}\n"
        "dimensions: {work: {values: [new, alteration]}}\n"
        'notes: {T: {"1": {effect: info, text: a remark}}}\n'
        "sources: {P: {what: invented}}\n"
    )
    with pytest.raises(InputError) as caught:
        read_ruleset("komma", [tmp_path], DAY, NAMES)
    assert [p.kind.id for p in caught.value.problems] == ["merged-across-quantities"]
    sheet = folder / "t.csv"
    sheet.write_text(sheet.read_text().replace("Zone B;<", "Zone B;0,24"))
    ruleset = read_ruleset("komma", [tmp_path], DAY, NAMES)
    window = cell(ruleset, "B", "B", "U_product")
    assert (window.cell, window.alternatives[0][0].text) == ("Uw = 1,3", "1.3")
    assert window.when[0].words == ("new",)
    assert cell(ruleset, "B", "B", "U_assembly").alternatives[0][0].number == 0.24


# -------------------------------------------------------------------------------- folding


def test_an_amendment_replaces_its_cells_and_names_itself() -> None:
    ruleset = shipped("quillhaven-2025-3")
    roof = cell(
        ruleset, "V3 and V2w", "roof.above_deck", "U_assembly", space_category="conditioned"
    )
    assert (roof.cell, roof.ruleset) == ("0.030", "quillhaven-2025-3")
    assert roof.clause == "Amendment 3 to Table 1"
    assert roof.replaced == "0.033 (merrow-2025, Table 1)"
    assert cell(ruleset, "V4", "roof.above_deck", "U_assembly").cell == "0.029"
    assert [(e.id, e.in_force) for e in ruleset.chain] == [
        ("merrow-2025", True), ("quillhaven-2025-3", True),
    ]  # fmt: skip
    assert len(ruleset.limits) == len(shipped("merrow-2025").limits)


@pytest.mark.parametrize(
    ("on", "cell_then", "in_force"),
    [
        (date(2024, 12, 31), "0.033", [False, False]),
        (date(2025, 6, 30), "0.033", [True, False]),
        (date(2025, 7, 1), "0.030", [True, True]),
        (None, "0.030", [True, True]),
    ],
)
def test_the_date_decides_what_is_in_force(
    on: date | None, cell_then: str, in_force: list[bool]
) -> None:
    ruleset = shipped("quillhaven-2025-3", on)
    assert [e.in_force for e in ruleset.chain] == in_force
    roof = cell(
        ruleset, "V3 and V2w", "roof.above_deck", "U_assembly", space_category="conditioned"
    )
    assert roof.cell == cell_then


def test_an_amendment_that_is_not_in_force_yet_may_declare_its_own_dimension(
    tmp_path: Path,
) -> None:
    for name in ("merrow-2025", "quillhaven-2025-3"):
        shutil.copytree(SHIPPED / name, tmp_path / name)
    path = tmp_path / "quillhaven-2025-3" / "ruleset.yaml"
    text = path.read_text()
    old = "tables:\n  - {id: T1, "
    assert old in text
    dimension = "dimensions:\n  use: {values: [office, home], meaning: use of the building}\n"
    path.write_text(text.replace(old, f"{dimension}{old}when: {{use: office}}, ", 1))
    for on, kinds in ((date(2025, 6, 30), []), (date(2025, 7, 1), ["office"])):
        ruleset = read_ruleset("quillhaven-2025-3", [tmp_path], on, NAMES)
        own = [x for x in ruleset.limits if x.ruleset == "quillhaven-2025-3"]
        words = {w for x in own for c in x.when if c.dimension == "use" for w in c.words}
        assert sorted(words) == kinds


def test_what_lies_beside_a_rule_set_and_cannot_be_read_is_left_alone(tmp_path: Path) -> None:
    shutil.copytree(SHIPPED / "merrow-2025", tmp_path / "merrow-2025")
    (tmp_path / "merrow-2025" / "old.csv").symlink_to("nowhere")
    (tmp_path / "merrow-2025" / "folder.csv").mkdir()
    assert read_ruleset("merrow-2025", [tmp_path], DAY, NAMES).limits


def test_the_last_day_is_not_in_force(tmp_path: Path) -> None:
    shutil.copytree(CASES / "example-2024", tmp_path / "example-2024")
    path = tmp_path / "example-2024" / "ruleset.yaml"
    path.write_text(path.read_text().replace("until: null", "until: 2026-03-02"))
    read = [read_ruleset("example-2024", [tmp_path], d, NAMES) for d in (DAY, date(2026, 3, 1))]
    assert [r.chain[0].in_force for r in read] == [False, True]


def test_the_hash_follows_every_byte(tmp_path: Path) -> None:
    shutil.copytree(CASES / "example-2024", tmp_path / "example-2024")
    before = read_ruleset("example-2024", [tmp_path], DAY, NAMES).chain[0].sha256
    sheet = tmp_path / "example-2024" / "opaque.csv"
    sheet.write_text(sheet.read_text().replace("0.030", "0.031"))
    after = read_ruleset("example-2024", [tmp_path], DAY, NAMES).chain[0].sha256
    assert before != after and len(before) == 64


# ------------------------------------------------------------------------ what is around


def test_the_shipped_sets_say_that_they_are_invented() -> None:
    for name in ("merrow-2025", "quillhaven-2025-3", "brannvik-2025"):
        ruleset = shipped(name)
        assert ruleset.invented and ruleset.status == "example"
        assert "invented" in ruleset.jurisdiction


def test_conventions_of_the_county() -> None:
    found = shipped("quillhaven-2025-3").conventions
    films = {(f.side, f.adjoins, f.direction): f.resistance for f in found.films}
    # 0.17, 0.46, 0.61, 0.68, 0.92 h ft2 F/Btu: air films of ANSI/ASHRAE/IES 90.1 A9.4.1
    assert films["outside", "outdoors", "*"] == pytest.approx(0.17 * R_IP, rel=1e-9)
    assert films["outside", "vented_attic", "*"] == pytest.approx(0.46 * R_IP, rel=1e-9)
    assert films["outside", "semiheated", "*"] == pytest.approx(0.46 * R_IP, rel=1e-9)
    assert [films["inside", "*", d] for d in ("up", "horizontal", "down")] == pytest.approx(
        [0.61 * R_IP, 0.68 * R_IP, 0.92 * R_IP], rel=1e-9
    )
    row = found.tables["cavity_factors"][0]
    assert row.value == 0.46 and "from memory" in row.source
    assert row.keys["spacing"] == pytest.approx(0.4064) and row.keys["depth"] == 3.625 * 0.0254
    slab = next(r for r in found.tables["f_factors"] if r.keys["position"] == "vertical")
    assert slab.value == pytest.approx(0.54 * 1.730735, rel=1e-6)
    assert slab.keys["heated"] == "no"
    test, light = found.class_tests
    assert (light.category, light.otherwise) == ("fenestration.*", "wall.steel_frame")
    assert test.at_least == pytest.approx(6 * 1055.05585262 / (0.09290304 * 5 / 9), rel=1e-9)
    assert (test.counted, test.clause) == ("indoor_of_continuous_insulation", "2.4")
    assert found.tapered_mean_within == pytest.approx(0.0254)
    assert (found.cladding, found.fasteners, found.crossed_insulation) == (
        "film_stays", "ignored", "zero",
    )  # fmt: skip
    assert found.where["films"] == "Table 6 of merrow-2025"
    assert found.where["methods"] == "Table 5 of merrow-2025"
    assert found.where["air_spaces"] == "default of envcheck"


def test_conventions_of_the_municipality() -> None:
    found = shipped("brannvik-2025").conventions
    rule = next(m for m in found.methods if m.category == "wall.*")
    assert (rule.method, rule.weight) == ("weighted", 0.5)
    assert found.film_set == "iso6946" and found.dimensions_measured == "inside"
    # ISO 6946: Rsi 0.13 for horizontal heat flow, Rse 0.04
    films = {(f.side, f.adjoins, f.direction): f.resistance for f in found.films}
    assert films["inside", "*", "horizontal"] == 0.13
    assert films["outside", "outdoors", "*"] == 0.04


def test_built_in_handbook_air_spaces(tmp_path: Path) -> None:
    shutil.copytree(CASES / "example-2024", tmp_path / "example-2024")
    path = tmp_path / "example-2024" / "ruleset.yaml"
    path.write_text(path.read_text() + "conventions: {air_spaces: handbook, films: handbook}\n")
    found = read_ruleset("example-2024", [tmp_path], DAY, NAMES).conventions
    rows = found.tables["air_spaces"]
    assert found.air_spaces == "table" and len(rows) > 50
    assert {r.keys["direction"] for r in rows} == {"up", "horizontal", "down"}
    assert found.film_set == "handbook"


def test_caps_means_trigger_and_exceptions() -> None:
    county, town = shipped("merrow-2025"), shipped("brannvik-2025")
    caps = {cap.of: (cap.most, cap.clause) for cap in county.area_limits}
    assert caps == {
        "window_wall_ratio": (0.30, "Table 3"), "skylight_roof_ratio": (0.04, "Table 3"),
    }  # fmt: skip
    (mean,) = county.averaging
    assert (mean.clause, mean.individual_cap, mean.cap_exempt) == ("4.1", 1.25, "roof.hatch")
    assert mean.cap_exempt_area == pytest.approx(20 * 0.09290304)
    assert county.exceptions[0].clause == "7.2" and county.trigger is None
    assert town.trigger is not None and town.trigger.share == 0.25
    assert (town.compare, county.compare) == ("rounded_2dp", "rounded_to_printed_decimals")
    offered = county.tradeoff
    assert offered is not None and offered.taken and offered.clause == "4.5"
    assert (offered.terms, offered.per) == (("U_A", "C_A", "F_P"), "space_category")
    assert (offered.classes, offered.charges) == (("conditioned",), False)


def test_degree_day_bounds_are_si() -> None:
    zones = shipped("merrow-2025").zones
    third = zones.bounds["hdd65"]["V3 and V2w"]
    assert third.low == pytest.approx(4200 * 5 / 9) and third.low_closed
    assert third.high == pytest.approx(6500 * 5 / 9) and not third.high_closed
    assert third.text == "[4200,6500)"


def test_remarks_say_what_is_not_judged(tmp_path: Path) -> None:
    shutil.copytree(CASES / "example-2024", tmp_path / "example-2024")
    path = tmp_path / "example-2024" / "ruleset.yaml"
    path.write_text(
        path.read_text().replace("clause: Table 1\n", "clause: Table 1\n    status: guidance\n")
        + 'point_limits: [{clause: "9.9", max: "0.35"}]\n'
    )
    ruleset = read_ruleset("example-2024", [tmp_path], DAY, NAMES)
    assert {x.table for x in ruleset.limits} == {"T2"}
    said = "\n".join(ruleset.remarks)
    assert "Table 1 is guidance" in said and "9.9" in said and "area-weighted mean" in said


@pytest.mark.parametrize("folder", sorted(SHIPPED.iterdir()), ids=lambda f: f.name)
def test_shipped_files_fit_the_schema_as_an_editor_reads_them(folder: Path) -> None:
    schema = json.loads(schema_text("rules"))
    Draft202012Validator.check_schema(schema)
    data, problems = read_yaml((folder / "ruleset.yaml").read_bytes(), "ruleset.yaml")
    assert not problems
    errors = list(Draft202012Validator(schema).iter_errors(data))
    assert not errors, errors[0].message


def test_every_key_of_the_schema_is_described() -> None:
    schema = json.loads(schema_text("rules"))
    for name, key in schema["properties"].items():
        assert key.get("description") or name in ("jurisdiction",), name
