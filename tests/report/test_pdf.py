"""The PDF: words stay data, the same bytes each time; its text is read back in tests/e2e."""

from __future__ import annotations

import json
import re
import sys

import pytest

from envcheck.report import desk, registry, view
from envcheck.report.formats import pdf
from envcheck.report.registry import MissingExtra
from envcheck.report.view import ViewOptions
from tests.changed import changed
from tests.report.fixture import JUDGED, PROJECT, RULESETS

MARKUP = '#read("/etc/passwd") *bold* _low_ $x^2$ @ref <tag> = head \\ "'


def made(project: object = PROJECT, units: str = "IP") -> view.View:
    asked = ViewOptions(details=True, workings=True, units=units)
    return view.build(project, RULESETS, JUDGED, asked)


def written(**options: object) -> bytes:
    found = registry.format_named("pdf").render(made(**options))
    assert isinstance(found, bytes)
    return found


def test_it_is_tagged_and_the_same_bytes_come_twice() -> None:
    first = written()
    assert first.startswith(b"%PDF-")
    assert re.search(rb"/Marked true", first) and b"/StructTreeRoot" in first
    assert first == written()


@pytest.mark.parametrize(("units", "box"), [("IP", b"612 792"), ("SI", b"595.27")])
def test_paper_follows_the_units(units: str, box: bytes) -> None:
    assert re.search(rb"/MediaBox ?\[0 0 " + box, written(units=units))


def test_words_of_a_user_are_never_markup() -> None:
    """Whatever a title holds reaches the page as data, and the page is set."""
    project = changed(PROJECT, title=MARKUP)
    data = pdf.data(made(project))
    assert MARKUP in str(data["title"])
    assert json.dumps(data)
    assert written(project=project).startswith(b"%PDF-")


def test_the_data_hold_every_block_of_the_desk_page() -> None:
    page, data = desk.page(made()), pdf.data(made())
    sections = data["sections"]
    assert isinstance(sections, list)
    assert [s["heading"] for s in sections] == [s.heading for s in page.sections]
    assert [len(s["blocks"]) for s in sections] == [len(s.blocks) for s in page.sections]


def test_long_words_may_break_and_numbers_do_not() -> None:
    assert pdf.breakable("1 / (0.75 / 23.5141592653) = 31.3522123537") == (
        "1 / (0.75 / 23.5141592653) = 31.3522123537"
    )
    path = "evidence/w7-protection-order-of-the-town.txt"
    assert pdf.breakable(path).replace("\u200b", "") == path
    assert max(map(len, pdf.breakable("x" * 10_000).split("\u200b"))) == 24


def test_without_its_library_the_format_names_the_extra(monkeypatch: pytest.MonkeyPatch) -> None:
    """None among the loaded modules makes an import fail, as Python documents it."""
    monkeypatch.setitem(sys.modules, "typst", None)
    with pytest.raises(MissingExtra) as found:
        written()
    assert (found.value.extra, found.value.library) == ("pdf", "typst")
