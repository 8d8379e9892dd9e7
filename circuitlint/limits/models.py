"""Rulesets as validated data: limits with their sources, severities, and one set laid over another."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass, field
from typing import Annotated, Literal, TypeAlias

from pydantic import BaseModel, ConfigDict, Field

from circuitlint.quantity import Quantity
from circuitlint.si import Dimension
from circuitlint.sources import Known, Source

Severity: TypeAlias = Literal["major", "minor", "observation"]
Occasion: TypeAlias = Literal["nominal", "worst_case", "near_limit", "kind", "not_assessed"]
OCCASIONS: tuple[Occasion, ...] = ("nominal", "worst_case", "near_limit", "kind", "not_assessed")


class Setting(BaseModel):
    """Base of every entry of a ruleset file."""

    model_config = ConfigDict(frozen=True, extra="forbid")


class SourceSetting(Setting):
    """Where a limit comes from and how its value is known."""

    work: str = ""
    place: str = ""
    edition: str = ""
    known: Known
    note: str = ""


class SeveritySetting(Setting):
    """Severity of a finding, by what it rests on."""

    nominal: Severity | None = Field(default=None, description="The nominal figure is beyond the limit.")
    worst_case: Severity | None = Field(default=None, description="Only the worst case is beyond the limit.")
    near_limit: Severity | None = Field(default=None, description="The worst case is close to the limit.")
    kind: Severity | None = Field(default=None, description="A matter of kind, with no figure to it.")
    not_assessed: Severity | None = Field(default=None, description="The check could not be made.")


class LimitSetting(Setting):
    """One limit: its value as text, and its source by name."""

    value: str
    source: str = Field(min_length=1, description="Key under `sources`.")


class RuleSetting(Setting):
    """One rule's limits and severities."""

    required: bool | None = Field(default=None, description="Whether a review that loses this rule is held.")
    severities: SeveritySetting = SeveritySetting()
    limits: dict[str, LimitSetting] = Field(default_factory=dict)
    left_out: bool = Field(default=False, description="Take a rule of the ruleset built on out of the review.")


class RulesetFile(Setting):
    """A ruleset file."""

    format: Literal["1"]
    name: Annotated[str, Field(pattern=r"^[a-z0-9]+(-[a-z0-9]+)*$", max_length=60)]
    title: str = Field(min_length=1)
    edition: Annotated[str, Field(pattern=r"^\d{4}-\d{2}-\d{2}$", description="Date of this edition.")]
    jurisdiction: str = Field(min_length=1, description="Where the limits come from and what prevails over them.")
    statement: str = Field(default="", description="The statement that local codes and the responsible person prevail.")
    built_on: str = Field(default="", description="Name of a ruleset whose limits hold where this one is silent.")
    near_the_limit: str = Field(default="", description="Room that counts as close to a limit, as a share of it.")
    decision_rule: Literal["simple", "guarded"] | None = Field(
        default=None, description="How readings are held against limits: by the value, or with its uncertainty as a guard band."
    )
    sources: dict[str, SourceSetting] = Field(default_factory=dict)
    rules: dict[str, RuleSetting] = Field(default_factory=dict)


@dataclass(frozen=True, slots=True)
class LimitSpec:
    """What a rule says of one of its limits: dimension and meaning."""

    dimension: Dimension
    meaning: str


@dataclass(frozen=True, slots=True)
class Limit:
    """A resolved limit: a quantity with its source, where it stands and who set it."""

    name: str
    quantity: Quantity
    source: Source
    path: str
    set_by: str

    @property
    def value(self) -> float:
        """The limit in the SI unit of its dimension."""
        return self.quantity.nominal


@dataclass(frozen=True, slots=True)
class RawLimit:
    """A limit as a ruleset states it, before a rule says which dimension it has."""

    text: str
    source: Source
    source_key: str
    set_by: str
    file: str
    line: int
    column: int


@dataclass(slots=True)
class RuleTerms:
    """What the resolved ruleset says of one rule."""

    required: bool = False
    severities: dict[Occasion, Severity] = field(default_factory=dict)
    limits: dict[str, RawLimit] = field(default_factory=dict)
    place: tuple[str, int, int] = ("", 1, 1)


@dataclass(slots=True)
class Ruleset:
    """A resolved ruleset: one file laid over those it is built on."""

    name: str
    title: str
    edition: str
    jurisdiction: str
    statement: str
    near_the_limit: float
    built_on: tuple[str, ...]
    sha256: str
    rules: dict[str, RuleTerms]
    documents: tuple[tuple[str, str], ...] = ()
    decision_rule: Literal["simple", "guarded"] = "guarded"


Limits: TypeAlias = Mapping[str, Limit]
