"""What is said of uncertainties: that each is of an input in use, and that correlations can hold together."""

from collections.abc import Iterable, Mapping
from dataclasses import replace
from typing import Any

from schemas.checked import Input, Request
from schemas.samples import NUMBER
from service.physics.declare import Array
from service.physics.faults import Fault, Refused
from service.physics.question import Question
from service.physics.sureness import DRAWS, SEED, Asked
from service.physics.uncertainty import DRAWS_TIMES_SAMPLES, Doubt, possible_together


def check_doubts(question: Question, doubts: Iterable[Input]) -> None:
    """Refuse the uncertainty of an input on which no wanted result rests, unless a table brought it."""
    leaves = {leaf for plan in question.plans.values() for leaf in plan.leaves}
    unused = [each.term for each in doubts if each.term not in leaves and each.column is None]
    if unused:
        raise Refused(*(Fault("unused", f"u_{name}", f"no result rests on {name}: leave it out") for name in unused))


def with_correlations(request: Request, sent: Mapping[str, Any]) -> Request:
    """Return the request with the correlations that were sent, as ``correlation.<input>.<input>``.

    Raises
    ------
    Refused
        Where one is not a number from -1 to 1, not between two uncertain inputs, or where they contradict each other.
    """
    uncertain = [each.term for each in request.doubts]
    found: dict[tuple[str, str], float] = {}
    for name, value in sent.items():
        pair = tuple(name.split(".")[1:])
        if len(pair) != 2 or pair[0] == pair[1] or not set(pair) <= set(uncertain):
            allowed = ", ".join(f"u_{each}" for each in uncertain) or "none was sent"
            reason = f"must name two inputs whose uncertainty is sent; uncertain here: {allowed}"
            raise Refused(Fault("unknown_option", name[:100], reason, allowed))
        ordered = (min(pair), max(pair))
        if ordered in found:
            raise Refused(Fault("repeated_name", name, "stands twice, once in each order"))
        found[ordered] = _coefficient(name, value)
    if not possible_together(uncertain, found):
        raise Refused(Fault("unknown_option", ", ".join(sent), "cannot hold together: no inputs correlate so"))
    return replace(request, correlations=found)


def _coefficient(name: str, value: Any) -> float:
    if isinstance(value, str) and NUMBER.fullmatch(value.strip()):
        value = float(value)
    if type(value) not in (int, float) or not -1.0 <= value <= 1.0:
        raise Refused(Fault("unknown_option", name, "must be a number from -1 to 1", "-1 to 1"))
    return float(value)


ASKING = ("u_methods", "u_unpublished", "uncertainty_method", "coverage", "draws", "seed")


def asked_of(request: Request, columns: Mapping[str, Array], samples: int) -> Asked | None:
    """Return how uncertainty is to be told, or None where nothing asks for it.

    Parameters
    ----------
    request : Request
        As checked.
    columns : mapping of str to array
        Uncertainties that a table brings, in the unit of their term.
    samples : int
        How many samples are answered, which bounds the draws.

    Raises
    ------
    Refused
        Where more draws are asked for than one request may take, or a spread of one method.
    """
    options = request.options
    constants = {each.term: each.values for each in request.doubts if each.values is not None}
    inputs = {name: u for name, u in {**constants, **columns}.items() if _in_use(request, name)}
    if not inputs and not any(name in options for name in ASKING):
        return None
    methods = options.get("u_methods", "1")
    if methods == "spread" and len(request.question.plans) < 2:
        raise Refused(Fault("unknown_option", "u_methods", "spread needs several parameterisations"))
    drawn = options.get("uncertainty_method") == "monte-carlo"
    draws = int(options.get("draws", DRAWS))
    if drawn and draws * samples > DRAWS_TIMES_SAMPLES:
        allowed = f"draws times samples up to {DRAWS_TIMES_SAMPLES}"
        raise Refused(Fault("too_large", "draws", f"{draws} for {samples} samples are too many", allowed))
    doubt = Doubt(inputs, request.correlations, methods, options.get("u_unpublished"))
    return Asked(doubt, drawn, draws, int(options.get("seed", SEED)), options.get("coverage"))


def _in_use(request: Request, name: str) -> bool:
    return any(name in plan.leaves for plan in request.question.plans.values())
