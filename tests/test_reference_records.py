"""The published facts that ship: their number, their origin, and what they say of sensitive pairs."""

from __future__ import annotations

import re
from collections import Counter
from pathlib import Path

import pytest

from builder.reading.yaml_files import read_yaml

REFERENCE = Path(__file__).parents[1] / "recipes" / "reference"

FILES = {
    "chemicals": 85,
    "codes": 56,
    "compatibility": 98,
    "constants": 27,
    "containers": 9,
    "couples": 3,
    "etchants": 126,
    "films": 88,
    "groups": 49,
    "hazards": 28,
    "mixing": 126,
    "precautions": 19,
    "products": 120,
    "rates": 93,
    "sources": 166,
}

RATES = {
    ("rate", "literature", "read"): 126,
    ("rate", "unchecked", "read"): 24,
    ("rate", "unchecked", "recalled"): 329,
    ("none_seen", "unchecked", "read"): 30,
    ("none_seen", "unchecked", "recalled"): 95,
}
"""Kind, rank and trust of the published numbers; a number recalled is never `literature`."""

STATEMENTS = {
    "attacks": 417,
    "resists": 320,
    "peels": 13,
    "roughens": 11,
    "oxidises": 6,
    "swells": 5,
    "residue": 3,
    "cracks": 2,
}
HINTS = 87

SENSITIVE = [
    # etchant, film, best evidence: a rank, or an effect where no number stands; source of that evidence
    ("bhf-5-1", "al-si", "unchecked", "williams1996"),
    ("bhf-5-1", "al-si", "attacks", "witvrouw2000"),
    ("bhf-5-1", "sio2-thermal-wet", "literature", "williams2003"),
    ("bhf-5-1", "cu", "roughens", "williams2003"),
    ("bhf-5-1", "ti", "attacks", "williams1996"),
    ("bhf-5-1", "si-100", "resists", "williams2003"),
    ("hf-49", "resist-positive-a", "peels", "williams1996"),
    ("hf-49", "resist-positive-b", "peels", "williams1996"),
    ("hf-49", "ti", "attacks", "williams1996"),
    ("hf-10-1", "sin-lpcvd", "literature", "williams2003"),
    ("hf-10-1", "sio2-pecvd", "attacks", "williams2003"),
    ("hf-vapour", "resist-positive-a", "peels", "williams2003"),
    ("hf-vapour", "cu", "roughens", "williams2003"),
    ("hf-vapour", "sin-pecvd-high-n", "residue", "witvrouw2000"),
    ("hno3-nh4f-si", "resist-positive-c", "peels", "williams2003"),
    ("h3po4-hot-160", "resist-positive-c", "peels", "williams2003"),
    ("h3po4-hot-160", "sin-lpcvd", "literature", "williams2003"),
    ("koh-30", "al-si", "attacks", "williams1996"),
    ("koh-30", "resist-positive-a", "attacks", "williams1996"),
    ("koh-30", "si-111", "resists", "sato1998"),
    ("tmah-2-38", "al-si", "attacks", "tabata1992"),
    ("piranha", "cu", "literature", "williams2003"),
    ("piranha", "al-evaporated", "unchecked", "burns2011"),
    ("piranha", "ge-poly", "swells", "burns2011"),
    ("cr-can-nitric", "nb", "roughens", "burns2011"),
    ("cr-can-nitric", "glass-borosilicate", "roughens", "burns2011"),
    ("acetone", "polycarbonate", "cracks", "brandrup1999"),
    ("acetone", "pvdf", "swells", "marshall2021"),
    ("plasma-o2-ash", "ag", "oxidises", "common-practice"),
    ("xef2", "ti", "attacks", "williams1996"),
    ("xef2", "sio2-thermal-wet", "resists", "williams2003"),
]
"""Chosen by hand from the publications named, where a wrong word would cost a sample."""


def _load(kind: str) -> dict[str, dict]:
    records = {}
    for path in sorted((REFERENCE / kind).glob("*.yaml")):
        raw, problems = read_yaml(path, path.name)
        assert not problems, problems
        records[path.stem] = raw.data
    return records


@pytest.fixture(scope="module")
def reference() -> dict[str, dict[str, dict]]:
    return {kind: _load(kind) for kind in FILES}


def _rates(reference) -> list[tuple[str, dict]]:
    return [(name, row) for name, record in reference["rates"].items() for row in record["rates"]]


def _statements(reference) -> list[tuple[str, dict]]:
    files = reference["compatibility"].items()
    return [(name, row) for name, record in files for row in record.get("statements", [])]


def _hints(reference) -> list[tuple[str, dict]]:
    return [
        (name, row) for name, record in reference["compatibility"].items() for row in record.get("hints", [])
    ]


def test_each_kind_holds_the_records_that_were_collected(reference) -> None:
    """No record is lost, and none appears unnoticed."""
    assert {kind: len(records) for kind, records in reference.items()} == FILES


def test_published_numbers_are_counted_by_kind_rank_and_trust(reference) -> None:
    """827 collected rows give 646 numbers; two more stood in a mixture and in a statement."""
    rows = [row for _, row in _rates(reference)]
    counts = Counter((row["kind"], row["rank"], row["trust"]) for row in rows)
    assert {key: counts[key] for key in RATES} == RATES
    assert Counter(row["kind"] for row in rows) == {
        "rate": 479,
        "none_seen": 125,
        "upper_limit": 19,
        "range": 16,
        "lower_limit": 9,
    }
    assert Counter(row["rank"] for row in rows) == {"literature": 144, "unchecked": 504}
    assert Counter(row["trust"] for row in rows) == {"read": 210, "recalled": 438}


def test_a_recalled_number_is_never_ranked_as_literature(reference) -> None:
    """What was not seen in a text cannot by itself make a plan hold."""
    assert not [
        row for _, row in _rates(reference) if row["trust"] == "recalled" and row["rank"] != "unchecked"
    ]


def test_statements_and_hints_are_counted(reference) -> None:
    """175 rows of the rate tables and 156 hand-mapped statements stand behind these counts."""
    effects = Counter(row["effect"] for _, row in _statements(reference))
    assert effects == STATEMENTS
    assert len(_hints(reference)) == HINTS


def test_nothing_seen_carries_a_limit_only_with_a_tested_time(reference) -> None:
    """`None seen` without detection limit and time is the statement "resists", never a rate of zero."""
    rows = [row for _, row in _rates(reference) if row["kind"] == "none_seen"]
    assert all(("detection_limit" in row) == ("tested_time" in row) for row in rows)
    assert all(re.fullmatch(r"0 (A|nm)/min", row["rate"]) for row in rows)
    assert all(row["rank"] == "unchecked" for row in rows if "tested_time" not in row)


def test_each_number_keeps_the_unit_it_was_printed_with(reference) -> None:
    """The units of the publications are kept, rates per cycle among them."""
    units = Counter(row["rate"].split()[-1] for _, row in _rates(reference))
    assert set(units) == {"A/min", "A/s", "A/cycle", "nm/min", "um/min", "um/h", "A/h", "nm/h", "nm/s"}
    assert units["A/cycle"] == 14


def test_every_part_and_every_film_resolves(reference) -> None:
    """Parts name chemicals; rates, statements and couples name films and etchants on record."""
    parts = {
        part["chemical"] for etchant in reference["etchants"].values() for part in etchant.get("parts", [])
    }
    assert parts <= set(reference["chemicals"])
    films = {row["film"] for _, row in _rates(reference) + _statements(reference)}
    films |= {film for couple in reference["couples"].values() for film in couple["films"]}
    assert films <= set(reference["films"])
    etchants = {name for name, _ in _rates(reference) + _statements(reference) + _hints(reference)}
    assert etchants <= set(reference["etchants"])


def test_every_etchant_says_what_it_is_made_of(reference) -> None:
    """An etchant states parts, or the composition as printed where they cannot be stated."""
    for name, etchant in reference["etchants"].items():
        assert ("parts" in etchant) != ("parts_unknown" in etchant), name


def test_every_source_resolves(reference) -> None:
    """A reader can follow each fact to its reference."""

    def sources(value):
        if isinstance(value, dict):
            for key, inner in value.items():
                named = key == "source"
                yield from ([inner] if isinstance(inner, str) else inner) if named else sources(inner)
        elif isinstance(value, list):
            for inner in value:
                yield from sources(inner)

    assert set(sources(reference)) <= set(reference["sources"])


def test_families_have_members_and_films_have_none(reference) -> None:
    """A family is a name for several films and is never taken for one of them."""
    families = {name for name, film in reference["films"].items() if film["class"] == "family"}
    assert families == {"si-any", "sio2-any", "sin-any", "resist-positive"}
    for name, film in reference["films"].items():
        members = set(film.get("members", []))
        assert bool(members) == (name in families), name
        assert members <= set(reference["films"]) - families, name


def test_similar_films_run_in_no_circle(reference) -> None:
    """A hint never comes back to the film that asked for it."""
    for start in reference["films"]:
        seen, front = set(), [start]
        while front:
            for other in reference["films"][front.pop()].get("similar", []):
                assert other != start, start
                if other not in seen:
                    seen.add(other)
                    front.append(other)


def test_groups_and_their_members_agree(reference) -> None:
    """What a chemical, etchant or film says of its groups is what the group says of its members."""
    holders: dict[str, set[str]] = {}
    for kind in ("chemicals", "etchants", "films"):
        for name, record in reference[kind].items():
            for group in record.get("groups", []):
                holders.setdefault(group, set()).add(name)
    for name, members in holders.items():
        assert members <= set(reference["groups"][name].get("members", [])), name


def test_hazard_codes_have_records_and_gaps_are_pending(reference) -> None:
    """A hazardous substance shows its codes, or says that nobody has supplied them."""
    for name, chemical in reference["chemicals"].items():
        for code in chemical["h_codes"] + chemical["pictograms"]:
            assert code.lower() in reference["codes"], (name, code)
        if chemical["signal"] == "pending":
            assert {"h_codes", "pictograms"} <= set(chemical["pending"]), name
            assert chemical["hazardous"], name
        if chemical["h_codes"]:
            assert chemical["hazardous"], name


def test_every_hazardous_substance_has_precautions_or_says_they_are_pending(reference) -> None:
    """No hazardous chemical lacks its protective equipment without saying so."""
    for kind in ("chemicals", "etchants"):
        for name, record in reference[kind].items():
            if record.get("hazardous", kind == "etchants"):
                assert (
                    record.get("precaution") in reference["precautions"] or "precaution" in record["pending"]
                ), name


@pytest.mark.parametrize(("etchant", "film", "expected", "source"), SENSITIVE)
def test_sensitive_pairs_say_what_was_published(
    reference, etchant: str, film: str, expected: str, source: str
) -> None:
    """The strongest evidence of a pair is the one its publication gives."""
    rates = [row for name, row in _rates(reference) if (name, row["film"]) == (etchant, film)]
    numbers = {(row["rank"], row["source"]) for row in rates if row["kind"] != "none_seen"}
    words = {
        (row["effect"], row["source"])
        for name, row in _statements(reference)
        if (name, row["film"]) == (etchant, film)
    }
    ranks = {rank for rank, _ in numbers}
    assert (expected, source) in numbers | words
    if expected == "unchecked":
        assert "literature" not in ranks
    if expected in {"peels", "cracks", "roughens", "oxidises", "residue", "swells"}:
        assert (expected, source) in words


def test_piranha_shows_both_figures_for_aluminium(reference) -> None:
    """Burns 2011, table 8.9, gives 850 A/s for Al and 30 A/s for Al-Si; neither hides the other."""
    found = {
        (row["film"], row["rate"])
        for name, row in _rates(reference)
        if name == "piranha" and row["source"] == "burns2011" and row["film"].startswith("al-")
    }
    assert found == {("al-evaporated", "850 A/s"), ("al-si", "30 A/s")}


def test_hot_phosphoric_keeps_the_two_surveys_apart(reference) -> None:
    """The 1996 value is recalled and unchecked; the 2003 value, 4.5 nm/min, was read and ranks above it."""
    found = {
        (row["source"], row["rank"], row["rate"])
        for name, row in _rates(reference)
        if name == "h3po4-hot-160" and row["film"] == "sin-lpcvd"
    }
    assert found == {("williams2003", "literature", "4.5 nm/min"), ("williams1996", "unchecked", "28 A/min")}


def test_no_record_names_a_web_host() -> None:
    """References keep organisation and title; an address would rot and is left out."""
    host = re.compile(r"https?:|www\.|\b[a-z0-9-]+\.(?:com|edu|gov|org|eu)\b")
    for path in REFERENCE.rglob("*.yaml"):
        lines = [
            line
            for line in path.read_text(encoding="utf-8").splitlines()
            if not line.startswith(("#", "doi:"))
        ]
        assert not host.search("\n".join(lines)), path.name
