"""``ask: "window"``: which speeds hold on which pitch, for one board, rider and snow.

A picture of pitch against speed. On every pitch the whole turn is too slow to balance up to
``slowest_mps``, holds with margin from there up to ``holds_mps``, is marginal up to
``marginal_mps``, washes out up to ``carves_mps`` and is too fast to carve above it (a turn on a
given line is never that). Each is exact at its pitch (:mod:`snowhold.hold`); where a bound is not
above the one before it, that state is empty on that pitch.
"""

from __future__ import annotations

from dataclasses import replace
from math import pi, radians
from typing import Any

from snowhold.carve import fastest
from snowhold.hold import hold_window_mps
from snowhold.phases import Turn
from snowhold.question import Choice, Field, Number, read
from snowhold.turn import FIELDS as TURN_FIELDS
from snowhold.turn import cautions, turn_of

FIELDS: dict[str, Field] = {
    **{name: field for name, field in TURN_FIELDS.items()
       if name not in ("phase_deg", "waist_m", "spread", "samples", "suggest")},
    "ask": Choice(("window",)),
    "highest_pitch_deg": Number(5, 50, "degrees", default=45),
    "points": Number(2, 400, "", default=60, whole=True),
}
"""What a window question may hold: the turn's own fields (its pitch and speed are the point that
is drawn into the picture), the highest pitch of the picture and the number of its pitches."""


def answer(question: dict[str, Any]) -> dict[str, Any]:
    """Answer a window question; raises :class:`snowhold.question.BadQuestion` on bad fields."""
    values = read(question, FIELDS)
    turn = turn_of(values)
    highest = values["highest_pitch_deg"]
    # The slowest speed goes with the root of the pitch: squares of even steps draw it evenly.
    pitches_deg = [highest * (i / values["points"])**2 for i in range(values["points"] + 1)]
    bounds = [_bounds_mps(replace(turn, pitch_rad=radians(pitch))) for pitch in pitches_deg]
    return {
        "pitch_deg": pitches_deg,
        **{key: [bound[key] for bound in bounds] for key in bounds[0]},
        "steepest_deg": {
            "holds": _steepest_deg(turn, "holds_mps", pitches_deg, bounds),
            "marginal": _steepest_deg(turn, "marginal_mps", pitches_deg, bounds),
            "carves": None if turn.line_radius_m is not None
            else _steepest_deg(turn, "carves_mps", pitches_deg, bounds)},
        "point": {"pitch_deg": values["pitch_deg"], "speed_mps": values["speed_mps"]},
        "cautions": cautions(highest),
    }


def _bounds_mps(turn: Turn) -> dict[str, float | None]:
    """The four speeds at one pitch."""
    slowest, holds = hold_window_mps(turn)
    _, marginal = hold_window_mps(turn, margin=0.0)
    carves = None
    if turn.line_radius_m is None:
        carves, _edge_rad = fastest(turn.sidecut_radius_m, turn.pitch_rad,
                                    pi - turn.from_phase_rad, turn.angulation_rad)
    return {"slowest_mps": slowest, "holds_mps": holds, "marginal_mps": marginal,
            "carves_mps": carves}


def _steepest_deg(turn: Turn, key: str, pitches_deg: list[float],
                  bounds: list[dict[str, Any]]) -> float | None:
    """Steepest pitch up to which some speed is above the slowest and below ``key``, by bisection.

    None where there is none even on the flat; the picture's edge where it goes beyond that.
    """
    closed = next((i for i, bound in enumerate(bounds) if bound[key] <= bound["slowest_mps"]), None)
    if closed is None:
        return pitches_deg[-1]
    if closed == 0:
        return None
    low, high = pitches_deg[closed - 1], pitches_deg[closed]
    while high - low > 1e-9:
        middle = (low + high) / 2
        bound = _bounds_mps(replace(turn, pitch_rad=radians(middle)))
        value, slowest = bound[key], bound["slowest_mps"]
        assert value is not None and slowest is not None
        low, high = (middle, high) if value > slowest else (low, middle)
    return low
