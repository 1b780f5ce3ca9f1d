"""Kinds of errors in the printed sheets of a rule set."""

from __future__ import annotations

from envcheck.errors import Kind

KINDS = (
    Kind(
        "blank-cell",
        "{where}: the cell is blank",
        "type the printed figure, NR where the code asks nothing, or - where it has no such case",
        "A blank would read as no limit; a table that leaves cells out says `blank: not_printed`.",
    ),
    Kind(
        "broken-csv",
        "the sheet is not valid CSV",
        "put text that holds a separator or quotes in double quotes, and double the quotes inside",
        "Quotes that are not closed or stand inside a cell.",
    ),
    Kind(
        "cell-decimal-mark",
        "{where}: the decimal mark is not that of the rule set",
        "use the mark that `decimal:` states, or correct `decimal:`",
        "A comma in a sheet with points, or a point in a sheet with commas.",
    ),
    Kind(
        "cell-not-executed",
        "{where}: the cell holds no figure of its own metric",
        "type a figure of the row's metric beside the other one, or leave the row out and say so "
        "under `not_judged:`",
        "A rating such as ER 34 stands beside the row's own figure, never alone.",
    ),
    Kind(
        "empty-sheet",
        "the sheet has no rows below its heads",
        "type the printed rows, or correct `header_rows:`",
        "A sheet without a single row.",
    ),
    Kind(
        "extent-without-rule",
        "{where}: a length stands after the figure, and the row does not say what it measures",
        "add `extent: depth` (or perimeter) to the row under `rows:`",
        "`10 for 24 in` is read only where the row says what the length is.",
    ),
    Kind(
        "lost-bracket",
        "{where}: a footnote bracket has no partner",
        "write the mark in square brackets right after the cell: 30[g]",
        "Footnote marks stand in square brackets.",
    ),
    Kind(
        "merged-across-quantities",
        "{where}: the cell repeats one that holds another quantity",
        "type the figure instead of < or ^",
        "`<` and `^` repeat a merged cell; from a U column to an R column that is wrong.",
    ),
    Kind(
        "missing-row-key",
        "the row has no key in its first column",
        "give the row a short key; an envcheck category such as wall.mass needs no further mapping",
        "Each printed row has a key that `rows:` can name.",
    ),
    Kind(
        "missing-table-unit",
        "{where}: the printed unit is not stated",
        "add it under `units:` in ruleset.yaml, such as {{U: Btu/(h.ft2.F), R: h.ft2.F/Btu}}",
        "A figure without its unit cannot be compared.",
    ),
    Kind(
        "no-base-cell",
        "the amendment changes a column that the base does not have",
        "repeat the heads of the base sheet",
        "An amendment repeats the heads of the sheet that it amends.",
    ),
    Kind(
        "no-base-row",
        "the amendment changes a row that the base does not have",
        "repeat key and conditions of the base row",
        "An amendment repeats the rows that it touches, conditions included.",
    ),
    Kind(
        "plus-without-rule",
        "{where}: a sum, and the row does not say what its figures speak of",
        "add `plus: [cavity, ci]` to the row under `rows:`, or a suffix to each figure",
        "`13+9` may be cavity and continuous insulation, or something else: the row says.",
    ),
    Kind(
        "prefix-against-metric",
        "{where}: the prefix names another quantity than row and column",
        "correct the cell, or the metric under `rows:` or `heads:`",
        "An R in a U column, or a U in an R column, is a slip of the column.",
    ),
    Kind(
        "ragged-row",
        "the row has another number of columns than the first",
        "check the separators; put text that holds a comma in quotes",
        "A cell was lost or split.",
    ),
    Kind(
        "repeated-head",
        "two columns have the same heads",
        "correct the head, or add the second head row",
        "Two columns that cannot be told apart.",
    ),
    Kind(
        "repeated-row",
        "the row stands twice, first in {where}",
        "delete one of the two, or tell them apart by a `when:` column",
        "The same key with the same conditions.",
    ),
    Kind(
        "second-table",
        "a second table begins in the sheet",
        "give each printed table its own CSV file and its own entry under `tables:`",
        "One sheet holds one printed table.",
    ),
    Kind(
        "sense-against-metric",
        "{where}: the figure is a maximum where a minimum is meant, or the reverse",
        "correct `limit:` or the sign in the cell",
        "U-, C- and F-factors are maxima, R-values minima.",
    ),
    Kind(
        "slash-without-rule",
        "{where}: a slash, and the row does not say what it stands for",
        "add `slash:` to the row under `rows:`: when (conditions), or (alternatives), and (both)",
        "13/17 may be two conditions, two alternatives or two parts: the row says which.",
    ),
    Kind(
        "trailing-letter",
        "{where}: a letter sticks to the figure",
        "write it in square brackets where it is a footnote mark",
        "30g may be a lost bracket: 30[g].",
    ),
    Kind(
        "unchanged-without-base",
        "{where}: the cell says 'unchanged', and the table amends none",
        "type the printed figure",
        "A single point stands for an unchanged cell of an amendment.",
    ),
    Kind(
        "undefined-footnote",
        "{where}: the footnote mark is not defined",
        "define it under `notes:`",
        "A mark without its note would change a limit unseen.",
    ),
    Kind(
        "unknown-band",
        "{where}: the rating band is not declared",
        "list the bands under `bands:`, best first, or correct the cell",
        "A band such as WER B means B or better, in the order that `bands:` gives.",
    ),
    Kind(
        "unknown-reference",
        "{where}: the cell refers to a row that has no figure in this column",
        "write `see ` and the key of another row of the sheet, or say under `rows:` what `see:` "
        "means",
        "`see wall.mass` takes the figure of that row in the same column.",
    ),
    Kind(
        "unknown-head",
        "{found_head!r} is a printed head without a meaning",
        "say under `head_levels:` or `heads:` what it means",
        "Every printed head is mapped, so that no column is read for another.",
    ),
    Kind(
        "unknown-suffix",
        "{where}: letters after the figure that are not known",
        "declare them under `suffixes:`, or correct the cell",
        "Suffixes such as ci say what a figure speaks of.",
    ),
    Kind(
        "unknown-zone-head",
        "the zone is not in the order of zones",
        "use a zone of `zones: {{order: ...}}`, or add it there",
        "Zones of sheets, members and bounds are those of the printed order.",
    ),
    Kind(
        "unreadable-cell",
        "{where}: the cell cannot be read",
        "type it as the cell grammar has it: 0.060, 13+9ci or 0+15ci, 10 for 24 in, NR, -",
        "A cell that fits no form of the grammar.",
    ),
    Kind(
        "wrong-head",
        "the {place} column must be {name!r}",
        "give the first row: row, label, any when: columns, the printed columns, src",
        "Reserved columns have fixed places, so that no figure is read from the wrong one.",
    ),
    Kind(
        "zone-missing",
        "the table has no {what} for zone {zone!r}",
        "type it, or name the zone under `gaps_allowed:` of the table",
        "A zone without figures is a gap unless the table says so.",
    ),
    Kind(
        "sheet-outside",
        "the sheet is not a CSV file of the rule set's own folder",
        "write the name of a CSV file that lies beside ruleset.yaml, without a path",
        "Nothing in a rule set reaches outside its folder.",
    ),
)
