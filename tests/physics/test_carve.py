"""The balanced carve and its speed window, against closed forms and SciPy's root finding."""

import math

import numpy as np
import pytest
from hypothesis import assume, given
from hypothesis import strategies as st
from scipy.optimize import brentq, minimize_scalar

from snowhold.carve import balanced_lean, fastest, slowest_mps, speed_window_mps

G = 9.80665
PITCHES = st.floats(0, math.radians(50))
PHASES = st.floats(0, math.pi)
ANGULATIONS = st.floats(0, math.radians(40))
SPEEDS = st.floats(0.5, 20)
RADII = st.floats(3, 40)


def residual(edge_rad, speed, radius, pitch, phase, angulation):
    """The balance equation as published (J/F 2004), in edge angle and not in the tan of lean."""
    kappa = speed**2 / (radius * G * math.cos(pitch))
    return (math.tan(edge_rad - angulation) - kappa / math.cos(edge_rad)
            + math.tan(pitch) * math.cos(phase))


def scipy_edge(speed, radius, pitch, phase, angulation):
    """Smallest root by a dense scan and Brent's method: "slow", "fast" or the edge angle."""
    if residual(0, speed, radius, pitch, phase, angulation) > 0:
        return "slow"
    grid = np.linspace(0, math.pi / 2 - 1e-6, 4001)
    values = [residual(edge, speed, radius, pitch, phase, angulation) for edge in grid]
    for i in range(len(grid) - 1):
        if values[i] <= 0 < values[i + 1]:
            edge = brentq(residual, grid[i], grid[i + 1],
                          args=(speed, radius, pitch, phase, angulation), xtol=1e-14)
            return edge if edge > angulation else "slow"
    return "fast"


@given(SPEEDS, RADII, PITCHES, PHASES, ANGULATIONS)
def test_root_agrees_with_scipy(speed, radius, pitch, phase, angulation):
    lean, too_slow, too_fast = balanced_lean(speed, radius, pitch, phase, angulation)
    expected = scipy_edge(speed, radius, pitch, phase, angulation)
    # Within a whisker of a bound the scan's grid can miss the pair of roots: both are right there.
    low = slowest_mps(radius, pitch, phase, angulation)
    high = fastest(radius, pitch, phase, angulation)[0]
    assume(abs(speed - low) > 1e-4 * max(low, 1) and abs(speed - high) > 1e-4 * high)
    if expected == "slow":
        assert too_slow and math.isnan(lean)
    elif expected == "fast":
        assert too_fast and math.isnan(lean)
    else:
        assert not too_slow and not too_fast
        assert lean + angulation == pytest.approx(expected, abs=1e-9)


@given(SPEEDS, RADII, PITCHES, PHASES)
def test_no_angulation_has_the_closed_form(speed, radius, pitch, phase):
    """ε = asin(κ/√(1+t²)) − atan t (J/F 2004), as long as the edge stays below 90°."""
    kappa = speed**2 / (radius * G * math.cos(pitch))
    pull = math.tan(pitch) * math.cos(phase)
    top = math.hypot(1, pull)
    assume(kappa < top * 0.9999)
    closed = math.asin(kappa / top) - math.atan(pull)
    assume(1e-6 < closed < math.pi / 2 - 1e-3)
    lean, _, _ = balanced_lean(speed, radius, pitch, phase, 0.0)
    assert lean == pytest.approx(closed, abs=1e-9)


@pytest.mark.parametrize("radius", [5, 8, 14])
def test_fastest_carve_on_the_flat(radius):
    """√(g R_sc) on the flat without angulation (J/F 2004); 8.86 m/s for 8 m."""
    assert fastest(radius, 0.0, 1.0, 0.0)[0] == pytest.approx(math.sqrt(G * radius), rel=1e-12)
    assert math.sqrt(G * 8) == pytest.approx(8.86, abs=0.005)


@pytest.mark.parametrize(("angulation_deg", "share"), [(0, 1.0), (5, 0.86), (8, 0.81)])
def test_angulation_lowers_the_fastest_carve(angulation_deg, share):
    """Maximum of κ = cos ε (tan(ε − a) + t) over ε by SciPy's bounded minimiser, on the flat."""
    angulation = math.radians(angulation_deg)
    found = minimize_scalar(lambda e: -math.cos(e) * math.tan(e - angulation),
                            bounds=(0, math.pi / 2), method="bounded",
                            options={"xatol": 1e-12})
    ratio = fastest(8, 0.0, 1.0, angulation)[0] / math.sqrt(G * 8)
    assert ratio == pytest.approx(math.sqrt(-found.fun), rel=1e-6)
    assert ratio == pytest.approx(share, abs=0.005)


@given(RADII, PITCHES, PHASES, st.floats(0.01, math.radians(40)))
def test_fastest_is_the_maximum_that_scipy_finds(radius, pitch, phase, angulation):
    pull = math.tan(pitch) * math.cos(phase)
    found = minimize_scalar(lambda e: -math.cos(e) * (math.tan(e - angulation) + pull),
                            bounds=(angulation, math.pi / 2), method="bounded",
                            options={"xatol": 1e-12})
    speed, edge = fastest(radius, pitch, phase, angulation)
    assert speed == pytest.approx(math.sqrt(-found.fun * radius * G * math.cos(pitch)), rel=1e-6)
    assert angulation < edge < math.pi / 2


@given(RADII, PITCHES, PHASES)
def test_window_bounds_without_angulation(radius, pitch, phase):
    """v_min² = R_sc g sin α cos φ and v_max² = R_sc g √(cos²α + sin²α cos²φ) above the fall line
    (J/F 2004); from the fall line on the edge reaches 90° first, at v² = R_sc g cos α."""
    above = math.cos(phase) > 0
    slow2 = radius * G * math.sin(pitch) * max(0, math.cos(phase))
    fast2 = radius * G * (math.sqrt(math.cos(pitch)**2 + (math.sin(pitch) * math.cos(phase))**2)
                          if above else math.cos(pitch))
    assert slowest_mps(radius, pitch, phase, 0.0)**2 == pytest.approx(slow2, rel=1e-9, abs=1e-12)
    assert fastest(radius, pitch, phase, 0.0)[0]**2 == pytest.approx(fast2, rel=1e-9)


@given(RADII, PITCHES, ANGULATIONS, st.floats(0, math.radians(80)), st.floats(-0.01, 0.01))
def test_window_of_the_turn_separates_what_carves(radius, pitch, angulation, start, off):
    """Inside the window every phase balances, just outside one does not: by the solver itself at
    each phase, which SciPy vouches for above."""
    assume(abs(off) > 1e-4)
    low, high = speed_window_mps(radius, pitch, start, angulation)
    phases = np.linspace(start, math.pi - start, 25)
    for bound, inside in ((low, off > 0), (high, off < 0)):
        speed = bound * (1 + off)
        if speed < 0.1 or not low * 1.02 < high:
            continue
        lean, _, _ = balanced_lean(speed, radius, pitch, phases, angulation, np)
        assert np.isfinite(lean).all() == inside


@given(SPEEDS, RADII, PITCHES, ANGULATIONS)
def test_arrays_and_floats_agree(speed, radius, pitch, angulation):
    phases = np.linspace(0, math.pi, 13)
    lean, slow, fast = balanced_lean(speed, radius, pitch, phases, angulation, np)
    for i, phase in enumerate(phases):
        one = balanced_lean(speed, radius, pitch, float(phase), angulation)
        assert (bool(slow[i]), bool(fast[i])) == one[1:]
        assert lean[i] == pytest.approx(one[0], abs=1e-7, nan_ok=True)


@given(SPEEDS, RADII, PITCHES, PHASES, ANGULATIONS)
def test_speed_and_radius_enter_only_as_their_carve_number(speed, radius, pitch, phase,
                                                           angulation):
    """Units: doubling the speed and quadrupling the sidecut changes no angle."""
    lean, _, _ = balanced_lean(speed, radius, pitch, phase, angulation)
    scaled, _, _ = balanced_lean(2 * speed, 4 * radius, pitch, phase, angulation)
    assert scaled == pytest.approx(lean, abs=1e-9, nan_ok=True)


@pytest.mark.parametrize("angulation_deg", [-10, -5, -2, -0.5])
@pytest.mark.parametrize("pitch_deg", [0, 10, 25])
def test_banking_past_the_platform_still_balances(angulation_deg, pitch_deg):
    """Negative angulation occurs among samples: where a root is found it is SciPy's."""
    angulation, pitch = math.radians(angulation_deg), math.radians(pitch_deg)
    checked = 0
    for speed in (3, 5, 7, 9):
        for phase in np.linspace(0, math.pi, 7):
            lean, _, _ = balanced_lean(speed, 8, pitch, float(phase), angulation)
            expected = scipy_edge(speed, 8, pitch, phase, angulation)
            if not math.isnan(lean) and not isinstance(expected, str):
                assert lean + angulation == pytest.approx(expected, abs=1e-8)
                checked += 1
    assert checked > 0
