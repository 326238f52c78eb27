"""Strings and neck of a plan: plan geometry by numeric intersection, section properties by polygons.

Lengths here are millimetres. s is the distance along one string's own plan line from the nominal nut line.
"""

import math
from dataclasses import dataclass

import numpy as np

SEMITONES = {"C": 0, "D": 2, "E": 4, "F": 5, "G": 7, "A": 9, "B": 11}


@dataclass
class String:
    """One string: its plan line, the crowns under it and its own properties (SI where the name says so)."""

    nut: np.ndarray
    saddle: np.ndarray
    scale: float
    fret_s: np.ndarray
    crown_z: np.ndarray
    line: tuple
    frequency: float
    ratios: np.ndarray
    unit_mass: float
    axial_n: float
    bending_nm2: float
    core_area_m2: float
    tensile_pa: float
    head: float
    tail: float

    def height(self, s):
        """Height of the open string's underside at s."""
        (s0, z0), (s1, z1) = self.line
        return z0 + (z1 - z0) * (s - s0) / (s1 - s0)

    def point(self, s):
        """Plan point at s."""
        return self.nut + (self.saddle - self.nut) * (s / self.scale)


def cross(p, q, u, v):
    """Where the line through p and q meets the line through u and v."""
    p, q, u, v = (np.asarray(point, float) for point in (p, q, u, v))
    t = np.linalg.solve(np.column_stack([q - p, u - v]), u - p)
    return p + t[0] * (q - p)


def polygon_section(corners):
    """Area and second moment about the x axis of a closed polygon centred on the origin."""
    x, y = np.asarray(corners, float).T
    x1, y1 = np.roll(x, -1), np.roll(y, -1)
    turn = x * y1 - x1 * y
    return abs(turn.sum()) / 2.0, abs(((y * y + y * y1 + y1 * y1) * turn).sum()) / 12.0


def section(core):
    """Area (m2), second moment (m4) and the diameter on which a wrap lies (m)."""
    size = core["diameter_mm"] * 1e-3
    if core["shape"] == "round":
        # Polar integration of the disc: exact for the two moments wanted.
        radius = size / 2.0
        return math.pi * radius**2, math.pi * radius**4 / 4.0, size
    corner = (size / 2.0) / math.cos(math.pi / 6.0)
    angles = np.arange(6) * math.pi / 3.0
    area, moment = polygon_section(np.column_stack([corner * np.cos(angles), corner * np.sin(angles)]))
    return area, moment, 2.0 * corner


def pitch_hz(pitch, reference):
    """Frequency of a pitch entry."""
    if "frequency_hz" in pitch:
        return float(pitch["frequency_hz"])
    name = pitch["note"]
    step = SEMITONES[name[0]]
    rest = name[1:]
    while rest[0] in "#b":
        step += 1 if rest[0] == "#" else -1
        rest = rest[1:]
    midi = 12 * (int(rest) + 1) + step
    return reference * 2.0 ** ((midi - 69) / 12.0)


def across(plan):
    """y of each string at the nominal nut and saddle lines."""
    count = len(plan["strings"])
    given = plan["instrument"].get("across_mm")
    if given:
        return np.array(given["nut"], float), np.array(given["saddle"], float)
    spread = plan["instrument"]["spread_mm"]
    if count == 1:
        return np.zeros(1), np.zeros(1)
    place = 0.5 - np.arange(count) / (count - 1)
    return spread["nut"] * place, spread["saddle"] * place


def equal_fraction(number):
    """Share of the scale that lies behind fret `number` at equal temperament."""
    return 1.0 - 0.5 ** (np.asarray(number, float) / 12.0)


def lines_in_plan(plan):
    """(nut points, saddle points, fret lines): arrays n x 2, n x 2 and frets x 2 x 2."""
    neck = plan["instrument"]
    y_nut, y_saddle = across(plan)
    numbers = np.arange(1, neck["frets"] + 1)
    scale = neck["scale_mm"]
    if not isinstance(scale, dict):
        x = np.array(neck.get("fret_positions_mm") or scale * equal_fraction(numbers), float)
        frets = np.array([[[v, 100.0], [v, -100.0]] for v in x])
        nuts = np.column_stack([np.zeros_like(y_nut), y_nut])
        saddles = np.column_stack([np.full_like(y_saddle, scale), y_saddle])
        return nuts, saddles, frets
    run_t = math.sqrt(scale["treble"] ** 2 - (y_saddle[0] - y_nut[0]) ** 2)
    run_b = math.sqrt(scale["bass"] ** 2 - (y_saddle[-1] - y_nut[-1]) ** 2)
    square = equal_fraction(scale["square_fret"])
    treble = np.array([[0.0, y_nut[0]], [run_t, y_saddle[0]]])
    start = square * (run_t - run_b)
    bass = np.array([[start, y_nut[-1]], [start + run_b, y_saddle[-1]]])
    shift = cross(treble[0], bass[0], [0.0, 0.0], [1.0, 0.0])[0]
    treble[:, 0] -= shift
    bass[:, 0] -= shift

    def along(line, share):
        return line[0] + share * (line[1] - line[0])
    frets = np.array([[along(treble, f), along(bass, f)] for f in equal_fraction(numbers)])
    nuts = np.array([cross(treble[0], bass[0], [0.0, y], [1.0, y]) for y in y_nut])
    saddles = np.array([cross(treble[1], bass[1], [0.0, y], [1.0, y]) for y in y_saddle])
    return nuts, saddles, frets


def target_ratios(plan, index, plain_hz):
    """(open frequency, ratio wanted at every fret), tempered where the plan says so."""
    number = np.arange(1, plan["instrument"]["frets"] + 1)
    targets = plan.get("targets")
    if not targets:
        return plain_hz, 2.0 ** (number / 12.0)
    opened = targets["open_cents"][index]
    classes = np.array(targets["pitch_class_cents"], float)
    nearest = round(69 + 12 * math.log2(plain_hz / plan.get("reference_hz", 440.0)))
    wanted = classes[(nearest + number) % 12]
    return plain_hz * 2.0 ** (opened / 1200.0), 2.0 ** (number / 12.0 + (wanted - opened) / 1200.0)


def crowns(fret_s, relief):
    """Crown heights: a parabola that is zero at the first and the last fret and -relief half way."""
    middle, half = (fret_s[0] + fret_s[-1]) / 2.0, (fret_s[-1] - fret_s[0]) / 2.0
    return relief * (((fret_s - middle) / half) ** 2 - 1.0)


def build(plan):
    """All strings of a plan."""
    nuts, saddles, frets = lines_in_plan(plan)
    neck = plan["instrument"]
    strings = []
    for index, entry in enumerate(plan["strings"]):
        nut, saddle = nuts[index], saddles[index]
        scale = float(np.hypot(*(saddle - nut)))
        meet = [cross(nut, saddle, line[0], line[1]) for line in frets]
        fret_s = np.array([np.hypot(*(point - nut)) for point in meet])
        crown_z = crowns(fret_s, neck.get("relief_mm", 0.0))
        action = entry["action_mm"]
        twelfth = (fret_s[11], crown_z[11] + action["twelfth"])
        first = (0.0, 0.0) if neck.get("zero_fret") else (fret_s[0], crown_z[0] + action["first"])
        frequency, ratios = target_ratios(plan, index, pitch_hz(entry["pitch"], plan.get("reference_hz", 440.0)))
        after = entry.get("afterlength_mm", {"head": 0.0, "tail": 0.0})
        strings.append(String(
            nut=nut, saddle=saddle, scale=scale, fret_s=fret_s, crown_z=crown_z, line=(first, twelfth),
            frequency=frequency, ratios=ratios, head=after["head"], tail=after["tail"], **properties(entry)))
    return strings


def properties(entry):
    """Mass, stiffnesses and strength of one string, SI."""
    core, wrap = entry["core"], entry.get("wrap")
    measured = entry.get("measured") or {}
    area, moment, seat = section(core)
    mass = core["density_kg_m3"] * area
    if wrap:
        wire = (wrap["outside_mm"] * 1e-3 - seat) / 2.0
        # Turns a metre, times the length of a turn, times the wire's area and density.
        mass += (1.0 / wire) * (math.pi * (seat + wire)) * (math.pi * wire**2 / 4.0) * wrap["density_kg_m3"]
    modulus = core["youngs_modulus_gpa"] * 1e9
    given = measured.get("unit_mass_kg_per_m"), measured.get("axial_stiffness_n"), measured.get("bending_stiffness_n_mm2")
    tensile = core.get("tensile_mpa")
    return {
        "unit_mass": mass if given[0] is None else given[0],
        "axial_n": modulus * area if given[1] is None else given[1],
        "bending_nm2": modulus * moment if given[2] is None else given[2] * 1e-6,
        "core_area_m2": area,
        "tensile_pa": None if tensile is None else tensile * 1e6,
    }
