"""A body that slides down a profile after a fall.

On each leg dv/dt = a − k v² with a = g (sin α − μ cos α) and k = ρ C_dA/(2m): v² follows a linear
equation in distance, so that every figure has a closed form. All of them keep their digits as k
goes to 0, where they become the forms of friction alone.

Symbols: α pitch, downhill positive; μ friction of clothing on snow; w = v².

The speed carries over a break of the profile unchanged (assumed): a real break is rounded, a
sharp hollow takes some of it, and over a sharp roll the body may fly for a while.

References
----------
[1] W. Nachbauer et al., Kinetic Friction of Sport Fabrics on Snow, Lubricants 4 (2016) 7:
    friction of clothing on snow from 0.19 to 0.48.
The equations are standard mechanics.
"""

from __future__ import annotations

from dataclasses import dataclass
from math import atan, atanh, cos, exp, expm1, inf, log, log1p, sin, sqrt, tan

from snowhold.constants import G0_MPS2

CLOTHING_FRICTION = {"slick": 0.19, "middle": 0.335, "rough": 0.48}
"""Friction of clothing on snow: the slickest and the roughest fabric of [1], and half-way."""


@dataclass(frozen=True)
class Leg:
    """A stretch of even slope: ``length_m`` along it, ``pitch_rad`` negative where it rises."""

    pitch_rad: float
    length_m: float


@dataclass(frozen=True)
class Passage:
    """A body's way over one leg: from ``start_m`` along the profile, ``distance_m`` far.

    ``stops``: it halts on this leg, ``distance_m`` after it came in.
    """

    start_m: float
    distance_m: float
    speed_in_mps: float
    speed_out_mps: float
    acceleration_mps2: float
    time_s: float
    stops: bool


@dataclass(frozen=True)
class Slide:
    """A body's way over a profile, from its fall to its halt or the profile's end.

    ``passages`` has one entry a leg, None where the body never was. ``distance_m`` is the
    distance slid. ``slides_back``: it halts on a rise too steep to lie on.
    """

    passages: tuple[Passage | None, ...]
    start_m: float
    distance_m: float
    end_speed_mps: float
    top_speed_mps: float
    time_s: float
    stops: bool
    slides_back: bool
    drag_per_m: float

    def speed_mps(self, place_m: float) -> float | None:
        """Speed at a place along the profile, m/s; None where the body never was."""
        for passage in self.passages:
            if passage is None:
                continue
            slid_m = place_m - passage.start_m
            # The end itself, not computed anew: there a halt is exactly 0.
            if slid_m == passage.distance_m or place_m == passage.start_m + passage.distance_m:
                return passage.speed_out_mps
            if 0 <= slid_m < passage.distance_m:
                return speed_after_mps(passage.speed_in_mps, passage.acceleration_mps2,
                                       self.drag_per_m, slid_m)
        return None


def speeds_up_above_rad(friction: float) -> float:
    """Pitch above which a slow slide speeds up, atan μ, rad."""
    return atan(friction)


def acceleration_mps2(pitch_rad: float, friction: float) -> float:
    """Acceleration down the slope before air drag, a = g (sin α − μ cos α), m/s²."""
    return G0_MPS2 * (sin(pitch_rad) - friction * cos(pitch_rad))


def speed_after_mps(speed_mps: float, acceleration_mps2: float, drag_per_m: float,
                    distance_m: float) -> float:
    """Speed after a distance on one leg, m/s, for a body that gets that far.

    w = w₀ e^(−2ks) + 2 a s (1 − e^(−2ks))/(2ks): v² is exponential in distance.
    """
    decay = 2 * drag_per_m * distance_m
    squared = (speed_mps**2 * exp(-decay)
               + 2 * acceleration_mps2 * distance_m * _fraction(decay))
    # Rounding alone can take it below 0, right at a halt.
    return sqrt(max(squared, 0.0))


def halt_m(speed_mps: float, acceleration_mps2: float, drag_per_m: float) -> float:
    """Distance to the halt on an endless leg, m; ``inf`` where the body does not stop.

    s = ln(1 + k w₀/|a|)/(2k) for a < 0, which is w₀/(2|a|) without drag. A body at rest stays
    where a ≤ 0. Without drag one with a = 0 keeps its speed.
    """
    if speed_mps == 0 and acceleration_mps2 <= 0:
        return 0.0
    if acceleration_mps2 >= 0:
        return inf
    without_drag_m = speed_mps**2 / (-2 * acceleration_mps2)
    growth = 2 * drag_per_m * without_drag_m
    # A quotient of the two would be 0/0 without drag.
    return without_drag_m * (log1p(growth) / growth if growth else 1.0)


def time_s(speed_in_mps: float, speed_out_mps: float, acceleration_mps2: float,
           drag_per_m: float, distance_m: float) -> float:
    """Time to slide a distance, s, given the speeds at both of its ends (not both 0).

    ``inf`` where the speed is too small for a float to hold.

    With q = √(k|a|) and u = 2s (1 − e^(−2ks))/(2ks)/(v + v₀ e^(−2ks)), t = atanh(qu)/q where
    gravity wins (a > 0), atan(qu)/q where friction does, and u itself without drag.
    """
    if speed_out_mps == 0:
        # To the halt; in this form nothing is lost where the distance is long. A body that has
        # only drag against it never quite halts.
        if acceleration_mps2 >= 0:
            return inf
        return _arc(speed_in_mps / -acceleration_mps2, acceleration_mps2, drag_per_m)
    decay = 2 * drag_per_m * distance_m
    plain_s = (2 * distance_m * _fraction(decay)
               / (speed_out_mps + speed_in_mps * exp(-decay)))
    rate = sqrt(drag_per_m * abs(acceleration_mps2))
    if acceleration_mps2 > 0 and rate * plain_s > 0.9:
        # atanh has a pole at 1, the speed at which drag and gravity balance: the same in
        # another form, which has none.
        balance_mps = sqrt(acceleration_mps2 / drag_per_m)
        return distance_m / balance_mps + log(
            (balance_mps + speed_out_mps) / (balance_mps + speed_in_mps)) / rate
    return _arc(plain_s, acceleration_mps2, drag_per_m)


def slide(legs: list[Leg], friction: float, drag_per_m: float, speed_mps: float,
          start_m: float = 0.0) -> Slide:
    """Slide of a body that falls at ``speed_mps``, ``start_m`` along the profile.

    ``start_m`` from 0 to below the profile's length; at a break the body starts on the leg below.
    """
    passages: list[Passage | None] = []
    leg_start_m, speed, stops, slides_back = 0.0, speed_mps, False, False
    for leg in legs:
        leg_end_m = leg_start_m + leg.length_m
        if stops or leg_end_m <= start_m:
            passages.append(None)
        else:
            passage = _pass(leg, friction, drag_per_m, speed, max(leg_start_m, start_m), leg_end_m)
            passages.append(passage)
            speed, stops = passage.speed_out_mps, passage.stops
            slides_back = stops and tan(leg.pitch_rad) < -friction
        leg_start_m = leg_end_m
    way = [passage for passage in passages if passage is not None]
    return Slide(tuple(passages), start_m, sum(passage.distance_m for passage in way), speed,
                 max([speed_mps] + [passage.speed_out_mps for passage in way]),
                 sum(passage.time_s for passage in way), stops, slides_back, drag_per_m)


def _pass(leg: Leg, friction: float, drag_per_m: float, speed_mps: float, start_m: float,
          end_m: float) -> Passage:
    """A body's way over one leg, from ``start_m`` along the profile."""
    acceleration = acceleration_mps2(leg.pitch_rad, friction)
    reach_m = halt_m(speed_mps, acceleration, drag_per_m)
    stops = reach_m <= end_m - start_m
    distance_m = reach_m if stops else end_m - start_m
    out_mps = 0.0 if stops else speed_after_mps(speed_mps, acceleration, drag_per_m, distance_m)
    duration_s = (0.0 if speed_mps == out_mps == 0 else
                  time_s(speed_mps, out_mps, acceleration, drag_per_m, distance_m))
    return Passage(start_m, distance_m, speed_mps, out_mps, acceleration, duration_s, stops)


def _fraction(decay: float) -> float:
    """(1 − e^(−x))/x, which is 1 at x = 0."""
    return -expm1(-decay) / decay if decay else 1.0


def _arc(plain_s: float, acceleration_mps2: float, drag_per_m: float) -> float:
    """atanh(qu)/q or atan(qu)/q with q = √(k|a|), which are u at q = 0."""
    rate = sqrt(drag_per_m * abs(acceleration_mps2))
    # The quotient would be 0/0, and below 1e-9 both are their argument to the last digit.
    if rate == 0 or rate * plain_s < 1e-9:
        return plain_s
    angle = rate * plain_s
    return (atanh(angle) if acceleration_mps2 > 0 else atan(angle)) / rate
