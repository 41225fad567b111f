"""``ask: "stiffness"``: a board's bending stiffness at home.

The board lies on two supports, a weight hangs or stands at mid-span, and the sag that the weight
adds is read off. Three-point bending of a beam of even stiffness [1] gives EI.

References
----------
[1] EI = P L³/(48 δ): any handbook of beam formulas.
[2] F. K. Fuss et al., Vibration of Snowboard Decks, Procedia Engineering 2 (2010): first free
    bending mode at 16 Hz.
"""

from __future__ import annotations

from math import hypot, pi
from typing import Any

from snowhold.constants import G0_MPS2
from snowhold.question import BadQuestion, Choice, Field, Number, read

FREE_FREE_NUMBER = 22.373285448061
"""(βL)² of the first bending mode of a free beam: the first root of cosh βL · cos βL = 1, squared.
Any handbook of vibration."""

LARGEST_SAG_SHARE = 0.1
"""Sag over span up to which the small-slope formula is used. Assumed: the slope at the supports,
3 δ/L, is then below 17°."""

FIELDS: dict[str, Field] = {
    "ask": Choice(("stiffness",)),
    "supports_m": Number(0.3, 2.0, "m"),
    "load_kg": Number(0.1, 100, "kg"),
    "sag_m": Number(0, 0.2, "m", above_low=True),
    "supports_spread_m": Number(0, 0.05, "m", default=0.005),
    "load_spread_kg": Number(0, 10, "kg", default=None, null=True),
    "sag_spread_m": Number(0, 0.02, "m", default=0.001),
}
"""Distance between the supports, weight at mid-span, sag that the weight adds, and 1σ of each
(assumed where not given; 2 % of the load)."""

LOAD_SPREAD_SHARE = 0.02
"""1σ of a load where it is not given, over the load. Assumed."""

STIFFNESSES_NM2 = (20.0, 2000.0)
"""Stiffnesses that a board question may hold, N·m²: children's boards to racing ones. Assumed."""


def bending_stiffness_nm2(load_n: float, supports_m: float, sag_m: float) -> float:
    """EI = P L³/(48 δ) [1], N·m², from the load P at mid-span, N, for sags small against the span.

    That of an even beam; on a tapered board it is mostly that of the middle, which bends most.
    """
    return load_n * supports_m**3 / (48 * sag_m)


def spread_shares(load_share: float, supports_share: float, sag_share: float) -> dict[str, float]:
    """What the relative 1σ of each measurement adds to that of EI: linear propagation of
    P L³/δ."""
    return {"load": load_share, "supports": 3 * supports_share, "sag": sag_share}


def free_mode_stiffness_nm2(frequency_hz: float, length_m: float, mass_kg: float) -> float:
    """EI of an even free beam from its first bending mode, N·m².

    ω = (βL)² √(EI/(m L³)), (βL)² = 22.37.
    """
    return (2 * pi * frequency_hz / FREE_FREE_NUMBER)**2 * mass_kg * length_m**3


# 16 Hz from [2]; length and mass of that board are assumed.
_MEASURED_NM2 = free_mode_stiffness_nm2(16.0, 1.55, 2.7)

TYPICAL = (
    {"code": "soft", "stiffness_nm2": 120.0, "source": "assumed"},
    {"code": "medium", "stiffness_nm2": round(_MEASURED_NM2, -1), "source": "fuss_2010_assumed"},
    {"code": "stiff", "stiffness_nm2": 320.0, "source": "assumed"},
)
"""Stiffnesses to start from, N·m². "fuss_2010_assumed": from the mode measured in [2] with length
and mass assumed."""


def answer(question: dict[str, Any]) -> dict[str, Any]:
    """Answer a stiffness question; raises :class:`snowhold.question.BadQuestion` on bad fields.

    * ``stiffness_nm2``, ``spread_nm2`` (1σ), ``low_nm2`` and ``high_nm2`` (1σ either way, as a
      factor, so that the low one stays above 0).
    * ``spread_from``: share of the variance that each measurement brings: ``load``, ``supports``,
      ``sag``; ``weakest``: the one that brings most, null where all spreads are 0.
    * ``typical``: :data:`TYPICAL`.
    """
    values = read(question, FIELDS)
    supports_m, load_kg, sag_m = (values[key] for key in ("supports_m", "load_kg", "sag_m"))
    ei_nm2 = bending_stiffness_nm2(load_kg * G0_MPS2, supports_m, sag_m)
    faults = []
    if sag_m > LARGEST_SAG_SHARE * supports_m:
        faults.append({"field": "sag_m", "problem": f"{sag_m:g} is too large for this span",
                       "allowed": f"up to {LARGEST_SAG_SHARE * supports_m:g} m here; take less "
                                  "weight"})
    elif not STIFFNESSES_NM2[0] <= ei_nm2 <= STIFFNESSES_NM2[1]:
        faults.append({"field": "sag_m", "problem": f"makes a stiffness of {ei_nm2:.3g} N·m²",
                       "allowed": f"a stiffness from {STIFFNESSES_NM2[0]:g} to "
                                  f"{STIFFNESSES_NM2[1]:g} N·m²"})
    if faults:
        raise BadQuestion(faults)
    load_spread_kg = values["load_spread_kg"]
    shares = spread_shares(
        LOAD_SPREAD_SHARE if load_spread_kg is None else load_spread_kg / load_kg,
        values["supports_spread_m"] / supports_m, values["sag_spread_m"] / sag_m)
    share = hypot(*shares.values())
    return {
        "stiffness_nm2": ei_nm2,
        "spread_nm2": share * ei_nm2,
        "low_nm2": ei_nm2 / (1 + share),
        "high_nm2": ei_nm2 * (1 + share),
        "spread_from": {name: (part / share)**2 if share > 0 else 0.0
                        for name, part in shares.items()},
        "weakest": max(shares, key=lambda name: shares[name]) if share > 0 else None,
        "typical": [dict(entry) for entry in TYPICAL],
        "cautions": ["estimate"],
    }
