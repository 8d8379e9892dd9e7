"""Rules on readings: what can be said of them from the instruments used, whatever the circuit."""

from __future__ import annotations

from collections.abc import Iterator

from circuitlint.authoring import Instrument, Noticed, ReadingResult, ReadingRule

LEAST_OF_RANGE = 0.1
"""Share of its range below which a reading had better be taken in a smaller one; common practice."""
MAINS = ("voltage", "current", "power", "power_factor", "loop_impedance", "total_voltage", "resistor_voltage", "coil_voltage")


class CalibrationInDate(ReadingRule):
    """An instrument read after its calibration fell due says less than its data sheet."""

    name = "calibration-in-date"
    title = "Instruments are in calibration on the day of the reading"

    def notice(self, reading: ReadingResult, instruments: dict[str, Instrument]) -> Iterator[Noticed]:
        """Overdue, not yet calibrated on that day, or not known."""
        for name in dict.fromkeys(one.instrument for one in reading.inputs if one.instrument):
            one = instruments[name]
            if not one.calibrated and not one.calibration_due:
                yield Noticed(f"nothing is stated of the calibration of {name}", "state `calibrated` and `calibration_due`")
            elif not reading.taken_on:
                yield Noticed(f"the day of the reading is not stated, and so not whether {name} was in calibration",
                              "state `taken_on`")
            elif one.calibration_due and reading.taken_on > one.calibration_due:
                due = f"the calibration of {name} fell due on {one.calibration_due}"
                yield Noticed(f"{due}, before the reading of {reading.taken_on}", "have it calibrated, and read again", "minor")
            elif one.calibrated and reading.taken_on < one.calibrated:
                yield Noticed(f"{name} was calibrated on {one.calibrated}, after the reading of {reading.taken_on}",
                              "see what its calibration found", "minor")


class CategoryStated(ReadingRule):
    """Which category an instrument has bears on who may use it where (IEC 61010-2-033)."""

    name = "measurement-category"
    title = "Instruments used on energised circuits have a stated measurement category"

    def notice(self, reading: ReadingResult, instruments: dict[str, Instrument]) -> Iterator[Noticed]:
        """No category stated for an instrument used on an energised circuit."""
        used = dict.fromkeys(one.instrument for one in reading.inputs if one.instrument and one.quantity in MAINS)
        for name in used:
            if not instruments[name].category:
                yield Noticed(f"no measurement category is stated for {name}, which was used on an energised circuit",
                              "state `category`, such as CAT III 600 V")


class WithinRange(ReadingRule):
    """Accuracy is stated within a range, and counts of the last place weigh most at its lower end."""

    name = "reading-within-range"
    title = "Readings lie within the range they were taken in, and not at its very bottom"

    def notice(self, reading: ReadingResult, instruments: dict[str, Instrument]) -> Iterator[Noticed]:
        """Beyond full scale, or below a tenth of it."""
        for one in reading.inputs:
            if one.range is None or one.quantity == "temperature":
                continue
            share = abs(one.value) / one.range
            spoken = one.quantity.replace("_", " ")
            if share > 1.0:
                yield Noticed(f"the {spoken} lies {100.0 * (share - 1.0):.0f} % beyond the range it was read in",
                              "read again in a larger range", "minor", one.quantity)
            elif share < LEAST_OF_RANGE:
                yield Noticed(f"the {spoken} was read in the lowest tenth of its range", "read again in a smaller range",
                              quantity=one.quantity)
