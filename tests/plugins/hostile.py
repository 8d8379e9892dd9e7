"""Plugins that misbehave, as text: each offers the rule `house-check`, or would."""

from __future__ import annotations

NAME = "house-check"
_HEAD = """\
import sys

from circuitlint.authoring import Fact, Rule, ask, at_least, at_most, offers


class HouseCheck(Rule):
    name = "house-check"
    title = "A check of the house"
    purpose = "It is here to go wrong."
    applies_to = "every circuit"
    figures = ("current",)
    states = ("cold",)
    needs = ()
    helps = "nothing"

    def check(self, circuit, limits):
        {body}


@offers
def circuitlint_rules():
    return [HouseCheck]
"""


def rule(body: str) -> str:
    """A plugin whose rule does this."""
    return _HEAD.format(body="\n        ".join(body.strip().splitlines()))


NOTHING = 'yield Fact("nothing", "nothing")\n'

LOADING = {
    "load error": "import a_module_that_is_nowhere\n",
    "syntax error": "def circuitlint_rules(:\n",
    "wrong types": 'from circuitlint.authoring import offers\n@offers\ndef circuitlint_rules():\n    return ["house-check"]\n',
    "no list": "from circuitlint.authoring import offers\n@offers\ndef circuitlint_rules():\n    return None\n",
    "a text for a tuple": rule(NOTHING).replace('figures = ("current",)', 'figures = "current"'),
    "an unknown state": rule(NOTHING).replace('states = ("cold",)', 'states = ("colt",)'),
    "a duplicate name": rule(NOTHING).replace('name = "house-check"', 'name = "voltage-drop"'),
    "a rule twice": rule(NOTHING).replace("return [HouseCheck]", "return [HouseCheck, HouseCheck]"),
    "a misspelt hook": rule(NOTHING).replace("def circuitlint_rules", "def circuitlint_ruels"),
    "a bare hook": rule(NOTHING).replace("@offers\n", ""),
    "a hook that raises": rule(NOTHING).replace("return [HouseCheck]", 'raise RuntimeError("no rules today")'),
    "a hook that exits": rule(NOTHING).replace("return [HouseCheck]", "sys.exit(0)"),
    "an exit while loading": "raise SystemExit(0)\n",
    "an interrupt while loading": "raise KeyboardInterrupt\n",
    "no check": rule(NOTHING).replace("def check", "def chekc"),
}
"""Plugins that never come to offer their rule, by misbehaviour."""

TOLD_OF_LOADING = {
    "load error": "a_module_that_is_nowhere",
    "syntax error": "SyntaxError",
    "wrong types": "not a Rule class",
    "no list": "NoneType; accepted: a list",
    "a text for a tuple": "`figures`; accepted: a tuple of texts",
    "an unknown state": "did you mean 'cold'?",
    "a duplicate name": "the rule name 'voltage-drop' is taken by circuitlint_rules",
    "a rule twice": "twice",
    "a misspelt hook": "did you mean 'circuitlint_rules'?",
    "a bare hook": "not decorated",
    "a hook that raises": "no rules today",
    "a hook that exits": "it ends the program",
    "an exit while loading": "it ends the program",
    "an interrupt while loading": "KeyboardInterrupt",
    "no check": "abstract",
}

RUNNING = {
    "an exception on one circuit": 'if circuit.tag == "=R3-Y1":\n    1 / 0\nyield Fact("looked at", "it was looked at")',
    "an exception half way": 'yield Fact("looked at", "it was looked at")\nraise LookupError("half way")',
    "an exit": "sys.exit(0)\nyield",
    "an interrupt": "raise KeyboardInterrupt\nyield",
    "an exception of its own kind": 'raise type("Stop", (BaseException,), {})("enough")\nyield',
    "an exception that cannot be printed": 'class Odd(Exception):\n    def __str__(self):\n        raise ValueError\nraise Odd\nyield',
    "not a number": "from dataclasses import replace\nasked = ask(circuit, 'current', 'cold')\n"
    "if hasattr(asked.found, 'nominal'):\n    asked = replace(asked, found=replace(asked.found, nominal=float('nan')))\n"
    "else:\n    asked = float('nan')\nfrom circuitlint.authoring import Comparison\nyield Comparison(asked, 'at most', None)",
    "a number in place of outcomes": "return float('nan')",
    "nothing": "return []",
    "something else": 'yield "conforms"',
    "a circuit that is not there": "from dataclasses import replace\n"
    "yield at_most(replace(ask(circuit, 'current', 'cold'), tag='=X99-Y99'), None)",
    "no end": 'number = 0\nwhile True:\n    number += 1\n    yield Fact(f"fact {number}", "and so on")',
    "emptied lists": "(circuit.entry.cable or []).clear()\nyield Fact('emptied', 'emptied')",
    "a part taken out": "circuit.entry.__dict__['meter'] = None\nyield Fact('taken out', 'taken out')",
    "a quantity changed": "object.__setattr__(circuit.supply.voltage, 'high', 1.0)\nyield Fact('changed', 'changed')",
    "a list written to": "circuit.entry.cable.append(1)\nyield Fact('changed', 'changed')",
    "a study emptied": "circuit.solutions = {}\nyield Fact('emptied', 'emptied')",
    "a solution exchanged": "for one in circuit.solutions.values():\n    one.nominal = one.nominal * 0\nyield Fact('x', 'x')",
    "figures overwritten": "for one in circuit.solutions.values():\n    one.nominal[:] = 0.0\nyield Fact('x', 'x')",
    "data overwritten": "circuit.data.data.clear()\nyield Fact('x', 'x')",
    "data exchanged": "circuit.data.data = {}\nyield Fact('x', 'x')",
    "a worksheet exchanged": "for one in circuit.solutions.values():\n    one.sheet.lacks = {}\nyield Fact('x', 'x')",
    "limits overwritten": "limits['circuit'] = None\nyield Fact('x', 'x')",
}
"""What a rule does on a circuit, by misbehaviour; each loses the rule there."""

TOLD_OF_RUNNING = {
    "an exception on one circuit": "ZeroDivisionError",
    "an exception half way": "half way",
    "an exit": "it ends the program",
    "an interrupt": "KeyboardInterrupt",
    "an exception of its own kind": "Stop: enough",
    "an exception that cannot be printed": "its message cannot be read",
    "not a number": "its figure current is not a finite number",
    "a number in place of outcomes": "check gives nan",
    "nothing": "yields nothing",
    "something else": "yielded str",
    "a circuit that is not there": "'=X99-Y99', which is not the one it was given",
    "no end": "does not come to an end",
    "emptied lists": "it changes the study",
    "a part taken out": "it changes the study",
    "a quantity changed": "it changes the study",
    "a list written to": "it changes the study",
    "a study emptied": "it changes the study",
    "a solution exchanged": "it changes the study",
    "data exchanged": "it changes the study",
    "a worksheet exchanged": "it changes the study",
    "figures overwritten": "read-only",
    "data overwritten": "attribute 'clear'",
    "limits overwritten": "does not support item assignment",
}

PRINTING = 'print("so far so good")\nsys.stdout.write("and so on")\nyield Fact("looked at", "it was looked at")'
