"""Reading an SVG back: where its words and strokes stand on paper."""

import re
from xml.etree import ElementTree

SVG = "{http://www.w3.org/2000/svg}"


def parsed(svg):
    return ElementTree.fromstring(svg)


def texts(svg):
    """Every line of words."""
    lines = []
    for one in parsed(svg).iter(f"{SVG}text"):
        lines += [part for part in one.itertext() if part]
    return lines


def _move(element):
    found = re.match(r"translate\(([-\d.e]+),([-\d.e]+)\)", element.get("transform", ""))
    return (float(found[1]), float(found[2])) if found else (0.0, 0.0)


def placed(svg, name):
    """(element, x, y) of every element of a name, with its translations added up."""
    found = []

    def walk(element, x, y):
        dx, dy = _move(element)
        if element.tag == f"{SVG}{name}":
            found.append((element, x + dx, y + dy))
        for child in element:
            walk(child, x + dx, y + dy)

    walk(parsed(svg), 0.0, 0.0)
    return found


def axis_values(svg, orient="bottom"):
    """Axis labels that are plain numbers: (value, x, y)."""
    values = []
    for element, x, y in placed(svg, "text"):
        text = "".join(element.itertext()).replace(",", "")
        if re.fullmatch(r"\d+(\.\d+)?", text):
            values.append((float(text), x, y))
    return values


def scale(pairs):
    """(slope, offset) of the straight line through the first and last of (value, px)."""
    (v1, p1), (v2, p2) = pairs[0], pairs[-1]
    slope = (p2 - p1) / (v2 - v1)
    return slope, p1 - slope * v1
