"""A board's bend under its rider, as figures of an answer."""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from math import cos, degrees, isfinite, radians
from typing import Any

import numpy as np

from snowhold.balance import normal_force_n
from snowhold.beam import Array, Deflection, nodes_m
from snowhold.bend import (
    NODES,
    Board,
    contact_parts,
    groove,
    load_factor,
    press,
    sidecut_curvature_pm,
)
from snowhold.shape import width_m
from snowhold.snow import SNOWS
from snowhold.suit import SEARCH_NODES, SUITS_SHARE, mass_range_kg, stiffness_range_nm2

OVAL_SHARE = 0.10
"""Local radii further apart than this share of their mean cut an oval: the tail skids out of the
groove. Assumed."""

_FLAT_PM = 1e-3
"""Curvature below which a groove is called straight and has no radius (1 km). Assumed."""


def answers(values: Mapping[str, Any], along: Sequence[tuple[float, float]],
            bindings_m: tuple[float, float]) -> dict[str, Any]:
    """Those keys of a board's answer that rest on its bend.

    ``values`` are checked values of a board question, ``along`` the stations of its outline.
    """
    fine, coarse = (board_of(values, along, bindings_m, nodes) for nodes in (NODES, SEARCH_NODES))
    edge_rad = radians(values["edge_angle_deg"])
    lean_rad = edge_rad - radians(values["angulation_deg"])
    normal_n = normal_force_n(values["rider_mass_kg"], radians(values["pitch_deg"]))
    hardness_npm3 = SNOWS[values["snow"]].hardness_npm3.value
    stiffness_nm2 = values["stiffness_nm2"]
    masses_kg = None
    if stiffness_nm2 is not None:
        masses_kg = mass_range_kg(coarse, stiffness_nm2, normal_n / values["rider_mass_kg"],
                                  edge_rad, lean_rad, hardness_npm3)
    return {
        "hard_snow_radius_m": cos(edge_rad) / sidecut_curvature_pm(fine),
        "bend": None if stiffness_nm2 is None else bite(
            fine, stiffness_nm2, normal_n, edge_rad, lean_rad, hardness_npm3),
        "mass_range_kg": masses_kg,
        "stiffness_range_nm2": stiffness_range_nm2(coarse, normal_n, edge_rad, lean_rad,
                                                   hardness_npm3),
    }


def board_of(values: Mapping[str, Any], along: Sequence[tuple[float, float]],
             bindings_m: tuple[float, float], nodes: int) -> Board:
    """The board that checked question values describe, on this many nodes."""
    x_m = nodes_m(values["effective_edge_m"], nodes)
    proud_m = np.array([width_m(along, at_m) for at_m in x_m.tolist()]) / 2
    shape = values["stiffness_shape"]
    return Board(x_m, proud_m - proud_m.min(),
                 np.interp(x_m, np.linspace(x_m[0], x_m[-1], len(shape)), shape),
                 values["camber_m"], bindings_m, values["front_share"])


def bite(board: Board, stiffness_nm2: float, normal_n: float, edge_rad: float, lean_rad: float,
         hardness_npm3: float) -> dict[str, Any]:
    """The groove that a board bends into the snow.

    * ``edge_angle_deg``, ``lean_deg``, ``normal_n``: what it is bent by.
    * ``converged``, ``residual`` (largest force out of balance over the load), ``force_balance``
      (Σ q_N/N − 1), ``steps``: how the solve ended. Where it has not converged every figure below
      is null.
    * ``turn_radius_m`` fitted over the contact, null where the groove is straight;
      ``over_hard_snow`` that radius over R_sc cos ε; ``fit`` "suits" within
      :data:`snowhold.suit.SUITS_SHARE`, "too_stiff" where it is wider, "too_soft" where it is
      tighter.
    * ``local_radius_m``: ``rear``, ``middle``, ``front`` third of the span in contact, null where
      it is straight or hardly touches; ``oval`` true where they differ by more than
      :data:`OVAL_SHARE` of their mean, or one is null; ``oval_share`` that difference, null with
      a null radius.
    * ``contact_length_m``, ``contact`` [{``from_m``, ``to_m``}] and ``max_depth_m``.
    * ``picture``: ``at_m``, ``depth_m`` (negative: in the air), ``push_npm`` q_N, at the nodes.
    """
    solution = press(board, np.array([stiffness_nm2]), np.array([normal_n]), edge_rad, lean_rad,
                     hardness_npm3)
    reply: dict[str, Any] = {
        "edge_angle_deg": degrees(edge_rad), "lean_deg": degrees(lean_rad), "normal_n": normal_n,
        "converged": bool(solution.converged[0]), "residual": _number(solution.residual[0]),
        "force_balance": _number(solution.balance[0]), "steps": int(solution.steps[0]),
    }
    if not reply["converged"]:
        return reply | dict.fromkeys((
            "turn_radius_m", "over_hard_snow", "fit", "local_radius_m", "oval", "oval_share",
            "contact_length_m", "contact", "max_depth_m", "picture"))
    cut = groove(board, solution, edge_rad)
    hard_snow_m = cos(edge_rad) / sidecut_curvature_pm(board)
    radius_m = _radius_m(float(cut.curvature_pm[0]))
    thirds_m = [_radius_m(curvature) for curvature in cut.third_curvature_pm[0].tolist()]
    known_m = [third_m for third_m in thirds_m if third_m is not None]
    share = (max(known_m) - min(known_m)) * 3 / sum(known_m) if len(known_m) == 3 else None
    return reply | {
        "turn_radius_m": radius_m,
        "over_hard_snow": None if radius_m is None else radius_m / hard_snow_m,
        "fit": fit(radius_m, hard_snow_m),
        "local_radius_m": dict(zip(("rear", "middle", "front"), thirds_m, strict=True)),
        "oval": share is None or share > OVAL_SHARE,
        "oval_share": share,
        "contact_length_m": float(cut.contact_m[0]),
        "contact": _contact(board.x_m, solution),
        "max_depth_m": float(solution.depth_m[0].max()),
        "picture": {
            "at_m": board.x_m.tolist(), "depth_m": solution.depth_m[0].tolist(),
            "push_npm": (solution.push_npm[0] / load_factor(edge_rad, lean_rad)).tolist()},
    }


def fit(radius_m: float | None, hard_snow_m: float) -> str:
    """How a carved radius (None: straight) compares with that of hard snow."""
    if radius_m is None or radius_m > (1 + SUITS_SHARE) * hard_snow_m:
        return "too_stiff"
    return "too_soft" if radius_m < (1 - SUITS_SHARE) * hard_snow_m else "suits"


def _contact(x_m: Array, solution: Deflection) -> list[dict[str, float]]:
    """The stretches of edge in contact, from tail to nose."""
    starts, ends = (part[0].tolist() for part in contact_parts(solution.depth_m))
    cell_m = float(x_m[1] - x_m[0])
    stretches: list[dict[str, float]] = []
    joined = False
    for left_m, start, end in zip(x_m.tolist(), starts, ends, strict=False):
        if end <= start:
            joined = False
            continue
        if joined and start == 0:
            stretches[-1]["to_m"] = left_m + cell_m * end
        else:
            stretches.append({"from_m": left_m + cell_m * start, "to_m": left_m + cell_m * end})
        joined = end == 1
    return stretches


def _radius_m(curvature_pm: float) -> float | None:
    """1/curvature, None where the line is straight, bent outward or unknown."""
    return 1 / curvature_pm if curvature_pm > _FLAT_PM else None


def _number(value: float) -> float | None:
    return float(value) if isfinite(value) else None
