"""What a sample file says, as a record."""

from __future__ import annotations

import json
import math

from builder.records.samples import Sample
from builder.records.terms import Edge, Exposure, Origin, Role, Surface

DATA = {
    "layers": [
        {"film": "resist", "thickness": "1.4 um", "role": "mask"},
        {"film": "oxide", "thickness": "500 nm +/- 10 nm", "role": "target"},
        {"film": "nitride", "thickness": "0.1 um", "role": "target"},
        {
            "film": "si",
            "thickness": "525 um",
            "role": "under",
            "allowed_loss": "20 nm",
            "surface": "critical",
        },
    ],
    "also_exposed": [
        {"film": "al", "thickness": "300 nm", "allowed_loss": "any", "exposed": "both-faces", "on": "ti"}
    ],
    "back": {"film": "oxide", "thickness": "500 nm"},
    "edge": "open",
    "goal": {"depth": "300 nm", "window": "5 um", "load_cm2": 12},
    "steps": [{"treat": "develop", "etchant": "tmah", "time": "60 s"}, {"etch": "any"}],
}


def sample(**changes: object) -> Sample:
    """Return the sample with some fields changed."""
    return Sample.from_raw({**DATA, **changes}, "somewhere/membrane.yaml", Origin.LAB)


def test_layers_keep_their_order_role_and_place() -> None:
    """Top first, as written."""
    found = sample()
    assert [layer.role for layer in found.layers] == [Role.MASK, Role.TARGET, Role.TARGET, Role.UNDER]
    assert [layer.pointer for layer in found.layers] == [f"/layers/{index}" for index in range(4)]
    assert [target.film for target in found.targets] == ["oxide", "nitride"]


def test_thickness_tolerance_and_loss_are_in_nanometres() -> None:
    """Not stated is None, never 0; `any` is without end."""
    found = sample()
    assert found.layers[0].thickness_nm == 1400
    assert (found.layers[0].tolerance_nm, found.layers[0].allowed_loss_nm) == (None, None)
    assert found.layers[1].tolerance_nm == 10
    assert found.layers[3].allowed_loss_nm == 20
    assert found.layers[3].surface is Surface.CRITICAL
    assert found.also_exposed[0].allowed_loss_nm == math.inf


def test_exposed_films_and_back_get_their_role() -> None:
    """The file does not say it, the place does."""
    found = sample()
    assert found.also_exposed[0].role is Role.EXPOSED
    assert found.also_exposed[0].exposed is Exposure.BOTH_FACES
    assert found.back is not None
    assert (found.back.role, found.is_back_protected) == (Role.BACK, False)
    assert len(found.films) == 6


def test_a_back_that_is_protected_or_not_stated() -> None:
    """The two are not the same."""
    assert (sample(back="protected").back, sample(back="protected").is_back_protected) == (None, True)
    bare = Sample.from_raw({"layers": DATA["layers"]}, "x.yaml", Origin.LAB)
    assert (bare.back, bare.is_back_protected, bare.edge) == (None, False, None)
    assert sample().edge is Edge.OPEN


def test_depth_in_words_and_in_numbers() -> None:
    """Through the targets is what no depth means."""
    depth = sample().goal.depth
    assert depth is not None
    assert depth.number == 300
    through = sample(goal={"depth": "through"}).goal
    assert (through.depth, through.is_through_wafer) == (None, False)
    assert sample(goal={"depth": "through-wafer"}).goal.is_through_wafer


def test_an_unnamed_sample_is_called_as_its_file() -> None:
    """And its data are kept as they were read."""
    found = sample()
    assert (found.sample, found.id) == ("membrane", "membrane")
    assert json.loads(found.json_text) == DATA


def test_steps_are_treatments_or_etches() -> None:
    """In order."""
    first, second = sample().steps
    assert (first.treat, first.etchant, first.etch) == ("develop", "tmah", None)
    assert (second.treat, second.etch) == (None, "any")
