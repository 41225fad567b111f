"""The track of a run: turn after turn, speed and place by integration over the phase.

Each turn runs from φ₀ to 180° − φ₀; the next is its mirror image. With w = v², R the radius of
the arc and n the load of balance [1],

    dw/dφ = 2 R dv/dt,  ds/dφ = R,  dx/dφ = ± R cos φ,  dy/dφ = R sin φ,  dt/dφ = R/v,

x across the hill, y down the fall line in the plane of the snow, s along the track. In w nothing
is singular where the rider stops. Fourth-order Runge-Kutta steps [2], 5° or shorter. The edge
change between two turns takes no time and no energy (assumed), and the lean of balance is there
at once: what a rider really does in it is not modelled. At a break of the profile the speed
carries over unchanged (assumed), as in :mod:`snowhold.slide`.

On a given line the friction is that of gliding as well: a drifting board is slowed more than
that, so speeds on a line are upper bounds.

References
----------
[1] U. D. Jentschura and F. Fahrbach, Physics of Skiing: The Ideal-Carving Equation and Its
    Applications, Can. J. Phys. 82 (2004) 249-261, arXiv physics/0310086.
[2] E. Hairer, S. P. Nørsett, G. Wanner, Solving Ordinary Differential Equations I (1993): the
    classical method of order 4.
"""

from __future__ import annotations

from dataclasses import dataclass
from math import cos, degrees, inf, pi, radians, sin, sqrt
from typing import NamedTuple

from snowhold.balance import (
    centre_force_n,
    lean_rad,
    load_g,
    normal_force_n,
    track_acceleration_mps2,
)
from snowhold.carve import LEAST_LEAN_RAD, balanced_lean
from snowhold.constants import G0_MPS2
from snowhold.phases import Turn, ridden_phases_deg
from snowhold.sidecut import carved_radius_m
from snowhold.slide import Leg

_HALT_RAD, _HALT_SHARE = 1e-3, 1e-3
"""Phase before a halt from which the deceleration is taken as even, if no more than this share of
the v² of the start is left. Assumed."""

_BREAK_M = 1e-9
"""How closely the break of a profile is hit."""


@dataclass(frozen=True)
class Steps:
    """How finely to integrate. The defaults are assumed: halved, they change less than 0.1 %.

    ``widest_rad``: widest step. ``change``: most of v² that may change in one. ``decay``: most of
    one step against the phase in which air drag alone takes v² to 1/e. ``least_rad``: where even
    a step this short meets no balance, the balance is lost.
    """

    widest_rad: float = radians(5)
    change: float = 0.25
    decay: float = 0.5
    least_rad: float = 1e-6


_STEPS = Steps()


@dataclass(frozen=True)
class Run:
    """What a run is made of.

    ``turn`` gives board, rider, snow, line, the start speed and the first phase of each turn; its
    own pitch is not used. ``legs`` run down the fall line (``inf`` long: without end).
    ``drag_per_m`` is ρ C_dA/(2 m), 1/m.
    """

    turn: Turn
    legs: tuple[Leg, ...]
    turns: int
    glide_friction: float
    drag_per_m: float


class Spot(NamedTuple):
    """A place on the track. Works are those done since the start, in J per kg of rider."""

    turn_index: int
    phase_rad: float
    leg_index: int
    squared_speed: float
    x_m: float
    y_m: float
    height_m: float
    distance_m: float
    time_s: float
    friction_jpkg: float
    drag_jpkg: float


class Rates(NamedTuple):
    """What changes with the phase at a spot, each per radian."""

    squared_speed: float
    radius_m: float
    time_s: float
    friction_jpkg: float
    drag_jpkg: float


@dataclass(frozen=True)
class Track:
    """A run from its start to its end.

    ``end`` is turns_done, profile_ends, stops, or the state in which there is no balance:
    too_slow or too_fast, then at the last spot. Two spots share a place where a turn ends and
    the next begins.
    """

    spots: list[Spot]
    end: str


def rates(run: Run, pitch_rad: float, phase_rad: float, squared_speed: float) -> Rates | str:
    """Rates of change in balance; where there is none, the state that says why."""
    if squared_speed <= 0:
        return "stops"
    turn, speed_mps = run.turn, sqrt(squared_speed)
    if turn.line_radius_m is None:
        lean, too_slow, too_fast = balanced_lean(speed_mps, turn.sidecut_radius_m, pitch_rad,
                                                 phase_rad, turn.angulation_rad)
        if too_fast:
            return "too_fast"
        if too_slow:
            return "too_slow"
        radius_m = carved_radius_m(turn.sidecut_radius_m, lean + turn.angulation_rad)
    else:
        radius_m = turn.line_radius_m
        lean = lean_rad(centre_force_n(1.0, speed_mps, radius_m, pitch_rad, phase_rad),
                        normal_force_n(1.0, pitch_rad))
        if lean <= LEAST_LEAN_RAD:
            return "too_slow"
    load = load_g(lean, pitch_rad)
    gain_mps2 = track_acceleration_mps2(speed_mps, pitch_rad, phase_rad, load,
                                        run.glide_friction, run.drag_per_m)
    return Rates(2 * radius_m * gain_mps2, radius_m, radius_m / speed_mps,
                 run.glide_friction * G0_MPS2 * load * radius_m,
                 run.drag_per_m * squared_speed * radius_m)


def follow(run: Run, steps: Steps = _STEPS) -> Track:
    """The whole run, one spot at each phase of :func:`snowhold.phases.ridden_phases_deg`, at each
    break of the profile and at the end."""
    first_rad = run.turn.from_phase_rad
    spot = start_spot(run)
    spots, end = [spot], None
    phases_deg = ridden_phases_deg(degrees(first_rad))[1:-1]
    stations_rad = [*map(radians, phases_deg), pi - first_rad]
    for turn_index in range(run.turns):
        if turn_index > 0:
            spot = spots[-1]._replace(turn_index=turn_index, phase_rad=first_rad)
            spots.append(spot)
        turn_spots, end = ride_turn(run, spot, stations_rad, steps)
        # Where the turn does not even begin, its one spot is there already.
        spots += turn_spots[1:] if turn_spots[0] == spot else turn_spots
        if end is not None:
            break
    # A rider who stands at the start cannot begin a turn.
    if end == "stops" and len(spots) == 1:
        end = "too_slow"
    return Track(spots, end or "turns_done")


def start_spot(run: Run) -> Spot:
    """The spot at which a run starts."""
    return Spot(0, run.turn.from_phase_rad, 0, run.turn.speed_mps**2, *[0.0] * 7)


def ride_turn(run: Run, spot: Spot, stations_rad: list[float],
              steps: Steps = _STEPS) -> tuple[list[Spot], str | None]:
    """From a spot on through the given later phases of the same turn: ``(spots, end)``.

    One spot a station, and one at each break of the profile, there on the next leg. ``end`` is as
    in :class:`Track`, None where the last station was reached; the last spot is where it ends,
    which may be the given one.
    """
    spots: list[Spot] = []
    leg, leg_end_m, start = _on_leg(run, spot)
    longest_rad = inf
    for station_rad in stations_rad:
        while spot.phase_rad < station_rad:
            if isinstance(start, str):
                return (spots if spots and spots[-1] == spot else [*spots, spot]), start
            step_rad = min(longest_rad, _longest_step_rad(run, spot, start, steps))
            # What is left may be a hair more than the last step.
            if last := spot.phase_rad + step_rad * (1 + 1e-9) >= station_rad:
                step_rad = station_rad - spot.phase_rad
            made = _step(run, leg, spot, start, step_rad)
            if isinstance(made, str):
                if step_rad <= steps.least_rad:
                    return [*spots, spot], made
                longest_rad = step_rad / 2
                continue
            longest_rad = 2 * step_rad
            reached, reached_rates = made
            if reached.y_m >= leg_end_m:
                spot = _at_break(run, leg, spot, start, step_rad, leg_end_m)
                if spot.leg_index + 1 == len(run.legs):
                    return [*spots, spot], "profile_ends"
                spot = spot._replace(leg_index=spot.leg_index + 1)
                leg, leg_end_m, start = _on_leg(run, spot)
                if spot.phase_rad < station_rad:
                    spots.append(spot)
            elif reached.squared_speed <= 0:
                return [*spots, reached], "stops"
            else:
                spot = reached._replace(phase_rad=station_rad) if last else reached
                start = reached_rates
        spots.append(spot)
    return spots, None


def _on_leg(run: Run, spot: Spot) -> tuple[Leg, float, Rates | str]:
    """A spot's leg, where that ends down the fall line, m, and the rates at the spot."""
    leg = run.legs[spot.leg_index]
    leg_end_m = sum(each.length_m for each in run.legs[:spot.leg_index + 1])
    return leg, leg_end_m, rates(run, leg.pitch_rad, spot.phase_rad, spot.squared_speed)


def _longest_step_rad(run: Run, spot: Spot, start: Rates, steps: Steps) -> float:
    """Longest step that keeps its accuracy, whatever the inputs."""
    longest_rad = steps.widest_rad
    if _halts_soon(run, spot, start):
        return longest_rad
    if start.squared_speed != 0:
        longest_rad = min(longest_rad,
                          steps.change * spot.squared_speed / abs(start.squared_speed))
    decay = 2 * run.drag_per_m * start.radius_m
    return min(longest_rad, steps.decay / decay) if decay > 0 else longest_rad


def _halts_soon(run: Run, spot: Spot, start: Rates) -> bool:
    """Whether the rider, slowing on like this, is about to stop."""
    little: float = run.turn.speed_mps**2 * _HALT_SHARE
    return spot.squared_speed <= min(-start.squared_speed * _HALT_RAD, little)


def _step(run: Run, leg: Leg, spot: Spot, start: Rates,
          step_rad: float) -> tuple[Spot, Rates] | str:
    """One step: the spot that it reaches and the rates there, or why it reaches none."""
    if _halts_soon(run, spot, start):
        return _towards_halt(run, leg, spot, start, step_rad)
    pitch_rad, squared, half_rad = leg.pitch_rad, spot.squared_speed, step_rad / 2
    middle_rad, end_rad = spot.phase_rad + half_rad, spot.phase_rad + step_rad
    second = rates(run, pitch_rad, middle_rad, squared + half_rad * start.squared_speed)
    if isinstance(second, str):
        return second
    third = rates(run, pitch_rad, middle_rad, squared + half_rad * second.squared_speed)
    if isinstance(third, str):
        return third
    fourth = rates(run, pitch_rad, end_rad, squared + step_rad * third.squared_speed)
    if isinstance(fourth, str):
        return fourth
    squared += step_rad / 6 * (start.squared_speed + 2 * second.squared_speed
                               + 2 * third.squared_speed + fourth.squared_speed)
    end = rates(run, pitch_rad, end_rad, squared)
    if isinstance(end, str):
        return end
    sixth, middle_m = step_rad / 6, 2 * (second.radius_m + third.radius_m)
    side = 1 - 2 * (spot.turn_index % 2)
    # The works take Simpson's rule with the end that was reached and, for the drag, v² half-way on
    # the cubic through both ends: with the weights of the step itself the energy would balance
    # however wrong the step is.
    middle_squared = ((spot.squared_speed + squared) / 2
                      + step_rad / 8 * (start.squared_speed - end.squared_speed))
    down_m = sixth * (start.radius_m * sin(spot.phase_rad) + middle_m * sin(middle_rad)
                      + fourth.radius_m * sin(end_rad))
    reached = Spot(
        spot.turn_index, end_rad, spot.leg_index, squared,
        spot.x_m + side * sixth * (start.radius_m * cos(spot.phase_rad)
                                   + middle_m * cos(middle_rad)
                                   + fourth.radius_m * cos(end_rad)),
        spot.y_m + down_m,
        spot.height_m - down_m * sin(pitch_rad),
        spot.distance_m + sixth * (start.radius_m + middle_m + fourth.radius_m),
        spot.time_s + sixth * (start.time_s + 2 * (second.time_s + third.time_s) + fourth.time_s),
        spot.friction_jpkg + sixth * (start.friction_jpkg + end.friction_jpkg
                                      + 2 * (second.friction_jpkg + third.friction_jpkg)),
        spot.drag_jpkg + sixth * (start.drag_jpkg + end.drag_jpkg
                                  + middle_m * run.drag_per_m * middle_squared))
    return reached, end


def _towards_halt(run: Run, leg: Leg, spot: Spot, start: Rates,
                  step_rad: float) -> tuple[Spot, Rates] | str:
    """The last bit before a halt at even deceleration, or as much of it as the step takes; or why
    balance is lost before it."""
    halt_rad = spot.squared_speed / -start.squared_speed
    halts = halt_rad <= step_rad
    way_rad = halt_rad if halts else step_rad
    squared = 0.0 if halts else spot.squared_speed + way_rad * start.squared_speed
    way_m, middle_rad = start.radius_m * way_rad, spot.phase_rad + way_rad / 2
    side = 1 - 2 * (spot.turn_index % 2)
    down_m = way_m * sin(middle_rad)
    reached = Spot(
        spot.turn_index, spot.phase_rad + way_rad, spot.leg_index, squared,
        spot.x_m + side * way_m * cos(middle_rad),
        spot.y_m + down_m,
        spot.height_m - down_m * sin(leg.pitch_rad),
        spot.distance_m + way_m,
        spot.time_s + 2 * way_m / (sqrt(spot.squared_speed) + sqrt(squared)),
        spot.friction_jpkg + start.friction_jpkg * way_rad,
        spot.drag_jpkg + start.drag_jpkg * way_rad / 2)
    # A halt is looked at just before it: at rest there is no carve to ask about.
    end = rates(run, leg.pitch_rad, reached.phase_rad, max(squared, 0.1 * spot.squared_speed))
    return end if isinstance(end, str) else (reached, end)


def _at_break(run: Run, leg: Leg, spot: Spot, start: Rates, step_rad: float,
              leg_end_m: float) -> Spot:
    """The spot at which a step that passes a leg's end is on it, by bisection and false position
    in turn; y only grows with the step."""
    short_rad, long_rad = 0.0, step_rad
    short_m, long_m = spot.y_m, inf
    reached = spot
    for count in range(100):
        share = 0.5
        if count % 2 and long_m < inf:
            share = (leg_end_m - short_m) / (long_m - short_m)
        tried_rad = short_rad + (long_rad - short_rad) * share
        made = _step(run, leg, spot, start, tried_rad)
        if isinstance(made, str):
            long_rad = tried_rad
            continue
        reached = made[0]
        if abs(reached.y_m - leg_end_m) <= _BREAK_M:
            break
        if reached.y_m < leg_end_m:
            short_rad, short_m = tried_rad, reached.y_m
        else:
            long_rad, long_m = tried_rad, reached.y_m
    return reached._replace(y_m=leg_end_m)
