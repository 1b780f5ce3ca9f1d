"""The text under the YAML: bytes that are no clean UTF-8, and what a scanner stumbled on."""

from __future__ import annotations

import re
from functools import cache
from typing import Any

import yaml

from envcheck.errors import Problem, problem

MOST_PROBLEMS = 50
_TURNING = re.compile(rb"\xe2(?:\x80[\xaa-\xae]|\x81[\xa6-\xa9])")
_NEXT_LINE = b"\xc2\x85"


@cache
def controls() -> re.Pattern[str]:
    """Control characters, and marks that turn the direction of writing; few files need it."""
    return re.compile(
        r"[\x00-\x08\x0b\x0c\x0e-\x1f\x7f-\x9f\u202a-\u202e\u2066-\u2069\ud800-\udfff\ufffe\uffff]"
    )


def check_bytes(raw: bytes, file: str) -> list[Problem]:
    """Say what keeps the bytes from being clean UTF-8 text; empty where nothing does."""
    if raw.startswith((b"\xff\xfe", b"\xfe\xff")) or b"\0" in raw[:4]:
        return [problem("wrong-encoding", file, 1, found="UTF-16 or UTF-32")]
    try:
        text = raw.decode("utf-8")
    except UnicodeDecodeError as error:
        line = raw.count(b"\n", 0, error.start) + 1
        found = f"byte 0x{raw[error.start]:02x}"
        return [problem("wrong-encoding", file, line, found=found)]
    if _TURNING.search(raw) or _NEXT_LINE in raw:
        return control_characters(text, file)
    return []


def control_characters(text: str, file: str) -> list[Problem]:
    """List the lines with control characters, the first ones only."""
    found = []
    for number, line in enumerate(text.split("\n"), 1):
        match = controls().search(line)
        if match:
            character = f"U+{ord(match[0]):04X}"
            found.append(problem("control-character", file, number, found=character))
            if len(found) == MOST_PROBLEMS:
                break
    return found


def syntax_problem(error: yaml.MarkedYAMLError, file: str) -> Problem:
    """Say what the scanner stumbled on, and where what it was in had begun."""
    mark: Any = error.problem_mark or error.context_mark
    start: Any = error.context_mark
    what = str(error.problem or error.context or "no YAML")
    if "nesting" in what:
        return problem("too-deep", file, mark.line + 1, found="more than 50 levels")
    if "quoted scalar" in str(error.context) and start is not None:
        mark = start
    in_flow = "," in what and "expected" in what and start is not None
    opened = f" (opened in line {start.line + 1})" if in_flow else ""
    fix = next((fix for words, fix in _FIXES if words in what), _FIX)
    line = mark.line + 1 if mark is not None else None
    return problem("yaml-syntax", file, line, fix=fix, what=what + opened)


_FIXES = (
    ("tab", "indent with spaces, not tabs"),
    ("cannot start any token", "indent with spaces, not tabs; quote text that starts with @ or `"),
    (
        "mapping values are not allowed",
        "quote text that holds a colon and a space, or indent alike",
    ),
    ("',' or", "close the bracket and put a comma between its items"),
    ("end of stream", "close the quote or bracket that was opened"),
    ("could not find expected ':'", "write 'key: value'; indent all keys of one block alike"),
)
_FIX = "check the indentation, the quotes and the brackets of this line and the one above"
