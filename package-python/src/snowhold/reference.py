"""``ask: "reference"``: what the answers rest on, for the page to show.

The classes of snow with their ranges, the published speeds, and the ranges of the turn's
numbers (what a slider may offer) with their spread where none is given.
"""

from __future__ import annotations

from typing import Any

from snowhold.changes import DEFAULT_SPREAD
from snowhold.question import Choice, Field, read
from snowhold.snow import SNOWS
from snowhold.speeds import SPEEDS
from snowhold.turn import RANGES

FIELDS: dict[str, Field] = {"ask": Choice(("reference",))}
"""A reference question has no other fields."""


def answer(question: dict[str, Any]) -> dict[str, Any]:
    """Answer a reference question: ``snows``, ``speeds``, ``turn_ranges`` and ``turn_spread``."""
    read(question, FIELDS)
    return {
        "snows": [{
            "code": snow.code, "name": snow.name, "roughness_m": snow.roughness_m,
            **{key: {"value": span.value, "low": span.low, "high": span.high}
               for key, span in (("hardness_npm3", snow.hardness_npm3),
                                 ("shear_strength_pa", snow.shear_strength_pa),
                                 ("glide_friction", snow.glide_friction))},
        } for snow in SNOWS.values()],
        "speeds": [vars(speed) for speed in SPEEDS.values()],
        "turn_ranges": {name: {"low": low, "high": high} for name, (low, high) in RANGES.items()},
        "turn_spread": dict(DEFAULT_SPREAD),
        "cautions": ["estimate"],
    }
