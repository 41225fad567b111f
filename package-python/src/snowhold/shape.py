"""The board's outline from a tape measure: widths, sidecut radius, radius by position.

x along the board from the middle of the effective edge, nose positive; widths in m. Three widths
(nose and tail at the ends of the effective edge, waist at its middle) give one radius
(:func:`snowhold.sidecut.sidecut_radius_m`); more widths give the radius by position.

References
----------
[1] Circle through three points: its curvature is four times the area of their triangle over the
    product of its sides (any handbook of geometry).
"""

from __future__ import annotations

from collections.abc import Sequence
from math import hypot, sqrt
from typing import Any

from snowhold.sidecut import sidecut_radius_m

WIDTH_SPREAD_M = 0.001
"""1σ of a width from a tape measure, m. Assumed."""

EDGE_SPREAD_M = 0.010
"""1σ of an effective edge from a tape measure or a spec sheet, m. Assumed."""

AGREES_SHARE = 0.05
"""A stated radius further from the measured one than this is explained."""

_STRAIGHT_PM = 1e-3
"""An edge that curves less than this (a radius over 1 km) is called straight. Assumed."""

Station = tuple[float, float]
"""Position and width, m."""


def radius_spread_m(nose_m: float, waist_m: float, tail_m: float, effective_edge_m: float,
                    width_spread_m: float = WIDTH_SPREAD_M,
                    edge_spread_m: float = EDGE_SPREAD_M) -> float:
    """1σ of the sidecut radius from the spreads of what it is measured from, m.

    Linear propagation through R = L²/(2 D), D = W_nose + W_tail − 2 W_waist:
    (σ_R/R)² = (2 σ_L/L)² + 6 (σ_W/D)².
    """
    difference_m = nose_m + tail_m - 2 * waist_m
    share = hypot(2 * edge_spread_m / effective_edge_m, sqrt(6) * width_spread_m / difference_m)
    return float(share * sidecut_radius_m(nose_m, waist_m, tail_m, effective_edge_m))


def stations(nose_m: float, waist_m: float, tail_m: float, effective_edge_m: float,
             widths: Sequence[Station] | None = None) -> list[Station]:
    """Positions and widths along the edge, from tail to nose.

    Without ``widths``: tail, waist and nose, the waist at the middle. With them (ascending
    positions): those, and tail and nose at the ends where the widths stop short of them.
    """
    half_m = effective_edge_m / 2
    if widths is None:
        return [(-half_m, tail_m), (0.0, waist_m), (half_m, nose_m)]
    inside = list(widths)
    # Within a thousandth of the end the measured width is the end's.
    slack_m = effective_edge_m / 1000
    if inside[0][0] > -half_m + slack_m:
        inside.insert(0, (-half_m, tail_m))
    if inside[-1][0] < half_m - slack_m:
        inside.append((half_m, nose_m))
    return inside


def width_m(along: Sequence[Station], at_m: float) -> float:
    """Width at a position, m, from three or more stations.

    Between two stations the parabola through them and the station before is blended, linearly,
    into the one through them and the station after; three stations give one parabola, an edge
    that is a parabola is met exactly, and the slope is continuous. Beyond the ends the last
    parabola goes on.
    """
    last = len(along) - 2
    right = next((i for i, (x_m, _) in enumerate(along) if x_m >= at_m), len(along) - 1)
    before = _parabola(along, min(max(right - 1, 1), last), at_m)
    after = _parabola(along, min(max(right, 1), last), at_m)
    left_m, right_m = along[max(right - 1, 0)][0], along[right][0]
    share = 0.0 if right_m <= left_m else min(max((at_m - left_m) / (right_m - left_m), 0.0), 1.0)
    return (1 - share) * before + share * after


def _parabola(along: Sequence[Station], middle: int, at_m: float) -> float:
    """The parabola through station ``middle`` and its two neighbours, at a position."""
    (x0, w0), (x1, w1), (x2, w2) = along[middle - 1:middle + 2]
    slope = (w1 - w0) / (x1 - x0)
    bend = ((w2 - w1) / (x2 - x1) - slope) / (x2 - x0)
    return w0 + (at_m - x0) * (slope + bend * (at_m - x1))


def fitted_curvature_pm(along: Sequence[Station], points: int = 101) -> float:
    """Curvature of the parabola fitted by least squares to one whole edge, 1/m.

    The part of half the width that goes with the Legendre polynomial P₂(t) = (3 t² − 1)/2, t from
    −1 to 1 along the edge, integrated by Simpson's rule: y″ = 3 c₂/(L/2)², c₂ = 5/2 ∫ y P₂ dt.
    """
    half_m = (along[-1][0] - along[0][0]) / 2
    total = 0.0
    for i in range(points):
        t = 2 * i / (points - 1) - 1
        weight = 1 if i in (0, points - 1) else 2 + 2 * (i % 2)
        half_width_m = width_m(along, along[0][0] + (1 + t) * half_m) / 2
        total += weight * half_width_m * (3 * t * t - 1) / 2
    return 3 * 2.5 * total * 2 / (3 * (points - 1)) / half_m**2


def local_curvature_pm(along: Sequence[Station]) -> list[float]:
    """Curvature of one edge at each inner station, 1/m, positive where the edge is waisted.

    That of the circle through the station and its two neighbours [1]: exact where the three lie
    on one arc; where the radius changes between them it lies between the two radii. The edge is
    half the width from the middle line.
    """
    curvatures = []
    for (x0, w0), (x1, w1), (x2, w2) in zip(along, along[1:], along[2:], strict=False):
        y0, y1, y2 = w0 / 2, w1 / 2, w2 / 2
        twice_area = (x1 - x0) * (y2 - y0) - (x2 - x0) * (y1 - y0)
        sides = hypot(x1 - x0, y1 - y0) * hypot(x2 - x1, y2 - y1) * hypot(x2 - x0, y2 - y0)
        curvatures.append(2 * twice_area / sides)
    return curvatures


def local_radii(along: Sequence[Station]) -> list[dict[str, float | None]]:
    """Radius at each inner station: ``at_m``, ``radius_m``, ``spread_m``, m.

    ``radius_m`` is None where the edge is straight or bulges outward there. ``spread_m`` is 1σ
    from that of each width (:data:`WIDTH_SPREAD_M`), None as well where it is as large as the
    radius: the stations are too close together for the tape.
    """
    rows: list[dict[str, float | None]] = []
    for index, curvature in enumerate(local_curvature_pm(along), start=1):
        before_m = along[index][0] - along[index - 1][0]
        after_m = along[index + 1][0] - along[index][0]
        # Second difference of three half widths, each with half the width's spread.
        spread_pm = (WIDTH_SPREAD_M / (before_m + after_m)
                     * sqrt(before_m**-2 + after_m**-2 + (1 / before_m + 1 / after_m)**2))
        waisted = curvature > _STRAIGHT_PM
        clear = waisted and spread_pm < curvature
        rows.append({"at_m": along[index][0],
                     "radius_m": 1 / curvature if waisted else None,
                     "spread_m": spread_pm / curvature**2 if clear else None})
    return rows


def stated_radius(stated_m: float, nose_m: float, waist_m: float, tail_m: float,
                  effective_edge_m: float,
                  radii: Sequence[dict[str, float | None]] | None = None) -> dict[str, Any]:
    """A radius from a spec sheet against the one from the widths.

    Returns ``measured_m``, ``stated_m``, ``difference`` (stated over measured, less 1),
    ``agrees`` (within :data:`AGREES_SHARE`) and, where it does not, ``reasons``: codes with the
    values that would explain it.

    * ``within_measuring``: the tape's own 2σ (``spread_m`` is 1σ) covers the difference.
    * ``several_radii``: the edge has several radii, ``least_m`` to ``most_m``, and the stated one
      is among them.
    * ``effective_edge``: widths and radius agree for this ``effective_edge_m``; spec sheets mix
      effective edge and contact length, some 5 to 10 % apart (common practice, no source).
    * ``waist``: edge and radius agree for this ``waist_m``, ``by_m`` from the given one.
    """
    measured_m = sidecut_radius_m(nose_m, waist_m, tail_m, effective_edge_m)
    difference = stated_m / measured_m - 1
    reasons: list[dict[str, Any]] = []
    agrees = abs(difference) <= AGREES_SHARE
    if not agrees:
        spread_m = radius_spread_m(nose_m, waist_m, tail_m, effective_edge_m)
        if abs(stated_m - measured_m) <= 2 * spread_m:
            reasons.append({"code": "within_measuring", "spread_m": spread_m})
        known_m = [row["radius_m"] for row in radii or () if row["radius_m"] is not None]
        if known_m and min(known_m) < stated_m < max(known_m):
            reasons.append({"code": "several_radii", "least_m": min(known_m),
                            "most_m": max(known_m)})
        mean_m = (nose_m + tail_m) / 2
        waist_needed_m = mean_m - effective_edge_m**2 / (4 * stated_m)
        reasons.append({"code": "effective_edge",
                        "effective_edge_m": 2 * sqrt(stated_m * (mean_m - waist_m))})
        reasons.append({"code": "waist", "waist_m": waist_needed_m,
                        "by_m": waist_needed_m - waist_m})
    return {"stated_m": stated_m, "measured_m": measured_m, "difference": difference,
            "agrees": agrees, "reasons": reasons}


TIP_SHARE = 0.6
"""Length of nose and tail beyond the effective edge over the width there. Assumed, for the
picture alone."""


def outline_m(along: Sequence[Station], points: int = 41) -> dict[str, list[float]]:
    """The board from above as one side of its outline, m: ``x_m`` from tail to nose, ``y_m`` half
    the width there.

    Nose and tail beyond the effective edge are drawn as half ellipses of assumed length.
    """
    start_m, end_m = along[0][0], along[-1][0]
    x_m = [start_m + (end_m - start_m) * i / (points - 1) for i in range(points)]
    y_m = [width_m(along, at_m) / 2 for at_m in x_m]
    share = [i / 8 for i in range(1, 9)]
    tail_m, nose_m = along[0][1], along[-1][1]
    x_m = ([start_m - TIP_SHARE * tail_m * s for s in reversed(share)] + x_m
           + [end_m + TIP_SHARE * nose_m * s for s in share])
    y_m = ([tail_m / 2 * sqrt(1 - s * s) for s in reversed(share)] + y_m
           + [nose_m / 2 * sqrt(1 - s * s) for s in share])
    return {"x_m": x_m, "y_m": y_m}
