"""Paper drawings in SVG as XML: size in millimetres, nothing but drawing elements, text that stays text."""

import xml.etree.ElementTree as ElementTree

from common import PAPERS_MM, UNITS, check, hostile, plans, start

SVG = "{http://www.w3.org/2000/svg}"
ELEMENTS = {SVG + name for name in ("svg", "g", "title", "rect", "path", "text")}
# Coordinates are written to a ten-thousandth.
SIZE_MM = 0.001


def check_file(path, paper):
    root = ElementTree.parse(path).getroot()
    check({element.tag for element in root.iter()} <= ELEMENTS, f"{path}: foreign elements")
    for element in root.iter():
        check(not any(key.startswith("on") or "href" in key for key in element.attrib), f"{path}: {element.attrib}")
    size = [float(root.get(side).removesuffix("mm")) for side in ("width", "height")]
    check(all(root.get(side).endswith("mm") for side in ("width", "height")), f"{path}: not in mm")
    box = [float(number) for number in root.get("viewBox").split()]
    check(box[:2] == [0.0, 0.0] and box[2:] == size, f"{path}: {box} for {size}")
    sheets = [group for group in root if group.tag == SVG + "g"]
    width, height = PAPERS_MM[paper]
    check(abs(size[0] - width) <= SIZE_MM, f"{path}: width {size[0]}")
    check(abs(size[1] - height * len(sheets)) <= SIZE_MM, f"{path}: {len(sheets)} sheets in {size[1]} mm")
    return root, len(sheets)


def main():
    program = start()
    files, sheets = 0, 0
    for name, plan in plans(program):
        source = program.save(name, plan)
        for paper in PAPERS_MM:
            for units in UNITS if "-" not in name else UNITS[:1]:
                path = program.file(f"{name}-{paper}-{units}.svg")
                program.run("sheet", source, "-o", path, "--paper", paper, "--units", units)
                root, count = check_file(path, paper)
                words = " ".join(text.text for text in root.iter(SVG + "text"))
                for string in plan["strings"]:
                    check(string.get("name", "1") in words, f"{path}: a string without its name")
                files, sheets = files + 1, sheets + count
    source = program.save("hostile", hostile(program))
    path = program.file("hostile.svg")
    program.run("sheet", source, "-o", path)
    root, _ = check_file(path, "a4")
    titles = [text.text for text in root.iter(SVG + "text") if "cmd()" in text.text]
    check(any(title.startswith("=cmd()<b>&\"'</b>") for title in titles), f"hostile.svg: {titles}")
    print(f"{files} drawings of {sheets} sheets are well-formed and of true size")


main()
