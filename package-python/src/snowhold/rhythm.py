"""The rhythm of carved turns on an even slope, and the pitch beyond which there is none.

M(v) is the speed at the end of a turn that starts at v. Turn follows turn, so that v, M(v),
M(M(v))… are the start speeds of a run. M grows with v (paths of one equation in one unknown do not
cross), hence these speeds only grow or only fall: they settle where M(v) = v, a *steady* rhythm,
or go on until a turn loses its balance. At the first phase of a turn that is the loss below, at a
later one the loss above.

The *critical pitch* is the steepest one that does not run away. A pitch runs away if every turn
that starts balanced comes out faster than it went in or gets too fast on the way, or if no one
speed balances both the first and the last phase of a turn: no speed carves that pitch turn after
turn, let the edge drift. A slope steeper than one that runs away runs away too: not proved, but
so in scans over shapes with drag up to 0.01/m (three times a usual rider's), and halving finds
the pitch. Only balance counts here; whether snow, boot and rider hold is the run's own margin.

References
----------
[1] S. S. Komissarov, Modelling of carving turns in alpine skiing, arXiv 1812.02539 (2019): pure
    carving is possible only on fairly flat slopes; the critical pitch, 8 to 20°, is set mostly by
    snow friction and less by the sidecut radius.
"""

from __future__ import annotations

from dataclasses import dataclass
from functools import lru_cache
from math import inf, pi, radians, sqrt
from typing import NamedTuple

from snowhold.carve import slowest_mps, speed_window_mps
from snowhold.constants import G0_MPS2
from snowhold.phases import Turn
from snowhold.slide import Leg
from snowhold.track import Run, Steps, ride_turn, start_spot

STEEPEST_RAD = radians(50)
"""Pitch up to which a critical pitch is looked for: the steepest that a question may ask."""

# Assumed, all three: finer ones move the critical pitch by less than 0.05°.
_PITCH_RAD = radians(0.01)
_SPEED_SHARE = 3e-4
_STEPS = Steps(widest_rad=radians(10), least_rad=1e-2)


@dataclass(frozen=True)
class Shape:
    """What carved turns look like: all that their rhythm depends on."""

    sidecut_radius_m: float
    angulation_rad: float
    from_phase_rad: float
    glide_friction: float
    drag_per_m: float


def shape_of(run: Run) -> Shape:
    """The shape of a run's turns on the board's own arc."""
    turn = run.turn
    return Shape(turn.sidecut_radius_m, turn.angulation_rad, turn.from_phase_rad,
                 run.glide_friction, run.drag_per_m)


def end_of_turn(shape: Shape, pitch_rad: float, speed_mps: float) -> tuple[float, str | None]:
    """M(v) of one turn on an even slope: ``(speed_mps, end)``.

    ``end`` None: of the whole turn. Else the speed where the turn ends before, and how.
    """
    # Mass, edge, legs and snow have no part in balance: any number will do.
    turn = Turn(pitch_rad, speed_mps, shape.sidecut_radius_m, shape.angulation_rad, 1, 1, 1, 1, 1,
                from_phase_rad=shape.from_phase_rad)
    run = Run(turn, (Leg(pitch_rad, inf),), 1, shape.glide_friction, shape.drag_per_m)
    spots, end = ride_turn(run, start_spot(run), [pi - shape.from_phase_rad], _STEPS)
    return sqrt(spots[-1].squared_speed), end


class Search(NamedTuple):
    """Start speeds of turns on one pitch.

    ``unhurried_mps``: one at which the turn does not come out faster than it went in, None where
    there is none. ``low_mps``: one below all of those; ``low_grows``: it comes out faster, else
    it gets too slow in the turn. ``high_gains``: the least speed known to be above all of those
    gains speed before it gets too fast.
    """

    unhurried_mps: float | None
    low_mps: float
    low_grows: bool
    high_gains: bool


def search(shape: Shape, pitch_rad: float) -> Search:
    """An unhurried start speed, looked for by halving.

    The faster the start, the less the speed grows: a tighter arc is a shorter way down.
    """
    low_mps = slowest_mps(shape.sidecut_radius_m, pitch_rad, shape.from_phase_rad,
                          shape.angulation_rad)
    # No carve is faster, whatever pitch, phase and angulation.
    high_mps = sqrt(shape.sidecut_radius_m * G0_MPS2)
    low_grows = high_gains = False
    while high_mps - low_mps > _SPEED_SHARE * high_mps:
        tried_mps = (low_mps + high_mps) / 2
        out_mps, end = end_of_turn(shape, pitch_rad, tried_mps)
        if end == "too_fast":
            high_mps, high_gains = tried_mps, out_mps > tried_mps
        elif end == "too_slow" or (end is None and out_mps > tried_mps):
            low_mps, low_grows = tried_mps, end is None
        else:
            return Search(tried_mps, low_mps, low_grows, high_gains)
    return Search(None, low_mps, low_grows, high_gains)


def runs_away(shape: Shape, pitch_rad: float) -> bool:
    """Whether the speed of carved turns grows on this pitch until none balances, or no one speed
    balances both the first and the last phase of a turn.

    Not where a turn gets too slow from every start that it can begin at: what friction and drag
    stop is not too steep.
    """
    slowest, fastest = speed_window_mps(shape.sidecut_radius_m, pitch_rad, shape.from_phase_rad,
                                        shape.angulation_rad)
    if slowest >= fastest:
        return True
    found = search(shape, pitch_rad)
    return found.unhurried_mps is None and (found.low_grows or found.high_gains)


@lru_cache(maxsize=64)
def critical_pitch_rad(shape: Shape) -> float | None:
    """The critical pitch of carved turns of this shape, rad, to 0.05°; None: more than 50°."""
    gentle_rad, steep_rad = 0.0, STEEPEST_RAD
    if not runs_away(shape, steep_rad):
        return None
    while steep_rad - gentle_rad > _PITCH_RAD:
        pitch_rad = (gentle_rad + steep_rad) / 2
        if runs_away(shape, pitch_rad):
            steep_rad = pitch_rad
        else:
            gentle_rad = pitch_rad
    return (gentle_rad + steep_rad) / 2


@lru_cache(maxsize=256)
def steady_speed_mps(shape: Shape, pitch_rad: float) -> float | None:
    """Start speed to which carved turns of this shape settle on this pitch, m/s, to 0.1 %.

    None: to none. Above the critical pitch they speed up; below it, where this is None, they lose
    speed until too slow for the next turn.
    """
    found = search(shape, pitch_rad)
    if found.unhurried_mps is None:
        return None
    low_mps, high_mps, grows = found.low_mps, found.unhurried_mps, found.low_grows
    while high_mps - low_mps > _SPEED_SHARE * high_mps:
        tried_mps = (low_mps + high_mps) / 2
        out_mps, end = end_of_turn(shape, pitch_rad, tried_mps)
        if end == "stops" or (end is None and out_mps <= tried_mps):
            high_mps = tried_mps
        else:
            low_mps, grows = tried_mps, end is None
    # Otherwise the next slower start is already too slow: the speed falls out of the window.
    return (low_mps + high_mps) / 2 if grows else None
