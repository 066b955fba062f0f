"""Films as deposited, and families of films."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Annotated

from builder.records.conversion import Density, Key, MolarMass
from builder.records.record import Record
from builder.records.terms import Barrier, Electrical, FilmClass, FilmFamily, SigmaClass, Trust


@dataclass(frozen=True, slots=True, kw_only=True)
class Film(Record):
    """
    One film as deposited, or a family of films (`film_class`, written `class` in the file).

    `barrier` other than dense lets liquid and HF vapour through at once. `sigma_class` None means
    that nobody called the film close; it then counts as other. `electrical` None is unknown.
    """

    name: str
    family: FilmFamily
    film_class: Annotated[FilmClass, Key("class")]
    barrier: Barrier
    synonyms: tuple[str, ...] = ()
    formula: str | None = None
    members: tuple[str, ...] = ()
    deposition: str | None = None
    electrical: Electrical | None = None
    noble: bool | None = None
    similar: tuple[str, ...] = ()
    density: Density | None = None
    molar_mass: MolarMass | None = None
    refractive_index: float | None = None
    adhesion_layer_usual: tuple[str, ...] = ()
    groups: tuple[str, ...] = ()
    crystalline_silicon: bool | None = None
    sigma_class: SigmaClass | None = None
    note: str | None = None
    source: str | None = None
    trust: Trust | None = None
    pending: tuple[str, ...] = ()

    @property
    def is_family(self) -> bool:
        """Tell whether the name stands for several films, so that its facts are hints only."""
        return self.film_class is FilmClass.FAMILY
