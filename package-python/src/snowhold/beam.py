"""A slender beam pressed into a foundation that can push but not pull.

The beam's deflection u(x) makes its bending energy plus the foundation's energy least:

    E(u) = ½ ∫ EI (u″ − u₀″)² dx + ∫ Φ(d(u)) dx − Σ P u,   d = sink·u + offset,

with u₀ the shape of the unloaded beam and dΦ/dd ∝ q(d), the force per length at depth d. The ends
are free and the rigid motion is part of u. Where q never falls with d, E is convex, so Newton's
method with a line search finds the one minimum from any start. Second differences on even nodes
(D₂ᵀ EI D₂) leave straight lines exactly unbent: force and moment balance hold on any mesh.

Everything is batched: the first axis of each array is the case, the second the node.

References
----------
[1] M. Hetényi, Beams on Elastic Foundation, 1946 (closed forms that the tests compare with).
"""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

Array = NDArray[np.float64]

Foundation = Callable[[Array], tuple[Array, Array]]
"""Force per length q(d) along the normal of the snow, N/m, and its slope dq/dd, N/m², at depths
d in m; both 0 out of contact, and q must never fall with d."""

CONVERGED_RESIDUAL = 1e-8
"""Largest force out of balance, at a node or in total, over the whole load, at which a solve
counts as converged."""

_WANTED_RESIDUAL = 1e-12
"""Newton goes on to here: its last step is nearly free and squares the error."""

_MOST_STEPS = 60
_MOST_HALVINGS = 40


@dataclass(frozen=True)
class Deflection:
    """Solution of :func:`deflect`.

    ``deflection_m`` u and ``depth_m`` d, m, and ``push_npm`` q, N/m, at each node; ``residual``
    (largest force out of balance, at a node or in total, over the load), ``balance`` (total push
    over total load, less 1), Newton's ``steps`` and ``converged`` for each case.
    """

    deflection_m: Array
    depth_m: Array
    push_npm: Array
    residual: Array
    balance: Array
    steps: NDArray[np.int64]
    converged: NDArray[np.bool_]


def nodes_m(length_m: float, count: int) -> Array:
    """``count`` even nodes on a beam of this length, 0 at its middle."""
    return np.linspace(-length_m / 2, length_m / 2, count)


def weights_m(x_m: Array) -> Array:
    """Trapezoid weights of even nodes, m: a sum with them is an integral along the beam."""
    weights = np.full(x_m.size, x_m[1] - x_m[0])
    weights[[0, -1]] *= 0.5
    return weights


def point_load(x_m: Array, at_m: float) -> Array:
    """Share of a point load at ``at_m``, on the beam, that each node carries.

    Linear between the two nodes beside it, so that force and moment are those of the load.
    """
    spacing = x_m[1] - x_m[0]
    share: Array = np.maximum(0.0, 1 - np.abs(x_m - at_m) / spacing)
    return share


def _second_difference(u: Array) -> Array:
    """D₂ u times the spacing squared, at the inner nodes."""
    difference: Array = u[:, :-2] - 2 * u[:, 1:-1] + u[:, 2:]
    return difference


def _spread_back(moments: Array) -> Array:
    """D₂ᵀ of values at the inner nodes, times the spacing squared."""
    force = np.zeros((len(moments), moments.shape[1] + 2))
    force[:, :-2] += moments
    force[:, 1:-1] -= 2 * moments
    force[:, 2:] += moments
    return force


def _bending_matrix(bend_npm: Array) -> Array:
    """D₂ᵀ EI D₂ for EI over the spacing cubed at the inner nodes, N/m."""
    rows = np.arange(bend_npm.shape[1])
    matrix = np.zeros((len(bend_npm), rows.size + 2, rows.size + 2))
    for i, left in enumerate((1.0, -2.0, 1.0)):
        for j, right in enumerate((1.0, -2.0, 1.0)):
            matrix[:, rows + i, rows + j] += left * right * bend_npm
    return matrix


def deflect(x_m: Array, stiffness_nm2: Array, free_shape_m: Array, load_n: Array, offset_m: Array,
            sink: Array, foundation: Foundation, start_m: Array) -> Deflection:
    """Deflection of beams pressed into a foundation.

    Parameters
    ----------
    x_m : even nodes, (nodes,).
    stiffness_nm2 : bending stiffness EI at the inner nodes, N·m², (cases, nodes − 2).
    free_shape_m : shape u₀ of the unloaded beam, m, (nodes,).
    load_n : load at each node along u, N, (cases, nodes).
    offset_m : depth of the undeflected, unloaded straight beam, m, (cases, nodes).
    sink : depth per deflection dd/du, (cases, 1), above 0.
    foundation : force per length and slope at a depth, in the unit of load per length along u.
    start_m : first guess of u, in contact along the whole beam, m, (cases, nodes).

    Never raises on a hard case: ``converged`` says whether forces balance. ``balance`` compares
    the foundation's total push with the total load.
    """
    weights = weights_m(x_m)
    bend_npm = stiffness_nm2 / (x_m[1] - x_m[0])**3
    stiffness = _bending_matrix(bend_npm)
    free_bend = _second_difference(free_shape_m[None, :])
    total_n = np.abs(load_n).sum(axis=1)
    diagonal = np.arange(x_m.size)
    # So small that it changes no figure; it keeps the matrix regular should contact be lost.
    stiffness[:, diagonal, diagonal] += 1e-14 * stiffness[:, diagonal, diagonal].max()

    def out_of_balance(u: Array) -> tuple[Array, Array]:
        push, slope = foundation(sink * u + offset_m)
        bending_n = _spread_back(bend_npm * (_second_difference(u) - free_bend))
        return bending_n + weights * push - load_n, weights * slope * sink

    def relative(force_n: Array) -> Array:
        # Bending moments add up to no force, so the sum is push less load.
        worst: Array = np.maximum(np.abs(force_n).max(axis=1), np.abs(force_n.sum(axis=1)))
        share: Array = worst / total_n
        return share

    u = start_m.copy()
    force, slope = out_of_balance(u)
    residual = relative(force)
    best_u, best_residual = u, residual
    steps = np.zeros(len(u), dtype=np.int64)
    done = residual <= _WANTED_RESIDUAL
    for _ in range(_MOST_STEPS):
        if done.all():
            break
        jacobian = stiffness.copy()
        jacobian[:, diagonal, diagonal] += slope
        step = -np.linalg.solve(jacobian, force[..., None])[..., 0]
        step[done] = 0.0
        descent = np.abs((force * step).sum(axis=1))
        rough = ~done & (residual > CONVERGED_RESIDUAL)
        for _ in range(_MOST_HALVINGS):
            trial_force, trial_slope = out_of_balance(u + step)
            # E is convex along the step: its slope rises from -descent through 0 at the least E.
            # A slope far above 0 means that the step went far past that.
            past = rough & ((trial_force * step).sum(axis=1) > 0.9 * descent)
            if not past.any():
                break
            step[past] *= 0.5
            descent[past] *= 0.5
        u, force, slope = u + step, trial_force, trial_slope
        before, residual = residual, relative(force)
        steps += ~done
        better = residual < best_residual
        best_u = np.where(better[:, None], u, best_u)
        best_residual = np.where(better, residual, best_residual)
        # Below the bound a step that does not help any more has met rounding.
        done |= best_residual <= _WANTED_RESIDUAL
        done |= (best_residual <= CONVERGED_RESIDUAL) & (residual > 0.25 * before)

    depth = sink * best_u + offset_m
    push, _ = foundation(depth)
    balance = (weights * push).sum(axis=1) / load_n.sum(axis=1) - 1
    converged = best_residual <= CONVERGED_RESIDUAL
    return Deflection(best_u, depth, push, best_residual, balance, steps, converged)
