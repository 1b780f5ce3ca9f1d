"""Kinds of errors in files: text and YAML, the schema, quantities."""

from __future__ import annotations

from envcheck.errors import Kind

KINDS = (
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
        "bad-range",
        "this is no range of a value",
        "{hint}",
        "A range is a value, +- (or ±), and half its width in the same unit or in per cent; its "
        "low end is above zero.",
    ),
    Kind(
        "range-not-here",
        "no range can be stated here",
        "{hint}",
        "Ranges are for the conductivity of a material, the thickness of a layer of one "
        "material, and the resistance of a layer or contact.",
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
)
