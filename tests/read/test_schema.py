"""The schema is sound, the quick yes never disagrees with it, and every refusal has words."""

from __future__ import annotations

import copy
import json
from pathlib import Path
from typing import Any

import pytest
import yaml
from hypothesis import given, settings
from hypothesis import strategies as st
from jsonschema import Draft202012Validator

from envcheck.errors import InputError
from envcheck.read.project import project_from_bytes
from envcheck.read.schema import check, schema_text
from envcheck.read.schema_words import where
from envcheck.read.yaml_reader import Entry, read_yaml
from envcheck.units import UNITS
from tests.read.names import NAMES

SCHEMA = json.loads(schema_text("project"))
STOCK = Draft202012Validator(SCHEMA)
SOUND = Path(__file__).parent.parent / "cases" / "sound"
SHED = (SOUND / "shed.yaml").read_bytes()


def shed() -> Entry:
    data, problems = read_yaml(SHED, "shed.yaml")
    assert data is not None and not problems
    return data


def test_schema_is_valid_draft_2020_12() -> None:
    Draft202012Validator.check_schema(SCHEMA)


def walk(node: Any) -> list[dict[str, Any]]:
    found = [node] if isinstance(node, dict) else []
    for inner in (
        node.values() if isinstance(node, dict) else node if isinstance(node, list) else ()
    ):
        found += walk(inner)
    return found


def test_no_choice_between_objects_and_every_quantity_is_known() -> None:
    for node in walk(SCHEMA):
        assert not node.keys() & {"oneOf", "anyOf", "unevaluatedProperties"}
        if "x-quantity" in node:
            assert node["x-quantity"] in UNITS and node["type"] == "string"


def test_every_property_has_a_title_for_editors() -> None:
    for node in walk(SCHEMA):
        for key, sub in (node.get("properties") or {}).items():
            if isinstance(sub, dict) and "const" not in sub and "$ref" not in sub:
                assert sub.get("title"), key


def test_a_sound_project_passes_both() -> None:
    assert check(shed(), "project", "shed.yaml") == []
    assert list(STOCK.iter_errors(shed())) == []


JUNK: list[Any] = [
    None,
    True,
    0,
    -1,
    1.5,
    "",
    "x",
    "x" * 700,
    [],
    ["x"],
    {},
    {"kind": "point"},
    [{}],
]


def places(node: Any, path: tuple[Any, ...] = ()) -> list[tuple[Any, ...]]:
    found = [path] if path else []
    steps = node if isinstance(node, dict) else range(len(node)) if isinstance(node, list) else ()
    for step in steps:
        found += places(node[step], (*path, step))
    return found


TREE = json.loads(json.dumps(shed()))
PLACES = places(TREE)


def spoilt(data: st.DataObject) -> Any:
    """A sound project with one or two places set, dropped or renamed."""
    tree = copy.deepcopy(TREE)
    for _ in range(data.draw(st.integers(1, 2))):
        *parents, last = data.draw(st.sampled_from(PLACES))
        node = tree
        try:
            for step in parents:
                node = node[step]
            act = data.draw(st.sampled_from(["set", "drop", "rename"]))
            if act == "set":
                node[last] = copy.deepcopy(data.draw(st.sampled_from(JUNK)))
            elif act == "drop":
                del node[last]
            else:
                node["kind" if last != "kind" else "knd"] = node.pop(last)
        except (LookupError, TypeError, AttributeError):
            continue
    return tree


@settings(deadline=None)
@given(st.data())
def test_the_quick_yes_never_accepts_what_the_schema_refuses(data: st.DataObject) -> None:
    tree = spoilt(data)
    read, _ = read_yaml(yaml.safe_dump(tree, sort_keys=False).encode(), "p.yaml")
    assert read is not None
    refused = list(STOCK.iter_errors(tree))
    found = check(read, "project", "p.yaml")
    assert bool(found) == bool(refused), [e.message for e in refused]
    for made in found:
        assert made.line and made.fix and "{" not in made.what


@settings(deadline=None)
@given(st.data())
def test_a_spoilt_project_is_read_or_refused_in_words(data: st.DataObject) -> None:
    raw = yaml.safe_dump(spoilt(data), sort_keys=False).encode()
    try:
        project = project_from_bytes(raw, "p.yaml", SOUND, NAMES)
    except InputError as error:
        assert all(made.line and made.fix for made in error.problems)
    else:
        assert project.assemblies


@pytest.mark.parametrize(
    ("path", "words"),
    [
        ((), "the file"),
        (("assemblies", "W1"), "assembly 'W1'"),
        (("assemblies", "W1", "layers", 2), "layer 3 of assembly 'W1'"),
        (("assemblies", "W1", "layers", 2, "member"), "member of layer 3 of assembly 'W1'"),
        (("site", "zones", 0), "zone 1 of site"),
    ],
)
def test_places_in_words(path: tuple[Any, ...], words: str) -> None:
    assert where(path) == words


def test_a_misspelt_key_is_one_problem_not_two() -> None:
    data = shed()
    layer = data["assemblies"]["W1"]["layers"][0]
    layer["thicknes"] = layer.pop("thickness")
    found = check(data, "project", "p.yaml")
    assert [p.kind.id for p in found] == ["unknown-key"]


def test_problems_are_capped() -> None:
    data = shed()
    layer = data["assemblies"]["W1"]["layers"][0]
    layers = data["assemblies"]["W1"]["layers"]
    for _ in range(400):
        bad = Entry(layer.line)
        bad.update(kind="material", material="x", thickness=3)
        layers.append(bad)
        layers.lines.append(layer.line)
    assert len(check(data, "project", "p.yaml")) == 200
