"""The drifted turn: the tightest line that holds at a speed.

Above the carve's speed a rider lets the edge drift outward on a line wider than the board's own
arc. On a line of radius R the lean follows from balance, ε = λ + a, and the four limits are those
of a carve. The force perpendicular to the snow is the same at every phase, so each limit is a
limit of lean alone: one largest lean serves the whole turn, and each phase turns it into a radius.

With u = tan λ = F/N and k = 1 + the margin asked for, all that follow are exact:

* platform, tan(λ + a) ≥ k tan λ: sin(2λ + a) ≤ sin a (k + 1)/(k − 1). Beyond the first lean that
  breaks this the platform can hold again; those leans are not used, since wider lines fail.
* snow, S_f e L ≥ k N u with e from the edge's sinking: C u² (1 − u tan a) ≤ u + tan a, where
  C = k² H_V N/(2 S_f² L).
* boot: λ ≤ drag angle − a.
* rider: u ≤ √(n_max² − cos² α)/(k cos α).
"""

from __future__ import annotations

from math import asin, atan, cos, inf, pi, sin, sqrt, tan

from snowhold.constants import G0_MPS2, HOLDS_MARGIN

_ROUNDING = 1e-9
"""Share by which a line is widened, so that rounding cannot tip it over its own limit."""


def largest_lean(pitch_rad: float, angulation_rad: float, normal_force_n: float,
                 effective_edge_m: float, max_load_g: float, hardness_npm3: float,
                 shear_strength_pa: float, drag_angle_rad: float | None = None,
                 margin: float = HOLDS_MARGIN) -> float:
    """Largest lean such that it and every smaller one hold with ``margin``, rad.

    0 or less: no lean holds. Never past ε = 90°, where the base turns away from the snow.
    ``angulation_rad`` and ``margin`` from 0.
    """
    need = 1 + margin
    leans_rad = [pi / 2 - angulation_rad]
    if margin > 0 and sin(angulation_rad) * (need + 1) <= need - 1:
        sine = sin(angulation_rad) * (need + 1) / (need - 1)
        leans_rad.append((asin(sine) - angulation_rad) / 2)
    crush = need**2 * hardness_npm3 * normal_force_n / (2 * shear_strength_pa**2
                                                        * effective_edge_m)
    leans_rad.append(_snow_lean_rad(crush, tan(angulation_rad)))
    if drag_angle_rad is not None:
        leans_rad.append(drag_angle_rad - angulation_rad)
    leans_rad.append(atan(sqrt(max_load_g**2 - cos(pitch_rad)**2) / (need * cos(pitch_rad))))
    return min(leans_rad)


def _snow_lean_rad(crush: float, tan_a: float) -> float:
    """Smallest lean at which C u² (1 − u tan a) = u + tan a; ``inf`` if there is none.

    With x = 1/u this is the cubic tan a x³ + x² − C x + C tan a = 0, whose largest root is the
    smallest lean: x = 0 excepted, it is convex for x > 0, so Newton's steps from the right fall
    to that root.
    """
    x = crush + 1
    for _ in range(200):
        value = ((tan_a * x + 1) * x - crush) * x + crush * tan_a
        slope = (3 * tan_a * x + 2) * x - crush
        if slope <= 0:
            return inf
        step = value / slope
        x -= step
        if x <= 0:
            return inf
        if step <= 1e-15 * x:
            break
    return atan(1 / x)


def line_radius_m(lean_rad: float, speed_mps: float, pitch_rad: float,
                  phase_rad: float) -> float:
    """Radius on which ``lean_rad`` balances the rider, m; ``inf`` where no line asks so much.

    R = v²/(g (cos α tan λ + sin α cos φ)), from F/N = tan λ. ``inf``: even straight on, gravity
    asks for more lean.
    """
    asked = cos(pitch_rad) * tan(lean_rad) + sin(pitch_rad) * cos(phase_rad)
    return speed_mps**2 / (G0_MPS2 * asked) if asked > 0 else inf


def tightest_line_m(lean_rad: float, speed_mps: float, pitch_rad: float,
                    last_phase_rad: float) -> float:
    """Radius of the tightest line that asks for no more than ``lean_rad`` at any phase, m.

    Below the fall line gravity adds, so the last phase of the turn sets it. ``inf``: none.
    """
    if lean_rad <= 0:
        return inf
    return line_radius_m(lean_rad, speed_mps, pitch_rad, last_phase_rad) * (1 + _ROUNDING)
