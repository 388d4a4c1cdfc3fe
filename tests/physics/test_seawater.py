"""Density, vapour pressure and pressure at the surface, against general-purpose references."""

import gsw
import numpy as np
import pytest
from iapws import IAPWS97

from service.physics.seawater import (
    absolute_salinity,
    density,
    icao_1993,
    reference_salinity,
    surface_pressure,
    water_vapour_pressure,
)
from tests.properties.questions import ask_and_answer, compute


def one(value: float) -> np.ndarray:
    return np.array([value])


def test_the_reference_salinity_of_35_is_that_of_the_standard() -> None:
    assert reference_salinity(one(35.0))[0] == pytest.approx(35.16504, rel=1e-15)  # TEOS-10, exact by definition


DENSITIES = [
    (0.0, 3.98, 999.975, 0.005),  # kg/m3, greatest density of fresh water, handbook
    (0.0, 20.0, 998.207, 0.005),  # handbook
    (0.0, 25.0, 997.048, 0.005),  # handbook
    (35.0, 5.0, 1027.675, 0.02),  # UNESCO technical papers in marine science 44 (1983), EOS-80
    (35.0, 25.0, 1023.343, 0.02),  # the same
    (40.0, 25.0, 1027.14, 0.05),  # computed from EOS-80, from memory
]


@pytest.mark.parametrize(("salinity", "temperature", "printed", "within"), DENSITIES)
def test_the_density_is_that_of_handbooks(salinity: float, temperature: float, printed: float, within: float) -> None:
    found = density(reference_salinity(one(salinity)), one(temperature))[0]

    assert found == pytest.approx(printed, abs=within)


@pytest.mark.parametrize("temperature", [5.0, 15.0, 25.0, 35.0])
def test_the_density_of_fresh_water_is_that_of_the_steam_tables(temperature: float) -> None:
    steam = IAPWS97(T=temperature + 273.15, P=0.101325).rho

    # two formulations of the same standard water; they differ by less than 5e-6
    assert density(one(0.0), one(temperature))[0] == pytest.approx(steam, rel=2e-5)


@pytest.mark.parametrize("temperature", [1.0, 10.0, 20.0, 30.0, 40.0])
def test_the_vapour_pressure_of_fresh_water_is_that_of_the_steam_tables(temperature: float) -> None:
    steam = IAPWS97(T=temperature + 273.15, x=0.0).P * 1e4  # hPa

    # Weiss and Price (1980) fitted older tables, and saturated air holds 0.4 % more than its vapour alone
    assert water_vapour_pressure(one(temperature), one(0.0))[0] == pytest.approx(steam, rel=0.005)


def test_salt_lowers_the_vapour_pressure_by_two_percent_at_salinity_35() -> None:
    fresh, salty = (water_vapour_pressure(one(20.0), one(S))[0] for S in (0.0, 35.0))

    assert salty / fresh == pytest.approx(0.981, abs=0.001)  # Raoult: 0.537 % a mole fraction unit of salt, handbook


def test_position_refines_the_salinity_of_the_sea_and_not_that_of_brackish_water() -> None:
    S, latitude, longitude = np.array([35.0, 1.9, 2.1]), one(4.0), one(188.0)
    found = absolute_salinity(S, latitude, longitude)
    atlas = gsw.SA_from_SP(S, 0.0, 188.0, 4.0)

    assert found[0] == atlas[0] != reference_salinity(S)[0]
    assert found[1] == reference_salinity(S)[1]
    assert found[2] == atlas[2]


def test_a_barometer_at_the_surface_is_taken_bit_for_bit() -> None:
    P = np.array([950.1, 1013.25, 1037.7])
    at_height_zero = surface_pressure(P, one(0.0), one(15.0), one(17.0))

    assert np.array_equal(at_height_zero, P)
    assert np.array_equal(compute("surface_pressure", {}, "co2", {"air_pressure": P})["surface_pressure"], P)


BAROMETERS = [(10.0, 1.2), (20.0, 2.4), (100.0, 12.0)]  # common practice: 0.12 hPa a metre near the sea


@pytest.mark.parametrize(("height", "difference"), BAROMETERS)
def test_a_high_barometer_reads_an_eighth_of_a_hectopascal_less_a_metre(height: float, difference: float) -> None:
    found = surface_pressure(one(1013.25), one(height), one(15.0), one(17.0))[0]

    assert found - 1013.25 == pytest.approx(difference, rel=0.03)


STANDARD_ATMOSPHERE = [  # m, hPa: ICAO Doc 7488, table of the standard atmosphere
    (0.0, 1013.25),
    (1000.0, 898.746),
    (2000.0, 794.952),
    (3000.0, 701.085),
    (5000.0, 540.199),
]


@pytest.mark.parametrize(("elevation", "printed"), STANDARD_ATMOSPHERE)
def test_the_standard_atmosphere_is_that_of_the_table(elevation: float, printed: float) -> None:
    assert icao_1993(one(elevation))[0] == pytest.approx(printed, abs=0.001)


def test_a_pressure_from_elevation_is_flagged_as_not_measured() -> None:
    values = {"water_temperature": 15.0, "salinity": 0.0, "elevation": 420.0, "air_mole_fraction": 420.0}
    found = ask_and_answer("solubility", "co2", values).outcome

    assert found.verdict.flags[0] == 3
    assert "standard atmosphere" in found.verdict.reasons[0][0]


def test_missing_numbers_pass_through() -> None:
    gap = np.array([15.0, np.nan])

    assert np.isnan(density(one(35.0), gap)).tolist() == [False, True]
    assert np.isnan(water_vapour_pressure(gap, one(35.0))).tolist() == [False, True]
    assert np.isnan(surface_pressure(one(1000.0), one(10.0), gap, one(17.0))).tolist() == [False, True]
