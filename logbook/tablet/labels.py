"""Sheets of QR labels: A4, three across and eight down, the number large beside the code.

The code has the highest error correction, since a label in a lock chamber gets scratched.
"""

from dataclasses import dataclass
from importlib import resources

import segno
from django.template.loader import render_to_string
from django.utils.safestring import SafeString, mark_safe
from weasyprint import CSS, HTML
from weasyprint.text.fonts import FontConfiguration

from logbook.records.render import OnlyOurs, faces, fonts_given

A_SHEET = 24


@dataclass(frozen=True)
class Label:
    tag: str
    name: str
    address: str

    @property
    def code(self) -> SafeString:
        made = segno.make(self.address, error="h", micro=False)
        # Our own drawing of the address; nothing of what people write is markup in it.
        return mark_safe(made.svg_inline(scale=1, border=4, omitsize=True))  # noqa: S308


def sheet(site: str, labels: list[Label]) -> bytes:
    """The PDF; a site without parts gets one empty sheet that says so."""
    sheets = [labels[at : at + A_SHEET] for at in range(0, len(labels), A_SHEET)]
    html = render_to_string("logbook/tablet/labels.html", {"site": site, "sheets": sheets})
    fetcher = OnlyOurs(fonts_given())
    fonts = FontConfiguration()
    style = resources.files("logbook") / "templates" / "logbook" / "tablet" / "labels.css"
    set_so = CSS(
        string=faces() + style.read_text(encoding="utf-8"),
        base_url="record:",
        url_fetcher=fetcher,
        font_config=fonts,
    )
    pdf: bytes = HTML(string=html, base_url="record:", url_fetcher=fetcher).write_pdf(
        stylesheets=[set_so], font_config=fonts
    )
    return pdf
