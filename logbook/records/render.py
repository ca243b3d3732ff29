"""A record's content → the bytes of its PDF, the same bytes each time.

Written as PDF/A-3: fonts inside, no address, the attachments tied to the document as its data.
Nothing is fetched but the fonts, and the pictures that the content itself carries.
"""

import hashlib
import re
from collections.abc import Mapping
from functools import cache
from importlib import resources
from io import BytesIO
from typing import Any

import segno
from django.template.loader import render_to_string
from django.utils.safestring import SafeString, mark_safe
from weasyprint import CSS, HTML, Attachment
from weasyprint.text.fonts import FontConfiguration
from weasyprint.urls import FatalURLFetchingError, URLFetcher, URLFetcherResponse

from logbook.figures.ink import INK
from logbook.figures.marks import mark_svg

from .content import Picture, RecordContent

VARIANT = "pdf/a-3b"
# Letters beyond Latin-1 lie in files of their own; the style names both families in turn.
FONTS = {
    "b612-regular.woff2": ("B612", 400),
    "b612-bold.woff2": ("B612", 700),
    "bitter-latin-400.woff2": ("Bitter", 400),
    "bitter-latin-700.woff2": ("Bitter", 700),
    "bitter-latin-ext-400.woff2": ("Bitter more", 400),
    "bitter-latin-ext-700.woff2": ("Bitter more", 700),
}
# Millimetres on paper of one unit of a figure.
FIGURE_MM = 0.227


class Refused(FatalURLFetchingError):
    """Something in the record pointed outside it. That must never be, so it stops the issue."""


class OnlyOurs(URLFetcher):
    """Answers ``record:`` names from what it was given, and refuses every other address."""

    def __init__(self, given: Mapping[str, tuple[bytes, str]]) -> None:
        super().__init__(allowed_protocols=("record",), allow_redirects=False)
        self._given = given

    def fetch(self, url: str, headers: Mapping[str, str] | None = None) -> URLFetcherResponse:
        if url not in self._given:
            raise Refused(f"A record holds no outside address: {url}")
        body, media_type = self._given[url]
        return URLFetcherResponse(url, BytesIO(body), {"Content-Type": media_type})


def render_record(content: RecordContent) -> bytes:
    """The PDF. Raises Refused where anything in it points outside."""
    fetcher = OnlyOurs(_given(content))
    fonts = FontConfiguration()
    html = HTML(string=record_html(content), base_url="record:", url_fetcher=fetcher)
    sheet = CSS(string=_style(), base_url="record:", url_fetcher=fetcher, font_config=fonts)
    pdf: bytes = html.write_pdf(
        stylesheets=[sheet],
        font_config=fonts,
        attachments=_attachments(content, fetcher),
        pdf_variant=VARIANT,
        pdf_identifier=_identifier(content),
        finisher=_name_attachments_once,
    )
    return pdf


def record_html(content: RecordContent) -> str:
    """The record as one HTML text, before it is set."""
    return render_to_string(
        "logbook/records/record.html",
        {
            **page_one_context(content, picture="record:picture"),
            "mark": _ours(_mark(content).replace("currentColor", INK)),
            "figures": [(one, _ours(_to_scale(one.print_svg))) for one in content.figures],
        },
    )


def _to_scale(svg: str) -> str:
    """The drawing in millimetres, all at one scale, so that two stand on a page."""
    head, body = svg.split(">", 1)
    head = re.sub(
        r' (width|height)="([\d.]+)"',
        lambda found: f' {found[1]}="{float(found[2]) * FIGURE_MM:.2f}mm"',
        head,
    )
    return f"{head}>{body}"


def page_one_context(content: RecordContent, *, picture: str) -> dict[str, Any]:
    """What ``logbook/records/page_one.html`` needs, so that the sign page can show it too.

    picture : the address of the part's picture
    """
    shown = content.part.picture
    return {
        "record": content,
        "mark": _ours(_mark(content)),
        "qr": qr_svg(content),
        "picture": picture,
        "spot": spot_svg(shown) if shown is not None else "",
    }


def _mark(content: RecordContent) -> str:
    return mark_svg(content.verdict, 18, unit="mm", key="record")


def spot_svg(picture: Picture) -> SafeString:
    """A ring around the place on the picture, in ink on white so that it shows on any photo."""
    if picture.mark is None:
        return _ours("")
    x, y = picture.mark[0] * picture.width, picture.mark[1] * picture.height
    r = 0.07 * max(picture.width, picture.height)
    ring = f'<circle cx="{x:.1f}" cy="{y:.1f}" r="{r:.1f}" fill="none"'
    return _ours(
        f'<svg class="spot" viewBox="0 0 {picture.width} {picture.height}" aria-hidden="true">'
        f'{ring} stroke="#ffffff" stroke-width="{r / 2:.1f}"/>'
        f'{ring} stroke="{INK}" stroke-width="{r / 4:.1f}"/></svg>'
    )


def qr_text(content: RecordContent) -> str:
    """What the square says: enough to look the record up and to hold it against the book."""
    return (
        f"record {content.number}\njournal {content.journal_size} entries\n"
        f"root {content.journal_root}"
    )


def qr_svg(content: RecordContent) -> SafeString:
    code = segno.make(qr_text(content), error="m", micro=False)
    return _ours(code.svg_inline(scale=1, border=0, omitsize=True, dark=INK))


def _ours(svg: str) -> SafeString:
    # Made here or in logbook.figures, which escape every word of a person.
    return mark_safe(svg)  # noqa: S308


def _name_attachments_once(_document: Any, pdf: Any) -> None:
    """The writer lists each attachment of the document twice: keep one reference of each."""
    if "AF" in pdf.catalog:
        pdf.catalog["AF"][:] = list(dict.fromkeys(pdf.catalog["AF"]))


def _identifier(content: RecordContent) -> bytes:
    whole = f"{content.number}\n{content.journal_size}\n{content.journal_root}"
    return hashlib.sha256(whole.encode()).digest()[:16]


def _attachments(content: RecordContent, fetcher: OnlyOurs) -> list[Attachment]:
    return [
        Attachment(
            string=one.text,
            base_url="record:",
            url_fetcher=fetcher,
            name=one.name,
            description=one.what,
            created=content.signed_at,
            modified=content.signed_at,
            relationship="Data",
        )
        for one in content.attachments
    ]


def _given(content: RecordContent) -> dict[str, tuple[bytes, str]]:
    given = dict(fonts_given())
    if content.part.picture is not None:
        given["record:picture"] = (content.part.picture.jpeg, "image/jpeg")
    for photo in content.photos:
        if photo.jpeg is not None:
            given[f"record:photo/{photo.sha256}"] = (photo.jpeg, "image/jpeg")
    return given


@cache
def fonts_given() -> dict[str, tuple[bytes, str]]:
    """The faces of the pages, by the names that ``faces`` asks for them."""
    folder = resources.files("logbook") / "static" / "logbook" / "fonts"
    return {f"record:font/{name}": ((folder / name).read_bytes(), "font/woff2") for name in FONTS}


def faces() -> str:
    """The style that brings the faces in."""
    return "".join(
        f'@font-face {{ font-family: "{family}"; font-weight: {weight};'
        f' src: url("record:font/{name}") format("woff2") }}\n'
        for name, (family, weight) in FONTS.items()
    )


@cache
def _style() -> str:
    sheet = resources.files("logbook") / "templates" / "logbook" / "records" / "record.css"
    return faces() + sheet.read_text(encoding="utf-8")
