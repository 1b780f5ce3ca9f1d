"""The HTML page in a real browser: figures, silence, paper, small screens, screen readers.

Chromium is driven through selenium; accessibility is checked by axe-core from the npm registry,
whose file the variable AXE names.
"""

from __future__ import annotations

import base64
import io
import json
import os
from collections.abc import Iterator
from pathlib import Path

import pytest
from pypdf import PdfReader
from selenium import webdriver
from selenium.webdriver.chrome.service import Service
from selenium.webdriver.common.by import By

from envcheck.__main__ import main

ROOT = Path(__file__).parents[2]
PROJECTS = {
    "review": ROOT / "projects/quillhaven-library/review.yaml",
    "permit": ROOT / "projects/quillhaven-library/permit.yaml",
    "renovation": ROOT / "projects/brannvik-warehouse/renovation.yaml",
}
FLAGS = (
    "--headless", "--no-sandbox", "--disable-gpu", "--disable-quic", "--no-first-run",
    "--disable-background-networking", "--disable-component-update", "--disable-sync",
)  # fmt: skip
NASTY = """'</title></style><script>window.bad = 1</script><img src=x onerror="window.bad = 2">'"""


@pytest.fixture(scope="module")
def browser() -> Iterator[webdriver.Chrome]:
    options = webdriver.ChromeOptions()
    options.binary_location = "/usr/bin/chromium"
    for flag in FLAGS:
        options.add_argument(flag)
    options.set_capability("goog:loggingPrefs", {"browser": "ALL", "performance": "ALL"})
    driver = webdriver.Chrome(options, Service("/usr/bin/chromedriver"))
    driver.set_window_size(1200, 900)
    yield driver
    driver.quit()


def written(project: Path, form: str, folder: Path) -> Path:
    target = folder / f"{project.stem}.{form}"
    main(["check", str(project), "--format", form, "--output", str(target)])
    return target


def opened(browser: webdriver.Chrome, page: Path) -> None:
    for kind in ("browser", "performance"):
        browser.get_log(kind)
    browser.get(page.as_uri())


@pytest.mark.parametrize("name", PROJECTS)
def test_the_page_shows_the_figures_of_the_json(
    browser: webdriver.Chrome, name: str, tmp_path: Path
) -> None:
    report = json.loads(written(PROJECTS[name], "json", tmp_path).read_text("utf-8"))
    opened(browser, written(PROJECTS[name], "html", tmp_path))
    text = browser.find_element(By.TAG_NAME, "main").text
    assert report["summary"] in text
    shown = browser.execute_script(
        "return [...document.querySelectorAll('tbody tr')]"
        ".map(r => [...r.cells].map(c => c.innerText.trim()))"
    )
    cells = {tuple(row) for row in shown}
    for row in report["rows"]:
        of_tag = [found for found in cells if found[0] == row["tag"]]
        assert any(
            row["verdict_text"] in found
            and f"{row['symbol']} {row['value']['text'] or '-'}" in found
            for found in of_tag
        ), row["tag"]
    assert browser.find_elements(By.CSS_SELECTOR, "svg.ladder[role=img][aria-label]")


@pytest.mark.parametrize("name", PROJECTS)
def test_it_asks_nobody_and_says_nothing_to_the_console(
    browser: webdriver.Chrome, name: str, tmp_path: Path
) -> None:
    page = written(PROJECTS[name], "html", tmp_path)
    opened(browser, page)
    assert browser.get_log("browser") == []
    events = [json.loads(each["message"])["message"] for each in browser.get_log("performance")]
    asked = [
        event["params"]["request"]["url"]
        for event in events
        if event["method"] == "Network.requestWillBeSent"
    ]
    assert [url for url in asked if not url.startswith("data:")] == [page.as_uri()]


@pytest.mark.parametrize("name", PROJECTS)
def test_it_reads_on_a_small_screen(browser: webdriver.Chrome, name: str, tmp_path: Path) -> None:
    """Nothing but a drawing is wider than 360 px, and small print stays legible."""
    browser.execute_cdp_cmd(
        "Emulation.setDeviceMetricsOverride",
        {"width": 360, "height": 640, "deviceScaleFactor": 1, "mobile": True},
    )
    try:
        opened(browser, written(PROJECTS[name], "html", tmp_path))
        assert browser.execute_script("return document.documentElement.scrollWidth") <= 360
        least = browser.execute_script(
            "return Math.min(...[...document.querySelectorAll('p,td,li,dd')]"
            ".map(e => parseFloat(getComputedStyle(e).fontSize)))"
        )
        assert least >= 11
    finally:
        browser.execute_cdp_cmd("Emulation.clearDeviceMetricsOverride", {})


@pytest.mark.parametrize(("paper", "width", "height"), [("a4", 8.27, 11.69), ("letter", 8.5, 11)])
def test_it_prints_with_title_date_hash_and_page_on_every_sheet(
    browser: webdriver.Chrome, paper: str, width: float, height: float, tmp_path: Path
) -> None:
    opened(browser, written(PROJECTS["permit"], "html", tmp_path))
    printed = browser.execute_cdp_cmd(
        "Page.printToPDF", {"paperWidth": width, "paperHeight": height, "preferCSSPageSize": False}
    )
    pages = PdfReader(io.BytesIO(base64.b64decode(printed["data"]))).pages
    assert 10 < len(pages) < 60
    for number, page in enumerate(pages, 1):
        text = page.extract_text()
        for words in ("Quillhaven Public Library", "report date 2026-", "sha256 "):
            assert words in text, (paper, number)
        assert f"page {number} of {len(pages)}" in " ".join(text.split())
    first = pages[0].extract_text()
    assert "Lines over their limit" in first and "lines: 0 over their limit, 0 open" in first


def test_injected_words_stay_words(browser: webdriver.Chrome, tmp_path: Path) -> None:
    source = PROJECTS["permit"].read_text("utf-8")
    title = "title: Quillhaven Public Library"
    assert source.count(title) == 1
    project = tmp_path / "nasty.yaml"
    project.write_text(source.replace(title, f"title: {NASTY}"), encoding="utf-8")
    target = tmp_path / "nasty.html"
    rules = str(ROOT / "rules")
    main(["check", str(project), "--rules", rules, "--format", "html", "--output", str(target)])
    opened(browser, target)
    assert browser.execute_script("return window.bad") is None
    assert browser.find_element(By.TAG_NAME, "h1").text.startswith(NASTY.strip("'"))
    assert browser.get_log("browser") == []


@pytest.mark.parametrize("name", PROJECTS)
def test_an_automated_accessibility_check_finds_nothing(
    browser: webdriver.Chrome, name: str, tmp_path: Path
) -> None:
    """The content policy forbids scripts, so that the checker runs through the debugger."""
    browser.execute_cdp_cmd("Page.setBypassCSP", {"enabled": True})
    opened(browser, written(PROJECTS[name], "html", tmp_path))
    browser.execute_script(Path(os.environ["AXE"]).read_text("utf-8"))
    found = browser.execute_async_script(
        "const done = arguments[arguments.length - 1]; axe.run(document).then(r => done(r))"
    )
    assert len(found["passes"]) > 10
    assert [(v["id"], v["nodes"][0]["html"][:200]) for v in found["violations"]] == []


@pytest.mark.parametrize("name", PROJECTS)
def test_the_pdf_holds_the_figures_of_the_json(name: str, tmp_path: Path) -> None:
    report = json.loads(written(PROJECTS[name], "json", tmp_path).read_text("utf-8"))
    pages = PdfReader(written(PROJECTS[name], "pdf", tmp_path)).pages
    text = " ".join(" ".join(page.extract_text() for page in pages).split())
    assert report["summary"] in text
    for row in report["rows"]:
        assert row["tag"] in text and (row["value"]["text"] or "-") in text
