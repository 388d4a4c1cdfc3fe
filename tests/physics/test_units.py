"""Units: their sizes against outside sources, their spellings, and what is refused."""

import math
import re
import subprocess
import sys
import timeit
from collections.abc import Mapping
from dataclasses import dataclass, field

import numpy as np
import pytest
import scipy.constants as si
from hypothesis import given, settings
from hypothesis import strategies as st

from service.physics import units
from service.physics.units import DIMENSIONS, UnitError, allowed, canonical, conversion, dimension_of, listing


@dataclass(frozen=True)
class SomeGas:
    """Stands for a gas; unhashable through its mapping, as the real ones are."""

    name: str
    molar_mass: float
    element: str | None = None
    element_mass: float | None = None
    constants: Mapping[str, float] = field(default_factory=dict)
    formula: str = "X"


OXYGEN = SomeGas("o2", 31.998, constants={"molar_volume_stp": 22.3916}, formula="O2")
CARBON_DIOXIDE = SomeGas("co2", 44.009, "C", 12.011, formula="CO2")
NITROUS_OXIDE = SomeGas("n2o", 44.013, "N", 28.014, formula="N2O")
RADON = SomeGas("rn222", 222.0, constants={"decay_constant": 2.098e-6}, formula="Rn")

# Every unit that a term of the service may have as its own.
OWN = """degC|1|degree|hPa|uatm|m|m s-1|cm h-1|mm h-1|m2 s-2|umol mol-1|%|m2|km2|m3 s-1|d|s|h|K|kg m-3|mol
m2 s-1|mol kg-1 atm-1|mol L-1 atm-1|atm kg mol-1|umol kg-1|umol L-1|mmol m-2 d-1"""
TERM_UNITS = re.split("[|\n]", OWN)
EXACT = 4 * np.finfo(float).eps  # both sides are the same definition, each rounded a few times


def factor(unit: str, base: str, gas: SomeGas | None = None, mass_as: str = "gas") -> float:
    return conversion(unit, base, gas, mass_as).factor


@pytest.mark.parametrize("unit", TERM_UNITS)
def test_a_terms_own_unit_leaves_numbers_as_they_are(unit: str) -> None:
    values = np.array([0.1, np.nan, -3.0])
    own = conversion(unit, unit)

    assert (own.unit, own.factor, own.offset) == (unit, 1.0, 0.0)
    for convert in (own.to_base, own.from_base, own.scale, own.unscale):
        assert convert(values) is values


@pytest.mark.parametrize("name", DIMENSIONS)
def test_each_dimension_starts_with_its_base_and_has_only_sound_factors(name: str) -> None:
    factors, offsets = zip(*DIMENSIONS[name].values(), strict=True)

    assert (factors[0], offsets[0]) == (1.0, 0.0)
    assert all(0.0 < size < math.inf for size in factors)
    assert not any(offsets) or name == "temperature"


def test_every_product_has_one_spelling_in_the_table_and_is_read_in_it() -> None:
    spellings = [unit for table in DIMENSIONS.values() for unit in table]

    assert [canonical(unit) for unit in spellings] == spellings
    assert len({tuple(sorted(unit.split())) for unit in spellings}) == len(set(spellings))


# scipy.constants holds CODATA and NIST SP 811 by another hand.
OUTSIDE = {
    "m s-1": {"kn": si.knot, "mph": si.mph, "km h-1": si.kmh, "ft s-1": si.foot, "in h-1": si.inch / si.hour},
    "cm h-1": {"m d-1": 100 / 24, "m s-1": 100 * si.hour, "kn": 100 * si.knot * si.hour},
    "m2 s-2": {"kn2": si.knot**2},
    "hPa": {"atm": si.atm / 100, "Torr": si.torr / 100, "bar": si.bar / 100, "psi": si.psi / 100},
    "uatm": {"hPa": 1e8 / si.atm, "Pa": 1e6 / si.atm, "ubar": si.bar / si.atm},
    "m": {"ft": si.foot, "in": si.inch},
    "m2": {"ha": si.hectare},
    "d": {"h": 1 / 24, "s": 1 / si.day, "min": si.minute / si.day},
    "degree": {"rad": 1 / si.degree},
    "m3 s-1": {"ft3 s-1": si.foot**3, "L min-1": si.liter / si.minute},
    "degC": {"degF": si.degree_Fahrenheit},
    "mol kg-1 atm-1": {"mol kg-1 Pa-1": si.atm},
    "atm kg mol-1": {"Pa m3 mol-1": 1000 / si.atm},
}


@pytest.mark.parametrize("base", OUTSIDE)
def test_a_factor_is_that_of_an_independent_table(base: str) -> None:
    ours = {unit: factor(unit, base) for unit in OUTSIDE[base]}

    assert ours == pytest.approx(OUTSIDE[base], rel=EXACT)


def test_a_barometers_unit_is_that_of_the_printed_table() -> None:
    # NIST SP 811 (2008), appendix B.8, in Pa: seven digits are printed.
    assert 100 * factor("mmHg", "hPa") == pytest.approx(133.3224, abs=0.5e-4)
    assert 100 * factor("inHg", "hPa") == pytest.approx(3386.389, abs=0.5e-3)


DECIMAL = """mmol L-1 = 1e3 umol L-1; nmol kg-1 = 1e-3 umol kg-1; pmol mol-1 = 1e-6 umol mol-1; Pa = 0.01 hPa
    umol m-2 d-1 = 1e-3 mmol m-2 d-1; mbar = 1 hPa; dbar = 100 hPa; kPa = 10 hPa; % = 0.01 1; 1 = 100 %
    1 = 1e6 umol mol-1; % = 1e4 umol mol-1; g cm-3 = 1000 kg m-3; kg L-1 = 1000 kg m-3; cm2 s-1 = 1e-4 m2 s-1
    mm2 s-1 = 1e-6 m2 s-1; mol m-2 s-1 = 86400e3 mmol m-2 d-1; mmol m-3 = 1 umol L-1; m km-1 = 0.001 1
    mol m-3 Pa-1 = 101.325 mol L-1 atm-1; mol ha-1 d-1 = 0.1 mmol m-2 d-1"""


@pytest.mark.parametrize("equation", re.split(r"[;\n] *", DECIMAL))
def test_a_factor_that_has_an_exact_decimal_is_exactly_that(equation: str) -> None:
    unit, _, rest = equation.partition(" = ")
    expected, _, base = rest.partition(" ")

    assert factor(unit, base) == float(expected)


def test_temperatures_convert_at_the_fixed_points() -> None:
    kelvin = conversion("K", "degC").to_base(np.array([273.15, 373.15, 0.0]))
    fahrenheit = conversion("degF", "degC").to_base(np.array([32.0, 212.0, -40.0]))

    # One rounding of 273.15 is 6e-14; of 100 degC 1.4e-14.
    assert kelvin == pytest.approx([0.0, 100.0, -273.15], abs=6e-14)
    assert fahrenheit == pytest.approx([0.0, 100.0, -40.0], abs=3e-14)
    assert conversion("K", "degC").offset == -273.15


def test_an_uncertainty_in_fahrenheit_is_scaled_and_not_shifted() -> None:
    one, read = np.array([1.0]), conversion("degF", "degC")

    assert [read.scale(one)[0], read.unscale(one)[0]] == pytest.approx([5 / 9, 9 / 5], rel=EXACT)


def test_a_term_in_kelvin_is_a_difference_unless_it_says_that_it_is_a_temperature() -> None:
    difference = conversion("degF", "K")
    temperature = conversion("degC", "K", dimension="temperature")

    assert (difference.factor, difference.offset) == (5 / 9, 0.0)
    assert (temperature.factor, temperature.offset) == (1.0, 273.15)


def test_a_milligram_per_litre_of_oxygen_is_31_25_micromole_per_litre() -> None:
    read = conversion("mg/L", "umol L-1", OXYGEN)

    assert read.factor == pytest.approx(31.2520, abs=0.5e-4)  # 1000 / 31.998, by hand
    assert (read.basis, read.mass_of) == ("per_litre", "O2")


def test_a_millilitre_per_litre_of_oxygen_is_44_66_micromole_per_litre() -> None:
    read = conversion("ml/l", "umol L-1", OXYGEN)

    assert read.factor == pytest.approx(44.6596, abs=0.5e-4)  # 1000 / 22.3916, Garcia and Gordon (1992)
    assert read.mass_of is None


def test_a_gas_without_a_molar_volume_has_the_ideal_one() -> None:
    assert factor("mL L-1", "umol L-1", CARBON_DIOXIDE) == pytest.approx(1000 / 22.414, rel=EXACT)


def test_a_flux_may_be_counted_as_the_mass_of_an_element() -> None:
    carbon = conversion("g m-2 yr-1", "mmol m-2 d-1", CARBON_DIOXIDE, "element")
    whole = conversion("g m-2 yr-1", "mmol m-2 d-1", CARBON_DIOXIDE)

    assert 1 / carbon.factor == pytest.approx(12.011 * 365.2425 / 1000, rel=EXACT)
    assert 1 / whole.factor == pytest.approx(44.009 * 365.2425 / 1000, rel=EXACT)
    assert (carbon.mass_of, whole.mass_of) == ("C", "CO2")


def test_an_element_counts_all_its_atoms() -> None:
    assert factor("ug L-1", "umol L-1", NITROUS_OXIDE, "element") == pytest.approx(1 / 28.014, rel=EXACT)


def test_an_activity_of_radon_is_divided_by_decay_constant_and_avogadro_constant() -> None:
    read = conversion("Bq m-3", "umol L-1", RADON)

    assert read.factor == pytest.approx(1e6 / (2.098e-6 * si.N_A) / 1000, rel=EXACT)
    assert read.basis == "per_litre"
    assert factor("dpm L-1", "umol L-1", RADON) == pytest.approx(read.factor * 1000 / 60, rel=EXACT)


def test_years_months_areas_and_integrated_amounts_convert() -> None:
    assert factor("mol m-2 yr-1", "mmol m-2 d-1") == pytest.approx(1000 / 365.2425, rel=EXACT)
    assert factor("mol m-2 month-1", "mmol m-2 d-1") == pytest.approx(12000 / 365.2425, rel=EXACT)
    assert factor("kg km-2 d-1", "mmol m-2 d-1", OXYGEN) == pytest.approx(1 / 31.998, rel=EXACT)
    assert factor("kg", "mol", OXYGEN) == pytest.approx(1000 / 31.998, rel=EXACT)


BASES = """umol kg-1 > umol kg-1 = 1 per_kilogram; umol L-1 > umol kg-1 = 1 per_litre; m > m = 1 None
mmol/kg > umol L-1 = 1000 per_kilogram; mol m-3 > umol kg-1 = 1000 per_litre; uM > umol kg-1 = 1 per_litre
mol L-1 atm-1 > mol kg-1 atm-1 = 1 per_litre; mmol kg-1 atm-1 > mol L-1 atm-1 = 0.001 per_kilogram
atm L mol-1 > atm kg mol-1 = 1 per_litre; mmol m-2 d-1 > mmol m-2 d-1 = 1 None"""


@pytest.mark.parametrize("row", re.split("; |\n", BASES))
def test_the_basis_of_an_amount_is_told_and_left_to_the_density(row: str) -> None:
    unit, base, expected, basis = re.split(" > | = | (?=per_|None)", row)
    read = conversion(unit, base)

    assert (read.factor, str(read.basis)) == (float(expected), basis)


def test_two_gases_of_one_name_do_not_share_a_conversion() -> None:
    assert factor("mg L-1", "umol L-1", OXYGEN) != factor("mg L-1", "umol L-1", SomeGas("o2", 63.996))


def test_alkalinity_may_be_stated_in_equivalents_and_in_no_mass() -> None:
    read = conversion("meq/L", "umol kg-1", dimension="alkalinity_per_kilogram")

    assert (read.unit, read.factor, read.basis) == ("meq L-1", 1000.0, "per_litre")
    with pytest.raises(UnitError):
        conversion("mg L-1", "umol kg-1", CARBON_DIOXIDE, dimension="alkalinity_per_kilogram")


SPELLINGS = """mmol m-2 d-1 = mmol/m2/d|mmol/(m2 d)|mmol/(m² day)|mmol m^-2 d^-1|mmol m**-2 d**-1|mmol m⁻² d⁻¹
mmol m-2 d-1 = mmol·m-2·d-1|mmol*m-2*d-1|mmol.m-2.d-1|  mmol  m-2 d-1 |mmol d-1 m-2|mmol per m2 per day
mmol m-2 d-1 = mmol/m^2/day|mmol m−2 d−1|mmol m^{-2} d^{-1}|mmol\u00a0m-2\u00a0d-1|millimoles/m2/day
mol kg-1 atm-1 = mol/kg/atm|mol/(kg·atm)|mol/(kg atm)|mol kg^-1 atm^-1; atm kg mol-1 = atm kg/mol|atm/(mol/kg)
mol L-1 atm-1 = M/atm|mol/L/atm|mol l-1 atm-1; uatm = \u00b5atm|\u03bcatm|µAtm|microatmospheres
umol mol-1 = ppm|PPM|ppmv|µmol/mol|1e-6; nmol mol-1 = ppb|1e-9; pmol mol-1 = ppt|pptv; mph = MPH|mi/h
kn = knots|knot|kt|kts|KNOTS|Kt; m s-1 = m/s|m.s-1|m s^-1|m/sec|metres per second|meter/second
km h-1 = km/h|kph|kmh|km/hr; cm h-1 = cm/h|cm/hr|cm hr-1|cm hour-1; degF = °F|F|Fahrenheit|deg F
degC = °C|º C|℃|deg C|C|celsius|Celsius|degrees_Celsius|degree_C|degrees C; K = kelvin|Kelvin|\u212a
hPa = hectopascal|hpa; mbar = millibar|millibars|mb; mmHg = mm Hg|mmhg; inHg = in Hg|inhg; Torr = torr|TORR
psu = PSU|PSS-78|pss-78|PSS‐78; 1 = |  ; % = percent|pct|％; degree = deg|degrees|°|degrees_north|Degree
d = day|days; h = hr|hour|hours; s = sec|second; yr = year|a|years; month = months; min = minutes
umol L-1 = uM|\u00b5M|\u03bcM|umol/l|µmol/litre|micromol/L; mmol L-1 = mM; nmol L-1 = nM; mol L-1 = M
mL L-1 = ml/l|mL/L|ml l^-1|millilitres per litre; m = metre|metres|meter|meters; ft = feet|foot
m3 s-1 = m3/s|m³/s|m^3 s^-1; m2 = m^2|m**2|m²; kn2 = kn^2|kt2|knots²; ueq kg-1 = µeq/kg|uEq/kg"""


@pytest.mark.parametrize("row", re.split("; |\n", SPELLINGS))
def test_the_usual_spellings_are_read(row: str) -> None:
    unit, _, texts = row.partition(" = ")

    assert {text: canonical(text) for text in texts.split("|")} == dict.fromkeys(texts.split("|"), unit)


NOT_READ = """furlong|m m|m s|mmol/m2 d|mmol s-2|M/S|Mmol m-2 d-1|MM|ms-1|kmh-1|µ|m^|(m|m)|m//s|/s|m/|m s-1)
()|per|m2^2|m s--1|m s-1 m|1 m|2 m|m s-999|g-C m-2 d-1|%%|degC m|psu psu|‰|\x00|\ud800"""
TOO_LONG = ["ﷺ" * 50, "d" * 61, " " * 61]


@pytest.mark.parametrize("text", re.split("[|\n]", NOT_READ) + TOO_LONG)
def test_what_is_not_in_the_table_is_not_read(text: str) -> None:
    assert canonical(text) is None
    assert dimension_of(text) is None


@settings(derandomize=True, max_examples=500)
@given(st.text(alphabet="mMsdhLkgolatPun2-1/^*.() °µ%CK", max_size=70) | st.text(max_size=70))
def test_any_text_is_read_as_a_unit_of_the_table_or_refused(text: str) -> None:
    assert canonical(text) in {None}.union(*DIMENSIONS.values())


REFUSED = [
    ("furlong", "m s-1", None, "is not a unit of speed; allowed: m s-1, kn, "),
    ("kn", "degC", None, "is not a unit of temperature; allowed: degC, K, degF"),
    ("ppt", "1", None, "is not a unit for a plain number; allowed: 1, %, "),
    ("", "umol mol-1", None, "is not a unit of mole fraction; allowed: umol mol-1, "),
    ("", "%", None, "is not a unit for a plain number; allowed: %, 1, "),
    ("psu", "1", None, "is not a unit for a plain number"),
    ("ppm", "umol kg-1", OXYGEN, "is not a unit of concentration; allowed: umol kg-1, umol L-1, mg kg-1, "),
    ("mg/L", "umol kg-1", None, "states a mass, which is an amount only of a known gas; allowed: umol kg-1"),
    ("ml/L", "umol kg-1", None, "states a gas volume, which is an amount only of a known gas"),
    ("Bq/L", "umol kg-1", OXYGEN, "states an activity, and O2 has no radioactivity"),
    ("mol m-2 d-1", "mol", None, "is not a unit of amount; allowed: mol, mmol, umol, nmol, pmol"),
]


@pytest.mark.parametrize(("unit", "base", "gas", "message"), REFUSED)
def test_a_refusal_says_what_is_allowed(unit: str, base: str, gas: SomeGas | None, message: str) -> None:
    with pytest.raises(UnitError) as caught:
        conversion(unit, base, gas)

    assert str(caught.value).startswith(f"{unit!r} {message}")
    assert (caught.value.unit, caught.value.base) == (unit, base)
    assert caught.value.allowed[0] == base


@pytest.mark.parametrize("text", ["%", "ppt", "1e-3", "g kg-1", "m m-1"])
def test_salinity_takes_no_unit_but_its_own(text: str) -> None:
    own = [conversion(each, "1", dimension="salinity") for each in ("", "1", "psu", "PSU", "PSS-78")]

    assert {(each.factor, each.offset) for each in own} == {(1.0, 0.0)}
    with pytest.raises(UnitError, match=r"is not a unit of salinity; allowed: 1, psu$"):
        conversion(text, "1", dimension="salinity")


def test_a_gas_without_a_counted_element_refuses_element_masses_alone() -> None:
    with pytest.raises(UnitError, match="O2 has no element to count") as caught:
        conversion("g m-2 d-1", "mmol m-2 d-1", OXYGEN, "element")

    assert not any(unit.startswith(("g ", "mg ")) for unit in caught.value.allowed)
    assert factor("mol m-2 d-1", "mmol m-2 d-1", OXYGEN, "element") == 1000.0


def test_a_refusal_repeats_at_most_sixty_characters_and_names_at_most_twelve_units() -> None:
    with pytest.raises(UnitError) as caught:
        conversion("\r\n" * 10_000, "mmol m-2 d-1", OXYGEN)

    assert caught.value.unit == "\r\n" * 30
    assert re.fullmatch(r"'(\\r\\n){30}' is not a unit of flux; allowed: ([\w -]+, ){12}\.\.\.", str(caught.value))


MISTAKES = [("furlong", None, "gas"), ("1", "speed", "gas"), ("m", "width", "gas"), ("m", None, "elements")]


@pytest.mark.parametrize(("base", "dimension", "mass_as"), MISTAKES)
def test_a_mistake_in_a_declaration_is_no_unit_error(base: str, dimension: str | None, mass_as: str) -> None:
    with pytest.raises(KeyError):
        conversion("m", base, OXYGEN, mass_as, dimension=dimension)


EVERYTHING = SomeGas("any", 40.0, "C", 12.011, {"decay_constant": 2.098e-6})
ROUND_TRIPS = [(unit, base) for base in TERM_UNITS for unit in allowed(base)]


@pytest.mark.parametrize("base", TERM_UNITS)
def test_every_unit_that_is_allowed_can_be_converted(base: str) -> None:
    read = [conversion(unit, base, EVERYTHING) for unit in allowed(base)]

    assert tuple(each.unit for each in read) == allowed(base)
    assert all(0.0 < each.factor < math.inf for each in read)


@settings(derandomize=True, max_examples=300)
@given(st.sampled_from(ROUND_TRIPS), st.floats(-1e6, 1e6, allow_subnormal=False))
def test_a_number_survives_the_way_there_and_back(pair: tuple[str, str], value: float) -> None:
    read = conversion(*pair, EVERYTHING)
    values = np.array([value])
    near_zero = 1e-12 if read.offset else 0.0  # there a zero point makes it the difference of two near 273

    assert read.from_base(read.to_base(values)) == pytest.approx(values, rel=1e-12, abs=near_zero)
    assert read.unscale(read.scale(values)) == pytest.approx(values, rel=1e-12, abs=0.0)


@settings(derandomize=True, max_examples=300)
@given(st.sampled_from([name for name in DIMENSIONS if name != "temperature"]), st.data())
def test_going_by_the_base_gives_the_same_factor(name: str, data: st.DataObject) -> None:
    one, other = (data.draw(st.sampled_from(sorted(DIMENSIONS[name]))) for _ in range(2))
    by_base = DIMENSIONS[name][one][0] / DIMENSIONS[name][other][0]

    assert conversion(one, other, dimension=name).factor == pytest.approx(by_base, rel=EXACT)


DIMENSION_OF = """temperature = degC; temperature = degF; temperature_difference = K; pressure = uatm
pressure = psi; speed = mm h-1; speed = knots; dimensionless = 1; dimensionless = %; salinity = psu
concentration_per_kilogram = umol kg-1; concentration_per_litre = µM; amount = mol; mole_fraction = ppm
concentration_per_litre_as_mass = mg L-1; density = kg m-3; area = km2; flux = mmol/m2/d"""


def test_a_unit_belongs_to_one_dimension() -> None:
    expected = {unit: name for name, unit in (row.split(" = ") for row in re.split("; |\n", DIMENSION_OF))}

    assert {unit: dimension_of(unit) for unit in expected} == expected


def test_an_amount_may_be_stated_in_every_way() -> None:
    ways = set(allowed("umol kg-1"))

    assert {"umol L-1", "mg kg-1", "mg L-1", "mL L-1", "Bq m-3", "nmol kg-1"} <= ways
    assert allowed("1", dimension="salinity") == ("1", "psu")


def test_the_listing_holds_the_whole_table_and_only_spellings_that_are_read() -> None:
    table = {of["name"]: {u["unit"]: (u["factor"], u["offset"]) for u in of["units"]} for of in listing()}
    also = [(other, u["unit"]) for each in listing() for u in each["units"] for other in u["also"]]

    assert table == {name: dict(each) for name, each in DIMENSIONS.items()}
    assert [pair for pair in also if canonical(pair[0]) != pair[1]] == []
    assert {("knots", "kn"), ("mmol/m2/d", "mmol m-2 d-1"), ("µatm", "uatm")} <= set(also)


def test_a_conversion_that_was_made_before_costs_microseconds() -> None:
    seconds = timeit.repeat(lambda: conversion("mg/L", "umol kg-1", OXYGEN), number=1000, repeat=5)

    assert min(seconds) / 1000 < 10e-6  # ten times what was measured: only a change of kind fails


def test_spellings_without_end_do_not_fill_the_memory() -> None:
    for i in range(6000):
        canonical(f"furlong{i}")
        conversion(" ".join(["kn", *("" for _ in range(i % 50))]), "m s-1", SomeGas("any", 1.0 + i))
    caches = [units._read.cache_info(), units._conversion.cache_info()]

    assert all(cache.maxsize and cache.currsize <= cache.maxsize for cache in caches)


def test_importing_the_units_brings_in_nothing_but_the_standard_library_beside_numpy() -> None:
    report = "{m.split('.')[0] for m in set(sys.modules) - before} - set(sys.stdlib_module_names)"
    code = f"import sys, numpy.typing; before = set(sys.modules); import service.physics.units; print(*{report})"
    done = subprocess.run([sys.executable, "-c", code], capture_output=True, text=True, check=True)

    assert done.stdout.split() == ["service"]
