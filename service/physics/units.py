"""The units that numbers may be sent or asked for in: a closed table, read at the boundary only."""

import itertools
import math
import re
import unicodedata
from collections.abc import Iterable, Mapping
from dataclasses import dataclass
from functools import cache, lru_cache
from types import MappingProxyType
from typing import Any, NamedTuple, Protocol

import numpy as np
from numpy.typing import NDArray

Array = NDArray[np.float64]
Size = tuple[int, int]  # numerator and denominator: sizes are exact, so that a factor is rounded only once
Sizes = dict[str, Size]

AVOGADRO_CONSTANT = 6.02214076e23  # mol-1; exact, SI Brochure, 9th edition (2019), section 2.2
IDEAL_MOLAR_VOLUME = 22.414  # L mol-1 at 0 degC and 101325 Pa, for a gas that brings none of its own
LONGEST_UNIT = 60  # characters; longer text is no unit, and no more of it is repeated to its sender
SHOWN = 12  # how many of the allowed units an error message names


class _Gas(Protocol):
    @property
    def name(self) -> str: ...
    @property
    def molar_mass(self) -> float: ...  # g mol-1
    @property
    def element(self) -> str | None: ...
    @property
    def element_mass(self) -> float | None: ...  # g of the element in one mole of the gas
    @property
    def constants(self) -> Mapping[str, float]: ...  # molar_volume_stp [L mol-1], decay_constant [s-1]


class UnitError(ValueError):
    """A unit that is unknown or cannot stand for the term; the message says which units can."""

    def __init__(self, unit: str, base: str, allowed: tuple[str, ...], reason: str = "is refused") -> None:
        shown = ", ".join(allowed[:SHOWN]) + (", ..." if len(allowed) > SHOWN else "")
        self.unit = unit[:LONGEST_UNIT]
        self.base, self.allowed = base, allowed
        super().__init__(f"{self.unit!r} {reason}; allowed: {shown}")


@dataclass(frozen=True, slots=True)
class Conversion:
    """How numbers in one unit become numbers in a term's own unit.

    `basis` is ``per_kilogram``, ``per_litre`` or None. Where it is not that of the term, `factor` leads to
    the term's unit with kg and L exchanged, and the density is still to be applied. `mass_of` is the formula
    of the gas or the symbol of the element whose mass it is; None for all but masses.
    """

    unit: str
    factor: float
    offset: float
    basis: str | None
    mass_of: str | None

    def to_base(self, values: Array) -> Array:
        """Return values in the term's unit; the same array where nothing changes."""
        return self.scale(values) if self.offset == 0.0 else values * self.factor + self.offset

    def from_base(self, values: Array) -> Array:
        """Return values in this unit; the same array where nothing changes."""
        return self.unscale(values if self.offset == 0.0 else values - self.offset)

    def scale(self, values: Array) -> Array:
        """Return differences or uncertainties in the term's unit: the zero point plays no part."""
        return values if self.factor == 1.0 else values * self.factor

    def unscale(self, values: Array) -> Array:
        """Return differences or uncertainties in this unit."""
        return values if self.factor == 1.0 else values / self.factor


def _product(*sizes: Size) -> Size:
    return math.prod(size[0] for size in sizes), math.prod(size[1] for size in sizes)


def _rows(text: str) -> list[list[str]]:
    return [row.split() for row in re.split(r"[;\n]", text)]


# Sizes in SI units, numerator and denominator. Those not powers of ten are exact by definition: Thompson and
# Taylor (2008), NIST Special Publication 811, appendix B. The year is the mean Gregorian one of 365.2425 d.
_BASIC = """m 1 1; in 254 10000; ft 3048 10000; ha 10000 1; L 1 1000; kn 1852 3600; mph 1609344 3600000; 1 1 1
    s 1 1; min 60 1; h 3600 1; d 86400 1; yr 31556952 1; month 31556952 12; degree 1 1; K 1 1; degC 1 1
    degF 5 9; % 1 100; psu 1 1; Pa 1 1; bar 100000 1; atm 101325 1; Torr 101325 760; mol 1 1; eq 1 1; g 1 1000
    Bq 1 1; dpm 1 60"""
_SIZE = {unit: (int(above), int(below)) for unit, above, below in _rows(_BASIC)}
_GRAVITY, _POUND = (980665, 10**5), (45359237, 10**8)  # m s-2, kg
_MERCURY = _product((135951, 10), _GRAVITY)  # Pa m-1, at the conventional density of 13595.1 kg m-3
_SIZE |= {"mmHg": _product(_MERCURY, (1, 1000)), "inHg": _product(_MERCURY, _SIZE["in"])}
_SIZE["psi"] = _product(_POUND, _GRAVITY, _SIZE["in"][::-1], _SIZE["in"][::-1])
_SIZE["rad"] = (180 / math.pi).as_integer_ratio()
_ZERO = {"K": -273.15, "degF": -160 / 9}  # the unit's zero, in degC
_PREFIXES = {"k": 3, "h": 2, "": 0, "d": -1, "c": -2, "m": -3, "u": -6, "n": -9, "p": -12}


@cache
def _size(part: str) -> Size:
    """Return the size of a factor such as ``kPa`` or ``m-2``."""
    if part in _SIZE:
        return _SIZE[part]
    name = part.rstrip("-123")
    if name != part:
        power = int(part.removeprefix(name))
        return _product(*[_size(name) if power > 0 else _size(name)[::-1]] * abs(power))
    ten = _PREFIXES[part[0]]
    return _product(_SIZE[part[1:]], (10 ** max(ten, 0), 10 ** max(-ten, 0)))


_TABLE: dict[str, Sizes] = {}


def _dimension(name: str, base: str, *alternatives: tuple[str, ...]) -> None:
    """Add a dimension: its base, and all products of one word from each string of an alternative."""
    choices = (itertools.product(*(words.split() for words in each[::-1])) for each in alternatives)
    units = {" ".join(parts[::-1]): _product(*map(_size, parts)) for parts in itertools.chain(*choices)}
    _TABLE[name] = {base: units[base]} | units


_LENGTH, _AREA, _CLOCK = "m cm mm km ft in", "m-2 km-2 cm-2 ha-1", "d-1 h-1 min-1 s-1"
_MOLES, _PER_MOLE = "mol mmol umol nmol pmol", "mol-1 mmol-1 umol-1 nmol-1 pmol-1"
_GAS_PRESSURE, _PER_GAS_PRESSURE = "atm uatm Pa hPa kPa bar", "atm-1 uatm-1 Pa-1 hPa-1 kPa-1 bar-1"
_WATER = {"per_kilogram": ("kg", "kg-1"), "per_litre": ("L m3", "L-1 m-3")}
# The ways of saying how much of a gas: the unit in which one mole of it is stated, and all units.
_OWN_UNIT = {"amount": "mol", "mass": "g", "gas_volume": "L", "activity": "Bq"}
_KINDS = {"amount": _MOLES, "mass": "mg g kg ug ng", "gas_volume": "mL L uL nL", "activity": "Bq kBq mBq dpm"}

_dimension("temperature", "degC", ("degC K degF",))
_dimension("temperature_difference", "K", ("K degC degF",))
_dimension("pressure", "hPa", ("hPa Pa kPa mbar bar dbar ubar atm uatm matm natm mmHg inHg Torr psi",))
_dimension("speed", "m s-1", ("kn mph",), ("km", "h-1"), ("cm", "h-1"), (_LENGTH, _CLOCK))
_dimension("speed_variance", "m2 s-2", ("kn2 mph2",), ("m2 cm2 km2 ft2", "s-2 h-2"))
_dimension("length", "m", (_LENGTH,))
_dimension("area", "m2", ("m2 km2 cm2 ha",))
_dimension("time", "d", ("d h min s month yr",))
_dimension("rate", "d-1", (f"{_CLOCK} month-1 yr-1",))
_dimension("angle", "degree", ("degree rad",))
_dimension("dimensionless", "1", ("1 %",), ("m", "m-1 km-1"), ("m3", "m-3"), ("L", "L-1"), ("mL", "mL-1"))
_dimension("salinity", "1", ("1 psu",))  # no percent: practical salinity is a scale without hundredths
_dimension("mole_fraction", "umol mol-1", (_MOLES, "mol-1"), ("% 1",))
_dimension("volumetric_flow", "m3 s-1", ("m3 L ft3", _CLOCK))
_dimension("diffusivity", "m2 s-1", ("m2 cm2 mm2", _CLOCK))
_dimension("ion_product", "mol2 kg-2", ("mol2", "kg-2"))
_dimension("density", "kg m-3", ("kg g", "m-3 L-1"), ("g", "cm-3 mL-1"))
for _kind, _words in _KINDS.items():
    _suffix, _first = ("", "") if _kind == "amount" else (f"_as_{_kind}", _words.split()[0])
    for _basis, (_in, _per) in _WATER.items():
        _unit = _in.split()[0]
        _dimension(f"concentration_{_basis}{_suffix}", f"{_first or 'umol'} {_unit}-1", (_words, _per))
    _dimension(f"flux{_suffix}", f"{_first or 'mmol'} m-2 d-1", (_words, _AREA, f"{_CLOCK} month-1 yr-1"))
    _dimension(f"amount_per_area{_suffix}", f"{_first or 'mol'} m-2", (_words, _AREA))
    _dimension(f"amount{_suffix}", _first or "mol", (_words,))
for _basis, (_in, _per) in _WATER.items():
    _unit = _in.split()[0]
    _dimension(f"solubility_{_basis}", f"mol {_unit}-1 atm-1", (_MOLES, _per, _PER_GAS_PRESSURE))
    _dimension(f"henry_constant_{_basis}", f"atm {_unit} mol-1", (_GAS_PRESSURE, _in, _PER_MOLE))
    _dimension(f"alkalinity_{_basis}", f"umol {_unit}-1", (f"ueq meq eq {_MOLES}", _per))


def _factors(name: str, sizes: Sizes) -> Mapping[str, tuple[float, float]]:
    (above, below), zeros = next(iter(sizes.values())), _ZERO if name == "temperature" else {}
    factors = {unit: (m * below / (n * above), zeros.get(unit, 0.0)) for unit, (m, n) in sizes.items()}
    return MappingProxyType(factors)


DIMENSIONS: Mapping[str, Mapping[str, tuple[float, float]]] = MappingProxyType(
    {name: _factors(name, sizes) for name, sizes in _TABLE.items()}
)

# A unit that stands in several dimensions belongs to the first of which it is the base, else to the first.
_HOME = {unit: name for name, units in reversed(_TABLE.items()) for unit in units}
_HOME |= {next(iter(units)): name for name, units in reversed(_TABLE.items())}
_BY_PARTS = {" ".join(sorted(unit.split())): unit for unit in _HOME}

_SYMBOLS = """degC C; degF F; L l; mL ml cc; uL ul; nL nl; yr a; mbar mb mBar; dbar dBar; hPa hpa HPa HPA
    mol/L M; mmol/L mM; umol/L uM; nmol/L nM; pmol/L pM; kPa kpa; mm2/s cSt; meq mEq; ueq uEq; uatm uAtm
    umol/mol 1e-6; nmol/mol 1e-9; pmol/mol 1e-12"""  # case matters
_WORDS = """kn knot knots kt kts; km/h kph kmh; mph mph mi/h; ft3/s cfs; % percent pct; K kelvin degk
    psu psu pss pss-78; rad radian radians; ha hectare hectares; Torr torr; mmHg mmhg mm_hg; inHg inhg in_hg
    umol/mol ppm ppmv; nmol/mol ppb ppbv; pmol/mol ppt pptv; s-1 1/s; month-1 1/month; yr-1 1/yr
    degree degree deg degrees degree_north degrees_north degree_east degrees_east
    degC celsius degc deg_c degree_c degrees_c degree_celsius degrees_celsius deg_celsius
    degF fahrenheit degf deg_f degree_f degrees_f degree_fahrenheit degrees_fahrenheit deg_fahrenheit
    s sec secs second seconds; min mins minute minutes; h hr hrs hour hours; d day days; month month months
    yr year years yrs; ft foot feet; in inch inches; d-1 1/d 1/day per_day; h-1 1/h; min-1 1/min"""  # in any case
_NAMES = "mol mol; mol mole; g gram; L litre; L liter; m metre; m meter; Pa pascal; bar bar; atm atmosphere"
_PREFIX_NAMES = ("kilo", "hecto", "", "deci", "centi", "milli", "micro", "nano", "pico")
_READ_EXACTLY = {"": "1"} | {spelling: unit for unit, *spellings in _rows(_SYMBOLS) for spelling in spellings}
_READ_AS_WORD = {spelling.lower(): unit for unit, *spellings in _rows(_WORDS) for spelling in spellings}
for _letter, _prefix in zip(_PREFIXES, _PREFIX_NAMES, strict=True):
    for _symbol, _name in _rows(_NAMES):
        _READ_AS_WORD |= dict.fromkeys((_prefix + _name, f"{_prefix}{_name}s"), _letter + _symbol)

# Compatibility normalisation has turned superscripts into digits, and the micro sign into the Greek letter.
_CHARACTERS = str.maketrans("μ−–‐·⋅∙×", "u---****", "{}")
_TOKEN = re.compile(r" *(?:([A-Za-z_]+)(?:(?:\^|\*\*)?([+-]?[0-9]{1,2}))?|([()/]|[.*](?!\*)))")


def _named(word: str) -> str:
    return _READ_EXACTLY.get(word) or _READ_AS_WORD.get(word.lower(), word)


def _parts(text: str) -> list[str] | None:
    """Return the factors of a product, such as ``m-2``; None where the text is no product of units."""
    parts: list[str] = []
    signs, sign, complete, end = [1], 1, False, 0
    while end < len(text):
        match = _TOKEN.match(text, end)
        if match is None:
            return None
        end = match.end()
        word, power, mark = match.groups()
        mark = "/" if word == "per" else mark
        if mark == "(":
            signs.append(signs[-1] * sign)
            sign, complete = 1, False
        elif mark and not complete:
            return None
        elif mark == ")":
            signs.pop()
            if not signs:
                return None
        elif mark:
            sign, complete = (-1 if mark == "/" else 1), False
        else:
            exponent = signs[-1] * sign * int(power or 1)
            for part, exponent_of_part in zip(_named(word).split("/"), (exponent, -exponent), strict=False):
                parts.append(part if exponent_of_part == 1 else f"{part}{exponent_of_part}")
            sign, complete = 1, True
    return parts if complete and len(signs) == 1 else None


def canonical(text: str) -> str | None:
    """Return the table's spelling of a unit that is spelt in any of the usual ways, or None.

    Examples
    --------
    >>> canonical("mmol/(m² day)")
    'mmol m-2 d-1'
    """
    return text if text in _HOME else _read(text) if len(text) <= LONGEST_UNIT else None


@lru_cache(maxsize=1024)
def _read(text: str) -> str | None:
    plain = unicodedata.normalize("NFKC", text.replace("º", "°")).translate(_CHARACTERS)
    plain = " ".join(plain.replace("°", "deg").split())
    joined = plain.replace(" ", "_")  # deg C, mm Hg
    plain = plain if _named(joined) == joined else _named(joined)
    if plain in _HOME:
        return plain
    parts = _parts(plain)
    return None if parts is None else _BY_PARTS.get(" ".join(sorted(parts)))


def dimension_of(unit: str) -> str | None:
    """Return the dimension of a unit: the first of which it is the base, else the first that has it."""
    return _HOME.get(canonical(unit) or "")


class _Reading(NamedTuple):
    """A dimension whose units may stand for a term, and the size of the unit that they are turned into."""

    dimension: str
    kind: str
    basis: str | None
    size: Size


@cache
def _readings(base: str, dimension: str | None) -> list[_Reading]:
    home = dimension or _HOME[base]
    targets: list[tuple[str, str, str | None]] = [(home, base, None)]
    if home.endswith(tuple(_WATER)):
        mine, other = _WATER if home.endswith("per_kilogram") else reversed(_WATER)
        swapped = base.replace("kg", "L") if other == "per_litre" else base.replace("L", "kg")
        targets = [(home, base, mine), (home.removesuffix(mine) + other, swapped, other)]
    targets = [target for target in targets if target[1] in _TABLE[target[0]] or target[0] == home]
    readings = []
    for kind, (name, target, basis) in itertools.product(_KINDS, targets):
        full_name = name if kind == "amount" else f"{name}_as_{kind}"
        if full_name in _TABLE:
            readings.append(_Reading(full_name, kind, basis, _TABLE[name][target]))
    return readings


def allowed(base: str, dimension: str | None = None, kinds: Iterable[str] = tuple(_KINDS)) -> tuple[str, ...]:
    """Return the units that may stand for a term with the unit `base`, that one first, of these kinds."""
    columns = [_TABLE[reading.dimension] for reading in _readings(base, dimension) if reading.kind in kinds]
    units = itertools.chain.from_iterable(itertools.zip_longest(*columns))
    return tuple(dict.fromkeys([base, *filter(None, units)]))


class _Mole(NamedTuple):
    """One mole of a gas in other measures; None where the gas has no such measure, or there is no gas."""

    label: str = ""
    mass_of: str | None = None
    mass: float | None = None  # g
    gas_volume: float | None = None  # L
    activity: float | None = None  # Bq
    amount: float = 1.0


_NO_GAS = _Mole()


def conversion(
    unit: str, base: str, gas: _Gas | None = None, mass_as: str = "gas", *, dimension: str | None = None
) -> Conversion:
    """Return how numbers in `unit`, as the caller spelt it, become numbers in a term's own unit.

    Parameters
    ----------
    unit : str
        A unit in any spelling. An empty one means 1, and only where the term's own unit is 1.
    base : str
        The term's own unit, as the table spells it.
    gas : object, optional
        The gas whose amount it is; without one, masses, gas volumes and activities are refused.
    mass_as : {"gas", "element"}
        What a mass is the mass of.
    dimension : str, optional
        A name in `DIMENSIONS`, where `base` alone does not say: ``salinity``, ``alkalinity_per_kilogram``.

    Raises
    ------
    UnitError
        If the unit is unknown or cannot stand for the term.
    KeyError
        If `base`, `dimension` or `mass_as` does not exist: a mistake in the program, not in a request.
    """
    if gas is None:
        return _conversion(unit, base, _NO_GAS, dimension)
    label = getattr(gas, "formula", gas.name)
    mass_of, mass = {"gas": (label, gas.molar_mass), "element": (gas.element, gas.element_mass)}[mass_as]
    decay = gas.constants.get("decay_constant")
    activity = None if decay is None else decay * AVOGADRO_CONSTANT
    volume = gas.constants.get("molar_volume_stp", IDEAL_MOLAR_VOLUME)
    return _conversion(unit, base, _Mole(label, mass_of, mass, volume, activity), dimension)


@lru_cache(maxsize=4096)
def _conversion(unit: str, base: str, mole: _Mole, dimension: str | None) -> Conversion:
    readings = _readings(base, dimension)
    spelling = canonical(unit) if unit.strip() or base == "1" else None
    reading = next((each for each in readings if spelling in _TABLE[each.dimension]), None)
    measure = getattr(mole, reading.kind) if reading else None
    if spelling is None or reading is None or measure is None:
        usable = [kind for kind in _KINDS if getattr(mole, kind) is not None]
        reason = _reason(reading, readings[0].dimension, mole)
        raise UnitError(unit, base, allowed(base, dimension, usable), reason)
    per_mole = _product(float(measure).as_integer_ratio(), _SIZE[_OWN_UNIT[reading.kind]])
    above, below = _product(_TABLE[reading.dimension][spelling], per_mole[::-1], reading.size[::-1])
    zeros = _ZERO if reading.dimension == "temperature" else {}
    offset = (zeros.get(spelling, 0.0) - zeros.get(base, 0.0)) * reading.size[1] / reading.size[0]
    mass_of = mole.mass_of if reading.kind == "mass" else None
    return Conversion(spelling, above / below, offset, reading.basis, mass_of)


def _reason(reading: _Reading | None, home: str, mole: _Mole) -> str:
    if reading is None:
        family = re.sub("_per_(kilogram|litre)", "", home).replace("_", " ")
        return f"is not a unit of {family}".replace("of dimensionless", "for a plain number")
    what = f"states {'an' if reading.kind == 'activity' else 'a'} {reading.kind.replace('_', ' ')}"
    if not mole.label:
        return f"{what}, which is an amount only of a known gas"
    lacks = {"mass": "element to count (mass_as=element)", "activity": "radioactivity"}
    return f"{what}, and {mole.label} has no {lacks[reading.kind]}"


def listing() -> list[dict[str, Any]]:
    """Return the table, dimension by dimension, with other spellings that are read for each unit."""
    also: dict[str | None, list[str]] = {}
    for spelling, unit in {**_READ_EXACTLY, **_READ_AS_WORD}.items():
        also.setdefault(canonical(unit), []).append(spelling)

    def record(unit: str, factor: float, offset: float) -> dict[str, Any]:
        others = [each for each in dict.fromkeys([*also.get(unit, []), *_slashed(unit)]) if each != unit]
        return {"unit": unit, "factor": factor, "offset": offset, "also": others}

    return [
        {"name": name, "base": next(iter(units)), "units": [record(unit, *units[unit]) for unit in units]}
        for name, units in DIMENSIONS.items()
    ]


def _slashed(unit: str) -> list[str]:
    above = " ".join(part for part in unit.split() if "-" not in part)
    below = [part.removesuffix("-1").replace("-", "") for part in unit.split() if "-" in part]
    forms = [unit, "/".join([above or "1", *below]), *([f"{above}/({' '.join(below)})"] if len(below) > 1 else [])]
    return forms + [re.sub(r"\bu(?=mol|atm|bar|g|L|eq)", "µ", form) for form in forms]
