"""The catalogue of input errors: one entry per kind, in alphabetical order of its id.

``what`` and ``fix`` are templates that the place of error fills in; ``about`` explains the kind in
the docs. Ids are stable: people look them up and scripts match them.
"""

from __future__ import annotations

from dataclasses import dataclass


@dataclass(frozen=True, slots=True)
class Kind:
    """One kind of error."""

    id: str
    what: str
    fix: str
    about: str


_ALL = (
    # reading: the file and its YAML, the schema, quantities, references, sizes
    Kind(
        "file-missing",
        "there is no such file",
        "check the path; give '-' to read standard input",
        "The project file was not found.",
    ),
    Kind(
        "file-is-folder",
        "this is a folder, not a file",
        "name the project file in it",
        "A folder was given where a file is read.",
    ),
    Kind(
        "file-unreadable",
        "the file cannot be read",
        "check its permissions",
        "The operating system refused to open or read the file.",
    ),
    Kind(
        "file-too-large",
        "the file is too large",
        "a project is one text file; split it, or look for pasted data",
        "Files over 64 MB are not read.",
    ),
    Kind(
        "empty-file",
        "the file holds nothing",
        "start from the text that 'envcheck new' prints",
        "An empty file, or one of comments only.",
    ),
    Kind(
        "wrong-encoding",
        "the file is not UTF-8 text",
        "save the file as UTF-8 in your editor",
        "Bytes that are no UTF-8: most often a file saved as Latin-1 or UTF-16.",
    ),
    Kind(
        "control-character",
        "there is a control character in the text",
        "delete the character and type the text again",
        "Such characters could make a report show other text than the file holds.",
    ),
    Kind(
        "yaml-syntax",
        "this is not valid YAML: {what}",
        "",
        "The text breaks the rules of YAML; the parser could not go on.",
    ),
    Kind(
        "duplicate-key",
        "the key {key!r} stands twice, first in line {first}",
        "keep one of the two, or rename one",
        "Two equal keys in one mapping; which one would count is anybody's guess.",
    ),
    Kind(
        "yaml-alias",
        "aliases are not read",
        "write the values out where they are needed",
        "A YAML alias (*name). Written-out values are what a reviewer can read.",
    ),
    Kind("yaml-anchor", "anchors are not read", "delete the anchor", "A YAML anchor (&name)."),
    Kind(
        "yaml-tag", "tags are not read", "delete the tag; put text in quotes", "A YAML tag (!name)."
    ),
    Kind(
        "merge-key",
        "the merge key '<<' is not read",
        "write the keys out where they are needed",
        "A YAML merge key.",
    ),
    Kind(
        "second-document",
        "a second document starts here",
        "keep one document per file; delete the line '---'",
        "A file holds one project or one rule set.",
    ),
    Kind(
        "too-deep",
        "brackets or blocks are nested too deep",
        "check for brackets that are never closed",
        "Nesting deeper than any file of this format needs.",
    ),
    Kind(
        "key-not-text",
        "a list or mapping stands where a key should",
        "write 'key: value'",
        "A key that is itself a list or mapping.",
    ),
    Kind(
        "not-finite",
        "this is not a finite number",
        "write the number, or leave the key out",
        "Infinity or not-a-number.",
    ),
    Kind(
        "leading-zero",
        "a number with a leading zero can be read in two ways",
        "drop the zero; put text in quotes",
        "Numbers such as 007.",
    ),
    Kind(
        "root-not-mapping",
        "the file must hold keys and values",
        "start from the text that 'envcheck new' prints",
        "A list or bare text at the top of the file.",
    ),
    Kind(
        "missing-key",
        "{where} lacks the key {key!r}",
        "add {key!r}{hint}",
        "A key that the format requires.",
    ),
    Kind(
        "wrong-type",
        "{key!r} holds the wrong kind of value",
        "{hint}",
        "Text where a list belongs, a number where text belongs, and so on.",
    ),
    Kind(
        "unknown-word",
        "{key!r} is none of the known words",
        "{hint}",
        "A word from a fixed list, most often misspelt.",
    ),
    Kind(
        "unknown-version",
        "this version of the format is not known",
        "{hint}",
        "The key 'envcheck' names the version of the project format.",
    ),
    Kind(
        "too-long",
        "{key!r} is too long",
        "shorten it; long explanations belong in the documents",
        "Text longer than a report can show.",
    ),
    Kind(
        "too-few",
        "{key!r} holds too little",
        "add at least one entry, or leave the key out",
        "An empty list or mapping, or empty text.",
    ),
    Kind(
        "out-of-range",
        "{key!r} is out of range",
        "{hint}",
        "A number that cannot be, such as an emittance of 1.3.",
    ),
    Kind(
        "wrong-form",
        "{key!r} does not have the right form",
        "{hint}",
        "Text that must follow a pattern.",
    ),
    Kind(
        "missing-unit",
        "a number without its unit",
        "{hint}",
        "Every quantity carries its unit as text.",
    ),
    Kind(
        "unknown-unit",
        "the unit is not known",
        "{hint}",
        "A unit that the table of units does not hold.",
    ),
    Kind(
        "wrong-unit",
        "the unit belongs to another quantity",
        "{hint}",
        "A known unit of the wrong quantity, such as a conductivity for a U-factor.",
    ),
    Kind(
        "comma-decimal",
        "a comma in a number",
        "{hint}",
        "Decimal commas and thousands marks are not guessed at.",
    ),
    Kind(
        "not-a-number",
        "this is not one number with its unit",
        "{hint}",
        "Prose, two numbers, gaps between digits, or no digits at all.",
    ),
    Kind(
        "number-too-large",
        "the number is too large to be true",
        "check the digits and the exponent",
        "No quantity of a building is that large.",
    ),
    Kind(
        "not-positive",
        "{key!r} must be more than zero",
        "type the size as drawn; leave out what is not there",
        "A zero or negative thickness, area, resistance and the like.",
    ),
    Kind(
        "bad-date",
        "{key!r} is no date",
        "write year-month-day, as 2026-03-02",
        "Dates are typed as year-month-day.",
    ),
    Kind(
        "unknown-material",
        "the material {name!r} is not known",
        "{hint}",
        "A material id that neither the project nor the library holds.",
    ),
    Kind(
        "unknown-profile",
        "the steel profile {name!r} is not known",
        "{hint}",
        "A profile id that the library does not hold; profiles can be described in place.",
    ),
    Kind(
        "unknown-assembly",
        "the assembly {name!r} is not in this file",
        "{hint}",
        "An element names an assembly that is not described.",
    ),
    Kind(
        "unknown-surface",
        "the surface {name!r} is not in this file",
        "{hint}",
        "An element names a surface that is not described.",
    ),
    Kind(
        "unknown-element",
        "the element {name!r} is not in this file",
        "{hint}",
        "A host, exception or answer names an element that is not there.",
    ),
    Kind(
        "unknown-layer",
        "the assembly has no layer titled {name!r}",
        "{hint}",
        "Fasteners name the title of the layer they cross.",
    ),
    Kind(
        "unknown-category",
        "the category {name!r} is not known",
        "{hint}",
        "Categories are a fixed list.",
    ),
    Kind(
        "unknown-finding",
        "the finding {name!r} is not known",
        "{hint}",
        "An answer names the id of a finding.",
    ),
    Kind(
        "needs-one-of",
        "{where} needs exactly one of {keys}",
        "{hint}",
        "A value that can be given in several ways, given in none or in several.",
    ),
    Kind(
        "no-amount",
        "the element has no amount",
        "give net_area, gross_area, perimeter, or count with width and height",
        "An element needs an area, a perimeter, or a count with a size.",
    ),
    Kind(
        "two-amounts",
        "the element has more than one amount",
        "keep one: net_area, gross_area, perimeter, or count with width and height",
        "Two amounts of one element may contradict each other.",
    ),
    Kind(
        "wrong-amount",
        "a {category} is measured by {measure}",
        "{hint}",
        "Slab edges are measured by their length, everything else by area.",
    ),
    Kind(
        "net-over-gross",
        "the net area is larger than the gross area",
        "exchange the two, or keep the one that the drawing shows",
        "An impossible area.",
    ),
    Kind(
        "openings-over-host",
        "the openings are larger than the element that holds them",
        "check the counts and sizes of {openings}",
        "Openings that name this element as host take up all of its gross area or more.",
    ),
    Kind(
        "own-host",
        "the element is its own host",
        "name the wall or roof that the opening is cut from",
        "An opening that names itself.",
    ),
    Kind(
        "below-grade-over-gross",
        "the area below grade is larger than the gross area",
        "check both areas",
        "An impossible area.",
    ),
    Kind(
        "framing-too-wide",
        "the members are as wide as their spacing or wider",
        "check width and spacing",
        "Members that leave no cavity.",
    ),
    Kind(
        "shares-over-one",
        "the shares leave no room: together {total}",
        "check the shares",
        "Shares of framing and headers, or of webs and joints, that take up all of the area.",
    ),
    Kind(
        "too-thick",
        "{key!r} is larger than {limit}",
        "check both sizes",
        "A part larger than what it lies in.",
    ),
    Kind(
        "evidence-outside",
        "the evidence lies outside the project's folder",
        "copy the document into the project's folder and name it from there",
        "Nothing in a project file reaches outside the folder that it lies in.",
    ),
    Kind(
        "unknown-key",
        "{key!r} is not a key of {where}",
        "{hint}",
        "A key that the format does not know, most often a misspelling.",
    ),
    # Rule sets.
    Kind(
        "blank-cell",
        "{where}: the cell is blank",
        "type the printed figure, NR where the code asks nothing, or - where it has no such case",
        "A gap in a sheet. A blank would read as no limit, so it is refused; a table that leaves cells unprinted says `blank: not_printed`.",
    ),
    Kind(
        "broken-csv",
        "the sheet is not valid CSV",
        "put text that holds a separator or quotes in double quotes, and double the quotes inside",
        "Quotes that are not closed or stand inside a cell.",
    ),
    Kind(
        "cap-closes-nothing",
        "the area cap does not say which rows it closes",
        "add `closes:` with the categories whose rows do not apply above the cap",
        "An area cap without its effect.",
    ),
    Kind(
        "cell-decimal-mark",
        "{where}: the decimal mark is not that of the rule set",
        "use the mark that `decimal:` states, or correct `decimal:`",
        "A comma in a sheet with points, or a point in a sheet with commas.",
    ),
    Kind(
        "cell-not-executed",
        "{where}: this kind of cell is not judged by this version",
        "type a figure, or leave the row out and say so under `not_judged:`",
        "The format knows rating bands, references to rows and lengths in words; they are not judged yet and never guessed.",
    ),
    Kind(
        "circular-base",
        "the rule sets amend each other in a circle",
        "correct `overlay: {{base: ...}}` of one of them",
        "A chain of amendments must end at a base.",
    ),
    Kind(
        "conditions-overlap",
        "two rows hold at once, the other one at {where}",
        "correct the conditions so that exactly one row is left for each case",
        "Exactly one limit must remain for an element; which of two counts is never chosen at run time.",
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
        "`<` and `^` repeat a merged cell; between a U column and an R column that would be a wrong figure.",
    ),
    Kind(
        "metric-not-executed",
        "{where}: this metric is not judged by this version",
        "leave the column or row out, and say so under `not_judged:`",
        "The format knows metrics that are not computed yet; their limits would never be checked, so they are refused.",
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
        "not-executed",
        "the rule set asks for {what}, which this version does not judge",
        "leave it out, and say so under `not_judged:`",
        "Nothing of a rule set is passed over in silence: what is not judged yet is refused or remarked.",
    ),
    Kind(
        "paths-not-stated",
        "the tables hold two paths, and the rule set does not say that either is enough",
        "add `paths: [{{any_of: [assembly, insulation], per: component, clause: ...}}]`",
        "U-factor path and R-value path are alternatives only where the code says so.",
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
        "Ids are lower-case words joined by hyphens; nothing in a file reaches outside the folders of `--rules`.",
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
        "undeclared-condition",
        "a condition asks for something that is not declared",
        "declare it under `dimensions:`",
        "Conditions speak of declared dimensions, so that a misspelt one is found.",
    ),
    Kind(
        "undefined-footnote",
        "{where}: the footnote mark is not defined",
        "define it under `notes:`",
        "A mark without its note would change a limit unseen.",
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
        "unknown-head",
        "{found_head!r} is a printed head without a meaning",
        "say under `head_levels:` or `heads:` what it means",
        "Every printed head is mapped, so that no column is read for another.",
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
        "unknown-rule-set",
        "there is no such rule set",
        "check the id, or name the folder that holds it with --rules",
        "Rule sets are looked up by id.",
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
        "unmapped-row",
        "the row fits no envcheck category",
        "say under `rows:` which category it covers",
        "Every printed row is mapped to the categories that it covers, by its key or by `element:`.",
    ),
    Kind(
        "unreadable-cell",
        "{where}: the cell cannot be read",
        "type it as the cell grammar has it: 0.060, 13+9ci or 0+15ci, 10 for 24 in, NR, -",
        "A cell that fits no form of the grammar.",
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
        "wrong-head",
        "the {place} column must be {name!r}",
        "give the first row: row, label, any when: columns, the printed columns, src",
        "Reserved columns have fixed places, so that no figure is read from the wrong one.",
    ),
    Kind(
        "wrong-table-unit",
        "the unit of {key!r} is not one that its figures can have",
        "write the printed unit, with a point or star between its parts",
        "U and C: Btu/(h.ft2.F) or W/(m2.K); R: h.ft2.F/Btu or (m2.K)/W; F: Btu/(h.ft.F) or W/(m.K).",
    ),
    Kind(
        "zone-missing",
        "the table has no {what} for zone {zone!r}",
        "type it, or name the zone under `gaps_allowed:` of the table",
        "A zone without figures is a gap unless the table says so.",
    ),
    Kind(
        "zones-overlap",
        "the bounds of two zones overlap",
        "correct the intervals: [4200,6500) holds 4200 and not 6500",
        "Each site must lie in exactly one zone.",
    ),
)

KINDS: dict[str, Kind] = {kind.id: kind for kind in _ALL}
