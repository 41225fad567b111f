"""The slide, against SciPy's solution of its equation, energy, and the forms of friction alone."""

import math

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st
from scipy.integrate import quad, solve_ivp
from scipy.optimize import brentq

from snowhold.slide import (
    CLOTHING_FRICTION,
    Leg,
    acceleration_mps2,
    halt_m,
    slide,
    speed_after_mps,
    speeds_up_above_rad,
    time_s,
)

G = 9.80665

FRICTIONS = st.floats(0.05, 1)
DRAGS = st.floats(0, 0.02) | st.sampled_from([0.0, 1e-300, 1e-15, 1e-9])
SPEEDS = st.floats(0, 60)


def legs_of(pitches_and_lengths):
    return [Leg(math.radians(pitch), length) for pitch, length in pitches_and_lengths]


PROFILES = st.lists(st.tuples(st.floats(-20, 50), st.floats(0.1, 500)), min_size=1,
                    max_size=6).map(legs_of)


def solved(pitch_rad, length_m, friction, drag, speed_mps):
    """Speed, distance and time at the leg's end or the halt, by numbers alone."""
    def slope(_, y):
        return [y[1], G * (math.sin(pitch_rad) - friction * math.cos(pitch_rad))
                - drag * y[1]**2]

    def at_the_end(_, y):
        return y[0] - length_m

    def at_the_halt(_, y):
        return y[1]

    at_the_end.terminal = at_the_halt.terminal = True
    at_the_halt.direction = -1
    way = solve_ivp(slope, (0, 1e6), [0.0, speed_mps], method="DOP853", rtol=1e-12, atol=1e-12,
                    events=(at_the_end, at_the_halt), dense_output=True)
    assert way.status == 1
    if way.y[0, -1] > length_m:
        # One step went past the end and to the halt behind it.
        end_s = brentq(lambda t: way.sol(t)[0] - length_m, 0, way.t[-1], xtol=1e-14)
        return way.sol(end_s)[1], length_m, end_s
    return way.y[1, -1], way.y[0, -1], way.t[-1]


@settings(max_examples=150, deadline=None)
@given(st.floats(-20, 50), st.floats(1, 1000), st.floats(0.1, 0.6), st.floats(0, 0.02),
       st.floats(0.5, 60))
def test_solve_ivp_to_1e_8(pitch_deg, length_m, friction, drag, speed_mps):
    """The closed forms of speed, halt and time against SciPy's solve_ivp."""
    pitch_rad = math.radians(pitch_deg)
    speed, distance, duration = solved(pitch_rad, length_m, friction, drag, speed_mps)
    way = slide([Leg(pitch_rad, length_m)], friction, drag, speed_mps)
    assert way.distance_m == pytest.approx(distance, rel=1e-8, abs=1e-8)
    # Close to a halt v falls as the root of the distance left: hold v² there, which does not.
    assert way.end_speed_mps**2 == pytest.approx(speed**2, rel=1e-8, abs=1e-8)
    if speed > 0.1 or way.stops:
        assert way.end_speed_mps == pytest.approx(speed, rel=1e-8, abs=1e-8)
        assert way.time_s == pytest.approx(duration, rel=1e-8, abs=1e-8)


@settings(deadline=None)
@given(st.floats(11, 50), st.floats(1, 1000), st.floats(0, 0.02))
def test_solve_ivp_from_rest(pitch_deg, length_m, drag):
    pitch_rad = math.radians(pitch_deg)
    speed, _, duration = solved(pitch_rad, length_m, 0.19, drag, 0.0)
    way = slide([Leg(pitch_rad, length_m)], 0.19, drag, 0.0)
    assert way.end_speed_mps == pytest.approx(speed, rel=1e-8)
    assert way.time_s == pytest.approx(duration, rel=1e-8)


def test_solve_ivp_over_three_legs():
    legs = legs_of([(30, 80), (12, 60), (-5, 200)])
    speed, total, duration = 5.0, 0.0, 0.0
    for leg in legs:
        speed, distance, time = solved(leg.pitch_rad, leg.length_m, 0.3, 0.004, speed)
        total, duration = total + distance, duration + time
    way = slide(legs, 0.3, 0.004, 5.0)
    assert way.stops and not way.slides_back and speed == pytest.approx(0, abs=1e-8)
    assert way.distance_m == pytest.approx(total, rel=1e-8)
    assert way.time_s == pytest.approx(duration, rel=1e-8)


@given(st.floats(-20, 50), st.floats(0.1, 5000), FRICTIONS, st.floats(0.001, 60))
def test_friction_alone(pitch_deg, length_m, friction, speed_mps):
    """Without drag: v² = v₀² + 2 a s, halt after v₀²/(2|a|), time 2 s/(v + v₀) (any textbook)."""
    a = G * (math.sin(math.radians(pitch_deg)) - friction * math.cos(math.radians(pitch_deg)))
    way = slide([Leg(math.radians(pitch_deg), length_m)], friction, 0.0, speed_mps)
    if a < 0 and speed_mps**2 / (-2 * a) <= length_m:
        assert way.stops
        assert way.distance_m == pytest.approx(speed_mps**2 / (-2 * a))
        assert way.time_s == pytest.approx(speed_mps / -a)
    else:
        assert not way.stops
        assert way.end_speed_mps**2 == pytest.approx(speed_mps**2 + 2 * a * length_m,
                                                     rel=1e-9, abs=1e-9 * speed_mps**2)
        assert way.time_s == pytest.approx(2 * length_m / (speed_mps + way.end_speed_mps))


@given(PROFILES, FRICTIONS, st.floats(0.01, 60))
def test_zero_drag_is_the_limit(legs, friction, speed_mps):
    """As drag goes to 0 every figure goes to that of no drag, and ever closer."""
    plain = slide(legs, friction, 0.0, speed_mps)
    fast = plain.top_speed_mps**2
    last = math.inf
    for drag in (1e-4, 1e-6, 1e-8, 1e-12, 1e-15, 1e-300, 5e-324):
        way = slide(legs, friction, drag, speed_mps)
        # Drag takes at most 2 k v² a metre from v²; one that halts on the way ends elsewhere.
        lost = plain.end_speed_mps**2 - way.end_speed_mps**2
        assert lost >= -1e-9 * fast
        if way.stops == plain.stops:
            assert lost <= 2 * drag * fast * plain.distance_m + 1e-9 * fast
        assert way.distance_m <= plain.distance_m + 1e-9 * plain.distance_m
        gap = abs(plain.distance_m - way.distance_m)
        assert gap <= last + 1e-9 * plain.distance_m
        last = gap
    assert way.distance_m == pytest.approx(plain.distance_m, rel=1e-12)
    assert way.time_s == pytest.approx(plain.time_s, rel=1e-6)


def test_speeds_up_from_published_friction():
    """Nachbauer et al. 2016, Lubricants 4:7: clothing on snow 0.19 to 0.48; a slide speeds up
    above 10.8° in the slickest and 25.6° in the roughest fabric."""
    assert CLOTHING_FRICTION["slick"] == 0.19
    assert CLOTHING_FRICTION["rough"] == 0.48
    assert round(math.degrees(speeds_up_above_rad(0.19)), 1) == 10.8
    assert round(math.degrees(speeds_up_above_rad(0.48)), 1) == 25.6
    for friction, pitch_deg in ((0.19, 10.75), (0.48, 25.64)):
        assert acceleration_mps2(math.radians(pitch_deg - 0.05), friction) < 0
        assert acceleration_mps2(math.radians(pitch_deg + 0.05), friction) > 0


@settings(deadline=None, max_examples=60)
@given(PROFILES, st.floats(0.05, 0.6), st.floats(0, 0.02), st.floats(0.1, 60))
def test_energy_closes(legs, friction, drag, speed_mps):
    """Loss of potential and kinetic energy = work of friction + work of drag, the last by SciPy's
    quadrature over the speed along the way; all a kilogram."""
    way = slide(legs, friction, drag, speed_mps)
    lost = (speed_mps**2 - way.end_speed_mps**2) / 2
    friction_work = drag_work = 0.0
    for leg, passage in zip(legs, way.passages, strict=True):
        if passage is None:
            continue
        lost += G * passage.distance_m * math.sin(leg.pitch_rad)
        friction_work += friction * G * math.cos(leg.pitch_rad) * passage.distance_m
        drag_work += quad(lambda s, p=passage: drag * speed_after_mps(
            p.speed_in_mps, p.acceleration_mps2, drag, s)**2, 0, passage.distance_m,
            epsabs=1e-10, epsrel=1e-10, limit=200)[0]
    scale = way.top_speed_mps**2 + abs(lost) + friction_work
    assert lost == pytest.approx(friction_work + drag_work, abs=1e-8 * scale)


@given(PROFILES, FRICTIONS, DRAGS, SPEEDS, st.data())
def test_steeper_is_never_slower(legs, friction, drag, speed_mps, data):
    index = data.draw(st.integers(0, len(legs) - 1))
    steeper = list(legs)
    more_rad = data.draw(st.floats(0, math.radians(50) - legs[index].pitch_rad))
    steeper[index] = Leg(legs[index].pitch_rad + more_rad, legs[index].length_m)
    before, after = (slide(one, friction, drag, speed_mps) for one in (legs, steeper))
    assert after.distance_m >= before.distance_m * (1 - 1e-12) - 1e-12
    for old, new in zip(before.passages, after.passages, strict=True):
        if old is not None and not old.stops:
            assert new is not None
            assert new.speed_out_mps**2 >= old.speed_out_mps**2 - 1e-10 * (
                1 + before.top_speed_mps**2)


@given(PROFILES, FRICTIONS, DRAGS, SPEEDS, st.floats(0, 500))
def test_longer_never_stops_sooner(legs, friction, drag, speed_mps, more_m):
    """A longer last leg, and a longer leg on which the slide speeds up."""
    before = slide(legs, friction, drag, speed_mps)
    longer = [*legs[:-1], Leg(legs[-1].pitch_rad, legs[-1].length_m + more_m)]
    assert slide(longer, friction, drag, speed_mps).distance_m >= before.distance_m
    for index, passage in enumerate(before.passages):
        if passage is not None and passage.speed_out_mps > passage.speed_in_mps:
            longer = [Leg(leg.pitch_rad, leg.length_m + (more_m if at == index else 0))
                      for at, leg in enumerate(legs)]
            after = slide(longer, friction, drag, speed_mps)
            assert after.distance_m >= before.distance_m * (1 - 1e-12)


@given(PROFILES, FRICTIONS, FRICTIONS, DRAGS, DRAGS, SPEEDS)
def test_more_friction_or_drag_is_never_faster(legs, one, other, drag_one, drag_other, speed_mps):
    """What makes the two corners of a band its ends."""
    slow = slide(legs, max(one, other), max(drag_one, drag_other), speed_mps)
    fast = slide(legs, min(one, other), min(drag_one, drag_other), speed_mps)
    assert slow.distance_m <= fast.distance_m * (1 + 1e-12) + 1e-12
    assert slow.end_speed_mps**2 <= fast.end_speed_mps**2 + 1e-10 * (1 + fast.top_speed_mps**2)
    if fast.stops:
        assert slow.stops or slow.end_speed_mps < 1e-3


@given(PROFILES, FRICTIONS, DRAGS, SPEEDS, st.floats(0, 0.999))
def test_a_slide_goes_on_as_if_it_began_where_it_is(legs, friction, drag, speed_mps, share):
    """Cut anywhere, the rest of a slide is a slide that begins there at the speed it has there."""
    whole = slide(legs, friction, drag, speed_mps)
    cut_m = share * whole.distance_m
    here_mps = whole.speed_mps(cut_m)
    assert here_mps is not None
    rest = slide(legs, friction, drag, here_mps, cut_m)
    assert cut_m + rest.distance_m == pytest.approx(whole.distance_m, rel=1e-6, abs=1e-6)
    assert rest.end_speed_mps**2 == pytest.approx(
        whole.end_speed_mps**2, abs=1e-6 * (1 + whole.top_speed_mps**2))


def test_cannot_stop_where_gravity_wins():
    assert halt_m(0.0, acceleration_mps2(math.radians(20), 0.3), 0.0) == math.inf
    assert halt_m(30.0, acceleration_mps2(math.radians(20), 0.3), 0.01) == math.inf


def test_at_rest_stays_where_friction_holds():
    way = slide(legs_of([(10, 100), (40, 100)]), 0.3, 0.005, 0.0)
    assert (way.stops, way.distance_m, way.time_s, way.slides_back) == (True, 0.0, 0.0, False)


def test_gravity_equal_to_friction_keeps_the_speed():
    """tan α = μ without drag: no force, so no change (Newton's first law); with drag it slows as
    e^(−ks) and never halts."""
    assert acceleration_mps2(0.0, 0.0) == 0.0
    way = slide([Leg(0.0, 100.0)], 0.0, 0.0, 7.0)
    assert (way.end_speed_mps, way.stops) == (7.0, False)
    assert way.time_s == pytest.approx(100 / 7)
    way = slide([Leg(0.0, 100.0)], 0.0, 0.01, 7.0)
    assert way.end_speed_mps == pytest.approx(7 * math.exp(-1))
    # dv/dt = −k v²: t = (1/v − 1/v₀)/k.
    assert way.time_s == pytest.approx((math.exp(1) - 1) / (7 * 0.01))


def test_balance_of_gravity_and_drag():
    """At v = √(a/k) nothing changes; from either side a long slide tends there (textbook)."""
    a = acceleration_mps2(math.radians(35), 0.3)
    balance_mps = math.sqrt(a / 0.005)
    leg = [Leg(math.radians(35), 4000.0)]
    steady = slide(leg, 0.3, 0.005, balance_mps)
    assert steady.end_speed_mps == pytest.approx(balance_mps)
    assert steady.time_s == pytest.approx(4000 / balance_mps)
    for start in (0.0, 2 * balance_mps):
        assert slide(leg, 0.3, 0.005, start).end_speed_mps == pytest.approx(balance_mps)


@given(st.floats(1e-6, 3), st.floats(1e-6, 0.02), st.floats(0.01, 60), st.floats(0.1, 5000))
def test_time_in_both_of_its_forms(acceleration, drag, speed_mps, distance_m):
    """Bounds that need no formula, and the halves of a way add up; near the balance of gravity
    and drag the other form takes over."""
    out = speed_after_mps(speed_mps, acceleration, drag, distance_m)
    got = time_s(speed_mps, out, acceleration, drag, distance_m)
    # The time lies between those at its slowest and its fastest speed, which is monotone.
    assert distance_m / max(speed_mps, out) * (1 - 1e-9) <= got
    assert got <= distance_m / min(speed_mps, out) * (1 + 1e-9)
    half = speed_after_mps(speed_mps, acceleration, drag, distance_m / 2)
    assert got == pytest.approx(time_s(speed_mps, half, acceleration, drag, distance_m / 2)
                                + time_s(half, out, acceleration, drag, distance_m / 2), rel=1e-9)


def test_starts_on_the_leg_below_a_break():
    legs = legs_of([(5, 50), (30, 50), (0, 300)])
    way = slide(legs, 0.4, 0.0, 4.0, 50.0)
    assert way.passages[0] is None
    assert way.passages[1].start_m == 50
    assert way.speed_mps(49.9) is None
    assert way.speed_mps(50.0) == 4.0
    halt = way.passages[2].start_m + way.passages[2].distance_m
    assert way.speed_mps(halt) == 0.0
    assert way.speed_mps(halt + 0.1) is None


def test_slides_back_from_a_steep_rise():
    """A rise steeper than atan μ does not hold a body that has come to a halt on it."""
    legs = legs_of([(20, 50), (-15, 200)])
    assert slide(legs, 0.2, 0.0, 10.0).slides_back
    assert not slide(legs, 0.3, 0.0, 10.0).slides_back
