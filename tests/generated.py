"""Pages of the docs that are written from the code: ``python -m tests.generated`` writes them."""

from __future__ import annotations

from pathlib import Path

from envcheck.error_kinds import KINDS
from envcheck.judge.crosschecks import checks
from envcheck.solve.registry import methods

DOCS = Path(__file__).parent.parent / "docs"


def methods_page() -> str:
    """docs/methods.md: every method of the registry."""
    parts = [
        "# Methods",
        "",
        "Written from the registry by `python -m tests.generated`; a test holds it current. A rule",
        "set may prescribe the methods marked *prescribable* under `conventions: methods:`.",
    ]
    for name, method in methods().items():
        prescribable = method.decides is not None or bool(method.solves)
        kinds = [kind for kind, _ in (*method.draws, *method.solves)]
        parts += [
            "",
            f"## `{name}`" + (" (prescribable)" if prescribable else ""),
            "",
            f"{method.title}.",
            "",
            f"- Formula: {method.formula}",
            f"- Source: {method.source}",
            f"- Valid for: {method.valid}",
        ]
        if kinds:
            parts.append(f"- Serves kind: {', '.join(f'`{kind}`' for kind in kinds)}")
    return "\n".join(parts) + "\n"


def errors_page() -> str:
    """docs/errors.md: every kind of input error by id, and every cross-check."""
    parts = [
        "# Errors and findings by id",
        "",
        "Written from the code by `python -m tests.generated`; a test holds it current.",
        "",
        "An error stops a run: `file:line: what is wrong (found ...; expected ...). Fix: ... [id]`",
        "all of them at once, exit status 2, nothing written.",
    ]
    for name in sorted(KINDS):
        kind = KINDS[name]
        parts += ["", f"## `{name}`", "", kind.about]
    parts += [
        "",
        "# Findings of the cross-checks",
        "",
        "A finding never changes a verdict. Severity E counts as open until the project answers it",
        "under `answers:`.",
        "",
    ]
    parts += [f"- `{check.id}`: {check.title}" for check in checks()]
    return "\n".join(parts) + "\n"


PAGES = {"methods.md": methods_page, "errors.md": errors_page}

if __name__ == "__main__":
    for page, write in PAGES.items():
        (DOCS / page).write_text(write(), encoding="utf-8")
