"""``ask: "boards"``: two to four boards side by side, for one rider, one range of pitch, one snow.

Each board gets a verdict, *suits*, *small* or *big*, with the reasons as codes and values. The rule
is *assumed*, from common practice (no source): each reason that a board is small or big carries
``by``, the share by which it misses; the largest one decides, and without any the board suits.

Small:

* ``speed_above_window``: even the rider's slower runs are faster than the board carves on any of
  the pitches: its sidecut turns too tight.
* ``too_soft``: bent by this rider it carves a tenth tighter than its sidecut: it folds.
* ``boot_drags``: boot or binding meets the snow :data:`DRAG_SLACK_DEG` or more below the edge angle
  of the turn at the rider's usual speed (of the carve, or of the tightest line that holds): it is
  too narrow.

Big:

* ``speed_below_window``: even the rider's faster runs are too slow to carve it on any of the
  pitches.
* ``too_stiff``: bent by this rider it carves a tenth wider than its sidecut.
* ``wide_for_boot``: no end of either boot stands out over the edge: slow from edge to edge.
"""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import replace
from math import radians
from typing import Any

from snowhold import turn
from snowhold.board import BOARD, RIDER, describe, turn_of
from snowhold.board_faults import cross_faults, read_all
from snowhold.carve import speed_window_mps
from snowhold.changes import DEFAULT_SPREAD
from snowhold.phases import ridden_phases_deg
from snowhold.question import Choice, Field, Items, Number, Record
from snowhold.snow import SNOWS
from snowhold.speeds import SPEEDS
from snowhold.suit import SUITS_SHARE

USUAL_LEVELS = tuple(who for who, speed in SPEEDS.items() if speed.spread_mps is not None)
"""Whose published speeds can stand for the rider's own."""

USUAL_SPREAD_SHARE = 0.2
"""1σ of one rider's usual speed over its mean, where it is not given. Assumed."""

RADIUS_EDGE_DEG = 45.0
"""Edge angle at which boards are compared, degrees."""

FIELDS: dict[str, Field] = {
    "ask": Choice(("boards",)),
    "boards": Items(Record(BOARD), 2, 4),
    **RIDER,
    "pitch_low_deg": Number(0, 50, "degrees", default=10),
    "pitch_high_deg": Number(0, 50, "degrees", default=20),
    "usual_level": Choice(USUAL_LEVELS, default="snowboarders"),
    "usual_speed_mps": Number(1, 40, "m/s", default=None, null=True),
    "usual_speed_spread_mps": Number(0, 15, "m/s", default=None, null=True),
    "usual_line_radius_m": turn.FIELDS["line_radius_m"],
}
"""What a question for several boards may hold. A given usual speed takes the place of the
published ones of the level; the usual turn is on the board's own arc, or drifts on the usual line.
Default pitches assumed."""

SAMPLES = 1024
"""Samples for the chance of each board."""

DRAG_SLACK_DEG = 3.0
"""How far a drag angle may fall short before the verdict counts it, degrees: 1σ of angulation.
Assumed."""

_WINDOW_PITCHES = 5


def answer(question: dict[str, Any]) -> dict[str, Any]:
    """Answer a question for several boards; raises :class:`snowhold.question.BadQuestion`.

    * ``usual_speed_mps``: ``low``, ``mean``, ``high`` (1σ either way), ``source`` "given" or
      "published".
    * ``boards``, in the question's order: ``verdict``, ``reasons`` [{``code``, ``side``, ``by``
      and values}], ``sidecut_radius_m``, ``speed_windows`` [{``pitch_deg``, ``min_mps``,
      ``max_mps``}] over the range (null bounds: no speed carves that pitch), ``carve_speed_mps``
      (the speeds that carve all of them, null: none), ``radius_at_45_m`` (``hard_snow``,
      ``bent``, null without a stiffness), ``drag_angle_deg``, ``clear_waist_m`` and ``needed`` at
      the usual speed on the middle pitch, ``mass_range_kg``, ``stiffness_range_nm2``, and
      ``chance_holds`` of the usual turn on the middle pitch, its speed being spread as the
      rider's usual speeds are (:func:`snowhold.sure.how_sure`).
    * ``cautions``.
    """
    values = read_all(question, FIELDS, _faults)
    usual = usual_speed_mps(values)
    return {
        "usual_speed_mps": usual,
        "boards": [_side(board, values, usual) for board in values["boards"]],
        "cautions": turn.cautions(values["pitch_high_deg"]),
    }


def usual_speed_mps(values: Mapping[str, Any]) -> dict[str, Any]:
    """The rider's usual speeds: a given mean with its spread, or the published ones."""
    mean_mps, spread_mps = values["usual_speed_mps"], values["usual_speed_spread_mps"]
    source = "published" if mean_mps is None else "given"
    if mean_mps is None:
        published = SPEEDS[values["usual_level"]]
        mean_mps = published.mean_mps
        spread_mps = published.spread_mps if spread_mps is None else spread_mps
    elif spread_mps is None:
        spread_mps = USUAL_SPREAD_SHARE * mean_mps
    return {"low": max(0.0, mean_mps - spread_mps), "mean": mean_mps,
            "high": mean_mps + spread_mps, "source": source}


def _side(board: Mapping[str, Any], values: Mapping[str, Any],
          usual: Mapping[str, Any]) -> dict[str, Any]:
    """One board's column of the comparison."""
    rider = {key: values[key] for key in RIDER}
    low_deg, high_deg = values["pitch_low_deg"], values["pitch_high_deg"]
    one = {**board, **rider, "pitch_deg": (low_deg + high_deg) / 2, "speed_mps": usual["mean"],
           "line_radius_m": values["usual_line_radius_m"], "edge_angle_deg": RADIUS_EDGE_DEG}
    told = describe(one)
    count = _WINDOW_PITCHES if high_deg > low_deg else 1
    windows = [_window(one, told["sidecut_radius_m"],
                       low_deg + (high_deg - low_deg) * i / max(1, count - 1))
               for i in range(count)]
    reasons = _reasons(told, windows, usual)
    decided = max(reasons, key=lambda reason: reason["by"], default=None)
    bend = told["bend"]
    return {
        "verdict": "suits" if decided is None else decided["side"],
        "reasons": reasons,
        "sidecut_radius_m": told["sidecut_radius_m"],
        "speed_windows": windows,
        "carve_speed_mps": _common_window(windows),
        "radius_at_45_m": {"hard_snow": told["hard_snow_radius_m"],
                           "bent": None if bend is None else bend["turn_radius_m"]},
        "drag_angle_deg": told["drag_angle_deg"],
        "clear_waist_m": None if told["boot"] is None else told["boot"]["clear_waist_m"],
        "needed": told["needed"],
        "mass_range_kg": told["mass_range_kg"],
        "stiffness_range_nm2": told["stiffness_range_nm2"],
        "chance_holds": _chance(one, told, usual),
    }


def _chance(one: dict[str, Any], told: Mapping[str, Any], usual: Mapping[str, Any]) -> float:
    """Chance that the usual turn holds on this board, its boots' drag included."""
    # Numpy is wanted for this only.
    from snowhold.sure import how_sure

    angles = [angle for angle in (told["drag_angle_deg"] or {}).values() if angle is not None]
    ride_on = replace(turn_of(one, told["sidecut_radius_m"]),
                      drag_angle_rad=radians(min(angles)) if angles else None)
    spread = {**DEFAULT_SPREAD, "speed_share": (usual["high"] - usual["mean"]) / usual["mean"]}
    return float(how_sure(ride_on, SNOWS[one["snow"]], spread,
                          ridden_phases_deg(one["from_phase_deg"]), SAMPLES)["chance_holds"])


def _window(one: Mapping[str, Any], radius_m: float, pitch_deg: float) -> dict[str, Any]:
    on = turn_of({**one, "pitch_deg": pitch_deg}, radius_m)
    slowest, fastest = speed_window_mps(radius_m, radians(pitch_deg), on.from_phase_rad,
                                        on.angulation_rad)
    carves = slowest < fastest
    return {"pitch_deg": pitch_deg, "min_mps": slowest if carves else None,
            "max_mps": fastest if carves else None}


def _common_window(windows: list[dict[str, Any]]) -> dict[str, float] | None:
    """The speeds that carve every pitch; None: none does."""
    if any(window["min_mps"] is None for window in windows):
        return None
    low = max(window["min_mps"] for window in windows)
    high = min(window["max_mps"] for window in windows)
    return {"min": low, "max": high} if low < high else None


def _reasons(told: Mapping[str, Any], windows: list[dict[str, Any]],
             usual: Mapping[str, Any]) -> list[dict[str, Any]]:
    """Why the board is small or big for this rider, worst first; see the module's docstring."""
    reasons: list[dict[str, Any]] = []

    def reason(code: str, side: str, by: float, **values: float | None) -> None:
        reasons.append({"code": code, "side": side, "by": by, **values})

    open_windows = [window for window in windows if window["min_mps"] is not None]
    if open_windows:
        fastest = max(window["max_mps"] for window in open_windows)
        slowest = min(window["min_mps"] for window in open_windows)
        if usual["low"] > fastest:
            reason("speed_above_window", "small", usual["low"] / fastest - 1,
                   speed_mps=usual["low"], limit_mps=fastest)
        elif usual["high"] < slowest:
            reason("speed_below_window", "big", slowest / usual["high"] - 1,
                   speed_mps=usual["high"], limit_mps=slowest)
    bend = told["bend"]
    if bend is not None and bend["fit"] in ("too_soft", "too_stiff"):
        # A board that stays straight misses wholly.
        over = bend["over_hard_snow"]
        soft = bend["fit"] == "too_soft"
        by = 1.0 if over is None else (
            (1 - SUITS_SHARE) / over - 1 if soft else over / (1 + SUITS_SHARE) - 1)
        reason(bend["fit"], "small" if soft else "big", by, over_hard_snow=over)
    boots = told["boot"]
    if boots is not None:
        _boot_reasons(told, boots, reason)
    return sorted(reasons, key=lambda entry: -entry["by"])


def _boot_reasons(told: Mapping[str, Any], boots: Mapping[str, Any], reason: Any) -> None:
    angles = [angle for angle in told["drag_angle_deg"].values() if angle is not None]
    if told["needed"] is not None and angles:
        needed_deg, drag_deg = told["needed"]["edge_angle_deg"], min(angles)
        if drag_deg < needed_deg - DRAG_SLACK_DEG:
            reason("boot_drags", "small", needed_deg / drag_deg - 1, drag_angle_deg=drag_deg,
                   needed_edge_angle_deg=needed_deg, clear_waist_m=boots["clear_waist_m"])
    overhangs = [(boots[foot][end]["overhang_m"], boots[foot]["insert_width_m"])
                 for foot in ("rear", "front") for end in ("toe", "heel")]
    overhang_m, width_m = max(overhangs)
    if overhang_m < 0:
        reason("wide_for_boot", "big", -2 * overhang_m / width_m, overhang_m=overhang_m)


def _faults(values: Mapping[str, Any]) -> list[dict[str, str]]:
    faults = []
    for index, board in enumerate(values.get("boards") or []):
        faults += cross_faults(board, f"boards[{index}].")
    low_deg, high_deg = values.get("pitch_low_deg"), values.get("pitch_high_deg")
    if low_deg is not None and high_deg is not None and low_deg > high_deg:
        faults.append({"field": "pitch_high_deg",
                       "problem": f"{high_deg:g} is below the lower end, {low_deg:g}",
                       "allowed": "pitch_low_deg or more"})
    return faults
