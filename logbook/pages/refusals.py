"""A refusal as a page: the same object that the API answers with, in one shape."""

from collections.abc import Callable
from typing import Any, TypeVar

from django.forms import Form
from django.http import HttpRequest, HttpResponse
from django.shortcuts import render

from logbook.errors import Refusal

T = TypeVar("T")
# There is nothing to show a form for: these take the whole page.
WHOLE_PAGE = {401, 404}


class RefusalMiddleware:
    """Turns a refusal that no form has shown into its page. The API has its own door."""

    def __init__(self, get_response: Callable[[HttpRequest], HttpResponse]) -> None:
        self.get_response = get_response

    def __call__(self, request: HttpRequest) -> HttpResponse:
        return self.get_response(request)

    def process_exception(self, request: HttpRequest, error: Exception) -> HttpResponse | None:
        if not isinstance(error, Refusal) or request.path.startswith("/api/"):
            return None
        return page(request, error)


def page(request: HttpRequest, refusal: Refusal) -> HttpResponse:
    return render(request, "logbook/refusal.html", {"refusal": refusal}, status=refusal.status)


def attempt(form: Form, act: Callable[..., T], *args: Any, **kwargs: Any) -> T | None:
    """Do the act. What is refused is shown in the form, beside the fields it names, and None comes
    back: nothing that was typed is lost.
    """
    try:
        return act(*args, **kwargs)
    except Refusal as refusal:
        if refusal.status in WHOLE_PAGE:
            raise
        show_beside(form, refusal)
        return None


def show_beside(form: Form, refusal: Refusal) -> None:
    """The refusal's sentences at their fields; what has no field here stands at the top."""
    form.refusal_status = refusal.status  # type: ignore[attr-defined]
    form.add_error(None, refusal.sentence)
    for name, sentences in refusal.fields.items():
        for sentence in sentences:
            form.add_error(name if name in form.fields else None, sentence)


def form_status(form: Form) -> int:
    """200 for a form just opened, the refusal's own status, or 400 for what could not be read."""
    if not form.is_bound or not form.errors:
        return 200
    return getattr(form, "refusal_status", 400)
