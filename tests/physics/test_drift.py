"""The tightest line that holds, against a scan of every lean and SciPy's root finding."""

import math

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st
from scipy.optimize import brentq

from snowhold.balance import centre_force_n, lean_rad, normal_force_n
from snowhold.drift import largest_lean, line_radius_m, tightest_line_m
from snowhold.grip import grip_margin, least_capacity
from snowhold.snow import SNOWS


def margin_at(lean, angulation, pitch, snow, mass_kg, max_load_g, drag=None):
    normal_n = normal_force_n(mass_kg, pitch)
    kind = SNOWS[snow]
    capacity_n, _, _ = least_capacity(normal_n, lean + angulation, mass_kg, pitch, 1.2, max_load_g,
                                      kind.hardness_npm3.value, kind.shear_strength_pa.value, drag)
    return grip_margin(capacity_n, normal_n * math.tan(lean))


@settings(deadline=None)
@given(st.floats(0, math.radians(40)), st.floats(0, math.radians(50)),
       st.sampled_from(sorted(SNOWS)), st.floats(15, 200), st.floats(1.1, 5),
       st.none() | st.floats(math.radians(5), math.radians(90)))
def test_largest_lean_against_a_scan(angulation, pitch, snow, mass_kg, max_load_g, drag):
    """Every lean up to it holds with 0.15, the next one does not: the four limits evaluated lean
    by lean, and SciPy's Brent where the margin crosses."""
    kind = SNOWS[snow]
    lean = largest_lean(pitch, angulation, normal_force_n(mass_kg, pitch), 1.2, max_load_g,
                        kind.hardness_npm3.value, kind.shear_strength_pa.value, drag)
    args = (angulation, pitch, snow, mass_kg, max_load_g, drag)
    leans = np.linspace(1e-4, math.pi / 2 - 1e-4, 600)
    margins = np.array([margin_at(x, *args) for x in leans])
    failing = np.flatnonzero(margins < 0.15)
    assert failing.size
    i = failing[0]
    if i == 0:
        assert lean <= leans[0] + 1e-9
        return
    jump = margins[i] == -1  # the boot or the turned-away base: a step, not a crossing
    crossing = leans[i] if jump else brentq(lambda x: margin_at(x, *args) - 0.15,
                                            leans[i - 1], leans[i], xtol=1e-14)
    assert lean == pytest.approx(crossing, abs=leans[1] - leans[0] if jump else 1e-8)


@given(st.floats(0.01, 1.2), st.floats(0.5, 30), st.floats(0, math.radians(40)),
       st.floats(0, math.pi))
def test_line_asks_for_its_lean(lean, speed, pitch, phase):
    """Balance on the returned radius gives the lean back."""
    radius = line_radius_m(lean, speed, pitch, phase)
    if math.isfinite(radius):
        force = centre_force_n(80, speed, radius, pitch, phase)
        assert lean_rad(force, normal_force_n(80, pitch)) == pytest.approx(lean, abs=1e-9)
    else:
        assert lean <= -math.atan(math.tan(pitch) * math.cos(phase)) + 1e-12


@given(st.floats(0.01, 1.2), st.floats(0.5, 30), st.floats(0, math.radians(40)),
       st.floats(0, math.radians(80)))
def test_the_last_phase_sets_the_line(lean, speed, pitch, start):
    line = tightest_line_m(lean, speed, pitch, math.pi - start)
    for phase in np.linspace(start, math.pi - start, 19):
        needed = line_radius_m(lean, speed, pitch, float(phase))
        assert needed <= line * (1 + 1e-12)


def test_flat_line_is_the_textbook_curve():
    """R = v²/(g tan λ), the banked curve of any mechanics textbook."""
    assert line_radius_m(math.pi / 4, 10, 0.0, 1.0) == pytest.approx(100 / 9.80665)


def test_no_lean_no_line():
    assert tightest_line_m(0.0, 10, 0.1, math.pi) == math.inf
