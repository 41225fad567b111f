"""Windows of speed and of line that hold, against bisection of the phase-by-phase verdict."""

import math
from dataclasses import replace

import numpy as np
import pytest
from hypothesis import assume, given, settings
from hypothesis import strategies as st

from snowhold.hold import hold_lines_m, hold_window_mps, own_arc_m, widest_arc_m
from snowhold.phases import Turn, ride
from snowhold.snow import SNOWS

TURNS = st.builds(
    lambda pitch, angulation, mass, load, snow, radius, line, start: Turn(
        pitch_rad=math.radians(pitch), speed_mps=1.0, sidecut_radius_m=radius,
        angulation_rad=math.radians(angulation), rider_mass_kg=mass, effective_edge_m=1.2,
        max_load_g=load, hardness_npm3=SNOWS[snow].hardness_npm3.value,
        shear_strength_pa=SNOWS[snow].shear_strength_pa.value, line_radius_m=line,
        from_phase_rad=math.radians(start)),
    st.floats(0.5, 40), st.floats(5, 30), st.floats(20, 150), st.floats(1.2, 3),
    st.sampled_from(sorted(SNOWS)), st.floats(5, 20), st.none() | st.floats(5, 60),
    st.floats(0, 60))


def holds(turn, speed_mps, margin):
    """Phase by phase, with the solver that SciPy vouches for in test_carve."""
    phases = np.linspace(turn.from_phase_rad, math.pi - turn.from_phase_rad, 61)
    margins = ride(replace(turn, speed_mps=speed_mps), phases, np).grip_margin
    return bool(np.isfinite(margins).all() and margins.min() >= margin)


@settings(deadline=None)
@given(TURNS, st.sampled_from([0.0, 0.15]))
def test_window_of_speeds_is_where_every_phase_holds(turn, margin):
    low, high = hold_window_mps(turn, margin)
    if high <= low * 1.001:
        for speed in np.linspace(max(low, 0.1), max(low, 0.1) * 1.5, 9):
            assert not holds(turn, speed * 1.001, margin)
        return
    assume(high > 0.1)
    assert holds(turn, low + (high - low) * 0.999, margin)
    assert holds(turn, max(low * 1.0001, 0.01), margin) or high < low * 1.0002
    assert not holds(turn, high * 1.001, margin)
    if low > 0.01:
        assert not holds(turn, low * 0.999, margin)


@settings(deadline=None)
@given(TURNS, st.floats(2, 20))
def test_lines_that_hold(turn, speed_mps):
    tightest, widest = hold_lines_m(replace(turn, speed_mps=speed_mps))
    assume(tightest * 1.01 < widest)
    on = replace(turn, line_radius_m=min(tightest * 1.001, widest), speed_mps=speed_mps)
    assert holds(on, speed_mps, 0.15)
    assert not holds(replace(on, line_radius_m=tightest * 0.999), speed_mps, 0.15)
    if widest < 1000:
        assert not holds(replace(on, line_radius_m=widest * 1.001), speed_mps, 0.15)


@settings(deadline=None)
@given(TURNS, st.floats(2, 20))
def test_no_arc_of_the_carve_is_wider_than_the_widest(turn, speed_mps):
    carve = replace(turn, speed_mps=speed_mps, line_radius_m=None)
    phases = np.linspace(turn.from_phase_rad, math.pi - turn.from_phase_rad, 31)
    radii = ride(carve, phases, np).turn_radius_m
    carved = radii[np.isfinite(radii)]
    if carved.size:
        assert carved.max() <= widest_arc_m(carve) * (1 + 1e-9)
    arcs = own_arc_m(carve, phases, np)
    assert np.isfinite(arcs).all()
    assert (arcs > 0).all()
    assert arcs[0] == pytest.approx(own_arc_m(carve, float(phases[0])))


def test_flat_line_by_hand():
    """On the flat n = 1/cos λ (any mechanics textbook): legs that carry 2 g lean 60°, and on a
    12 m line v² = g R tan λ. Snow firm and angulation ample, so that nothing else gives first."""
    turn = Turn(0.0, 1.0, 8.0, math.radians(20), 80, 1.2, 2.0, 0.12e9, 0.5e6, line_radius_m=12.0)
    assert hold_window_mps(turn, 0.0)[1] == pytest.approx(
        math.sqrt(9.80665 * 12 * math.tan(math.radians(60))), rel=1e-9)
