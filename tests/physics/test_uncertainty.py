"""How sure a result is: worked examples of the Guide, first order against draws, shares, and what cannot be."""

from collections.abc import Mapping
from typing import Any

import numpy as np
import pytest

from service.physics import declare
from service.physics.answer import Answer, answer
from service.physics.declare import GASES, NO_GAS, QUANTITIES, Array, Step, Term
from service.physics.engine import run
from service.physics.plans import Node, Plan
from service.physics.question import Question, ask
from service.physics.summary import combined
from service.physics.sureness import Asked
from service.physics.uncertainty import Doubt, Spread, correlation_matrix, first_order, monte_carlo, possible_together

DRAWS = 200_000


# Worked examples of JCGM 100:2008, as plans of one step each.


def plan_of(function: Any, terms: Mapping[str, Term], result: str) -> Plan:
    names = tuple(name for name in terms if name != result)
    node = Node(Step((result,), function, names, name="worked"), function, names, (result,))
    return Plan((node,), {result: result}, names, {}, {}, (), (node.step,), {}, (), ())


def spread_of(
    monkeypatch: pytest.MonkeyPatch,
    function: Any,
    values: Mapping[str, tuple[float, float]],
    correlations: Mapping[tuple[str, str], float] | None = None,
) -> Spread:
    """Return the spread of a function of values with their standard uncertainties."""
    terms = {name: Term(name, "1", "of an example", scale=abs(value) or 1.0) for name, (value, _) in values.items()}
    for name, term in terms.items():
        monkeypatch.setitem(declare.TERMS, name, term)
    steps = plan_of(function, {**terms, "outcome": Term("outcome", "1", "of an example")}, "outcome")
    known = run(steps, {name: np.array([value]) for name, (value, _) in values.items()})
    doubt = Doubt({name: np.array([u]) for name, (_, u) in values.items()}, correlations or {}, "0")
    return first_order(steps, known, ["outcome"], doubt, NO_GAS, None)


def test_the_gauge_block_of_the_guide_is_sure_to_32_nm(monkeypatch: pytest.MonkeyPatch) -> None:
    # JCGM 100:2008, H.1, first order: length 50 mm, u in nm; printed 32 nm (31.7 by hand from its table)
    example = {
        "standard_length": (50_000_623.0, 25.0),
        "length_difference": (215.0, 9.7),
        "expansion_of_standard": (11.5e-6, 1.2e-6),
        "expansion_difference": (0.0, 0.58e-6),
        "temperature_offset": (-0.1, 0.41),
        "temperature_difference": (0.0, 0.029),
    }

    def length(standard: Array, difference: Array, alpha: Array, apart: Array, offset: Array, warmer: Array) -> Array:
        return standard + difference - standard * (apart * offset + alpha * warmer)

    spread = spread_of(monkeypatch, length, example)

    assert spread.u["outcome"][0] == pytest.approx(32.0, abs=0.5)  # the printed digit
    shares = {name: float(share[0]) for name, share in spread.budget["outcome"].items()}
    assert shares["standard_length"] == pytest.approx(25.0**2 / 31.7**2, abs=0.005)
    assert shares["temperature_offset"] == pytest.approx(0.0, abs=1e-12)
    assert sum(shares.values()) == pytest.approx(1.0, abs=1e-12)


IMPEDANCE = [  # JCGM 100:2008, H.2, table H.4, as printed (from memory, reproduced by hand): value and u, in ohm
    ("resistance", lambda volts, amperes, phase: volts / amperes * np.cos(phase), 127.732, 0.071),
    ("reactance", lambda volts, amperes, phase: volts / amperes * np.sin(phase), 219.847, 0.295),
    ("impedance", lambda volts, amperes, phase: volts / amperes + 0.0 * phase, 254.260, 0.236),
]


@pytest.mark.parametrize(
    ("function", "value", "u"), [each[1:] for each in IMPEDANCE], ids=[each[0] for each in IMPEDANCE]
)
def test_the_correlated_impedance_of_the_guide(
    monkeypatch: pytest.MonkeyPatch, function: Any, value: float, u: float
) -> None:
    example = {"volts": (4.9990, 0.0032), "amperes": (19.6610e-3, 0.0095e-3), "phase": (1.04446, 0.00075)}
    correlations = {("volts", "amperes"): -0.36, ("volts", "phase"): 0.86, ("amperes", "phase"): -0.65}

    spread = spread_of(monkeypatch, function, example, correlations)
    shares = spread.budget["outcome"]

    assert function(4.9990, 19.6610e-3, 1.04446) == pytest.approx(value, abs=0.0005)
    assert spread.u["outcome"][0] == pytest.approx(u, abs=0.0015)  # correlations are printed to two digits only
    assert sum(float(share[0]) for share in shares.values()) == pytest.approx(1.0, abs=1e-9)
    assert {"correlation.volts.amperes", "correlation.volts.phase"} <= set(shares)


# Realistic questions: first order against draws.

Inputs = dict[str, tuple[float, float]]  # value and standard uncertainty
SEA: Inputs = {"water_temperature": (15.0, 0.1), "salinity": (35.0, 0.05)}
OPEN_SEA: Inputs = SEA | {"wind_speed": (8.0, 0.5)}
STEADY: Inputs = SEA | {"wind_speed": (8.0, 0.25)}  # a time goes as one over the wind squared
AIR: Inputs = {"air_mole_fraction": (420.0, 0.3)}
EQUILIBRATOR: Inputs = {
    "water_mole_fraction": (450.0, 2.0),
    "equilibrator_temperature": (15.6, 0.05),
    "equilibrator_pressure": (1012.0, 0.5),
    "air_pressure": (1008.0, 0.5),
    "wind_height": (18.0, 1.0),
}
PAIR: Inputs = {"alkalinity": (2310.0, 3.0), "dissolved_inorganic_carbon": (2080.0, 3.0)}
LAKE: Inputs = {
    "water_temperature": (18.0, 0.2),
    "salinity": (0.0, 0.0),
    "air_pressure": (990.0, 1.0),
    "wind_speed": (3.0, 0.3),
    "water_concentration": (0.15, 0.01),
    "air_mole_fraction": (1.95, 0.02),
}
LAYER: Inputs = {"mixed_layer_depth": (50.0, 2.0)}
BUFFERED: Inputs = LAYER | {"alkalinity": (2310.0, 3.0), "water_fugacity": (380.0, 2.0)}
TIME = {"pick": ("equilibration_time",)}
Case = tuple[str, str, str, Inputs, dict[str, Any]]
CASES: list[Case] = [
    ("open sea", "flux", "co2", OPEN_SEA | {"water_fugacity": (360.0, 2.0), "air_fugacity": (415.0, 0.5)}, {}),
    ("equilibrator", "flux", "co2", OPEN_SEA | AIR | EQUILIBRATOR, {}),
    ("alkalinity and carbon", "flux", "co2", OPEN_SEA | AIR | PAIR, {}),
    ("oxygen", "flux", "o2", OPEN_SEA | {"water_saturation": (104.0, 0.6), "air_pressure": (1010.0, 0.5)}, {}),
    ("methane", "flux", "ch4", LAKE, {"water": "lake", "parameterisation": "cole-caraco-1998"}),
    (
        "upwelled",
        "flux",
        "n2o",
        OPEN_SEA | {"water_saturation": (180.0, 5.0), "air_mole_fraction": (0.336, 0.001)},
        {},
    ),
    ("dms", "flux", "dms", OPEN_SEA | {"water_concentration": (0.004, 0.0003), "air_mole_fraction": (1e-4, 1e-5)}, {}),
    ("argon", "solubility", "ar", SEA, {"pick": ("solubility",)}),
    ("oxygen layer", "equilibration", "o2", STEADY | LAYER, TIME),
    ("buffered layer", "equilibration", "co2", STEADY | BUFFERED, TIME),
]
# With a fifth of k uncertain, one over k is no straight line any more: the times are left to the draws.
WITH_METHODS = [(case, "1") for case in CASES if case[1] != "equilibration"]


def question_of(case: Case) -> Question:
    _, quantity, gas, inputs, more = case
    named = (more["parameterisation"],) if "parameterisation" in more else ()
    pick = more.get("pick", ("flux",))
    record = QUANTITIES[quantity]
    return ask(record, GASES[gas], more.get("water"), frozenset(inputs), (), named, pick, (), "gas")


def named(each: object) -> str:
    return str(each[0] if isinstance(each, tuple) else each)


@pytest.mark.parametrize(("case", "methods"), [*((case, "0") for case in CASES), *WITH_METHODS], ids=named)
def test_first_order_is_within_3_percent_of_200_000_draws(case: Case, methods: str) -> None:
    question = question_of(case)
    (steps,) = question.plans.values()
    known = run(steps, {name: np.array([value]) for name, (value, _) in case[3].items()})
    uncertain = {name: np.array([u]) for name, (_, u) in case[3].items() if u > 0.0 and name in steps.leaves}
    doubt = Doubt(uncertain, {}, methods, 5.0)  # percent, for methods that publish none
    keys = list(steps.keys.values())

    linear = first_order(steps, known, keys, doubt, question.gas, None)
    drawn = monte_carlo(steps, known, keys, doubt, question.gas, DRAWS, 7, None)

    for key in keys:
        assert linear.u[key][0] > 0.0
        assert drawn.u[key] == pytest.approx(linear.u[key], rel=0.03)
        assert sum(float(share[0]) for share in linear.budget[key].values()) == pytest.approx(1.0, abs=1e-12)
        assert all(float(share[0]) >= 0.0 for share in linear.budget[key].values())


def test_a_time_that_rests_on_a_fifth_of_k_is_told_to_differ_from_the_draws() -> None:
    inputs = {name: np.array([value]) for name, (value, _) in (STEADY | LAYER).items()}
    question = ask(QUANTITIES["equilibration"], GASES["o2"], None, frozenset(inputs), (), (), TIME["pick"], (), "gas")
    uncertain = {name: np.array([u]) for name, (_, u) in (STEADY | LAYER).items()}

    told = answer(question, inputs, 1, asked=Asked(Doubt(uncertain, {}, "1", 5.0), True, 20_000))

    assert told.outcome.verdict.reasons[0] == [
        "u of equilibration_time: first order and Monte Carlo differ by more than a tenth"
    ]


def test_a_flux_by_hand() -> None:
    # F = 0.24 k K0 (f_w - f_a): with k and both fugacities uncertain, the relative squares add
    values = {"water_temperature": 20.0, "salinity": 35.0, "given_transfer_velocity": 16.0}
    inputs = {name: np.array([value]) for name, value in values.items()}
    inputs |= {"water_fugacity": np.array([360.0]), "air_fugacity": np.array([400.0])}
    uncertain = {"given_transfer_velocity": 3.2, "water_fugacity": 2.0, "air_fugacity": 0.5}
    question = ask(QUANTITIES["flux"], GASES["co2"], None, frozenset(inputs), (), (), ("flux",), (), "gas")

    told = answer(question, inputs, 1, asked=Asked(Doubt({n: np.array([u]) for n, u in uncertain.items()}, {}, "0")))
    sure, flux = told.outcome.sure["flux"], told.outcome.results["flux"]

    by_hand = abs(flux[0]) * np.sqrt(0.2**2 + (2.0**2 + 0.5**2) / 40.0**2)
    assert sure.u[0] == pytest.approx(by_hand, rel=1e-6)  # central differences over 1e-4 of a scale
    assert sure.budget["given_transfer_velocity"][0] == pytest.approx(0.04 / (0.04 + 4.25 / 1600.0), rel=1e-6)


# Samples, zeros, gaps.


def asked_flux(uncertain: Mapping[str, Array], samples: int, monte: bool = False) -> Answer:
    """Return the flux of some samples scattered about what is usual."""
    rng = np.random.default_rng(11)
    inputs = {
        "water_temperature": rng.uniform(5.0, 25.0, 50),
        "salinity": np.array([35.0]),
        "wind_speed": rng.uniform(2.0, 15.0, 50),
        "water_fugacity": rng.uniform(300.0, 500.0, 50),
        "air_fugacity": rng.uniform(400.0, 420.0, 50),
    }
    inputs = {name: array[:samples] if array.size > 1 else array for name, array in inputs.items()}
    question = ask(QUANTITIES["flux"], GASES["co2"], None, frozenset(inputs), (), (), ("flux",), (), "gas")
    return answer(question, inputs, samples, asked=Asked(Doubt(uncertain, {}, "0"), monte, 2000, 3))


@pytest.mark.parametrize("monte", [False, True])
def test_samples_at_once_are_as_sure_as_each_alone_bit_for_bit(monte: bool) -> None:
    uncertain = {"wind_speed": np.array([0.4]), "water_fugacity": np.array([2.0]), "salinity": np.array([0.1])}

    together = asked_flux(uncertain, 50, monte).outcome
    fewer = asked_flux(uncertain, 7, monte).outcome
    alone = asked_flux(uncertain, 1, monte).outcome

    assert np.array_equal(fewer.sure["flux"].u, together.sure["flux"].u[:7])
    assert np.array_equal(alone.sure["flux"].u, together.sure["flux"].u[:1])
    for name, share in together.sure["flux"].budget.items():
        assert np.array_equal(share[:7], fewer.sure["flux"].budget[name])


def test_no_uncertainty_at_all_is_told_as_zero() -> None:
    sure = asked_flux({"wind_speed": np.array([0.0])}, 3).outcome.sure["flux"]

    assert sure.u.tolist() == [0.0, 0.0, 0.0]
    assert np.isnan(sure.budget["wind_speed"]).all()


@pytest.mark.parametrize(("u", "told"), [(-0.1, "negative"), (float("nan"), "missing")])
def test_an_uncertainty_that_is_none_empties_only_itself(u: float, told: str) -> None:
    outcome = asked_flux({"wind_speed": np.array([0.4, u, 0.4])}, 3).outcome

    assert np.isfinite(outcome.results["flux"]).all()
    assert np.isnan(outcome.sure["flux"].u).tolist() == [False, True, False]
    assert outcome.verdict.flags.tolist() == [1, 1, 1]
    assert outcome.verdict.reasons[1] == [f"u_wind_speed is {told}: no uncertainty is told"]


POSSIBLE = [{("a", "b"): 1.0}, {("a", "b"): 0.9, ("b", "c"): 0.9, ("a", "c"): 0.7}, {}]
IMPOSSIBLE = [
    {("a", "b"): 0.9, ("b", "c"): 0.9, ("a", "c"): -0.9},
    {("a", "b"): -1.0, ("b", "c"): -1.0, ("a", "c"): -1.0},
]


@pytest.mark.parametrize("correlations", POSSIBLE)
def test_correlations_that_can_hold_together_are_told_apart(correlations: dict[tuple[str, str], float]) -> None:
    assert possible_together(("a", "b", "c"), correlations)
    assert np.array_equal(correlation_matrix("abc", correlations), correlation_matrix("abc", correlations).T)


@pytest.mark.parametrize("correlations", IMPOSSIBLE)
def test_correlations_that_cannot_are_too(correlations: dict[tuple[str, str], float]) -> None:
    assert not possible_together(("a", "b", "c"), correlations)


# Over a series: what is shared does not dwindle.

PARTS = {"wind_speed": np.full(100, 0.01), "salinity": np.full(100, 0.02)}
UNCERTAIN = Doubt({"wind_speed": np.ones(1), "salinity": np.ones(1)})


def test_what_samples_do_not_share_dwindles_with_their_number() -> None:
    found = combined(PARTS, UNCERTAIN, ())

    assert found.u == pytest.approx(np.sqrt(100.0 * (0.01**2 + 0.02**2)), rel=1e-14)
    assert found.common == 0.0
    assert found.budget == pytest.approx({"wind_speed": 0.2, "salinity": 0.8})


def test_what_samples_share_adds_with_its_sign() -> None:
    mixed = {
        "wind_speed": np.tile([0.01, -0.01], 50),
        "salinity": np.full(100, 0.02),
        "transfer: x": np.full(100, 0.05),
    }

    found = combined(mixed, UNCERTAIN, {"wind_speed", "salinity"})

    assert found.budget == pytest.approx({"wind_speed": 0.0, "salinity": 4.0 / 29.0, "transfer: x": 25.0 / 29.0})
    assert (found.common, found.independent) == pytest.approx((np.sqrt(29.0), 0.0))
    assert found.u_inputs == pytest.approx(2.0)


@pytest.mark.parametrize("common", [(), ("wind_speed", "salinity")])
def test_a_correlation_within_samples_is_an_entry_of_its_own(common: tuple[str, ...]) -> None:
    doubt = Doubt(UNCERTAIN.inputs, {("salinity", "wind_speed"): -1.0})

    found = combined(PARTS, doubt, common)
    size = 1.0 if common else 0.1

    assert found.u == pytest.approx(size * 1.0, rel=1e-12)  # 2 less 1, as the errors take each other away
    assert sum(found.budget.values()) == pytest.approx(1.0, abs=1e-12)
    assert found.budget["correlation.salinity.wind_speed"] == pytest.approx(-4.0)


def test_a_method_that_publishes_nothing_leaves_only_the_inputs() -> None:
    found = combined(PARTS, UNCERTAIN, (), ("schmidt_number: someone-1999",))

    assert np.isnan(found.u)
    assert found.u_inputs > 0.0
    assert "schmidt_number: someone-1999" in str(found.reason)


def test_a_method_that_publishes_nothing_costs_only_the_results_that_rest_on_it() -> None:
    values = {"water_temperature": 15.0, "salinity": 35.0, "wind_speed": 7.0}
    inputs = {name: np.array([value]) for name, value in values.items()}
    pick = ("schmidt_number", "transfer_velocity", "wind_speed_10m")
    question = ask(QUANTITIES["transfer-velocity"], GASES["o2"], None, frozenset(inputs), (), (), pick, (), "gas")

    outcome = answer(question, inputs, 1, asked=Asked(Doubt({"wind_speed": np.array([0.5])}))).outcome

    assert {name: bool(np.isnan(sure.u[0])) for name, sure in outcome.sure.items()} == {
        "schmidt_number": True,
        "transfer_velocity": True,
        "wind_speed_10m": False,
    }
    assert outcome.unpublished == ("schmidt_number: wanninkhof-2014",)
