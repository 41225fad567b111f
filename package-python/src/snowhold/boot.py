"""Boot drag: the edge angle at which a toe or heel meets the snow.

Seen along the board, ``overhang_m`` o is how far the sole's end stands out beyond the edge at the
binding and ``height_m`` h its height above the base plane there (board, binding base and the
sole's upturn). Tilted by ε and sunk by e it touches the snow when h cos ε − o sin ε = e, plain
geometry. An end that does not stand out (o ≤ 0) never drags.
"""

from __future__ import annotations

from math import atan2, cos, degrees, pi, radians, sin
from typing import Any

from snowhold.grip import penetration_m

Pressure = tuple[float, float, float]
"""What the edge sinks by: normal force N, effective edge m, snow hardness N/m³."""


def reach_m(sole_length_m: float, binding_rad: float, sole_width_m: float = 0.0) -> float:
    """How far a sole reaches across the board from its middle, m.

    B cos ψ / 2, ψ from straight across; ends rounded to half the sole's width b add
    b (1 − cos ψ)/2. A width of 0 takes toe and heel as points on the sole's middle line.
    """
    return (sole_length_m * cos(binding_rad) + sole_width_m * (1 - cos(binding_rad))) / 2


def drag_angle_rad(overhang_m: float, height_m: float,
                   pressure: Pressure | None = None) -> float | None:
    """Edge angle at which this end of the boot touches the snow, rad; None: it does not stand out.

    Without ``pressure`` the edge does not sink: atan(h/o). With it the edge's depth grows with ε,
    so h cos ε − o sin ε − e(ε) falls from h and has one root, found by halving.
    """
    if overhang_m <= 0:
        return None
    low_rad, high_rad = 0.0, atan2(height_m, overhang_m)
    if pressure is None:
        return high_rad
    for _ in range(60):
        middle_rad = (low_rad + high_rad) / 2
        if _clearance_m(overhang_m, height_m, middle_rad, pressure) > 0:
            low_rad = middle_rad
        else:
            high_rad = middle_rad
    return low_rad


def _clearance_m(overhang_m: float, height_m: float, edge_rad: float,
                 pressure: Pressure) -> float:
    """Height of the boot's end over the snow, m."""
    return (height_m * cos(edge_rad) - overhang_m * sin(edge_rad) - _depth_m(edge_rad, pressure))


def _depth_m(edge_rad: float, pressure: Pressure) -> float:
    normal_n, edge_m, hardness_npm3 = pressure
    return float(penetration_m(normal_n, edge_m, edge_rad, hardness_npm3))


def most_overhang_m(height_m: float, edge_rad: float, pressure: Pressure) -> float:
    """Widest overhang that is clear of the snow up to this edge angle (above 0), m.

    o = (h cos ε − e)/sin ε; 0 where even that sinks in, since a boot that does not stand out
    counts as clear, and from 90° on, where the base no longer faces the snow.
    """
    if edge_rad >= pi / 2:
        return 0.0
    depth_m = _depth_m(edge_rad, pressure)
    return max(0.0, (height_m * cos(edge_rad) - depth_m) / sin(edge_rad))


def feet(boot: dict[str, Any], insert_widths_m: tuple[float, float],
         bindings_m: tuple[float, float], pressure: Pressure, waist_m: float,
         target_rad: float) -> dict[str, Any]:
    """Both boots on the board: overhang, drag angle and the waist that would clear them.

    ``boot`` holds the fields of :data:`snowhold.board.BOOT`; pairs are (rear, front).
    ``target_rad`` is the edge angle to be cleared. The waist that clears it is as much wider than
    this one as the width at the inserts would have to be, and None where any width does.
    """
    answer: dict[str, Any] = {}
    clear_m: list[float] = []
    for foot, width_m, at_m in zip(("rear", "front"), insert_widths_m, bindings_m, strict=True):
        binding_rad = radians(boot[f"{foot}_angle_deg"])
        forward_m = boot[f"{foot}_toeward_m"]
        half_m = reach_m(boot["sole_length_m"], binding_rad, boot["sole_width_m"])
        answer[foot] = {"insert_width_m": width_m,
                        "outline": _outline_m(boot, binding_rad, at_m, forward_m)}
        for end, shift_m in (("toe", forward_m), ("heel", -forward_m)):
            height_m = boot[f"{end}_height_m"]
            overhang_m = half_m + shift_m - width_m / 2
            most_m = most_overhang_m(height_m, target_rad, pressure)
            clear_m.append(2 * (half_m + shift_m - most_m) - (width_m - waist_m))
            answer[foot][end] = {
                "overhang_m": overhang_m,
                "height_m": height_m,
                "drag_angle_deg": _degrees(drag_angle_rad(overhang_m, height_m, pressure)),
                "unsunk_drag_angle_deg": _degrees(drag_angle_rad(overhang_m, height_m)),
            }
    waist_needed_m = max(clear_m)
    answer["target_edge_angle_deg"] = degrees(target_rad)
    answer["clear_waist_m"] = waist_needed_m if waist_needed_m > 0 else None
    answer["clears"] = waist_needed_m <= waist_m
    return answer


def least_drag_deg(boots: dict[str, Any], end: str) -> float | None:
    """Least drag angle of this end over both feet, degrees; None: neither drags."""
    angles = [boots[foot][end]["drag_angle_deg"] for foot in ("rear", "front")]
    return min((angle for angle in angles if angle is not None), default=None)


def _degrees(angle_rad: float | None) -> float | None:
    return None if angle_rad is None else degrees(angle_rad)


def _outline_m(boot: dict[str, Any], binding_rad: float, at_m: float,
               forward_m: float) -> dict[str, list[float]]:
    """The sole from above, m: x along the board toward the nose, y across it toward the toe edge.

    Its ends are half circles of the sole's width, so that it reaches as far as :func:`reach_m`.
    """
    radius_m = boot["sole_width_m"] / 2
    straight_m = boot["sole_length_m"] / 2 - radius_m
    x_m, y_m = [], []
    for step in range(26):
        end = 1 if step < 13 else -1
        turn_rad = pi * (step % 13) / 12 + (0 if end > 0 else pi)
        aside_m = radius_m * cos(turn_rad)
        along_m = end * straight_m + radius_m * sin(turn_rad)
        x_m.append(at_m + along_m * sin(binding_rad) + aside_m * cos(binding_rad))
        y_m.append(forward_m + along_m * cos(binding_rad) - aside_m * sin(binding_rad))
    return {"x_m": x_m, "y_m": y_m}

