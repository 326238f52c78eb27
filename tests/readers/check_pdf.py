"""Paper drawings in PDF as pymupdf reads them: page size, no scaling, layers, fonts, check lines and crests."""

import math

import pymupdf
from common import PAPERS_MM, UNITS, check, hostile, plans, start

MM = 25.4 / 72.0
# PDF numbers are single precision: some hundred-thousandths of a millimetre on A3.
CHECK_LINE_MM = 0.001
CREST_MM = 0.01
PAGE_MM = 0.01
# The crosses that mark crests have arms of 1 mm.
ARM_MM = 1.0


def lines(page, layer):
    """Straight lines on a layer: (from, to) in millimetres, y up."""
    found = []
    for path in page.get_drawings():
        if path.get("layer") == layer:
            for item in path["items"]:
                if item[0] == "l":
                    found.append(tuple((p.x * MM, (page.rect.height - p.y) * MM) for p in item[1:3]))
    return found


def length(line):
    return math.dist(*line)


def crosses(page):
    """Middles of crosses on the layer of crests, in the order of drawing."""
    arms = [line for line in lines(page, "CREST") if abs(length(line) - 2 * ARM_MM) < 1e-3]
    middles = [((a[0] + b[0]) / 2, (a[1] + b[1]) / 2) for a, b in arms]
    return [level for level, upright in zip(middles[::2], middles[1::2], strict=True) if math.dist(level, upright) < 1e-3]


def check_file(path, paper):
    document = pymupdf.open(path)
    kind, value = document.xref_get_key(document.pdf_catalog(), "ViewerPreferences/PrintScaling")
    check((kind, value) == ("name", "/None"), f"{path}: print scaling {kind} {value}")
    names = {group["name"] for group in document.get_ocgs().values()}
    check({"CREST", "SLOT", "STRING", "NOMINAL", "DIMENSION", "TEXT", "CHECK"} <= names, f"{path}: layers {names}")
    for page in document:
        size = (page.rect.width * MM, page.rect.height * MM)
        check(math.dist(size, PAPERS_MM[paper]) <= PAGE_MM, f"{path}: page {size}")
        fonts = page.get_fonts()
        check(fonts and all(font[1] == "ttf" and font[3].startswith("CRESTL+") for font in fonts), f"{path}: {fonts}")
        check(len(document.extract_font(fonts[0][0])[3]) > 1000, f"{path}: the font is not embedded")
        drawn = lines(page, "CHECK")
        for wanted, level, count in ((100.0, True, 1), (100.0, False, 1), (101.6, True, 1)):
            fit = [
                line
                for line in drawn
                if abs(length(line) - wanted) <= CHECK_LINE_MM and (abs(line[0][1] - line[1][1]) < 1e-6) == level
            ]
            check(len(fit) == count, f"{path}: {len(fit)} check lines of {wanted} mm")
    return document


def nominal_origin(path, nominal, crest, scale_mm):
    """Where the nut line meets the centre line, from the nominal saddle line next to a crest and the centre line
    that crosses it. A sheet may show the nut as well."""
    upright = [line for line in nominal if abs(line[0][0] - line[1][0]) < 1e-4 and length(line) > 20]
    check(upright, f"{path}: no nominal saddle line")
    x = min((line[0][0] for line in upright), key=lambda x: abs(x - crest[0]))
    level = [line for line in nominal if abs(line[0][1] - line[1][1]) < 1e-4]
    crossing = [line[0][1] for line in level if min(line[0][0], line[1][0]) < x < max(line[0][0], line[1][0])]
    check(crossing, f"{path}: no centre line")
    return (x - scale_mm, min(crossing, key=lambda y: abs(y - crest[1])))


def check_crests(path, document, plan, report):
    """Crests against the solution: from the nominal line and centre line of a single scale, else from the first."""
    page = document[0]
    wanted = [(s["built"]["crest_mm"]["x"], s["built"]["crest_mm"]["y"]) for s in report["strings"]]
    found = crosses(page)
    check(len(found) == len(wanted), f"{path}: {len(found)} crests")
    scale = plan["instrument"]["scale_mm"]
    if isinstance(scale, dict):
        origin = (found[0][0] - wanted[0][0], found[0][1] - wanted[0][1])
    else:
        origin = nominal_origin(path, lines(page, "NOMINAL"), found[0], scale)
    worst = max(math.dist((f[0] - origin[0], f[1] - origin[1]), w) for f, w in zip(found, wanted, strict=True))
    check(worst <= CREST_MM, f"{path}: a crest is {worst} mm off")
    return worst


def check_words(path, document, report):
    """The figures of the setbacks are found as text."""
    text = "".join(page.get_text() for page in document)
    for string in report["strings"]:
        figure = f"{abs(string['built']['saddle_setback_mm']):.2f}"
        check(figure in text, f"{path}: {figure} is not written")


def main():
    program = start()
    files, pages, worst = 0, 0, 0.0
    for name, plan in plans(program):
        source = program.save(name, plan)
        report = program.report(source)
        for paper in PAPERS_MM:
            for units in UNITS if "-" not in name else UNITS[:1]:
                path = program.file(f"{name}-{paper}-{units}.pdf")
                program.run("sheet", source, "-o", path, "--paper", paper, "--units", units, "--date", "2031-05-04")
                document = check_file(path, paper)
                worst = max(worst, check_crests(path, document, plan, report))
                if units == "mm":
                    check_words(path, document, report)
                files, pages = files + 1, pages + len(document)
    source = program.save("hostile", hostile(program))
    path = program.file("hostile.pdf")
    program.run("sheet", source, "-o", path, "--paper", "a3")
    text = check_file(path, "a3")[0].get_text()
    check("=cmd()<b>&\"'</b> %%c é♭□□" in text, f"hostile.pdf: {text}")
    print(f"{files} drawings of {pages} pages; crests within {worst:.1e} mm, check lines within {CHECK_LINE_MM} mm")


main()
