"""How numbers, dates and the two voices are written on a page. ``{% load words %}``"""

import datetime
from decimal import Decimal
from typing import Any

from django import template
from django.utils.html import format_html
from django.utils.safestring import SafeString
from django.utils.translation import gettext as _

from logbook.figures import words
from logbook.pages import writing

register = template.Library()


@register.filter
def day(on: datetime.date | None) -> str:
    """14 Sep 2027, with spaces that do not break."""
    return writing.day(on) if on else ""


@register.filter
def moment(at: datetime.datetime | None, time_zone: str = "UTC") -> str:
    """4 May 2026, 09:55 +02:00, where the site is."""
    return writing.moment(at, time_zone) if at else ""


@register.filter
def counts(unit: str) -> str:
    """What is counted, in the plural as the figures have it."""
    return words.counts(unit)


def _sign(context: template.Context) -> str:
    return str(context.get("decimal_sign", "."))


@register.simple_tag(takes_context=True)
def num(context: template.Context, value: Decimal | float | None) -> str:
    """A number as this person reads it; empty for none."""
    return "" if value is None else writing.number(value, _sign(context))


@register.simple_tag(takes_context=True)
def usage(context: template.Context, at: Decimal, unit: str) -> str:
    """14,950 hours."""
    return writing.usage(at, unit, _sign(context))


@register.simple_tag(takes_context=True)
def mm(context: template.Context, value: Decimal | float | None) -> SafeString:
    """8.4 mm, the unit in Regular."""
    if value is None:
        return format_html("{}", _("not measured"))
    said = writing.number(value, _sign(context))
    return format_html('<span class="whole">{}&nbsp;<span class="unit">mm</span></span>', said)


@register.simple_tag
def entered(value: Any, classes: str = "") -> SafeString:
    """In the person's voice, and said so to those who only hear the page."""
    return format_html(
        '<span class="entered {}"><span class="hidden">{} </span>{}</span>',
        classes,
        _("entered:"),
        value,
    )


@register.simple_tag
def computed(value: Any, classes: str = "") -> SafeString:
    """In the program's voice."""
    return format_html(
        '<span class="computed {}"><span class="hidden">{} </span>{}</span>',
        classes,
        _("computed:"),
        value,
    )
