"""User text made inert: it can neither steer a terminal nor mark up a page."""

from __future__ import annotations

import re
import unicodedata

JOINERS = "\u200c\u200d"
"""Zero-width (non-)joiners, which several scripts need within a word."""
_MARKUP = re.compile(r"([\\`*_{}\[\]<>#|~!&$])")
_SPACES = re.compile(r" {2,}")


def clean(text: str) -> str:
    """Give one printable line: controls and direction marks escaped, odd spaces made plain."""
    if text.isprintable():
        return text
    return _SPACES.sub(" ", "".join(map(_visible, text))).strip()


def _visible(char: str) -> str:
    if char.isprintable() or char in JOINERS:
        return char
    if char in "\n\r\t" or unicodedata.category(char) in ("Zs", "Zl", "Zp"):
        return " "
    code = ord(char)
    return f"\\x{code:02x}" if code < 0x100 else f"\\u{code:04x}"


def for_markdown(text: str) -> str:
    """Escape everything that Markdown or HTML would read as markup."""
    return _MARKUP.sub(r"\\\1", text)


def as_code(text: str) -> str:
    """Wrap in a code span that the text itself cannot end."""
    return "`" + text.replace("`", "'") + "`"


def for_csv(text: str) -> str:
    """Guard a text cell that a spreadsheet would run as a formula."""
    return f"'{text}" if text[:1] in ("=", "+", "-", "@") else text
