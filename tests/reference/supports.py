"""Synthetic instruments whose supports hold otherwise than their plan says, with measured crests: `python3 supports.py`.

Writes supports/001-120.json, an array with one object a line, {"origin", "plan", "truth"}. The plan says ½ for every
support, as a plan does where nothing is known; the true fixities are drawn evenly from 0 to 1. Everything else is drawn as
for the other synthetic instruments, and crests and nut edges are measured (`as_built`) on all of them.
"""

import json
import os
import sys

import numpy as np

import faults
import instruments
import nominal

COUNT = 120
# Behind the numbers of the other instruments.
STREAM = 50_000


def attempt(draw, number):
    """One draw of everything; raises Unfit if it will not do."""
    plan = nominal.plan(draw, number)
    frets = draw.pick(instruments.FRET_SETS)
    hidden = instruments.draw_hidden(draw, plan, "fret")
    supports = {end: draw.between(0.0, 1.0, 3) for end in ("nut", "fret", "saddle")}
    true = faults.Instrument(plan | {"supports": supports}, hidden, frets)
    instruments.sane(plan, true)
    true.nut = draw.normal(instruments.NUT_MM, true.count)
    size = plan["instrument"]["scale_mm"] / 648.0
    true.crest = true.best(False, true.nut, np.full(true.count, 2.0 * size))[1]
    true.crest = true.crest + size * draw.normal(0.4, true.count)
    if np.abs(true.errors(true.nut, true.crest)).max() > instruments.WORST_CENTS:
        raise faults.Unfit("not an instrument that anybody would measure")
    truth = {}
    tuning = draw.normal(instruments.TUNING_CENTS, true.count)
    plan["readings"] = instruments.readings(draw, true, tuning, truth, False)
    plan["as_built"] = {"saddle_setback_mm": instruments.near(draw, true.crest),
                        "nut_setback_mm": instruments.near(draw, true.nut)}
    return {"origin": f"tests/reference/supports.py, seed {instruments.SEED}, instrument {number}", "plan": plan,
            "truth": {"supports": supports, "family": nominal.ORDER[number % len(nominal.ORDER)],
                      "crest_setback_mm": true.crest, "nut_setback_mm": true.nut, "outlier": truth["outlier"]}}


def instrument(number):
    """Instrument `number`: the first one of its random sequence that is fit."""
    draw = instruments.Draw(STREAM + number)
    for _ in range(400):
        try:
            return attempt(draw, number)
        except faults.Unfit:
            continue
    raise ValueError(f"no instrument {number}")


def main():
    """Writes the file."""
    os.makedirs(instruments.HERE / "supports", exist_ok=True)
    lines = [json.dumps(instruments.tidy(instrument(n)), allow_nan=False, separators=(",", ":"))
             for n in range(1, COUNT + 1)]
    path = instruments.HERE / "supports" / f"001-{COUNT:03}.json"
    path.write_text("[\n" + ",\n".join(lines) + "\n]\n", encoding="utf-8")
    print(path.name, "written")
    return 0


if __name__ == "__main__":
    sys.exit(main())
