"""General-purpose libraries, asked live over whole ranges: they know nothing of this service."""

import gsw
import iapws
import numpy as np
import pytest
import scipy.constants
from CoolProp import CoolProp
from scipy.optimize import brentq

from service.physics import constants, quantities, wind  # noqa: F401  quantities declares
from service.physics.declare import Array
from service.physics.engine import plan, run

ROUNDING = 1e-12
DENSITY_STANDARDS = 1e-6  # IAPWS-09, which the sea-water standard takes, reproduces IAPWS-95 to 1 part in a million
VAPOUR_FORMULATIONS = 1.5e-3  # Goff and Gratch (1946) and IAPWS-95 differ by 0.1 %, the fit adds 0.02 %
# cm3 mol-1: second virial coefficients are measured to 1 or 2 percent for carbon dioxide, 3 percent for nitrous oxide
SECOND_VIRIAL = {"co2": 2.0, "n2o": 4.0}
COLD_TO_WARM = np.linspace(0.02, 40.0, 9)
SALINITIES = np.array([0.0, 5.0, 20.0, 35.0, 42.0])


def computed(term: str, gas: str = "co2", **values: Array | float) -> Array:
    """Return a term by the service's own plan, without a request around it."""
    arrays = {name: np.atleast_1d(np.asarray(value, dtype=float)) for name, value in values.items()}
    steps = plan((term,), frozenset(arrays), (), gas)
    return run(steps, arrays)[steps.keys[term]]


def grid() -> tuple[Array, Array]:
    celsius, salinity = np.meshgrid(COLD_TO_WARM, SALINITIES)
    return celsius.ravel(), salinity.ravel()


def water(output: str, celsius: float) -> float:
    return float(CoolProp.PropsSI(output, "T", celsius + 273.15, "P", 101325, "Water"))


def test_oxygen_in_equilibrium_with_air_is_that_of_gsw() -> None:
    celsius, salinity = grid()
    service = computed("equilibrium_concentration", "o2", water_temperature=celsius, salinity=salinity)

    np.testing.assert_allclose(service, gsw.O2sol_SP_pt(salinity, celsius), rtol=ROUNDING)


def test_density_of_fresh_water_is_that_of_the_water_standard() -> None:
    service = computed("density", water_temperature=COLD_TO_WARM, salinity=0.0)
    library = [water("D", celsius) for celsius in COLD_TO_WARM]

    np.testing.assert_allclose(service, library, rtol=DENSITY_STANDARDS)


@pytest.mark.parametrize("salinity", [2.0, 20.0, 35.0])
def test_density_of_sea_water_is_that_of_the_standard_programmed_by_others(salinity: float) -> None:
    service = computed("density", water_temperature=COLD_TO_WARM, salinity=salinity)
    absolute = salinity * constants.ABSOLUTE_SALINITY_PER_PRACTICAL / 1000.0
    library = [iapws.SeaWater(T=celsius + 273.15, P=0.101325, S=absolute).rho for celsius in COLD_TO_WARM]

    np.testing.assert_allclose(service, library, rtol=DENSITY_STANDARDS)


def test_vapour_pressure_of_fresh_water_is_near_that_of_the_water_standard() -> None:
    service = computed("water_vapour_pressure", water_temperature=COLD_TO_WARM, salinity=0.0)
    library = [CoolProp.PropsSI("P", "T", celsius + 273.15, "Q", 0, "Water") / 100.0 for celsius in COLD_TO_WARM]

    np.testing.assert_allclose(service, library, rtol=VAPOUR_FORMULATIONS)


def test_salt_lowers_the_vapour_pressure_as_it_lowers_the_chemical_potential_of_water() -> None:
    celsius, salinity = grid()
    service = computed("water_vapour_pressure", water_temperature=celsius, salinity=salinity)
    fresh = computed("water_vapour_pressure", water_temperature=celsius, salinity=0.0)
    absolute = salinity * constants.ABSOLUTE_SALINITY_PER_PRACTICAL
    potential = [gsw.chem_potential_water_t_exact(S, celsius, 0.0) for S in (absolute, 0.0 * absolute)]
    library = np.exp(1000.0 * (potential[0] - potential[1]) / (461.51805 * (celsius + 273.15)))  # J kg-1 K-1

    np.testing.assert_allclose(service / fresh, library, atol=5e-4)  # one linear term in salinity for all temperatures


@pytest.mark.parametrize(("gas", "fluid"), [("co2", "CarbonDioxide"), ("n2o", "NitrousOxide")])
def test_fugacity_of_the_pure_gas_is_that_of_its_equation_of_state(gas: str, fluid: str) -> None:
    state = CoolProp.AbstractState("HEOS", fluid)
    pressure = constants.STANDARD_ATMOSPHERE
    for celsius in (0.0, 10.0, 20.0, 30.0, 40.0):
        state.update(CoolProp.PT_INPUTS, 100.0 * pressure, celsius + 273.15)
        service = computed(
            "fugacity_coefficient",
            gas,
            water_temperature=celsius,
            surface_pressure=pressure,
            partial_pressure_in_air=1e6,
        )
        allowed = SECOND_VIRIAL[gas] / (constants.GAS_CONSTANT_CM3_ATM * (celsius + 273.15))

        assert np.log(service[0]) == pytest.approx(np.log(state.fugacity_coefficient(0)), abs=allowed)


@pytest.mark.parametrize(("wind_speed", "height"), [(0.5, 10.0), (3.0, 4.0), (8.0, 18.0), (20.0, 25.0), (40.0, 60.0)])
def test_the_wind_profile_solves_its_own_equations(wind_speed: float, height: float) -> None:
    def excess(friction: float) -> float:
        roughness = 0.011 * friction**2 / 9.81 + 0.11 * 1.5e-5 / friction
        return float(friction - 0.40 * wind_speed / np.log(height / roughness))

    friction = brentq(excess, 1e-3, 5.0, xtol=1e-15, rtol=1e-14)
    roughness = 0.011 * friction**2 / 9.81 + 0.11 * 1.5e-5 / friction
    ten = wind_speed * np.log(10.0 / roughness) / np.log(height / roughness)

    assert computed("wind_speed_10m", wind_speed=wind_speed, wind_height=height)[0] == pytest.approx(ten, rel=1e-10)


def test_the_pressure_at_an_elevation_solves_the_hydrostatic_equation() -> None:
    heights = np.linspace(0.0, 6000.0, 60001)
    density = 1.0 / (constants.DRY_AIR_GAS_CONSTANT * (288.15 - 0.0065 * heights))
    logarithm = -scipy.constants.g * np.trapezoid(density, heights)

    service = computed("surface_pressure", elevation=6000.0)[0]

    assert service == pytest.approx(scipy.constants.atm / 100.0 * np.exp(logarithm), rel=1e-8)


@pytest.mark.parametrize(
    ("ours", "theirs"),
    [
        (constants.STANDARD_ATMOSPHERE, scipy.constants.atm / 100.0),
        (constants.GAS_CONSTANT, scipy.constants.R),
        (constants.GAS_CONSTANT_LITRE_ATM, scipy.constants.R / scipy.constants.atm * 1000.0),
        (constants.ZERO_CELSIUS, scipy.constants.zero_Celsius),
        (constants.GRAVITY, scipy.constants.g),
        (constants.METRES_PER_DAY, scipy.constants.day / scipy.constants.hour / 100.0),
        (constants.LN_2, float(np.log(2.0))),
    ],
)
def test_constants_are_those_of_the_international_adjustment(ours: float, theirs: float) -> None:
    assert ours == pytest.approx(theirs, rel=1e-15)


@pytest.mark.parametrize(
    ("ours", "theirs", "printed"),
    [
        (constants.MOLAR_VOLUME_IDEAL, scipy.constants.R * 273.15 / scipy.constants.atm * 1000.0, 5e-4),
        (constants.GAS_CONSTANT_CM3_ATM, scipy.constants.R / scipy.constants.atm * 1e6, 5e-4),
        (constants.DRY_AIR_GAS_CONSTANT, scipy.constants.R / 28.9644e-3, 1e-2),  # ICAO's R is 8.31432
    ],
)
def test_older_printed_constants_are_within_their_digits_of_the_present_ones(
    ours: float, theirs: float, printed: float
) -> None:
    assert ours == pytest.approx(theirs, abs=printed)
