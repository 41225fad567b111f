"""``ask: "turn"``: will the edge hold through this turn?

The verdict is the worst state over the phases that are ridden. The answer's figures are lists
with one entry a phase, null where there is no balance. :data:`FIELDS` gives every input with its
range; the modules of the formulas, put together in :mod:`snowhold.phases`, give the physics.
"""

from __future__ import annotations

from dataclasses import replace
from math import degrees, isfinite, isnan, radians
from typing import Any

from snowhold.arrays import numpy_or_none
from snowhold.balance import normal_force_n
from snowhold.carve import speed_window_mps
from snowhold.changes import DEFAULT_SPREAD, changes
from snowhold.constants import AVALANCHE_PITCH_DEG
from snowhold.grip import edge_catch_rad
from snowhold.hold import hold_lines_m, hold_window_mps, widest_arc_m
from snowhold.phases import Turn, ridden_phases_deg
from snowhold.question import Choice, Field, Flag, Number, Record, read
from snowhold.snow import SNOWS
from snowhold.turn_table import path_m, reason, table, worst_row

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
    "waist_m": Number(0.15, 0.40, "m", default=0.25),
    "spread": Record({
        "pitch_deg": Number(0, 5, "degrees", default=DEFAULT_SPREAD["pitch_deg"]),
        "speed_share": Number(0, 0.5, "", default=DEFAULT_SPREAD["speed_share"]),
        "sidecut_share": Number(0, 0.3, "", default=DEFAULT_SPREAD["sidecut_share"]),
        "angulation_deg": Number(0, 10, "degrees", default=DEFAULT_SPREAD["angulation_deg"]),
        "line_share": Number(0, 0.5, "", default=DEFAULT_SPREAD["line_share"]),
        "snow_share": Number(0, 1, "", default=DEFAULT_SPREAD["snow_share"]),
    }, default={}),
    "samples": Number(0, 200_000, "", default=2048, whole=True),
    "suggest": Flag(default=True),
}
"""What a turn question may hold: ranges wide enough for children and racers (assumed)."""

RANGES = {name: (field.low, field.high) for name, field in FIELDS.items()
          if isinstance(field, Number)}
"""Lowest and highest allowed value of each number."""


def answer(question: dict[str, Any]) -> dict[str, Any]:
    """Answer a turn question; raises :class:`snowhold.question.BadQuestion` on bad fields.

    Lists have one entry a phase, in the order of travel, null where there is no balance:

    * ``phase_deg``: the ridden phases, or the one that is asked for.
    * ``lean_deg``, ``edge_angle_deg``, ``turn_radius_m``, ``load_g``, ``penetration_m``.
    * ``grip_margin``, the ``limit`` that sets it (:data:`snowhold.grip.LIMITS`) and ``state``
      (:data:`snowhold.grip.STATES`).
    * ``limit_lean_deg``: lean at which that edge would give. ``section_tilt_deg``: how the snow
      rises toward the turn's centre in the section across the turn. ``zone``: above, on or below
      the fall line.
    * ``pivoted``: the given line is tighter there than the tilted board carves.
    * ``least_edge_angle_deg``, ``drift_angle_deg``, ``groove_width_m``: how it drifts
      (:class:`snowhold.phases.Slip`).

    And of the turn as a whole:

    * ``verdict``: its worst state. ``worst``: the figures of that phase; ``reason``: its ``state``,
      ``limit`` and ``zone`` (above, on or below the fall line, or whole).
      ``first_fail_phase_deg``: the first phase that neither holds nor is marginal, or null.
    * ``carve_speed_mps``: ``min`` and ``max`` that balance on the board's own arc throughout;
      ``hold_speed_mps``: that hold with margin throughout. Null: no speed does.
    * ``drift``: :func:`tightest_line`, or null.
    * ``edge_catch``: ``clearance_angle_deg`` below which a drifting board's leading edge can
      catch, and the ``phases_deg`` of the given line that come under it.
    * ``chance_holds``, ``chances``, ``margin_band``, ``balanced_share``:
      :func:`snowhold.sure.how_sure`; null without numpy or with ``samples`` 0.
    * ``changes``: :func:`snowhold.changes.changes`; null with ``suggest`` false.
    * ``picture``: paths from above, x across the hill and y down the fall line, m: ``path_m`` of
      the turn as asked, ``own_path_m`` of the board's own arc where a line is given,
      ``drift_path_m`` of the tightest line that holds.
    * ``cautions``: codes of the warnings that belong beside the answer.
    """
    values = read(question, FIELDS)
    turn = turn_of(values)
    whole_deg = ridden_phases_deg(values["from_phase_deg"])
    asked_deg = values["phase_deg"]
    rows = table(turn, whole_deg if asked_deg is None else [asked_deg])
    worst = worst_row(rows)
    catch_rad = edge_catch_rad(
        normal_force_n(turn.rider_mass_kg, turn.pitch_rad), turn.effective_edge_m,
        values["waist_m"], turn.hardness_npm3, SNOWS[values["snow"]].roughness_m)
    drift = tightest_line(turn, catch_rad)
    return {
        "verdict": rows["state"][worst],
        **rows,
        "worst": {key: rows[key][worst] for key in (
            "phase_deg", "lean_deg", "edge_angle_deg", "turn_radius_m", "load_g",
            "grip_margin", "limit", "state", "penetration_m", "limit_lean_deg")},
        "first_fail_phase_deg": next(
            (phase for phase, at in zip(rows["phase_deg"], rows["state"], strict=True)
             if at not in ("holds", "marginal")), None),
        "reason": reason(rows, worst),
        "carve_speed_mps": carve_window(turn),
        "hold_speed_mps": hold_window(turn),
        "drift": drift,
        "edge_catch": {
            "clearance_angle_deg": None if isnan(catch_rad) else degrees(catch_rad),
            "phases_deg": [] if turn.line_radius_m is None else phases_under(rows, catch_rad),
        },
        "picture": {
            "path_m": path_m(turn, whole_deg),
            "own_path_m": None if turn.line_radius_m is None else path_m(
                replace(turn, line_radius_m=None), whole_deg),
            "drift_path_m": None if drift is None else path_m(
                replace(turn, line_radius_m=drift["line_radius_m"]), whole_deg),
        },
        **_how_sure(turn, values, rows["phase_deg"]),
        "changes": changes(turn, values, RANGES) if values["suggest"] else None,
        "cautions": cautions(values["pitch_deg"]),
    }


def _how_sure(turn: Turn, values: dict[str, Any], phases_deg: list[float]) -> dict[str, Any]:
    """Chance and band of :mod:`snowhold.sure`; nulls without numpy or without samples."""
    if values["samples"] == 0 or numpy_or_none() is None:
        return {"chance_holds": None, "chances": None, "margin_band": None,
                "balanced_share": None}
    from snowhold.sure import how_sure

    return how_sure(turn, SNOWS[values["snow"]], values["spread"], phases_deg, values["samples"])


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


def carve_window(turn: Turn) -> dict[str, float] | None:
    """Slowest and fastest speed of a balanced carve over the whole turn; None: no speed."""
    slowest, fastest_mps = speed_window_mps(turn.sidecut_radius_m, turn.pitch_rad,
                                            turn.from_phase_rad, turn.angulation_rad)
    return {"min": slowest, "max": fastest_mps} if slowest < fastest_mps else None


def hold_window(turn: Turn) -> dict[str, float] | None:
    """Slowest and fastest speed at which the whole turn holds with margin; None: no speed."""
    slowest, fastest = hold_window_mps(turn)
    return {"min": slowest, "max": fastest} if slowest < fastest else None


def tightest_line(turn: Turn, catch_rad: float) -> dict[str, Any] | None:
    """The tightest line that holds with margin at this speed over the ridden turn; None: none.

    It and every wider line hold, at each phase in which the edge is loaded toward the centre,
    and none is tighter than the board's own arc (``bounded_by`` "sidecut" where that is what
    sets it). ``edge_catch_phases_deg``: where its edge angle is under ``catch_rad``.
    """
    line_m, _widest_m = hold_lines_m(turn)
    if not isfinite(line_m):
        return None
    arc_m, bounded_by = widest_arc_m(turn), "grip"
    if arc_m > line_m:
        line_m, bounded_by = arc_m, "sidecut"
    if line_m <= 0:
        return None
    rows = table(replace(turn, line_radius_m=line_m),
                 ridden_phases_deg(degrees(turn.from_phase_rad)))
    loaded = [index for index, margin in enumerate(rows["grip_margin"]) if margin is not None]
    if not loaded:
        return None
    worst = min(loaded, key=lambda index: rows["grip_margin"][index])
    return {"line_radius_m": line_m, "bounded_by": bounded_by, **{key: rows[key][worst] for key in (
        "lean_deg", "edge_angle_deg", "load_g", "grip_margin", "limit", "phase_deg",
        "least_edge_angle_deg", "drift_angle_deg", "groove_width_m", "limit_lean_deg")},
        "edge_catch_phases_deg": phases_under(rows, catch_rad)}


def phases_under(rows: dict[str, list[Any]], catch_rad: float) -> list[float]:
    """Phases of a drifted turn at which the leading edge can catch.

    Those whose edge angle is under the clearance angle, and those whose edge is not loaded toward
    the centre at all: there the board goes over flat. NaN: no tilt clears it.
    """
    catch_deg = degrees(catch_rad)
    return [phase for phase, edge_deg in zip(rows["phase_deg"], rows["edge_angle_deg"],
                                             strict=True)
            if edge_deg is None or not edge_deg > catch_deg]


def cautions(pitch_deg: float) -> list[str]:
    """Codes of the warnings that belong beside an answer on this pitch."""
    return ["estimate"] + (["avalanche"] if pitch_deg >= AVALANCHE_PITCH_DEG else [])
