"""What to measure next, and how wrong each input may be before the verdict changes."""

from django.contrib.auth.decorators import login_required
from django.http import HttpResponse
from django.shortcuts import render

import assessment
from logbook import access

from .asked import Asked


@login_required
def measuring(request: Asked, pk: int) -> HttpResponse:
    """Worked out when it is opened: the verdict is decided anew at worse inputs, many times."""
    one = access.assessment_for(request.user, pk, "engineer")
    asked = None if one.case_text is None else assessment.how_sure(one.case_text)
    return render(
        request,
        "logbook/measuring.html",
        {
            "tab": "desk",
            "site": one.location.component.site,
            "component": one.location.component,
            "location": one.location,
            "crack": one.crack,
            "foot_zone": one.location.component.site.time_zone,
            "assessment": one,
            "asked": asked,
        },
    )
