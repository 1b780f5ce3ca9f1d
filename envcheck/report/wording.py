"""Words of the report: one place for every term that is not a user's or a rule set's own."""

from __future__ import annotations

from functools import lru_cache

from envcheck.model import metrics

VERDICTS = {
    "pass": "within",
    "fail": "over its limit",
    "too_close": "limit lies between the bounds",
    "not_decided": "not decided",
    "no_requirement": "no requirement",
    "not_in_table": "no row covers it",
    "official_decides": "the official decides",
    "path_closed": "row closed by an area cap",
}
SHORT_OF = "short of its limit"
"""``fail`` where the limit is a least value."""
OVER_WITH = "over"
"""``fail`` that a line carries for its group."""
BY_ROUNDING = ", by rounding"
AT_LIMIT = ", at its limit"
ROUNDED_TO_LIMIT = ", rounded to its limit"
ON_METHOD = "the verdict hangs on the method"
WITHIN_BY_METHOD = "by the method that decides here; another may give another verdict"
NOT_PROVEN = (
    "both ends are solved; between them nothing is proven, since a thicker layer of a section may "
    "also spread heat along it"
)
METRICS = {name: metric.words for name, metric in metrics.METRICS.items()} | {
    "U_assembly": "U-factor of the assembly",
    "C_factor": "C-factor (no films, no soil)",
    "F_factor": "F-factor of the slab edge",
    "R_insulation": "rated R-value of the insulation",
    "SHGC": "solar heat gain coefficient",
}
METHODS = {
    "series": "layers in series",
    "parallel_path": "parallel paths",
    "isothermal_planes": "isothermal planes",
    "weighted": "weighted between parallel paths and isothermal planes",
    "cavity_factor": "cavity correction factors",
    "effective_layer": "effective layer resistance",
    "zone": "zone method",
    "two_dimensional": "two-dimensional bounds",
    "c_factor": "C-factor from layers",
    "f_factor": "F-factor looked up",
    "iso13370_slab": "slab on ground by ISO 13370",
    "iso13370_suspended": "suspended floor by ISO 13370",
    "iso13370_basement": "heated basement by ISO 13370",
    "iso13370_basement_floor": "floor of a heated basement by ISO 13370",
    "iso13370_basement_wall": "walls of a heated basement by ISO 13370",
    "iso13370_unheated": "unheated basement by ISO 13370",
    "curved": "cylinder or sphere",
    "iso10077_window": "window by ISO 10077-1",
    "iso12631_curtain_wall": "curtain wall by ISO 12631",
    "en673_glazing": "centre of the glass by EN 673",
    "rated": "rated value",
    "sum_of_labels": "labels added up",
    "mean_thickness": "mean thickness",
    "minimum_thickness": "least thickness",
}
WEIGHTS = {"bre_465": "by BRE Digest 465", "table": "by the rule set's table"}
SCOPES = {
    "new": "new building",
    "addition": "addition",
    "alteration": "alteration",
    "change_of_use": "change of use",
}
STATUS = {
    "official": "official text",
    "transcribed": "transcribed from print",
    "example": "example",
}
SEVERITIES = {"E": "to be settled", "W": "to be checked", "N": "to note"}
RATIOS = {
    "window_wall_ratio": "fenestration / gross above-grade wall",
    "skylight_roof_ratio": "skylights / gross roof",
}
NO_TURN = "none: no verdict turns by one convention of another rule set alone"
GROUPS = {"mean": "mean", "trade_off": "trade-off"}
"""Lines judged together, by kind."""
ELECTED = "the project elects it: its lines carry this verdict"
NOT_ELECTED = "for information: the project does not elect it"
GROUP_STATES = {
    "pass": "as drawn is not above the table",
    "fail": "as drawn is above the table",
    "official_decides": "the official decides",
    "not_decided": "closed",
}
TRAIL = {
    "date": "date",
    "edition": "edition",
    "amendment": "amendment",
    "zone": "zone",
    "row": "row",
    "condition": "condition",
    "footnote": "footnote",
    "path": "path",
    "class": "class",
    "rounding": "rounding",
}
INSULATION_PATH = "R-value path"
STATES = {
    "pass": "within",
    "fail": "over",
    "not_available": "not available",
    "not_decided": "not decided",
}
COMPARE = {
    "rounded_to_printed_decimals": "computed value rounded half-up to the decimals of the limit",
    "unrounded": "computed value not rounded",
    "rounded_2dp": "computed value rounded half-up to two decimals",
}
FILM_SETS = {
    "iso6946": "ISO 6946, by direction of heat flow",
    "handbook": "handbook set, by position and direction",
}
AIR_SPACES = {"iso6946": "ISO 6946 formula", "handbook": "handbook table", "table": "table"}
CLADDING = {
    "iso6946": "layers outside a well-ventilated space dropped, inner film value outside",
    "film_stays": "well-ventilated space and what lies outside count 0, outer film stays",
}
FASTENERS = {
    "ignored": "ignored in continuous insulation",
    "iso6946": "correction of ISO 6946",
    "chi": "by point transmittance (chi)",
}
CORRECTIONS = {"ignored": "not counted", "iso6946": "correction of ISO 6946"}
TAPERED = {
    "integral": "by the areas of equal thickness (integral)",
    "mean": "at the mean thickness",
    "minimum": "at the least thickness",
}
CROSSED = {
    "zero": "insulation crossed by continuous metal counts 0",
    "counted": "insulation crossed by continuous metal counts in full",
    "two_dimensional": "insulation crossed by continuous metal by two-dimensional bounds",
}
OUR_DEFAULT = "default of envcheck"
APPROVES_NOTHING = "This report compares figures; it approves nothing. The code official decides."
DEFERRAL = (
    "This report compares computed heat-transfer values with limits that a user typed in. It is "
    "not an approval, a permit or a certificate. The code official having jurisdiction decides; "
    "where law requires it, a licensed professional prepares or seals the documents."
)
HASH_NOTE = "identifies the file, not its correctness"
NOTHING = "none"


def plain(word: str) -> str:
    """Write an identifier as words."""
    return word.replace("_", " ")


def plural(count: int, one: str, many: str = "") -> str:
    """Write a count with its noun."""
    return f"{count} {one if count == 1 else many or one + 's'}"


def listed(names: tuple[str, ...] | list[str], most: int = 12) -> str:
    """Write names in a row, cut where there are very many."""
    more = f" and {len(names) - most} more" if len(names) > most else ""
    return ", ".join(names[:most]) + more


def either(text: str) -> str:
    """Write alternatives of a printed condition, ``E|S|W``, as words."""
    *most, last = text.split("|")
    return f"{', '.join(most)} or {last}" if most else last


@lru_cache(maxsize=64)
def path(name: str, symbol: str) -> str:
    """Name a path: ``assembly`` by the letter of its metric."""
    if name == "insulation":
        return INSULATION_PATH
    return f"{symbol}-factor path" if name == "assembly" else plain(name)
