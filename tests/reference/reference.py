"""Independent reference computation of a whole plan: `python3 reference.py PLAN.json` prints a solve report.

Written from the description of the model and of the plan file alone; see README.md in this folder.
"""

import json
import math
import sys

import numpy as np

import fretting
import neck
import saddles


def line_between(setting, piece, crests):
    """The straight crest of one piece, cut at its outer strings."""
    p, q = (setting.crest_point(i, crests[i]) for i in (piece[0], piece[-1]))
    return line_report(p, q)


def line_report(p, q):
    """A line from its treble end p to its bass end q."""
    return {"treble": {"x": p[0], "y": p[1]}, "bass": {"x": q[0], "y": q[1]},
            "slant_degrees": math.degrees(math.atan2(q[0] - p[0], p[1] - q[1]))}


def slot_report(setting, crests):
    """The slot of a shaped saddle: its line, and each crest's distance from it, positive away from the nut."""
    point, along, _ = setting.slot(crests)
    ends = [neck.cross(point, point + along, s.nut, s.saddle) for s in (setting.strings[0], setting.strings[-1])]
    away = np.array([along[1], -along[0]])
    away = away if away[0] > 0.0 else -away
    offsets = [float((setting.crest_point(i, c) - point) @ away) for i, c in enumerate(crests)]
    return line_report(*ends), offsets


def built(setting):
    """(nuts, crests, crests settled, shared settled), lines, slot offsets, fits for the plan's own style."""
    if setting.style == "shaped":
        found, fits = setting.in_blank(setting.rule)
        line, offsets = slot_report(setting, found[1])
        return found, [line], offsets, fits
    if setting.style == "separate":
        return setting.separate(setting.rule), [], [None] * setting.count, True
    found = setting.on_lines(setting.rule)
    lines = [line_between(setting, piece, found[1]) for piece in setting.pieces(setting.style)]
    return found, lines, [0.0] * setting.count, True


def contact_report(setting, index, nut, crest, cents):
    """Setbacks of one string and what is left of its errors."""
    kept = cents[np.array(setting.fit_frets[index]) - 1]
    return {"saddle_setback_mm": crest, "nut_setback_mm": nut,
            "rms_cents": float(np.sqrt(np.mean(kept**2))), "max_cents": float(np.abs(kept).max())}


def solve(plan, setting_of=saddles.Setting):
    """The report of a plan as plain data, with numbers in full."""
    strings = neck.build(plan)
    bench = fretting.Bench(plan, strings)
    setting = setting_of(plan, strings, bench)
    ideal = setting.separate(setting.rule)
    made, lines, offsets, fits = built(setting)
    numbers = list(range(1, plan["instrument"]["frets"] + 1))
    existing = plan.get("as_built")

    def sound(nuts, crests):
        return bench.sound([(i, nuts[i], crests[i], numbers) for i in range(setting.count)], confirm=True)
    zero = np.zeros(setting.count)
    none, at_ideal, at_made = sound(zero, zero), sound(*ideal[:2]), sound(*made[:2])
    as_built = sound(existing["nut_setback_mm"], existing["saddle_setback_mm"]) if existing else None
    entries = []
    for i, string in enumerate(strings):
        o = none[i]
        crest = string.point(string.scale + made[1][i])
        height = fretting.contacts(string, made[0][i], made[1][i])[1][1]
        tension = float(o["open_tension"])
        entries.append({
            "string": i + 1, "name": plan["strings"][i].get("name", str(i + 1)),
            "frequency_hz": string.frequency, "scale_mm": string.scale,
            "unit_mass_kg_per_m": string.unit_mass, "axial_stiffness_n": string.axial_n,
            "bending_stiffness_n_mm2": string.bending_nm2 * 1e6, "tension_n": tension,
            "strain": float(o["strain"]),
            "breaking_fraction": None if string.tensile_pa is None
            else tension / (string.tensile_pa * string.core_area_m2),
            "bending_length_mm": math.sqrt(string.bending_nm2 / tension) * 1e3,
            "inharmonicity": math.pi**2 * string.bending_nm2 / (tension * (o["open_length"] * 1e-3) ** 2),
            "ideal": contact_report(setting, i, ideal[0][i], ideal[1][i], at_ideal[i]["cents"]),
            "built": contact_report(setting, i, made[0][i], made[1][i], at_made[i]["cents"])
            | {"crest_mm": {"x": crest[0], "y": crest[1], "z": height}, "slot_offset_mm": offsets[i]},
            "ideal_settled": bool(ideal[2][i]), "built_settled": bool(made[2][i]),
            "frets": [{
                "fret": n, "position_mm": string.fret_s[n - 1], "none_cents": o["cents"][n - 1],
                "ideal_cents": at_ideal[i]["cents"][n - 1], "built_cents": at_made[i]["cents"][n - 1],
                "as_built_cents": as_built[i]["cents"][n - 1] if as_built else None,
                "length_cents": o["length_part"][n - 1], "tension_cents": o["tension_part"][n - 1],
                "mass_cents": o["mass_part"][n - 1], "stiffness_cents": o["stiffness_part"][n - 1],
                "finger_force_n": o["finger_force"][n - 1],
                "touches_fret": o["touched"][n - 1][-1] if o["touched"][n - 1] else None,
                "touched_frets": o["touched"][n - 1],
            } for n in numbers],
        })
    return {"settled": {"ideal": bool(ideal[3]), "built": bool(made[3])}, "strings": entries, "saddle": {"lines": lines, "fits": bool(fits)},
            "total_tension_n": float(sum(o["open_tension"] for o in none))}


def plain(value):
    """Numpy scalars turned into Python ones."""
    if isinstance(value, dict):
        return {key: plain(v) for key, v in value.items()}
    if isinstance(value, list):
        return [plain(v) for v in value]
    return value.item() if isinstance(value, np.generic) else value


if __name__ == "__main__":
    with open(sys.argv[1], encoding="utf-8") as file:
        print(json.dumps(plain(solve(json.load(file))), indent=1, allow_nan=False))
