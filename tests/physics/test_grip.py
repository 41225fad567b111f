"""The four limits, against the platform rule, published ranges and integrals done by SciPy."""

import math

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st
from scipy.integrate import quad

from snowhold.balance import centre_force_n, normal_force_n
from snowhold.grip import (
    LIMITS,
    clearance_angle_rad,
    grip_margin,
    least_capacity,
    limit_lean_rad,
    penetration_m,
    platform_capacity_n,
    rider_capacity_n,
    snow_capacity_n,
    state,
)
from snowhold.snow import SNOWS


def margin(lean_deg, edge_deg, snow="P", mass_kg=80, load_g=2.0, drag_deg=None):
    normal_n = normal_force_n(mass_kg, 0.0)
    kind = SNOWS[snow]
    capacity_n, index, _ = least_capacity(
        normal_n, math.radians(edge_deg), mass_kg, 0.0, 1.2, load_g, kind.hardness_npm3.value,
        kind.shear_strength_pa.value, None if drag_deg is None else math.radians(drag_deg))
    return grip_margin(capacity_n, normal_n * math.tan(math.radians(lean_deg))), LIMITS[index]


def test_platform_rule_worked_case():
    """A rider 68.5° above the snow on a board tilted 30° holds, since 68.5 ≥ 90 − 30.

    Common practice, no source.
    """
    got, _ = margin(90 - 68.5, 30)
    assert state(got) == "holds"
    assert margin(90 - 59.9, 30)[0] < 0


@given(st.floats(1, 89))
def test_no_angulation_is_exactly_on_the_platform_limit(lean_deg):
    """J/F 2004: an ideal carve has its resultant perpendicular to the base."""
    normal_n = normal_force_n(80, 0.0)
    needed_n = normal_n * math.tan(math.radians(lean_deg))
    assert platform_capacity_n(normal_n, math.radians(lean_deg)) == pytest.approx(needed_n)


@given(st.floats(5, 80), st.floats(300, 2000), st.sampled_from(sorted(SNOWS)))
def test_penetration_carries_the_weight(edge_deg, normal_n, snow):
    """Mössner 2013: force is displaced volume times hardness. SciPy integrates the wedge that the
    base cuts out of the snow; the edge sinks until that carries N."""
    hardness = SNOWS[snow].hardness_npm3.value
    edge = math.radians(edge_deg)
    depth_m = penetration_m(normal_n, 1.2, edge, hardness)
    area_m2, _ = quad(lambda z: z / math.tan(edge), 0, depth_m, epsabs=1e-16)
    assert hardness * area_m2 * 1.2 == pytest.approx(normal_n, rel=1e-9)


def test_snow_shears_at_depth_times_length_times_strength():
    """Mössner 2013, by hand: 5 mm, 1.2 m, 0.3 N/mm² is 5 · 1200 · 0.3 = 1800 N."""
    assert snow_capacity_n(0.005, 1.2, 0.3e6) == pytest.approx(1800)


def test_rider_limit_is_the_load_factor():
    """At the limit √(F² + N²) = n_max m g: Pythagoras."""
    pitch = math.radians(20)
    force_n = rider_capacity_n(80, pitch, 2.0)
    assert math.hypot(force_n, normal_force_n(80, pitch)) == pytest.approx(2 * 80 * 9.80665)


def test_boot_past_its_drag_angle_carries_nothing():
    assert margin(30, 46, drag_deg=45) == (-1, "boot")
    assert margin(30, 45, drag_deg=45)[1] != "boot"


def test_a_base_past_upright_carries_nothing():
    assert margin(60, 90.001, load_g=5) == (-1, "platform")


@pytest.mark.parametrize(("snow", "lean_deg"), [("1F", 55), ("P", 55), ("K", 45), ("4F", 40),
                                                ("I", 20), ("F", 10)])
def test_snow_classes_hold_to_the_lean_of_practice(snow, lean_deg):
    """An 80 kg rider on 1.2 m of edge, 5° of angulation, strong legs. Common practice, no source.

    "About" is taken as within 5° for all but the two classes where 55° is a lower bound.
    """
    leans = np.arange(1, 84, 0.25)
    held = [lean for lean in leans if margin(lean, lean + 5, snow, load_g=5)[0] >= 0]
    first_gone = next((lean for lean in leans if lean not in held), 84)
    if lean_deg == 55:
        assert first_gone >= 55
    else:
        assert first_gone == pytest.approx(lean_deg, abs=5)


@pytest.mark.parametrize("snow", SNOWS.values(), ids=lambda s: s.code)
def test_snow_stays_inside_the_published_ranges(snow):
    """Mössner 2013: H_V 0.04-90 N/mm³, S_f 0.04-0.50 N/mm² (upper from memory). Wolfsperger 2021:
    glide 0.026 to 0.143."""
    assert 0.04e9 <= snow.hardness_npm3.low <= snow.hardness_npm3.value
    assert snow.hardness_npm3.value <= snow.hardness_npm3.high <= 90e9
    assert 0.04e6 <= snow.shear_strength_pa.low <= snow.shear_strength_pa.value
    assert snow.shear_strength_pa.value <= snow.shear_strength_pa.high <= 0.50e6
    assert 0.026 <= snow.glide_friction.low <= snow.glide_friction.value
    assert snow.glide_friction.value <= snow.glide_friction.high <= 0.143


def test_snow_classes_are_the_hand_hardness_test():
    """Fierz et al. 2009: fist, four fingers, one finger, pencil, knife, ice."""
    assert list(SNOWS) == ["F", "4F", "1F", "P", "K", "I"]
    hardness = [snow.hardness_npm3.value for snow in SNOWS.values()]
    assert hardness == sorted(hardness)


@given(st.floats(1, 60), st.sampled_from(sorted(SNOWS)), st.floats(15, 190))
def test_heavier_never_gains_margin(lean_deg, snow, mass_kg):
    """Depth grows with the root of the load, the needed force with the load itself."""
    assert (margin(lean_deg, lean_deg + 5, snow, mass_kg + 10)[0]
            <= margin(lean_deg, lean_deg + 5, snow, mass_kg)[0] + 1e-12)


@pytest.mark.parametrize(("lean_deg", "word"), [(0.15, "holds"), (0.149999, "marginal"),
                                                (0.0, "marginal"), (-1e-9, "washes_out")])
def test_states_at_their_thresholds(lean_deg, word):
    """The thresholds 0.15 and 0 are the product's own (assumed)."""
    assert state(lean_deg) == word


def test_clearance_of_a_usual_board():
    """Trigonometry: 250 mm wide, 10 mm of roughness and no sinking is asin(0.04) = 2.29°; with
    11 mm of sinking 4.8°, the upper end of the 2-5° stated for a usual board."""
    assert math.degrees(clearance_angle_rad(0.0, 0.25, 0.010)) == pytest.approx(2.292, abs=0.001)
    assert math.degrees(clearance_angle_rad(0.011, 0.25, 0.010)) == pytest.approx(4.818, abs=0.001)
    assert math.isnan(clearance_angle_rad(0.3, 0.25, 0.010))


def test_needed_force_and_capacity_share_one_balance():
    """The margin of a turn is the same from the forces as from the angles."""
    pitch, phase = math.radians(12), 2.0
    needed_n = centre_force_n(80, 7, 9, pitch, phase)
    normal_n = normal_force_n(80, pitch)
    edge = math.atan2(needed_n, normal_n) + math.radians(5)
    assert grip_margin(platform_capacity_n(normal_n, edge), needed_n) == pytest.approx(
        math.tan(edge) / (needed_n / normal_n) - 1)


@given(st.floats(1, 70), st.floats(0, 15), st.sampled_from(sorted(SNOWS)))
def test_at_the_limit_lean_the_margin_is_used_up(lean_deg, angulation_deg, snow):
    """The same edge, leant on until it gives: the four limits evaluated there leave nothing."""
    got, _ = margin(lean_deg, lean_deg + angulation_deg, snow)
    limit_deg = math.degrees(limit_lean_rad(math.radians(lean_deg), got))
    assert margin(limit_deg, lean_deg + angulation_deg, snow)[0] == pytest.approx(0, abs=1e-9)
