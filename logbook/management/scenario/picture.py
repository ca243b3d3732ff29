"""Simple drawings that stand for photographs of the demo's parts."""

from PIL import Image, ImageDraw

SIZE = (1200, 800)
PAPER, METAL, EDGE, DARK = "#dfe5df", "#aab4ae", "#45525a", "#7d8a84"


def draw(what: str, words: str) -> Image.Image:
    """A grey part on a light ground, with its name; one shape for each sort of part."""
    image = Image.new("RGB", SIZE, PAPER)
    pen = ImageDraw.Draw(image)
    _SHAPES[what](pen)
    pen.text((40, 30), words, fill=EDGE, font_size=34)
    pen.text((40, 745), "drawing: invented part of the demo scenario", fill=EDGE, font_size=22)
    return image


def _link(pen: ImageDraw.ImageDraw) -> None:
    pen.rounded_rectangle((150, 330, 1050, 500), 30, METAL, EDGE, 5)
    for x in (260, 940):
        pen.ellipse((x - 150, 265, x + 150, 565), METAL, EDGE, 5)
        pen.ellipse((x - 65, 350, x + 65, 480), PAPER, EDGE, 5)


def _girder(pen: ImageDraw.ImageDraw) -> None:
    pen.rectangle((90, 280, 1110, 320), METAL, EDGE, 5)
    pen.rectangle((90, 320, 1110, 520), DARK, EDGE, 5)
    pen.rectangle((90, 520, 1110, 565), METAL, EDGE, 5)
    for x in (300, 600, 900):
        pen.line((x, 320, x, 470), EDGE, 8)


def _shaft(pen: ImageDraw.ImageDraw) -> None:
    pen.rectangle((90, 370, 1110, 470), METAL, EDGE, 5)
    pen.rectangle((430, 290, 760, 550), DARK, EDGE, 5)
    pen.rectangle((850, 395, 1010, 425), EDGE)


def _vessel(pen: ImageDraw.ImageDraw) -> None:
    pen.rounded_rectangle((170, 260, 1030, 580), 150, METAL, EDGE, 5)
    pen.rectangle((560, 200, 640, 262), DARK, EDGE, 5)


def _plate(pen: ImageDraw.ImageDraw) -> None:
    pen.polygon(((260, 640), (360, 200), (840, 200), (940, 640)), METAL, EDGE, 5)
    for x, y in ((430, 290), (770, 290), (390, 560), (810, 560)):
        pen.ellipse((x - 30, y - 30, x + 30, y + 30), PAPER, EDGE, 5)


def _tie(pen: ImageDraw.ImageDraw) -> None:
    pen.rectangle((120, 320, 1080, 520), METAL, EDGE, 5)
    pen.ellipse((840, 360, 960, 480), PAPER, EDGE, 5)


def _lever(pen: ImageDraw.ImageDraw) -> None:
    pen.polygon(((120, 390), (760, 330), (1080, 200), (1080, 300), (860, 420), (1080, 540),
                 (1080, 640), (760, 510), (120, 470)), METAL, EDGE, 5)  # fmt: skip
    pen.ellipse((130, 380, 230, 480), PAPER, EDGE, 5)


_SHAPES = {
    "link": _link,
    "girder": _girder,
    "shaft": _shaft,
    "vessel": _vessel,
    "plate": _plate,
    "tie": _tie,
    "lever": _lever,
}
