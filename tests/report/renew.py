"""``python -m tests.report.renew`` writes the expected texts anew; read the difference first."""

from __future__ import annotations

from typing import Any

from tests.report import test_explain, test_formats


def main() -> None:
    """Write every expected text from the code as it stands."""
    for module in (test_formats, test_explain):
        function: Any = module.test_exact_text
        names, rows = function.pytestmark[0].args
        for row in rows:
            case = dict(zip(names, row, strict=True))
            file = case.pop("file")
            options = case.pop("options", {})
            written: Any = module.written
            text = written(*case.values(), **options)
            (test_formats.EXPECTED / file).write_text(text, encoding="utf-8")


if __name__ == "__main__":
    main()
