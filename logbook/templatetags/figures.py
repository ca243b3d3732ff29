"""``{% load figures %}`` … ``{% mark "watch" 96 %}``: the verdict mark, inline."""

from django import template
from django.utils.safestring import SafeString, mark_safe

from logbook.figures.marks import mark_svg

register = template.Library()


@register.simple_tag
def mark(verdict: str, size: float = 24, unit: str = "") -> SafeString:
    """The mark of a verdict; its word stands beside it, never the mark alone."""
    # Nothing of what people write is in it: our own paths, and a verdict that is looked up.
    return mark_safe(mark_svg(verdict, size, unit=unit))  # noqa: S308
