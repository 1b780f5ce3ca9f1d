"""The HTML page: inert, without script or network, the same figures, and ladders to scale."""

from __future__ import annotations

import re
from dataclasses import replace
from html.parser import HTMLParser
from xml.etree import ElementTree as Xml

import pytest
from hypothesis import given
from hypothesis import strategies as st

from envcheck.report import drawing, main_table, registry, view
from envcheck.report.formats.html import css_text
from envcheck.report.ladder import Ladder, Rung, Strip, Tick
from envcheck.report.view import ViewOptions
from tests.report.fixture import JUDGED, PROJECT, RULESETS

NASTY = '</style><script>alert(1)</script>"; } body { display: none } <img src=x onerror=y> =1+1'


class Read(HTMLParser):
    """Tags with their attributes, and the text of cells by row."""

    def __init__(self, page: str) -> None:
        super().__init__()
        self.tags: list[tuple[str, dict[str, str | None]]] = []
        self.rows: list[list[str]] = []
        self.text: list[str] = []
        self.in_cell = False
        self.feed(page)

    def handle_starttag(self, tag: str, attrs: list[tuple[str, str | None]]) -> None:
        self.tags.append((tag, dict(attrs)))
        if tag == "tr":
            self.rows.append([])
        if tag in ("td", "th"):
            self.rows[-1].append("")
            self.in_cell = True

    def handle_endtag(self, tag: str) -> None:
        if tag in ("td", "th"):
            self.in_cell = False

    def handle_data(self, data: str) -> None:
        self.text.append(data)
        if self.in_cell:
            self.rows[-1][-1] += data


def built(project: object = PROJECT, **options: object) -> view.View:
    asked = ViewOptions(**{"details": True, "workings": True, **options})
    return view.build(project, RULESETS, JUDGED, asked)


def page(**options: object) -> str:
    return registry.format_named("html").render(built(**options))


def test_it_is_built_with_details_and_workings() -> None:
    form = registry.format_named("html")
    assert form.details and form.workings


def test_the_first_page_holds_what_must_be_decided() -> None:
    """The sentence that counts, the lines over or open, the open items; then all the rest."""
    made, text = built(), page()
    places = [
        text.index(words)
        for words in (
            made.summary.split(".")[0],
            "Lines over their limit, and open lines",
            "Open items",
            ">Lines<",
            "Corrections asked for",
            "How it was judged",
        )
    ]
    assert places == sorted(places)


@pytest.mark.parametrize("units", ["SI", "IP"])
def test_every_row_of_the_tables_stands_on_the_page(units: str) -> None:
    """Each line with its figures, and every list to tick off, cell by cell."""
    rows = {tuple(row) for row in Read(page(units=units)).rows}
    made = built(units=units)
    wanted = [
        row
        for rules in made.rule_sets
        for row in main_table.grid(
            [r for r in made.rows if r.rule_set == rules.id], bool(rules.printed_units), made.bounds
        ).rows
    ]
    wanted += [row for each in made.schedules for row in each.grid.rows]
    assert len(wanted) > len(made.rows)
    for row in wanted:
        assert tuple(row) in rows


def test_no_script_no_address_no_handler() -> None:
    read = Read(page())
    names = {tag for tag, _ in read.tags}
    assert not names & {"script", "img", "iframe", "object", "embed", "form", "video"}
    for tag, attributes in read.tags:
        assert not any(name.startswith("on") for name in attributes), tag
        for name in ("href", "src"):
            assert (attributes.get(name) or "#").startswith(("#", "data:,")), attributes
    assert (
        "meta",
        {
            "http-equiv": "Content-Security-Policy",
            "content": "default-src 'none'; style-src 'unsafe-inline'; img-src data:",
        },
    ) in read.tags


def test_words_of_a_user_are_inert() -> None:
    """A title with markup, quotes and braces neither opens a tag nor ends the style."""
    project = replace(PROJECT, title=NASTY)
    text = registry.format_named("html").render(built(project))
    read = Read(text)
    assert "script" not in {tag for tag, _ in read.tags}
    assert NASTY in "".join(read.text)
    style = text[text.index("<style>") : text.index("</style>")]
    assert "display: none }" not in style and "alert" in style


@given(st.text())
def test_a_text_in_the_style_cannot_end_its_string(text: str) -> None:
    written = str(css_text(text))
    assert re.fullmatch(r'"(?:[\w .,:()-]|\\[0-9a-f]{6})*"', written, re.ASCII)
    read_back = re.sub(r"\\([0-9a-f]{6})", lambda m: chr(int(m[1], 16)), written[1:-1])
    assert read_back == text


def test_tables_say_what_their_heads_are() -> None:
    read = Read(page())
    heads = [attributes.get("scope") for tag, attributes in read.tags if tag == "th"]
    assert heads and set(heads) == {"col", "row"}
    tags = [tag for tag, _ in read.tags]
    assert tags.count("table") == tags.count("caption") > 5
    assert tags.count("h1") == tags.count("main") == 1
    assert dict(read.tags)["html"]["lang"] == "en"


def test_the_same_view_gives_the_same_bytes() -> None:
    assert page() == page()


# ------------------------------------------------------------------------------------ ladders


def strip(*lengths: float) -> Strip:
    rungs = tuple(Rung(f"piece {n}", x, f"{x:g}", f"{n} %") for n, x in enumerate(lengths))
    return Strip("path", "75 %", sum(lengths), f"{sum(lengths):g}", rungs)


LADDER = Ladder(
    (strip(0.17, 7.5, 0.0, 5.98, 0.68), strip(0.17, 4.4, 0.68), Strip("whole", "", 12.0, "12", ())),
    (Tick(16.0, "limit U 0.0625: R 16"),),
    "h ft2 F/Btu",
    "0 %",
    "shares",
)


def drawn(each: Ladder) -> Xml.Element:
    return Xml.fromstring(
        drawing.ladder(each, "x").replace(' xmlns="http://www.w3.org/2000/svg"', "")
    )


def test_pieces_are_as_long_as_their_resistance() -> None:
    """All strips, the whole and the limit share one ruler; a piece without R is not drawn."""
    svg = drawn(LADDER)
    bars = [r for r in svg.iter("rect") if r.get("height") == f"{drawing.BAR:g}"]
    widths = [float(r.get("width", "")) for r in bars]
    scale = (drawing.WIDTH - drawing.LEFT - drawing.RIGHT) / 16.0
    lengths = [0.17, 7.5, 5.98, 0.68, 0.17, 4.4, 0.68, 12.0]
    assert widths == pytest.approx([x * scale for x in lengths], abs=0.006)
    limit = next(p.get("d", "") for p in svg.iter("path") if p.get("stroke-dasharray"))
    assert float(limit[1:].split()[0]) == pytest.approx(drawing.LEFT + 16.0 * scale, abs=0.006)


def test_every_rung_carries_its_figure_and_the_picture_its_words() -> None:
    svg = drawn(LADDER)
    texts = [t.text for t in svg.iter("text")]
    for words in (
        "0 %",
        "1 %",
        "3 %",
        "4 %",
        "limit U 0.0625: R 16",
        "path, 75 % of the area: R 14.33",
    ):
        assert words in texts
    assert "2 %" in texts and "whole: R 12" in texts
    spoken = svg.get("aria-label", "")
    assert spoken == (
        "Resistance ladder, R in h ft2 F/Btu: path (75 % of the area): R 14.33; "
        "path (75 % of the area): R 5.25; whole: R 12; limit U 0.0625: R 16"
    )


@given(st.lists(st.tuples(st.floats(0, drawing.WIDTH), st.floats(10, 50)), min_size=1, max_size=12))
def test_texts_are_spread_without_touching(pairs: list[tuple[float, float]]) -> None:
    """In order, never overlapping, within the drawing, and unmoved where nothing touches."""
    places = sorted(at for at, _ in pairs)
    widths = [wide for _, wide in pairs]
    found = drawing.spread(places, widths)
    for n in range(1, len(found)):
        assert found[n] - found[n - 1] >= (widths[n] + widths[n - 1]) / 2 - 1e-6
    if sum(widths) <= drawing.WIDTH:
        assert found[0] >= widths[0] / 2 - 1e-6
        assert found[-1] <= drawing.WIDTH - widths[-1] / 2 + 1e-6


def test_texts_that_have_room_stay_where_they_are() -> None:
    assert drawing.spread([50.0, 150.0, 400.0], [40.0] * 3) == [50.0, 150.0, 400.0]
    assert drawing.spread([100.0, 110.0, 300.0], [40.0] * 3) == [85.0, 125.0, 300.0]


def test_the_ruler_has_round_steps() -> None:
    assert [drawing.nice(x) for x in (0.9, 1.0, 1.2, 3.0, 0.06, 7.0)] == [1, 1, 2, 5, 0.1, 10]
