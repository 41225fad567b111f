"""Which riders a board's stiffness suits, and which stiffness suits a rider.

A board suits where the radius that it carves, bent into this snow, is within a tenth of the
R_sc cos ε of hard snow. Curvature rises with the rider's force and falls with stiffness (a board so
limp that it touches at the bindings alone excepted), so each bound is crossed once in that
direction; it is looked for in finer and finer tables, whose cost is known beforehand.
"""

from __future__ import annotations

from collections.abc import Callable
from math import cos, exp

import numpy as np

from snowhold.beam import Array
from snowhold.bend import Board, groove, press, sidecut_curvature_pm
from snowhold.stiffness import STIFFNESSES_NM2
from snowhold.turn import RANGES

SUITS_SHARE = 0.10
"""Departure from R_sc cos ε, either way, up to which a board is said to suit. Assumed."""

SEARCH_NODES = 41
"""Nodes of the search. Assumed; its bounds differ from those of a fine mesh by about 1 %."""

MASSES_KG = RANGES["rider_mass_kg"]
"""Rider masses searched, those that a question may hold."""

Range = dict[str, float | None]
"""``min`` and ``max``; None at an end: it lies outside what was searched."""


def mass_range_kg(board: Board, stiffness_nm2: float, normal_per_kg: float, edge_rad: float,
                  lean_rad: float, hardness_npm3: float) -> Range | None:
    """Rider masses that a stiffness suits, kg; None: no mass does.

    ``normal_per_kg`` is the force normal to the snow per rider mass, N/kg.
    """
    def ratio(mass_kg: Array) -> Array:
        return hard_snow_ratio(board, np.full(mass_kg.size, stiffness_nm2),
                               mass_kg * normal_per_kg, edge_rad, lean_rad, hardness_npm3)

    # The lighter the rider, the wider the turn.
    return _suited(ratio, MASSES_KG, falling=False)


def stiffness_range_nm2(board: Board, normal_n: float, edge_rad: float, lean_rad: float,
                        hardness_npm3: float) -> Range | None:
    """Stiffnesses (EI at the middle) that suit a rider's force, N·m²; None: none does."""
    def ratio(stiffness_nm2: Array) -> Array:
        return hard_snow_ratio(board, stiffness_nm2, np.full(stiffness_nm2.size, normal_n),
                               edge_rad, lean_rad, hardness_npm3)

    return _suited(ratio, STIFFNESSES_NM2, falling=True)


def hard_snow_ratio(board: Board, stiffness_nm2: Array, normal_n: Array, edge_rad: float,
                    lean_rad: float, hardness_npm3: float) -> Array:
    """Carved curvature over that of hard snow, R_sc cos ε / R, one for each case.

    NaN where the solve did not converge or too little of the edge touches.
    """
    solution = press(board, stiffness_nm2, normal_n, edge_rad, lean_rad, hardness_npm3)
    curvature_pm = groove(board, solution, edge_rad).curvature_pm
    hard_pm = sidecut_curvature_pm(board) / cos(edge_rad)
    return np.where(solution.converged, curvature_pm / hard_pm, np.nan)


def _suited(ratio: Callable[[Array], Array], searched: tuple[float, float],
            falling: bool) -> Range | None:
    """The part of a range whose ratio lies within :data:`SUITS_SHARE`, on a logarithmic scale."""
    least, most = 1 / (1 + SUITS_SHARE), 1 / (1 - SUITS_SHARE)
    at = np.log(np.geomspace(*searched, 12))
    table = ratio(np.exp(at))
    fits = bool(((table >= least) & (table <= most)).any())
    # The bounds in the order in which they are met along the range.
    bounds = (most, least) if falling else (least, most)
    brackets = [_bracket(at, table, bound, falling) for bound in bounds]
    for _ in range(2):
        # Both brackets in one batch of solves.
        inside = [np.linspace(bracket[0][0], bracket[0][1], 7)
                  for bracket in brackets if bracket is not None]
        if not inside:
            break
        tables = np.split(ratio(np.exp(np.concatenate(inside))), len(inside))
        found = iter(zip(inside, tables, strict=True))
        brackets = [bracket and (_bracket(*next(found), bound, falling) or bracket)
                    for bracket, bound in zip(brackets, bounds, strict=True)]
    low, high = (None if bracket is None else _crossing(*bracket, bound)
                 for bracket, bound in zip(brackets, bounds, strict=True))
    if low is None and high is None and not fits:
        return None
    return {"min": low, "max": high}


Bracket = tuple[Array, Array]
"""Two neighbouring places, and the ratio at both."""


def _bracket(at: Array, table: Array, bound: float, falling: bool) -> Bracket | None:
    """The two neighbouring places between which the ratio rises through ``bound``, or falls
    through it; None: it does not."""
    known = np.isfinite(table)
    at, table = at[known], table[known]
    above = table > bound
    crosses = np.nonzero((above[:-1] == falling) & (above[1:] != falling))[0]
    if not crosses.size:
        return None
    pair = slice(int(crosses[0]), int(crosses[0]) + 2)
    return at[pair], table[pair]


def _crossing(at: Array, table: Array, bound: float) -> float:
    """Where a straight line between two places crosses ``bound``."""
    share = (bound - table[0]) / (table[1] - table[0])
    return exp(float(at[0] + share * (at[1] - at[0])))
