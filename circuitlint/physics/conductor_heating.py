"""How warm a conductor runs."""

from __future__ import annotations

import numpy as np

from circuitlint.physics.formula import formula
from circuitlint.si import Ampere, Celsius, Kelvin, OhmPerMetre, Ratio, WattPerMetre
from circuitlint.sources import Source

THERMAL_CIRCUIT = Source("IEC 60287-1-1", "thermal equivalent circuit, steady state", known="value from memory")
FACTORS = Source("IEC 60364-5-52", "clause 523 and annex B", "2009", known="value from memory")
AMBIENT_TABLE = Source("IEC 60364-5-52", "table B.52.14, each entry reproduced by this form", "2009")


@formula("P'", "{I}² · {R'}", source=Source("Joule's law", known="derived"), validity="one conductor", current="I",
         resistance_per_length="R'")
def loss_per_metre(*, current: Ampere, resistance_per_length: OhmPerMetre) -> WattPerMetre:
    """P' = I² · R'"""
    return current**2 * resistance_per_length


@formula("Iz", "{It} · {ka} · {kg}", source=FACTORS, validity="factors of the same tables as the tabled value", tabled="It",
         ambient_factor="ka", grouping_factor="kg")
def corrected_ampacity(*, tabled: Ampere, ambient_factor: Ratio, grouping_factor: Ratio) -> Ampere:
    """Iz = It · ka · kg"""
    return tabled * ambient_factor * grouping_factor


@formula("ka", "√(({ϑm} − {ϑa}) / ({ϑm} − {ϑ0}))", source=AMBIENT_TABLE, validity="ambient below the highest temperature; else 0",
         ambient="ϑa", highest_temperature="ϑm", reference_ambient="ϑ0")
def ambient_factor(*, ambient: Celsius, highest_temperature: Celsius, reference_ambient: Celsius) -> Ratio:
    """ka = √((ϑm − ϑa) / (ϑm − ϑ0))"""
    return np.sqrt(np.maximum(highest_temperature - ambient, 0.0) / (highest_temperature - reference_ambient))


@formula(
    "ϑ", "({ϑa} + x · D · {B} / ({B} + {ϑm})) / (1 − x · D / ({B} + {ϑm})) with x = ({I} / {Iz})², D = {ϑm} − {ϑ0}",
    source=THERMAL_CIRCUIT, validity="steady state, x · D < B + ϑm; beyond that the conductor runs away", current="I",
    ampacity="Iz", ambient="ϑa", highest_temperature="ϑm", reference_ambient="ϑ0", inferred_zero="B",
)
def conductor_temperature(
    *, current: Ampere, ampacity: Ampere, ambient: Celsius, highest_temperature: Celsius, reference_ambient: Celsius,
    inferred_zero: Kelvin,
) -> Celsius:
    """ϑ = (ϑa + x · D · B / (B + ϑm)) / (1 − x · D / (B + ϑm))

    `ampacity` is corrected for grouping but not for ambient, which stands beside it. NaN beyond thermal runaway.
    """
    share = (current / ampacity) ** 2 * (highest_temperature - reference_ambient) / (inferred_zero + highest_temperature)
    left = 1.0 - share
    return np.where(left > 0.0, (ambient + share * inferred_zero) / np.where(left > 0.0, left, 1.0), np.nan)
