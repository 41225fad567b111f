"""How much force toward the turn's centre the edge can take, and what gives first.

Four limits: the *platform* (the resultant must press into the base, not slide off it), the
*snow* (the groove's wall shears off), the *boot* (past the drag angle it lifts the edge out) and
the *rider* (what the legs carry). The least of them is the capacity; grip margin is
capacity / needed force − 1.

References
----------
[1] Platform rule of ski technique, the "90° rule": common practice, no source; as an equation
    also in U. D. Jentschura and F. Fahrbach, Can. J. Phys. 82 (2004) 249-261.
[2] M. Mössner et al., Measurement of mechanical properties of snow for simulation of skiing,
    J. Glaciology 59 (2013): penetration force is displaced volume times hardness H_V; shear
    force at failure is depth times length times failure shear stress S_f.
"""

from __future__ import annotations

from snowhold import scalars
from snowhold.constants import G0_MPS2, GROOMED_ROUGHNESS_M, HOLDS_MARGIN
from snowhold.scalars import Namespace, Value

LIMITS = ("platform", "snow", "boot", "rider")
"""The four limits, in the order in which :func:`least_capacity` numbers them."""

STATES = ("washes_out", "too_fast", "too_slow", "marginal", "holds")
"""States of a phase, worst first."""

def penetration_m(normal_force_n: Value, effective_edge_m: Value, edge_angle_rad: Value,
                  hardness_npm3: Value, xp: Namespace = scalars) -> Value:
    """Depth to which the edge sinks, m, for 0 ≤ ε < 90°.

    An edge at ε that is e deep displaces e²/(2 tan ε) per length; times H_V it carries N/L [2]:
    e = √(2 (N/L) tan ε / H_V).
    """
    return xp.sqrt(2 * normal_force_n * xp.tan(edge_angle_rad)
                   / (effective_edge_m * hardness_npm3))


def platform_capacity_n(normal_force_n: Value, edge_angle_rad: Value,
                        xp: Namespace = scalars) -> Value:
    """Force that a frictionless base takes before the resultant slides off it: N tan ε [1], N."""
    return normal_force_n * xp.tan(edge_angle_rad)


def snow_capacity_n(penetration_m: Value, effective_edge_m: Value,
                    shear_strength_pa: Value) -> Value:
    """Force at which the groove's wall shears off: S_f e L [2], N."""
    return shear_strength_pa * penetration_m * effective_edge_m


def rider_capacity_n(mass_kg: Value, pitch_rad: Value, max_load_g: Value,
                     xp: Namespace = scalars) -> Value:
    """Force at which the load reaches what the legs carry: m g √(n_max² − cos² α), N.

    n_max above 1. The default of 2 and its range 1.5 to 3 are assumed.
    """
    return mass_kg * G0_MPS2 * xp.sqrt(max_load_g**2 - xp.cos(pitch_rad)**2)


def least_capacity(normal_force_n: Value, edge_angle_rad: Value, mass_kg: Value,
                   pitch_rad: Value, effective_edge_m: Value, max_load_g: Value,
                   hardness_npm3: Value, shear_strength_pa: Value,
                   drag_angle_rad: float | None = None,
                   xp: Namespace = scalars) -> tuple[Value, Value, Value]:
    """Capacity, the limit that sets it and the edge's depth:
    ``(capacity_n, limit_index, penetration_m)``.

    ``limit_index`` counts in :data:`LIMITS`. Without a ``drag_angle_rad`` the boot never drags.
    A base tilted away from the turn (ε < 0), or by 90° or more so that it no longer faces the
    snow, carries nothing (assumed), and its depth is NaN.
    """
    faces_snow = xp.logical_and(edge_angle_rad >= 0, edge_angle_rad < xp.pi / 2)
    edge_rad = xp.where(faces_snow, edge_angle_rad, 0.0)
    depth_m = penetration_m(normal_force_n, effective_edge_m, edge_rad, hardness_npm3, xp)
    boot_n = xp.inf
    if drag_angle_rad is not None:
        boot_n = xp.where(edge_angle_rad > drag_angle_rad, 0.0, xp.inf)
    # Where the base does not face the snow both of the first two are 0, the platform first.
    capacities_n = (
        platform_capacity_n(normal_force_n, edge_rad, xp),
        snow_capacity_n(depth_m, effective_edge_m, shear_strength_pa),
        boot_n,
        rider_capacity_n(mass_kg, pitch_rad, max_load_g, xp),
    )
    capacity_n, limit_index = capacities_n[0], 0
    for index, candidate_n in enumerate(capacities_n[1:], start=1):
        less = candidate_n < capacity_n
        capacity_n = xp.where(less, candidate_n, capacity_n)
        limit_index = xp.where(less, index, limit_index)
    return capacity_n, limit_index, xp.where(faces_snow, depth_m, xp.nan)


def grip_margin(capacity_n: Value, centre_force_n: Value) -> Value:
    """Grip margin: capacity over needed force, less 1, for a needed force above 0."""
    return capacity_n / centre_force_n - 1


def limit_lean_rad(lean_rad: Value, grip_margin: Value, xp: Namespace = scalars) -> Value:
    """Lean at which this edge would give, rad: tan λ grown by the margin, at an unchanged force
    square to the snow."""
    return xp.atan((1 + grip_margin) * xp.tan(lean_rad))


def state(grip_margin: float) -> str:
    """State of a balanced phase by its grip margin: holds, marginal or washes_out."""
    if grip_margin >= HOLDS_MARGIN:
        return "holds"
    return "marginal" if grip_margin >= 0 else "washes_out"


def clearance_angle_rad(penetration_m: Value, width_m: Value,
                        roughness_m: Value = GROOMED_ROUGHNESS_M,
                        xp: Namespace = scalars) -> Value:
    """Least edge angle that keeps the leading edge of a drifting board clear of the snow, rad.

    Over the board's width W the tilt must lift the far edge above the base's sinking e and the
    surface's roughness r: ε > asin((e + r)/W); plain geometry, r assumed. NaN where e + r > W:
    no tilt clears it.
    """
    lift = (penetration_m + roughness_m) / width_m
    return xp.where(lift <= 1, xp.asin(xp.where(lift <= 1, lift, 0.0)), xp.nan)


def edge_catch_rad(normal_force_n: float, effective_edge_m: float, width_m: float,
                   hardness_npm3: float, roughness_m: float) -> float:
    """Edge angle from which the leading edge is clear at the depth that very angle gives, rad.

    NaN where no tilt clears it.
    """
    angle_rad = 0.0
    # Steeper is deeper and deeper asks for steeper, ever less so: from below the steps rise to
    # the answer.
    for _ in range(60):
        depth_m = penetration_m(normal_force_n, effective_edge_m, angle_rad, hardness_npm3)
        next_rad = float(clearance_angle_rad(depth_m, width_m, roughness_m))
        if not next_rad - angle_rad > 1e-12:
            return next_rad
        angle_rad = next_rad
    return angle_rad


def least_edge_rad(lean_rad: Value, normal_force_n: Value, effective_edge_m: Value,
                   hardness_npm3: Value, shear_strength_pa: Value, margin: float,
                   xp: Namespace = scalars) -> Value:
    """Flattest edge at which platform and snow hold a lean with ``margin``, rad.

    Platform: tan ε ≥ k tan λ. Snow: S_f e L ≥ k N tan λ, with e from the edge's sinking, is
    tan ε ≥ k² tan²λ H_V N/(2 S_f² L). k is 1 + margin.
    """
    tan_lean = (1 + margin) * xp.tan(lean_rad)
    crush = hardness_npm3 * normal_force_n / (2 * shear_strength_pa**2 * effective_edge_m)
    return xp.atan(xp.maximum(tan_lean, crush * tan_lean**2))
