"""Plans whose saddle must suit several sets of strings: `python3 sets.py PLAN.json` prints the report with all sets.

Only least squares: the weighted sum of the squared errors of all sets, the plan's own strings among them, is made
small by the same constrained optimiser as for a single set.
"""

import copy
import json
import sys

import numpy as np

import fretting
import neck
import reference
import saddles


def own_plans(plan):
    """(name, weight, plan with that set for its own strings) of every set, the plan's own first."""
    found = [(plan.get("title", "").strip() or "as planned", plan.get("strings_weight", 1.0), plan)]
    for other in plan["alternatives"]:
        strings = copy.deepcopy(other.get("strings") or plan["strings"])
        for string, pitch in zip(strings, other.get("pitches") or []):
            if pitch is not None:
                string["pitch"] = pitch
        rest = {k: v for k, v in plan.items() if k not in ("alternatives", "strings_weight", "as_built")}
        found.append((other["name"], other.get("weight", 1.0), rest | {"strings": strings}))
    return found


class JointProblem(saddles.Problem):
    """Crests and nut edges that all sets share: the errors of all of them, by the roots of the weights."""

    def evaluate(self, x):
        residuals, jacobians = [[] for _ in self.members], [[] for _ in self.members]
        for weight, setting in self.setting.sets:
            one = saddles.Problem(setting, self.pieces, self.nut, self.nut_values, setting.fit_frets, self.strip)
            for k, (e, j) in enumerate(zip(*one.evaluate(x))):
                residuals[k].append(np.sqrt(weight) * e)
                jacobians[k].append(np.sqrt(weight) * j)
        return [np.concatenate(e) for e in residuals], [np.vstack(j) for j in jacobians]


class JointSetting(saddles.Setting):
    """A plan's own strings, fitted together with its alternatives."""

    problem = JointProblem

    def __init__(self, plan, strings, bench):
        super().__init__(plan, strings, bench)
        if self.rule != "least_squares":
            raise ValueError("only least squares is worked out for several sets")
        self.sets = []
        for _, weight, own in own_plans(plan):
            lines = neck.build(own)
            self.sets.append((weight, saddles.Setting(own, lines, fretting.Bench(own, lines))))


def set_report(name, weight, plan, contacts):
    """How built crests and nut edges suit one set."""
    strings = neck.build(plan)
    bench = fretting.Bench(plan, strings)
    setting = saddles.Setting(plan, strings, bench)
    nuts, crests, _, _ = setting.separate("least_squares")
    numbers = list(range(1, plan["instrument"]["frets"] + 1))

    def sound(nut, crest):
        return bench.sound([(i, nut[i], crest[i], numbers) for i in range(setting.count)], confirm=True)
    zero = np.zeros(setting.count)
    none, alone, built = sound(zero, zero), sound(nuts, crests), sound(*contacts)
    entries, every = [], []
    for i, string in enumerate(strings):
        tension = float(none[i]["open_tension"])
        every.append(built[i]["cents"][np.array(setting.fit_frets[i]) - 1])
        entries.append({
            "string": i + 1, "name": plan["strings"][i].get("name", str(i + 1)), "frequency_hz": string.frequency,
            "tension_n": tension,
            "breaking_fraction": None if string.tensile_pa is None
            else tension / (string.tensile_pa * string.core_area_m2),
            "ideal": reference.contact_report(setting, i, nuts[i], crests[i], alone[i]["cents"]),
            "built": reference.contact_report(setting, i, contacts[0][i], contacts[1][i], built[i]["cents"]),
            "frets": {"none_cents": list(none[i]["cents"]), "ideal_cents": list(alone[i]["cents"]),
                      "built_cents": list(built[i]["cents"]),
                      "touches_fret": [t[-1] if t else None for t in none[i]["touched"]]}})
    every = np.concatenate(every)
    return {"name": name, "weight": weight, "total_tension_n": sum(e["tension_n"] for e in entries),
            "rms_cents": float(np.sqrt(np.mean(every**2))), "max_cents": float(np.abs(every).max()),
            "strings": entries}


def solve(plan):
    """The report of a plan with alternatives, and of every set."""
    report = reference.solve(plan, JointSetting)
    made = [string["built"] for string in report["strings"]]
    contacts = [m["nut_setback_mm"] for m in made], [m["saddle_setback_mm"] for m in made]
    return report | {"alternatives": [set_report(*entry, contacts) for entry in own_plans(plan)]}


if __name__ == "__main__":
    with open(sys.argv[1], encoding="utf-8") as file:
        print(json.dumps(reference.plain(solve(json.load(file))), indent=1, allow_nan=False))
