"""Answers in words, for the command line's ``--text``."""

from __future__ import annotations

from collections.abc import Callable
from typing import Any

from snowhold.board_words import board_lines, boards_lines, stiffness_lines
from snowhold.pitch_words import pitch_lines

VERDICTS = {"holds": "Holds", "marginal": "Marginal", "washes_out": "Washes out",
            "too_slow": "Too slow to carve", "too_fast": "Too fast to carve"}

LIMITS = {"platform": "the base tilts too little for the force on it",
          "snow": "the snow shears before it carries the force",
          "boot": "the boot touches the snow and lifts the edge",
          "rider": "the load is more than the legs carry"}

ZONES = {"above": "above the fall line", "on": "on the fall line", "below": "below the fall line",
         "whole": "through the whole turn"}

CAUTIONS = {
    "estimate": "An estimate. It does not replace the judgement of patrol, an instructor or local "
                "rules. It says nothing about avalanche danger. Closed stays closed.",
    "avalanche": "From about 30°: see the avalanche bulletin.",
    "drift_friction": "What a drifting edge slows is not counted: real speeds are lower.",
}


def text(question: Any, reply: dict[str, Any]) -> str:
    """The reply to a question as lines for people."""
    if "error" in reply:
        return "\n".join(f"{fault['field']}: {fault['problem']} (allowed: {fault['allowed']})"
                         for fault in reply["error"])
    lines = _TOPICS[question["ask"]](reply)
    return "\n".join(lines + [CAUTIONS[code] for code in reply["cautions"]])


def turn_lines(reply: dict[str, Any]) -> list[str]:
    """A turn's answer in lines."""
    worst, reason = reply["worst"], reply["reason"]
    lines = [VERDICTS[reply["verdict"]]]
    if worst["grip_margin"] is not None:
        verb = "gives first" if worst["grip_margin"] < 0 else "would give first"
        lines += [
            f"  Closest {ZONES[reason['zone']]}, at {worst['phase_deg']:.0f}° of the turn; there "
            f"{LIMITS[worst['limit']]}: that {verb}.",
            f"  Lean {worst['lean_deg']:.0f}° from the perpendicular to the snow, edge angle "
            f"{worst['edge_angle_deg']:.0f}°, grip margin {worst['grip_margin']:+.0%}",
            f"  Load {worst['load_g']:.2f} g, radius {worst['turn_radius_m']:.1f} m, edge sunk "
            f"{_millimetres(worst['penetration_m'])}",
        ]
    elif reply["verdict"] == "too_slow":
        lines.append("  Gravity alone turns tighter than the flattest carve there.")
    else:
        lines.append("  The board's own arc is too tight for this speed; let it drift.")
    window = reply["carve_speed_mps"]
    lines.append("  No speed carves this whole turn." if window is None else
                 f"  Carves the whole turn from {window['min'] * 3.6:.0f} to "
                 f"{window['max'] * 3.6:.0f} km/h.")
    drift = reply["drift"]
    lines.append("  No line holds at this speed." if drift is None else
                 f"  Tightest line that holds: {drift['line_radius_m']:.1f} m, lean "
                 f"{drift['lean_deg']:.0f}°, grip margin {drift['grip_margin']:+.0%}.")
    if reply["chance_holds"] is not None:
        lines.append(f"  Chance that it holds, inputs being rough: {reply['chance_holds']:.0%}.")
    lines += ["  " + _change(change) for change in reply["changes"] or []]
    return lines


def _change(change: dict[str, Any]) -> str:
    """One suggestion in words."""
    name, unit, factor = _INPUTS[change["input"]]
    if not change["enough"]:
        return f"{name}: no change of it alone is enough."
    to = change["to"]
    return f"{name}: {to if isinstance(to, str) else f'{to * factor:.1f}'} {unit}".rstrip() + "."


_INPUTS = {"speed_mps": ("Speed", "km/h", 3.6), "pitch_deg": ("Pitch", "°", 1),
           "angulation_deg": ("Angulation", "°", 1), "sidecut_radius_m": ("Sidecut radius", "m", 1),
           "line_radius_m": ("Drift on a line of", "m", 1), "snow": ("Snow", "", 1)}
"""Inputs that a change may be of: name, unit, and factor from the engine's unit."""


def _millimetres(depth_m: float | None) -> str:
    return "out of the snow" if depth_m is None else f"{depth_m * 1000:.1f} mm"


ENDS = {"turns_done": "All turns done", "profile_ends": "The profile ends",
        "stops": "The rider stops", "too_slow": "Too slow to carve on: the run ends",
        "too_fast": "Too fast to carve on: the run ends"}


def run_lines(reply: dict[str, Any]) -> list[str]:
    """A run's answer in lines."""
    fails, worst = reply["fails_at"], reply["worst"]
    lines = [VERDICTS[reply["verdict"]],
             f"  {ENDS[reply['end']]} after {reply['time_s']:.1f} s and "
             f"{reply['distance_m']:.0f} m, at {reply['end_speed_mps'] * 3.6:.0f} km/h; fastest "
             f"{reply['top_speed_mps'] * 3.6:.0f} km/h."]
    if fails is not None:
        why = "" if fails["limit"] is None else f"; there {LIMITS[fails['limit']]}"
        lines.append(f"  {VERDICTS[fails['state']]} in turn {fails['turn']}, at "
                     f"{fails['phase_deg']:.0f}° of it, {fails['distance_m']:.0f} m on, at "
                     f"{fails['speed_mps'] * 3.6:.0f} km/h{why}.")
    elif worst is not None:
        lines.append(f"  Closest in turn {worst['turn']}, at {worst['phase_deg']:.0f}° of it: grip "
                     f"margin {worst['grip_margin']:+.0%}, where {LIMITS[worst['limit']]}.")
    for leg in reply["legs"] or []:
        steady = leg["steady_speed_mps"]
        if leg["no_speed_carves"]:
            end = "no speed carves it turn after turn; drift it"
        elif steady is None:
            end = "carved turns lose speed until too slow"
        else:
            end = f"carved turns settle at {steady * 3.6:.0f} km/h"
        lines.append(f"  {leg['pitch_deg']:.0f}°: {end}.")
    if reply["critical_pitch_deg"] is not None:
        lines.append(f"  Turns like these carve up to {reply['critical_pitch_deg']:.1f}°.")
    return lines


def window_lines(reply: dict[str, Any]) -> list[str]:
    """A speed window's answer in lines."""
    lines = ["  pitch   too slow to   holds to   marginal to   carves to (km/h)"]
    for i in range(0, len(reply["pitch_deg"]), 6):
        speeds = [reply[key][i] for key in ("slowest_mps", "holds_mps", "marginal_mps",
                                            "carves_mps")]
        lines.append(f"  {reply['pitch_deg'][i]:4.0f}°" + "".join(
            "           -" if speed is None else f"{speed * 3.6:12.0f}" for speed in speeds))
    steepest = reply["steepest_deg"]["holds"]
    lines.append("  No speed holds on any pitch." if steepest is None else
                 f"  Some speed holds up to {steepest:.0f}°.")
    return lines


def reference_lines(reply: dict[str, Any]) -> list[str]:
    """What the answers rest on, in lines."""
    lines = [f"  {snow['code']:>2}  {snow['name']}" for snow in reply["snows"]]
    return lines + [f"  {speed['who']}: {speed['mean_mps'] * 3.6:.1f} km/h ({speed['source']})"
                    for speed in reply["speeds"]]


_TOPICS: dict[str, Callable[[dict[str, Any]], list[str]]] = {
    "turn": turn_lines,
    "window": window_lines,
    "run": run_lines,
    "reference": reference_lines,
    "board": board_lines,
    "boards": boards_lines,
    "stiffness": stiffness_lines,
    "pitch": pitch_lines,
}
