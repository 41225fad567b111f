"""Balance of forces, against mechanics done another way and against published statements."""

import math

import pytest
from hypothesis import given
from hypothesis import strategies as st

from snowhold.balance import (
    centre_force_n,
    lean_rad,
    load_g,
    normal_force_n,
    section_tilt_rad,
    track_acceleration_mps2,
)

PITCHES = st.floats(0, math.radians(50))
PHASES = st.floats(0, math.pi)


def lean(mass_kg, speed_mps, radius_m, pitch_rad, phase_rad):
    return lean_rad(centre_force_n(mass_kg, speed_mps, radius_m, pitch_rad, phase_rad),
                    normal_force_n(mass_kg, pitch_rad))


@given(PITCHES, PHASES, st.floats(1, 40), st.floats(2, 100))
def test_force_agrees_with_vectors_in_space(pitch_rad, phase_rad, speed_mps, radius_m):
    """Newton's second law written in three dimensions, without section formulas.

    Axes: x across the hill, y horizontal out of the hill, z up. The snow's force is m (a − g).
    """
    down = (0.0, math.cos(pitch_rad), -math.sin(pitch_rad))
    normal = (0.0, math.sin(pitch_rad), math.cos(pitch_rad))
    # Heading x at φ = 0 turning toward the fall line; the centre lies 90° further on.
    centre = [-math.sin(phase_rad) * (i == 0) + math.cos(phase_rad) * down[i] for i in range(3)]
    acceleration = [speed_mps**2 / radius_m * c for c in centre]
    snow_force = [acceleration[i] + 9.80665 * (i == 2) for i in range(3)]
    toward_centre = sum(f * c for f, c in zip(snow_force, centre, strict=True))
    perpendicular = sum(f * n for f, n in zip(snow_force, normal, strict=True))
    assert toward_centre == pytest.approx(
        centre_force_n(1, speed_mps, radius_m, pitch_rad, phase_rad), abs=1e-9)
    assert perpendicular == pytest.approx(normal_force_n(1, pitch_rad), abs=1e-9)
    n = load_g(lean(1, speed_mps, radius_m, pitch_rad, phase_rad), pitch_rad)
    assert n == pytest.approx(math.hypot(toward_centre, perpendicular) / 9.80665, rel=1e-9)


@given(PITCHES, PHASES, st.floats(0, 40), st.floats(2, 100), st.floats(15, 200))
def test_mass_cancels_from_lean(pitch_rad, phase_rad, speed_mps, radius_m, mass_kg):
    """J/F 2004: the ideal-carving equation holds no mass."""
    assert lean(mass_kg, speed_mps, radius_m, pitch_rad, phase_rad) == pytest.approx(
        lean(1, speed_mps, radius_m, pitch_rad, phase_rad), abs=1e-12)


@given(PITCHES)
def test_a_traverse_leans_by_the_pitch(pitch_rad):
    """Standing across the hill the rider is upright in space: mechanics of a plane."""
    assert lean(80, 0, 1, pitch_rad, math.pi) == pytest.approx(pitch_rad, abs=1e-12)


@given(PITCHES, st.floats(0.1, 40), st.floats(2, 100), st.floats(0, math.pi - 0.01))
def test_lean_grows_through_the_turn(pitch_rad, speed_mps, radius_m, phase_rad):
    """Gravity helps above the fall line and adds below it (J/F 2004)."""
    assert (lean(80, speed_mps, radius_m, pitch_rad, phase_rad)
            <= lean(80, speed_mps, radius_m, pitch_rad, phase_rad + 0.01) + 1e-12)


@given(PITCHES, PHASES, st.floats(0.1, 39), st.floats(2, 99))
def test_faster_leans_more_and_wider_less(pitch_rad, phase_rad, speed_mps, radius_m):
    base = lean(80, speed_mps, radius_m, pitch_rad, phase_rad)
    assert lean(80, speed_mps + 1, radius_m, pitch_rad, phase_rad) > base
    assert lean(80, speed_mps, radius_m + 1, pitch_rad, phase_rad) < base


def test_flat_turn_is_the_textbook_bank():
    """tan λ = v²/(g R): the banked curve of any mechanics textbook. v = 10, R = 10.1972 gives 45°.
    """
    assert math.degrees(lean(80, 10, 100 / 9.80665, 0, 1.0)) == pytest.approx(45, abs=1e-9)
    assert load_g(math.radians(60), 0) == pytest.approx(2)


def test_straight_glide_is_the_inclined_plane():
    """g (sin α − μ cos α), the inclined plane of any mechanics textbook: α = 30°, μ = 0.1."""
    acceleration = track_acceleration_mps2(0, math.radians(30), math.pi / 2,
                                           math.cos(math.radians(30)), 0.1, 0.0)
    assert acceleration == pytest.approx(9.80665 * (0.5 - 0.1 * math.sqrt(3) / 2))


@given(PITCHES, PHASES)
def test_section_tilt_is_where_gravity_points(pitch_rad, phase_rad):
    """Gravity projected into the plane of the radius and the snow's perpendicular, by vectors in
    space; the angle between it and the perpendicular is how the snow is tilted there."""
    down = (0.0, math.cos(pitch_rad), -math.sin(pitch_rad))
    normal = (0.0, math.sin(pitch_rad), math.cos(pitch_rad))
    centre = [-math.sin(phase_rad) * (i == 0) + math.cos(phase_rad) * down[i] for i in range(3)]
    gravity = (0.0, 0.0, -1.0)
    along = sum(g * c for g, c in zip(gravity, centre, strict=True))
    into = -sum(g * n for g, n in zip(gravity, normal, strict=True))
    assert section_tilt_rad(pitch_rad, phase_rad) == pytest.approx(-math.atan2(along, into),
                                                                   abs=1e-12)
    assert section_tilt_rad(pitch_rad, math.pi) == pytest.approx(pitch_rad)
