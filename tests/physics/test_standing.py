"""Standing and side-slipping, against balance in a traverse and forces added up as vectors."""

import math

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st
from scipy.optimize import brentq

from snowhold.balance import centre_force_n, lean_rad, normal_force_n
from snowhold.grip import LIMITS
from snowhold.snow import SNOWS
from snowhold.standing import (
    Stance,
    sideslip_below_rad,
    standing_edge_angle_rad,
    standing_grip,
    steepest_stand_rad,
)

G = 9.80665
KINDS = st.sampled_from(sorted(SNOWS))
PITCHES = st.floats(0.1, 50)


def stance(mass_kg=80.0, edge_m=1.2, angulation_deg=5.0, load_g=2.0, drag_deg=None):
    return Stance(mass_kg, edge_m, math.radians(angulation_deg), load_g,
                  None if drag_deg is None else math.radians(drag_deg))


def grip(rider, pitch_deg, snow):
    kind = SNOWS[snow]
    return standing_grip(rider, math.radians(pitch_deg), kind.hardness_npm3.value,
                         kind.shear_strength_pa.value)


def stands_to_deg(rider, snow, margin=0.0):
    kind = SNOWS[snow]
    limit = steepest_stand_rad(rider, kind.hardness_npm3.value, kind.shear_strength_pa.value,
                               margin)
    return None if limit is None else math.degrees(limit)


@given(PITCHES)
def test_traverse_leans_by_the_pitch(pitch_deg):
    """Jentschura and Fahrbach 2004: at R → ∞ across the hill the lean of balance is the pitch."""
    pitch = math.radians(pitch_deg)
    lean = lean_rad(centre_force_n(80, 5, 1e300, pitch, math.pi), normal_force_n(80, pitch))
    assert standing_edge_angle_rad(pitch) == pytest.approx(lean)
    assert standing_edge_angle_rad(-pitch) == pytest.approx(lean)


@given(PITCHES, KINDS, st.floats(15, 200), st.floats(0.5, 2), st.floats(0, 30))
def test_margin_from_forces_written_out(pitch_deg, snow, mass_kg, edge_m, angulation_deg):
    """The least of platform (common practice, no source) and snow (Mössner 2013), here by hand."""
    rider = stance(mass_kg, edge_m, angulation_deg)
    margin, limit = grip(rider, pitch_deg, snow)
    kind = SNOWS[snow]
    pitch, tilt = math.radians(pitch_deg), math.radians(pitch_deg + angulation_deg)
    platform = math.tan(tilt) / math.tan(pitch)
    depth = math.sqrt(2 * mass_kg * G * math.cos(pitch) * math.tan(tilt)
                      / (edge_m * kind.hardness_npm3.value))
    sheared = kind.shear_strength_pa.value * edge_m * depth / (mass_kg * G * math.sin(pitch))
    legs = math.sqrt(2.0**2 - math.cos(pitch)**2) / math.sin(pitch)
    assert margin == pytest.approx(min(platform, sheared, legs) - 1, abs=1e-9)
    assert limit in LIMITS


@given(PITCHES, KINDS)
def test_without_angulation_the_platform_is_exactly_on_its_limit(pitch_deg, snow):
    margin, limit = grip(stance(angulation_deg=0), pitch_deg, snow)
    assert margin <= 1e-12
    if limit == "platform":
        assert margin >= 0


@pytest.mark.parametrize("snow", sorted(SNOWS))
def test_pitch_that_washes_out_by_scipy(snow):
    """SciPy finds the pitch at which the snow's shear force is what standing needs."""
    kind = SNOWS[snow]

    def spare(pitch):
        depth = math.sqrt(2 * 80 * G * math.cos(pitch) * math.tan(pitch + math.radians(5))
                          / (1.2 * kind.hardness_npm3.value))
        return kind.shear_strength_pa.value * 1.2 * depth - 80 * G * math.sin(pitch)

    got = stands_to_deg(stance(), snow)
    if spare(math.radians(50)) > 0:
        assert got is None
    else:
        assert got == pytest.approx(math.degrees(brentq(spare, 0.01, math.radians(50),
                                                        xtol=1e-12)), abs=1e-6)


def test_harder_ice_washes_out_on_flatter_ground():
    """On ice an edge stands on some 20°, on soft groomed snow on more than anyone rides: common
    practice, no source."""
    assert 15 < stands_to_deg(stance(), "I") < 25
    assert stands_to_deg(stance(), "1F") is None
    assert stands_to_deg(stance(), "P") is None
    assert stands_to_deg(stance(), "F") < stands_to_deg(stance(), "4F")


@given(KINDS, st.floats(15, 190), st.floats(0, 10))
def test_heavier_never_stands_steeper(snow, mass_kg, more_kg):
    """Depth grows as the root of the weight, so that weight outgrows the snow's hold on it."""
    light, heavy = (stands_to_deg(stance(mass), snow) for mass in (mass_kg, mass_kg + more_kg))
    assert (90 if heavy is None else heavy) <= (90 if light is None else light) + 1e-6


def test_margin_asked_for_is_met_where_it_ends():
    limit_deg = stands_to_deg(stance(), "I", margin=0.15)
    assert grip(stance(), limit_deg, "I")[0] == pytest.approx(0.15, abs=1e-6)


def test_a_dragging_boot_holds_nothing():
    assert grip(stance(drag_deg=20), 20, "P") == (-1.0, "boot")
    assert stands_to_deg(stance(drag_deg=20), "P") == pytest.approx(15, abs=1e-6)
    assert stands_to_deg(stance(angulation_deg=25, drag_deg=20), "P") == pytest.approx(0, abs=1e-6)


@pytest.mark.parametrize("pitch_deg", [0.0, 5e-324, 1e-300, 1e-9])
def test_level_ground_asks_for_nothing(pitch_deg):
    assert grip(stance(), pitch_deg, "I") == (math.inf, None)


@given(st.floats(0, 50), st.floats(0.03, 0.15), st.floats(-5, 5))
def test_sideslip_from_vectors(pitch_deg, friction, off_deg):
    """A block on a plane at α − ε to the horizontal slips where its weight's part along the plane
    outgrows friction (Coulomb): the base is that plane. Uphill the edge holds it."""
    below = sideslip_below_rad(math.radians(pitch_deg), friction)
    edge = below + math.radians(off_deg)
    tilt = math.radians(pitch_deg) - edge
    weight = np.array([0.0, -1.0])
    along = weight @ np.array([math.cos(tilt), -math.sin(tilt)])
    across = abs(weight @ np.array([math.sin(tilt), math.cos(tilt)]))
    if abs(off_deg) > 1e-6:
        assert (along > friction * across) == (off_deg < 0)
