"""Series in time: their order, what each sample holds, what a layer remembers, and what is left of a disequilibrium."""

import math
from collections.abc import Callable

import numpy as np
import pytest
from scipy.integrate import solve_ivp

from schemas.moments import moments
from service.physics import quantities  # noqa: F401  imported for what it declares
from service.physics.carbonate.solve import Acids, hydrogen_by_carbon, hydrogen_by_carbon_dioxide
from service.physics.declare import Array
from service.physics.engine import plan, run
from service.physics.equilibration import disequilibrium_by_then, disequilibrium_since, equilibration_rate
from service.physics.series import gap_limit, holding_time, out_of_order
from service.physics.turnover import turnover_net, turnover_one_way
from service.physics.wind_memory import decayed_sums, memory, reuer_2007, teeter_2018

ONE = np.ones(1)
NAN = float("nan")
METHODS = [reuer_2007, teeter_2018]
Method = Callable[[Array, Array, Array, Array], tuple[Array, Array]]


def invented_year(step: float = 1.0, seed: int = 5) -> tuple[Array, Array, Array]:
    """Return times, transfer velocities and depths of an invented year."""
    rng = np.random.default_rng(seed)
    time = np.arange(0.0, 365.0, step)
    return time, rng.gamma(2.0, 8.0, time.size), rng.uniform(20.0, 80.0, time.size)


# Times in words.

SPELLINGS = [
    ("1970-01-01", 0.0),
    ("2026-03-01", 20513.0),
    ("2026-03-01T12:00:00Z", 20513.5),
    ("2026-03-01 12:00", 20513.5),
    ("2026-03-01T12:00Z", 20513.5),
    ("2026-03-01T14:00:00+02:00", 20513.5),
    ("2026-03-01T09:30:00-0230", 20513.5),
    ("2026-03-01T12:00:00 UTC", 20513.5),
    ("2024-02-29T23:59:59.5Z", 19783.0 - 0.5 / 86400.0),
    ("2016-12-31T23:59:60Z", 17167.0),  # a leap second is the next one
    ("1969-12-31T12:00Z", -0.5),
    ("12.5", 12.5),
    ("-3", -3.0),
]
NO_TIMES = [
    "yesterday",
    "2026-02-29",
    "2026-13-01",
    "2026-03-01T25:00",
    "01/03/2026",
    "2026-03-01T12:00:00 02:00",
    "12:00",
]


@pytest.mark.parametrize(("text", "days"), SPELLINGS)
def test_a_time_is_read_as_days_since_1970(text: str, days: float) -> None:
    found, faults = moments([text, text])

    assert faults == {}
    assert found == pytest.approx([days, days], abs=1e-10)  # a hundredth of a millisecond


@pytest.mark.parametrize("text", NO_TIMES)
def test_what_is_no_time_is_told_with_its_place(text: str) -> None:
    found, faults = moments(["2026-03-01", text])

    assert np.isnan(found).tolist() == [False, True]
    assert list(faults) == [1]


def test_a_column_of_plain_times_agrees_with_the_calendar_of_numpy() -> None:
    written = np.datetime64("1999-12-30T00:00:00") + np.arange(40_000) * np.timedelta64(3607, "s")

    found, faults = moments([f"{each}Z" for each in written])

    assert faults == {}
    assert np.array_equal(found, written.astype("datetime64[s]").astype(np.int64) / 86400.0)


# Order and spacing.


def test_a_time_out_of_order_is_told_and_a_missing_one_is_not() -> None:
    time = np.array([0.0, 2.0, NAN, 1.0, 2.0, 3.0])

    assert out_of_order(time).tolist() == [False, False, False, True, True, False]


def test_each_sample_holds_half_way_to_its_neighbours() -> None:
    assert holding_time(np.array([0.0, 1.0, 3.0, 4.0])).tolist() == [0.5, 1.5, 1.5, 0.5]


def test_a_gap_is_a_spacing_of_more_than_three_median_ones_and_is_not_bridged() -> None:
    time = np.array([0.0, 1.0, 2.0, 3.0, 13.0, 14.0])

    assert gap_limit(time) == 3.0
    assert holding_time(time).tolist() == [0.5, 1.0, 1.0, 1.0, 1.0, 0.5]


def test_one_sample_holds_for_no_time() -> None:
    assert holding_time(np.array([7.0])).tolist() == [0.0]


# Decay.


def test_20_cm_per_hour_over_40_m_leaves_one_e_th_after_8_days_and_a_third() -> None:
    rate = equilibration_rate(np.array([40.0]), ONE, np.array([20.0]), ONE, 0.0 * ONE, 0.0 * ONE)

    assert disequilibrium_by_then(rate, np.array([[40.0 / 4.8]]))[0, 0] == pytest.approx(math.exp(-1.0), rel=1e-14)


def test_ventilation_from_below_adds_to_the_rate_whatever_the_storage_ratio() -> None:
    depth, velocity, storage = np.array([40.0]), np.array([20.0]), np.array([12.0])

    still = equilibration_rate(depth, ONE, velocity, storage, 0.0 * ONE, 0.0 * ONE)
    moving = equilibration_rate(depth, ONE, velocity, storage, 0.0 * ONE, np.array([0.03]))

    assert moving - still == pytest.approx([0.03], rel=1e-12)


@pytest.mark.parametrize("steps", [1, 7, 1000])
def test_a_decay_is_the_same_number_in_one_step_or_in_a_thousand(steps: int) -> None:
    time, rate = np.linspace(0.0, 30.0, steps + 1), np.full(steps + 1, 0.12)

    assert disequilibrium_since(time, rate)[-1] == pytest.approx(math.exp(-3.6), rel=1e-13)  # rounding of 1000 sums


def test_a_rate_that_changes_is_integrated_exactly_between_samples() -> None:
    left = disequilibrium_since(np.array([0.0, 2.0, 3.0]), np.array([0.1, 0.3, 0.0]))

    assert left == pytest.approx([1.0, math.exp(-0.4), math.exp(-0.55)], rel=1e-15)  # by hand: 2 x 0.2, then 1 x 0.15


def test_a_sample_without_a_rate_has_no_result_and_is_bridged() -> None:
    left = disequilibrium_since(np.array([0.0, 1.0, 2.0, 3.0]), np.array([0.1, NAN, 0.1, 0.1]))

    assert np.isnan(left).tolist() == [False, True, False, False]
    assert left[-1] == pytest.approx(math.exp(-0.3), rel=1e-15)


# Turnover.


def test_the_two_turnover_times_are_stock_over_their_own_flux() -> None:
    stock, out, back = np.array([10_000.0]), np.array([100.0]), np.array([120.0])

    assert turnover_one_way(stock, out) == [100.0]
    assert turnover_net(stock, out, back) == [500.0]
    assert turnover_net(stock, back, out) == [500.0]


# The memory of the wind.


def test_decayed_sums_are_what_a_plain_loop_gives_however_deep() -> None:
    rng = np.random.default_rng(2)
    gains, depth = rng.normal(size=(2, 300)), np.cumsum(rng.exponential(40.0, 300))  # 12,000 in all: many scans
    by_hand, total = np.empty_like(gains), np.zeros(2)
    for place in range(300):
        total = total * math.exp(depth[place - 1] - depth[place] if place else 0.0) + gains[:, place]
        by_hand[:, place] = total

    assert decayed_sums(gains, depth) == pytest.approx(by_hand, rel=1e-12, abs=1e-12)


@pytest.mark.parametrize("method", METHODS)
@pytest.mark.parametrize("depth", [5.0, 40.0, 500.0])
def test_a_constant_wind_is_remembered_as_itself(method: Method, depth: float) -> None:
    velocity = np.full(200, 13.7)

    weighted, _ = method(np.arange(200.0), ONE, velocity, np.array([depth]))

    assert np.array_equal(weighted, velocity)


def by_weights(time: Array, velocity: Array, depth: Array, sample: int) -> tuple[float, float]:
    """Return the mean with weights multiplied one by one, and the fraction ventilated, as the paper describes it."""
    weight, total, weights = 1.0, 0.0, 0.0
    spans = np.diff(time, prepend=time[0])
    for back in range(sample, -1, -1):
        if time[back] <= time[sample] - 60.0:
            break
        total += velocity[back] * weight * spans[back]
        weights += weight * spans[back]
        weight *= 1.0 - min(velocity[back] * 0.24 * spans[back] / depth[back], 1.0)
    return total / weights, 1.0 - weight


def test_reuer_2007_weights_by_the_fraction_of_the_layer_ventilated_since() -> None:
    time, velocity, depth = invented_year()
    weighted, ventilated = reuer_2007(time, ONE, velocity, depth)

    for sample in (1, 2, 30, 59, 60, 61, 200, 364):
        mean, fraction = by_weights(time, velocity, depth, sample)
        assert weighted[sample] == pytest.approx(mean, rel=1e-12)
        assert ventilated[sample] == pytest.approx(fraction, abs=1e-13)


def test_teeter_2018_gives_the_flux_of_a_constant_production_its_own_size() -> None:
    time, velocity, depth = np.arange(0.0, 200.0), invented_year()[1][:200], np.full(200, 18.0)
    held = np.repeat(velocity, 2)[1:-1]  # half-way to its neighbours
    excess, production = 0.0, 25.0  # mmol m-3, mmol m-2 d-1
    for each in held:
        rate = each * 0.24 / 18.0
        settled = production / 18.0 / rate
        excess = settled + (excess - settled) * math.exp(-rate * 0.5)

    weighted, ventilated = teeter_2018(time, ONE, velocity, depth)

    assert 1.0 - ventilated[-1] < 1e-4  # so that what was before the memory is forgotten to that extent
    assert weighted[-1] * 0.24 * excess == pytest.approx(production, rel=2e-4)


def test_the_refinement_agrees_between_daily_and_hourly_samples_of_the_same_wind() -> None:
    daily = np.arange(0.0, 90.0)
    velocity = 15.0 + 8.0 * np.sin(daily / 9.0)
    hourly = np.arange(0.0, 89.0 + 1e-9, 1.0 / 24.0)
    finely = np.interp(hourly, daily, velocity)

    coarse = teeter_2018(daily, ONE, velocity, np.array([40.0]))[0][-1]
    fine = teeter_2018(hourly, ONE, finely, np.array([40.0]))[0][-1]

    assert coarse == pytest.approx(fine, rel=1e-3)  # a wind that turns over in weeks, sampled by days


@pytest.mark.parametrize("method", METHODS)
def test_a_missing_sample_has_no_result_and_is_bridged(method: Method) -> None:
    velocity = np.full(100, 12.0)
    velocity[[40, 41, 70]] = NAN

    weighted, ventilated = method(np.arange(100.0), ONE, velocity, np.array([30.0]))

    assert np.flatnonzero(np.isnan(weighted)).tolist() == [40, 41, 70]
    assert set(weighted[np.isfinite(weighted)]) == {12.0}
    assert np.array_equal(np.isnan(weighted), np.isnan(ventilated))


@pytest.mark.parametrize("method", METHODS)
def test_a_year_of_calm_and_a_layer_exchanged_at_once_are_no_obstacle(method: Method) -> None:
    time = np.arange(100.0)

    calm, nothing = method(time, ONE, np.zeros(100), np.array([30.0]))
    storm, all_of_it = method(time, ONE, np.full(100, 1e4), np.array([0.1]))

    assert not calm.any()
    assert not nothing.any()
    assert set(storm) == {1e4}
    assert all_of_it[1:] == pytest.approx(np.ones(99))


@pytest.mark.parametrize("method", METHODS)
def test_a_series_of_nothing_but_gaps_gives_nothing(method: Method) -> None:
    assert np.isnan(method(np.full(3, NAN), ONE, np.ones(3), ONE)).all()


def test_the_memory_tells_how_far_back_it_reaches_and_its_gaps() -> None:
    time = np.concatenate((np.arange(0.0, 10.0), np.arange(30.0, 120.0)))

    length, exchange, gaps = memory(time, ONE, np.array([12.5]), np.array([60.0]))

    assert length[[0, 5, -1]].tolist() == [0.0, 5.0, 60.0]
    assert exchange[-1] == pytest.approx(60.0 * 3.0 / 60.0, rel=1e-12)
    assert gaps[[9, 10, -1]].tolist() == [0.0, 1.0, 0.0]


def test_half_the_water_under_ice_is_half_the_velocity() -> None:
    time, velocity, depth = invented_year()

    weighted, _ = teeter_2018(time, np.array([0.5]), velocity, depth)

    assert weighted == pytest.approx(teeter_2018(time, ONE, 0.5 * velocity, depth)[0], rel=1e-14)


# The course of carbon dioxide far from equilibrium.

WATER = {
    "water_temperature": 15.0,
    "salinity": 35.0,
    "alkalinity": 2300.0,
    "air_fugacity": 400.0,
    "given_transfer_velocity": 15.0,
    "mixed_layer_depth": 50.0,
}
SYSTEM = (
    *("solubility", "carbonic_acid_constant", "bicarbonate_constant", "boric_acid_constant", "boron"),
    *("water_ion_product", "bisulphate_constant", "sulphate", "hydrogen_fluoride_constant", "fluoride"),
    *("phosphoric_acid_constant", "dihydrogen_phosphate_constant", "hydrogen_phosphate_constant"),
    *("silicic_acid_constant", "phosphate", "silicate"),
)
TIMES = np.array([0.0, 1.0, 10.0, 50.0, 100.0, 300.0, 1000.0])
OWN = ("transfer_velocity", "given")


def computed(wanted: tuple[str, ...], values: dict[str, float], *chosen: tuple[str, str]) -> dict[str, Array]:
    steps = plan(wanted, frozenset({*values, "times"}), tuple(sorted((OWN, *chosen))), "co2")
    known = run(steps, {**{name: np.array([value]) for name, value in values.items()}, "times": TIMES[:, np.newaxis]})
    return {name: known[steps.keys[name]] for name in wanted}


def by_a_solver(values: dict[str, float], ventilation: float) -> Array:
    """Return the course by a general solver of the equation for total carbon."""
    found = computed(SYSTEM, values)
    nutrients = [found[name] * 1e-6 for name in ("phosphate", "silicate")]  # umol to mol
    acids = Acids._make([found[name] for name in SYSTEM[3:14]] + nutrients)
    K0, K1, K2 = (found[name] for name in SYSTEM[:3])
    alkalinity = np.array([values["alkalinity"] * 1e-6])

    def carbon(fugacity: float) -> float:
        dioxide = K0 * fugacity * 1e-6
        hydrogen = hydrogen_by_carbon_dioxide(alkalinity, dioxide, K1, K2, acids)
        return float((dioxide * (1.0 + K1 / hydrogen * (1.0 + K2 / hydrogen)))[0])

    def dioxide(total: float) -> float:
        hydrogen = hydrogen_by_carbon(alkalinity, np.array([total]), K1, K2, acids)
        return float((total / (1.0 + K1 / hydrogen * (1.0 + K2 / hydrogen)))[0])

    at_rest, end = float(K0[0]) * values["air_fugacity"] * 1e-6, carbon(values["air_fugacity"])
    rate = values["given_transfer_velocity"] * 0.24 / values["mixed_layer_depth"]

    def change(_: float, state: Array) -> list[float]:
        return [-rate * (dioxide(state[0]) - at_rest) - ventilation * (state[0] - end)]

    solved = solve_ivp(
        change, (0.0, TIMES[-1]), [carbon(values["water_fugacity"])], "LSODA", TIMES, rtol=1e-11, atol=1e-17
    )
    left = np.array([dioxide(total) for total in solved.y[0]]) - at_rest
    return np.asarray(left / left[0])


FAR = [(600.0, 0.0), (100.0, 0.0), (10_000.0, 0.0), (2000.0, 0.02)]


@pytest.mark.parametrize(("fugacity", "ventilation"), FAR)
def test_the_nonlinear_course_is_what_a_general_solver_gives(fugacity: float, ventilation: float) -> None:
    values = {**WATER, "water_fugacity": fugacity, "ventilation_rate": ventilation}
    course = computed(("disequilibrium",), values, ("course", "nonlinear"))["disequilibrium"][:, 0]

    assert course == pytest.approx(by_a_solver(values, ventilation), abs=2e-9)  # the solver's own tolerance, scaled


def test_near_equilibrium_the_nonlinear_course_is_the_linear_one() -> None:
    near = {**WATER, "water_fugacity": 400.01}
    far = {**WATER, "water_fugacity": 1500.0}

    def both(values: dict[str, float]) -> tuple[Array, Array]:
        linear, nonlinear = (
            computed(("disequilibrium",), values, ("course", name))["disequilibrium"]
            for name in ("linear", "nonlinear")
        )
        return linear, nonlinear

    linear, nonlinear = both(near)
    assert nonlinear == pytest.approx(linear, abs=2e-5)  # a disequilibrium of 2.5e-5 changes the ratio by as much
    linear, nonlinear = both(far)
    assert np.abs(nonlinear - linear).max() > 0.05


def test_the_course_of_a_sample_does_not_depend_on_the_others() -> None:
    alone = computed(("disequilibrium",), {**WATER, "water_fugacity": 700.0}, ("course", "nonlinear"))
    given = frozenset({*WATER, "water_fugacity", "times"})
    steps = plan(("disequilibrium",), given, (("course", "nonlinear"), OWN), "co2")
    values = {name: np.array([value]) for name, value in WATER.items()}
    many = {**values, "water_fugacity": np.array([300.0, 700.0, 5000.0]), "times": TIMES[:, np.newaxis]}
    together = run(steps, many)[steps.keys["disequilibrium"]]

    assert np.array_equal(together[:, 1], alone["disequilibrium"][:, 0])
