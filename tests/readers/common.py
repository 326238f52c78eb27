"""What the readers share: the program, plans made from its examples, and an own computation of the datum.

Every reader is called with the program and a folder to write in:

    python check_dxf.py PROGRAM FOLDER
"""

import copy
import json
import math
import os
import subprocess
import sys

PAPERS_MM = {"a4": (210.0, 297.0), "a3": (420.0, 297.0), "letter": (215.9, 279.4)}
UNITS = ("mm", "inch", "inch_fraction")
DATUMS = ("nut", "twelfth_fret", "saddle_line")

# Text that markup, DXF and spreadsheets would take for more than text.
HOSTILE = "=cmd()<b>&\"'</b> %%c é♭弦ש ^J \\P\\U+0041 {x} \u202e ]]>"


class Program:
    """The program under test and the folder its files go to."""

    def __init__(self, path, folder):
        self.path = path
        self.folder = folder
        os.makedirs(folder, exist_ok=True)

    def run(self, *arguments):
        """Runs a command and gives its standard output; a failure ends the test."""
        done = subprocess.run([self.path, *arguments], capture_output=True, check=False)
        if done.returncode != 0:
            sys.exit(f"{' '.join(arguments)}: status {done.returncode}: {done.stderr.decode()}")
        return done.stdout

    def file(self, name):
        return os.path.join(self.folder, name)

    def examples(self):
        """The names of the examples."""
        lines = self.run("example").decode().splitlines()
        return [line.split()[0] for line in lines if line.strip()]

    def example(self, name):
        return json.loads(self.run("example", name))

    def save(self, name, plan):
        """Writes a plan and gives its path."""
        path = self.file(f"{name}.json")
        with open(path, "w", encoding="utf-8") as out:
            json.dump(plan, out, ensure_ascii=False)
        return path

    def report(self, path):
        return json.loads(self.run("solve", path, "--json"))


def start():
    """The program as named by the arguments."""
    if len(sys.argv) != 3:
        sys.exit(f"usage: {sys.argv[0]} PROGRAM FOLDER")
    return Program(sys.argv[1], sys.argv[2])


def plans(program):
    """Every example as it stands and with each style of saddle and a shaped nut: (name, plan)."""
    for name in program.examples():
        plan = program.example(name)
        yield name, plan
        for style in ("separate", "shaped", "straight", "two_piece"):
            other = copy.deepcopy(plan)
            other["saddle"]["style"] = style
            other["saddle"].pop("split_after", None)
            if style == "two_piece":
                other["saddle"]["split_after"] = 2
            other["nut"] = {"style": "shaped"}
            yield f"{name}-{style}", other


def hostile(program):
    """A plan whose title and names mean harm."""
    plan = program.example("steel_six")
    plan["title"] = HOSTILE
    for string in plan["strings"]:
        string["name"] = HOSTILE
    return plan


def datum_x_mm(plan, datum):
    """x of a datum on the centre line from the nominal nut line, worked out here from the plan alone."""
    share = {"nut": 0.0, "twelfth_fret": 0.5, "saddle_line": 1.0}[datum]
    instrument = plan["instrument"]
    measured = instrument.get("fret_positions_mm")
    if datum == "twelfth_fret" and measured:
        return measured[11]
    scale = instrument["scale_mm"]
    if not isinstance(scale, dict):
        return share * scale
    # The outer strings lie at ± half the spread, so the line through their points crosses y = 0 at the mean of
    # the two ends weighted by the spread, which is equal on both sides. The nut line does so at x = 0.
    spread = instrument["spread_mm"]
    rise = (spread["saddle"] - spread["nut"]) / 2.0
    run = {side: math.sqrt(scale[side] ** 2 - rise**2) for side in ("treble", "bass")}
    return share * (run["treble"] + run["bass"]) / 2.0


def check(condition, words):
    """Ends the test with words where something is not so."""
    if not condition:
        sys.exit(f"FAILED: {words}")
