"""The YAML reader against PyYAML, and what it refuses."""

from __future__ import annotations

import pytest
import yaml
from hypothesis import given
from hypothesis import strategies as st

from envcheck.read import yaml_reader
from envcheck.read.yaml_reader import Entries, Entry, line_of, read_yaml

TEXT = """\
# comment
a: 1
b:
  - x
  - {c: 2.5, d: [true, null]}
e: |
  two
  lines
f: 'quoted: text'
"""


@pytest.fixture(params=["CSafeLoader", "SafeLoader"])
def loader(request: pytest.FixtureRequest, monkeypatch: pytest.MonkeyPatch) -> None:
    """Run with libyaml and with the pure Python scanner."""
    monkeypatch.setattr(yaml_reader, "_Loader", getattr(yaml, request.param))


@pytest.mark.usefixtures("loader")
def test_data_and_lines() -> None:
    data, problems = read_yaml(TEXT.encode(), "p.yaml")
    assert problems == []
    assert data == yaml.safe_load(TEXT)
    assert isinstance(data, Entry) and isinstance(data["b"], Entries)
    assert data.lines == {"a": 2, "b": 3, "e": 6, "f": 9}
    assert line_of(data, ("b", 1, "d", 1)) == 5
    assert line_of(data, ("b", 7, "nowhere")) == 3
    assert line_of(data, ("b", 1, "c")) == 5


LEAVES = st.one_of(
    st.booleans(),
    st.none(),
    st.integers(-(10**12), 10**12),
    st.floats(-1e12, 1e12).filter(lambda x: x == 0 or abs(x) > 1e-12),
    # PyYAML leaves text such as 0E0 unquoted, which is a number in YAML 1.2.
    st.text(
        st.characters(codec="utf-8", categories=["L", "N", "P", "S", "Zs"]), max_size=12
    ).filter(lambda text: not text[:1] or text[0] not in "+-.0123456789"),
)
TREES = st.dictionaries(
    st.text(st.characters(categories=["L", "N"]), min_size=1, max_size=6),
    st.recursive(
        LEAVES,
        lambda inner: st.one_of(
            st.lists(inner, max_size=4),
            st.dictionaries(
                st.text(st.characters(categories=["L"]), min_size=1), inner, max_size=4
            ),
        ),
        max_leaves=12,
    ),
    min_size=1,
    max_size=4,
)


@given(TREES, st.booleans())
def test_what_pyyaml_writes_reads_back(tree: dict[str, object], flow: bool) -> None:
    text = yaml.safe_dump(tree, allow_unicode=True, default_flow_style=flow)
    data, problems = read_yaml(text.encode(), "p.yaml")
    assert problems == []
    assert data == tree


@given(st.binary(max_size=200))
def test_any_bytes_end_in_data_or_problems(raw: bytes) -> None:
    data, problems = read_yaml(raw, "p.yaml")
    assert data is not None or problems


@given(st.text(st.sampled_from("ab:-[]{},&*!|>'\"#%@`?\t\n 0.~<"), max_size=60))
def test_any_text_ends_in_data_or_problems(text: str) -> None:
    data, problems = read_yaml(text.encode(), "p.yaml")
    assert data is not None or problems


@pytest.mark.parametrize(
    ("text", "value"),
    [
        # YAML 1.2 core schema (yaml.org/spec/1.2.2, section 10.3), narrowed to decimal numbers
        ("true", True),
        ("null", None),
        ("~", None),
        ("", None),
        ("12", 12),
        ("-1.5", -1.5),
        ("1e3", 1000.0),
        (".5", 0.5),
        ("0.25", 0.25),
        # text, where YAML 1.1 would see something else
        ("yes", "yes"),
        ("No", "No"),
        ("True", "True"),
        ("12:30", "12:30"),
        ("2026-03-02", "2026-03-02"),
        ("0x1F", "0x1F"),
        ("1_000", "1_000"),
        ("R-13", "R-13"),
        ("3/4 in", "3/4 in"),
        ("'12'", "12"),
        ('"true"', "true"),
    ],
)
def test_scalars(text: str, value: object) -> None:
    data, problems = read_yaml(f"k: {text}".encode(), "p.yaml")
    assert problems == []
    assert data is not None
    assert data["k"] == value and type(data["k"]) is type(value)


def test_text_only_keeps_every_scalar_as_typed() -> None:
    text = "a: 1\nb: [007, true, .nan, '', 0.060]\nc:\nd: null\n"
    data, problems = read_yaml(text.encode(), "r.yaml", text_only=True)
    assert problems == []
    assert data == {"a": "1", "b": ["007", "true", ".nan", "", "0.060"], "c": None, "d": "null"}


@pytest.mark.usefixtures("loader")
@pytest.mark.parametrize(
    ("text", "kind", "line"),
    [
        ("a: 1\na: 2", "duplicate-key", 2),
        ("a: &x 1", "yaml-anchor", 1),
        ("b: 1\na: *x", "yaml-alias", 2),
        ("a: !!int '1'", "yaml-tag", 1),
        ("a: !own 1", "yaml-tag", 1),
        ("<<: {b: 1}\na: 2", "merge-key", 1),
        ("a: 1\n---\nb: 2", "second-document", 2),
        ("? [a]\n: b", "key-not-text", 1),
        ("a:\n  ? {b: c}\n  : d", "key-not-text", 2),
        ("a: .inf", "not-finite", 1),
        ("a: -.INF", "not-finite", 1),
        ("a: 1e999", "number-too-large", 1),
        ("a: 010", "leading-zero", 1),
        ("- a", "root-not-mapping", 1),
        ("a: [", "yaml-syntax", None),
        ("a: b: c", "yaml-syntax", 1),
        ('a: "\\x07"', "control-character", 1),
        ("# only\n", "empty-file", None),
        ("a: " + "[" * 60 + "]" * 60, "too-deep", 1),
    ],
)
def test_refusals(text: str, kind: str, line: int | None) -> None:
    _, problems = read_yaml(text.encode(), "p.yaml")
    assert kind in {p.kind.id for p in problems}
    found = next(p for p in problems if p.kind.id == kind)
    if line is not None or kind == "empty-file":
        assert found.line == line


def test_reading_goes_on_after_what_can_be_mended() -> None:
    _, problems = read_yaml(b"a: 1\na: 2\nb: 007\nc: &x 3\nd: .nan\n", "p.yaml")
    assert [(p.kind.id, p.line) for p in problems] == [
        ("duplicate-key", 2),
        ("leading-zero", 3),
        ("yaml-anchor", 4),
        ("not-finite", 5),
    ]


def test_byte_order_mark_and_line_ends() -> None:
    data, problems = read_yaml(b"\xef\xbb\xbfa: 1\r\nb: 2\r\n", "p.yaml")
    assert (data, problems) == ({"a": 1, "b": 2}, [])
    assert data is not None and data.lines == {"a": 1, "b": 2}
