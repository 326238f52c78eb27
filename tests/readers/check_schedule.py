"""Schedules as Python's csv module reads them: header, rows, figures, and names that are no formulas."""

import csv
import io

from common import DATUMS, check, datum_x_mm, hostile, plans, start

# Three decimals of a millimetre, four of an inch, two of a cent; half of the last place and a hair.
ROUNDING = {"mm": 0.000501, "in": 0.0000501, "cents": 0.00501}


def read(program, source, *options):
    text = program.run("schedule", source, *options).decode("utf-8")
    return list(csv.DictReader(io.StringIO(text)))


def close(row, column, value, words):
    unit = column.rsplit("_", 1)[1]
    if value is None:
        check(row[column] == "", f"{words}: {column} is {row[column]!r}")
        return
    check("," not in row[column] and "e" not in row[column], f"{words}: {column} is {row[column]!r}")
    check(abs(float(row[column]) - value) <= ROUNDING[unit], f"{words}: {column} {row[column]} for {value}")


def check_rows(words, rows, plan, report, unit, datum_mm):
    check(len(rows) == len(report["strings"]), f"{words}: {len(rows)} rows")
    scale = 1.0 if unit == "mm" else 1.0 / 25.4
    for row, string, planned in zip(rows, report["strings"], plan["strings"], strict=True):
        built, wrap = string["built"], planned.get("wrap")
        gauge = wrap["outside_mm"] if wrap else planned["core"]["diameter_mm"]
        lengths = {
            "gauge": gauge,
            "ideal_setback": string["ideal"]["saddle_setback_mm"],
            "built_setback": built["saddle_setback_mm"],
            "crest_x": built["crest_mm"]["x"] - datum_mm,
            "crest_y": built["crest_mm"]["y"],
            "slot_offset": built["slot_offset_mm"],
            "crest_height": built["crest_mm"]["z"],
            "nut_setback": built["nut_setback_mm"],
        }
        check(("ideal_plus_minus_" + unit in row) == ("plus_minus_mm" in string), f"{words}: a band too many or few")
        if "plus_minus_mm" in string:
            lengths["ideal_plus_minus"] = string["plus_minus_mm"]
        for name, value in lengths.items():
            close(row, f"{name}_{unit}", None if value is None else value * scale, words)
        octave = next(fret for fret in string["frets"] if fret["fret"] == 12)
        close(row, "octave_error_cents", octave["built_cents"], words)
        close(row, "worst_error_cents", built["max_cents"], words)
        check(row["string"] == str(string["string"]), f"{words}: string {row['string']}")


def main():
    program = start()
    tables = 0
    for name, plan in plans(program):
        source = program.save(name, plan)
        report = program.report(source)
        for datum in DATUMS:
            for units, unit in (("mm", "mm"), ("inch", "in"), ("inch_fraction", "in")):
                rows = read(program, source, "--datum", datum, "--units", units)
                check_rows(f"{name} {datum} {units}", rows, plan, report, unit, datum_x_mm(plan, datum))
                tables += 1
    rows = read(program, program.save("hostile", hostile(program)))
    for row in rows:
        check(row["name"].startswith("'=cmd()<b>"), f"hostile: {row['name']}")
    print(f"{tables} schedules hold what the report says")


main()
