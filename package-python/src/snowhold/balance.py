"""Balance of a rider in a turn on a slope.

Symbols: α pitch, φ turn phase (0 heading across the hill at the start of the turn, 90° straight
down the fall line, 180° across the hill at its end), v speed along the track, R turn radius in
the plane of the snow, λ lean from the perpendicular to the snow toward the turn's centre. The
rider has no acceleration perpendicular to the snow.

References
----------
[1] U. D. Jentschura and F. Fahrbach, Physics of Skiing: The Ideal-Carving Equation and Its
    Applications, Can. J. Phys. 82 (2004) 249-261, arXiv physics/0310086.
"""

from __future__ import annotations

from snowhold import scalars
from snowhold.constants import G0_MPS2
from snowhold.scalars import Namespace, Value


def centre_force_n(mass_kg: Value, speed_mps: Value, turn_radius_m: Value, pitch_rad: Value,
                   phase_rad: Value, xp: Namespace = scalars) -> Value:
    """Force in the snow plane toward the turn's centre that the snow must supply, N.

    F = m (v²/R − g sin α cos φ) [1]. Above the fall line gravity helps, below it gravity adds.
    Negative: gravity alone pulls harder toward the centre than the turn needs.
    """
    return mass_kg * (speed_mps**2 / turn_radius_m
                      - G0_MPS2 * xp.sin(pitch_rad) * xp.cos(phase_rad))


def normal_force_n(mass_kg: Value, pitch_rad: Value, xp: Namespace = scalars) -> Value:
    """Force perpendicular to the snow, N = m g cos α [1], in N."""
    return mass_kg * G0_MPS2 * xp.cos(pitch_rad)


def lean_rad(centre_force_n: Value, normal_force_n: Value, xp: Namespace = scalars) -> Value:
    """Lean of balance λ = atan2(F, N) [1], rad; rider mass cancels."""
    return xp.atan2(centre_force_n, normal_force_n)


def load_g(lean_rad: Value, pitch_rad: Value, xp: Namespace = scalars) -> Value:
    """Load factor n = √(F² + N²)/(m g) = cos α / cos λ, in units of body weight."""
    return xp.cos(pitch_rad) / xp.cos(lean_rad)


def section_tilt_rad(pitch_rad: Value, phase_rad: Value, xp: Namespace = scalars) -> Value:
    """How the snow rises toward the turn's centre in the section across the turn, rad.

    −atan(tan α cos φ): gravity as seen in the plane of the radius and the snow's perpendicular is
    straight down there. Its size is the pitch at the turn's ends, 0 on the fall line.
    """
    return -xp.atan(xp.tan(pitch_rad) * xp.cos(phase_rad))


def track_acceleration_mps2(speed_mps: Value, pitch_rad: Value, phase_rad: Value, load_g: Value,
                            glide_friction: Value, drag_per_m: Value,
                            xp: Namespace = scalars) -> Value:
    """Acceleration along the track dv/dt = g sin α sin φ − μ g n − (ρ C_dA/2m) v² [1], m/s².

    ``drag_per_m`` is ρ C_dA/(2 m), 1/m.
    """
    return (G0_MPS2 * (xp.sin(pitch_rad) * xp.sin(phase_rad) - glide_friction * load_g)
            - drag_per_m * speed_mps**2)
