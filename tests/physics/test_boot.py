"""Boot drag. Outside checks: plane geometry drawn point by point, SciPy's root finder."""

import math

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st
from scipy.optimize import brentq

from snowhold.boot import drag_angle_rad, feet, most_overhang_m, reach_m
from snowhold.grip import penetration_m

PRESSURE = (780.0, 1.2, 1.2e8)
BOOT = {"sole_length_m": 0.30, "sole_width_m": 0.0, "front_angle_deg": 15.0, "rear_angle_deg": -6.0,
        "front_toeward_m": 0.0, "rear_toeward_m": 0.0, "toe_height_m": 0.05,
        "heel_height_m": 0.045}


def test_without_sinking_it_is_the_angle_of_height_over_overhang():
    assert drag_angle_rad(0.02, 0.05) == pytest.approx(math.atan(0.05 / 0.02))


def test_an_end_that_does_not_stand_out_never_drags():
    assert drag_angle_rad(0.0, 0.05, PRESSURE) is None
    assert drag_angle_rad(-0.01, 0.05) is None


@settings(deadline=None)
@given(overhang_m=st.floats(0.001, 0.1), height_m=st.floats(0.01, 0.15),
       normal_n=st.floats(100, 2000), hardness=st.floats(4e7, 9e10))
def test_the_toe_touches_at_the_edges_depth(overhang_m, height_m, normal_n, hardness):
    """Turn the corner (−overhang, height) about the edge by ε and let SciPy find where it meets the
    surface, e above the edge."""
    def corner_over_snow_m(edge_rad):
        lifted = np.array([math.sin(edge_rad), math.cos(edge_rad)]) @ [-overhang_m, height_m]
        return lifted - penetration_m(normal_n, 1.2, edge_rad, hardness)

    expected = brentq(corner_over_snow_m, 0, math.pi / 2 - 1e-9, xtol=1e-13)
    assert drag_angle_rad(overhang_m, height_m, (normal_n, 1.2, hardness)) == pytest.approx(
        expected, abs=1e-9)


def test_sinking_brings_the_boot_down_and_hard_snow_does_not():
    dry = drag_angle_rad(0.02, 0.05)
    soft = drag_angle_rad(0.02, 0.05, (780.0, 1.2, 4e7))
    hard = drag_angle_rad(0.02, 0.05, (780.0, 1.2, 1e15))
    assert soft < drag_angle_rad(0.02, 0.05, PRESSURE) < dry
    assert hard == pytest.approx(dry, abs=1e-4)


def test_reach_of_points_and_of_round_ends():
    """Points on the middle line: B cos ψ/2. Round ends: the widest of 3600 outline points."""
    assert reach_m(0.3, math.radians(20)) == pytest.approx(0.15 * math.cos(math.radians(20)))
    turn_rad = np.linspace(0, 2 * math.pi, 3601)
    end_m = (0.3 - 0.1) / 2 * math.cos(math.radians(20))
    assert reach_m(0.3, math.radians(20), 0.1) == pytest.approx(
        (end_m + 0.05 * np.cos(turn_rad)).max(), abs=1e-9)


def test_overhang_of_both_feet_and_both_ends():
    """o = (B cos ψ − W)/2, shifted by the off-centring."""
    boots = feet(BOOT | {"front_toeward_m": 0.004}, (0.262, 0.26), (-0.26, 0.26), PRESSURE, 0.25,
                 math.radians(50))
    front = (0.30 * math.cos(math.radians(15)) - 0.26) / 2
    rear = (0.30 * math.cos(math.radians(6)) - 0.262) / 2
    assert boots["front"]["toe"]["overhang_m"] == pytest.approx(front + 0.004)
    assert boots["front"]["heel"]["overhang_m"] == pytest.approx(front - 0.004)
    assert boots["rear"]["toe"]["overhang_m"] == pytest.approx(rear)
    assert boots["rear"]["heel"]["overhang_m"] == pytest.approx(rear)


@pytest.mark.parametrize("target_deg", [40.0, 55.0, 65.0])
def test_the_waist_that_clears_it_puts_the_worst_drag_at_the_target(target_deg):
    target_rad = math.radians(target_deg)
    boots = feet(BOOT, (0.262, 0.26), (-0.26, 0.26), PRESSURE, 0.25, target_rad)
    wider_m = boots["clear_waist_m"] - 0.25
    again = feet(BOOT, (0.262 + wider_m, 0.26 + wider_m), (-0.26, 0.26), PRESSURE, 0.25 + wider_m,
                 target_rad)
    angles = [again[foot][end]["drag_angle_deg"] for foot in ("rear", "front")
              for end in ("toe", "heel")]
    assert min(angle for angle in angles if angle is not None) == pytest.approx(target_deg)
    assert boots["clears"] == (wider_m <= 0)


def test_where_every_overhang_sinks_in_none_is_allowed():
    soft = (2000.0, 0.5, 4e7)
    assert most_overhang_m(0.02, math.radians(80), soft) == 0
    boots = feet(BOOT, (0.262, 0.26), (-0.26, 0.26), soft, 0.25, math.radians(80))
    assert boots["clear_waist_m"] == pytest.approx(
        0.25 + 0.30 * math.cos(math.radians(6)) - 0.262)


def test_the_drawn_sole_reaches_as_far_as_the_computed_one():
    boots = feet(BOOT | {"sole_width_m": 0.1, "front_toeward_m": 0.005}, (0.262, 0.26),
                 (-0.26, 0.26), PRESSURE, 0.25, math.radians(50))
    for foot in ("rear", "front"):
        y_m = boots[foot]["outline"]["y_m"]
        half_m = boots[foot]["insert_width_m"] / 2
        assert max(y_m) == pytest.approx(half_m + boots[foot]["toe"]["overhang_m"], abs=5e-4)
        assert -min(y_m) == pytest.approx(half_m + boots[foot]["heel"]["overhang_m"], abs=5e-4)
    x_m, y_m = (boots["front"]["outline"][key] for key in ("x_m", "y_m"))
    assert np.mean(x_m) == pytest.approx(0.26, abs=1e-6)
    # The front toes point to the nose.
    assert x_m[int(np.argmax(y_m))] > 0.26
