"""The stages called in order: read -> solve -> judge. Nothing else happens here."""

from __future__ import annotations

from dataclasses import dataclass
from pathlib import Path

from envcheck.judge import crosschecks
from envcheck.judge.building import closed_rows, closings, ratios, take_means
from envcheck.judge.classes import classify
from envcheck.judge.select import select
from envcheck.judge.verdict import Case, judge
from envcheck.model.judged import Judged, Line, Mean, Ratio
from envcheck.model.names import Names
from envcheck.model.project import Element, Project
from envcheck.model.ruleset import RuleSet
from envcheck.model.solved import Properties, Setting, Solved
from envcheck.read.project import read_project
from envcheck.read.rulesets import read_ruleset, rule_folders
from envcheck.solve.assembly import solve
from envcheck.solve.conventions import resolve
from envcheck.solve.properties import properties
from envcheck.solve.registry import prescribable

COMPLIES, OVER, OPEN = 0, 1, 3
"""Exit status of a run: none over and none open; at least one over; none over, some open."""
