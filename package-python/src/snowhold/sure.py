"""How sure: the chance that the edge holds when every input is rough.

Each input is spread about its stated value; a Latin hypercube with a fixed seed covers the
spreads evenly, and every sample is a whole turn of its own. Pitch and angulation are normal,
speed, sidecut and line radius log-normal (they stay positive), snow hardness and shear strength
triangular in the logarithm over the published range of their class, peaked at its value. The
default spreads are assumed; so are the shapes and the samples' independence.

References
----------
[1] M. D. McKay, R. J. Beckman, W. J. Conover, A Comparison of Three Methods for Selecting Values
    of Input Variables…, Technometrics 21 (1979) 239-245: Latin hypercube sampling.
"""

from __future__ import annotations

import random
from dataclasses import replace
from functools import lru_cache
from math import log, radians
from statistics import NormalDist
from typing import Any

import numpy as np

from snowhold.constants import HOLDS_MARGIN
from snowhold.grip import STATES
from snowhold.phases import Turn, ride
from snowhold.snow import Snow, Span

_NORMALS = ("pitch", "speed", "sidecut", "angulation", "line")
_UNIFORMS = ("hardness", "shear")
_SEED = 20
_BLOCK = 4096
"""Samples that are ridden at a time, which bounds the memory of large numbers of them."""

_BAND = (0.05, 0.95)


@lru_cache(maxsize=2)
def latin_hypercube(count: int) -> dict[str, np.ndarray[Any, Any]]:
    """``count`` samples of each input [1]: standard normal or uniform (0, 1) columns.

    Python's own generator, whose numbers are the same on every machine and in every version.
    """
    generator = random.Random(_SEED)
    quantile = NormalDist().inv_cdf
    columns = {}
    for name in _NORMALS + _UNIFORMS:
        # One sample in each of ``count`` equal slices, kept off the ends where a normal is endless.
        shares = [(i + min(max(generator.random(), 1e-9), 1 - 1e-9)) / count for i in range(count)]
        generator.shuffle(shares)
        columns[name] = np.array([quantile(share) for share in shares]
                                 if name in _NORMALS else shares)
    return columns


def log_triangular(span: Span, share_of_range: float, uniform: Any) -> Any:
    """Values triangular in the logarithm over a span, peaked at its value, from uniform (0, 1).

    ``share_of_range`` draws the ends toward the value: 0 gives the value alone, 1 the whole span.
    """
    below = log(span.value / span.low) * share_of_range
    above = log(span.high / span.value) * share_of_range
    width = below + above
    left = np.sqrt(uniform * width * below) - below
    right = above - np.sqrt((1 - uniform) * width * above)
    return span.value * np.exp(np.where(uniform * width < below, left, right))


def sampled(turn: Turn, snow: Snow, spread: dict[str, float], count: int) -> Turn:
    """The turn with a column of ``count`` samples in each spread field."""
    unit = {name: column[:, None] for name, column in latin_hypercube(count).items()}
    return replace(
        turn,
        pitch_rad=turn.pitch_rad + radians(spread["pitch_deg"]) * unit["pitch"],
        speed_mps=turn.speed_mps * np.exp(spread["speed_share"] * unit["speed"]),
        sidecut_radius_m=turn.sidecut_radius_m * np.exp(spread["sidecut_share"] * unit["sidecut"]),
        angulation_rad=turn.angulation_rad
        + radians(spread["angulation_deg"]) * unit["angulation"],
        line_radius_m=None if turn.line_radius_m is None
        else turn.line_radius_m * np.exp(spread["line_share"] * unit["line"]),
        hardness_npm3=log_triangular(snow.hardness_npm3, spread["snow_share"], unit["hardness"]),
        shear_strength_pa=log_triangular(snow.shear_strength_pa, spread["snow_share"],
                                         unit["shear"]))


def how_sure(turn: Turn, snow: Snow, spread: dict[str, float], phases_deg: list[float],
             count: int) -> dict[str, Any]:
    """Chance that the edge holds, and the band of its margin along the turn.

    ``chance_holds`` is the share of the samples whose whole turn is balanced with a grip margin
    of 0 or more; ``chances`` the share of each verdict. ``margin_band`` has the 5 % and 95 %
    quantiles of the margin at each phase among the samples that are balanced there, and
    ``balanced_share``; null where none of them is.
    """
    phase_rad = np.radians(phases_deg)
    samples = sampled(turn, snow, spread, count)
    margins = np.empty((count, len(phases_deg)))
    worst = np.empty(count, dtype=int)
    for start in range(0, count, _BLOCK):
        block = slice(start, start + _BLOCK)
        columns: dict[str, Any] = {name: value[block] for name, value in vars(samples).items()
                                   if isinstance(value, np.ndarray)}
        phases = ride(replace(samples, **columns), phase_rad, np)
        margins[block] = phases.grip_margin
        worst[block] = _worst_state(phases.grip_margin, phases.too_slow, phases.too_fast)
    chances = {state: float(np.mean(worst == index)) for index, state in enumerate(STATES)}
    low, high, balanced = _band(margins)
    return {"chance_holds": chances["holds"] + chances["marginal"], "chances": chances,
            "margin_band": {"low": low, "high": high}, "balanced_share": balanced}


def _worst_state(margin: Any, too_slow: Any, too_fast: Any) -> Any:
    """Index in STATES of each sample's worst phase."""
    least = np.where(np.isnan(margin), np.inf, margin).min(axis=1)
    state = np.where(least < HOLDS_MARGIN, STATES.index("marginal"), STATES.index("holds"))
    for name, found in (("too_slow", too_slow), ("too_fast", too_fast)):
        here = np.broadcast_to(found, margin.shape).any(axis=1)
        state = np.where(here, STATES.index(name), state)
    return np.where(least < 0, STATES.index("washes_out"), state)


def _band(margins: Any) -> tuple[list[float | None], list[float | None], list[float]]:
    """Quantiles of each phase's margins, NaN left out, and the share that is not NaN."""
    ordered = np.sort(margins, axis=0)  # NaN sorts to the end
    counts = (~np.isnan(margins)).sum(axis=0)
    columns = np.arange(margins.shape[1])
    low, high = (ordered[np.clip((share * counts).astype(int), 0, np.maximum(counts - 1, 0)),
                         columns] for share in _BAND)
    def listed(values: Any) -> list[float | None]:
        return [float(value) if count else None
                for value, count in zip(values, counts, strict=True)]

    return listed(low), listed(high), [float(c) for c in counts / len(margins)]
