"""A turn phase by phase: balance, edge, load and grip together.

Puts balance, carve and grip together for one turn (or, with arrays in its fields, for many), on
the board's own arc or on a given line.
"""

from __future__ import annotations

from dataclasses import dataclass
from math import ceil, pi

from snowhold import scalars
from snowhold.balance import centre_force_n, lean_rad, load_g, normal_force_n
from snowhold.carve import LEAST_LEAN_RAD, balanced_lean
from snowhold.constants import HOLDS_MARGIN
from snowhold.grip import grip_margin, least_capacity, least_edge_rad
from snowhold.scalars import Namespace, Value
from snowhold.sidecut import carved_radius_m, drift_angle_rad, groove_width_m

STEP_DEG = 5
"""Widest step between the phases of a whole turn, degrees."""


@dataclass(frozen=True)
class Turn:
    """What a turn is made of, in SI and radians. With numpy any number may be an array.

    ``line_radius_m`` None: the balanced carve. ``drag_angle_rad`` None: the boot never drags.
    ``from_phase_rad``: the turn runs from that phase to π less it.
    """

    pitch_rad: Value
    speed_mps: Value
    sidecut_radius_m: Value
    angulation_rad: Value
    rider_mass_kg: Value
    effective_edge_m: Value
    max_load_g: Value
    hardness_npm3: Value
    shear_strength_pa: Value
    line_radius_m: Value = None
    drag_angle_rad: float | None = None
    from_phase_rad: float = 0.0


@dataclass(frozen=True)
class Phases:
    """A turn at its phases: one entry a phase in each field, NaN where there is no balance."""

    lean_rad: Value
    edge_rad: Value
    turn_radius_m: Value
    load_g: Value
    grip_margin: Value
    limit_index: Value
    penetration_m: Value
    too_slow: Value
    too_fast: Value
    pivoted: Value


@dataclass(frozen=True)
class Slip:
    """How a turn drifts at its phases, NaN where there is no balance.

    ``least_edge_rad``: flattest edge that would hold that lean with margin. ``drift_angle_rad``
    and ``groove_width_m``: :mod:`snowhold.sidecut`; 0 where the board runs along its own arc.
    """

    least_edge_rad: Value
    drift_angle_rad: Value
    groove_width_m: Value


def ridden_phases_deg(from_phase_deg: float) -> list[float]:
    """Phases from ``from_phase_deg`` (0 to below 90) to 180 less it, in even steps of 5° or less.
    """
    span_deg = 180 - 2 * from_phase_deg
    steps = ceil(span_deg / STEP_DEG)
    return [from_phase_deg + span_deg * i / steps for i in range(steps + 1)]


def ride(turn: Turn, phase_rad: Value, xp: Namespace = scalars) -> Phases:
    """The turn at one phase (floats) or at many (``xp=numpy``; arrays broadcast).

    On the board's own arc the lean is that of the balanced carve; on a line it follows from
    balance on the line's radius. ``pivoted``: the line is tighter there than the tilted board
    carves, so it must be pivoted around. ``grip_margin`` is capacity over needed force less 1.
    """
    if turn.line_radius_m is None:
        lean, too_slow, too_fast = balanced_lean(turn.speed_mps, turn.sidecut_radius_m,
                                                 turn.pitch_rad, phase_rad,
                                                 turn.angulation_rad, xp)
        edge = lean + turn.angulation_rad
        radius_m = carved_radius_m(turn.sidecut_radius_m, edge, xp)
        pivoted = too_slow & False
    else:
        needed_n = centre_force_n(turn.rider_mass_kg, turn.speed_mps, turn.line_radius_m,
                                  turn.pitch_rad, phase_rad, xp)
        lean = lean_rad(needed_n, normal_force_n(turn.rider_mass_kg, turn.pitch_rad, xp), xp)
        too_slow = lean <= LEAST_LEAN_RAD
        too_fast = too_slow & False
        lean = xp.where(too_slow, xp.nan, lean)
        edge = lean + turn.angulation_rad
        radius_m = turn.line_radius_m + 0.0 * lean
        # A relative 1e-9 keeps a line that is the board's own arc from being called tighter.
        pivoted = radius_m < carved_radius_m(turn.sidecut_radius_m, edge, xp) * (1 - 1e-9)

    normal_n = normal_force_n(turn.rider_mass_kg, turn.pitch_rad, xp)
    balanced = xp.logical_not(xp.isnan(lean))
    safe_lean = xp.where(balanced, lean, pi / 4)
    capacity_n, limit_index, depth_m = least_capacity(
        normal_n, safe_lean + turn.angulation_rad, turn.rider_mass_kg, turn.pitch_rad,
        turn.effective_edge_m, turn.max_load_g, turn.hardness_npm3, turn.shear_strength_pa,
        turn.drag_angle_rad, xp)
    margin = grip_margin(capacity_n, normal_n * xp.tan(safe_lean))
    return Phases(lean_rad=lean, edge_rad=edge, turn_radius_m=radius_m,
                  load_g=load_g(lean, turn.pitch_rad, xp),
                  grip_margin=xp.where(balanced, margin, xp.nan),
                  limit_index=limit_index,
                  penetration_m=xp.where(balanced, depth_m, xp.nan),
                  too_slow=too_slow, too_fast=too_fast, pivoted=pivoted)


def slip(turn: Turn, phases: Phases, xp: Namespace = scalars) -> Slip:
    """How the turn drifts at the phases that :func:`ride` gave."""
    own_arc_m = carved_radius_m(turn.sidecut_radius_m, phases.edge_rad, xp)
    given = turn.effective_edge_m, own_arc_m, phases.turn_radius_m
    return Slip(
        least_edge_rad=least_edge_rad(
            phases.lean_rad, normal_force_n(turn.rider_mass_kg, turn.pitch_rad, xp),
            turn.effective_edge_m, turn.hardness_npm3, turn.shear_strength_pa, HOLDS_MARGIN, xp),
        drift_angle_rad=drift_angle_rad(*given), groove_width_m=groove_width_m(*given))
