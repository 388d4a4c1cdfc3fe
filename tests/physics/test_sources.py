"""The bibliography is complete in itself, in order, and can be handed on as BibTeX."""

import re
import unicodedata
from collections import Counter

import pytest

from service.physics import sources
from service.physics.bibtex import bibtex
from service.physics.declare import Source
from service.physics.sources import SOURCES

CONSTANTS = {name: value for name, value in vars(sources).items() if isinstance(value, Source)}
ALL = pytest.mark.parametrize("source", SOURCES.values(), ids=SOURCES)

EARLIEST_YEAR, LATEST_YEAR = 1900, 2026
DOI = re.compile(r"10\.\d{4,9}/[!-~]+")  # registrant, then printing ASCII without blanks
PERSON = re.compile(r"\S[^,;]*, ([A-Z]\.[ -]?)+")
BODY = re.compile(r"[A-Z]{3,6}")

# The manual is known by the names of its three bodies, so its key gives all of them.
KEYS_WITH_ALL_AUTHORS = ("ioc-scor-iapso-2010",)

# The fields that the standard styles ask for.
REQUIRED_FIELDS = {
    "article": {"author", "title", "journal", "year"},
    "book": {"author", "title", "publisher", "year"},
    "incollection": {"author", "title", "booktitle", "publisher", "year"},
    "techreport": {"author", "title", "institution", "year"},
}

INVENTED = Source(
    key="author-writer-1999",
    authors="Author, A. B.; Wríter, C.",
    year=1999,
    title="Salt & water: 5 % of $x_1$, #2",
    journal="Journal of R&D",
    doi="10.0000/a_b%c",
    volume="1",
    pages="2-3",
    note="50 % from memory",
)


def surnames_in_a_key(source: Source) -> str:
    names = [name.split(",")[0].strip() for name in source.authors.split(";")]
    if len(names) > 2 and source.key not in KEYS_WITH_ALL_AUTHORS:
        names = names[:1]
    plain = unicodedata.normalize("NFKD", "-".join(names)).casefold().encode("ascii", "ignore").decode()
    return plain.replace("'", "").replace(" ", "-")


def parsed(entry: str) -> tuple[str, str, dict[str, str]]:
    """Read one entry by counting braces, as BibTeX does, and refuse what does not end where it should."""
    head = re.match(r"@(\w+)\{([^\s,{}]+),", entry)
    assert head is not None, "no entry type and key"
    fields: dict[str, str] = {}
    position = head.end()
    while field := re.compile(r"\s*(\w+) = \{").match(entry, position):
        depth, position = 1, field.end()
        while depth:
            assert position < len(entry), "a brace is never closed"
            depth += {"{": 1, "}": -1}.get(entry[position], 0)
            position += 1
        assert field[1] not in fields, f"{field[1]} twice"
        fields[field[1]] = entry[field.end() : position - 1]
        if entry[position] != ",":
            break
        position += 1
    assert entry[position:].strip() == "}", "text left over"
    return head[1], head[2], fields


def test_every_constant_is_named_after_its_key() -> None:
    names = {name: source.key.replace("-", "_").upper() for name, source in CONSTANTS.items()}

    assert list(names) == list(names.values())


def test_constants_stand_in_the_order_of_their_keys() -> None:
    keys = [source.key for source in CONSTANTS.values()]

    assert keys == sorted(keys)


def test_the_bibliography_holds_every_constant_under_its_key_in_order() -> None:
    assert list(SOURCES.items()) == [(source.key, source) for source in CONSTANTS.values()]


def test_the_bibliography_cannot_be_changed() -> None:
    with pytest.raises(TypeError):
        SOURCES["author-writer-1999"] = INVENTED  # type: ignore[index]


def test_no_doi_and_no_title_within_a_year_is_given_twice() -> None:
    dois = Counter(source.doi.lower() for source in SOURCES.values() if source.doi)
    titles = Counter((source.title.lower(), source.year) for source in SOURCES.values())

    assert [doi for doi, count in dois.items() if count > 1] == []
    assert [title for title, count in titles.items() if count > 1] == []


@ALL
def test_a_key_is_made_of_surnames_year_and_an_optional_suffix(source: Source) -> None:
    stem = f"{surnames_in_a_key(source)}-{source.year}"

    assert re.fullmatch(rf"{re.escape(stem)}(-[a-z0-9]+)?", source.key)


def test_a_key_has_a_suffix_only_where_another_publication_shares_its_stem() -> None:
    stems = {source.key: f"{surnames_in_a_key(source)}-{source.year}" for source in SOURCES.values()}
    shared = {stem for stem, count in Counter(stems.values()).items() if count > 1}

    assert {stem for key, stem in stems.items() if key != stem} == shared


@ALL
def test_every_author_is_a_surname_with_initials_or_the_short_name_of_a_body(source: Source) -> None:
    wrong = [name for name in source.authors.split("; ") if not (PERSON.fullmatch(name) or BODY.fullmatch(name))]

    assert wrong == []


@ALL
def test_the_year_is_plausible(source: Source) -> None:
    assert EARLIEST_YEAR <= source.year <= LATEST_YEAR


@ALL
def test_a_doi_is_well_formed_or_the_note_says_why_there_is_none(source: Source) -> None:
    if source.doi is None:
        assert source.note is not None
        assert re.search("no DOI|DOI not confirmed", source.note)
    else:
        assert DOI.fullmatch(source.doi)
        assert "DOI" not in (source.note or "")


@ALL
def test_a_range_of_pages_ascends(source: Source) -> None:
    pages = re.fullmatch(r"(\d+)-(\d+)", source.pages or "")

    assert pages is None or int(pages[1]) < int(pages[2])


@pytest.mark.parametrize(
    ("source", "citation"),
    [
        (sources.WANNINKHOF_2014, "Wanninkhof (2014)"),
        (sources.WEISS_PRICE_1980, "Weiss and Price (1980)"),
        (sources.NIGHTINGALE_2000, "Nightingale et al. (2000)"),
        (sources.JAHNE_1987, "Jähne et al. (1987)"),
        (sources.OCONNOR_DOBBINS_1958, "O'Connor and Dobbins (1958)"),
        (sources.DE_BRUYN_SALTZMAN_1997, "De Bruyn and Saltzman (1997)"),
        (sources.IOC_SCOR_IAPSO_2010, "IOC et al. (2010)"),
        (sources.JCGM_2008_100, "JCGM (2008)"),
    ],
)
def test_a_citation_names_authors_and_year_as_in_running_text(source: Source, citation: str) -> None:
    assert source.citation == citation


@ALL
def test_a_bibtex_entry_can_be_read_back(source: Source) -> None:
    entry_type, key, fields = parsed(bibtex(source))

    assert key == source.key
    assert fields.keys() >= REQUIRED_FIELDS[entry_type]
    assert all(fields.values())
    assert fields["year"] == str(source.year)
    assert fields.get("doi") == source.doi
    assert len(fields["author"].split(" and ")) == len(source.authors.split(";"))
    assert fields["title"].replace("\\", "") == f"{{{source.title}}}"


@ALL
def test_a_bibtex_entry_has_no_unescaped_special_character_outside_the_doi(source: Source) -> None:
    _, _, fields = parsed(bibtex(source))
    text = " ".join(value for name, value in fields.items() if name != "doi")

    assert re.search(r"(?<!\\)[&%_#$]", text) is None


def test_bibtex_escapes_what_it_must_and_leaves_accents_and_the_doi() -> None:
    assert bibtex(INVENTED) == (
        "@article{author-writer-1999,\n"
        "  author = {Author, A. B. and Wríter, C.},\n"
        "  title = {{Salt \\& water: 5 \\% of \\$x\\_1\\$, \\#2}},\n"
        "  journal = {Journal of R\\&D},\n"
        "  volume = {1},\n"
        "  pages = {2--3},\n"
        "  year = {1999},\n"
        "  doi = {10.0000/a_b%c},\n"
        "  annote = {50 \\% from memory}\n"
        "}\n"
    )


@pytest.mark.parametrize(
    ("source", "entry_type", "fields"),
    [
        (sources.WEISS_1974, "article", {"journal": "Marine Chemistry", "volume": "2", "pages": "203--215"}),
        (
            sources.LISS_MERLIVAT_1986,
            "incollection",
            {
                "booktitle": "The Role of Air-Sea Exchange in Geochemical Cycling",
                "publisher": "Reidel",
                "pages": "113--127",
            },
        ),
        (
            sources.ZEEBE_WOLF_GLADROW_2001,
            "book",
            {"publisher": "Elsevier", "series": "Elsevier Oceanography Series 65"},
        ),
        (sources.POLING_2001, "book", {"publisher": "McGraw-Hill", "edition": "5th edition"}),
        (
            sources.JCGM_2008_100,
            "techreport",
            {
                "author": "{JCGM}",
                "institution": "Joint Committee for Guides in Metrology",
                "number": "JCGM 100:2008",
            },
        ),
    ],
)
def test_each_kind_of_publication_becomes_its_own_type_of_entry(
    source: Source, entry_type: str, fields: dict[str, str]
) -> None:
    actual_type, _, actual = parsed(bibtex(source))

    assert actual_type == entry_type
    assert actual.items() >= fields.items()


@pytest.mark.parametrize(
    "broken",
    [
        "@article{two words,\n  year = {1999}\n}\n",
        "@article{key,\n  year = {1999}\n  title = {no comma before}\n}\n",
        "@article{key,\n  year = {1999}}\n}\n",
        "@article{key,\n  year = {{1999}\n}\n",
        "@article{key,\n  year = {1999},\n  year = {2000}\n}\n",
    ],
)
def test_the_reader_of_these_tests_refuses_a_broken_entry(broken: str) -> None:
    with pytest.raises(AssertionError):
        parsed(broken)
