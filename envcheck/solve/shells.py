"""Curved walls and films: resistances of cylinders, spheres, convection and contact, in K/W.

Assumptions of every function: steady state, no heat generated inside, one-dimensional radial
flow, constant conductivity. Arguments are floats or arrays in SI, of any shape that broadcasts.
"""

from __future__ import annotations

from math import pi

from envcheck.solve.elementary import least, ln


def cylinder_resistance(
    r_in: float, r_out: float, conductivity: float, length: float = 1.0
) -> float:
    """Resistance of a cylindrical shell: R = ln(r_out/r_in) / (2 pi k L).

    r_in, r_out: radii, m, 0 < r_in <= r_out. conductivity: k, W/(m K). length: L, m.
    Returns K/W. Errors: ValueError for radii out of order or a number that is not above 0.
    Source: Incropera and DeWitt, Fundamentals of Heat and Mass Transfer, 3.3.1.
    """
    _shell(r_in, r_out, conductivity)
    _above_zero("length", length)
    return ln(r_out / r_in) / (2.0 * pi * conductivity * length)


def sphere_resistance(r_in: float, r_out: float, conductivity: float) -> float:
    """Resistance of a spherical shell: R = (1/r_in - 1/r_out) / (4 pi k).

    r_in, r_out: radii, m, 0 < r_in <= r_out. conductivity: k, W/(m K). Returns K/W.
    Errors: ValueError for radii out of order or a number that is not above 0.
    Source: Incropera and DeWitt, Fundamentals of Heat and Mass Transfer, 3.3.2.
    """
    _shell(r_in, r_out, conductivity)
    return (1.0 / r_in - 1.0 / r_out) / (4.0 * pi * conductivity)


def cylinder_area(radius: float, length: float = 1.0) -> float:
    """Area of a cylinder's mantle: A = 2 pi r L. radius, length: m. Returns m2."""
    return 2.0 * pi * radius * length


def convection_resistance(h: float, area: float) -> float:
    """Resistance of a surface film: R = 1 / (h A).

    h: heat transfer coefficient, W/(m2 K). area: A, m2. Returns K/W.
    Errors: ValueError for a number that is not above 0.
    Source: Newton's law of cooling; Incropera and DeWitt, 3.1.2.
    """
    _above_zero("h", h)
    _above_zero("area", area)
    return 1.0 / (h * area)


def contact_resistance(contact: float, area: float) -> float:
    """Resistance of a joint: R = Rc / A.

    contact: Rc, m2 K/W, 0 or more. area: A, m2. Returns K/W.
    Errors: ValueError for a negative Rc or an area that is not above 0.
    Source: Incropera and DeWitt, 3.1.4.
    """
    if least(contact) < 0:
        raise ValueError(f"contact must not be negative, got {contact}")
    _above_zero("area", area)
    return contact / area


def equivalent_thickness(contact: float, conductivity: float) -> float:
    """Thickness of a solid that resists as much as a joint: L = Rc k.

    contact: Rc, m2 K/W. conductivity: k, W/(m K). Returns m.
    Source: Cengel, Heat and Mass Transfer, 3-2 (thermal contact resistance).
    """
    return contact * conductivity


def critical_radius(conductivity: float, h: float) -> float:
    """Radius of cylindrical insulation at which the heat loss is greatest: r = k / h.

    conductivity: k, W/(m K). h: outside coefficient, W/(m2 K). Returns m.
    Errors: ValueError for a number that is not above 0.
    Source: Incropera and DeWitt, Fundamentals of Heat and Mass Transfer, Example 3.5.
    """
    _above_zero("conductivity", conductivity)
    _above_zero("h", h)
    return conductivity / h


def _shell(r_in: float, r_out: float, conductivity: float) -> None:
    _above_zero("r_in", r_in)
    _above_zero("conductivity", conductivity)
    if least(r_out - r_in) < 0:
        raise ValueError(f"r_out must not be below r_in, got {r_out} < {r_in}")


def _above_zero(name: str, value: float) -> None:
    if least(value) <= 0:
        raise ValueError(f"{name} must be above 0, got {value}")
