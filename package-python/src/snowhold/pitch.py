"""``ask: "pitch"``: what a slope asks, what happens after a fall, how far it takes to stop.

The profile is one to ten legs from the top down. Each has its length along the slope and its
pitch, given as an angle, as a percentage (100 tan α) or as the drop over the leg; all three are
negative where the profile rises. :mod:`snowhold.pitch_question` gives every input with its range.
The formulas are in :mod:`snowhold.standing`, :mod:`snowhold.slide`, :mod:`snowhold.stopping` and
:mod:`snowhold.atmosphere`, the sentences in :mod:`snowhold.pitch_words`.

``stand_edge_angle_deg`` is that of the steepest leg; every leg has its own in ``legs``. On the
``weakest_leg`` a standing edge has the least grip margin in its poorest snow: with one snow on the
whole profile mostly the steepest. The first leg counts where several are equal. The slide and the
stop begin ``fall_at_m`` along the profile; at a break that is the top of the leg below.
"""

from __future__ import annotations

from dataclasses import dataclass, replace
from functools import lru_cache
from math import cos, degrees, inf, isfinite, radians, sin, tan
from typing import Any

from snowhold import pitch_words
from snowhold.atmosphere import air_density_kgpm3, drag_per_m
from snowhold.balance import normal_force_n
from snowhold.constants import AVALANCHE_PITCH_DEG
from snowhold.grip import edge_catch_rad, state
from snowhold.pitch_question import FIELDS, pitch_deg, read_pitch
from snowhold.slide import CLOTHING_FRICTION, Leg, Passage, Slide, slide, speeds_up_above_rad
from snowhold.snow import SNOWS, Snow, Span
from snowhold.standing import (
    Stance,
    sideslip_below_rad,
    standing_edge_angle_rad,
    standing_grip,
    steepest_stand_rad,
)
from snowhold.stopping import (
    BRAKING_FRICTION,
    REACTION_TIME_S,
    cannot_stop_above_rad,
    speed_within_on_mps,
    stopping_distance_m,
    stopping_distance_on_m,
)

__all__ = ["FIELDS", "answer"]

MASS_SPREAD = 0.25
"""Share by which the mass of whoever falls may differ from the rider's. Assumed."""

DRAG_AREA_SPREAD = Span(1.0, 0.7, 1.4)
"""Factors on the drag area: 0.35 to 0.7 m² for 0.5 m². Assumed."""

SWEEP_PITCHES_DEG = tuple(range(51))
"""The pitches of the tables over pitch, degrees."""

_DRAWN_POINTS = 120


@dataclass(frozen=True)
class _Fall:
    """A fall on a profile, and the air and masses that it may happen with."""

    legs: list[Leg]
    at_m: float
    speed_mps: float
    drag_per_m: Span

    def slide(self, friction: float, drag_per_m: float) -> Slide:
        return slide(self.legs, friction, drag_per_m, self.speed_mps, self.at_m)


def answer(question: dict[str, Any]) -> dict[str, Any]:
    """Answer a pitch question; raises :class:`snowhold.question.BadQuestion` on bad fields."""
    values = read_pitch(question)
    pitches_deg = [pitch_deg(leg) for leg in values["legs"]]
    legs = [Leg(radians(pitch), leg["length_m"])
            for pitch, leg in zip(pitches_deg, values["legs"], strict=True)]
    snows = [SNOWS[leg["snow"] or values["snow"]] for leg in values["legs"]]
    stance = _stance(values)
    leg_answers = _legs(legs, pitches_deg, snows, stance, values)
    steepest = max(range(len(legs)), key=lambda index: abs(legs[index].pitch_rad))

    density = air_density_kgpm3(values["altitude_m"], values["air_temperature_c"])
    fall = _Fall(legs, values["fall_at_m"], values["speed_mps"], _drag(values, density))
    fall_leg = _leg_at(legs, fall.at_m)
    friction = _or(values["clothing_friction"], CLOTHING_FRICTION["middle"])
    asked = fall.slide(friction, fall.drag_per_m.value)
    levels = {clothing: fall.slide(level, fall.drag_per_m.value)
              for clothing, level in CLOTHING_FRICTION.items()}
    frictions = _around(friction, CLOTHING_FRICTION["slick"], CLOTHING_FRICTION["rough"])
    fastest = fall.slide(frictions.low, fall.drag_per_m.low)
    slowest = fall.slide(frictions.high, fall.drag_per_m.high)
    band = _band(slowest, fastest)
    band |= {"friction": {"low": frictions.low, "high": frictions.high},
             "drag_per_m": {"low": fall.drag_per_m.low, "high": fall.drag_per_m.high},
             "may_slide_back": _may_slide_back(legs, frictions.low, slowest, fastest)}
    stopping = _stopping(values, legs)
    weakest = min(range(len(legs)), key=lambda index: _sureness(leg_answers[index]["standing"]))
    return {
        "stand_edge_angle_deg": leg_answers[steepest]["standing"]["edge_angle_deg"],
        "steepest_leg": steepest,
        "weakest_leg": weakest,
        "legs": leg_answers,
        "fall": {"at_m": fall.at_m, "leg": fall_leg, "speed_mps": fall.speed_mps,
                 "left_m": sum(leg.length_m for leg in legs) - fall.at_m},
        "slide": {"friction": friction, **_slide(asked),
                  "legs": [_passage(passage) for passage in asked.passages]},
        "levels": [_level(fall, clothing, levels[clothing]) for clothing in CLOTHING_FRICTION],
        "band": band,
        "profile": _profile(legs, fall.at_m, {"asked": asked, **levels, "fastest": fastest,
                                              "slowest": slowest}),
        "sweep": _sweep(fall, fall_leg),
        "stopping": stopping,
        "air_density_kgpm3": density,
        "sentences": [
            pitch_words.stand(leg_answers[steepest], leg_answers[weakest]),
            pitch_words.fall(fall.speed_mps, fall.at_m, band),
            pitch_words.stop(fall.speed_mps, leg_answers[fall_leg]["pitch_deg"], stopping),
        ],
        "cautions": ["estimate"] + (
            ["avalanche"] if any(pitch >= AVALANCHE_PITCH_DEG for pitch in pitches_deg)
            else []),
    }


def _leg_at(legs: list[Leg], place_m: float) -> int:
    """Index of the leg at a place along the profile."""
    end_m = 0.0
    for index, leg in enumerate(legs):
        end_m += leg.length_m
        if place_m < end_m:
            return index
    return len(legs) - 1


def _stance(values: dict[str, Any]) -> Stance:
    drag_deg = values["drag_angle_deg"]
    return Stance(values["rider_mass_kg"], values["effective_edge_m"],
                  radians(values["angulation_deg"]), values["max_load_g"],
                  None if drag_deg is None else radians(drag_deg))


def _drag(values: dict[str, Any], air_density_kgpm3: float) -> Span:
    """Drag per metre as asked, and its least and most over the spreads of mass and drag area."""
    mass_kg, area_m2 = values["rider_mass_kg"], values["drag_area_m2"]
    return Span(
        drag_per_m(air_density_kgpm3, area_m2, mass_kg),
        drag_per_m(air_density_kgpm3, area_m2 * DRAG_AREA_SPREAD.low, mass_kg * (1 + MASS_SPREAD)),
        drag_per_m(air_density_kgpm3, area_m2 * DRAG_AREA_SPREAD.high,
                   mass_kg * (1 - MASS_SPREAD)))


def _around(value: float, low: float, high: float) -> Span:
    """A value in its range, which is widened where the value lies outside."""
    return Span(value, min(low, value), max(high, value))


def _or(value: float | None, default: float) -> float:
    return default if value is None else value


def _finite(number: float) -> float | None:
    return number if isfinite(number) else None


def _spread(span: Span) -> dict[str, float]:
    return {"low": span.low, "mid": span.value, "high": span.high}


def _legs(legs: list[Leg], pitches_deg: list[float], snows: list[Snow], stance: Stance,
          values: dict[str, Any]) -> list[dict[str, Any]]:
    """Each leg's shape and what it asks of a rider who stands on it or stops on it."""
    answers = []
    start_m = 0.0
    for leg, leg_pitch_deg, snow in zip(legs, pitches_deg, snows, strict=True):
        answers.append({
            "pitch_deg": leg_pitch_deg,
            "percent": 100 * tan(leg.pitch_rad),
            "drop_m": leg.length_m * sin(leg.pitch_rad),
            "length_m": leg.length_m,
            "start_m": start_m,
            "end_m": start_m + leg.length_m,
            "snow": snow.code,
            "standing": _standing(stance, leg.pitch_rad, snow, values["waist_m"]),
            "stopping_distance_m": {
                key: _finite(stopping_distance_m(values["speed_mps"], leg.pitch_rad, *braking))
                for key, braking in _brakings(values).items()},
        })
        start_m += leg.length_m
    return answers


def _standing(stance: Stance, pitch_rad: float, snow: Snow, waist_m: float) -> dict[str, Any]:
    """Standing and side-slipping on one pitch; the margin's low and high are over the snow."""
    hardness, shear = snow.hardness_npm3, snow.shear_strength_pa
    margin, limit = standing_grip(stance, pitch_rad, hardness.value, shear.value)
    # Harder snow lets the edge in less, weaker snow shears sooner.
    low, _ = standing_grip(stance, pitch_rad, hardness.high, shear.low)
    high, _ = standing_grip(stance, pitch_rad, hardness.low, shear.high)
    edge_rad = standing_edge_angle_rad(pitch_rad)
    slips_deg = degrees(sideslip_below_rad(pitch_rad, snow.glide_friction.value))
    clears_deg = degrees(edge_catch_rad(
        normal_force_n(stance.mass_kg, pitch_rad), stance.effective_edge_m, waist_m,
        hardness.value, snow.roughness_m))
    return {
        "edge_angle_deg": degrees(edge_rad),
        "angulated_edge_angle_deg": degrees(edge_rad + stance.angulation_rad),
        "grip_margin": {"low": _finite(low), "mid": _finite(margin), "high": _finite(high)},
        "limit": limit,
        "state": {"low": state(low), "mid": state(margin), "high": state(high)},
        "edge_catch_below_deg": _finite(clears_deg),
        # NaN clears nothing: the comparison is false.
        "sideslip_deg": ({"min": clears_deg, "max": slips_deg} if clears_deg < slips_deg
                         else None),
        "washes_out_above_deg": _washes_out_above_deg(stance, snow),
    }


def _sureness(standing: dict[str, Any]) -> float:
    """The margin of a standing edge in the poorest of its snow; level ground asks for none."""
    low: float | None = standing["grip_margin"]["low"]
    return inf if low is None else low


@lru_cache(maxsize=64)
def _washes_out_above_deg(stance: Stance, snow: Snow) -> dict[str, float | None]:
    """Pitch above which even standing washes out on this snow; null: not up to 50°."""
    hardness, shear = snow.hardness_npm3, snow.shear_strength_pa
    limits_rad = {
        "low": steepest_stand_rad(stance, hardness.high, shear.low),
        "mid": steepest_stand_rad(stance, hardness.value, shear.value),
        "high": steepest_stand_rad(stance, hardness.low, shear.high),
    }
    return {key: None if limit is None else degrees(limit) for key, limit in limits_rad.items()}


def _slide(way: Slide) -> dict[str, Any]:
    """A slide in figures; the distance and the place of its halt are null where it has none."""
    halt = next(((index, passage.start_m + passage.distance_m)
                 for index, passage in enumerate(way.passages)
                 if passage is not None and passage.stops), (None, None))
    return {
        "stops": way.stops,
        "distance_m": way.distance_m if way.stops else None,
        "stops_at_m": halt[1],
        "stops_on_leg": halt[0],
        "slides_back": way.slides_back,
        "end_speed_mps": way.end_speed_mps,
        "top_speed_mps": way.top_speed_mps,
        "time_s": _finite(way.time_s),
    }


def _passage(passage: Passage | None) -> dict[str, Any]:
    if passage is None:
        return dict.fromkeys(("speed_in_mps", "speed_out_mps", "distance_m", "time_s", "stops"))
    return {
        "speed_in_mps": passage.speed_in_mps,
        "speed_out_mps": passage.speed_out_mps,
        "distance_m": passage.distance_m,
        "time_s": _finite(passage.time_s),
        "stops": passage.stops,
    }


def _band(slowest: Slide, fastest: Slide) -> dict[str, Any]:
    """From the slowest to the fastest slide; a distance is null where that slide has no halt."""
    def stops_all_some_none() -> str:
        if fastest.stops:
            return "all"
        return "some" if slowest.stops else "none"

    return {
        "stops": stops_all_some_none(),
        "distance_m": {"low": slowest.distance_m if slowest.stops else None,
                       "high": fastest.distance_m if fastest.stops else None},
        "end_speed_mps": {"low": slowest.end_speed_mps, "high": fastest.end_speed_mps},
        "top_speed_mps": {"low": slowest.top_speed_mps, "high": fastest.top_speed_mps},
    }


def _may_slide_back(legs: list[Leg], friction: float, slowest: Slide, fastest: Slide) -> bool:
    """Whether a slide in the band may halt on a rise that it then slides back from.

    ``friction`` is the least of the band.
    """
    return any(
        tan(leg.pitch_rad) < -friction and quick is not None and (slow is None or slow.stops)
        for leg, slow, quick in zip(legs, slowest.passages, fastest.passages, strict=True))


def _level(fall: _Fall, clothing: str, way: Slide) -> dict[str, Any]:
    """The slide in one clothing, with its band over mass and drag area."""
    friction = CLOTHING_FRICTION[clothing]
    return {
        "clothing": clothing,
        "friction": friction,
        "speeds_up_above_deg": degrees(speeds_up_above_rad(friction)),
        **_slide(way),
        "band": _band(fall.slide(friction, fall.drag_per_m.high),
                      fall.slide(friction, fall.drag_per_m.low)),
    }


def _profile(legs: list[Leg], fall_at_m: float, ways: dict[str, Slide]) -> dict[str, Any]:
    """The profile as lists for drawing, and the speed of each slide along it.

    Heights are above the lowest point, x is level from the top. A speed is null where that slide
    never was. Every break, the fall and every halt are among the points.
    """
    breaks_m = [0.0]
    x_m, height_m = [0.0], [0.0]
    for leg in legs:
        breaks_m.append(breaks_m[-1] + leg.length_m)
        x_m.append(x_m[-1] + leg.length_m * cos(leg.pitch_rad))
        height_m.append(height_m[-1] - leg.length_m * sin(leg.pitch_rad))
    lowest_m = min(height_m)
    step_m = breaks_m[-1] / _DRAWN_POINTS
    places_m = {count * step_m for count in range(_DRAWN_POINTS)} | {fall_at_m} | set(breaks_m)
    for way in ways.values():
        places_m |= {passage.start_m + passage.distance_m for passage in way.passages
                     if passage is not None and passage.stops}
    points_m = sorted(places_m)
    on = [_leg_at(legs, place_m) for place_m in points_m]
    return {
        "distance_m": points_m,
        "x_m": [x_m[leg] + (place_m - breaks_m[leg]) * cos(legs[leg].pitch_rad)
                for leg, place_m in zip(on, points_m, strict=True)],
        "height_m": [height_m[leg] - lowest_m
                     - (place_m - breaks_m[leg]) * sin(legs[leg].pitch_rad)
                     for leg, place_m in zip(on, points_m, strict=True)],
        "speed_mps": {name: [way.speed_mps(place_m) for place_m in points_m]
                      for name, way in ways.items()},
    }


def _sweep(fall: _Fall, leg: int) -> dict[str, Any]:
    """The slide against the pitch of the leg of the fall; the rest of the profile stays."""
    levels: list[dict[str, Any]] = []
    for clothing, friction in CLOTHING_FRICTION.items():
        foot_mps, end_mps, distance_m = [], [], []
        for swept_deg in SWEEP_PITCHES_DEG:
            legs = list(fall.legs)
            legs[leg] = replace(legs[leg], pitch_rad=radians(swept_deg))
            way = replace(fall, legs=legs).slide(friction, fall.drag_per_m.value)
            foot = way.passages[leg]
            foot_mps.append(foot.speed_out_mps if foot is not None else None)
            end_mps.append(way.end_speed_mps)
            distance_m.append(way.distance_m if way.stops else None)
        levels.append({"clothing": clothing, "friction": friction, "foot_speed_mps": foot_mps,
                       "end_speed_mps": end_mps, "distance_m": distance_m})
    return {"leg": leg, "pitch_deg": list(SWEEP_PITCHES_DEG), "levels": levels}


def _brakings(values: dict[str, Any]) -> dict[str, tuple[float, float]]:
    """Braking grip and reaction time for the shortest, the asked and the longest stop."""
    grip, reaction = _braking_spans(values)
    return {"low": (grip.high, reaction.low), "mid": (grip.value, reaction.value),
            "high": (grip.low, reaction.high)}


def _braking_spans(values: dict[str, Any]) -> tuple[Span, Span]:
    grip = _or(values["braking_friction"], BRAKING_FRICTION.value)
    reaction_s = _or(values["reaction_time_s"], REACTION_TIME_S.value)
    return (_around(grip, BRAKING_FRICTION.low, BRAKING_FRICTION.high),
            _around(reaction_s, REACTION_TIME_S.low, REACTION_TIME_S.high))


def _stopping(values: dict[str, Any], legs: list[Leg]) -> dict[str, Any]:
    """Stopping from ``fall_at_m`` on; distances are null where braking does not stop the rider."""
    grip, reaction = _braking_spans(values)
    brakings = _brakings(values)
    speed_mps, at_m = values["speed_mps"], values["fall_at_m"]
    distances_m = {key: stopping_distance_on_m(legs, speed_mps, *braking, at_m)
                   for key, braking in brakings.items()}
    left_m = sum(leg.length_m for leg in legs) - at_m
    sight_m = values["sight_distance_m"]
    return {
        "distance_m": _finite(distances_m["mid"]),
        "band_m": {key: _finite(distances_m[key]) for key in ("low", "high")},
        "past_profile": {key: left_m < distance_m < inf
                         for key, distance_m in distances_m.items()},
        "braking_friction": _spread(grip),
        "reaction_time_s": _spread(reaction),
        "cannot_stop_above_deg": {
            key: degrees(cannot_stop_above_rad(friction))
            for key, friction in _spread(grip).items()},
        "by_pitch": {
            "pitch_deg": list(SWEEP_PITCHES_DEG),
            "distance_m": {
                key: [_finite(stopping_distance_m(speed_mps, radians(swept_deg), *braking))
                      for swept_deg in SWEEP_PITCHES_DEG]
                for key, braking in brakings.items()},
        },
        "sight": None if sight_m is None else {
            "distance_m": sight_m,
            # The longest stop allows the least speed.
            "speed_mps": {key: speed_within_on_mps(legs, sight_m, *brakings[braking], at_m)
                          for key, braking in (("low", "high"), ("mid", "mid"),
                                               ("high", "low"))},
        },
    }
