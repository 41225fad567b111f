"""Drift angle, groove, least edge and edge catch, against geometry in the plane."""

import math

import pytest
from hypothesis import given
from hypothesis import strategies as st

from snowhold.grip import (
    clearance_angle_rad,
    edge_catch_rad,
    grip_margin,
    least_capacity,
    least_edge_rad,
    penetration_m,
)
from snowhold.sidecut import drift_angle_rad, groove_width_m
from snowhold.snow import SNOWS


@pytest.mark.parametrize(("own_m", "track_m"), [(5.0, 14.0), (4.0, 8.0), (8.0, 200.0)])
def test_drift_against_two_circles(own_m, track_m):
    """An edge on a circle of its own, touching a larger one at the waist: the angle between the
    two tangents at the edge's end, and the gap between the circles there. Plane geometry; the
    shallow forms are within the next order, (L/2R)²."""
    half = 0.6
    angle = math.asin(half / own_m) - math.asin(half / track_m)
    gap = (own_m - math.sqrt(own_m**2 - half**2)) - (track_m - math.sqrt(track_m**2 - half**2))
    tolerance = (half / own_m)**2
    assert drift_angle_rad(1.2, own_m, track_m) == pytest.approx(angle, rel=tolerance)
    assert groove_width_m(1.2, own_m, track_m) == pytest.approx(gap, rel=tolerance)


def test_the_own_arc_does_not_drift():
    assert drift_angle_rad(1.2, 6.0, 6.0) == groove_width_m(1.2, 6.0, 6.0) == 0


@given(st.floats(1, 75), st.floats(200, 2000), st.sampled_from(sorted(SNOWS)))
def test_least_edge_is_where_the_margin_is_reached(lean_deg, normal_n, snow):
    """Platform and snow evaluated at the least edge give 0.15, a little flatter less."""
    lean, kind = math.radians(lean_deg), SNOWS[snow]

    def margin(edge):
        capacity_n, _, _ = least_capacity(normal_n, edge, 80, 0.0, 1.2, 1000.0,
                                          kind.hardness_npm3.value, kind.shear_strength_pa.value)
        return grip_margin(capacity_n, normal_n * math.tan(lean))

    edge = least_edge_rad(lean, normal_n, 1.2, kind.hardness_npm3.value,
                          kind.shear_strength_pa.value, 0.15)
    assert margin(edge) == pytest.approx(0.15, abs=1e-9)
    assert margin(edge * 0.999) < 0.15


@pytest.mark.parametrize("snow", SNOWS.values(), ids=lambda s: s.code)
def test_edge_catch_lifts_the_leading_edge_just_clear(snow):
    """Geometry: at that tilt the far edge of a 250 mm board is as high as sinking plus bumps."""
    angle = edge_catch_rad(700, 1.2, 0.25, snow.hardness_npm3.value, snow.roughness_m)
    lift = 0.25 * math.sin(angle)
    assert lift == pytest.approx(
        penetration_m(700, 1.2, angle, snow.hardness_npm3.value) + snow.roughness_m, abs=1e-9)
    # 2 to 5° for a usual board on groomed snow: common practice, no source.
    if snow.code in ("1F", "P", "K", "I"):
        assert 2 <= math.degrees(angle) <= 5


def test_no_tilt_clears_bumps_higher_than_the_board_is_wide():
    assert math.isnan(edge_catch_rad(700, 1.2, 0.25, 0.1e9, 0.3))
    assert math.isnan(clearance_angle_rad(0.2, 0.15, 0.01))
