"""The bibliography: reading it, finding a source, citing it."""

from dataclasses import FrozenInstanceError

import pytest

from spinhazard.sources import Source, citation, load_sources, resolve

SOURCES = load_sources()
every_source = pytest.mark.parametrize("source", SOURCES.values(), ids=SOURCES)


def test_sources_that_rules_formulas_and_checks_were_promised_are_there():
    promised = {
        "openstax-up1", "beer-johnston-dynamics", "roark", "timoshenko-som2", "robinson-1944", "bc-top-9a", "iso-13855",
        "iso-13857", "iso-14119", "iso-14120", "iso-14118", "iso-12100", "iec-60204-1", "ieee-115", "iec-60034-2-1",
        "29cfr1910.147", "29cfr1910.212", "29cfr1910.215", "29cfr1910.217", "29cfr1910.219", "30cfr56", "jcgm-100",
        "jcgm-101", "schlichting", "ddesb-ts9", "nist-sp811", "spinhazard-methods", "practice", "en-iso-19085",
        "en-12413", "dir-2006-42-ec", "reg-eu-2023-1230", "iso-13849-1", "policy",
    }  # fmt: skip

    assert promised - set(SOURCES) == set()


@every_source
def test_source_says_what_it_is_and_how_far_it_was_read(source):
    assert source.short
    assert source.title
    assert source.status in {"text", "memory", "common practice", "own"}
    assert " " not in source.id


def test_sources_are_read_once_and_keep_their_order():
    assert load_sources() is SOURCES
    assert next(iter(SOURCES)) == "openstax-up1"


def test_source_cannot_be_changed():
    with pytest.raises(FrozenInstanceError, match="cannot assign to field 'status'"):
        SOURCES["roark"].status = "text"


def test_short_names_tell_sources_apart():
    shorts = [source.short for source in SOURCES.values()]

    assert len(shorts) == len(set(shorts))


@pytest.mark.parametrize("reference", ["iso-14119 6.2", "iso-14119"])
def test_reference_leads_to_its_source_with_or_without_a_place(reference):
    assert resolve(reference) is SOURCES["iso-14119"]


@pytest.mark.parametrize(
    ("reference", "words"),
    [
        ("iso-14191 6.2", 'no source has the id "iso-14191"; the nearest is "iso-14119"'),
        ("29cfr1910.218 (a)", 'no source has the id "29cfr1910.218"; the nearest is "29cfr1910.21'),
        ("§§§", 'no source has the id "§§§"$'),
        ("", 'no source has the id ""$'),
    ],
)
def test_unknown_id_is_refused_with_the_nearest_one(reference, words):
    with pytest.raises(LookupError, match=words):
        resolve(reference)


@pytest.mark.parametrize(
    ("reference", "printed"),
    [
        ("29cfr1910.147 (d)(5)", "29 CFR 1910.147(d)(5)"),
        ("29cfr1910.217 table O-10", "29 CFR 1910.217, table O-10"),
        ("iso-14119 6.2", "ISO 14119, 6.2 (from memory)"),
        ("iso-12100", "ISO 12100:2010 (from memory)"),
        ("openstax-up1 §10.4", "OpenStax University Physics 1, §10.4"),
        ("practice", "common practice, no source"),
        ("policy fragment_energy_limit", "site policy, fragment_energy_limit"),
    ],
)
def test_citation_names_document_and_place_and_says_when_it_is_from_memory(reference, printed):
    assert citation(reference) == printed


@every_source
def test_exactly_the_sources_from_memory_are_printed_so(source):
    assert citation(f"{source.id} 1").endswith("(from memory)") == (source.status == "memory")


def test_citation_of_an_unknown_id_is_refused():
    with pytest.raises(LookupError, match='no source has the id "nowhere"'):
        citation("nowhere 1")


def test_bibliography_holds_nothing_but_sources():
    assert {type(source) for source in SOURCES.values()} == {Source}
    assert [source.id for source in SOURCES.values()] == list(SOURCES)
