"""What has changed since a person checked the sheets."""

from __future__ import annotations

from collections.abc import Iterator

from envcheck.lint import Check, Sheets
from envcheck.model.typed import Fault


def changed(sheets: Sheets) -> Iterator[Fault]:
    """A file that is not as it was when the folder was locked."""
    lock = sheets.set.lock
    for name in lock.changed if lock is not None else ():
        file = f"{sheets.set.file.rpartition('/')[0]}/{name}".lstrip("/")
        assert lock is not None
        what = f"changed since {lock.checked_by} checked it on {lock.on}"
        fix = "have it compared with the print again, then `envcheck rules lock`"
        yield Fault("L27", "remark", file, None, what, name, "", fix, place=name)


CHECKS = (Check("L27", "Changed since it was locked", changed),)
