"""The board bent into the snow: the groove that its edge cuts.

x along the edge from its middle, nose positive. The edge stands y(x) proud in the base plane, u is
the board's deflection normal to its base, into the snow. Tilted by ε the edge is
d = u cos ε + y sin ε deep, where it meets the snow, and the line that it draws in the snow is
y cos ε − u sin ε. Snow pushes back per length with q_N = H_V d²/(2 tan ε) [1], normal to the snow;
with the lean λ of a balanced rider that loads the board normal to its base by
q_N (cos ε + tan λ sin ε), and the rider's normal force N, by the same factor, loads it at the two
bindings.

On hard snow the whole edge touches and the radius is R_sc cos ε [2]. A board that is too stiff
for its rider does not bend that far; one that is too soft folds at the bindings.

References
----------
[1] M. Mössner et al., Measurement of mechanical properties of snow for simulation of skiing,
    J. Glaciology 59 (2013): penetration force is displaced volume times hardness H_V.
[2] U. D. Jentschura and F. Fahrbach, Can. J. Phys. 82 (2004) 249-261, arXiv physics/0310086.
"""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from snowhold import grip
from snowhold.beam import Array, Deflection, Foundation, deflect, point_load

NODES = 81
"""Nodes along the edge. Assumed; halving the mesh changes the carved radius by less than 0.1 %."""


@dataclass(frozen=True)
class Board:
    """What bends, at even nodes.

    ``x_m`` nodes and ``proud_m`` y at them, m; ``stiffness_shape`` EI over its value at the middle
    at the nodes; ``camber_m`` height of the middle above the ends of the unloaded board (negative:
    reverse camber), taken as a parabola; ``bindings_m`` rear and front binding's x;
    ``front_share`` of the rider's weight on the front one.
    """

    x_m: Array
    proud_m: Array
    stiffness_shape: Array
    camber_m: float
    bindings_m: tuple[float, float]
    front_share: float


def crushed_snow(hardness_npm3: float, edge_rad: float, factor: float) -> Foundation:
    """Snow as a foundation: q = factor · H_V d²/(2 tan ε), N/m [1], 0 out of contact."""
    stiffness = factor * hardness_npm3 / (2 * np.tan(edge_rad))

    def push(depth_m: Array) -> tuple[Array, Array]:
        pressed = np.maximum(depth_m, 0.0)
        return stiffness * pressed**2, 2 * stiffness * pressed

    return push


def load_factor(edge_rad: float, lean_rad: float) -> float:
    """Force normal to the base over force normal to the snow, cos ε + tan λ sin ε."""
    return float(np.cos(edge_rad) + np.tan(lean_rad) * np.sin(edge_rad))


def press(board: Board, stiffness_nm2: Array, normal_n: Array, edge_rad: float, lean_rad: float,
          hardness_npm3: float) -> Deflection:
    """Press a board into snow, once for each entry of ``stiffness_nm2`` (EI at the middle, N·m²)
    and ``normal_n`` (N, in N), both (cases,); 0 < ε < 90°.

    The result's ``push_npm`` is along the board's deflection; over cos ε + tan λ sin ε it is q_N.
    Its ``balance`` is the same for both: Σ q_N over N, less 1.
    """
    x_m = board.x_m
    factor = load_factor(edge_rad, lean_rad)
    rear_m, front_m = board.bindings_m
    share = ((1 - board.front_share) * point_load(x_m, rear_m)
             + board.front_share * point_load(x_m, front_m))
    length_m = x_m[-1] - x_m[0]
    free_m = -board.camber_m * (1 - (2 * x_m / length_m)**2)
    offset_m = board.proud_m * np.sin(edge_rad) + np.zeros((len(normal_n), 1))
    mean_depth_m = grip.penetration_m(normal_n, length_m, edge_rad, hardness_npm3, np)
    start_m = (mean_depth_m[:, None] - offset_m) / np.cos(edge_rad)
    return deflect(
        x_m, stiffness_nm2[:, None] * board.stiffness_shape[1:-1], free_m,
        factor * normal_n[:, None] * share, offset_m, np.cos(edge_rad),
        crushed_snow(hardness_npm3, edge_rad, factor), start_m)


def contact_parts(depth_m: Array) -> tuple[Array, Array]:
    """Part of each cell between neighbouring nodes that is in contact: its ``(from, to)``, 0 to 1.

    Depth is linear between nodes. (cases, nodes) → two of (cases, nodes − 1).
    """
    left, right = depth_m[:, :-1], depth_m[:, 1:]
    crosses = (left > 0) != (right > 0)
    crossing = np.where(crosses, left / np.where(crosses, left - right, 1.0), 0.0)
    start = np.where(left > 0, 0.0, np.where(right > 0, crossing, 0.0))
    end = np.where(right > 0, 1.0, np.where(left > 0, crossing, 0.0))
    return start, end


def part_weights_m(x_m: Array, start: Array, end: Array) -> Array:
    """Weights of the nodes in an integral over these parts of the cells, m, linear in between."""
    spacing = x_m[1] - x_m[0]
    right = spacing * (end**2 - start**2) / 2
    left = spacing * (end - start) - right
    weights = np.zeros((len(start), x_m.size))
    weights[:, :-1] += left
    weights[:, 1:] += right
    return weights


def fitted_curvature_pm(x_m: Array, line_m: Array, weights_m: Array) -> Array:
    """Curvature of the parabola fitted to a line by least squares, 1/m; NaN for too few points.

    ``line_m`` and ``weights_m`` are (cases, nodes).
    """
    total = weights_m.sum(axis=1, keepdims=True)
    few = (np.count_nonzero(weights_m > 0, axis=1) < 4) | (total[:, 0] <= 0)
    weights = np.where(few[:, None], 1.0, weights_m)
    total = weights.sum(axis=1, keepdims=True)
    centred = x_m - (weights * x_m).sum(axis=1, keepdims=True) / total
    # Orthogonal polynomials: the quadratic's coefficient comes alone, and well conditioned.
    second = (weights * centred**2).sum(axis=1, keepdims=True)
    third = (weights * centred**3).sum(axis=1, keepdims=True)
    quadratic = centred**2 - third / second * centred - second / total
    coefficient = ((weights * quadratic * line_m).sum(axis=1)
                   / (weights * quadratic**2).sum(axis=1))
    return np.where(few, np.nan, 2 * coefficient)


def line_in_snow_m(board: Board, deflection_m: Array, edge_rad: float) -> Array:
    """Line that the edge draws in the snow plane, y cos ε − u sin ε, m."""
    line: Array = board.proud_m * np.cos(edge_rad) - deflection_m * np.sin(edge_rad)
    return line


@dataclass(frozen=True)
class Groove:
    """What the edge of a pressed board cuts, one entry a case; NaN where a part of the edge has
    too little contact to tell.

    ``curvature_pm`` of the parabola fitted to the edge's line over all of its contact, and
    ``third_curvature_pm`` (cases, 3) over the rear, middle and front third of the span from its
    first to its last contact, 1/m; ``contact_m`` length in contact.
    """

    curvature_pm: Array
    third_curvature_pm: Array
    contact_m: Array


def groove(board: Board, solution: Deflection, edge_rad: float) -> Groove:
    """The groove that a pressed board's edge cuts."""
    x_m = board.x_m
    line_m = line_in_snow_m(board, solution.deflection_m, edge_rad)
    start, end = contact_parts(solution.depth_m)
    weights = part_weights_m(x_m, start, end)
    touched = end > start
    cell_m = x_m[1] - x_m[0]
    first_m = np.where(touched, x_m[:-1] + cell_m * start, np.inf).min(axis=1, keepdims=True)
    last_m = np.where(touched, x_m[:-1] + cell_m * end, -np.inf).max(axis=1, keepdims=True)
    thirds = []
    for index in range(3):
        from_m = first_m + (last_m - first_m) * index / 3
        to_m = first_m + (last_m - first_m) * (index + 1) / 3
        inside_start = np.clip((from_m - x_m[:-1]) / cell_m, start, end)
        inside_end = np.clip((to_m - x_m[:-1]) / cell_m, start, end)
        thirds.append(fitted_curvature_pm(
            x_m, line_m, part_weights_m(x_m, inside_start, inside_end)))
    return Groove(fitted_curvature_pm(x_m, line_m, weights), np.stack(thirds, axis=1),
                  weights.sum(axis=1))


def sidecut_curvature_pm(board: Board) -> float:
    """Curvature of the parabola fitted to the whole edge in the base plane, 1/m.

    On hard snow the board carves this over cos ε, whatever its outline.
    """
    whole = np.ones((1, board.x_m.size - 1))
    weights = part_weights_m(board.x_m, 0 * whole, whole)
    return float(fitted_curvature_pm(board.x_m, board.proud_m[None, :], weights)[0])
