"""Windows as read: corrected emissivities, fills, sizes; all products are invented."""

from __future__ import annotations

from typing import Any

import pytest

from envcheck.read.windows import corrected_ratio
from tests.read.test_project import HEAD, read


@pytest.mark.parametrize(
    ("normal", "ratio"),
    [(0.01, 1.22), (0.03, 1.22), (0.04, 1.20), (0.10, 1.14), (0.89, 0.94), (0.95, 0.94)],
)
def test_corrected_emissivity_between_and_beyond_its_rows(normal: float, ratio: float) -> None:
    # EN 673:2011 (from memory): 0.03 has 1.22, 0.05 has 1.18, 0.89 has 0.94.
    assert corrected_ratio(normal) == pytest.approx(ratio)


def window(keys: str) -> Any:
    text = f"{HEAD}  W: {{kind: window, title: W, width: 1 m, height: 2 m, {keys}}}\n"
    return read(text).assemblies["W"].window


def test_a_single_light_takes_what_its_frame_leaves() -> None:
    found = window("frame_width: 10 cm, u_frame: 1 W/(m2*K), u_glass: 2 W/(m2*K), psi: 0 W/(m*K)")
    (light,) = found.lights
    assert (light.area, light.edge) == pytest.approx((0.8 * 1.8, 2 * (0.8 + 1.8)))
    assert found.u_glass == 2.0 and not found.opaque


def test_gas_and_emissivities_of_a_space() -> None:
    found = window(
        "frame_width: 10 cm, u_frame: 1 W/(m2*K), psi: 0 W/(m*K), glazing: {panes: [4 mm, 4 mm], "
        "gaps: [{thickness: 16 mm, gas: argon, share: 90 %, normal_emissivities: [0.89, 0.03]}]}"
    )
    (space,) = found.lights[0].infill.glazing.spaces
    assert (space.share, space.title) == (0.9, "90 % argon")
    assert space.emissivities == pytest.approx((0.89 * 0.94, 0.03 * 1.22))
    assert "argon rho 1.699" in space.source and "mixed linearly" in space.source
    assert found.u_glass is None


def test_a_frame_without_a_size_takes_the_rest() -> None:
    lights = "{title: L, count: 2, width: 40 cm, height: 1 m, u_glass: 2 W/(m2*K), psi: 0 W/(m*K)}"
    panel = "{title: P, area: 0.4 m2, edge_length: 2.6 m, u_panel: 1 W/(m2*K), psi: 0 W/(m*K)}"
    found = window(f"u_frame: 1.5 W/(m2*K), lights: [{lights}, {panel}]")
    assert [light.opaque for light in found.lights] == [False, True]
    assert found.opaque_area == pytest.approx(0.4)
    assert [(frame.area, frame.u) for frame in found.frames] == [(None, 1.5)]
