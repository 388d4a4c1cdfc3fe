"""How a publication is written as a BibTeX entry."""

import re

from service.physics.declare import Source

SPECIAL = re.compile(r"[&%_#$]")


def bibtex(source: Source) -> str:
    """Return a publication as one BibTeX entry in UTF-8.

    Parameters
    ----------
    source : Source
        The publication.

    Returns
    -------
    str
        The entry, ending in a newline; its key is the key of the source.

    Notes
    -----
    A book with pages is a chapter, ``@incollection``; a report is a ``@techreport``. Titles stand in double
    braces so that formulae and names keep their capitals. The DOI is not escaped, because programs read that
    field verbatim. The note goes to ``annote``, which the standard styles do not print.
    """
    entry_type, container = _type_and_container(source)
    fields = {
        "author": _authors(source.authors),
        "title": f"{{{_escaped(source.title)}}}",
        **{name: _escaped(value) for name, value in container.items()},
        "pages": source.pages and source.pages.replace("-", "--"),
        "year": str(source.year),
        "doi": source.doi,
        "annote": source.note and _escaped(source.note),
    }
    lines = [f"  {name} = {{{value}}}" for name, value in fields.items() if value]
    return f"@{entry_type}{{{source.key},\n" + ",\n".join(lines) + "\n}\n"


def _type_and_container(source: Source) -> tuple[str, dict[str, str]]:
    volume = source.volume or ""
    if source.kind == "report":
        return "techreport", {"institution": source.journal, "number": volume}
    if source.kind == "book" and source.pages:
        title, _, publisher = source.journal.partition("; ")
        return "incollection", {"booktitle": title, "publisher": publisher}
    if source.kind == "book":
        return "book", {"publisher": source.journal, "edition" if "edition" in volume else "series": volume}
    return "article", {"journal": source.journal, "volume": volume}


def _authors(authors: str) -> str:
    names = (name.strip() for name in authors.split(";"))
    return " and ".join(_escaped(name) if "," in name else f"{{{_escaped(name)}}}" for name in names)


def _escaped(text: str) -> str:
    return SPECIAL.sub(r"\\\g<0>", text)
