"""The carbonate system: its constants at their limits, its solver against another one, and what follows from it."""

import itertools
import math
from collections.abc import Iterable

import numpy as np
import pytest
from scipy.optimize import brentq

from service.physics import quantities  # noqa: F401  imported for what it declares
from service.physics.carbonate import constants, solve
from service.physics.declare import Array
from service.physics.engine import plan, run

Values = dict[str, float | Array]
NUTRIENTS = ("phosphate", "silicate")
SEA = {"water_temperature": 18.0, "salinity": 35.0, "alkalinity": 2310.0}
EQUILIBRATOR = {"equilibrator_temperature": 18.0, "equilibrator_pressure": 1010.0, "water_mole_fraction": 400.0}


def compute(wanted: str, options: dict[str, str] | None = None, /, **values: float | Array) -> Array:
    """Return a term for co2 from the values given, which must be enough."""
    steps = plan((wanted,), frozenset(values), tuple(sorted((options or {}).items())), "co2")
    assert not steps.missing, steps.missing
    inputs = {name: np.atleast_1d(np.asarray(value, float)) for name, value in values.items()}
    return run(steps, inputs)[steps.keys[wanted]]


def every(*axes: Iterable[float]) -> list[Array]:
    """Return the columns of all combinations."""
    return list(np.array(list(itertools.product(*axes))).T)


def charges(hydrogen: float, acids: solve.Acids) -> float:
    """Return the alkalinity of all acids but carbonic, species by species: another way to write the balance."""
    free = hydrogen / (1.0 + acids.sulphate[0] / acids.bisulphate_constant[0])
    K1, K2, K3 = (float(each[0]) for each in acids[7:10])
    phosphates = [1.0, K1 / hydrogen, K1 * K2 / hydrogen**2, K1 * K2 * K3 / hydrogen**3]
    phosphoric, _, hydrogen_phosphate, phosphate = (acids.phosphate[0] * each / sum(phosphates) for each in phosphates)
    return float(
        acids.boron[0] / (1.0 + hydrogen / acids.boric_acid_constant[0])
        + acids.water_ion_product[0] / hydrogen
        + acids.silicate[0] / (1.0 + hydrogen / acids.silicic_acid_constant[0])
        + hydrogen_phosphate
        + 2.0 * phosphate
        - phosphoric
        - free
        - acids.sulphate[0] / (1.0 + acids.bisulphate_constant[0] / free)
        - acids.fluoride[0] / (1.0 + acids.hydrogen_fluoride_constant[0] / hydrogen)
    )


def water(temperature: float, salinity: float, phosphate: float, silicate: float) -> tuple[float, float, solve.Acids]:
    """Return both constants of carbonic acid, and the other acids."""
    given = {"water_temperature": temperature, "salinity": salinity, "phosphate": phosphate, "silicate": silicate}
    found = [
        compute(name, **given) * (1e-6 if name in given else 1.0)
        for name in ("carbonic_acid_constant", "bicarbonate_constant", *solve.Acids._fields)
    ]
    return float(found[0][0]), float(found[1][0]), solve.Acids(*found[2:])


WATERS = [
    (temperature, salinity, nutrients)
    for temperature, salinity in itertools.product((-2.0, 12.0, 40.0), (0.0, 0.5, 8.0, 35.0, 45.0))
    for nutrients in ((0.0, 0.0), (3.0, 150.0))
]
ALKALINITIES = (-100.0, -1.0, 0.0, 1e-3, 1.0, 60.0, 500.0, 2000.0, 2300.0, 10_000.0)
CARBONS = (1.0, 30.0, 500.0, 1999.0, 2001.0, 2300.0, 4600.0, 12_000.0)
FUGACITIES = (1.0, 30.0, 400.0, 5000.0, 20_000.0)


@pytest.mark.parametrize(("temperature", "salinity", "nutrients"), WATERS)
def test_the_ph_from_total_carbon_is_that_of_another_root_finder(
    temperature: float, salinity: float, nutrients: tuple[float, float]
) -> None:
    K1, K2, acids = water(temperature, salinity, *nutrients)
    alkalinity, carbon = every(ALKALINITIES, (1e-3, *CARBONS))

    def balance(ph: float, wanted: float, total: float) -> float:
        hydrogen = 10.0**-ph
        share = 1.0 + K1 / hydrogen + K1 * K2 / hydrogen**2
        return float(total / share * (K1 / hydrogen + 2 * K1 * K2 / hydrogen**2) + charges(hydrogen, acids) - wanted)

    given = (alkalinity * 1e-6, carbon * 1e-6)
    ours = -np.log10(solve.hydrogen_by_carbon(*given, np.array([K1]), np.array([K2]), acids))
    theirs = [brentq(balance, -1.0, 16.0, args=each, xtol=1e-13) for each in zip(*given, strict=True)]

    assert ours == pytest.approx(np.array(theirs), rel=0, abs=1e-10)


@pytest.mark.parametrize(("temperature", "salinity", "nutrients"), WATERS)
def test_the_ph_from_carbon_dioxide_is_that_of_another_root_finder(
    temperature: float, salinity: float, nutrients: tuple[float, float]
) -> None:
    K1, K2, acids = water(temperature, salinity, *nutrients)
    solubility = float(compute("solubility", water_temperature=temperature, salinity=salinity)[0])
    alkalinity, fugacity = every(ALKALINITIES, FUGACITIES)
    given = (alkalinity * 1e-6, solubility * fugacity * 1e-6)

    def balance(ph: float, wanted: float, dissolved: float) -> float:
        hydrogen = 10.0**-ph
        return float(dissolved * (K1 / hydrogen + 2 * K1 * K2 / hydrogen**2) + charges(hydrogen, acids) - wanted)

    with np.errstate(all="ignore"):  # as the engine runs it
        ours = -np.log10(solve.hydrogen_by_carbon_dioxide(*given, np.array([K1]), np.array([K2]), acids))
    theirs = [brentq(balance, -1.0, 16.0, args=each, xtol=1e-13) for each in zip(*given, strict=True)]

    assert ours == pytest.approx(np.array(theirs), rel=0, abs=1e-10)


SALINITIES = (0.0, 1e-3, 0.5, 1.0, 5.0, 19.0, 35.0, 45.0, 60.0)
TEMPERATURES = (-5.0, -2.0, 10.0, 25.0, 40.0, 60.0)
POSSIBLE_ALKALINITY = (-1e4, -100, -1, -1e-6, 0, 1e-9, 1e-3, 1, 100, 1000, 2000, 2300, 1e4, 1e6)


@pytest.mark.parametrize("nutrients", [0.0, 2.0, 1000.0])
def test_every_possible_water_has_a_solution(nutrients: float) -> None:
    salinity, temperature, alkalinity, carbon = every(
        SALINITIES, TEMPERATURES, POSSIBLE_ALKALINITY, (0, 1e-9, 1e-3, 1, 100, 1999.9, 2000, 4600, 12_000, 1e6)
    )
    common: Values = {"salinity": salinity, "water_temperature": temperature} | dict.fromkeys(NUTRIENTS, nutrients)
    by_carbon = compute("hydrogen_ion", alkalinity=alkalinity, dissolved_inorganic_carbon=carbon, **common)
    by_fugacity = compute("hydrogen_ion", alkalinity=alkalinity, water_fugacity=carbon, **common)

    assert np.isfinite(by_carbon).all()
    assert np.isfinite(by_fugacity).all()


def test_what_is_not_solved_in_time_is_no_number(monkeypatch: pytest.MonkeyPatch) -> None:
    monkeypatch.setattr(solve, "ITERATIONS", 2)

    found = compute("hydrogen_ion", **SEA, dissolved_inorganic_carbon=np.array([2050.0, np.nan]))

    assert np.isnan(found).all()


def random_waters(samples: int) -> dict[str, Array]:
    """Return invented waters of every salinity, some without phosphate, the first block without any."""
    rng = np.random.default_rng(8660)
    phosphate = np.where(rng.random(samples) < 0.5, 0.0, rng.uniform(0.0, 3.0, samples))
    phosphate[: samples // 4] = 0.0
    fresh = rng.random(samples) < 0.3
    return {
        "water_temperature": rng.uniform(-2.0, 40.0, samples),
        "salinity": np.where(fresh, rng.uniform(0.0, 1.5, samples), rng.uniform(0.0, 45.0, samples)),
        "alkalinity": np.where(rng.random(samples) < 0.1, np.nan, rng.uniform(-50.0, 4000.0, samples)),
        "phosphate": phosphate,
        "silicate": rng.uniform(0.0, 100.0, samples),
    }


WAYS = [
    ("revelle_factor", {"dissolved_inorganic_carbon": 2100.0}),
    ("storage_ratio", {"water_fugacity": 400.0}),
    ("fugacity_in_water", {"ph": 8.0}),
    ("fugacity_in_water", EQUILIBRATOR),
    ("fugacity_in_water", {**EQUILIBRATOR, "headspace_ratio": 0.4}),
]


@pytest.mark.parametrize(("wanted", "way"), WAYS)
@pytest.mark.parametrize("size", [1, 7, 64])
def test_blocks_do_not_matter_to_the_last_bit(wanted: str, way: dict[str, float], size: int) -> None:
    waters = random_waters(300)
    whole = compute(wanted, **waters, **way)
    blocks = [
        compute(wanted, **{name: array[start : start + size] for name, array in waters.items()}, **way)
        for start in range(0, 300, size)
    ]

    assert np.isfinite(whole).sum() > 100
    assert np.array_equal(np.concatenate(blocks), whole, equal_nan=True)


def test_a_sample_without_a_number_changes_nothing_for_its_neighbours() -> None:
    salinity = np.array([35.0, np.nan, 10.0, 0.2])
    among = compute("storage_ratio", water_temperature=18.0, salinity=salinity, alkalinity=2310.0, water_fugacity=400.0)
    alone = [float(compute("storage_ratio", **{**SEA, "salinity": S}, water_fugacity=400.0)[0]) for S in salinity]

    assert np.isnan(among[1])
    assert np.array_equal(among, np.array(alone), equal_nan=True)


@pytest.mark.parametrize("salinity", [0.0, 5.0, 35.0])
@pytest.mark.parametrize("alkalinity", [50.0, 2300.0])
def test_carbon_to_fugacity_and_back_is_itself(salinity: float, alkalinity: float) -> None:
    common = {"water_temperature": 12.0, "salinity": salinity, "alkalinity": alkalinity}
    carbon = np.array([60.0, 1500.0, 2100.0, 2600.0])
    fugacity = compute("fugacity_in_water", **common, dissolved_inorganic_carbon=carbon)

    assert compute("carbon_by_fugacity", **common, carbonate_fugacity=fugacity) == pytest.approx(carbon, rel=1e-12)


def test_every_pair_tells_the_same_water() -> None:
    hydrogen = compute("hydrogen_ion", **SEA, dissolved_inorganic_carbon=2050.0)
    fugacity = compute("fugacity_in_water", **SEA, dissolved_inorganic_carbon=2050.0)
    storage = compute("storage_ratio", **SEA, dissolved_inorganic_carbon=2050.0)
    no_alkalinity = {name: value for name, value in SEA.items() if name != "alkalinity"}

    assert compute("fugacity_in_water", **SEA, ph=-np.log10(hydrogen)) == pytest.approx(fugacity, rel=1e-10)
    assert compute("storage_ratio", **SEA, water_fugacity=fugacity) == pytest.approx(storage, rel=1e-12)
    assert compute(
        "storage_ratio", **no_alkalinity, dissolved_inorganic_carbon=2050.0, water_fugacity=fugacity
    ) == pytest.approx(storage, rel=1e-12)
    assert compute("storage_ratio", **no_alkalinity, ph=-np.log10(hydrogen), water_fugacity=fugacity) == pytest.approx(
        storage, rel=1e-12
    )


@pytest.mark.parametrize(("temperature", "salinity"), [(25.0, 35.0), (2.0, 33.0), (15.0, 8.0), (20.0, 0.0)])
@pytest.mark.parametrize("nutrients", [0.0, 50.0])
def test_the_buffer_factors_are_the_slopes_of_the_curve(temperature: float, salinity: float, nutrients: float) -> None:
    common = {
        "water_temperature": temperature,
        "salinity": salinity,
        "alkalinity": 1800.0,
        "phosphate": nutrients,
        "silicate": nutrients,
    }
    carbon, small = 1750.0, 1e-4
    low, middle, high = (
        float(compute("fugacity_in_water", **common, dissolved_inorganic_carbon=each)[0])
        for each in (carbon * (1 - small), carbon, carbon * (1 + small))
    )
    solubility = float(compute("solubility", water_temperature=temperature, salinity=salinity)[0])

    # central differences: their own error is of the order of the square of the step
    revelle = compute("revelle_factor", **common, dissolved_inorganic_carbon=carbon)
    storage = compute("storage_ratio", **common, dissolved_inorganic_carbon=carbon)
    assert revelle == pytest.approx(math.log(high / low) / math.log((1 + small) / (1 - small)), rel=1e-5)
    assert storage == pytest.approx(2 * small * carbon / (solubility * (high - low)), rel=1e-5)
    assert storage == pytest.approx(carbon / (solubility * middle * revelle), rel=1e-10)


def test_pure_water_stores_little_more_than_its_carbon_dioxide() -> None:
    pure = {"water_temperature": 25.0, "salinity": 0.0, "alkalinity": 0.0}
    ratio = compute("storage_ratio", **pure, water_fugacity=400.0)
    hydrogen = float(compute("hydrogen_ion", **pure, water_fugacity=400.0)[0])

    # [H+] = [HCO3-] = sqrt(K1 K0 f) there, so that d(CO2 + HCO3)/dCO2 = 1 + sqrt(K1 / (K0 f)) / 2
    assert float(ratio[0]) == pytest.approx(1.09, abs=0.005)
    assert hydrogen == pytest.approx(math.sqrt(10**-6.352 * 0.03406 * 400e-6), rel=3e-3)


def test_a_water_without_carbon_dioxide_has_the_limits_of_the_factors() -> None:
    found = compute("storage_ratio", **SEA, water_fugacity=np.array([0.0, 1e-9]))

    assert found[0] == pytest.approx(found[1], rel=1e-5)
    assert compute("fugacity_in_water", **SEA, dissolved_inorganic_carbon=0.0) == pytest.approx(0.0, abs=0.0)


@pytest.mark.parametrize("temperature", np.linspace(2.0, 30.0, 8))
def test_sea_water_has_buffer_factors_of_the_published_range(temperature: float) -> None:
    given = {"water_temperature": temperature, "salinity": 35.0, "alkalinity": 2300.0, "water_fugacity": 380.0}

    # Revelle factor: 8 to 15, Egleston et al. (2010), Sarmiento and Gruber (2006); storage ratio: common practice
    assert 8.0 < float(compute("revelle_factor", **given)[0]) < 15.5
    assert 6.0 < float(compute("storage_ratio", **given)[0]) < 25.0


def jump(wanted: str, limit: float, **given: float | Array) -> Array:
    """Return a term just below a salinity and at it."""
    given.setdefault("water_temperature", np.linspace(2.0, 35.0, 12))
    return np.array([compute(wanted, salinity=salinity, **given) for salinity in (np.nextafter(limit, 0.0), limit)])


@pytest.mark.parametrize(("alkalinity", "carbon"), [(1400.0, 1300.0), (2000.0, 2000.0), (1000.0, 1200.0)])
def test_the_step_at_the_limit_of_the_sea_is_no_larger_than_the_sets_are_sure(alkalinity: float, carbon: float) -> None:
    given = {"alkalinity": alkalinity, "dissolved_inorganic_carbon": carbon}
    below, at = jump("fugacity_in_water", constants.SEA_FROM, **given)
    ph = -np.log10(jump("hydrogen_ion", constants.SEA_FROM, **given))

    assert np.abs(at / below - 1.0).max() < 0.013
    assert 0.001 < np.abs(ph[1] - ph[0]).max() < 0.0145


def test_where_salt_begins_to_count_the_step_is_large_and_millero_has_none() -> None:
    given = {"alkalinity": 2000.0, "dissolved_inorganic_carbon": 1980.0}
    below, at = jump("fugacity_in_water", constants.FRESH_BELOW, **given)
    ph = -np.log10(jump("hydrogen_ion", constants.FRESH_BELOW, **given))
    temperature = np.linspace(2.0, 35.0, 12)
    pure = constants.plummer_busenberg_1982(temperature)
    brackish = constants.millero_2010(temperature, np.zeros(1))

    assert 0.4 < np.abs(at / below - 1.0).max() < 0.5
    assert 0.28 < np.abs(ph[1] - ph[0]).max() < 0.31
    # two sets for pure water agree as measurements there do, to 0.002 in pK
    assert np.abs(np.log10(np.array(pure) / np.array(brackish))).max() < 0.002


def test_millero_and_lueker_agree_within_their_scatter_in_sea_water() -> None:
    temperature, salinity = every(np.linspace(2.0, 35.0, 12), np.linspace(19.0, 43.0, 13))
    ours = np.array(constants.millero_2010(temperature, salinity))
    theirs = np.array(constants.lueker_2000(temperature, salinity))
    apart = np.log10(ours / theirs)
    open_sea = (salinity > 29.0) & (salinity < 37.0)

    sure = np.array([math.hypot(0.0055, 0.005), math.hypot(0.010, 0.010)])  # in pK, standard deviations of both fits

    # two of them at the salinities of the open sea, three where the data of both thin out
    assert (np.abs(apart[:, open_sea]).max(axis=1) < 2.0 * sure).all()
    assert (np.abs(apart).max(axis=1) < 3.0 * sure).all()


BY_CARBONATE = {"temperature_correction": "carbonate"}


def test_an_equilibrator_at_sea_temperature_corrects_nothing() -> None:
    for salinity in (0.5, 10.0, 35.0):
        given = {**SEA, "salinity": salinity, **EQUILIBRATOR}

        assert compute("temperature_factor", BY_CARBONATE, **given) == pytest.approx(1.0, rel=1e-12)
        assert compute("temperature_factor", **given) == pytest.approx(1.0, rel=1e-12)


def test_alkalinity_changes_the_correction_only_below_salinity_20() -> None:
    salinity = np.array([19.9, 20.0, 35.0])
    given: Values = {**SEA, **EQUILIBRATOR, "salinity": salinity, "equilibrator_temperature": 19.5}
    by_default = compute("temperature_factor", **given)
    without = compute("temperature_factor", **{name: each for name, each in given.items() if name != "alkalinity"})
    carbonate = compute("temperature_factor", BY_CARBONATE, **given)

    assert np.array_equal(by_default[1:], without[1:])
    assert by_default[0] == carbonate[0]
    assert abs(by_default[0] - without[0]) > 0.01


def test_air_without_carbon_dioxide_is_corrected_by_nothing() -> None:
    given = {**SEA, **EQUILIBRATOR, "water_mole_fraction": 0.0, "equilibrator_temperature": 25.0}

    assert compute("fugacity_in_water", BY_CARBONATE, **given) == pytest.approx(0.0, abs=0.0)


def test_a_headspace_of_no_volume_is_the_flow_through_case() -> None:
    given = {**SEA, **EQUILIBRATOR, "equilibrator_temperature": 22.0}
    bottle = compute("fugacity_in_water", **given, headspace_ratio=0.0)
    flow_through = compute("fugacity_in_water", BY_CARBONATE, **given)

    assert bottle == pytest.approx(flow_through, rel=1e-12)


@pytest.mark.parametrize("salinity", [0.0, 35.0])
def test_no_carbon_is_lost_between_bottle_and_headspace(salinity: float) -> None:
    ratio, start, warm, pressure = 0.5, 410.0, 22.0, 1010.0
    water_in = {"salinity": salinity, "alkalinity": 1200.0}
    given = {
        **water_in,
        "water_temperature": 8.0,
        "equilibrator_temperature": warm,
        "equilibrator_pressure": pressure,
        "water_mole_fraction": 1500.0,
        "headspace_ratio": ratio,
        "headspace_start_mole_fraction": start,
    }
    in_situ = compute("fugacity_in_water", **given)
    before = compute("carbon_by_fugacity", **water_in, water_temperature=8.0, carbonate_fugacity=in_situ)
    after = compute("carbon_at_equilibrator", **given)
    vapour = compute("water_vapour_pressure", water_temperature=warm, salinity=salinity)
    density = compute("density", water_temperature=warm, salinity=salinity)
    moles_of_gas = (pressure - vapour) * 100.0 / (8.31446261815324 * (warm + 273.15))  # mol m-3, dry
    gained = ratio * moles_of_gas * (1500.0 - start)  # umol per cubic metre of water

    assert (before - after) * density == pytest.approx(gained, rel=1e-9)


def test_a_bottle_of_sea_water_gave_up_what_its_bicarbonate_made_good() -> None:
    given = {**SEA, **EQUILIBRATOR, "headspace_ratio": 1.0}
    with_carbonate = compute("fugacity_in_water", **given)
    from_dioxide = compute("fugacity_in_water", **{k: v for k, v in given.items() if k != "alkalinity"})

    # the headspace took 0.8 times the dissolved gas and more, but less than a hundredth of the total carbon
    assert float(from_dioxide[0]) > 800.0
    assert 400.0 < float(with_carbonate[0]) < 460.0


def test_more_boron_leaves_less_alkalinity_to_carbon() -> None:
    pair = {**SEA, "dissolved_inorganic_carbon": 2050.0}
    lee = float(compute("fugacity_in_water", **pair)[0])
    uppstrom = float(compute("fugacity_in_water", {"total_boron": "uppstrom-1974"}, **pair)[0])

    assert lee / uppstrom == pytest.approx(1.015, abs=0.002)


def test_a_concentration_per_litre_is_one_per_kilogram_times_the_density() -> None:
    density = float(compute("density", water_temperature=18.0, salinity=35.0)[0]) / 1000.0
    names = ("alkalinity", "dissolved_inorganic_carbon", "phosphate", "silicate")
    per_kilogram = dict(zip(names, (2310.0, 2050.0, 1.5, 20.0), strict=True))
    per_litre = {f"{name}_per_litre": value * density for name, value in per_kilogram.items()}
    common = {"water_temperature": 18.0, "salinity": 35.0}

    assert compute("fugacity_in_water", **common, **per_litre) == pytest.approx(
        compute("fugacity_in_water", **common, **per_kilogram), rel=1e-12
    )
