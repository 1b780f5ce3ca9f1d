"""The one registry of formats, filled by being in the folder ``formats``.

A format is a module with ``NAME``, ``TITLE``, ``EXTENSION`` and ``render(view)``, which gives text
or the bytes of a file. Where that needs a library of an extra, it raises ``MissingExtra``. It may
have ``DETAILS = True`` (it always lists the assemblies), ``WORKINGS = True`` (with ladder and
worksheet) and ``answer(made, width) -> str`` for what the other commands say.
"""

from __future__ import annotations

from collections.abc import Callable
from functools import cache
from importlib import import_module
from pkgutil import iter_modules
from typing import NamedTuple

from envcheck.report.answer import Answer
from envcheck.report.view import View


class MissingExtra(Exception):
    """A format whose library is not installed: the extra that brings it, the library."""

    def __init__(self, extra: str, library: str) -> None:
        super().__init__(extra, library)
        self.extra = extra
        self.library = library


class Format(NamedTuple):
    """One way to lay a view out."""

    name: str
    title: str
    extension: str
    details: bool
    workings: bool
    render: Callable[[View], str | bytes]
    answer: Callable[[Answer, int], str] | None
    """(what another command says, width) -> text"""


@cache
def names() -> tuple[str, ...]:
    """Names of the formats, without importing any: the file's name is the format's."""
    package = import_module("envcheck.report.formats")
    return tuple(sorted(info.name for info in iter_modules(package.__path__)))


@cache
def answering() -> tuple[str, ...]:
    """Names of the formats that lay out what other commands say."""
    return tuple(name for name in names() if format_named(name).answer is not None)


def format_named(name: str) -> Format:
    """Load one format.

    Errors: KeyError for a name that no file bears.
    """
    if name not in names():
        raise KeyError(name)
    module = import_module(f"envcheck.report.formats.{name}")
    return Format(
        name=module.NAME,
        title=module.TITLE,
        extension=module.EXTENSION,
        details=getattr(module, "DETAILS", False),
        workings=getattr(module, "WORKINGS", False),
        render=module.render,
        answer=getattr(module, "answer", None),
    )
