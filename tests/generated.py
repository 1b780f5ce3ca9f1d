"""Pages of the docs that are written from the code: ``python -m tests.generated`` writes them."""

from __future__ import annotations

from pathlib import Path

from envcheck.error_kinds import KINDS
from envcheck.judge.crosschecks import checks
from envcheck.solve.registry import methods
from tests.projects.patterns import caught_by, patterns, printed

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


def crosschecks_page() -> str:
    """docs/crosschecks.md: the error patterns, where each is caught, and what ``check`` prints."""
    parts = [INTRODUCTION]
    seen = set()
    for each in patterns():
        parts += ["", f"## {each.number}. {each.title}", ""]
        parts += ["| caught by | project | printed |", "|---|---|---|"]
        for name, expected in each.bad.items():
            seen.add(expected.get("finding"))
            line = printed(each.folder, name, expected).replace("|", "\\|")
            parts.append(f"| {caught_by(expected)} | `{each.folder.name}/{name}.yaml` | {line} |")
    rest = [check for check in checks() if check.id not in seen]
    parts += ["", "## Other cross-checks", ""]
    parts += [f"- `{check.id}` ({check.sure}): {check.title}" for check in rest]
    return "\n".join(parts) + "\n"


INTRODUCTION = """# Cross-checks

Written from the cases by `python -m tests.generated`; a test holds it current.

Slips that submittals make are found by cross-checks, refused as input errors, or left open by a
verdict. A finding says what was seen, what it suggests and how sure that is, and what would settle
it; it never changes a figure. It is *certain* where the file contradicts itself, the drawing or the
rule set, *likely* where what was seen usually means that, *to be looked at* where it may well be as
it should. Findings to be settled count as open until the project answers them under `answers:`;
those to be checked and to note do not.

What each pattern gives is shown by small projects in `tests/cases/patterns`, each beside good ones
that give nothing. Figures, places and rule sets are invented."""


PAGES = {"methods.md": methods_page, "errors.md": errors_page, "crosschecks.md": crosschecks_page}

if __name__ == "__main__":
    for page, write in PAGES.items():
        (DOCS / page).write_text(write(), encoding="utf-8")
