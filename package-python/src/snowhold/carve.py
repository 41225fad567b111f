"""The balanced carve: the edge angle at which the turn that the board carves balances the rider.

With κ = v²/(R_sc g cos α), t = tan α cos φ and angulation a (ε = λ + a), balance on the carved
radius R_sc cos ε reads tan λ = κ/cos(λ + a) − t [1]. With u = tan λ and
cos(λ + a) = (cos a − u sin a) cos λ it becomes

    P(u) = (u + t)(cos a − u sin a) − κ √(1 + u²) = 0,

which is concave in u for a ≥ 0. The smallest root is the carve; the other leans further and is
unstable in practice. P ≥ 0 at λ = 0 means that gravity alone turns tighter than the flattest
carve: *too slow*. P < 0 everywhere: *too fast*.

For a = 0 the carve is ε = asin(κ/√(1 + t²)) − atan t, as long as that is below 90°.

References
----------
[1] U. D. Jentschura and F. Fahrbach, Physics of Skiing: The Ideal-Carving Equation and Its
    Applications, Can. J. Phys. 82 (2004) 249-261, arXiv physics/0310086.
"""

from __future__ import annotations

from snowhold import scalars
from snowhold.constants import G0_MPS2
from snowhold.scalars import Namespace, Value

LEAST_LEAN_RAD = 1e-9
"""A lean below this is no lean, and the phase is too slow: a margin needs a force to compare with.
Assumed; a billionth of a radian is nothing on a hill."""

_STEPS = 60
"""Newton steps at the most: next to a double root each one only halves the distance."""

_SMALL_ANGULATION_RAD = 1e-6
"""Below this the fastest carve is that of no angulation: the two differ by less than 1e-5."""


def carve_number(speed_mps: Value, sidecut_radius_m: Value, pitch_rad: Value,
                 xp: Namespace = scalars) -> Value:
    """κ = v²/(R_sc g cos α), dimensionless: turning force at the sidecut's radius over normal."""
    return speed_mps**2 / (sidecut_radius_m * G0_MPS2 * xp.cos(pitch_rad))


def fall_line_pull(pitch_rad: Value, phase_rad: Value, xp: Namespace = scalars) -> Value:
    """t = tan α cos φ, dimensionless: gravity's pull toward the turn's centre over normal."""
    return xp.tan(pitch_rad) * xp.cos(phase_rad)


def carve_number_of(tan_lean: Value, pull: Value, angulation_rad: Value,
                    xp: Namespace = scalars) -> Value:
    """The κ that a lean balances on the carved radius, (u + t)(cos a − u sin a)/√(1 + u²): P = 0.
    """
    return ((tan_lean + pull) * (xp.cos(angulation_rad) - tan_lean * xp.sin(angulation_rad))
            / xp.sqrt(1 + tan_lean**2))


def balanced_lean(speed_mps: Value, sidecut_radius_m: Value, pitch_rad: Value, phase_rad: Value,
                  angulation_rad: Value, xp: Namespace = scalars) -> tuple[Value, Value, Value]:
    """Lean of the balanced carve: ``(lean_rad, too_slow, too_fast)``.

    ``lean_rad`` is NaN where a flag is true. Valid for pitch and angulation up to 50° and 40°:
    there P rises through λ = 0, so that a negative root shows as P(0) ≥ 0. A negative angulation
    is past the platform limit whatever the root; Newton's iteration then usually finds it, and
    calls the phase too fast where it does not.
    """
    kappa = carve_number(speed_mps, sidecut_radius_m, pitch_rad, xp)
    pull = fall_line_pull(pitch_rad, phase_rad, xp)
    tan_a = xp.tan(angulation_rad)
    too_slow = xp.logical_or(kappa <= pull * xp.cos(angulation_rad), kappa < pull - tan_a)
    first_root = _first_root if xp is scalars else _first_roots
    tan_lean, too_fast = first_root(kappa, pull, xp.sin(angulation_rad), xp.cos(angulation_rad),
                                    xp.maximum(0.0, -tan_a), too_slow)
    lean_rad = xp.atan(tan_lean)
    balanced = xp.logical_not(xp.logical_or(too_slow, too_fast))
    too_slow = xp.logical_or(too_slow, xp.logical_and(balanced, lean_rad <= LEAST_LEAN_RAD))
    return xp.where(xp.logical_or(too_slow, too_fast), xp.nan, lean_rad), too_slow, too_fast


def _newton_step(tan_lean: Value, kappa: Value, pull: Value, sin_a: Value, cos_a: Value,
                 xp: Namespace) -> tuple[Value, Value, Value]:
    """Newton's step for P from ``tan_lean``: ``(step, rising, worth taking)``.

    P is concave for a ≥ 0 and negative at the start, so the steps grow toward the first root
    without passing it (a step back is rounding); a slope that is no longer positive shows that
    there is none.
    """
    root = xp.sqrt(1 + tan_lean**2)
    value = (tan_lean + pull) * (cos_a - tan_lean * sin_a) - kappa * root
    slope = cos_a - (2 * tan_lean + pull) * sin_a - kappa * tan_lean / root
    rising = slope > 0
    step = -value / xp.where(rising, slope, 1.0)
    forward = xp.where(sin_a >= 0, step, abs(step))
    return step, rising, xp.logical_and(rising, forward > 1e-15 * (1 + tan_lean))


def _first_root(kappa: float, pull: float, sin_a: float, cos_a: float, start: float,
                skip: bool) -> tuple[float, bool]:
    """Smallest root of P from ``start`` up, and whether there is none, for plain floats."""
    tan_lean, rising, worth = start, True, not skip
    for _ in range(_STEPS):
        if not worth:
            break
        step, rising, worth = _newton_step(tan_lean, kappa, pull, sin_a, cos_a, scalars)
        if worth:
            tan_lean += step
    return tan_lean, not rising


def _first_roots(kappa: Value, pull: Value, sin_a: Value, cos_a: Value, start: Value,
                 skip: Value) -> tuple[Value, Value]:
    """:func:`_first_root` for arrays: each step is taken only by those that still move."""
    import numpy as np

    shape = np.broadcast_shapes(*(np.shape(v) for v in (kappa, pull, sin_a, skip)))
    tan_lean, none = np.empty(shape), np.zeros(shape, dtype=bool)
    tan_lean[...] = start
    roots, missing = tan_lean.reshape(-1), none.reshape(-1)
    moving = np.flatnonzero(~np.broadcast_to(skip, shape).reshape(-1))
    given = [np.broadcast_to(v, shape).reshape(-1)[moving] for v in (kappa, pull, sin_a, cos_a)]
    for _ in range(_STEPS):
        kappa_now, pull_now, sin_now, cos_now = given
        step, rising, worth = _newton_step(roots[moving], kappa_now, pull_now, sin_now, cos_now,
                                           np)
        missing[moving[~rising]] = True
        moving, given = moving[worth], [v[worth] for v in given]
        if not moving.size:
            break
        roots[moving] += step[worth]
    return tan_lean, none


def slowest_mps(sidecut_radius_m: Value, pitch_rad: Value, phase_rad: Value,
                angulation_rad: Value, xp: Namespace = scalars) -> Value:
    """Speed above which a balanced carve leans into the turn, m/s; 0 from the fall line on.

    v² = R_sc g cos α · max(t, 0) cos a: the carve number at which P(0) = 0.
    """
    pull = xp.maximum(0.0, fall_line_pull(pitch_rad, phase_rad, xp))
    return xp.sqrt(sidecut_radius_m * G0_MPS2 * xp.cos(pitch_rad) * pull * xp.cos(angulation_rad))


def fastest(sidecut_radius_m: Value, pitch_rad: Value, phase_rad: Value, angulation_rad: Value,
            xp: Namespace = scalars) -> tuple[Value, Value]:
    """Highest speed with a balanced carve, m/s, and the edge angle ε there, rad.

    The greatest κ for which P has a root is that of the u > 0 at which
    (u + t)(cos a − u sin a)/√(1 + u²) is stationary: the one positive root of
    u³ sin a + u (2 sin a + t cos a) − (cos a − t sin a), a convex cubic there, so that Newton's
    steps from ε = 90° fall to it without passing it. For a = 0: κ = √(1 + t²) above the fall
    line, and κ → 1 as ε → 90° from the fall line on (R_sc cos ε would be negative past 90°).
    """
    pull = fall_line_pull(pitch_rad, phase_rad, xp)
    angulated = angulation_rad > _SMALL_ANGULATION_RAD
    a_rad = xp.where(angulated, angulation_rad, 1.0)
    sin_a, cos_a, tan_a = xp.sin(a_rad), xp.cos(a_rad), xp.tan(a_rad)
    tan_lean = 1 / tan_a + 0.0 * pull
    for _ in range(100):
        value = (sin_a * tan_lean**2 + 2 * sin_a + pull * cos_a) * tan_lean - cos_a + pull * sin_a
        slope = 3 * sin_a * tan_lean**2 + 2 * sin_a + pull * cos_a
        step = value / slope
        tan_lean = tan_lean - step
        if not xp.any(step > 1e-15 * tan_lean):
            break
    kappa_angulated = carve_number_of(tan_lean, pull, a_rad, xp)
    above = pull > 0
    kappa_straight = xp.where(above, xp.sqrt(1 + pull**2), 1.0)
    edge_straight = xp.where(above, xp.pi / 2 - xp.atan(pull), xp.pi / 2)

    kappa = xp.where(angulated, kappa_angulated, kappa_straight)
    edge_rad = xp.where(angulated, xp.atan(tan_lean) + a_rad, edge_straight)
    return xp.sqrt(kappa * sidecut_radius_m * G0_MPS2 * xp.cos(pitch_rad)), edge_rad


def speed_window_mps(sidecut_radius_m: Value, pitch_rad: Value, from_phase_rad: Value,
                     angulation_rad: Value, xp: Namespace = scalars) -> tuple[Value, Value]:
    """Slowest and fastest speed that carve the whole turn, m/s; no speed does where they cross.

    The turn runs from φ = ``from_phase_rad`` to 180° less it. Both bounds fall with φ, so the
    first phase sets the slowest and the last the fastest speed.
    """
    slowest = slowest_mps(sidecut_radius_m, pitch_rad, from_phase_rad, angulation_rad, xp)
    fastest_mps, _ = fastest(sidecut_radius_m, pitch_rad, xp.pi - from_phase_rad,
                             angulation_rad, xp)
    return slowest, fastest_mps
