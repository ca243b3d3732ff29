"""Fields as the book asks for them: nothing chosen beforehand, comma and point both read."""

from collections.abc import Iterable
from typing import Any

from django import forms
from django.utils.translation import gettext_lazy as _

MISSING = {"required": _("This is missing.")}


class Text(forms.CharField):
    def __init__(self, label: Any, *, lines: int = 1, **kwargs: Any) -> None:
        if lines > 1:
            kwargs.setdefault("widget", forms.Textarea(attrs={"rows": lines}))
        super().__init__(label=label, error_messages=MISSING, **kwargs)


class Day(forms.DateField):
    short = True

    def __init__(self, label: Any, **kwargs: Any) -> None:
        messages = MISSING | {"invalid": _("This is not a date. Write it as 2026-05-04.")}
        widget = forms.DateInput(attrs={"type": "date"}, format="%Y-%m-%d")
        super().__init__(label=label, error_messages=messages, widget=widget, **kwargs)


class Number(forms.DecimalField):
    """A number typed with a decimal point or comma; what is typed is shown again as typed."""

    short = True

    def __init__(self, label: Any, **kwargs: Any) -> None:
        messages = MISSING | {"invalid": _("This is not a number. Write it as 8.4 or 8,4.")}
        widget = forms.TextInput(attrs={"inputmode": "decimal", "autocomplete": "off"})
        super().__init__(label=label, error_messages=messages, widget=widget, **kwargs)

    def to_python(self, value: Any) -> Any:
        if isinstance(value, str):
            value = value.strip().replace(",", ".")
        return super().to_python(value)


class Choice(forms.ChoiceField):
    """Boxes to touch, none of them ticked at the start."""

    as_choice = True

    def __init__(self, label: Any, choices: Iterable[tuple[Any, Any]], **kwargs: Any) -> None:
        super().__init__(
            label=label,
            choices=list(choices),
            widget=forms.RadioSelect,
            error_messages=MISSING | {"invalid_choice": _("Choose one of these.")},
            **kwargs,
        )


class Pick(forms.ChoiceField):
    """One of a long list, with nothing chosen at the start."""

    def __init__(self, label: Any, choices: Iterable[tuple[Any, Any]], **kwargs: Any) -> None:
        super().__init__(
            label=label,
            choices=[("", _("– choose –")), *choices],
            error_messages=MISSING | {"invalid_choice": _("Choose one of these.")},
            **kwargs,
        )


def offer(field: forms.Field, choices: list[tuple[str, str]]) -> None:
    """What can be chosen here, known only when the page is asked for."""
    if not isinstance(field, forms.ChoiceField):
        raise TypeError(f"{type(field).__name__} offers no choices")
    field.choices = choices


class Tick(forms.BooleanField):
    as_tick = True

    def __init__(self, label: Any, **kwargs: Any) -> None:
        super().__init__(label=label, required=False, **kwargs)


class Password(forms.CharField):
    def __init__(self, label: Any, **kwargs: Any) -> None:
        widget = forms.PasswordInput(attrs={"autocomplete": "current-password"})
        super().__init__(label=label, strip=False, widget=widget, error_messages=MISSING, **kwargs)
