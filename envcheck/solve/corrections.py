"""The corrections of ISO 6946, annex F, together: fasteners, air voids, rain on inverted roofs."""

from __future__ import annotations

from envcheck.model.project import Assembly
from envcheck.model.ruleset import Conventions
from envcheck.solve.methods.air_voids import correct_for_voids
from envcheck.solve.methods.fasteners import Correction, correct_for_fasteners
from envcheck.solve.methods.inverted_roof import correct_for_rain


def corrections(
    assembly: Assembly, r_total: float, conventions: Conventions, outside: int = 0
) -> tuple[Correction, ...]:
    """Every correction that the conventions ask for.

    r_total: of the wall as drawn, films included, tapered layers at their least thickness, m2
    K/W. outside: how many layers lie outside of a well-ventilated cavity.
    """
    if not assembly.fasteners and not assembly.voids and assembly.inverted is None:
        return ()
    given = (assembly, r_total, conventions, outside)
    return correct_for_fasteners(*given), correct_for_voids(*given), correct_for_rain(*given)


def counted_from(
    found: tuple[Correction, ...], u_factor: float, conventions: Conventions
) -> tuple[Correction, ...]:
    """The same, or none of them where together they are too small a share of U to count.

    u_factor: without corrections, W/(m2 K). ISO 6946 (annex D of 2007, from memory) lets
    corrections below 3 % be left out; they are only where the rule set states that share.
    """
    least = conventions.corrections_from
    total = sum(one.value for one in found)
    if least is None or total <= 0 or total >= least * u_factor or any(x.missing for x in found):
        return found
    said = (
        f"corrections of ISO 6946 add {100 * total / u_factor:.2g} % together: below "
        f"{100 * least:.3g} % the rule set does not count them"
    )
    others = tuple(words for one in found for words in one.assumptions)
    return (Correction(0.0, assumptions=(*others, said)),)
