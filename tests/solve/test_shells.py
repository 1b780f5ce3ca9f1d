"""What the shells refuse, and how they tend to a plane wall."""

from __future__ import annotations

from collections.abc import Callable

import pytest

from envcheck.solve import shells
from envcheck.solve.network import plane_wall


@pytest.mark.parametrize(
    ("function", "arguments", "said"),
    [
        (shells.cylinder_resistance, (0.0, 1.0, 1.0), "r_in must be above 0"),
        (shells.cylinder_resistance, (0.2, 0.1, 1.0), "r_out must not be below r_in"),
        (shells.cylinder_resistance, (0.1, 0.2, 1.0, 0.0), "length must be above 0"),
        (shells.sphere_resistance, (0.1, 0.2, 0.0), "conductivity must be above 0"),
        (shells.sphere_resistance, (0.2, 0.1, 1.0), "r_out must not be below r_in"),
        (shells.convection_resistance, (-1.0, 1.0), "h must be above 0"),
        (shells.convection_resistance, (1.0, 0.0), "area must be above 0"),
        (shells.contact_resistance, (-1.0, 1.0), "contact must not be negative"),
        (shells.contact_resistance, (1.0, 0.0), "area must be above 0"),
        (shells.critical_radius, (0.0, 1.0), "conductivity must be above 0"),
        (shells.critical_radius, (1.0, 0.0), "h must be above 0"),
    ],
)
def test_refused(function: Callable[..., float], arguments: tuple[float, ...], said: str) -> None:
    with pytest.raises(ValueError, match=said):
        function(*arguments)


@pytest.mark.parametrize("radius", [10.0, 100.0, 1000.0])
def test_a_thin_shell_of_large_radius_is_a_plane_wall(radius: float) -> None:
    """First-order error of the plane wall is half the thickness over the radius, or all of it."""
    thickness, conductivity = 0.2, 0.8
    plane = plane_wall(thickness, conductivity)
    outer = radius + thickness
    curved = shells.cylinder_resistance(radius, outer, conductivity)
    assert curved * shells.cylinder_area(radius) == pytest.approx(plane, rel=thickness / radius)
    sphere = shells.sphere_resistance(radius, outer, conductivity) * 4 * 3.141592653589793
    assert sphere * radius * outer == pytest.approx(plane, rel=1e-9)


def test_a_shell_without_thickness_resists_nothing() -> None:
    assert shells.cylinder_resistance(0.1, 0.1, 1.0) == 0
    assert shells.sphere_resistance(0.1, 0.1, 1.0) == 0
    assert shells.contact_resistance(0.0, 1.0) == 0


def test_loss_is_greatest_at_the_critical_radius() -> None:
    """Insulation of 0.055 W/(m K) on a tube of 5 mm radius, h = 5 W/(m2 K)."""
    conductivity, h, tube = 0.055, 5.0, 0.005
    critical = shells.critical_radius(conductivity, h)

    def total(radius: float) -> float:
        film = shells.convection_resistance(h, shells.cylinder_area(radius))
        return shells.cylinder_resistance(tube, radius, conductivity) + film

    assert total(critical) < min(total(0.98 * critical), total(1.02 * critical))


def test_contact_of_a_part_of_a_square_metre() -> None:
    """Cengel, Heat and Mass Transfer, Example 3-4: 11,000 W/(m2 K) is 0.909e-4 m2 K/W."""
    assert shells.contact_resistance(1 / 11_000, 1.0) == pytest.approx(0.909e-4, abs=0.0005e-4)
    assert shells.contact_resistance(1 / 11_000, 0.25) == pytest.approx(3.636e-4, abs=0.002e-4)
