"""How sure a result is: first-order propagation and Monte Carlo through a plan, after JCGM 100:2008 and 101:2008."""

from collections.abc import Iterator, Mapping, Sequence
from dataclasses import dataclass, field
from statistics import NormalDist

import numpy as np

from service.physics.declare import FAMILY_OF, TERMS, Array, Gas, Uncertainty
from service.physics.methods import GIVEN
from service.physics.plans import Node, Plan

STEP = 1e-4  # of a term's scale: the difference over which a derivative is taken
METHOD_FAMILIES = ("transfer_velocity", "solubility", "schmidt_number")  # whose published uncertainty counts
DRAWS_TIMES_SAMPLES = 20_000_000  # bounds the time of one request
MATTERS = 1e-9  # relative change of a result per relative change of a method, below which it is rounding
APART = 0.1  # relative difference of the two ways at which a sample is told of it
Pair = tuple[str, str]


@dataclass(frozen=True, slots=True)
class Doubt:
    """What is uncertain: inputs by their standard uncertainty, correlations, and whether methods count."""

    inputs: Mapping[str, Array]
    correlations: Mapping[Pair, float] = field(default_factory=dict)
    methods: str = "1"
    unpublished: float | None = None


@dataclass(frozen=True, slots=True)
class Group:
    """The nodes of one method, which are wrong together."""

    name: str
    nodes: tuple[Node, ...]
    uncertainty: Uncertainty | None


@dataclass(frozen=True, slots=True)
class Spread:
    """What is known of how sure the wanted numbers are, each by the key of its value.

    Attributes
    ----------
    u, u_inputs : mapping of str to array
        Standard uncertainty, with the methods and from the inputs alone, in the unit of the term.
    budget : mapping of str to mapping of str to array
        The share of each input, method and correlation in u squared.
    unknown : mapping of str to tuple of str
        Numbers of which u is not given, with the methods that publish no uncertainty.
    interval : mapping of str to (low, high)
        Coverage interval, where one was asked for.
    parts : mapping of str to mapping of str to array
        Derivative times uncertainty of each input and method, signed.
    """

    u: Mapping[str, Array]
    u_inputs: Mapping[str, Array]
    budget: Mapping[str, Mapping[str, Array]]
    unknown: Mapping[str, tuple[str, ...]]
    interval: Mapping[str, tuple[Array, Array]] = field(default_factory=dict)
    parts: Mapping[str, Mapping[str, Array]] = field(default_factory=dict)

    @property
    def unpublished(self) -> tuple[str, ...]:
        """Return the methods for want of whose uncertainty some number has none."""
        return tuple(dict.fromkeys(name for names in self.unknown.values() for name in names))


def groups(plan: Plan, gas: Gas) -> list[Group]:
    """Return the methods of a plan whose published uncertainty counts.

    Parameters
    ----------
    plan : Plan
        What is run.
    gas : Gas
        Whose coefficient blocks may bring an uncertainty of their own.
    """
    found: dict[str, list[Node]] = {}
    for node in plan.nodes:
        family = FAMILY_OF.get(node.step.results[0])
        if family and family.name in METHOD_FAMILIES and node.step.method not in (None, GIVEN):
            found.setdefault(f"{family.name}: {node.step.method}", []).append(node)
    return [Group(name, tuple(nodes), _published(nodes, gas)) for name, nodes in found.items()]


def _published(nodes: Sequence[Node], gas: Gas) -> Uncertainty | None:
    for node in nodes:
        block = gas.block(node.step.results[0], node.step.method)
        if published := (block.uncertainty if block else None) or node.step.uncertainty:
            return published
    return None


def rerun(
    plan: Plan, known: Mapping[str, Array], changed: Mapping[str, Array], group: Group | None = None
) -> dict[str, Array]:
    """Return what a plan gives when some of its numbers are replaced, computing only what follows from them.

    Parameters
    ----------
    plan : Plan
        What was run.
    known : mapping of str to array
        What came of it.
    changed : mapping of str to array
        New numbers by key; with a group, those of its nodes.
    group : Group, optional
        Whose own nodes are not run again.
    """
    now = {**known, **changed}
    touched = set(changed)
    fixed = group.nodes if group else ()
    with np.errstate(all="ignore"):
        for node in plan.nodes:
            if node in fixed or touched.isdisjoint(node.arguments):
                continue
            outcome = node.function(*[now[key] for key in node.arguments])
            now.update(zip(node.results, outcome if len(node.results) > 1 else (outcome,), strict=True))
            touched.update(node.results)
    return now


def first_order(
    plan: Plan, known: Mapping[str, Array], keys: Sequence[str], doubt: Doubt, gas: Gas, coverage: float | None
) -> Spread:
    """Propagate uncertainties to first order, by central differences over the plan.

    Parameters
    ----------
    plan : Plan
        What was run.
    known : mapping of str to array
        What came of it.
    keys : sequence of str
        The wanted numbers.
    doubt : Doubt
        What is uncertain.
    gas : Gas
        Of which gas.
    coverage : float or None
        Probability of an interval, taken as normal. [1]

    Returns
    -------
    Spread
    """
    parts = {name: _part(plan, known, keys, name, u) for name, u in doubt.inputs.items()}
    variance = {key: sum((part[key] ** 2 for part in parts.values()), np.zeros(1)) for key in keys}
    pairs: dict[str, dict[str, Array]] = {}
    for (a, b), r in doubt.correlations.items():
        pairs[f"correlation.{a}.{b}"] = {key: 2.0 * r * parts[a][key] * parts[b][key] for key in keys}
    for pair in pairs.values():
        variance = {key: variance[key] + pair[key] for key in keys}
    u_inputs = {key: np.sqrt(np.maximum(variance[key], 0.0)) for key in keys}
    unknown: dict[str, list[str]] = {key: [] for key in keys}
    for group in _counted(plan, gas, doubt):
        published = group.uncertainty or _supplied(doubt)
        if published is None:
            for key in _keys_that_rest_on(plan, known, keys, group):
                unknown[key].append(group.name)
            continue
        parts[group.name] = _method_part(plan, known, keys, group, published)
        variance = {key: variance[key] + parts[group.name][key] ** 2 for key in keys}
    u = {key: np.sqrt(np.maximum(variance[key], 0.0)) for key in keys}
    squares = {name: {key: part[key] ** 2 for key in keys} for name, part in parts.items()} | pairs
    with np.errstate(all="ignore"):
        budget = {key: {name: each[key] / variance[key] for name, each in squares.items()} for key in keys}
    u |= {key: np.full_like(u[key], np.nan) for key in keys if unknown[key]}
    budget = {key: shares for key, shares in budget.items() if not unknown[key]}
    interval = {}
    if coverage is not None:
        k = NormalDist().inv_cdf(0.5 + coverage / 2.0)
        interval = {key: (known[key] - k * u[key], known[key] + k * u[key]) for key in keys}
    return Spread(u, u_inputs, budget, {key: tuple(names) for key, names in unknown.items() if names}, interval, parts)


def _keys_that_rest_on(plan: Plan, known: Mapping[str, Array], keys: Sequence[str], group: Group) -> Iterator[str]:
    """Yield the wanted numbers that change with a method; one that it enters and leaves again does not count."""
    moved = _method_part(plan, known, keys, group, Uncertainty(1.0, True, "", ""))
    for key in keys:
        if (np.abs(moved[key]) > MATTERS * np.abs(known[key])).any():
            yield key


def _counted(plan: Plan, gas: Gas, doubt: Doubt) -> Iterator[Group]:
    """Yield the methods that count: none, all, or with ``spread`` all but the transfer velocity."""
    if doubt.methods == "0":
        return
    for group in groups(plan, gas):
        if doubt.methods != "spread" or not group.name.startswith("transfer_velocity"):
            yield group


def _supplied(doubt: Doubt) -> Uncertainty | None:
    if doubt.unpublished is None:
        return None
    stated = f"{doubt.unpublished:g} %, the caller's own"
    return Uncertainty(doubt.unpublished / 100.0, True, "supplied by the caller", stated)


def _part(
    plan: Plan, known: Mapping[str, Array], keys: Sequence[str], name: str, uncertainty: Array
) -> dict[str, Array]:
    """Return derivative times uncertainty of one input, one-sided at the limits of the possible."""
    term, value = TERMS[name], known[name]
    low, high = term.possible
    half = STEP * term.scale
    above, below = np.minimum(value + half, high), np.maximum(value - half, low)
    if term.above_lower_limit:
        below = np.where(below > low, below, value)
    up, down = rerun(plan, known, {name: above}), rerun(plan, known, {name: below})
    width = above - below
    with np.errstate(all="ignore"):
        return {key: (up[key] - down[key]) / width * uncertainty for key in keys}


def _method_part(
    plan: Plan, known: Mapping[str, Array], keys: Sequence[str], group: Group, published: Uncertainty
) -> dict[str, Array]:
    up = rerun(plan, known, _scaled(known, group, published, STEP), group)
    down = rerun(plan, known, _scaled(known, group, published, -STEP), group)
    with np.errstate(all="ignore"):
        return {key: (up[key] - down[key]) / (2.0 * STEP) * published.value for key in keys}


def _scaled(known: Mapping[str, Array], group: Group, published: Uncertainty, by: Array | float) -> dict[str, Array]:
    """Return the leading results of a method's nodes, moved by a part of themselves or by an amount."""
    moved = {}
    for node in group.nodes:
        lead = known[node.results[0]]
        moved[node.results[0]] = lead * (1.0 + by) if published.relative else lead + by
    return moved


def monte_carlo(
    plan: Plan,
    known: Mapping[str, Array],
    keys: Sequence[str],
    doubt: Doubt,
    gas: Gas,
    draws: int,
    seed: int,
    coverage: float | None,
) -> Spread:
    """Propagate uncertainties by drawing, one set of draws for all samples, so that N at once equal N alone.

    Parameters
    ----------
    plan : Plan
        What was run.
    known : mapping of str to array
        What came of it.
    keys : sequence of str
        The wanted numbers.
    doubt : Doubt
        What is uncertain; normal distributions. Draws that are impossible are left out.
    gas : Gas
        Of which gas.
    draws, seed : int
        How many, and of which sequence.
    coverage : float or None
        Probability of an interval. [1]

    Returns
    -------
    Spread
        Its budget is that of `first_order`.
    """
    linear = first_order(plan, known, keys, doubt, gas, coverage)
    if linear.unpublished:
        return linear
    counted = list(_counted(plan, gas, doubt))
    names = list(doubt.inputs)
    normal = np.random.default_rng(seed).standard_normal((len(names) + len(counted), draws))
    normal[: len(names)] = _correlated(names, doubt.correlations) @ normal[: len(names)]
    samples = max(known[key].shape[-1] for key in (*keys, *names))
    told = {key: np.empty((3, *known[key].shape[:-1], samples)) for key in keys}
    for row in range(samples):
        one = {key: array[..., row : row + 1] if array.shape[-1] > 1 else array for key, array in known.items()}
        drawn = _drawn(plan, one, names, counted, doubt, normal, row)
        for key in keys:
            told[key][..., row] = np.apply_along_axis(_of_draws, -1, drawn[key], coverage).T
    u = {key: each[0] for key, each in told.items()}
    interval = {key: (each[1], each[2]) for key, each in told.items()} if coverage is not None else {}
    return Spread(u, linear.u_inputs, linear.budget, {}, interval, linear.parts)


def _of_draws(values: Array, coverage: float | None) -> Array:
    """Return standard deviation and coverage interval of some draws, of which those without a number do not count."""
    values = values[np.isfinite(values)] if values.size > 1 else values
    u = values.std(ddof=1) if values.size > 1 else 0.0
    if coverage is None or not values.size:
        return np.array([u, np.nan, np.nan])
    return np.array([u, *np.quantile(values, (0.5 - coverage / 2.0, 0.5 + coverage / 2.0))])


def _drawn(
    plan: Plan,
    one: Mapping[str, Array],
    names: Sequence[str],
    counted: Sequence[Group],
    doubt: Doubt,
    normal: Array,
    row: int,
) -> dict[str, Array]:
    """Return what the plan gives for every draw of one sample."""
    drawn: dict[str, Array] = {}
    for place, name in enumerate(names):
        u = doubt.inputs[name]
        values = one[name] + normal[place] * (u[row] if u.size > 1 else u[0])
        low, high = TERMS[name].possible
        drawn[name] = np.where((values >= low) & (values <= high), values, np.nan)
    now = rerun(plan, one, drawn)
    for place, group in enumerate(counted, len(names)):
        published = group.uncertainty or _supplied(doubt)
        if published is not None:
            now = rerun(plan, now, _scaled(now, group, published, published.value * normal[place]), group)
    return now


def _correlated(names: Sequence[str], correlations: Mapping[Pair, float]) -> Array:
    """Return the factor that makes independent draws correlated."""
    nearly = correlation_matrix(names, correlations) + 1e-12 * np.eye(len(names))  # a perfect correlation is singular
    return np.asarray(np.linalg.cholesky(nearly), dtype=float)


def correlation_matrix(names: Sequence[str], correlations: Mapping[Pair, float]) -> Array:
    """Return the matrix of correlations between inputs.

    Parameters
    ----------
    names : sequence of str
        The uncertain inputs, in order.
    correlations : mapping of (str, str) to float
        Those that are not zero. [1]
    """
    matrix = np.eye(len(names))
    for (a, b), r in correlations.items():
        i, j = names.index(a), names.index(b)
        matrix[i, j] = matrix[j, i] = r
    return matrix


def possible_together(names: Sequence[str], correlations: Mapping[Pair, float]) -> bool:
    """Tell whether correlations can hold together: their matrix has no negative eigenvalue."""
    return bool(np.linalg.eigvalsh(correlation_matrix(names, correlations)).min() > -1e-9)
