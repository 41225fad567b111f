"""How far it takes to stop: reaction at full speed, then braking on the edges.

The braking distance d follows from energy, v² = 2 g d (μ_b cos α − sin α); before it the rider
travels v t_r. Air drag, which would help, is left out.

Symbols: α pitch, downhill positive; μ_b braking grip; t_r reaction time. The mechanics is
standard; the figures for μ_b and t_r are assumed.
"""

from __future__ import annotations

from math import atan, inf, sqrt

from snowhold.constants import G0_MPS2
from snowhold.slide import Leg, acceleration_mps2
from snowhold.snow import Span

BRAKING_FRICTION = Span(0.35, 0.2, 0.5)
"""Braking grip μ_b of a board set across the slope on its edge. Assumed."""

REACTION_TIME_S = Span(1.0, 0.5, 1.5)
"""Reaction time t_r, s. Assumed."""


def cannot_stop_above_rad(braking_friction: float) -> float:
    """Pitch from which braking does not stop a rider at all, atan μ_b, rad."""
    return atan(braking_friction)


def stopping_distance_m(speed_mps: float, pitch_rad: float, braking_friction: float,
                        reaction_time_s: float) -> float:
    """Distance to a stop on an even slope, m; ``inf`` where braking does not stop the rider.

    v t_r + v²/(2 g (μ_b cos α − sin α)); none where μ_b ≤ tan α. 0 for a rider who stands.
    """
    if speed_mps == 0:
        return 0.0
    braking_mps2 = -acceleration_mps2(pitch_rad, braking_friction)
    if braking_mps2 <= 0:
        return inf
    return speed_mps * reaction_time_s + speed_mps**2 / (2 * braking_mps2)


def speed_within_mps(distance_m: float, pitch_rad: float, braking_friction: float,
                     reaction_time_s: float) -> float | None:
    """Fastest speed that stops within a distance on an even slope, m/s; None: none does.

    The positive root of :func:`stopping_distance_m`'s quadratic.
    """
    braking_mps2 = -acceleration_mps2(pitch_rad, braking_friction)
    if braking_mps2 <= 0:
        return None
    # Divided through by the root's conjugate, which loses no digits where t_r is long.
    return 2 * distance_m / (reaction_time_s
                             + sqrt(reaction_time_s**2 + 2 * distance_m / braking_mps2))


def stopping_distance_on_m(legs: list[Leg], speed_mps: float, braking_friction: float,
                           reaction_time_s: float, start_m: float = 0.0) -> float:
    """Distance to a stop along a profile, from ``start_m`` on it, m; ``inf``: no stop.

    Past the profile's end its last leg is taken to go on. ``start_m`` is before that end. On an
    even slope this is :func:`stopping_distance_m`. Where a leg is too steep for the braking to
    hold the speed, the slope adds to it during the reaction too: otherwise a longer reaction
    could stop sooner.
    """
    if speed_mps == 0:
        return 0.0
    reaction_end_m = start_m + speed_mps * reaction_time_s
    squared, leg_end_m = speed_mps**2, 0.0
    for number, leg in enumerate(legs, start=1):
        from_m, leg_end_m = max(leg_end_m, start_m), leg_end_m + leg.length_m
        to_m = inf if number == len(legs) else leg_end_m
        if to_m <= from_m:
            continue
        acceleration = acceleration_mps2(leg.pitch_rad, braking_friction)
        brake_from_m = min(max(reaction_end_m, from_m), to_m)
        squared += 2 * max(acceleration, 0.0) * (brake_from_m - from_m)
        if acceleration < 0:
            braking_m = squared / (-2 * acceleration)
            if braking_m <= to_m - brake_from_m:
                return brake_from_m + braking_m - start_m
        elif to_m == inf:
            return inf
        squared += 2 * acceleration * (to_m - brake_from_m)
    return inf


def speed_within_on_mps(legs: list[Leg], distance_m: float, braking_friction: float,
                        reaction_time_s: float, start_m: float = 0.0) -> float | None:
    """Fastest speed that stops within a distance along a profile, m/s; None: none does.

    Found by halving: the faster, the farther, and on one even leg this is
    :func:`speed_within_mps`. Relative error below 1e-12.
    """
    def stops_within(speed_mps: float) -> bool:
        return stopping_distance_on_m(legs, speed_mps, braking_friction, reaction_time_s,
                                      start_m) <= distance_m

    # No slope in which braking is all grip takes more than this away.
    too_fast = 1.001 * sqrt(2 * G0_MPS2 * distance_m * sqrt(1 + braking_friction**2))
    slow = 1e-9 * too_fast
    if not stops_within(slow):
        return None
    while too_fast - slow > 1e-13 * too_fast:
        speed_mps = (slow + too_fast) / 2
        if stops_within(speed_mps):
            slow = speed_mps
        else:
            too_fast = speed_mps
    return slow
