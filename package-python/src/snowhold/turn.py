"""``ask: "turn"``: will the edge hold through this turn?

The verdict is the worst state over the phases that are ridden. The answer's figures are lists
with one entry a phase, null where there is no balance. :data:`FIELDS` gives every input with its
range; the modules of the formulas, put together in :mod:`snowhold.phases`, give the physics.
"""

from __future__ import annotations

from dataclasses import replace
from math import cos, degrees, isfinite, isnan, pi, radians, sin
from typing import Any

from snowhold.arrays import numpy_or_none
from snowhold.balance import normal_force_n
from snowhold.carve import fastest, speed_window_mps
from snowhold.constants import AVALANCHE_PITCH_DEG
from snowhold.drift import largest_lean, tightest_line_m
from snowhold.grip import LIMITS, STATES, state
from snowhold.phases import Phases, Turn, ridden_phases_deg, ride
from snowhold.question import Choice, Field, Number, read
from snowhold.snow import SNOWS

FIELDS: dict[str, Field] = {
    "ask": Choice(("turn",)),
    "pitch_deg": Number(0, 50, "degrees"),
    "speed_mps": Number(0, 40, "m/s"),
    "sidecut_radius_m": Number(3, 40, "m"),
    "angulation_deg": Number(0, 40, "degrees", default=5),
    "snow": Choice(tuple(SNOWS), default="P"),
    "rider_mass_kg": Number(15, 200, "kg", default=80),
    "effective_edge_m": Number(0.5, 2.0, "m", default=1.2),
    "max_load_g": Number(1.1, 5.0, "times body weight", default=2.0),
    "line_radius_m": Number(1, 1000, "m", default=None, null=True),
    "drag_angle_deg": Number(5, 90, "degrees", default=None, null=True),
    "phase_deg": Number(0, 180, "degrees", default=None, null=True),
    "from_phase_deg": Number(0, 80, "degrees", default=0),
}
"""What a turn question may hold: ranges wide enough for children and racers (assumed)."""


def answer(question: dict[str, Any]) -> dict[str, Any]:
    """Answer a turn question; raises :class:`snowhold.question.BadQuestion` on bad fields."""
    values = read(question, FIELDS)
    turn = turn_of(values)
    whole_deg = ridden_phases_deg(values["from_phase_deg"])
    whole = table(turn, whole_deg)
    asked_deg = values["phase_deg"]
    rows = whole if asked_deg is None else table(turn, [asked_deg])
    worst = worst_row(rows)
    window = carve_window(turn)
    drift = tightest_line(turn)
    return {
        "verdict": rows["state"][worst],
        **rows,
        "worst": {key: rows[key][worst] for key in (
            "phase_deg", "lean_deg", "edge_angle_deg", "turn_radius_m", "load_g",
            "grip_margin", "limit", "state", "penetration_m")},
        "first_fail_phase_deg": next(
            (phase for phase, at in zip(rows["phase_deg"], rows["state"], strict=True)
             if at not in ("holds", "marginal")), None),
        "reason": _reason(rows, worst),
        "carve_speed_mps": window,
        "drift": drift,
        "picture": {
            "path_m": path_m(turn, whole),
            "drift_path_m": None if drift is None else path_m(
                replace(turn, line_radius_m=drift["line_radius_m"]), whole),
        },
        "cautions": cautions(values["pitch_deg"]),
    }


def turn_of(values: dict[str, Any]) -> Turn:
    """The turn that checked question values describe, in SI and radians."""
    snow = SNOWS[values["snow"]]
    drag_deg = values["drag_angle_deg"]
    return Turn(
        pitch_rad=radians(values["pitch_deg"]), speed_mps=values["speed_mps"],
        sidecut_radius_m=values["sidecut_radius_m"],
        angulation_rad=radians(values["angulation_deg"]),
        rider_mass_kg=values["rider_mass_kg"], effective_edge_m=values["effective_edge_m"],
        max_load_g=values["max_load_g"], hardness_npm3=snow.hardness_npm3.value,
        shear_strength_pa=snow.shear_strength_pa.value, line_radius_m=values["line_radius_m"],
        drag_angle_rad=None if drag_deg is None else radians(drag_deg),
        from_phase_rad=radians(values["from_phase_deg"]))


def table(turn: Turn, phases_deg: list[float]) -> dict[str, list[Any]]:
    """The turn at these phases as the answer's lists, one entry a phase."""
    numpy = numpy_or_none()
    if numpy is None:
        rows = [ride(turn, radians(phase)) for phase in phases_deg]
    else:
        rows = _rows(ride(turn, numpy.radians(phases_deg), numpy), len(phases_deg), numpy)
    return {
        "phase_deg": [float(phase) for phase in phases_deg],
        "lean_deg": [_deg_or_none(row.lean_rad) for row in rows],
        "edge_angle_deg": [_deg_or_none(row.edge_rad) for row in rows],
        "turn_radius_m": [_or_none(row.turn_radius_m) for row in rows],
        "load_g": [_or_none(row.load_g) for row in rows],
        "grip_margin": [_or_none(row.grip_margin) for row in rows],
        "limit": [None if isnan(row.grip_margin) else LIMITS[int(row.limit_index)]
                  for row in rows],
        "state": [state_of(row) for row in rows],
        "penetration_m": [_or_none(row.penetration_m) for row in rows],
        "pivoted": [bool(row.pivoted) for row in rows],
    }


def _rows(phases: Phases, count: int, numpy: Any) -> list[Phases]:
    """Arrays over phases as one record of plain numbers a phase."""
    columns = [numpy.broadcast_to(column, count).tolist() for column in vars(phases).values()]
    return [Phases(*row) for row in zip(*columns, strict=True)]


def state_of(row: Phases) -> str:
    """The state of one phase."""
    if row.too_slow:
        return "too_slow"
    if row.too_fast:
        return "too_fast"
    return state(row.grip_margin)


def worst_row(rows: dict[str, list[Any]]) -> int:
    """Index of the worst phase: by state, then by margin.

    Without a margin: the first of the phases that are too slow and the last of those that are
    too fast, where each is furthest from balance.
    """
    def badness(index: int) -> tuple[float, float]:
        at = rows["state"][index]
        margin = rows["grip_margin"][index]
        if margin is None:
            margin = -index if at == "too_fast" else index
        return STATES.index(at), margin

    return min(range(len(rows["state"])), key=badness)


def _reason(rows: dict[str, list[Any]], worst: int) -> dict[str, Any]:
    """What the verdict rests on, as codes: state, limit and where in the turn."""
    same = [at == rows["state"][worst] for at in rows["state"]]
    steady = len({round(value or 0.0, 9) for value in rows["lean_deg"]}) == 1
    phase_deg = rows["phase_deg"][worst]
    if all(same) and steady:
        zone = "whole"
    elif phase_deg < 80:
        zone = "above"
    else:
        zone = "on" if phase_deg <= 100 else "below"
    return {"state": rows["state"][worst], "limit": rows["limit"][worst], "zone": zone}


def carve_window(turn: Turn) -> dict[str, float] | None:
    """Slowest and fastest speed of a balanced carve over the whole turn; None: no speed."""
    slowest, fastest_mps = speed_window_mps(turn.sidecut_radius_m, turn.pitch_rad,
                                            turn.from_phase_rad, turn.angulation_rad)
    return {"min": slowest, "max": fastest_mps} if slowest < fastest_mps else None


def tightest_line(turn: Turn) -> dict[str, Any] | None:
    """The tightest line that holds with margin at this speed over the ridden turn; None: none.

    It and every wider line hold, at each phase in which the edge is loaded toward the centre,
    and none is tighter than the board's own arc (``bounded_by`` "sidecut" where that is what
    sets it).
    """
    lean_rad = largest_lean(
        turn.pitch_rad, turn.angulation_rad, normal_force_n(turn.rider_mass_kg, turn.pitch_rad),
        turn.effective_edge_m, turn.max_load_g, turn.hardness_npm3, turn.shear_strength_pa,
        turn.drag_angle_rad)
    line_m = tightest_line_m(lean_rad, turn.speed_mps, turn.pitch_rad, pi - turn.from_phase_rad)
    if not isfinite(line_m):
        return None
    bounded_by = "grip"
    phases_deg = ridden_phases_deg(degrees(turn.from_phase_rad))
    own_arc = table(replace(turn, line_radius_m=None), phases_deg)
    for radius_m in own_arc["turn_radius_m"]:
        if radius_m is not None and radius_m > line_m:
            line_m, bounded_by = radius_m, "sidecut"
    if line_m <= 0:
        return None
    rows = table(replace(turn, line_radius_m=line_m), phases_deg)
    loaded = [index for index, margin in enumerate(rows["grip_margin"]) if margin is not None]
    if not loaded:
        return None
    worst = min(loaded, key=lambda index: rows["grip_margin"][index])
    return {"line_radius_m": line_m, "bounded_by": bounded_by, **{key: rows[key][worst] for key in (
        "lean_deg", "edge_angle_deg", "load_g", "grip_margin", "limit", "phase_deg")}}


def path_m(turn: Turn, rows: dict[str, list[Any]]) -> dict[str, list[float]]:
    """The turn from above, m: x across the hill, y down the fall line in the plane of the snow.

    One point a phase. Where no carve balances, the path is the board's own arc: flat where it is
    too slow, at the edge angle of its fastest carve where it is too fast.
    """
    phases_rad = [radians(phase) for phase in rows["phase_deg"]]
    radii_m = []
    for phase_rad, at, radius_m in zip(phases_rad, rows["state"], rows["turn_radius_m"],
                                       strict=True):
        if turn.line_radius_m is not None:
            radius_m = turn.line_radius_m
        elif at == "too_fast":
            _, edge_rad = fastest(turn.sidecut_radius_m, turn.pitch_rad, phase_rad,
                                  turn.angulation_rad)
            radius_m = turn.sidecut_radius_m * cos(edge_rad)
        elif radius_m is None:
            radius_m = turn.sidecut_radius_m
        radii_m.append(radius_m)
    x_m, y_m = [0.0], [0.0]
    for i in range(1, len(radii_m)):
        mean_m = (radii_m[i - 1] + radii_m[i]) / 2
        x_m.append(x_m[-1] + mean_m * (sin(phases_rad[i]) - sin(phases_rad[i - 1])))
        y_m.append(y_m[-1] + mean_m * (cos(phases_rad[i - 1]) - cos(phases_rad[i])))
    return {"x_m": x_m, "y_m": y_m}


def cautions(pitch_deg: float) -> list[str]:
    """Codes of the warnings that belong beside an answer on this pitch."""
    return ["estimate"] + (["avalanche"] if pitch_deg >= AVALANCHE_PITCH_DEG else [])


def _or_none(number: float) -> float | None:
    return None if isnan(number) else float(number)


def _deg_or_none(angle_rad: float) -> float | None:
    return None if isnan(angle_rad) else degrees(angle_rad)
