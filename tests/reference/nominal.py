"""Nominal plans of ordinary instruments, as a repairer would enter them from a handbook and a ruler.

Sizes are ordinary ones from memory of the trade (common practice), spread a little; they stand for nobody's
product. Steel: 206 GPa, 7850 kg/m3. Nylon and fluorocarbon: modulus at playing stress from the line
4.5 + 39 s GPa, s the stress in GPa (J. Woodhouse and N. Lynch-Aird 2019, from memory).
"""

import math

import neck
import plans

BASS = [("G2", 0.49, 1.02), ("D2", 0.55, 1.52), ("A1", 0.60, 2.03), ("E1", 0.65, 2.60), ("B0", 0.70, 3.25)]
FLUORO = [("A4", 0.52, None), ("E4", 0.62, None), ("C4", 0.74, None), ("G4", 0.57, None)]
# Plain wire's density and tensile strength (None: not given), wrap's density.
MATERIALS = {"steel": (7850, 2400, 7850), "bronze_wound": (7850, 2400, 8800), "nylon": (1130, None, 8960),
             "fluorocarbon": (1770, None, None)}
FAMILIES = {
    "steel six": {"set": plans.STEEL_SIX, "material": "bronze_wound", "scale": [647.7, 648.0, 645.2, 650.0], "frets": [20],
                  "first": (0.33, 0.58), "twelfth": (1.8, 2.4), "relief": (0.10, 0.25), "spread": (36.5, 54.0),
                  "saddle": {"style": "shaped", "thickness_mm": 3.0}},
    "nylon six": {"set": plans.NYLON_SIX, "material": "nylon", "scale": [650.0, 640.0], "frets": [19],
                  "first": (0.55, 0.75), "twelfth": (3.0, 3.9), "relief": (0.10, 0.25), "spread": (43.0, 58.0),
                  "saddle": {"style": "shaped", "thickness_mm": 2.5}},
    "bass four": {"set": BASS[:4], "material": "steel", "scale": [864.0, 762.0], "frets": [20, 21, 24],
                  "first": (0.45, 0.6), "twelfth": (2.0, 2.6), "relief": (0.2, 0.35), "spread": (31.0, 57.0),
                  "saddle": {"style": "separate"}},
    "tenor four": {"set": FLUORO, "material": "fluorocarbon", "scale": [432.0, 430.0], "frets": [17, 19],
                   "first": (0.45, 0.6), "twelfth": (2.4, 2.8), "relief": (0.0, 0.08), "spread": (28.0, 41.0),
                   "saddle": {"style": "shaped", "thickness_mm": 2.5}},
    "mandolin eight": {"set": plans.MANDOLIN, "material": "bronze_wound", "scale": [352.4, 350.0, 355.6], "frets": [20],
                       "first": (0.25, 0.35), "twelfth": (1.5, 1.9), "relief": (0.03, 0.12), "spread": (25.0, 41.0),
                       "saddle": {"style": "straight"}},
    "steel seven": {"set": plans.EIGHT[:7], "material": "steel", "scale": [647.7, 660.4, 673.1], "frets": [22, 24],
                    "first": (0.33, 0.5), "twelfth": (1.6, 2.1), "relief": (0.12, 0.25), "spread": (42.0, 63.0),
                    "saddle": {"style": "separate"}},
    "bass five": {"set": BASS, "material": "steel", "scale": [864.0, 889.0], "frets": [24],
                   "first": (0.45, 0.65), "twelfth": (2.0, 2.8), "relief": (0.2, 0.35), "spread": (38.0, 70.0),
                   "saddle": {"style": "separate"}},
}
ORDER = ["steel six", "nylon six", "bass four", "tenor four", "mandolin eight", "steel six", "steel seven", "nylon six",
         "bass five", "steel six", "tenor four"]


def string_entry(draw, family, scale, pattern, share):
    """A string near the family's pattern; share runs from 0 on the treble side to 1 on the bass side."""
    note, core, outside = pattern
    material = family["material"]
    density, tensile, wrap_density = MATERIALS[material]
    hexagonal = outside is not None and tensile is not None
    core = round(core * draw.between(0.97, 1.03, 3) * (0.93 if hexagonal else 1.0), 3)
    entry = {"pitch": {"note": note},
             "core": {"shape": "hex" if hexagonal else "round", "diameter_mm": core,
                      "youngs_modulus_gpa": 206, "density_kg_m3": density}}
    if tensile:
        entry["core"]["tensile_mpa"] = tensile
    if outside is not None:
        entry["wrap"] = {"outside_mm": round(outside * draw.between(0.98, 1.02, 3), 3), "density_kg_m3": wrap_density}
    if not tensile:
        own = neck.properties(entry)
        pull = own["unit_mass"] * (2e-3 * scale * neck.pitch_hz(entry["pitch"], 440.0)) ** 2
        entry["core"]["youngs_modulus_gpa"] = round(4.5 + 39.0 * pull / own["core_area_m2"] * 1e-9, 1)
    low_first, high_first = family["first"]
    low, high = family["twelfth"]
    entry["action_mm"] = {"first": round(low_first + share * (high_first - low_first) + draw.between(-0.03, 0.03, 2), 2),
                          "twelfth": round(low + share * (high - low) + draw.between(-0.1, 0.1, 2), 2)}
    return entry


def plan(draw, number):
    """The nominal plan of instrument `number`, without readings."""
    name = ORDER[number % len(ORDER)]
    family = FAMILIES[name]
    scale = draw.pick(family["scale"])
    last = len(family["set"]) - 1
    strings = [string_entry(draw, family, scale, p, k / last) for k, p in enumerate(family["set"])]
    for k in range(1, len(strings), 2) if name == "mandolin eight" else ():
        strings[k] = strings[k - 1] | {"action_mm": strings[k]["action_mm"]}
    return {
        "format": "crestline-plan", "version": 1, "title": f"Synthetic {number}: {name}",
        "instrument": {"scale_mm": scale, "frets": draw.pick(family["frets"]),
                       "relief_mm": draw.between(*family["relief"], 2),
                       "spread_mm": dict(zip(("nut", "saddle"), family["spread"]))},
        "pressing": {"finger_fraction": 0.33, "depth_mm": 0.1},
        "supports": {"nut": 0.5, "fret": 0.5, "saddle": 0.5},
        "strings": strings, "saddle": dict(family["saddle"]),
    }


def holds(entry, scale):
    """Is the string within its strength, or not over 450 MPa where none is given?"""
    own = neck.properties(entry)
    pull = own["unit_mass"] * (2e-3 * scale * neck.pitch_hz(entry["pitch"], 440.0)) ** 2
    return 12.0 < pull < 0.8 * (own["tensile_pa"] or 450e6) * own["core_area_m2"] and math.isfinite(pull)
