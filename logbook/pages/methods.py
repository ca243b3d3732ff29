"""How it is computed: every relation with its range, source, accuracy and what confirms it."""

from itertools import groupby

from django.contrib.auth.decorators import login_required
from django.http import HttpResponse
from django.shortcuts import render

import assessment

from .asked import Asked


@login_required
def methods(request: Asked) -> HttpResponse:
    """The same for everyone: it is read from the code and holds nothing of any site."""
    parts = groupby(assessment.chapters(), key=lambda chapter: chapter.part)
    return render(
        request,
        "logbook/methods.html",
        {"parts": [(part, list(files)) for part, files in parts], "engine": assessment.ENGINE},
    )
