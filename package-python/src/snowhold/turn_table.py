"""A turn as lists with one entry a phase, its worst phase, and its path from above."""

from __future__ import annotations

from math import cos, degrees, isnan, radians, sin
from typing import Any

from snowhold.arrays import numpy_or_none
from snowhold.balance import section_tilt_rad
from snowhold.grip import LIMITS, STATES, limit_lean_rad, state
from snowhold.hold import own_arc_m
from snowhold.phases import Phases, Slip, Turn, ride, slip


def table(turn: Turn, phases_deg: list[float]) -> dict[str, list[Any]]:
    """The turn at these phases as the answer's lists, one entry a phase, null where none."""
    rows = _rows(turn, phases_deg)
    return {
        "phase_deg": [float(phase) for phase in phases_deg],
        "lean_deg": [_deg_or_none(row.lean_rad) for row, _ in rows],
        "edge_angle_deg": [_deg_or_none(row.edge_rad) for row, _ in rows],
        "turn_radius_m": [_or_none(row.turn_radius_m) for row, _ in rows],
        "load_g": [_or_none(row.load_g) for row, _ in rows],
        "grip_margin": [_or_none(row.grip_margin) for row, _ in rows],
        "limit": [None if isnan(row.grip_margin) else LIMITS[int(row.limit_index)]
                  for row, _ in rows],
        "state": [_state(row) for row, _ in rows],
        "penetration_m": [_or_none(row.penetration_m) for row, _ in rows],
        "limit_lean_deg": [_deg_or_none(limit_lean_rad(row.lean_rad, row.grip_margin))
                           for row, _ in rows],
        "section_tilt_deg": [degrees(section_tilt_rad(turn.pitch_rad, radians(phase)))
                             for phase in phases_deg],
        "zone": [_zone(phase) for phase in phases_deg],
        "pivoted": [bool(row.pivoted) for row, _ in rows],
        "least_edge_angle_deg": [_deg_or_none(slips.least_edge_rad) for _, slips in rows],
        "drift_angle_deg": [_deg_or_none(slips.drift_angle_rad) for _, slips in rows],
        "groove_width_m": [_or_none(slips.groove_width_m) for _, slips in rows],
    }


def _rows(turn: Turn, phases_deg: list[float]) -> list[tuple[Phases, Slip]]:
    """The turn at each phase in plain numbers, by way of arrays where numpy is there."""
    numpy = numpy_or_none()
    if numpy is None:
        ridden = [ride(turn, radians(phase)) for phase in phases_deg]
        return [(phases, slip(turn, phases)) for phases in ridden]
    phases = ride(turn, numpy.radians(phases_deg), numpy)
    columns = [[numpy.broadcast_to(column, len(phases_deg)).tolist()
                for column in vars(record).values()]
               for record in (phases, slip(turn, phases, numpy))]
    return [(Phases(*row), Slip(*slips))
            for row, slips in zip(zip(*columns[0], strict=True), zip(*columns[1], strict=True),
                                  strict=True)]


def _state(row: Phases) -> str:
    if row.too_slow:
        return "too_slow"
    return "too_fast" if row.too_fast else state(row.grip_margin)


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


def reason(rows: dict[str, list[Any]], worst: int) -> dict[str, Any]:
    """What the verdict rests on, as codes: state, limit and where in the turn."""
    same = [at == rows["state"][worst] for at in rows["state"]]
    steady = len({round(value or 0.0, 9) for value in rows["lean_deg"]}) == 1
    zone = "whole" if all(same) and steady else rows["zone"][worst]
    return {"state": rows["state"][worst], "limit": rows["limit"][worst], "zone": zone}


def _zone(phase_deg: float) -> str:
    """Where a phase lies: within 10° of the fall line (assumed) is on it."""
    if phase_deg < 80:
        return "above"
    return "on" if phase_deg <= 100 else "below"


def path_m(turn: Turn, phases_deg: list[float]) -> dict[str, list[float]]:
    """The turn from above, m: x across the hill, y down the fall line in the plane of the snow.

    One point a phase, on the line or the board's own arc (:func:`snowhold.hold.own_arc_m`, which
    has a radius also where no carve balances).
    """
    phases_rad = [radians(phase) for phase in phases_deg]
    numpy = numpy_or_none()
    if turn.line_radius_m is not None:
        radii_m = [turn.line_radius_m] * len(phases_rad)
    elif numpy is None:
        radii_m = [own_arc_m(turn, phase_rad) for phase_rad in phases_rad]
    else:
        radii_m = own_arc_m(turn, numpy.array(phases_rad), numpy).tolist()
    x_m, y_m = [0.0], [0.0]
    for i in range(1, len(radii_m)):
        mean_m = (radii_m[i - 1] + radii_m[i]) / 2
        x_m.append(x_m[-1] + mean_m * (sin(phases_rad[i]) - sin(phases_rad[i - 1])))
        y_m.append(y_m[-1] + mean_m * (cos(phases_rad[i - 1]) - cos(phases_rad[i])))
    return {"x_m": x_m, "y_m": y_m}


def _or_none(number: float) -> float | None:
    return None if isnan(number) else float(number)


def _deg_or_none(angle_rad: float) -> float | None:
    return None if isnan(angle_rad) else degrees(angle_rad)
