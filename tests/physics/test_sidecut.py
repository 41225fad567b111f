"""Sidecut radius, against geometry done exactly and a circle fitted in three dimensions."""

import math

import numpy as np
import pytest
from scipy.optimize import least_squares

from snowhold.sidecut import (
    carved_radius_m,
    carved_radius_sunk_m,
    sidecut_depth_m,
    sidecut_radius_m,
)


def test_tape_measure_formula_of_iso_6289():
    """ISO 6289 (number from memory): L²/(2000 (nose + tail − 2 waist)), L and widths in mm."""
    in_mm = 1200**2 / (2000 * (300 + 298 - 2 * 252))
    assert sidecut_radius_m(0.300, 0.252, 0.298, 1.2) == pytest.approx(in_mm)


def test_depth_against_the_exact_circle():
    """s = R − √(R² − L²/4), Euclid; the shallow form is within s/(2R) of it."""
    exact_m = 8 - math.sqrt(64 - 0.36)
    depth_m = sidecut_depth_m(1.2, 8)
    assert depth_m == pytest.approx(exact_m, rel=exact_m / 16 * 1.01)


@pytest.mark.parametrize("edge_deg", [0, 20, 45, 60])
def test_carved_radius_against_a_fitted_circle(edge_deg):
    """A board with an exact parabolic sidecut is bent until its whole edge lies in the snow plane;
    SciPy fits a circle to the edge's trace in that plane. R = R_sc cos ε is J/F 2004. Past 60° the
    arc is no longer shallow against its chord and the two part by more than 1 %."""
    edge_rad = math.radians(edge_deg)
    x = np.linspace(-0.6, 0.6, 101)
    proud_m = x**2 / (2 * 8)
    # In the tilted base plane the ends stand proud by x²/2R_sc across the board; seen across the
    # slope the bend that brings them to the snow lengthens that to proud/cos ε.
    trace_m = proud_m / math.cos(edge_rad)
    fit = least_squares(lambda p: np.hypot(x, trace_m - p[0] - p[1]) - p[1], [0, 5],
                        xtol=1e-14, ftol=1e-14)
    assert carved_radius_m(8, edge_rad) == pytest.approx(fit.x[1], rel=0.01)


@pytest.mark.parametrize("edge_deg", [5, 30, 60, 80])
def test_no_extra_sinking_gives_back_the_hard_snow_radius(edge_deg):
    """Howe (from memory): e = 0 in the sunk form is R_sc cos ε."""
    edge_rad = math.radians(edge_deg)
    assert carved_radius_sunk_m(8, 1.2, edge_rad, 0) == pytest.approx(
        carved_radius_m(8, edge_rad), rel=1e-12)
    assert carved_radius_sunk_m(8, 1.2, edge_rad, 0.005) < carved_radius_m(8, edge_rad)


def test_sunk_radius_against_geometry_in_space():
    """The bent edge as points in space: deflection (e + s sin ε)/cos ε at the middle, as a
    parabola, rotated by ε and seen from above; its depth gives L²/8d."""
    edge_rad, extra_m = math.radians(50), 0.004
    depth_m = sidecut_depth_m(1.2, 8)
    bend_m = (extra_m + depth_m * math.sin(edge_rad)) / math.cos(edge_rad)
    across = np.array([[math.cos(edge_rad), math.sin(edge_rad)],
                       [-math.sin(edge_rad), math.cos(edge_rad)]])
    # In the board's frame the middle lies (toward the waist, down into the snow) of the ends.
    along_snow, into_snow = across @ np.array([depth_m, bend_m])
    assert into_snow == pytest.approx(extra_m, rel=1e-9)
    assert carved_radius_sunk_m(8, 1.2, edge_rad, extra_m) == pytest.approx(
        1.2**2 / (8 * along_snow), rel=1e-12)
