"""Frozen dataclasses handed from stage to stage. They import nothing of envcheck.

``project``  what the user drew: assemblies, elements, surfaces, facts, claims.
``ruleset``  what the user's limit tables say: limits, zones, conditions, conventions.
``solved``   what an assembly's network gives: value, bracket, tree, worksheet.
``judged``   lines with verdicts, findings, sums.

Every number is SI (m, W, K, kg, J); names carry no unit, docstrings do.
"""
