"""``check --moisture`` over the renovation: what it computes, withholds, and leaves alone."""

from __future__ import annotations

import json
import re
import shutil
import subprocess
import sys
from functools import cache
from math import exp
from pathlib import Path
from typing import Any

import pytest
from jsonschema import Draft202012Validator

from envcheck import pipeline
from envcheck.report import view
from envcheck.report.moisture import NONE_COMPUTED

WAREHOUSE = Path(__file__).parents[2] / "projects" / "brannvik-warehouse" / "renovation.yaml"
SCHEMA = Path(view.__file__).parent / "schemas" / "report.schema.json"
FAVOURABLE = ("no condensation", "is not below", "none is left by this sum\n", "safe.\n", "dries\n")


@cache
def said(*options: str, project: str = str(WAREHOUSE)) -> tuple[int, str]:
    command = [sys.executable, "-m", "envcheck", "check", project, *options]
    done = subprocess.run(command, capture_output=True, encoding="utf-8", check=False)
    assert done.stderr == ""
    return done.returncode, done.stdout


def sections(text: str) -> dict[str, str]:
    parts = re.split(r"^Moisture, (\w+): .*$", text.split("Assumed\n")[0], flags=re.M)
    return dict(zip(parts[1::2], parts[2::2], strict=True))


def joined(text: str) -> str:
    return " ".join(text.split())


@cache
def data() -> dict[str, Any]:
    found: dict[str, Any] = json.loads(said("--moisture", "--format", "json")[1])
    return found


def test_nothing_else_changes_and_no_verdict_hangs_on_it() -> None:
    plain_status, plain = said()
    status, text = said("--moisture")
    assert status == plain_status == 3
    assert "oisture check" not in plain.split("Cautions")[0]
    start, end = text.index("Moisture check (advisory)"), text.index("\nAssumed\n")
    assert text[:start] + text[end + 1 :] == plain
    assert "moisture" not in json.loads(said("--format", "json")[1])


def test_no_favourable_word_where_it_must_not_judge() -> None:
    found = sections(said("--moisture")[1])
    assert set(found) == {"S1", "S3", "S6", "S7", "S9"}
    for name in ("S1", "S3", "S7"):
        text = joined(found[name]) + "\n"
        assert "no favourable statement is made for this assembly" in text
        assert [words for words in FAVOURABLE if words in text] == [], name
    assert "inside solid or hollow masonry: rain, capillary flow" in joined(found["S1"])
    assert "a timber roof" in joined(found["S3"])
    assert "one thickness for 'PIR'" in joined(found["S6"])
    assert NONE_COMPUTED in joined(found["S9"])
    assert "below its critical temperature factor in Jan, Feb, Nov, Dec" in joined(found["S9"])


def test_the_dormer_condenses_and_is_dry_again_by_hand() -> None:
    """S7 in January: its amounts from the printed climate, as on paper."""
    one = next(each for each in data()["moisture"]["assemblies"] if each["assembly"] == "S7")
    (face,) = one["faces"]
    assert face["title"] == "Outer board / Steel studs with wool"
    assert (face["month"], float(face["left"]["text"])) == ("Mar", 0.0)
    r_out = 0.13 + 0.060 / 0.043 + 0.012 / 0.13
    r_all = r_out + 0.100 / 0.035 + 0.0125 / 0.25 + 0.13
    s_out, s_in = 3 * 0.060 + 50 * 0.012, 1 * 0.100 + 10 * 0.0125
    p_out = 0.87 * 610.5 * exp(21.875 * -2.5 / (265.5 - 2.5))
    t = -2.5 + 22.5 * r_out / r_all
    p = 610.5 * exp(17.269 * t / (237.3 + t))
    gain = 2e-10 * 86400 * 31 * ((p_out + 810 - p) / s_in - (p - p_out) / s_out)
    december, january = (float(face["amounts"][month]["text"]) for month in (11, 0))
    assert january - december == pytest.approx(gain, abs=1e-4)


def test_json_fits_its_schema_and_the_page_carries_its_figures() -> None:
    schema = json.loads(SCHEMA.read_text(encoding="utf-8"))
    assert list(Draft202012Validator(schema).iter_errors(data())) == []
    text = said("--moisture", "--details")[1]
    for one in data()["moisture"]["assemblies"]:
        own = joined(sections(text)[one["assembly"]])
        figures = [one["factor"]] if one["says"] else []
        figures += [amount for face in one["faces"] for amount in face["amounts"]]
        assert [each["text"] for each in figures if each["text"] not in own] == []
        assert [line["result"] for line in one["worksheet"] if line["result"] not in own] == []


@pytest.mark.parametrize("name", ["html", "markdown"])
def test_other_formats_say_the_same(name: str) -> None:
    text = said("--moisture", "--format", name)[1]
    for one in data()["moisture"]["assemblies"]:
        for face in one["faces"]:
            assert all(amount["text"] in text for amount in face["amounts"])
    assert "Advisory, by ISO 13788" in text


def test_the_workbook_has_a_sheet_of_it(tmp_path: Path) -> None:
    import openpyxl

    made = tmp_path / "report.xlsx"
    assert said("--moisture", "--format", "xlsx", "--output", str(made))[0] == 3
    book = openpyxl.load_workbook(made)
    cells = [cell.value for row in book["Moisture"].iter_rows() for cell in row]
    assert "Moisture check (advisory)" in cells
    assert 3.1896 in cells


def test_without_a_climate_each_missing_thing_is_named(tmp_path: Path) -> None:
    text = WAREHOUSE.read_text(encoding="utf-8")
    start, end = text.index("  climate: "), text.index("rule_sets: [")
    (tmp_path / "p.yaml").write_text(text[:start] + text[end:], encoding="utf-8")
    rules = str(WAREHOUSE.parents[2] / "rules")
    shutil.copytree(WAREHOUSE.parent / "evidence", tmp_path / "evidence")
    status, said_ = said("--moisture", "--rules", rules, project=str(tmp_path / "p.yaml"))
    assert status == 3
    words = joined(said_)
    for key in ("climate.temperatures", "climate.humidities", "indoor_air"):
        assert re.search(
            rf"not computed; missing: [^;]*{re.escape(key)}[^;]*\(section site, line \d+\)", words
        )


def test_bad_humidity_is_refused_at_its_line(tmp_path: Path) -> None:
    text = WAREHOUSE.read_text(encoding="utf-8").replace("humidities: [87 %", "humidities: [107 %")
    (tmp_path / "p.yaml").write_text(text, encoding="utf-8")
    with pytest.raises(Exception, match=r"107 %.*at most 100 %"):
        pipeline.run(str(tmp_path / "p.yaml"), (str(WAREHOUSE.parents[2] / "rules"),))
