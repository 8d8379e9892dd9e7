"""How slow a coil is for the contact that breaks its current, against what the contact was proven with."""

from __future__ import annotations

import numpy as np

from circuitlint.physics.dimensions import SecondPerWatt
from circuitlint.physics.formula import formula
from circuitlint.si import Ratio, Second, Watt
from circuitlint.sources import Source

BUILD_UP = Source("OpenStax University Physics vol. 2", "14.4 RL Circuits")
CATEGORY = Source("IEC 60947-5-1", "utilization category DC-13, empirical time constant", note="read in a wiring handbook")


@formula(
    "t",
    "−{T} · ln(1 − {s})",
    source=BUILD_UP,
    validity="linear resistance and inductance; 0.95 is three time constants, as contact categories state it",
    time_constant="T",
    share="s",
)
def time_to_share(*, time_constant: Second, share: Ratio) -> Second:
    """t = −T · ln(1 − s)"""
    return -time_constant * np.log1p(-share)


@formula(
    "T95",
    "min({k} · {P}, {Tm})",
    source=CATEGORY,
    validity="direct-current electromagnets; 6 ms/W and at most 300 ms in the standard",
    time_per_watt="k",
    power="P",
    longest="Tm",
)
def category_time(*, time_per_watt: SecondPerWatt, power: Watt, longest: Second) -> Second:
    """T95 = min(k · P, Tm)"""
    return np.minimum(time_per_watt * power, longest)
