"""Readings files: every fault with its place and what would be accepted; filled-in test sheets are read alike."""

from __future__ import annotations

import csv
import io

import pytest

from circuitlint.errors import ReadingsError
from circuitlint.readings.accuracy import Accuracy
from circuitlint.readings.reading import read_readings
from circuitlint.readings.test_sheet import full_scale, make
from circuitlint.reports import readings_sheet
from tests.readings.held import held, reviewed

PARTS = {"AC": ["circuit", "load", "load.coil"]}
INSTRUMENT = "instruments:\n  m: {inputs: {voltage: {accuracy: ± (1 % + 2), resolution: 0.1 V}}}\n"


def faults(text: str, name: str = "r.yaml") -> list[str]:
    with pytest.raises(ReadingsError) as caught:
        read_readings([(name, text.encode())], PARTS)
    return [str(one) for one in caught.value.faults]


@pytest.mark.parametrize(("line", "place", "told"), [
    ("{tag: AC, voltage: '229,8 V'}", "r.yaml:3:24", "a decimal comma"),
    ("{tag: AC, voltage: 229.8}", "r.yaml:3:24", "has no unit"),
    ("{tag: AC, voltage: 229.8 A}", "r.yaml:3:24", "is a current, not a voltage"),
    ("{tag: AC, voltge: 229.8 V}", "r.yaml:3:15", "did you mean 'voltage'?"),
    ("{tag: AD, voltage: 229.8 V}", "r.yaml:3:11", "no circuit has the tag 'AD'"),
    ("{tag: AC, state: stedy, voltage: 229.8 V}", "r.yaml:3:22", "did you mean 'steady'?"),
    ("{tag: AC, of: load.coyl, voltage: 229.8 V}", "r.yaml:3:19", "AC has no part 'load.coyl'"),
    ("{tag: AC, taken_on: 2027-02-30, voltage: 229.8 V}", "r.yaml:3:25", "'2027-02-30' is not a date"),
    ("{tag: AC, instrument: meter, voltage: 229.8 V}", "r.yaml:3:27", "no instrument is named 'meter'"),
    ("{tag: AC, four_wire: perhaps, resistance: 3 ohm}", "r.yaml:3:26", "neither yes nor no"),
    ("{tag: AC}", "r.yaml:3:5", "nothing was read"),
    ("{tag: AC, repeats: [{voltage: 1 V}, {current: 1 A}]}", "r.yaml:3:5", "do not hold the same quantities"),
    ("{tag: AC, voltage: 1 V, repeats: [{voltage: 1 V}]}", "r.yaml:3:5", "both in the sets and beside them"),
    ("{tag: AC, total_voltage: 1 V, resistor_voltage: 1 V, coil_voltage: 1 V}", "r.yaml:3:30", "three-voltage method lacks"),
])
def test_a_faulty_reading_is_told_with_its_place(line: str, place: str, told: str) -> None:
    (fault,) = faults(f"format: 1\nreadings:\n  - {line}\n")
    assert fault.startswith(place + ":")
    assert told in fault


def test_all_faults_of_a_file_are_told_in_one_go() -> None:
    text = "format: 1\nreadings:\n  - {tag: AC, voltage: 1, current: 2}\n  - {tag: AC, taken_on: soon, voltage: 1 V}\n"
    assert len(faults(text)) == 3


@pytest.mark.parametrize(("text", "told"), [
    ("", "the file is empty"), ("- 1", "not a mapping"), ("format: 1\n", "no readings"), ("a: [", "not YAML"),
    ("format: 1\nreadings: [{tag: AC, voltage: 1 V}]\ninstruments: {m: {calibrated: 2027-01-02, calibration_due: 2026-01-02,"
     " inputs: {}}}", "falls due before it was done"),
    ("format: 1\nreadings: &a\n  - *a\n", "an alias refers to itself"),
])
def test_what_is_no_readings_file_is_refused_in_words(text: str, told: str) -> None:
    assert any(told in fault for fault in faults(text))


@pytest.mark.parametrize("text", ["± (0.8 % + 3)", "±(0.8%+3)", "+/- (0.8 % + 3 digits)", "± (0.80 % + 3 d)"])
def test_an_accuracy_is_read_however_the_data_sheet_spaces_it(text: str) -> None:
    read = Accuracy.read(text)
    assert (read.share, read.digits) == pytest.approx((0.008, 3.0))


@pytest.mark.parametrize("text", [
    "0.8 %", "± 3", "± (0.8 % + 3", "± (0,8 % + 3)", "± (0.8 % 3)", "± ()", "± 0 %", "± 200 %", "± (3 + 0.8 %)",
])
def test_an_accuracy_that_could_be_meant_otherwise_is_refused(text: str) -> None:
    with pytest.raises(ValueError, match=r"accuracy|share|without any error"):
        Accuracy.read(text)


def test_digits_without_a_resolution_are_refused_where_they_stand() -> None:
    (fault,) = faults("format: 1\ninstruments:\n  m: {inputs: {voltage: {accuracy: ± (1 % + 2)}}}\n"
                      "readings: [{tag: AC, voltage: 1 V}]\n")
    assert fault.startswith("r.yaml:3:25:") and "no resolution says what one digit is" in fault


@pytest.mark.parametrize(("cell", "place", "told"), [
    ('AC,voltage,"5,1",V', "s.csv:2:12", "decimal comma"), ("AC,voltag,5.1,V", "s.csv:2:4", "unknown quantity 'voltag'"),
    ("AC,voltage,5.1,A", "s.csv:2:12", "not a voltage"), ("AD,voltage,5.1,V", "s.csv:2:1", "no circuit has the tag"),
    ("AC,voltage,5,1,V", "s.csv:2:16", "a line of 5 cells under 4 columns"),
    ('AC,voltage,"5.1,V', "s.csv:2:12", "a quoted cell does not end"),
])
def test_a_faulty_cell_of_a_test_sheet_is_told_with_line_and_column(cell: str, place: str, told: str) -> None:
    fault = faults(f"tag,quantity,value,unit\n{cell}\n", "s.csv")[0]
    assert fault.startswith(place + ":"), fault
    assert told in fault


@pytest.mark.parametrize(("head", "told"), [
    ("tag,quantity", "the column 'value' is missing"), ("tag,quantity,value,volts", "unknown column 'volts'"),
    ("tag,quantity,value,value", "stands twice"),
])
def test_a_test_sheet_with_a_strange_head_is_refused(head: str, told: str) -> None:
    assert any(told in fault for fault in faults(f"{head}\nAC,voltage,1 V\n", "s.csv"))


def test_a_sheet_nobody_filled_in_is_not_taken_for_readings() -> None:
    assert "none filled in" in faults("tag,quantity,value\nAC,voltage,\nAC,current,\n", "s.csv")[0]


def test_sets_of_a_test_sheet_are_simultaneous_sets() -> None:
    rows = "".join(f"AC;steady;{n};{q};{v};set {n}\n" for n, pair in enumerate(((230.0, 2.0), (231.0, 2.1)), 1)
                   for q, v in zip(("voltage", "current"), (f"{pair[0]} V", f"{pair[1]} A"), strict=True))
    read = read_readings([("s.csv", f"tag;state;set;quantity;value;note\n{rows}".encode())], PARTS)
    (one,) = read.readings
    assert [each.voltage.nominal for each in one.entry.repeats] == [230.0, 231.0]


def test_the_printed_test_sheet_filled_in_is_read_back_with_its_instruments() -> None:
    installation, record = reviewed()
    sheet = make(installation, record)
    lines = list(csv.DictReader(io.StringIO(readings_sheet.as_csv(sheet))))
    for line in lines:
        expected = line["expected"].split()[0].replace("−", "-")
        line["value"] = expected
        line["instrument"] = "m" if line["quantity"] == "voltage" else ""
    out = io.StringIO()
    table = csv.DictWriter(out, lines[0], lineterminator="\r\n")
    table.writeheader()
    table.writerows(lines)
    read = read_readings([("i.yaml", f"format: 1\n{INSTRUMENT}".encode()), ("s.csv", ("\ufeff" + out.getvalue()).encode())])
    given = {one.quantity for circuit in sheet.circuits for one in circuit.lines}
    taken = {name for one in read.readings for name in given if getattr(one.entry, name) is not None}
    assert taken == given
    for circuit in sheet.circuits:
        for line in circuit.lines:
            key = (circuit.tag, line.state, line.of)
            (found,) = [one.entry for one in read.readings if (one.entry.tag, one.entry.state, one.entry.of) == key]
            assert getattr(found, line.quantity).nominal == pytest.approx(line.lowest, rel=1e-3, abs=1e-9)


def test_the_sheet_expects_what_the_readings_are_held_against() -> None:
    installation, record = reviewed()
    (line,) = [one for one in make(installation, record).circuits[0].lines if (one.quantity, one.of) == ("current", "")]
    out = held("format: 1\nreadings: [{tag: AC, current: 2 A ± 0.01 A}]")
    assert (line.lowest, line.highest) == out.readings[0].results[0].predicted[1:]


@pytest.mark.parametrize(("value", "scale"), [(0.5, 0.6), (1.7, 2.0), (1.9, 6.0), (5.5, 20.0), (230.0, 600.0), (0.0019, 0.006)])
def test_the_range_is_the_smallest_common_one_with_a_tenth_to_spare(value: float, scale: float) -> None:
    # 2-6-20 ranges of hand-held meters: common practice.
    assert full_scale(value) == pytest.approx(scale)
