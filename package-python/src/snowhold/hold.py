"""The speeds at which a whole turn holds.

A turn's lean grows through it, so its first phase says whether it is too slow and its last
whether it is too fast or washes out. Every limit is a limit of lean (see :mod:`snowhold.drift`),
and balance turns a lean into a speed in closed form, so the window is exact. At angulations below
about 4° the platform can hold again beyond the leans at which it has let go; a window ends where
it first lets go.
"""

from __future__ import annotations

from math import cos, inf, pi, sin, sqrt, tan

from snowhold import scalars
from snowhold.balance import normal_force_n
from snowhold.carve import balanced_lean, carve_number_of, fall_line_pull, fastest, slowest_mps
from snowhold.constants import G0_MPS2, HOLDS_MARGIN
from snowhold.drift import largest_lean, tightest_line_m
from snowhold.phases import Turn
from snowhold.scalars import Namespace, Value
from snowhold.sidecut import carved_radius_m


def largest_lean_of(turn: Turn, margin: float = HOLDS_MARGIN) -> float:
    """Largest lean that holds with ``margin`` for this turn's rider, snow and pitch, rad."""
    return largest_lean(turn.pitch_rad, turn.angulation_rad,
                        normal_force_n(turn.rider_mass_kg, turn.pitch_rad),
                        turn.effective_edge_m, turn.max_load_g, turn.hardness_npm3,
                        turn.shear_strength_pa, turn.drag_angle_rad, margin)


def hold_window_mps(turn: Turn, margin: float = HOLDS_MARGIN) -> tuple[float, float]:
    """Speeds between which the whole turn holds with ``margin``, m/s: above the first, up to the
    second; none where the second is not above the first. The turn's own speed plays no part.

    On the board's own arc v² = κ R_sc g cos α with κ of the largest lean, or of the fastest carve
    if that leans less; on a line of radius R, v² = (tan λ + t) R g cos α.
    """
    last_pull = fall_line_pull(turn.pitch_rad, pi - turn.from_phase_rad)
    tan_lean = tan(max(largest_lean_of(turn, margin), 0.0))
    if turn.line_radius_m is None:
        slowest = slowest_mps(turn.sidecut_radius_m, turn.pitch_rad, turn.from_phase_rad,
                              turn.angulation_rad)
        _, edge_rad = fastest(turn.sidecut_radius_m, turn.pitch_rad, pi - turn.from_phase_rad,
                              turn.angulation_rad)
        tan_lean = min(tan_lean, tan(edge_rad - turn.angulation_rad))
        number = carve_number_of(tan_lean, last_pull, turn.angulation_rad)
        radius_m = turn.sidecut_radius_m
    else:
        radius_m = turn.line_radius_m
        slowest = slowest_mps(radius_m, turn.pitch_rad, turn.from_phase_rad, 0.0)
        number = tan_lean + last_pull
    return slowest, sqrt(max(number, 0.0) * radius_m * G0_MPS2 * cos(turn.pitch_rad))


def own_arc_m(turn: Turn, phase_rad: Value, xp: Namespace = scalars) -> Value:
    """Radius of the board's own arc at a phase, m.

    That of the balanced carve; where there is none, of the flat board where it is too slow and of
    the fastest carve where it is too fast.
    """
    lean_rad, too_slow, too_fast = balanced_lean(turn.speed_mps, turn.sidecut_radius_m,
                                                 turn.pitch_rad, phase_rad, turn.angulation_rad,
                                                 xp)
    edge_rad = xp.where(too_slow, 0.0, lean_rad + turn.angulation_rad)
    if xp.any(too_fast):
        _, fastest_edge_rad = fastest(turn.sidecut_radius_m, turn.pitch_rad, phase_rad,
                                      turn.angulation_rad, xp)
        edge_rad = xp.where(too_fast, fastest_edge_rad, edge_rad)
    return carved_radius_m(turn.sidecut_radius_m, edge_rad, xp)


def widest_arc_m(turn: Turn) -> float:
    """Radius of the widest arc that the board itself carves in this turn, m; 0 if it carves none.

    Leans grow through the turn, so it is the arc of the first phase; where that is too slow, of
    the later phase at which the carve sets in with no lean. A line must be at least as wide, or
    the board would have to be pivoted around it.
    """
    lean_rad, too_slow, too_fast = balanced_lean(turn.speed_mps, turn.sidecut_radius_m,
                                                 turn.pitch_rad, turn.from_phase_rad,
                                                 turn.angulation_rad)
    if too_fast:
        return 0.0
    return float(carved_radius_m(turn.sidecut_radius_m,
                                 turn.angulation_rad + (0.0 if too_slow else lean_rad)))


def hold_lines_m(turn: Turn) -> tuple[float, float]:
    """Radii between which a line holds with margin at this speed through the whole turn, m.

    From the tightest, up to the one on which gravity alone turns the rider at the first phase;
    none where the second is not above the first. On lines wider than that the edge is not loaded
    toward the centre at first, so nothing lets go, but no turn is balanced there either.
    """
    tightest = tightest_line_m(largest_lean_of(turn), turn.speed_mps, turn.pitch_rad,
                               pi - turn.from_phase_rad)
    pull = G0_MPS2 * sin(turn.pitch_rad) * max(cos(turn.from_phase_rad), 0.0)
    return tightest, turn.speed_mps**2 / pull if pull > 0 else inf
