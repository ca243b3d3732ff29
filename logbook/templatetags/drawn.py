"""``{{ figure|drawn }}``: a figure of ours, inline, in the page's own font and colours."""

from django import template
from django.utils.safestring import SafeString, mark_safe

from logbook.figures.drawing import Figure

register = template.Library()


@register.filter
def drawn(figure: Figure) -> SafeString:
    # Every word in it went through the drawing's own escaping; see logbook/figures/drawing.py.
    return mark_safe(figure.page_svg)  # noqa: S308
