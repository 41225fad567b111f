"""What a pitch question may hold, and what is wrong with one that cannot be answered."""

from __future__ import annotations

from collections.abc import Mapping
from math import asin, atan, degrees
from typing import Any

from snowhold.question import BadQuestion, Choice, Field, Items, Number, Record, read
from snowhold.snow import SNOWS

_PITCH_DEG = Number(-20, 50, "degrees", default=None, null=True)
_GIVEN_BY = ("pitch_deg", "percent", "drop_m")

LEG_FIELDS: dict[str, Field] = {
    "pitch_deg": _PITCH_DEG,
    "percent": Number(-36, 119, "%", default=None, null=True),
    "drop_m": Number(-1710, 3830, "m", default=None, null=True),
    "length_m": Number(0.1, 5000, "m"),
    "snow": Choice(tuple(SNOWS), default=None, null=True),
}
"""A leg: exactly one of pitch, percent and drop; its pitch from −20° (a rise) to 50°. Without a
``snow`` of its own it has the question's."""

FIELDS: dict[str, Field] = {
    "ask": Choice(("pitch",)),
    "legs": Items(Record(LEG_FIELDS), 1, 10),
    "snow": Choice(tuple(SNOWS), default="P"),
    # Mean of snowboarders on groomed trails, 33.0 km/h: L. L. Stepan et al., Skier and
    # snowboarder speeds at US ski areas, JSAMS Plus (2023).
    "speed_mps": Number(0, 60, "m/s", default=9.2),
    "fall_at_m": Number(0, 50000, "m", default=0),
    "clothing_friction": Number(0.05, 1, "", default=None, null=True),
    "rider_mass_kg": Number(15, 200, "kg", default=80),
    "drag_area_m2": Number(0, 2, "m²", default=0.5),
    "altitude_m": Number(-400, 9000, "m", default=1500),
    "air_temperature_c": Number(-60, 40, "°C", default=None, null=True),
    "braking_friction": Number(0.05, 1, "", default=None, null=True),
    "reaction_time_s": Number(0, 5, "s", default=None, null=True),
    "sight_distance_m": Number(0.5, 5000, "m", default=None, null=True),
    "angulation_deg": Number(0, 40, "degrees", default=5),
    "effective_edge_m": Number(0.5, 2.0, "m", default=1.2),
    "max_load_g": Number(1.1, 5.0, "times body weight", default=2.0),
    "drag_angle_deg": Number(5, 90, "degrees", default=None, null=True),
    "waist_m": Number(0.15, 0.4, "m", default=0.25),
}
"""What a pitch question may hold: ranges and defaults assumed where nothing else is said. A null
``clothing_friction``, ``braking_friction`` or ``reaction_time_s`` is the middle of its range."""

def read_pitch(question: dict[str, Any]) -> dict[str, Any]:
    """The question's values, checked; raises :class:`snowhold.question.BadQuestion`.

    The faults of single fields and those between fields are named all at once.
    """
    faults: list[dict[str, str]] = []
    values: dict[str, Any] = {}
    try:
        values = read(question, FIELDS)
    except BadQuestion as bad:
        faults = bad.faults
    # A list that is too long is one fault, and its legs have not been read.
    legs_read = not any(fault["field"] == "legs" for fault in faults)
    for index, leg in enumerate(question["legs"] if legs_read else []):
        path = f"legs[{index}]."
        sound = not any(fault["field"].startswith(path) for fault in faults)
        if isinstance(leg, Mapping):
            faults += _leg_faults(leg, path, sound)
    if not any(fault["field"].startswith(("legs", "fall_at_m")) for fault in faults):
        place = ("legs", "fall_at_m")
        part = read({key: question[key] for key in place if key in question},
                    {key: FIELDS[key] for key in place})
        length_m = sum(leg["length_m"] for leg in part["legs"])
        if part["fall_at_m"] >= length_m:
            faults.append(_fault("fall_at_m", "is not on the profile",
                                 f"a number from 0 to below its length, {length_m:g} m"))
    if faults:
        raise BadQuestion(faults)
    return values


def _leg_faults(leg: Mapping[str, Any], path: str, sound: bool) -> list[dict[str, str]]:
    """What is wrong between the fields of one leg; ``sound``: each field alone is right."""
    given = [key for key in _GIVEN_BY if leg.get(key) is not None]
    allowed = f"exactly one of {', '.join(_GIVEN_BY)}"
    if not given:
        return [_fault(f"{path}pitch_deg", "is missing", allowed)]
    faults = [_fault(path + key, f"gives the leg's pitch again, after {given[0]}", allowed)
              for key in given[1:]]
    if sound and "drop_m" in given:
        if abs(leg["drop_m"]) > leg["length_m"]:
            faults.append(_fault(f"{path}drop_m", "is more than the leg's length",
                                 f"a drop up to length_m, {leg['length_m']:g} m"))
        else:
            pitch_deg = degrees(asin(leg["drop_m"] / leg["length_m"]))
            if not _PITCH_DEG.low <= pitch_deg <= _PITCH_DEG.high:
                faults.append(_fault(
                    f"{path}drop_m", f"makes the leg's pitch {pitch_deg:.1f}°",
                    f"a drop that makes a pitch from {_PITCH_DEG.low:g} to "
                    f"{_PITCH_DEG.high:g} degrees"))
    return faults


def _fault(field: str, problem: str, allowed: str) -> dict[str, str]:
    return {"field": field, "problem": problem, "allowed": allowed}


def pitch_deg(leg: dict[str, Any]) -> float:
    """Pitch of a checked leg, degrees, whichever way it is given."""
    given: float | None = leg["pitch_deg"]
    if given is not None:
        return given
    pitch_rad = (asin(leg["drop_m"] / leg["length_m"]) if leg["percent"] is None
                 else atan(leg["percent"] / 100))
    # Half of the length is a drop of 30°, not of 29.999999999999996°.
    return round(degrees(pitch_rad), 9)
