"""The names that later stages know, handed to ``read`` so that it can check and suggest them."""

from typing import NamedTuple


class Names(NamedTuple):
    """Known names by registry."""

    methods: tuple[str, ...]
    categories: tuple[str, ...]
    findings: tuple[str, ...]
