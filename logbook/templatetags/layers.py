"""What came with an entry from a tablet: drawn over a photo, and what the tablet had shown."""

import json
from dataclasses import dataclass
from typing import Any

from django import template
from django.utils.html import format_html, format_html_join
from django.utils.safestring import SafeString

from logbook.models import Device, Inspection, Photo, StopNote

register = template.Library()
# The two strokes of an arrow's head, in hundredths of the picture.
HEAD = 6


@register.simple_tag
def layer(photo: Photo) -> SafeString:
    """The arrows and circles of a photo as an SVG over it; a plate below shows them on any."""
    made = getattr(photo, "layer", None)
    if made is None:
        return format_html("")
    marks = [_path(mark) for mark in json.loads(made.marks)]
    drawn = format_html_join(
        "",
        '<path class="layer-plate" d="{0}"/><path class="layer" d="{0}"/>',
        ((m,) for m in marks),
    )
    return format_html(
        '<svg viewBox="0 0 100 100" preserveAspectRatio="none" aria-hidden="true">{}</svg>', drawn
    )


def _path(mark: list[Any]) -> str:
    kind, x1, y1, x2, y2 = mark[0], *(n / 100 for n in mark[1:])
    if kind == "circle":
        rx, ry = abs(x2 - x1), abs(y2 - y1)
        return f"M{x1 - rx} {y1}a{rx} {ry} 0 1 0 {2 * rx} 0a{rx} {ry} 0 1 0 {-2 * rx} 0Z"
    return f"M{x2} {y2}L{x1} {y1}M{x1} {y1 - HEAD}V{y1}H{x1 - HEAD}"


@dataclass(frozen=True)
class OnTablet:
    device: Device
    sentences: list[str]
    notes: list[StopNote]


@register.simple_tag
def shown_on_tablet(entry: Inspection) -> OnTablet | None:
    """What the person read on the tablet when it was written, word for word; None for an entry
    that came another way."""
    sent = getattr(entry, "sent_from_tablet", None)
    if sent is None:
        return None
    try:
        shown = json.loads(sent.shown)
    except ValueError:
        shown = {}
    said = shown.get("sentences") if isinstance(shown, dict) else None
    sentences = [str(one) for one in said] if isinstance(said, list) else []
    return OnTablet(sent.device, sentences, list(StopNote.objects.filter(inspection=entry)))
