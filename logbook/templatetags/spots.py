"""``{% spot place picture %}``: where a place is marked, drawn over the picture of the part."""

from django import template
from django.utils.html import format_html
from django.utils.safestring import SafeString

from logbook.models import Location, Photo

register = template.Library()
# The ring as a part of the picture's width.
RING = 0.022


@register.simple_tag
def spot(place: Location, picture: Photo) -> SafeString:
    """A ring with the place's number on a sheet-coloured plate."""
    if place.picture_x is None or place.picture_y is None or not picture.width:
        return format_html("")
    wide, tall = picture.width, picture.height or 0
    x, y, radius = place.picture_x * wide, place.picture_y * tall, wide * RING
    # The number stands right of the ring, or left of it near the right edge.
    text_x, anchor = (
        (x + 1.5 * radius, "start") if place.picture_x < 0.8 else (x - 1.5 * radius, "end")
    )
    return format_html(
        '<circle class="spot-plate" cx="{0}" cy="{1}" r="{2}" stroke-width="{3}"/>'
        '<circle class="spot" cx="{0}" cy="{1}" r="{2}" stroke-width="{4}"/>'
        '<text class="spot-number" x="{5}" y="{6}" font-size="{7}" stroke-width="{4}"'
        ' text-anchor="{8}">{9}</text>',
        *(f"{value:.1f}" for value in (x, y, radius, radius * 0.7, radius * 0.3)),
        *(f"{value:.1f}" for value in (text_x, y + 0.6 * radius, 2 * radius)),
        anchor,
        place.number,
    )
