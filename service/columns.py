"""Which columns of a table stand for which inputs."""

from collections.abc import Iterable, Mapping
from typing import Any

from schemas.samples import Column
from service.csv_table import Header
from service.physics.faults import Fault, Refused

USED_LIMIT = 64
SHORTEST_FOR_A_SLIP = 5  # letters; shorter names are too near to other words


def bind(header: Header, raw: Mapping[str, Any], inputs: Iterable[str]) -> dict[str, Any]:
    """Return the request with columns in place of ``@`` references and of headers that are inputs.

    Parameters
    ----------
    header : Header
        Of the table.
    raw : mapping
        Names and values as sent beside the table.
    inputs : iterable of str
        The names of the inputs of the quantity.

    Raises
    ------
    Refused
        For a reference without its column, an input given twice, a header that is nearly an input.
    """
    known = tuple(inputs)
    ignored = {word.strip() for word in str(raw.get("ignore", "")).split(";") if word.strip()}
    bound: dict[str, Any] = {}
    pointed: set[int] = set()
    for name, value in raw.items():
        if isinstance(value, str) and value.startswith("@"):
            bound[name] = _referred(header, name, value[1:])
            pointed.add(bound[name].index)
        else:
            bound[name] = value
    faults: list[Fault] = []
    for index, name in enumerate(header.names):
        if name in ignored or header.raw[index] in ignored:
            continue
        if name not in known:
            continue
        if name not in bound:
            bound[name] = Column(index, header.raw[index], header.units[index])
        elif index not in pointed:
            faults.append(_twice(name, isinstance(bound[name], Column) and name not in raw))
    faults += _near_misses(header, bound, pointed, ignored, known)
    faults += [
        Fault("column", word, "is to be ignored but is not a column", ", ".join(header.names)[:500])
        for word in sorted(ignored)
        if word not in header.names and word not in header.raw
    ]
    if faults:
        raise Refused(*faults)
    if sum(isinstance(value, Column) for value in bound.values()) > USED_LIMIT:
        raise Refused(Fault("too_large", "csv", "uses too many columns", f"{USED_LIMIT} columns"))
    return bound


def _twice(name: str, as_columns: bool) -> Fault:
    if as_columns:
        return Fault("two_ways", name, "is the header of two columns: rename one of them")
    reason = f"is a column and is given beside the table: send one, or leave the column out with ignore={name}"
    return Fault("two_ways", name, reason)


def _referred(header: Header, name: str, reference: str) -> Column:
    """Return the column that a reference means: a whole header, or its part before the bracket, and perhaps a unit."""
    text = reference.strip()
    unit = None
    candidates = [i for i, raw in enumerate(header.raw) if raw == text] or _named(header, text)
    if not candidates and text.endswith("]") and "[" in text:
        text, _, rest = text.rpartition("[")
        text, unit = text.strip(), rest[:-1].strip()
        candidates = [i for i, raw in enumerate(header.raw) if raw == text] or _named(header, text)
        own = [header.units[i] for i in candidates if header.raw[i] != text]
        if any(own) and own[0] != unit:
            reason = f"@{reference[:100]} gives the unit {unit}, the header {own[0]}: send @{text}, or mend the header"
            raise Refused(Fault("two_ways", name, reason))
    if not candidates:
        raise Refused(Fault("column", name, f"@{reference[:100]} is not a column", ", ".join(header.raw)[:500]))
    if len(candidates) > 1:
        raise Refused(Fault("column", name, f"@{reference[:100]} names {len(candidates)} columns"))
    index = candidates[0]
    return Column(index, header.raw[index], unit if unit is not None else header.units[index])


def _named(header: Header, text: str) -> list[int]:
    return [index for index, name in enumerate(header.names) if name == text]


def _near_misses(
    header: Header, bound: Mapping[str, Any], pointed: set[int], ignored: set[str], known: Iterable[str]
) -> list[Fault]:
    unused = [name for name in known if name not in bound]
    faults = []
    for index, name in enumerate(header.names):
        if index in pointed or name in ignored or header.raw[index] in ignored or name in known:
            continue
        plain = "_".join(name.strip().lower().replace("-", " ").replace("_", " ").split())
        near = next((each for each in unused if plain == each or _one_slip(plain, each)), None)
        if near:
            faults.append(
                Fault(
                    "near_miss",
                    name,
                    f"is nearly {near}: rename the column to {near}, or send ignore={name} to leave it out",
                    near,
                )
            )
    return faults


def _one_slip(word: str, name: str) -> bool:
    """Tell whether a word differs from a name by one letter changed, lost, added or swapped with its neighbour."""
    if word == name or abs(len(word) - len(name)) > 1 or len(name) < SHORTEST_FOR_A_SLIP:
        return False
    first = next((i for i, (a, b) in enumerate(zip(word, name, strict=False)) if a != b), min(len(word), len(name)))
    rest_word, rest_name = word[first:], name[first:]
    if len(word) == len(name):
        swapped = rest_word[1::-1] + rest_word[2:] == rest_name
        return rest_word[1:] == rest_name[1:] or swapped
    longer, shorter = (rest_word, rest_name) if len(word) > len(name) else (rest_name, rest_word)
    return longer[1:] == shorter
