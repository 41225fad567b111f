"""Air density, against the standard atmosphere's table and SciPy's solution of its equations."""

import math

import pytest
from hypothesis import given
from hypothesis import strategies as st
from scipy.integrate import solve_ivp

from snowhold.atmosphere import (
    air_density_kgpm3,
    drag_per_m,
    geopotential_altitude_m,
    standard_pressure_pa,
    standard_temperature_k,
)

# ISO 2533 / U.S. Standard Atmosphere 1976 at geopotential altitude: from memory, and the same to
# all digits here as the PyPI package fluids 1.3.1 (ATMOSPHERE_1976) computes.
TABLE = [
    # H m, T K, p Pa, ρ kg/m³
    (0, 288.150, 101325.0, 1.22500),
    (1000, 281.650, 89874.6, 1.11164),
    (2000, 275.150, 79495.2, 1.00649),
    (3000, 268.650, 70108.5, 0.909122),
    (4000, 262.150, 61640.2, 0.819129),
    (5000, 255.650, 54019.9, 0.736116),
    (8000, 236.150, 35599.8, 0.525168),
    (11000, 216.650, 22632.06, 0.363918),
]


@pytest.mark.parametrize(("geopotential_m", "temperature_k", "pressure_pa", "density"), TABLE)
def test_iso_2533_table(geopotential_m, temperature_k, pressure_pa, density):
    altitude_m = 6356766 * geopotential_m / (6356766 - geopotential_m)
    assert geopotential_altitude_m(altitude_m) == pytest.approx(geopotential_m)
    assert standard_temperature_k(altitude_m) == pytest.approx(temperature_k, abs=5e-4)
    assert standard_pressure_pa(altitude_m) == pytest.approx(pressure_pa, rel=3e-6)
    assert air_density_kgpm3(altitude_m) == pytest.approx(density, rel=3e-6)


def test_hydrostatic_equation():
    """dp/dh = −ρ g with gravity falling as 1/(r + h)², solved by SciPy in true altitude."""
    radius_m = 6356766.0

    def slope(h, p):
        gravity = 9.80665 * (radius_m / (radius_m + h))**2
        return [-p[0] / (287.05287 * standard_temperature_k(h)) * gravity]

    solved = solve_ivp(slope, (0, 6000), [101325.0], rtol=1e-11, atol=1e-6)
    assert standard_pressure_pa(6000) == pytest.approx(solved.y[0, -1], rel=1e-9)


@given(st.floats(-400, 9000), st.floats(-60, 40))
def test_an_actual_temperature_scales_the_density(altitude_m, air_temperature_c):
    """Ideal gas: at one pressure density is inverse to temperature."""
    warm = air_density_kgpm3(altitude_m, air_temperature_c)
    standard = air_density_kgpm3(altitude_m)
    assert warm * (air_temperature_c + 273.15) == pytest.approx(
        standard * standard_temperature_k(altitude_m))
    assert 0.3 < warm < 1.8


def test_drag_of_a_falling_body():
    """Where k v² = g a falling body has its terminal speed √(2 m g/(ρ C_dA)) (any textbook)."""
    k = drag_per_m(1.2, 0.5, 80)
    assert math.sqrt(9.80665 / k) == pytest.approx(math.sqrt(2 * 80 * 9.80665 / (1.2 * 0.5)))
