"""What to change: for each input on its own, the least change that makes the turn hold.

The speeds at which a turn holds are known in closed form (:mod:`snowhold.hold`), so each input
has a clear distance to them: how far the speed is inside the window that a value of that input
gives. Where that distance crosses zero nearest to the present value is solved by bisection.
"""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import replace
from math import inf, pi, radians, sqrt
from typing import Any

from snowhold.hold import hold_lines_m, hold_window_mps, own_arc_m, widest_arc_m
from snowhold.phases import Turn
from snowhold.snow import SNOWS

DEFAULT_SPREAD = {"pitch_deg": 2.0, "speed_share": 0.10, "sidecut_share": 0.03,
                  "angulation_deg": 3.0, "line_share": 0.10, "snow_share": 1.0}
"""One standard deviation of each input, and for snow the share of its published range. Assumed."""

_INSIDE = 1e-6
"""Share by which a suggested value is put inside its bound, so that rounding cannot undo it."""


def room_mps(turn: Turn) -> float:
    """How far the speed is inside the window that holds, m/s; negative outside."""
    slowest, fastest = hold_window_mps(turn)
    return min(float(turn.speed_mps) - slowest, fastest - float(turn.speed_mps))


def changes(turn: Turn, values: dict[str, Any],
            ranges: dict[str, tuple[float, float]]) -> list[dict[str, Any]]:
    """For each input the least change that makes the turn hold with margin, smallest first.

    ``values`` are the question's; its ``spread`` has one standard deviation of each input.
    ``ranges`` has the lowest and highest value of each. Each entry has ``input``, ``from``, ``to``
    (None: no change of this input alone is enough), ``enough``, and ``effort``: the change in
    standard deviations (for snow, in classes). Empty for a turn that holds.
    """
    if room_mps(turn) > 0:
        return []
    spread = values["spread"]
    found = [_speed(turn, spread, ranges), _line(turn, spread, ranges),
             _snow(turn, values["snow"])]
    for name, field in (("pitch_deg", "pitch_rad"), ("angulation_deg", "angulation_rad")):
        found.append(_angle(turn, name, field, values[name], spread[name], ranges[name]))
    if turn.line_radius_m is None:
        found.append(_sidecut(turn, spread, ranges))
    return sorted(found, key=lambda change: inf if change["effort"] is None else change["effort"])


def _change(name: str, now: Any, to: Any, effort: float | None) -> dict[str, Any]:
    return {"input": name, "from": now, "to": to, "enough": to is not None, "effort": effort}


def _into(low: float, high: float, now: float) -> float | None:
    """The value nearest to ``now`` that lies just inside (``low``, ``high``); None if none does."""
    low, high = low * (1 + _INSIDE), high * (1 - _INSIDE)
    return None if low > high else min(max(now, low), high)


def _speed(turn: Turn, spread: dict[str, float],
           ranges: dict[str, tuple[float, float]]) -> dict[str, Any]:
    now = turn.speed_mps
    slowest, fastest = hold_window_mps(turn)
    to = _into(slowest, min(fastest, ranges["speed_mps"][1]), now)
    sigma = max(spread["speed_share"], 1e-9) * max(now, 1e-9)
    return _change("speed_mps", now, to, None if to is None else abs(to - now) / sigma)


def _sidecut(turn: Turn, spread: dict[str, float],
             ranges: dict[str, tuple[float, float]]) -> dict[str, Any]:
    """The window's speeds go with the root of the sidecut radius, so its radii follow."""
    now, now_speed = turn.sidecut_radius_m, turn.speed_mps
    slowest, fastest = hold_window_mps(turn)
    least, most = ranges["sidecut_radius_m"]
    # Kept within the range as speeds, so that no square of a vanishing speed overflows.
    low = now * (now_speed / fastest)**2 if fastest * sqrt(most / now) > now_speed else inf
    high = now * (now_speed / slowest)**2 if slowest * sqrt(most / now) > now_speed else most
    to = _into(max(low, least), min(high, most), now)
    sigma = max(spread["sidecut_share"], 1e-9) * now
    return _change("sidecut_radius_m", now, to, None if to is None else abs(to - now) / sigma)


def _angle(turn: Turn, name: str, field: str, now: float, sigma_deg: float,
           allowed: tuple[float, float]) -> dict[str, Any]:
    """Pitch or angulation, which enter the window in more than one place."""
    to = _nearest(lambda deg: room_mps(replace(turn, **{field: radians(deg)})), now, *allowed)
    return _change(name, now, to,
                   None if to is None else abs(to - now) / max(sigma_deg, 1e-9))


def _line(turn: Turn, spread: dict[str, float],
          ranges: dict[str, tuple[float, float]]) -> dict[str, Any]:
    """Another line at the same speed; a carve is left for the nearest line that its board can
    drift on, which is never tighter than its own arc."""
    tightest, widest = hold_lines_m(turn)
    least, most = ranges["line_radius_m"]
    now = turn.line_radius_m
    compared_m = own_arc_m(turn, pi - turn.from_phase_rad) if now is None else now
    to = _into(max(tightest, least, widest_arc_m(turn)), min(widest, most), compared_m)
    sigma = max(spread["line_share"], 1e-9) * compared_m
    return _change("line_radius_m", now, to, None if to is None else abs(to - compared_m) / sigma)


def _snow(turn: Turn, snow: str) -> dict[str, Any]:
    """The class of snow nearest to this one, softer or harder, on which the turn holds."""
    codes = list(SNOWS)
    now = codes.index(snow)
    for code in sorted(codes, key=lambda code: abs(codes.index(code) - now)):
        kind = SNOWS[code]
        if room_mps(replace(turn, hardness_npm3=kind.hardness_npm3.value,
                            shear_strength_pa=kind.shear_strength_pa.value)) > 0:
            return _change("snow", snow, code, abs(codes.index(code) - now))
    return _change("snow", snow, None, None)


def _nearest(room: Callable[[float], float], now: float, low: float,
             high: float) -> float | None:
    """The value nearest to ``now`` at which ``room`` is above 0, to 1e-9; None if there is none.

    Looks outward in steps of 1 (degree) for a change of sign, nearest first, then bisects it.
    """
    for step in range(1, int(high - low) + 2):
        nearest = [(side * (value - now), value)
                   for side in (-1, 1)
                   if (value := _bisected(room, max(low, min(high, now + side * (step - 1))),
                                          max(low, min(high, now + side * step)))) is not None]
        if nearest:
            return min(nearest)[1]
    return None


def _bisected(room: Callable[[float], float], outside: float, inside: float) -> float | None:
    """The end of a step just past where ``room`` rises above 0; None if it does not by its end."""
    if outside == inside or room(inside) <= _INSIDE:
        return None
    while abs(inside - outside) > 1e-9:
        middle = (inside + outside) / 2
        if room(middle) > _INSIDE:
            inside = middle
        else:
            outside = middle
    return inside
