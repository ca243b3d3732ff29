"""An invented record, and a picture made for it."""

from datetime import UTC, date, datetime
from hashlib import sha256
from io import BytesIO

from PIL import Image, ImageDraw

from logbook.figures.diagram import diagram_figure
from logbook.figures.drawing import Table
from logbook.figures.size_usage import size_figure
from logbook.records.content import (
    Attachment,
    Line,
    Part,
    PhotoShown,
    Picture,
    RecordContent,
    Sighting,
    Signature,
    Step,
)
from tests.figures.stories import DIAGRAM, STORY

ROOT = sha256(b"root").hexdigest()


def jpeg(width=640, height=420, shade=(150, 160, 155)):
    image = Image.new("RGB", (width, height), shade)
    pen = ImageDraw.Draw(image)
    pen.rectangle((width * 0.2, height * 0.3, width * 0.8, height * 0.7), fill=(90, 98, 94))
    pen.line((width * 0.5, height * 0.31, width * 0.52, height * 0.6), fill=(20, 20, 20), width=3)
    out = BytesIO()
    image.save(out, "JPEG", quality=80)
    return out.getvalue()


def attachment(name, text, what):
    return Attachment(name, text, sha256(text.encode()).hexdigest(), what)


def content(**changes):
    made = {
        "number": 12,
        "verdict": "restrict",
        "sentence": "May be used only up to 12 t. Look again by 14 Dec 2026 or 14,400 lifts.",
        "limit": "12 t on the hook; the limiter is set and tag 88 hangs at the desk",
        "until": "14 Dec 2026 or 14,400 lifts, whichever comes first",
        "held": False,
        "part": Part(
            site="Lower Mill lock",
            tag="C-17",
            name="Quay crane, jib foot",
            place="4 Lower chord, weld at gusset",
            crack="crack 2",
            serial="88-1207",
            picture=Picture(jpeg(), 640, 420, (0.51, 0.45)),
        ),
        "signature": Signature(
            "Ása Wójcik-Öz", "Board of Lifting Engineers 4471", "approved",
            "5 May 2026, 16:20 +02:00", 211,
        ),
        "caution": (
            "This is a proposal that a licensed person has signed. The owner’s codes, the local"
            " rules and licensed practice come first."
        ),
        "signed_at": datetime(2026, 5, 5, 14, 20, tzinfo=UTC),
        "journal_size": 211,
        "journal_root": ROOT,
        "engine": "assessment 0.1, NumPy 2.4, SciPy 1.17",
        "decided": (
            Line("proposed", "restrict, 4 May 2026, 15:02 +02:00", source="entry 207"),
            Line("review", "accepted by J. Brandt", True, "entry 209"),
        ),
        "reasons": (
            "Taken at its worst it holds at the largest load with a reserve of 1.21.",
            "1.40 is asked for; at 12 t the reserve is 1.47.",
        ),
        "look": (
            Line("procedure", "UT-12 revision 3", True),
            Line("instrument", "flaw detector 3, calibrated until 1 Nov 2026", True),
            Line("surface", "bare, dry", True),
        ),
        "sightings": (
            Sighting("15 Jan 2024", "6,100 lifts", "a crack", "5.1 mm", "18 mm",
                     "ultrasonic, angle beam", "O. Varga", entry=31),
            Sighting("12 May 2025", "9,900 lifts", "a crack", "7.8 mm", "24 mm",
                     "ultrasonic, angle beam", "O. Varga",
                     struck="read from the wrong edge", entry=120),
            Sighting("12 May 2025", "9,900 lifts", "a crack", "6.6 mm", "21 mm",
                     "ultrasonic, angle beam", "O. Varga", "second reading agrees", entry=122),
            Sighting("4 May 2026", "12,600 lifts", "a crack", "8.4 mm", "24 mm",
                     "ultrasonic, angle beam", "P. Nkosi", entry=206),
        ),
        "photos": (
            PhotoShown("mouth of the crack", sha256(b"1").hexdigest(), 206, jpeg(600, 400)),
            PhotoShown("", sha256(b"2").hexdigest(), 206, None),
        ),
        "figures": (size_figure(STORY), diagram_figure(DIAGRAM)),
        "rules": Table(
            ("rule", "date", "counter", "why not"),
            (
                ("1 worst life ÷ 2 (governs)", "14 Dec 2026", "14,400 lifts", ""),
                ("2 forecast", "", "", "not computed yet"),
            ),
        ),
        "inputs": (
            Line("toughness", "96 MPa√m; worst: 72 MPa√m", True, "mill certificate 4471, lowest of"
                 " three"),
            Line("peak stress", "membrane 121 MPa, bending 34 MPa", True, "strain gauge log 2024"),
        ),
        "steps": tuple(
            Step("Stress intensity at the deepest point", "K = F · σ · √(π · a / Q)",
                 "1.09 · 155 MPa · √(π · 9.6 mm / 1.46)", "24.3", "MPa√m",
                 "Newman & Raju 1981, NASA TM-85793, equation 1")
            for _ in range(6)
        ),
        "cautions": ("No credit is taken for load-order retardation.",),
        "attachments": (
            attachment("case.json", '{"case":1}', "the case, as it was assessed"),
            attachment("outcome.json", '{"outcome":1}', "the outcome"),
        ),
    }  # fmt: skip
    return RecordContent(**{**made, **changes})


TODAY = date(2026, 5, 5)
