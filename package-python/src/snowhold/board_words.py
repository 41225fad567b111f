"""Answers about boards in words, for the command line's ``--text``."""

from __future__ import annotations

from typing import Any

_STATED = {
    "within_measuring": "a tape measure is not surer than that (1σ {spread_m:.1f} m)",
    "several_radii": "the edge has radii from {least_m:.1f} to {most_m:.1f} m",
    "effective_edge": "they would agree for an effective edge of {effective_edge_m:.2f} m",
    "waist": "they would agree for a waist of {waist_m:.3f} m",
}

_FITS = {"suits": "bends to its sidecut", "too_stiff": "too stiff to bend to its sidecut",
         "too_soft": "so soft that it folds"}

_VERDICTS = {"suits": "Suits", "small": "On the small side", "big": "On the big side"}

_REASONS = {
    "speed_above_window": "even the slower runs, {speed_mps:.1f} m/s, are faster than the "
                          "{limit_mps:.1f} m/s that it carves",
    "speed_below_window": "even the faster runs, {speed_mps:.1f} m/s, are slower than the "
                          "{limit_mps:.1f} m/s that it carves",
    "too_soft": "under this rider it folds: it turns tighter than its sidecut",
    "too_stiff": "under this rider it does not bend to its sidecut",
    "boot_drags": "the boot drags at {drag_angle_deg:.0f}°, the turn asks for "
                  "{needed_edge_angle_deg:.0f}°",
    "wide_for_boot": "no end of the boots reaches the edge",
}


def board_lines(reply: dict[str, Any]) -> list[str]:
    """A board's answer in lines."""
    lines = [f"Sidecut radius {reply['sidecut_radius_m']:.1f} m "
             f"(±{reply['sidecut_spread_m']:.1f} m by tape)"]
    stated = reply["stated_radius"]
    if stated is not None:
        lines.append(f"  Stated {stated['stated_m']:.1f} m, {stated['difference']:+.0%}: "
                     + ("agrees." if stated["agrees"] else "; ".join(
                         _STATED[reason["code"]].format(**reason)
                         for reason in stated["reasons"]) + "."))
    window = reply["carve_speed_mps"]
    lines.append("  No speed carves a whole turn on this pitch." if window is None else
                 f"  Carves whole turns from {window['min'] * 3.6:.0f} to "
                 f"{window['max'] * 3.6:.0f} km/h.")
    if reply["needed"] is not None:
        lines.append(f"  The turn asks for {reply['needed']['edge_angle_deg']:.0f}° of edge angle.")
    if reply["boot"] is not None:
        lines += [f"  The {end} {'never drags' if angle is None else f'drags at {angle:.0f}°'}."
                  for end, angle in reply["drag_angle_deg"].items()]
        waist_m = reply["boot"]["clear_waist_m"]
        if not reply["boot"]["clears"]:
            lines.append(f"  A waist of {waist_m:.3f} m would clear "
                         f"{reply['boot']['target_edge_angle_deg']:.0f}°.")
    bend = reply["bend"]
    if bend is not None:
        lines += _bend_lines(bend)
        lines.append(f"  Rider masses that suit: {_range(reply['mass_range_kg'], 'kg')}.")
    lines.append("  Stiffness that suits this rider: "
                 f"{_range(reply['stiffness_range_nm2'], 'N·m²')}.")
    return lines


def _bend_lines(bend: dict[str, Any]) -> list[str]:
    if not bend["converged"]:
        return ["  The bend could not be computed."]
    radius_m = bend["turn_radius_m"]
    cuts = "straight on" if radius_m is None else f"{radius_m:.1f} m"
    lines = [f"  At {bend['edge_angle_deg']:.0f}° it carves {cuts} with "
             f"{bend['contact_length_m']:.2f} m of edge: {_FITS[bend['fit']]}."]
    if bend["oval"]:
        lines.append("  It bends unevenly: the groove is an oval and the tail skids out of it.")
    return lines


def boards_lines(reply: dict[str, Any]) -> list[str]:
    """A comparison's answer in lines."""
    usual = reply["usual_speed_mps"]
    lines = [f"Usual speeds {usual['low'] * 3.6:.0f} to {usual['high'] * 3.6:.0f} km/h"]
    for number, board in enumerate(reply["boards"], start=1):
        reasons = [_REASONS[reason["code"]].format(**reason) for reason in board["reasons"]]
        lines.append(f"Board {number}, {board['sidecut_radius_m']:.1f} m: "
                     + ": ".join([_VERDICTS[board["verdict"]], *(["; ".join(reasons)] if reasons
                                                                  else [])]) + ".")
    return lines


def stiffness_lines(reply: dict[str, Any]) -> list[str]:
    """A stiffness measurement in lines."""
    return [f"Bending stiffness {reply['stiffness_nm2']:.0f} N·m², {reply['low_nm2']:.0f} to "
            f"{reply['high_nm2']:.0f} within 1σ"]


def _range(span: dict[str, float | None] | None, unit: str) -> str:
    if span is None:
        return "none"
    low, high = span["min"], span["max"]
    if low is None and high is None:
        return "any"
    if low is None:
        return f"up to {high:.0f} {unit}"
    return f"from {low:.0f} {unit}" if high is None else f"{low:.0f} to {high:.0f} {unit}"
