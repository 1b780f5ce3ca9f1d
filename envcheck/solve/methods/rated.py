"""Rated products: the stated whole-product value; the centre of the glass alone never decides."""

from __future__ import annotations

from envcheck.model.project import Assembly
from envcheck.model.ruleset import Conventions
from envcheck.model.solved import Beside, Setting, Step
from envcheck.solve.registry import Decision, Method, NotDecided

NOT_WHOLE = (
    "the whole product's U-factor: only the centre of glass is stated; the whole product with its "
    "frame is needed"
)
DEFAULT = "the U-factor is a default value, not a rating of this product"


def solve_rated(assembly: Assembly, setting: Setting, conventions: Conventions) -> Decision:
    """Take the stated U-factor of a whole product, W/(m2 K).

    Errors: NotDecided where no U-factor is stated. Evidence is weighed by the judgement.
    """
    rated = assembly.rated
    if rated is None or rated.u_factor is None:
        raise NotDecided("the U-factor of the whole product")
    if rated.basis == "centre_of_glass":
        note = "stated value of the centre of glass; frame and edge are not in it"
        beside = (Beside("centre_of_glass", rated.u_factor, note),)
        return Decision(None, missing=(NOT_WHOLE,), beside=beside)
    source = ", ".join(part for part in (rated.evidence, rated.standard, rated.document) if part)
    title = "U-factor of the whole product, as stated"
    step = Step("U", title, "", (), rated.u_factor, "u_factor", source)
    assumptions = (DEFAULT,) if rated.basis == "default" else ()
    return Decision(rated.u_factor, steps=(step,), assumptions=assumptions)


METHODS = (
    Method(
        name="rated",
        title="Rated product",
        formula="U as stated for the whole product",
        source="the label, rating or test named beside the value",
        valid="whole product with frame; size and options as rated",
        solves=(("rated", solve_rated),),
        metric="U_product",
    ),
)
