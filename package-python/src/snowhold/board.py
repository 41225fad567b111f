"""``ask: "board"``: will this board suit this rider?

From widths and effective edge to sidecut radius, boot drag, the groove that the board bends into
this snow, the masses and stiffnesses that suit, and the speeds that it carves. :data:`FIELDS`
gives every input with its range, :func:`answer` every figure of the answer; the modules of each
formula give the physics.

x runs along the board from the middle of its effective edge, nose
positive; y across it, the toe edge positive.
"""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import replace
from math import degrees, inf, pi, radians
from typing import Any

from snowhold import turn
from snowhold.balance import normal_force_n
from snowhold.board_faults import cross_faults, read_all
from snowhold.boot import feet, least_drag_deg
from snowhold.hold import hold_lines_m, widest_arc_m
from snowhold.phases import Turn, ride
from snowhold.question import Choice, Field, Items, Number, Record
from snowhold.shape import local_radii, outline_m, radius_spread_m, stated_radius, stations, width_m
from snowhold.sidecut import sidecut_depth_m, sidecut_radius_m
from snowhold.snow import SNOWS
from snowhold.stiffness import STIFFNESSES_NM2

STANCE_SHARE = 0.43
"""Distance between the bindings over the effective edge, where it is not given: 0.52 m on 1.2 m.
Assumed."""

BOOT: dict[str, Field] = {
    "sole_length_m": Number(0.15, 0.40, "m"),
    "sole_width_m": Number(0, 0.15, "m", default=0),
    "front_angle_deg": Number(-60, 75, "degrees", default=15),
    "rear_angle_deg": Number(-60, 75, "degrees", default=-6),
    "front_toeward_m": Number(-0.05, 0.05, "m", default=0),
    "rear_toeward_m": Number(-0.05, 0.05, "m", default=0),
    "toe_height_m": Number(0.01, 0.15, "m", default=0.050),
    "heel_height_m": Number(0.01, 0.15, "m", default=0.045),
}
"""A boot in its binding: sole length and width (0: section 6's points on the middle line), binding
angle from straight across (toes toward the nose positive), how far the boot stands off centre
toward the toe edge, height of each end of the sole above the base: board, binding and the sole's
upturn. Angles and heights where not given are assumed."""

BOARD: dict[str, Field] = {
    "nose_m": Number(0.15, 0.50, "m"),
    "waist_m": Number(*turn.RANGES["waist_m"], "m"),
    "tail_m": Number(0.15, 0.50, "m"),
    "effective_edge_m": Number(*turn.RANGES["effective_edge_m"], "m"),
    "widths": Items(Record({"at_m": Number(-1, 1, "m"), "width_m": Number(0.10, 0.50, "m")}),
                    3, 15, default=None, null=True),
    "stated_radius_m": Number(*turn.RANGES["sidecut_radius_m"], "m", default=None, null=True),
    "stiffness_nm2": Number(*STIFFNESSES_NM2, "N·m²", default=None, null=True),
    "stiffness_shape": Items(Number(0.02, 5, ""), 2, 21, default=[1.0, 1.0]),
    "camber_m": Number(-0.03, 0.03, "m", default=0),
    "stance_width_m": Number(0.2, 1.0, "m", default=None, null=True),
    "setback_m": Number(-0.1, 0.1, "m", default=0),
    "front_insert_width_m": Number(0.10, 0.50, "m", default=None, null=True),
    "rear_insert_width_m": Number(0.10, 0.50, "m", default=None, null=True),
}
"""A board. ``widths``: three or more along the edge, x from its middle. ``stiffness_nm2`` EI in
bending, times ``stiffness_shape``, evenly spaced from tail to nose, linear in between.
``camber_m`` negative: reverse camber. ``setback_m`` of the stance's middle toward the tail. Widths
at the inserts follow from the outline where they are not given. Ranges assumed, wide enough for
children's and racing boards."""

RIDER: dict[str, Field] = {
    "rider_mass_kg": turn.FIELDS["rider_mass_kg"],
    "front_share": Number(0.2, 0.8, "", default=0.5),
    "angulation_deg": turn.FIELDS["angulation_deg"],
    "max_load_g": turn.FIELDS["max_load_g"],
    "snow": turn.FIELDS["snow"],
    "from_phase_deg": turn.FIELDS["from_phase_deg"],
    "boot": Record(BOOT, default=None, null=True),
}
"""The rider, the snow and how the turn is ridden. ``front_share`` of the weight on the front
binding."""

FIELDS: dict[str, Field] = {
    "ask": Choice(("board",)),
    **BOARD,
    **RIDER,
    "pitch_deg": Number(*turn.RANGES["pitch_deg"], "degrees", default=15),
    "speed_mps": Number(*turn.RANGES["speed_mps"], "m/s", default=None, null=True),
    "line_radius_m": turn.FIELDS["line_radius_m"],
    "edge_angle_deg": Number(10, 75, "degrees", default=45),
}
"""What a board question may hold. ``edge_angle_deg`` is the edge angle at which the board is bent;
``speed_mps`` asks for the edge angle that the boot must clear, on the board's own arc or on a line
of ``line_radius_m``."""


def answer(question: dict[str, Any]) -> dict[str, Any]:
    """Answer a board question; raises :class:`snowhold.question.BadQuestion` on bad fields.

    Keys of the answer, those of :func:`describe` and

    * ``cautions``: codes of the warnings that belong beside it.
    """
    values = read_all(question, FIELDS, cross_faults)
    return {**describe(values), "cautions": turn.cautions(values["pitch_deg"])}


def describe(values: dict[str, Any]) -> dict[str, Any]:
    """A board under a rider, from the checked values of :data:`FIELDS`.

    * ``sidecut_radius_m``, ``sidecut_spread_m`` (1σ from a tape measure), ``sidecut_depth_m``.
    * ``stated_radius``: a given radius against that (:func:`snowhold.shape.stated_radius`), or
      null.
    * ``radii``: radius by position (:func:`snowhold.shape.local_radii`), null without ``widths``.
    * ``carve_speed_mps``: ``min``, ``max`` of a carve of the whole turn on this pitch; null: none.
    * ``needed``: :func:`needed_edge` at speed and pitch, null without a speed.
    * ``drag_angle_deg``: ``toe`` and ``heel``, the lesser of both feet, null where the boot does
      not stand out; null without a boot. ``boot``: :func:`snowhold.boot.feet`, or null.
    * ``bend``: :func:`snowhold.bite.bite`, null without a stiffness. ``hard_snow_radius_m``
      R_sc cos ε at ``edge_angle_deg``.
    * ``mass_range_kg`` (null without a stiffness, or where no mass suits), ``stiffness_range_nm2``
      (null: none suits): ``min``, ``max``, null at an open end.
    * ``picture``: ``outline`` of the board, ``bindings_m`` rear and front.
    """
    # Numpy is wanted from here on; a bad question is refused without it.
    from snowhold import bite

    along = outline_stations(values)
    bindings_m = binding_places_m(values)
    widths = (values["nose_m"], values["waist_m"], values["tail_m"], values["effective_edge_m"])
    radius_m = sidecut_radius_m(*widths)
    ride_on = turn_of(values, radius_m)
    radii = None if values["widths"] is None else local_radii(along)
    needed = needed_edge(ride_on) if values["speed_mps"] is not None else None
    boots = None
    if values["boot"] is not None:
        target_deg = values["edge_angle_deg"] if needed is None else needed["edge_angle_deg"]
        insert_m = tuple(
            width_m(along, at_m) if values[f"{foot}_insert_width_m"] is None
            else values[f"{foot}_insert_width_m"]
            for foot, at_m in zip(("rear", "front"), bindings_m, strict=True))
        pressure = (normal_force_n(ride_on.rider_mass_kg, ride_on.pitch_rad),
                    values["effective_edge_m"], ride_on.hardness_npm3)
        boots = feet(values["boot"], (insert_m[0], insert_m[1]), bindings_m, pressure,
                     values["waist_m"], radians(target_deg))
    stated_m = values["stated_radius_m"]
    return {
        "sidecut_radius_m": radius_m,
        "sidecut_spread_m": radius_spread_m(*widths),
        "sidecut_depth_m": sidecut_depth_m(values["effective_edge_m"], radius_m),
        "stated_radius": None if stated_m is None else stated_radius(stated_m, *widths, radii),
        "radii": radii,
        "carve_speed_mps": turn.carve_window(ride_on),
        "needed": needed,
        "drag_angle_deg": None if boots is None else {
            end: least_drag_deg(boots, end) for end in ("toe", "heel")},
        "boot": boots,
        **bite.answers(values, along, bindings_m),
        "picture": {"outline": outline_m(along),
                    "bindings_m": {"rear": bindings_m[0], "front": bindings_m[1]}},
    }


def outline_stations(values: Mapping[str, Any]) -> list[tuple[float, float]]:
    """Positions and widths along the edge, from tail to nose, m."""
    widths = values["widths"]
    return stations(
        values["nose_m"], values["waist_m"], values["tail_m"], values["effective_edge_m"],
        None if widths is None else [(row["at_m"], row["width_m"]) for row in widths])


def binding_places_m(values: Mapping[str, Any]) -> tuple[float, float]:
    """Rear and front binding from the middle of the effective edge, m."""
    stance_m = values["stance_width_m"]
    if stance_m is None:
        stance_m = STANCE_SHARE * values["effective_edge_m"]
    return -stance_m / 2 - values["setback_m"], stance_m / 2 - values["setback_m"]


def turn_of(values: Mapping[str, Any], radius_m: float) -> Turn:
    """The whole turn that the rider makes on this board. Its boot is left out: what the turn needs
    is compared with what the boot allows."""
    snow = SNOWS[values["snow"]]
    return Turn(
        pitch_rad=radians(values["pitch_deg"]), speed_mps=values["speed_mps"] or 0.0,
        sidecut_radius_m=radius_m, angulation_rad=radians(values["angulation_deg"]),
        rider_mass_kg=values["rider_mass_kg"], effective_edge_m=values["effective_edge_m"],
        max_load_g=values["max_load_g"], hardness_npm3=snow.hardness_npm3.value,
        shear_strength_pa=snow.shear_strength_pa.value,
        line_radius_m=values["line_radius_m"],
        from_phase_rad=radians(values["from_phase_deg"]))


def needed_edge(ride_on: Turn) -> dict[str, Any] | None:
    """The greatest edge angle of the turn: ``edge_angle_deg``, ``turn_radius_m``, ``by``.

    ``by`` says of which turn: "line" the given one, "carve" the board's own arc, or, above the
    carve's speed, "drift" the tightest line that holds: no turn that holds asks for more. Lean
    grows through the turn, so its last phase asks for most; on a line too tight for any edge it
    can pass 90°. None: too slow throughout, or no line holds.
    """
    last_rad = pi - ride_on.from_phase_rad
    at = ride(ride_on, last_rad)
    by = "carve" if ride_on.line_radius_m is None else "line"
    if at.too_fast:
        line_m = max(hold_lines_m(ride_on)[0], widest_arc_m(ride_on))
        if not 0 < line_m < inf:
            return None
        by = "drift"
        at = ride(replace(ride_on, line_radius_m=line_m), last_rad)
    if at.too_slow:
        return None
    return {"edge_angle_deg": degrees(at.edge_rad), "by": by,
            "turn_radius_m": float(at.turn_radius_m)}

