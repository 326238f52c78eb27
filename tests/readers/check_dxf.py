"""Machine drawings as ezdxf reads them: audit, units, layers, crests, slots and the dimensions' own measurements."""

import ezdxf
from common import DATUMS, HOSTILE, UNITS, check, datum_x_mm, hostile, plans, start

# A drill does not know a micrometre; the file holds a nanometre.
PLACE_MM = 0.001
LAYERS = {"CREST", "SLOT", "STRING", "NOMINAL", "DIMENSION", "TEXT"}


def read(path):
    document = ezdxf.readfile(path)
    audit = document.audit()
    check(not audit.errors and not audit.fixes, f"{path}: {audit.errors} {audit.fixes}")
    check(document.dxfversion == "AC1009", f"{path}: version {document.dxfversion}")
    check(document.header["$INSUNITS"] == 4, f"{path}: not in millimetres")
    return document


def on(document, layer):
    return [entity for entity in document.modelspace() if entity.dxf.layer == layer]


def check_crests(path, document, report, datum_mm):
    points = on(document, "CREST")
    check(all(p.dxftype() == "POINT" for p in points), f"{path}: more than points on CREST")
    check(len(points) == len(report["strings"]), f"{path}: {len(points)} crests")
    worst = 0.0
    for point, string in zip(points, report["strings"], strict=True):
        crest = string["built"]["crest_mm"]
        off = max(abs(point.dxf.location.x - (crest["x"] - datum_mm)), abs(point.dxf.location.y - crest["y"]))
        worst = max(worst, off)
    check(worst <= PLACE_MM, f"{path}: a crest is {worst} mm off")
    return worst


def check_slots(path, document, report):
    slots = on(document, "SLOT")
    for slot in slots:
        check(slot.dxftype() == "POLYLINE" and slot.is_closed, f"{path}: an open thing on SLOT")
        check(len(slot.vertices) == 4, f"{path}: a slot with {len(slot.vertices)} corners")
    lines = report["saddle"]["lines"]
    wanted = len(lines) if lines else len(report["strings"])
    check(len(slots) == wanted, f"{path}: {len(slots)} slots for {wanted}")


def check_dimensions(path, document, report):
    values = []
    for dimension in document.modelspace().query("DIMENSION"):
        check(dimension.dxf.layer == "DIMENSION", f"{path}: a dimension on {dimension.dxf.layer}")
        block = dimension.get_geometry_block()
        check(block is not None and len(block) >= 4, f"{path}: a dimension without its picture")
        values.append(dimension.get_measurement())
    wanted = [abs(s["built"]["saddle_setback_mm"]) for s in report["strings"]]
    wanted += [abs(s["built"]["nut_setback_mm"]) for s in report["strings"] if s["built"]["nut_setback_mm"]]
    wanted += [abs(line["slant_degrees"]) for line in report["saddle"]["lines"] if abs(line["slant_degrees"]) > 0.01]
    for value in wanted:
        near = min(abs(value - found) for found in values)
        check(near <= PLACE_MM, f"{path}: no dimension measures {value}, the nearest is {near} off")
    return len(values)


def check_extents(path, document):
    low, high = document.header["$EXTMIN"], document.header["$EXTMAX"]
    for point in on(document, "CREST"):
        at = point.dxf.location
        check(low[0] <= at.x <= high[0] and low[1] <= at.y <= high[1], f"{path}: a crest outside the extents")


def main():
    program = start()
    files, dimensions, worst = 0, 0, 0.0
    for name, plan in plans(program):
        source = program.save(name, plan)
        report = program.report(source)
        for datum in DATUMS:
            for units in UNITS if "-" not in name else UNITS[:1]:
                path = program.file(f"{name}-{datum}-{units}.dxf")
                program.run("sheet", source, "-o", path, "--datum", datum, "--units", units)
                document = read(path)
                used = {entity.dxf.layer for entity in document.modelspace()}
                check(used == LAYERS, f"{path}: layers {used}")
                worst = max(worst, check_crests(path, document, report, datum_x_mm(plan, datum)))
                check_slots(path, document, report)
                check_extents(path, document)
                dimensions += check_dimensions(path, document, report)
                files += 1
    source = program.save("hostile", hostile(program))
    path = program.file("hostile.dxf")
    program.run("sheet", source, "-o", path)
    document = read(path)
    texts = [text.plain_text() for text in document.modelspace().query("TEXT")]
    check(any("=cmd()<b>" in text for text in texts), "hostile.dxf: the title is gone")
    check(not any("⌀" in text or "\n" in text for text in texts), f"hostile.dxf: a code was run: {texts}")
    check(HOSTILE not in open(path, encoding="ascii").read(), "hostile.dxf: text was written as it came")
    print(f"{files} drawings without an error or a fix, {dimensions} dimensions; crests within {worst:.1e} mm")


main()
