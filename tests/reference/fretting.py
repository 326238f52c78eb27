"""The taut path of a fretted string, and the error of the note it gives.

A path is found by walking from its start: of everything ahead, the string lies on what stands up
steepest from where it is. (`selftest.py` holds it against a convex hull and against minimising the
path's length over the heights of the string above each crown.)
"""

from dataclasses import dataclass

import numpy as np

import mode


def taut(start, end, s, z):
    """Indices of the crowns that a string pulled from `start` over crowns (s, z) to `end` lies on."""
    here_s, here_z = start
    touched = []
    first = int(np.searchsorted(s, here_s, side="right"))
    stop = int(np.searchsorted(s, end[0], side="left"))
    while first < stop:
        slope = (z[first:stop] - here_z) / (s[first:stop] - here_s)
        best = int(np.argmax(slope))
        if slope[best] <= (end[1] - here_z) / (end[0] - here_s):
            break
        best += first
        touched.append(best)
        here_s, here_z = s[best], z[best]
        first = best + 1
    return touched


def polyline(points):
    """Length of a polyline."""
    steps = np.diff(np.asarray(points, float), axis=0)
    return float(np.hypot(steps[:, 0], steps[:, 1]).sum())


@dataclass
class Fretted:
    """One fretted note's geometry."""

    path: float
    speaking: float
    bend: float
    touched: list


def press(string, fret, nut_at, crest_at, pressing):
    """Geometry of the string pressed at `fret` between the contacts (s, z)."""
    k = fret - 1
    s, z = string.fret_s, string.crown_z
    before = s[k - 1] if k else 0.0
    finger = (s[k] - pressing["finger_fraction"] * (s[k] - before), z[k] - pressing["depth_mm"])
    if finger[0] <= nut_at[0]:
        raise ValueError("the finger would stand behind the nut")
    crown = (s[k], z[k])
    left = [nut_at] + [(s[i], z[i]) for i in taut(nut_at, finger, s[:k], z[:k])] + [finger]
    over = taut(crown, crest_at, s, z)
    right = [crown] + [(s[i], z[i]) for i in over] + [crest_at]
    last = left[-2]
    rise_left = (last[1] - finger[1]) / np.hypot(finger[0] - last[0], finger[1] - last[1])
    rise_right = (crown[1] - finger[1]) / np.hypot(crown[0] - finger[0], crown[1] - finger[1])
    return Fretted(
        path=polyline(left) + polyline([finger, crown]) + polyline(right),
        speaking=polyline(right[-2:]), bend=rise_left + rise_right, touched=[i + 1 for i in over])


def contacts(string, nut_setback, saddle_setback):
    """Nut contact and crest (s, z): both lie on the open string's line."""
    near, far = nut_setback, string.scale + saddle_setback
    return (near, string.height(near)), (far, string.height(far))


class Bench:
    """A plan's strings with its pressing, supports and slip: turns setbacks into errors."""

    def __init__(self, plan, strings):
        self.strings = strings
        self.pressing = plan.get("pressing") or {"finger_fraction": 0.33, "depth_mm": 0.1}
        self.supports = plan.get("supports") or {"nut": 0.5, "fret": 0.5, "saddle": 0.5}
        self.slip = plan.get("slip") or {"head": 0.0, "tail": 0.0}

    def sound(self, jobs, confirm=False):
        """For jobs (string index, nut setback, saddle setback, frets) a list of dicts of arrays."""
        geometry = [self._geometry(*job) for job in jobs]
        mass = np.array([self.strings[job[0]].unit_mass for job in jobs])
        bend = np.array([self.strings[job[0]].bending_nm2 for job in jobs])
        pitch = np.array([self.strings[job[0]].frequency for job in jobs])
        opened = np.array([g[0] for g in geometry])
        hold = self.supports
        pull = mode.tensions(mass, bend, opened * 1e-3, pitch, hold["nut"], hold["saddle"], confirm)
        open_e = np.sqrt(bend / pull) / (opened * 1e-3)
        open_q = mode.quotients(open_e, hold["nut"], hold["saddle"], confirm)
        out = [self._tighten(job, g, t) for job, g, t in zip(jobs, geometry, pull)]
        e = np.concatenate([np.sqrt(b / o["tension"]) / (o["speaking"] * 1e-3) for b, o in zip(bend, out)])
        q = mode.quotients(e, hold["fret"], hold["saddle"], confirm)
        start = 0
        for index, (job, o) in enumerate(zip(jobs, out)):
            stop = start + len(o["speaking"])
            self._cents(job, o, open_q[index], q[start:stop])
            start = stop
        return out

    def _geometry(self, index, nut_setback, saddle_setback, frets):
        string = self.strings[index]
        near, far = contacts(string, nut_setback, saddle_setback)
        return polyline([near, far]), [press(string, fret, near, far, self.pressing) for fret in frets]

    def _tighten(self, job, geometry, pull):
        """Tension and unit mass of the fretted notes from the stretch of the path."""
        string = self.strings[job[0]]
        opened, notes = geometry
        shared = opened + self.slip["head"] * string.head + self.slip["tail"] * string.tail
        strain = pull / string.axial_n
        path = np.array([note.path for note in notes])
        # 1 + e_n = (1 + e_0)(1 + d), kept as e_n = e_0 + d + e_0 d so that no digits are lost.
        longer = (path - opened) / shared
        fretted = strain + longer + strain * longer
        return {
            "open_tension": pull, "strain": strain, "open_length": opened,
            "speaking": np.array([note.speaking for note in notes]),
            "tension": string.axial_n * fretted,
            "thinner": (1.0 + strain) / (1.0 + fretted),
            "bend": np.array([note.bend for note in notes]),
            "touched": [note.touched for note in notes],
        }

    def _cents(self, job, o, open_q, q):
        """Errors and their four parts."""
        string = self.strings[job[0]]
        wanted = string.ratios[np.asarray(job[3]) - 1]
        mass = string.unit_mass * o["thinner"]
        sounded = q / (2.0 * o["speaking"] * 1e-3) * np.sqrt(o["tension"] / mass)
        o["cents"] = 1200.0 * np.log2(sounded / (string.frequency * wanted))
        o["length_part"] = 1200.0 * np.log2(o["open_length"] / (o["speaking"] * wanted))
        o["tension_part"] = 600.0 * np.log2(o["tension"] / o["open_tension"])
        o["mass_part"] = -600.0 * np.log2(o["thinner"])
        o["stiffness_part"] = 1200.0 * np.log2(q / open_q)
        o["finger_force"] = o["tension"] * o["bend"]
