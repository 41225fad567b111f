"""Density of the air by the standard atmosphere, and the drag that it makes.

Symbols: H geopotential altitude, T temperature, p pressure, ρ density, C_dA drag area, m mass.

References
----------
[1] ISO 2533:1975, Standard Atmosphere (the same as the U.S. Standard Atmosphere, 1976, up to
    32 km). Its constants below are from memory; the tests compare what follows from them with an
    independent implementation.
"""

from __future__ import annotations

from snowhold.constants import G0_MPS2
from snowhold.scalars import Value

SEA_LEVEL_TEMPERATURE_K = 288.15
"""Temperature of the standard atmosphere at H = 0, K [1]."""

SEA_LEVEL_PRESSURE_PA = 101325.0
"""Pressure of the standard atmosphere at H = 0, Pa [1]."""

LAPSE_RATE_KPM = -0.0065
"""Change of temperature with geopotential altitude from 0 to 11 km, K/m [1]."""

GAS_CONSTANT_JPKGK = 287.05287
"""Specific gas constant of dry air, J/(kg K) [1]."""

EARTH_RADIUS_M = 6356766.0
"""Nominal radius of the Earth that turns altitude into geopotential altitude, m [1]."""

ZERO_CELSIUS_K = 273.15
"""0 °C in K: the definition of the Celsius scale."""


def geopotential_altitude_m(altitude_m: Value) -> Value:
    """Geopotential altitude H = r h/(r + h) of a place h above sea level [1], m."""
    return EARTH_RADIUS_M * altitude_m / (EARTH_RADIUS_M + altitude_m)


def standard_temperature_k(altitude_m: Value) -> Value:
    """Temperature of the standard atmosphere [1], K, up to 11 km geopotential."""
    return SEA_LEVEL_TEMPERATURE_K + LAPSE_RATE_KPM * geopotential_altitude_m(altitude_m)


def standard_pressure_pa(altitude_m: Value) -> Value:
    """Pressure of the standard atmosphere p = p₀ (T/T₀)^(−g/(β R)) [1], Pa, up to 11 km."""
    exponent = -G0_MPS2 / (LAPSE_RATE_KPM * GAS_CONSTANT_JPKGK)
    return (SEA_LEVEL_PRESSURE_PA
            * (standard_temperature_k(altitude_m) / SEA_LEVEL_TEMPERATURE_K)**exponent)


def air_density_kgpm3(altitude_m: Value, air_temperature_c: Value | None = None) -> Value:
    """Density of dry air ρ = p/(R T) at ``altitude_m`` above sea level, kg/m³.

    Valid up to 11 km geopotential. ``air_temperature_c`` replaces the standard atmosphere's own
    temperature; the pressure stays the standard one, so that weather leaves an error of a few
    per cent.
    """
    temperature_k = (standard_temperature_k(altitude_m) if air_temperature_c is None
                     else air_temperature_c + ZERO_CELSIUS_K)
    return standard_pressure_pa(altitude_m) / (GAS_CONSTANT_JPKGK * temperature_k)


def drag_per_m(air_density_kgpm3: Value, drag_area_m2: Value, mass_kg: Value) -> Value:
    """k = ρ C_dA/(2 m), 1/m: air drag slows a body by k v²."""
    return air_density_kgpm3 * drag_area_m2 / (2 * mass_kg)
