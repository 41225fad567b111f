"""What a pitch answer means, in three sentences that could be read aloud.

Each is a code with the values that it rests on; a page makes its own words from them, and
:func:`english` is the command line's. A code is chosen by the whole band, never by its middle,
and numbers are rounded outward: a sentence is neither surer nor vaguer than the band.
"""

from __future__ import annotations

from math import ceil, floor
from typing import Any

from snowhold.snow import SNOWS

Sentence = dict[str, Any]


def stand(steepest: dict[str, Any], weakest: dict[str, Any]) -> Sentence:
    """What standing asks on the steepest leg, and whether the edge holds on the weakest.

    Both are legs of the answer; the verdict is over the whole range of the weakest one's snow.
    """
    standing = weakest["standing"]
    lowest, highest = standing["state"]["low"], standing["state"]["high"]
    values = {"pitch_deg": steepest["pitch_deg"],
              "edge_angle_deg": steepest["standing"]["edge_angle_deg"],
              "weakest_pitch_deg": weakest["pitch_deg"], "snow": weakest["snow"],
              "margin_low": standing["grip_margin"]["low"],
              "margin_high": standing["grip_margin"]["high"]}
    if steepest["pitch_deg"] == 0:
        code = "stand_level"
    elif lowest == highest:
        code = f"stand_{lowest}"
    elif lowest == "washes_out":
        code = "stand_may_wash_out"
    else:
        code = "stand_may_be_marginal"
    return {"code": code, "values": values}


def fall(speed_mps: float, at_m: float, band: dict[str, Any]) -> Sentence:
    """What happens after a fall, over the whole ``band`` of the answer."""
    values = {
        "speed_mps": speed_mps, "at_m": at_m,
        "friction_low": band["friction"]["low"], "friction_high": band["friction"]["high"],
        "distance_low_m": band["distance_m"]["low"], "distance_high_m": band["distance_m"]["high"],
        "end_speed_low_mps": band["end_speed_mps"]["low"],
        "end_speed_high_mps": band["end_speed_mps"]["high"],
        "may_slide_back": band["may_slide_back"],
    }
    stays = band["distance_m"]["high"] == 0 and not band["may_slide_back"]
    return {"code": "slide_stays" if stays else f"slide_stops_{band['stops']}", "values": values}


def stop(speed_mps: float, pitch_deg: float, stopping: dict[str, Any]) -> Sentence:
    """How far it takes to stop, over the whole band of the answer's ``stopping``.

    ``pitch_deg`` is that of the leg on which it begins.
    """
    low_m, high_m = stopping["band_m"]["low"], stopping["band_m"]["high"]
    values = {"speed_mps": speed_mps, "pitch_deg": pitch_deg, "distance_low_m": low_m,
              "distance_high_m": high_m,
              "past_profile": any(stopping["past_profile"].values())}
    if speed_mps == 0:
        code = "stop_at_rest"
    elif low_m is None:
        code = "stop_never"
    else:
        code = "stop_unsure" if high_m is None else "stop_always"
    return {"code": code, "values": values}


def english(sentence: Sentence) -> str:
    """A sentence in words."""
    values = sentence["values"]
    kind = sentence["code"].split("_")[0]
    return {"stand": _stand, "slide": _slide, "stop": _stop}[kind](sentence["code"], values)


def pitch_lines(reply: dict[str, Any]) -> list[str]:
    """A pitch answer in lines for people."""
    lines = [english(sentence) for sentence in reply["sentences"]]
    for number, (leg, passage) in enumerate(zip(reply["legs"], reply["slide"]["legs"],
                                                strict=True), start=1):
        line = (f"  Leg {number}: {leg['pitch_deg']:.1f}°, {leg['length_m']:.0f} m, "
                f"{SNOWS[leg['snow']].name}; ")
        if passage["stops"] is None:
            line += "the slide is not here"
        elif passage["stops"]:
            line += (f"a slide at friction {reply['slide']['friction']:g} stops after "
                     f"{passage['distance_m']:.0f} m of it")
        else:
            line += (f"a slide at friction {reply['slide']['friction']:g} leaves it at "
                     f"{passage['speed_out_mps'] * 3.6:.0f} km/h")
        lines.append(line + ".")
    for level in reply["levels"]:
        lines.append(f"  In {level['clothing']} clothing (friction {level['friction']:g}) a "
                     f"slide speeds up above {level['speeds_up_above_deg']:.1f}°.")
    limits = reply["stopping"]["cannot_stop_above_deg"]
    lines.append(f"  Braking stops nobody above {limits['low']:.0f}° to {limits['high']:.0f}°, "
                 "by how well the edge grips.")
    sight = reply["stopping"]["sight"]
    if sight is not None:
        slow, quick = sight["speed_mps"]["low"], sight["speed_mps"]["high"]
        if quick is None:
            text = "no speed stops"
        elif slow is None:
            text = f"up to {_down(quick * 3.6)} km/h may stop, or none"
        else:
            text = f"{_down(slow * 3.6)} km/h stops, {_down(quick * 3.6)} km/h at best"
        lines.append(f"  Within {sight['distance_m']:g} m of sight {text}.")
    return lines


def _stand(code: str, values: dict[str, Any]) -> str:
    if code == "stand_level":
        return "On level ground, standing asks for no edge."
    end = {
        "stand_holds": "holds",
        "stand_may_be_marginal": "holds, perhaps only just",
        "stand_marginal": "holds only just",
        "stand_may_wash_out": "may hold or wash out, by how that snow is on the day",
        "stand_washes_out": "washes out",
    }[code]
    where = ("there" if values["weakest_pitch_deg"] == values["pitch_deg"] else
             f"where it is least sure, on {_degrees(values['weakest_pitch_deg'])},")
    return (f"To stand on the steepest part, {_degrees(values['pitch_deg'])}, a board has to be "
            f"tilted {_degrees(values['edge_angle_deg'])} onto its edge; {where} on snow that is "
            f"{SNOWS[values['snow']].name}, an edge {end}.")


def _slide(code: str, values: dict[str, Any]) -> str:
    start = ("After a fall from standing" if values["speed_mps"] == 0 else
             f"After a fall at {values['speed_mps'] * 3.6:.0f} km/h")
    clothing = (f"with clothing friction from {values['friction_low']:g} to "
                f"{values['friction_high']:g}")
    near, far = values["distance_low_m"], values["distance_high_m"]
    slow, quick = values["end_speed_low_mps"], values["end_speed_high_mps"]
    back = " On the rise it may slide back." if values["may_slide_back"] else ""
    if code == "slide_stays":
        return f"Who falls here from standing stays there, {clothing}."
    if code == "slide_stops_all":
        return f"{start} a body slides {_from_to(near, far, 'm')} and stops, {clothing}.{back}"
    if code == "slide_stops_some":
        return (f"{start} a body may stop, after {_down(near)} m at the least, or run past the "
                f"end of this profile at up to {_up(quick * 3.6)} km/h, {clothing}.{back}")
    return (f"{start} a body does not stop on this profile: it reaches the end at "
            f"{_from_to(slow * 3.6, quick * 3.6, 'km/h')}, {clothing}.")


def _stop(code: str, values: dict[str, Any]) -> str:
    start = f"Braking from {values['speed_mps'] * 3.6:.0f} km/h"
    near, far = values["distance_low_m"], values["distance_high_m"]
    past = " if the slope goes on as it ends" if values["past_profile"] else ""
    if code == "stop_at_rest":
        return "Who stands has nothing to brake."
    if code == "stop_always":
        return (f"{start} takes {_from_to(near, far, 'm')} to a stop with the time to "
                f"react{past}.")
    if code == "stop_unsure":
        return (f"{start} takes {_down(near)} m at the best{past}, and with the poorest grip "
                "it never stops.")
    return f"{start} never stops here, even with the best grip."


def _from_to(low: float, high: float, unit: str) -> str:
    low_text, high_text = _down(low), _up(high)
    return (f"{low_text} {unit}" if low_text == high_text else
            f"{low_text} to {high_text} {unit}")


def _down(number: float) -> str:
    return f"{floor(number)}"


def _up(number: float) -> str:
    return f"{ceil(number)}"


def _degrees(angle_deg: float) -> str:
    return f"{abs(angle_deg):.1f}".removesuffix(".0") + "°"
