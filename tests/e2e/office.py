"""LibreOffice without a window: recalculates every formula of a workbook and saves it again."""

from __future__ import annotations

import subprocess
from pathlib import Path

ALWAYS = """<?xml version="1.0" encoding="UTF-8"?>
<oor:items xmlns:oor="http://openoffice.org/2001/registry"
 xmlns:xs="http://www.w3.org/2001/XMLSchema" xmlns:xsi="http://www.w3.org/2001/XMLSchema-instance">
<item oor:path="/org.openoffice.Office.Calc/Formula/Load">
<prop oor:name="OOXMLRecalcMode" oor:op="fuse"><value>0</value></prop></item>
</oor:items>
"""
"""Setting by which formulas are computed anew on loading, whatever value is stored with them."""


def recalculated(book: Path, folder: Path) -> Path:
    """Load ``book``, compute every formula anew, save into ``folder``; gives the new file."""
    profile = folder / "profile"
    (profile / "user").mkdir(parents=True, exist_ok=True)
    (profile / "user" / "registrymodifications.xcu").write_text(ALWAYS, encoding="utf-8")
    out = folder / "recalculated"
    out.mkdir(exist_ok=True)
    subprocess.run(
        [
            "soffice", f"-env:UserInstallation={profile.as_uri()}", "--headless", "--convert-to",
            "xlsx:Calc MS Excel 2007 XML", "--outdir", str(out), str(book),
        ],
        check=True, capture_output=True, timeout=180,
    )  # fmt: skip
    return out / book.name
