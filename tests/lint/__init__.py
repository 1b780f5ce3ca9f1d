"""Lint of typed tables, each check with a good and a bad sheet."""
