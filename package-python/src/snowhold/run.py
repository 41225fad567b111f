"""``ask: "run"``: a run of turns, down one pitch or a profile of several.

From a start speed the run is followed turn by turn (:mod:`snowhold.track`): carved on the board's
own arc, or with a ``line_radius_m`` drifted on that line in every turn. Beside it the pitch from
which on no speed carves turn after turn (:mod:`snowhold.rhythm`). :data:`FIELDS` gives every
input with its range, ``docs/ask-run.md`` the whole answer.

The verdict is the worst state of the run. ``fails_at`` is the first place at which the edge does
not hold: a negative margin, past which the run goes on (as if it had held), or lost balance,
which ends it.
"""

from __future__ import annotations

from dataclasses import replace
from math import degrees, inf, radians, sqrt
from typing import Any

from snowhold.arrays import numpy_or_none
from snowhold.atmosphere import air_density_kgpm3, drag_per_m
from snowhold.constants import G0_MPS2
from snowhold.grip import LIMITS, STATES, state
from snowhold.phases import Phases, ride
from snowhold.question import BadQuestion, Choice, Field, Flag, Items, Number, Record, read
from snowhold.rhythm import critical_pitch_rad, shape_of, steady_speed_mps
from snowhold.slide import Leg
from snowhold.snow import SNOWS
from snowhold.track import Run, Spot, Track, follow, ride_turn
from snowhold.turn import FIELDS as TURN_FIELDS
from snowhold.turn import cautions, turn_of

FIELDS: dict[str, Field] = {
    "ask": Choice(("run",)),
    "pitch_deg": Number(0, 50, "degrees", default=None, null=True),
    "legs": Items(Record({"pitch_deg": Number(0, 50, "degrees"),
                          "length_m": Number(0.1, 5000, "m")}), 1, 10, default=None, null=True),
    "start_speed_mps": Number(0, 40, "m/s"),
    "start_phase_deg": Number(0, 80, "degrees", default=20),
    "turns": Number(1, 60, "", default=10, whole=True),
    **{name: TURN_FIELDS[name] for name in (
        "sidecut_radius_m", "angulation_deg", "snow", "rider_mass_kg", "effective_edge_m",
        "max_load_g", "line_radius_m", "drag_angle_deg")},
    "glide_friction": Number(0, 0.2, "", default=None, null=True),
    "drag_area_m2": Number(0, 2, "m²", default=0.5),
    "altitude_m": Number(-400, 9000, "m", default=1500),
    "air_temperature_c": Number(-60, 40, "°C", default=None, null=True),
    "critical": Flag(default=True),
}
"""What a run question may hold: ranges and defaults assumed. A null ``glide_friction`` is the
snow's; ``turns`` stops the run; ``critical`` false leaves the critical pitch and the legs out."""

_FAILS_RAD = 1e-4
"""How closely the first phase that washes out is found."""


def answer(question: dict[str, Any]) -> dict[str, Any]:
    """Answer a run question; raises :class:`snowhold.question.BadQuestion` on bad fields."""
    values = _read(question)
    run = run_of(values)
    track = follow(run)
    path = path_of(run, track)
    last = track.spots[-1]
    verdict = min(path["state"], key=STATES.index)
    critical_deg, legs = _rhythm(run) if values["critical"] else (None, None)
    steepest_deg = max(_deg(leg.pitch_rad) for leg in run.legs)
    return {
        "verdict": verdict,
        "end": track.end,
        "fails_at": _fails_at(run, track, path),
        "worst": _worst(path),
        "time_s": last.time_s,
        "distance_m": last.distance_m,
        "end_speed_mps": sqrt(last.squared_speed),
        "top_speed_mps": max(path["speed_mps"]),
        "critical_pitch_deg": critical_deg,
        "no_speed_carves": None if legs is None else any(leg["no_speed_carves"] for leg in legs),
        "legs": legs,
        "energy": energy(run, last),
        "path": path,
        "cautions": cautions(steepest_deg) + (
            [] if run.turn.line_radius_m is None else ["drift_friction"]),
    }


def _read(question: dict[str, Any]) -> dict[str, Any]:
    """The question's values, checked; every fault at once, those between fields too."""
    faults: list[dict[str, str]] = []
    values: dict[str, Any] = {}
    try:
        values = read(question, FIELDS)
    except BadQuestion as bad:
        faults = bad.faults
    given = [key for key in ("pitch_deg", "legs") if question.get(key) is not None]
    allowed = "exactly one of pitch_deg and legs"
    if not given:
        faults.append({"field": "pitch_deg", "problem": "is missing", "allowed": allowed})
    elif len(given) == 2:
        faults.append({"field": "legs", "problem": "give the pitch again, after pitch_deg",
                       "allowed": allowed})
    if faults:
        raise BadQuestion(faults)
    return values


def run_of(values: dict[str, Any]) -> Run:
    """The run that checked question values describe."""
    legs = ((Leg(radians(values["pitch_deg"]), inf),) if values["legs"] is None else
            tuple(Leg(radians(leg["pitch_deg"]), leg["length_m"]) for leg in values["legs"]))
    turn = turn_of({**values, "pitch_deg": 0.0, "speed_mps": values["start_speed_mps"],
                    "from_phase_deg": values["start_phase_deg"]})
    friction = values["glide_friction"]
    return Run(
        turn=turn, legs=legs, turns=values["turns"],
        glide_friction=SNOWS[values["snow"]].glide_friction.value if friction is None
        else friction,
        drag_per_m=drag_per_m(air_density_kgpm3(values["altitude_m"],
                                                values["air_temperature_c"]),
                              values["drag_area_m2"], values["rider_mass_kg"]))


def path_of(run: Run, track: Track) -> dict[str, list[Any]]:
    """The track as the answer's lists, one entry a spot, null where there is no balance."""
    spots = track.spots
    rows = _ridden(run, spots)
    states = [_state(row) for row in rows]
    if track.end in ("too_slow", "too_fast"):
        # The last spot is where balance is lost: a millionth of a radian before that it is found.
        states[-1] = track.end

    def column(values: list[float], turned: bool = False) -> list[float | None]:
        return [None if at in ("too_slow", "too_fast") else degrees(value) if turned else value
                for value, at in zip(values, states, strict=True)]

    return {
        "x_m": [spot.x_m for spot in spots],
        "y_m": [spot.y_m for spot in spots],
        "height_m": [spot.height_m for spot in spots],
        "time_s": [spot.time_s for spot in spots],
        "distance_m": [spot.distance_m for spot in spots],
        "speed_mps": [sqrt(spot.squared_speed) for spot in spots],
        "pitch_deg": [_deg(run.legs[spot.leg_index].pitch_rad) for spot in spots],
        "turn_index": [spot.turn_index for spot in spots],
        "phase_deg": [_deg(spot.phase_rad) for spot in spots],
        "lean_deg": column([row.lean_rad for row in rows], turned=True),
        "edge_angle_deg": column([row.edge_rad for row in rows], turned=True),
        "turn_radius_m": column([row.turn_radius_m for row in rows]),
        "load_g": column([row.load_g for row in rows]),
        "grip_margin": column([row.grip_margin for row in rows]),
        "limit": [None if at in ("too_slow", "too_fast") else LIMITS[int(row.limit_index)]
                  for row, at in zip(rows, states, strict=True)],
        "state": states,
        "pivoted": [bool(row.pivoted) for row in rows],
    }


def _ridden(run: Run, spots: list[Spot]) -> list[Phases]:
    """Lean, edge and grip at each spot, as plain numbers."""
    numpy = numpy_or_none()
    if numpy is None:
        return [_ridden_at(run, spot) for spot in spots]
    legs = numpy.array([leg.pitch_rad for leg in run.legs])
    turn = replace(run.turn, pitch_rad=legs[[spot.leg_index for spot in spots]],
                   speed_mps=numpy.sqrt([spot.squared_speed for spot in spots]))
    phases = ride(turn, numpy.array([spot.phase_rad for spot in spots]), numpy)
    columns = [numpy.broadcast_to(each, len(spots)).tolist() for each in vars(phases).values()]
    return [Phases(*row) for row in zip(*columns, strict=True)]


def _ridden_at(run: Run, spot: Spot) -> Phases:
    """Lean, edge and grip at one spot."""
    return ride(replace(run.turn, pitch_rad=run.legs[spot.leg_index].pitch_rad,
                        speed_mps=sqrt(spot.squared_speed)), spot.phase_rad)


def _state(row: Phases) -> str:
    if row.too_slow:
        return "too_slow"
    return "too_fast" if row.too_fast else state(row.grip_margin)


def _fails_at(run: Run, track: Track, path: dict[str, list[Any]]) -> dict[str, Any] | None:
    """The first place at which the edge does not hold; None: it holds to the end of the run."""
    index = next((index for index, at in enumerate(path["state"])
                  if at not in ("holds", "marginal")), None)
    if index is None:
        return None
    spot, failed = track.spots[index], path["state"][index]
    limit, margin = path["limit"][index], path["grip_margin"][index]
    before = track.spots[index - 1]
    if failed == "washes_out" and index > 0 and before.turn_index == spot.turn_index:
        # On a new leg the margin may jump below 0: then halving ends at the break itself.
        while spot.phase_rad - before.phase_rad > _FAILS_RAD:
            (middle, *_), end = ride_turn(run, before, [(before.phase_rad + spot.phase_rad) / 2])
            if end is not None:
                break
            row = _ridden_at(run, middle)
            if _state(row) == "washes_out":
                spot, limit, margin = middle, LIMITS[int(row.limit_index)], row.grip_margin
            else:
                before = middle
    return {
        "x_m": spot.x_m, "y_m": spot.y_m, "distance_m": spot.distance_m, "time_s": spot.time_s,
        "turn": spot.turn_index + 1, "phase_deg": _deg(spot.phase_rad),
        "pitch_deg": _deg(run.legs[spot.leg_index].pitch_rad),
        "speed_mps": sqrt(spot.squared_speed), "state": failed, "limit": limit,
        "grip_margin": margin,
    }


def _worst(path: dict[str, list[Any]]) -> dict[str, Any] | None:
    """The spot with the least margin among those in balance; None: none is."""
    balanced = [index for index, margin in enumerate(path["grip_margin"]) if margin is not None]
    if not balanced:
        return None
    worst = min(balanced, key=lambda index: path["grip_margin"][index])
    return {"turn": path["turn_index"][worst] + 1, **{key: path[key][worst] for key in (
        "phase_deg", "distance_m", "speed_mps", "lean_deg", "edge_angle_deg", "load_g",
        "grip_margin", "limit", "state")}}


def _rhythm(run: Run) -> tuple[float | None, list[dict[str, Any]]]:
    """The critical pitch, degrees, and what it makes of each leg."""
    shape = shape_of(run)
    critical_rad = critical_pitch_rad(shape)
    legs = [{
        "pitch_deg": _deg(leg.pitch_rad),
        "length_m": None if leg.length_m == inf else leg.length_m,
        "no_speed_carves": critical_rad is not None and leg.pitch_rad > critical_rad,
        "steady_speed_mps": steady_speed_mps(shape, leg.pitch_rad),
    } for leg in run.legs]
    return None if critical_rad is None else degrees(critical_rad), legs


def energy(run: Run, last: Spot) -> dict[str, float]:
    """Where the energy went, J, from the start to the last spot.

    ``relative_error``: what is missing of the balance, over all that there was to spend.
    """
    mass_kg = run.turn.rider_mass_kg
    start_j = mass_kg * run.turn.speed_mps**2 / 2
    lost = {
        "kinetic_loss_j": start_j - mass_kg * last.squared_speed / 2,
        "potential_loss_j": mass_kg * G0_MPS2 * (0.0 - last.height_m),
        "friction_work_j": mass_kg * last.friction_jpkg,
        "drag_work_j": mass_kg * last.drag_jpkg,
    }
    spent_j = start_j + lost["potential_loss_j"]
    missing_j = (lost["kinetic_loss_j"] + lost["potential_loss_j"]
                 - lost["friction_work_j"] - lost["drag_work_j"])
    return {**lost, "relative_error": missing_j / spent_j if spent_j > 0 else 0.0}


def _deg(angle_rad: float) -> float:
    """An angle that was asked in degrees, in degrees again: without what the way has cost."""
    return round(degrees(angle_rad), 9)
