"""The record of a set of readings: what was read, what follows, how it stands to the prediction, what it may mean.

Kept apart from the review record, with a format number of its own. The same inputs give the same bytes.
"""

from __future__ import annotations

from typing import Literal

from pydantic import Field

from circuitlint.review.record import Document, Part, Place, Problem

READINGS_FORMAT = 1

Statement = Literal["conforms", "conforms, with doubt", "nonconforming, with doubt", "nonconforming", "not assessed"]
Agreement = Literal["inside", "inside, with doubt", "outside, with doubt", "outside", "not assessed"]
DecisionRule = Literal["simple", "guarded"]
Standing = Literal["for", "against", "neither"]


class InputRead(Part):
    """One quantity as it was read."""

    quantity: str = Field(description="Name of the quantity, such as `voltage`.")
    dimension: str = Field(description="Name of the dimension.")
    value: float = Field(description="Reading, or the mean of repeated ones, in the SI unit.")
    sets: int = Field(description="Number of observations.")
    uncertainty: float | None = Field(description="Standard uncertainty; null where nothing says how accurate the reading is.")
    instrument: str = Field(default="", description="Name of the instrument; empty where none is stated.")
    range: float | None = Field(default=None, description="Range of the instrument's input.")
    place: Place = Field(description="Where in the readings file it stands.")


class BudgetLine(Part):
    """How much of a result's variance one contribution brings."""

    what: str = Field(description="The contribution.")
    share: float = Field(description="Share of the variance of the result.")


class Measured(Part):
    """One result with its uncertainty, beside what was predicted."""

    name: str = Field(description="Trade word of the quantity, as figures have it.")
    dimension: str = Field(description="Name of the dimension.")
    value: float = Field(description="Value in the SI unit.")
    uncertainty: float | None = Field(description="Standard uncertainty to first order; null where it is not known.")
    degrees: float | None = Field(description="Effective degrees of freedom; null where they are infinite or not valid.")
    low: float | None = Field(description="Lower end of the coverage interval.")
    high: float | None = Field(description="Upper end of the coverage interval.")
    coverage: float = Field(description="Share of the possible values that the interval holds.")
    by: str = Field(description="What the interval rests on.")
    sampled_uncertainty: float | None = Field(default=None, description="Standard deviation found by Monte Carlo.")
    first_order_agrees: bool = Field(default=False, description="Whether the first-order interval agrees with the sampled one.")
    lost: float = Field(default=0.0, description="Share of Monte Carlo trials that gave no physical result.")
    budget: tuple[BudgetLine, ...] = Field(default=(), description="Contributions, largest first.")
    predicted: tuple[float, float, float] | None = Field(default=None, description="Nominal, lowest, highest predicted value.")
    predicted_from: str = Field(default="", description="Which figure or datum the prediction is.")
    agreement: Agreement = Field(default="not assessed", description="How the interval lies to the predicted range.")
    deviation: float | None = Field(
        default=None, description="Distance from the middle of the prediction over both standard uncertainties together."
    )
    why: str = Field(default="", description="Why it was not assessed.")


class LimitJudged(Part):
    """A limit of the review judged again with a measured value."""

    check: str = Field(description="The review check's `id`.")
    rule: str = Field(description="Name of the rule.")
    figure: str = Field(description="Name of the figure.")
    of: str = Field(description="Part; empty for the circuit.")
    state: str = Field(description="State.")
    sense: Literal["at least", "at most"] = Field(description="Which side of the limit conforms.")
    dimension: str = Field(description="Name of the dimension.")
    limit: float = Field(description="The limit.")
    value: float = Field(description="Measured value.")
    low: float | None = Field(description="Lower end of its coverage interval.")
    high: float | None = Field(description="Upper end of its coverage interval.")
    statement: Statement = Field(description="Which of four statements the value earns.")
    accepted: bool = Field(description="Whether the decision rule accepts it.")
    reviewed: str = Field(description="What the review found of the same check, before installation.")
    why: str = Field(default="", description="Why it was not assessed.")


class Evidence(Part):
    """One reading that speaks for or against an explanation."""

    what: str = Field(description="Name of the reading.")
    dimension: str = Field(description="Name of the dimension.")
    read: float = Field(description="What was read.")
    expected: float = Field(description="What would be read if the explanation were true.")
    without: float = Field(description="What would be read if all were as defined.")
    away: float = Field(description="Distance of the reading from what is expected, in joint standard uncertainties.")
    away_without: float = Field(description="The same with all as defined.")
    standing: Standing = Field(description="For, against, or neither.")


class Explanation(Part):
    """What the readings may mean."""

    name: str = Field(description="Trade word, such as `shorted-turns`.")
    what: str = Field(description="In one sentence.")
    certainty: Literal["explains it alone", "explains it best", "explains it too", "directly read"] = Field(
        description="How far the readings set it apart; never a proof."
    )
    weight: float = Field(description="How well it tells the readings, against the best one: 1 for the best.")
    amount: str = Field(default="", description="How much of it fits best, in words.")
    evidence: tuple[Evidence, ...] = Field(default=(), description="Readings for and against.")
    check: str = Field(default="", description="What would settle it.")


class Remark(Part):
    """What a rule on readings has to say."""

    rule: str = Field(description="Name of the rule.")
    what: str = Field(description="What is.")
    help: str = Field(default="", description="What would help.")
    severity: Literal["major", "minor", "observation"] = Field(default="observation", description="Its severity.")
    place: Place = Field(description="Where in the readings file.")


class ReadingResult(Part):
    """One entry of a readings file, evaluated."""

    tag: str = Field(description="Circuit.")
    serves: str = Field(default="", description="What the circuit serves.")
    state: str = Field(description="State.")
    of: str = Field(description="Part that was measured; empty for the circuit at its origin.")
    taken_on: str = Field(default="", description="Day.")
    by: str = Field(default="", description="Who took it.")
    note: str = Field(default="", description="As written.")
    place: Place = Field(description="Where in the readings file it stands.")
    method: str = Field(description="How the results follow from the readings.")
    notes: tuple[str, ...] = Field(description="What a reader must know.")
    inputs: tuple[InputRead, ...] = Field(description="What was read.")
    results: tuple[Measured, ...] = Field(description="What follows.")
    correlation: dict[str, float] = Field(description="Correlation of results, by `one, other`.")


class CircuitReadings(Part):
    """All readings of one circuit together."""

    tag: str = Field(description="Circuit.")
    limits: tuple[LimitJudged, ...] = Field(description="Limits judged again.")
    not_measured: int = Field(description="Checks with a limit for which no reading speaks.")
    departs: bool | None = Field(
        description="Whether the readings together depart from the prediction beyond chance; null where it could not be told."
    )
    misfit: float | None = Field(description="Chance of readings at least so far from the prediction, all being as defined.")
    explanations: tuple[Explanation, ...] = Field(description="What the difference may mean, likeliest first.")
    told: str = Field(default="", description="What can be said of the whole, in one sentence.")


class InstrumentUsed(Part):
    """An instrument as the readings file states it."""

    name: str = Field(description="Name in the readings file.")
    called: str = Field(default="", description="What a person calls it.")
    serial: str = Field(default="", description="Serial number.")
    category: str = Field(default="", description="Measurement category.")
    true_rms: bool | None = Field(default=None, description="Whether it reads true rms.")
    calibrated: str = Field(default="", description="Day of its calibration.")
    calibration_due: str = Field(default="", description="Day the next one is due.")
    inputs: dict[str, str] = Field(description="Accuracy by input, as stated.")


class ReadingsRecord(Part):
    """One set of readings held against one review."""

    format: Literal[1] = Field(default=1, description="Format of the record.")
    title: str = Field(description="Title of the readings, or of the definition.")
    tool: str = Field(description="Name of the tool.")
    version: str = Field(description="Version of the tool.")
    taken_on: str = Field(default="", description="Day.")
    by: str = Field(default="", description="Who took the readings.")
    witness: str = Field(default="", description="Who saw it.")
    ruleset: str = Field(description="Name of the ruleset of the review.")
    decision_rule: DecisionRule = Field(description="Decision rule in force.")
    coverage: float = Field(description="Share of the possible values that each interval holds.")
    seed: int = Field(description="Seed of the Monte Carlo runs.")
    trials: int = Field(description="Trials of each Monte Carlo run.")
    definition: tuple[Document, ...] = Field(description="Files of the definition and ruleset, with digests.")
    documents: tuple[tuple[str, str], ...] = Field(description="Readings files, with digests.")
    instruments: tuple[InstrumentUsed, ...] = Field(description="Instruments stated.")
    readings: tuple[ReadingResult, ...] = Field(description="Every entry, in file order.")
    circuits: tuple[CircuitReadings, ...] = Field(description="Every circuit read, in the order of the definition.")
    remarks: tuple[Remark, ...] = Field(default=(), description="What rules on readings have to say.")
    problems: tuple[Problem, ...] = Field(default=(), description="Rules that failed.")
    not_read: tuple[str, ...] = Field(description="Circuits of the definition of which nothing was read.")
    unfilled: int = Field(default=0, description="Lines of test sheets left empty.")
    sources: tuple[str, ...] = Field(description="Works the evaluation follows.")
    held: bool = Field(description="Whether a circuit departs from its prediction, a limit is not accepted, or a remark major.")
    statement: str = Field(description="Who prevails.")
