"""YAML to plain data in one pass over the parser's events; every key keeps its line.

PyYAML scans; this module only builds. What a short reviewed file never needs is refused: aliases
and anchors (bombs), tags, merge keys, a second document, keys that are no text, depth over 50.
Scalars follow YAML 1.2 narrowed down: ``true``, ``false``, ``null``, decimal integers and floats
are typed, all else is text (``yes``, ``12:30``, dates). Going through events costs a fifth of
loading, since no tags are resolved and no node objects are made.
"""

from __future__ import annotations

import re
from functools import lru_cache
from typing import Any

import yaml

from envcheck.errors import Problem, problem
from envcheck.read.yaml_text import (
    MOST_PROBLEMS,
    check_bytes,
    control_characters,
    controls,
    syntax_problem,
)

_Loader: Any = getattr(yaml, "CSafeLoader", yaml.SafeLoader)
DEEPEST = 50


class Entry(dict[str, Any]):
    """A mapping with the line where it starts and the line of each key."""

    __slots__ = ("line", "lines")

    def __init__(self, line: int) -> None:
        self.line = line
        self.lines: dict[str, int] = {}


class Entries(list[Any]):
    """A sequence with the line where it starts and the line of each item."""

    __slots__ = ("line", "lines")

    def __init__(self, line: int) -> None:
        self.line = line
        self.lines: list[int] = []


def line_of(data: Any, path: tuple[str | int, ...]) -> int:
    """Give the line of a key or item; of its nearest parent where the path leads nowhere."""
    line: int = data.line
    for step in path:
        try:
            line = data.lines[step]
            data = data[step]
        except (AttributeError, LookupError, TypeError):
            break
    return line


def read_yaml(
    raw: bytes, file: str, *, text_only: bool = False
) -> tuple[Entry | None, list[Problem]]:
    """Read one document; the data is None where it could not be read to its end.

    With ``text_only`` every scalar stays the text that was typed, but for an empty one, which is
    None as it is without.
    """
    builder = _Builder(file, text_only)
    wrong = check_bytes(raw, file)
    if wrong:
        return None, wrong
    try:
        builder.run(raw)
    except yaml.MarkedYAMLError as error:
        builder.problems.append(syntax_problem(error, file))
    except yaml.reader.ReaderError:
        builder.problems += control_characters(raw.decode("utf-8", "replace"), file)
    except _StopReading:
        pass
    else:
        if isinstance(builder.root, Entry) and not builder.broken:
            return builder.root, builder.problems
        builder.check_root()
    return None, builder.problems


class _StopReading(Exception):
    """Reading on would make no sense."""


_DISCARD = "\0discard"
_COMPLEX = "\0complex"
_START = frozenset("0123456789+-.tfn~")
_NUMBER = re.compile(r"[+-]?(?:[0-9]+(\.[0-9]*)?|(\.[0-9]+))([eE][+-]?[0-9]+)?")
_LEADING_ZERO = re.compile(r"[+-]?0[0-9]+(\.[0-9]*)?")
_NOT_FINITE = re.compile(r"[+-]?\.(?:inf|Inf|INF)|\.(?:nan|NaN|NAN)")
_WORDS = {"true": True, "false": False, "null": None, "~": None}


@lru_cache(maxsize=16384)
def _typed(text: str) -> tuple[Any, str]:
    """Give the value of a plain scalar and the id of its problem, if any."""
    if text in _WORDS:
        return _WORDS[text], ""
    if _LEADING_ZERO.fullmatch(text):
        return text, "leading-zero"
    match = _NUMBER.fullmatch(text)
    if match is None:
        return text, "not-finite" if _NOT_FINITE.fullmatch(text) else ""
    number = float(text)
    if abs(number) > 1e15 or len(text) > 40:
        return text, "number-too-large"
    return (number if match[1] or match[2] or match[3] else int(text)), ""


class _Builder:
    """Puts events together."""

    def __init__(self, file: str, text_only: bool) -> None:
        self.file = file
        self.text_only = text_only
        self.problems: list[Problem] = []
        self.root: Any = None
        self.broken = False
        self.documents = 0
        self.stack: list[tuple[Any, str | None]] = []

    def add(self, kind: str, line: int | None, **fill: Any) -> None:
        self.problems.append(problem(kind, self.file, line, **fill))
        if len(self.problems) >= MOST_PROBLEMS:
            raise _StopReading

    def stop(self, kind: str, line: int | None, **fill: Any) -> None:
        self.add(kind, line, **fill)
        raise _StopReading

    def check_root(self) -> None:
        """Say what stands where a mapping should."""
        if self.root is None:
            self.problems.append(problem("empty-file", self.file, None))
        elif not isinstance(self.root, Entry):
            found = "a list" if isinstance(self.root, Entries) else f"{str(self.root)!r}"
            self.problems.append(problem("root-not-mapping", self.file, 1, found=found))

    # -------------------------------------------------------------------------- events

    def run(self, raw: bytes) -> None:
        """Consume all events of the stream."""
        loader = _Loader(raw)
        try:
            self._consume(loader.get_event)
        finally:
            loader.dispose()

    def _consume(self, get_event: Any) -> None:
        """Build the root from events; one loop, since it runs 10^5 times for a large file."""
        scalar, close = yaml.ScalarEvent, (yaml.MappingEndEvent, yaml.SequenceEndEvent)
        open_ = (yaml.MappingStartEvent, yaml.SequenceStartEvent)
        here: Any = None
        key: Any = None
        while (event := get_event()) is not None:
            kind = event.__class__
            if kind is scalar:
                text = event.value
                plain = not (event.style or event.anchor or event.tag)
                if key is None and here.__class__ is Entry:
                    line = event.start_mark.line + 1
                    if plain and text not in here.lines and text.isprintable() and text != "<<":
                        here.lines[text] = line
                        key = text
                    else:
                        key = self._key(event, here, line)
                    continue
                if plain and text and text[0] not in _START:
                    if key is not None and key is not _DISCARD:
                        here[key], key = text, None
                        continue
                    value, line = text, event.start_mark.line + 1
                else:
                    line = event.start_mark.line + 1
                    value = self._scalar(event, line)
            elif kind in close:
                value, line = here, here.line
                here, key = self.stack.pop()
                if key is _COMPLEX:
                    key = _DISCARD
                    continue
            elif kind in open_:
                here, key = self._open(event, here, key), None
                continue
            elif kind is yaml.AliasEvent:
                line = event.start_mark.line + 1
                key, value = self._alias(event, key, line), None
                if here.__class__ is Entry and key is _COMPLEX:
                    key = _DISCARD
                    continue
            else:
                self._document(event)
                continue
            if here.__class__ is Entry:
                if key is not _DISCARD:
                    here[key] = value
                key = None
            elif here is None:
                self.root = value
            else:
                here.append(value)
                here.lines.append(line)

    def _scalar(self, event: Any, line: int) -> Any:
        text = event.value
        if event.anchor or event.tag:
            self._marked(event, line)
        if event.style:
            if event.style == '"' and not text.isprintable():
                self._escaped(text, line)
            return text
        if not text:
            return None
        if text[0] not in _START or self.text_only:
            return text
        value, wrong = _typed(text)
        if wrong:
            self.add(wrong, line, found=text)
        return value

    def _open(self, event: Any, here: Any, key: str | None) -> Entry | Entries:
        line = event.start_mark.line + 1
        if event.anchor or event.tag:
            self._marked(event, line)
        if here.__class__ is Entry and key is None:
            self.add("key-not-text", line)
            self.broken, key = True, _COMPLEX
        self.stack.append((here, key))
        if len(self.stack) > DEEPEST:
            self.stop("too-deep", line, found=f"more than {DEEPEST} levels")
        return Entry(line) if event.__class__ is yaml.MappingStartEvent else Entries(line)

    def _alias(self, event: Any, key: str | None, line: int) -> str | None:
        self.add("yaml-alias", line, found=f"*{event.anchor}")
        self.broken = True
        return _COMPLEX if key is None else key

    def _key(self, event: Any, here: Entry, line: int) -> str:
        text: str = event.value
        if event.anchor or event.tag:
            self._marked(event, line)
        if not text.isprintable():
            self._escaped(text, line)
        if text in here.lines:
            self.add("duplicate-key", line, key=text, first=here.lines[text])
            return _DISCARD
        if text == "<<" and not event.style:
            self.add("merge-key", line)
            self.broken = True
            return _DISCARD
        here.lines[text] = line
        return text

    def _marked(self, event: Any, line: int) -> None:
        if event.anchor:
            self.add("yaml-anchor", line, found=f"&{event.anchor}")
        if event.tag and event.tag != "!":
            self.add("yaml-tag", line, found=event.tag)

    def _escaped(self, text: str, line: int) -> None:
        match = controls().search(text)
        if match:
            self.add("control-character", line, found=f"U+{ord(match[0]):04X}")

    def _document(self, event: Any) -> None:
        if event.__class__ is yaml.DocumentStartEvent:
            self.documents += 1
            if self.documents > 1:
                mark: Any = event.start_mark
                self.stop("second-document", mark.line + 1)
