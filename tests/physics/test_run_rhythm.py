"""The rhythm of carved turns and its critical pitch, against the published range and trend, and
against whole runs from every start speed."""

import math

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from snowhold.phases import Turn
from snowhold.rhythm import Shape, critical_pitch_rad, end_of_turn, runs_away, steady_speed_mps
from snowhold.slide import Leg
from snowhold.track import Run, follow

G = 9.80665


def shape_of(sidecut=8.0, angulation_deg=0.0, start_deg=20.0, friction=0.04, drag=0.0032):
    return Shape(sidecut, math.radians(angulation_deg), math.radians(start_deg), friction, drag)


def critical_deg(**fields):
    return math.degrees(critical_pitch_rad(shape_of(**fields)))


def run_from(shape, pitch_rad, speed, turns=60):
    turn = Turn(0.0, speed, shape.sidecut_radius_m, shape.angulation_rad, 80, 1.2, 2.0, 1.2e8, 3e5,
                from_phase_rad=shape.from_phase_rad)
    return follow(Run(turn, (Leg(pitch_rad, math.inf),), turns, shape.glide_friction,
                      shape.drag_per_m))


@pytest.mark.parametrize("start_deg", [0, 20, 45])
def test_komissarov_range_and_trend(start_deg):
    """S. S. Komissarov, Modelling of carving turns in alpine skiing, arXiv 1812.02539 (2019), for
    balance without angulation: the critical pitch lies from 8 to 20°, is set mostly by snow
    friction and less by the sidecut radius."""
    found = {(friction, sidecut): critical_deg(friction=friction, sidecut=sidecut,
                                               start_deg=start_deg)
             for friction in (0.02, 0.03, 0.04) for sidecut in (8.0, 16.0)}
    assert all(8 < pitch < 20 for pitch in found.values())
    by_friction = [found[0.04, sidecut] - found[0.02, sidecut] for sidecut in (8.0, 16.0)]
    by_sidecut = [found[friction, 16.0] - found[friction, 8.0] for friction in (0.02, 0.03, 0.04)]
    assert min(by_sidecut) > 0
    # Both are doublings.
    assert min(by_friction) > 2 * max(by_sidecut)


def test_angulation_lowers_the_critical_pitch():
    """It tightens the carve and so lowers the fastest one (J/F 2004 with ε = λ + a)."""
    pitches = [critical_deg(angulation_deg=angulation) for angulation in (0, 2, 5, 10)]
    assert pitches == sorted(pitches, reverse=True)
    assert pitches[2] < 8


@pytest.mark.parametrize("fields", [
    {}, {"angulation_deg": 5}, {"start_deg": 0, "friction": 0.02}, {"start_deg": 45},
    {"sidecut": 14.0, "angulation_deg": 5, "friction": 0.1}])
def test_runs_survive_below_it_and_none_does_above(fields):
    """By whole runs with the run's own, finer steps: from some start speed 60 turns carve just
    below the critical pitch, from no start speed just above it."""
    shape = shape_of(**fields)
    critical, top = critical_pitch_rad(shape), math.sqrt(shape.sidecut_radius_m * G)
    below, above = critical - math.radians(0.2), critical + math.radians(0.2)
    steady = steady_speed_mps(shape, below)
    assert run_from(shape, below, steady).end == "turns_done"
    for i in range(1, 60):
        assert run_from(shape, above, top * i / 60, turns=200).end in ("too_fast", "too_slow")


@pytest.mark.parametrize("angulation_deg", [0, 5])
def test_runs_settle_at_the_steady_speed(angulation_deg):
    """From faster and from slower, 60 turns end within 0.5 % of the fixed point of the turn."""
    shape = shape_of(angulation_deg=angulation_deg)
    pitch = 0.8 * critical_pitch_rad(shape)
    steady = steady_speed_mps(shape, pitch)
    for start in (0.95 * steady, 1.01 * steady):
        track = run_from(shape, pitch, start)
        assert track.end == "turns_done"
        assert math.sqrt(track.spots[-1].squared_speed) == pytest.approx(steady, rel=5e-3)


def test_the_coarse_turn_is_the_fine_turn():
    shape = shape_of(angulation_deg=5)
    for speed in (4.0, 5.0, 6.0):
        fine = run_from(shape, math.radians(6), speed, turns=1)
        coarse, end = end_of_turn(shape, math.radians(6), speed)
        assert end is None
        assert coarse == pytest.approx(math.sqrt(fine.spots[-1].squared_speed), rel=1e-4)


def test_flat_ground():
    """Without losses any pitch at all speeds up; with them the flat only slows down."""
    assert critical_deg(friction=0.0, drag=0.0) == pytest.approx(0, abs=0.02)
    assert steady_speed_mps(shape_of(), 0.0) is None
    assert not runs_away(shape_of(), 0.0)


def test_a_parachute_carves_everywhere():
    assert critical_pitch_rad(shape_of(sidecut=30.0, start_deg=60, drag=0.06)) is None


@settings(deadline=None, max_examples=8)
@given(st.floats(4, 25), st.floats(0, 20), st.floats(0, 60), st.floats(0, 0.12),
       st.floats(0, 0.01))
def test_what_runs_away_does_so_on_anything_steeper(sidecut, angulation, start, friction, drag):
    """A scan over pitches: none below the critical pitch runs away, all above do."""
    shape = shape_of(sidecut, angulation, start, friction, drag)
    critical = critical_pitch_rad(shape)
    for pitch_deg in range(1, 50, 4):
        pitch = math.radians(pitch_deg)
        if critical is None or abs(pitch - critical) > math.radians(0.1):
            assert runs_away(shape, pitch) == (critical is not None and pitch > critical)
