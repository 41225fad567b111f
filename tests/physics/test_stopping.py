"""Stopping, against SciPy's solution of the motion and the energy that braking takes away."""

import math

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st
from scipy.integrate import solve_ivp

from snowhold.slide import Leg
from snowhold.stopping import (
    BRAKING_FRICTION,
    REACTION_TIME_S,
    cannot_stop_above_rad,
    speed_within_mps,
    speed_within_on_mps,
    stopping_distance_m,
    stopping_distance_on_m,
)

G = 9.80665

GRIPS = st.floats(0.05, 1)
REACTIONS = st.floats(0, 5)
SPEEDS = st.floats(0.01, 60)


def legs_of(pitches_and_lengths):
    return [Leg(math.radians(pitch), length) for pitch, length in pitches_and_lengths]


PROFILES = st.lists(st.tuples(st.floats(-20, 50), st.floats(0.1, 300)), min_size=1,
                    max_size=5).map(legs_of)


def braked_m(legs, speed_mps, grip, place_m):
    """Where the braking ends, by numbers alone, leg by leg; the last leg goes on."""
    end_m = 0.0
    for index, leg in enumerate(legs):
        end_m = end_m + leg.length_m if index < len(legs) - 1 else 1e9
        if end_m <= place_m:
            continue
        a = G * (math.sin(leg.pitch_rad) - grip * math.cos(leg.pitch_rad))

        def at_the_end(_, y, end_m=end_m):
            return y[0] - end_m

        def at_the_halt(_, y):
            return y[1]

        at_the_end.terminal = at_the_halt.terminal = True
        at_the_halt.direction = -1
        way = solve_ivp(lambda _, y, a=a: [y[1], a], (0, 1e6), [place_m, speed_mps],
                        rtol=1e-11, atol=1e-11, events=(at_the_end, at_the_halt))
        place_m, speed_mps = way.y[:, -1]
        if way.t_events[1].size:
            return place_m
    return math.inf


@settings(deadline=None)
@given(st.floats(-20, 40), st.floats(0.5, 60), st.floats(0.2, 0.9), st.floats(0, 2))
def test_energy_form_agrees_with_solve_ivp(pitch_deg, speed_mps, grip, reaction_s):
    got = stopping_distance_m(speed_mps, math.radians(pitch_deg), grip, reaction_s)
    if not math.isfinite(got):
        assert math.tan(math.radians(pitch_deg)) >= grip
    elif got < 1e6:
        start_m = speed_mps * reaction_s
        assert got == pytest.approx(
            braked_m(legs_of([(pitch_deg, 1.0)]), speed_mps, grip, start_m), rel=1e-8)


def test_profile_agrees_with_solve_ivp():
    """Braking begins in the middle of a leg, passes a leg too steep to brake on, and stops."""
    legs = legs_of([(10, 40), (25, 30), (12, 80), (-4, 50)])
    for speed in (8.0, 15.0, 25.0):
        start = 5 + speed * 0.5
        assert start < 40
        assert 5 + stopping_distance_on_m(legs, speed, 0.35, 0.5, 5.0) == pytest.approx(
            braked_m(legs, speed, 0.35, start), rel=1e-8)


@given(st.floats(-20, 50), st.floats(0.1, 100), SPEEDS, GRIPS, REACTIONS)
def test_a_profile_of_one_pitch_is_an_even_slope(pitch_deg, length_m, speed, grip, reaction_s):
    even = stopping_distance_m(speed, math.radians(pitch_deg), grip, reaction_s)
    for legs in ([(pitch_deg, length_m)], [(pitch_deg, length_m)] * 4):
        assert stopping_distance_on_m(legs_of(legs), speed, grip, reaction_s, length_m / 2
                                      ) == pytest.approx(even, rel=1e-9)


@given(PROFILES, SPEEDS, SPEEDS, GRIPS, GRIPS, REACTIONS, REACTIONS, st.floats(0, 0.99))
def test_faster_later_or_weaker_never_stops_sooner(legs, v1, v2, grip1, grip2, t1, t2, share):
    """What makes the corners of a band its ends, and the search for a speed right."""
    start_m = share * sum(leg.length_m for leg in legs)
    best = stopping_distance_on_m(legs, min(v1, v2), max(grip1, grip2), min(t1, t2), start_m)
    worst = stopping_distance_on_m(legs, max(v1, v2), min(grip1, grip2), max(t1, t2), start_m)
    assert best <= worst * (1 + 1e-9) + 1e-9


def test_a_longer_reaction_never_stops_sooner_on_too_steep_a_leg():
    """Energy by hand: down 30 m at 40°, with no braking that holds, then 0.35 g on the level."""
    legs = legs_of([(40, 30), (0, 500)])
    gained = G * (math.sin(math.radians(40)) - 0.35 * math.cos(math.radians(40))) * 30
    level_m = (5**2 / 2 + gained) / (0.35 * G)
    for reaction_s in (0.0, 2.0, 6.0):
        assert stopping_distance_on_m(legs, 5.0, 0.35, reaction_s) == pytest.approx(30 + level_m)


@given(st.floats(-20, 50), st.floats(0.5, 5000), GRIPS, REACTIONS)
def test_speed_within_sight_stops_within_sight(pitch_deg, sight_m, grip, reaction_s):
    """The closed form is the inverse of the distance, and the search over a profile finds it."""
    pitch_rad = math.radians(pitch_deg)
    speed = speed_within_mps(sight_m, pitch_rad, grip, reaction_s)
    found = speed_within_on_mps(legs_of([(pitch_deg, 7.0)]), sight_m, grip, reaction_s, 3.0)
    if speed is None:
        assert math.tan(pitch_rad) >= grip * (1 - 1e-12)
        assert found is None
    elif grip - math.tan(pitch_rad) > 1e-6:
        assert stopping_distance_m(speed, pitch_rad, grip, reaction_s) == pytest.approx(sight_m)
        assert found == pytest.approx(speed, rel=1e-9)


@settings(deadline=None)
@given(PROFILES, st.floats(0.5, 500), GRIPS, REACTIONS, st.floats(0, 0.99))
def test_speed_within_sight_on_a_profile(legs, sight_m, grip, reaction_s, share):
    start_m = share * sum(leg.length_m for leg in legs)
    speed = speed_within_on_mps(legs, sight_m, grip, reaction_s, start_m)
    if speed is None:
        assert stopping_distance_on_m(legs, 0.01, grip, reaction_s, start_m) > sight_m
    else:
        assert stopping_distance_on_m(legs, speed, grip, reaction_s, start_m) <= sight_m
        assert stopping_distance_on_m(legs, speed * (1 + 1e-9), grip, reaction_s, start_m
                                      ) > sight_m


def test_cannot_stop_from_atan_grip_up():
    """Where gravity along the slope is all the grip there is, nothing is left to brake with."""
    assert math.degrees(cannot_stop_above_rad(1.0)) == pytest.approx(45)
    for grip in (BRAKING_FRICTION.low, BRAKING_FRICTION.value, BRAKING_FRICTION.high):
        limit = cannot_stop_above_rad(grip)
        assert stopping_distance_m(10, limit + 1e-9, grip, 1.0) == math.inf
        assert stopping_distance_m(10, limit - 1e-9, grip, 1.0) < math.inf


def test_level_ground_by_hand():
    """v²/(2 μ g) on the level (any textbook): 10 m/s, 0.5 → 10.197 m, and 10 m for 1 s."""
    assert stopping_distance_m(10, 0.0, 0.5, 1.0) == pytest.approx(20.19716, abs=1e-5)


def test_standing_needs_no_distance():
    assert stopping_distance_m(0, 0.7, 0.2, 1.5) == 0
    assert stopping_distance_on_m(legs_of([(45, 10)]), 0, 0.2, 1.5) == 0


def test_assumed_ranges():
    """Assumed, no source: pinned so that a change is seen."""
    assert (BRAKING_FRICTION.low, BRAKING_FRICTION.value, BRAKING_FRICTION.high) == (0.2, 0.35,
                                                                                    0.5)
    assert (REACTION_TIME_S.low, REACTION_TIME_S.value, REACTION_TIME_S.high) == (0.5, 1.0, 1.5)
