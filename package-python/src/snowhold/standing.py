"""What a slope asks of a rider who stands or side-slips on an edge.

In a traverse the lean of balance is the pitch, λ = α, on a rise as on a descent: to stand, the
base must be tilted at least α out of the slope, that is, to the horizontal. Angulation a tilts it
further, ε = α + a. The limits of :mod:`snowhold.grip` then say whether the edge holds.

References
----------
[1] U. D. Jentschura and F. Fahrbach, Physics of Skiing: The Ideal-Carving Equation and Its
    Applications, Can. J. Phys. 82 (2004) 249-261, arXiv physics/0310086 (balance).
"""

from __future__ import annotations

from dataclasses import dataclass
from math import atan, inf, radians, sin

from snowhold.balance import normal_force_n
from snowhold.constants import G0_MPS2
from snowhold.grip import LIMITS, grip_margin, least_capacity

STEEPEST_RAD = radians(50.0)
"""Steepest pitch that is looked at, rad. Assumed."""


@dataclass(frozen=True)
class Stance:
    """A rider on an edge: mass with gear, effective edge, angulation, what the legs carry, and
    the edge angle from which the boot drags (None: never)."""

    mass_kg: float
    effective_edge_m: float
    angulation_rad: float
    max_load_g: float
    drag_angle_rad: float | None = None


def standing_edge_angle_rad(pitch_rad: float) -> float:
    """Least edge angle at which a frictionless base carries a standing rider: the pitch [1]."""
    return abs(pitch_rad)


def standing_grip(stance: Stance, pitch_rad: float, hardness_npm3: float,
                  shear_strength_pa: float) -> tuple[float, str | None]:
    """Grip margin of a standing edge tilted to ε = α + a, and the limit that governs.

    ``(inf, None)`` where the slope asks for no force. Force needed m g sin α, perpendicular to
    the snow m g cos α [1].
    """
    pitch_rad = abs(pitch_rad)
    # On next to level ground the margin grows past every bound.
    if pitch_rad < 1e-9:
        return inf, None
    needed_n = stance.mass_kg * G0_MPS2 * sin(pitch_rad)
    capacity_n, limit_index, _ = least_capacity(
        normal_force_n(stance.mass_kg, pitch_rad), pitch_rad + stance.angulation_rad,
        stance.mass_kg, pitch_rad, stance.effective_edge_m, stance.max_load_g, hardness_npm3,
        shear_strength_pa, stance.drag_angle_rad)
    margin = grip_margin(capacity_n, needed_n)
    # Without angulation the platform stands exactly on its limit: no verdict by rounding.
    return (0.0 if -1e-12 < margin < 0 else margin), LIMITS[int(limit_index)]


def steepest_stand_rad(stance: Stance, hardness_npm3: float, shear_strength_pa: float,
                       margin: float = 0.0) -> float | None:
    """Pitch up to which a standing edge keeps a grip margin, rad; None: up to 50° at least.

    The first crossing from level ground up, to 1e-9 rad: 0 where not even the flattest holds.
    """
    def holds(pitch_rad: float) -> bool:
        return standing_grip(stance, pitch_rad, hardness_npm3, shear_strength_pa)[0] >= margin

    step_rad = radians(1.0)
    steeper = next((count * step_rad for count in range(1, round(STEEPEST_RAD / step_rad) + 1)
                    if not holds(count * step_rad)), None)
    if steeper is None:
        return None
    flatter = steeper - step_rad
    while steeper - flatter > 1e-9:
        pitch_rad = (flatter + steeper) / 2
        if holds(pitch_rad):
            flatter = pitch_rad
        else:
            steeper = pitch_rad
    return flatter


def sideslip_below_rad(pitch_rad: float, glide_friction: float) -> float:
    """Edge angle below which a standing board starts to slip sideways, rad; below 0: never.

    Flatter than the pitch the force leaves the platform, and the base's friction holds as far as
    atan μ: ε < α − atan μ. That a base glides sideways as it does lengthways is assumed.
    """
    return abs(pitch_rad) - atan(glide_friction)
