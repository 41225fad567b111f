"""Radius that a sidecut carves, and the sidecut from a tape measure.

Symbols: L effective edge, R_sc sidecut radius, s = L²/(8 R_sc) sidecut depth (an arc shallow
against its chord), ε edge angle between base and snow, e how much deeper the middle of the edge
sinks than its ends.

References
----------
[1] U. D. Jentschura and F. Fahrbach, Physics of Skiing: The Ideal-Carving Equation and Its
    Applications, Can. J. Phys. 82 (2004) 249-261, arXiv physics/0310086.
[2] J. Howe, The New Skiing Mechanics, 2nd ed., 2001 (from memory).
[3] ISO 6289, Skis — Vocabulary: R_sc = L²/(2000 (W_nose + W_tail − 2 W_waist)), R_sc in m and the
    rest in mm (the standard's number from memory).
"""

from __future__ import annotations

from snowhold import scalars
from snowhold.scalars import Namespace, Value


def sidecut_depth_m(effective_edge_m: Value, sidecut_radius_m: Value) -> Value:
    """Depth s = L²/(8 R_sc) of the sidecut at the waist, m, for s small against L."""
    return effective_edge_m**2 / (8 * sidecut_radius_m)


def sidecut_radius_m(nose_m: Value, waist_m: Value, tail_m: Value,
                     effective_edge_m: Value) -> Value:
    """Sidecut radius from widths at the ends of the effective edge and at the waist [3], m.

    R_sc = L²/(2 (W_nose + W_tail − 2 W_waist)), all in m: depth s = (W_nose + W_tail − 2 W_waist)/4
    put into s = L²/(8 R_sc). The waist must be narrower than the mean of nose and tail.
    """
    return effective_edge_m**2 / (2 * (nose_m + tail_m - 2 * waist_m))


def carved_radius_m(sidecut_radius_m: Value, edge_angle_rad: Value,
                    xp: Namespace = scalars) -> Value:
    """Radius carved on hard snow, R = R_sc cos ε [1], m, for ε from 0 to below 90°."""
    return sidecut_radius_m * xp.cos(edge_angle_rad)


def carved_radius_sunk_m(sidecut_radius_m: Value, effective_edge_m: Value, edge_angle_rad: Value,
                         extra_depth_m: Value, xp: Namespace = scalars) -> Value:
    """Radius carved where the middle of the edge sinks ``extra_depth_m`` deeper than its ends, m.

    R = L²/(8 (s/cos ε + e tan ε)), the geometry of [1] and [2]; e = 0 gives back R_sc cos ε.
    """
    depth_m = sidecut_depth_m(effective_edge_m, sidecut_radius_m)
    return effective_edge_m**2 / (8 * (depth_m / xp.cos(edge_angle_rad)
                                       + extra_depth_m * xp.tan(edge_angle_rad)))


def drift_angle_rad(effective_edge_m: Value, own_arc_m: Value, turn_radius_m: Value) -> Value:
    """Angle between the edge and the track at the edge's ends, (L/2)(1/R_own − 1/R), rad.

    An edge whose own arc is R_own, led along a track of radius R, lies along it only at the
    waist; toward its ends it stands across it by the difference of the two curvatures. Plain
    geometry for arcs shallow against L; 0 on the board's own arc.
    """
    return effective_edge_m / 2 * (1 / own_arc_m - 1 / turn_radius_m)


def groove_width_m(effective_edge_m: Value, own_arc_m: Value, turn_radius_m: Value) -> Value:
    """Width that the drifting edge sweeps, (L²/8)(1/R_own − 1/R), m: the difference of the two
    arcs' depths; 0 on the board's own arc."""
    return effective_edge_m**2 / 8 * (1 / own_arc_m - 1 / turn_radius_m)
