"""Kinds of errors in the meaning of a rule set: ``ruleset.yaml`` and its chain."""

from __future__ import annotations

from envcheck.errors import Kind

KINDS = (
    Kind(
        "broken-lock",
        "the lock of the folder cannot be read",
        "lock the folder anew with `envcheck rules lock`, or delete the file",
        "ruleset.lock holds hashes of the folder's files, who compared them with print, and when.",
    ),
    Kind(
        "class-test-incomplete",
        "a class test needs {what}",
        "{hint}",
        "The class holds from its figure on (at_least) or below it; a test of slope or of a share "
        "says in which class an element stands that fails.",
    ),
    Kind(
        "cap-closes-nothing",
        "the area cap does not say which rows it closes",
        "add `closes:` with the categories whose rows do not apply above the cap",
        "An area cap without its effect.",
    ),
    Kind(
        "circular-base",
        "the rule sets amend each other in a circle",
        "correct `overlay: {{base: ...}}` of one of them",
        "A chain of amendments must end at a base.",
    ),
    Kind(
        "conditions-leave-gap",
        "the conditions on {name!r} leave a gap",
        "add the row that is printed for it, or say why there is none: "
        "`uncovered_allowed: {{{name}: ...}}`",
        "A case that no row covers must be one that the code leaves open, and said so.",
    ),
    Kind(
        "conditions-overlap",
        "two rows hold at once, the other one at {where}",
        "correct the conditions so that exactly one row is left for each case",
        "Exactly one limit must remain for an element; none of two is chosen at run time.",
    ),
    Kind(
        "dates-overlap",
        "two columns hold on the same day",
        "correct `from:` or `until:` under `in_force:`",
        "Columns by date must not overlap: exactly one holds on each day.",
    ),
    Kind(
        "dates-reversed",
        "the rule set ends before it begins",
        "correct `from:` or `until:`",
        "The day `until` is the first on which the rule set no longer holds.",
    ),
    Kind(
        "dimension-without-values",
        "the dimension says neither its words nor that it is a number",
        "add `values: [...]` or `type: number`",
        "What a condition may ask for must be declared, so that a misspelt word is found.",
    ),
    Kind(
        "footnote-without-text",
        "the footnote waits for the official and says nothing",
        "add `text:` with the footnote as printed",
        "What a machine cannot decide is printed for the official, so it needs its words.",
    ),
    Kind(
        "footnotes-multiply",
        "{where}: the footnotes of one cell make too many cases",
        "split the row by `when:` columns, or leave a footnote to the official (`check: reviewer`)",
        "Each conditional footnote doubles the cases of its cell; six are 64.",
    ),
    Kind(
        "paths-not-stated",
        "the tables hold two paths, and the rule set does not say that either is enough",
        "add `paths: [{{any_of: [assembly, insulation], per: component, clause: ...}}]`",
        "U-factor path and R-value path are alternatives only where the code says so.",
    ),
    Kind(
        "repeated-table",
        "two tables have the same id",
        "give each table its own id",
        "Notes, paths and amendments find a table by its id.",
    ),
    Kind(
        "rule-set-id-differs",
        "the id in the file is not the name of its folder",
        "write the folder's name behind `ruleset:`, or rename the folder",
        "A rule set is found by the name of its folder.",
    ),
    Kind(
        "rule-set-not-id",
        "a rule set is named by its id, not by a path",
        "write the folder's name alone; `--rules` names the folder that holds it",
        "Ids are lower-case words joined by hyphens; no file reaches outside `--rules`.",
    ),
    Kind(
        "undeclared-condition",
        "a condition asks for something that is not declared",
        "declare it under `dimensions:`",
        "Conditions speak of declared dimensions, so that a misspelt one is found.",
    ),
    Kind(
        "unknown-base-table",
        "the amendment changes a table that the base does not have",
        "write the id of a table of the base",
        "An amendment names the table that it amends by its id.",
    ),
    Kind(
        "unknown-condition-word",
        "{name!r} has no such word",
        "use a declared word, or add it under `dimensions:`",
        "A word that a condition does not know, most often a misspelling.",
    ),
    Kind(
        "unknown-film-set",
        "there is no such set of surface films",
        "name a CSV file of the folder, or a built-in set",
        "Films come from the rule set's folder or from a built-in set.",
    ),
    Kind(
        "unknown-like",
        "the table is like one that is not there",
        "write the id of a table above this one",
        "`like:` takes the settings of a table that stands before.",
    ),
    Kind(
        "unknown-measure",
        "the zones are bounded by a measure that is not known",
        "use a measure of the site, such as hdd65 or hdd18",
        "Degree days carry their base temperature in the name.",
    ),
    Kind(
        "unknown-method",
        "there is no such method",
        "use a method that `envcheck methods` lists",
        "A method that the rule set prescribes must be one that is computed.",
    ),
    Kind(
        "unknown-metric",
        "{where}: no known metric",
        "state `metric:` for the row, the head or the table",
        "Every figure is a figure of something: U_assembly, R_insulation, SHGC ...",
    ),
    Kind(
        "unknown-ratio",
        "the area cap is on a ratio that is not known",
        "use window_wall_ratio or skylight_roof_ratio, or say in words what it caps",
        "A cap in words is printed in the report and not judged.",
    ),
    Kind(
        "unknown-rule-set",
        "there is no such rule set",
        "check the id, or name the folder that holds it with --rules",
        "Rule sets are looked up by id.",
    ),
    Kind(
        "unmapped-row",
        "the row fits no envcheck category",
        "say under `rows:` which category it covers",
        "Every printed row is mapped to categories, by its key or by `element:`.",
    ),
    Kind(
        "unreadable-condition",
        "the condition on {name!r} cannot be read",
        "write <=0.30, >3, (0.30,0.50] or words joined by |",
        "Conditions are words or intervals.",
    ),
    Kind(
        "unreadable-figure",
        "the figure cannot be read",
        "write one number and its unit",
        "A figure in ruleset.yaml that is no number with a unit.",
    ),
    Kind(
        "wrong-table-unit",
        "the unit of {key!r} is not one that its figures can have",
        "write the printed unit, with a point or star between its parts",
        "U, C: Btu/(h.ft2.F), W/(m2.K); R: h.ft2.F/Btu, (m2.K)/W; F: Btu/(h.ft.F), W/(m.K).",
    ),
    Kind(
        "zones-overlap",
        "the bounds of two zones overlap",
        "correct the intervals: [4200,6500) holds 4200 and not 6500",
        "Each site must lie in exactly one zone.",
    ),
)
