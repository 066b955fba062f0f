"""The closed sets of words that records use, one enum each."""

from __future__ import annotations

import enum


class Origin(enum.StrEnum):
    """Whose record it is: a published fact shipped with the program, or the lab's own."""

    REFERENCE = "reference"
    LAB = "lab"


class Trust(enum.StrEnum):
    """Whether a fact was seen in a text that quotes its source, or recalled."""

    READ = "read"
    RECALLED = "recalled"


class PartTrust(enum.StrEnum):
    """Trust in one part of a chemical's record; a gap is a part that nobody has found."""

    READ = "read"
    RECALLED = "recalled"
    GAP = "gap"


class Confidence(enum.StrEnum):
    """How sure it is that a published number belongs to this film in this etchant."""

    HIGH = "high"
    MEDIUM = "medium"
    LOW = "low"


class Method(enum.StrEnum):
    """How a film is removed."""

    WET = "wet"
    VAPOUR = "vapour"
    PLASMA = "plasma"
    CYCLIC = "cyclic"
    LIFT_OFF = "lift-off"


class State(enum.StrEnum):
    """The state in which an etchant reaches the film."""

    LIQUID = "liquid"
    VAPOUR = "vapour"
    PLASMA = "plasma"


class FilmFamily(enum.StrEnum):
    """The family of a film: it decides the drawing and groups matrices, never a verdict."""

    SEMICONDUCTOR = "semiconductor"
    OXIDE = "oxide"
    NITRIDE = "nitride"
    METAL = "metal"
    POLYMER = "polymer"
    RESIST = "resist"
    OTHER = "other"


class FilmClass(enum.StrEnum):
    """A film as deposited, or a name for several films, whose rates are hints only."""

    FILM = "film"
    FAMILY = "family"


class Electrical(enum.StrEnum):
    """What a film is in a galvanic couple."""

    METAL = "metal"
    SEMICONDUCTOR = "semiconductor"
    INSULATOR = "insulator"


class Barrier(enum.StrEnum):
    """Whether a liquid or vapour passes a film before the film is gone; only `dense` stops it."""

    DENSE = "dense"
    COLUMNAR = "columnar"
    PINHOLED = "pinholed"
    UNKNOWN = "unknown"


class SigmaClass(enum.StrEnum):
    """Whether a film is so well defined that published wet rates carry over closely."""

    CLOSE = "close"
    OTHER = "other"


class RateKind(enum.StrEnum):
    """What a published number is."""

    RATE = "rate"
    RANGE = "range"
    UPPER_LIMIT = "upper_limit"
    LOWER_LIMIT = "lower_limit"
    NONE_SEEN = "none_seen"


class PublishedRank(enum.StrEnum):
    """Rank of a published rate; `unchecked` if it is recalled or rests on a guess."""

    LITERATURE = "literature"
    UNCHECKED = "unchecked"


class Effect(enum.StrEnum):
    """What an etchant is said to do to a film."""

    ATTACKS = "attacks"
    RESISTS = "resists"
    PEELS = "peels"
    SWELLS = "swells"
    ROUGHENS = "roughens"
    CRACKS = "cracks"
    OXIDISES = "oxidises"
    RESIDUE = "residue"


class CoupleEffect(enum.StrEnum):
    """What the contact of two films does in an etchant."""

    NONE = "none"
    ATTACKS = "attacks"
    UNDERCUT = "undercut"


class Bath(enum.StrEnum):
    """How a bath keeps its temperature."""

    THERMOSTATED = "thermostated"
    OPEN = "open"
    SELF_HEATING = "self-heating"


class PublishedConditions(enum.StrEnum):
    """Whether reactor and settings are those under which the rates were published."""

    SAME = "same"
    DIFFERENT = "different"


class Status(enum.StrEnum):
    """State of a recipe."""

    DRAFT = "draft"
    PROVEN = "proven"
    RETIRED = "retired"


class AfterStepKind(enum.StrEnum):
    """What a step after the etch is for."""

    RINSE = "rinse"
    QUENCH = "quench"
    STRIP = "strip"
    PASSIVATE = "passivate"
    DRY = "dry"
    OTHER = "other"


class ToolKind(enum.StrEnum):
    """Kind of a bench or chamber."""

    BENCH = "bench"
    VAPOUR = "vapour"
    PLASMA = "plasma"
    DEEP_SILICON = "deep-silicon"
    ASH = "ash"


class Signal(enum.StrEnum):
    """GHS signal word."""

    DANGER = "danger"
    WARNING = "warning"
    NONE = "none"
    PENDING = "pending"


class ExposureKind(enum.StrEnum):
    """Kind of an exposure limit: average, short term, ceiling (over so many minutes), immediate danger."""

    TWA = "TWA"
    STEL = "STEL"
    C = "C"
    C10 = "C10"
    C15 = "C15"
    IDLH = "IDLH"


class SideKind(enum.StrEnum):
    """What one side of a mixing rule names."""

    CHEMICAL = "chemical"
    GROUP = "group"
    FILM_GROUP = "film_group"
    ETCHANT = "etchant"
    CONTAINER = "container"
    MATERIAL = "material"


class MixingSeverity(enum.StrEnum):
    """Whether a plan with both sides is refused, or carries a caution."""

    FORBID = "forbid"
    CAUTION = "caution"


class FitnessVerdict(enum.StrEnum):
    """Whether a container material stands a chemical."""

    USABLE = "usable"
    LIMITED = "limited"
    NOT_USABLE = "not-usable"


class CodeKind(enum.StrEnum):
    """Kind of a GHS code."""

    H_STATEMENT = "h-statement"
    EU_STATEMENT = "eu-statement"
    PICTOGRAM = "pictogram"
    PRECEDENCE = "precedence"


class HazardKind(enum.StrEnum):
    """Where a plasma hazard sits."""

    GAS = "gas"
    CHAMBER = "chamber"
    FILM = "film"
    BY_PRODUCT = "by-product"
    PUMP = "pump"
    RESIDUE = "residue"


class Role(enum.StrEnum):
    """Where a film stands on a sample: in the stack, elsewhere in reach of the etch, or on the back."""

    MASK = "mask"
    TARGET = "target"
    UNDER = "under"
    EXPOSED = "exposed"
    BACK = "back"


class Exposure(enum.StrEnum):
    """Which part of a film the etch reaches."""

    FACE = "face"
    SIDEWALL = "sidewall"
    BOTH_FACES = "both-faces"


class Surface(enum.StrEnum):
    """`critical`: roughening counts as loss of the film."""

    CRITICAL = "critical"


class Edge(enum.StrEnum):
    """Whether the edge of a sample is open to the etch."""

    OPEN = "open"
    PROTECTED = "protected"
    UNUSED = "unused"


class Treatment(enum.StrEnum):
    """A step of a sequence that is no etch of the target."""

    DEVELOP = "develop"
    STRIP = "strip"
    CLEAN = "clean"
    REWORK = "rework"
    RINSE = "rinse"
