"""Sidecut from widths. Outside checks: circles drawn exactly, ISO 6289's formula in its own units
(the standard's number from memory), numpy's least squares, a Monte Carlo of the tape measure."""

import math

import numpy as np
import pytest

from snowhold.shape import (
    fitted_curvature_pm,
    local_curvature_pm,
    local_radii,
    outline_m,
    radius_spread_m,
    stated_radius,
    stations,
    width_m,
)
from snowhold.sidecut import sidecut_radius_m


def arc_width_m(at_m, radius_m=8.0, waist_m=0.25):
    """Width of a board whose edges are exact circles."""
    return waist_m + 2 * (radius_m - math.sqrt(radius_m**2 - at_m**2))


def test_circle_is_found_exactly_at_any_stations():
    at_m = [-0.6, -0.35, -0.2, 0.02, 0.3, 0.41, 0.6]
    along = [(x, arc_width_m(x)) for x in at_m]
    assert [1 / k for k in local_curvature_pm(along)] == pytest.approx([8.0] * 5, rel=1e-9)


def test_two_radius_edge():
    """7 m behind the waist, 10 m before it, one tangent at the waist: exact wherever three stations
    lie on one arc, in between where they straddle the change."""
    at_m = np.linspace(-0.6, 0.6, 9)
    along = [(x, arc_width_m(x, 7.0 if x <= 0 else 10.0)) for x in at_m.tolist()]
    radii_m = [row["radius_m"] for row in local_radii(along)]
    assert radii_m[:3] == pytest.approx([7.0] * 3, rel=1e-9)
    assert radii_m[4:] == pytest.approx([10.0] * 3, rel=1e-9)
    assert 7 < radii_m[3] < 10


def test_straight_and_bulging_edges_have_no_radius():
    along = [(-0.4, 0.25), (0.0, 0.25), (0.4, 0.25)]
    assert local_radii(along)[0]["radius_m"] is None
    bulge = [(-0.4, 0.25), (0.0, 0.27), (0.4, 0.25)]
    assert local_radii(bulge)[0]["radius_m"] is None


def test_tape_measure_formula_in_its_own_units():
    """ISO 6289: L²/(2000 (W_nose + W_tail − 2 W_waist)), mm to m."""
    nose, waist, tail, edge = 296, 253, 290, 1210
    expected_m = edge**2 / (2000 * (nose + tail - 2 * waist))
    assert sidecut_radius_m(0.296, 0.253, 0.290, 1.210) == pytest.approx(expected_m)
    along = stations(0.296, 0.253, 0.290, 1.210)
    assert 1 / fitted_curvature_pm(along) == pytest.approx(expected_m)


def test_spread_of_the_radius_is_that_of_many_tape_measures():
    random = np.random.default_rng(1)
    nose, waist, tail = (width + random.normal(0, 0.001, 200_000) for width in (0.296, 0.253, 0.29))
    edge = 1.21 + random.normal(0, 0.01, 200_000)
    radii_m = sidecut_radius_m(nose, waist, tail, edge)
    assert radius_spread_m(0.296, 0.253, 0.29, 1.21) == pytest.approx(radii_m.std(), rel=0.02)


def test_spread_of_a_local_radius_is_that_of_many_tape_measures():
    random = np.random.default_rng(2)
    at_m = np.array([-0.3, 0.1, 0.4])
    widths_m = np.array([arc_width_m(x) for x in at_m.tolist()])
    told = local_radii(list(zip(at_m.tolist(), widths_m.tolist(), strict=True)))[0]
    many = [local_curvature_pm(list(zip(at_m, widths_m + random.normal(0, 0.001, 3), strict=True)))
            for _ in range(20_000)]
    assert told["spread_m"] / told["radius_m"]**2 == pytest.approx(np.std(many), rel=0.03)


def test_widths_between_stations():
    """Met at the stations; a parabola is met everywhere; a circle to a tenth of a millimetre."""
    at_m = [-0.6, -0.3, -0.1, 0.2, 0.45, 0.6]
    parabola = [(x, 0.25 + 0.01 * x + 0.13 * x**2) for x in at_m]
    circle = [(x, arc_width_m(x)) for x in at_m]
    for x, width in circle:
        assert width_m(circle, x) == pytest.approx(width)
    for x in np.linspace(-0.6, 0.6, 57).tolist():
        assert width_m(parabola, x) == pytest.approx(0.25 + 0.01 * x + 0.13 * x**2)
        assert width_m(circle, x) == pytest.approx(arc_width_m(x), abs=1e-4)


def test_widths_have_no_kink():
    along = [(-0.6, 0.30), (-0.2, 0.252), (0.1, 0.25), (0.35, 0.27), (0.6, 0.31)]
    x_m = np.linspace(-0.6, 0.6, 24_001)
    slope = np.gradient([width_m(along, x) for x in x_m.tolist()], x_m)
    assert np.abs(np.diff(slope)).max() < 1e-3


def test_fitted_curvature_is_numpys():
    along = [(-0.6, 0.30), (-0.2, 0.252), (0.1, 0.25), (0.35, 0.27), (0.6, 0.31)]
    x_m = np.linspace(-0.6, 0.6, 4001)
    half_m = [width_m(along, x) / 2 for x in x_m.tolist()]
    assert fitted_curvature_pm(along) == pytest.approx(2 * np.polyfit(x_m, half_m, 2)[0], rel=2e-3)


def test_stations_reach_both_ends():
    assert stations(0.3, 0.25, 0.29, 1.2) == [(-0.6, 0.29), (0.0, 0.25), (0.6, 0.3)]
    inner = [(-0.4, 0.27), (0.0, 0.25), (0.6, 0.3)]
    assert stations(0.3, 0.25, 0.29, 1.2, inner) == [(-0.6, 0.29), *inner]


def test_a_stated_radius_within_five_percent_agrees():
    told = stated_radius(8.2, 0.295, 0.25, 0.295, 1.2)
    assert told["measured_m"] == pytest.approx(8.0)
    assert told["agrees"]
    assert told["reasons"] == []
    assert told["difference"] == pytest.approx(0.025)


def test_a_disagreement_is_explained_by_values_that_would_heal_it():
    told = stated_radius(9.5, 0.295, 0.25, 0.295, 1.2)
    reasons = {reason["code"]: reason for reason in told["reasons"]}
    assert not told["agrees"]
    assert set(reasons) == {"effective_edge", "waist"}
    edge_m = reasons["effective_edge"]["effective_edge_m"]
    assert sidecut_radius_m(0.295, 0.25, 0.295, edge_m) == pytest.approx(9.5)
    waist_m = reasons["waist"]["waist_m"]
    assert sidecut_radius_m(0.295, waist_m, 0.295, 1.2) == pytest.approx(9.5)
    assert reasons["waist"]["by_m"] == pytest.approx(waist_m - 0.25)


def test_the_tapes_own_spread_and_several_radii_are_named():
    codes = [reason["code"] for reason in stated_radius(8.45, 0.295, 0.25, 0.295, 1.2)["reasons"]]
    assert codes[0] == "within_measuring"
    along = [(x, arc_width_m(x, 7.0 if x <= 0 else 10.0))
             for x in (-0.6, -0.4, -0.2, 0.2, 0.4, 0.6)]
    told = stated_radius(9.3, along[-1][1], 0.25, along[0][1], 1.2, local_radii(along))
    assert "several_radii" in [reason["code"] for reason in told["reasons"]]


def test_outline_has_the_measured_widths():
    outline = outline_m(stations(0.3, 0.25, 0.29, 1.2))
    x_m, y_m = outline["x_m"], outline["y_m"]
    assert x_m == sorted(x_m)
    assert (y_m[0], y_m[-1]) == pytest.approx((0, 0))
    for at, width in ((-0.6, 0.29), (0.0, 0.25), (0.6, 0.3)):
        assert np.interp(at, x_m, y_m) == pytest.approx(width / 2)
