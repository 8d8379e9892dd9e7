"""The common rules are held to what every author's rule is held to."""

from __future__ import annotations

import json

import circuitlint_rules
import pytest
import yaml

from circuitlint import demo
from circuitlint.testing import hold_to_promises

# An alternating-current magnet, the same with its capacitor, and a direct-current valve.
SHOWN_ON = ("=R3-Y1", "=R3-Y2", "=F1-Y1")


@pytest.mark.parametrize("tag", SHOWN_ON)
def test_every_common_rule_keeps_its_promises_on_a_circuit_of_the_demo(tag: str) -> None:
    whole = yaml.safe_load(demo.content()[1])
    (circuit,) = [one for one in whole["circuits"] if one["tag"] == tag]
    alone = json.dumps({**whole, "circuits": [circuit], "concessions": []})
    hold_to_promises(alone, *circuitlint_rules.circuitlint_rules(), ruleset="low-voltage-50hz")
