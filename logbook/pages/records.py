"""The list of printed records, and each as its stored bytes."""

from django.contrib.auth.decorators import login_required
from django.core.paginator import Paginator
from django.http import HttpResponse
from django.shortcuts import render

from logbook import access
from logbook.models import Disposition, Record
from logbook.records.issue import stored_bytes

from .asked import Asked

A_PAGE = 50


@login_required
def records(request: Asked) -> HttpResponse:
    """Every number, issued or void: a gap would show."""
    sites = list(access.sites_of(request.user))
    rows = (
        Record.objects.filter(site__in=sites)
        .select_related(
            "site",
            "disposition__location__component",
            "disposition__crack",
            "disposition__signatory",
            "deferral__disposition__location__component",
            "deferral__disposition__crack",
            "deferral__by",
        )
        .order_by("-number")
    )
    leaf = Paginator(rows, A_PAGE).get_page(request.GET.get("leaf"))
    return render(
        request,
        "logbook/records.html",
        {
            "tab": "records",
            "leaf": leaf,
            "rows": [(one, _signed(one)) for one in leaf.object_list],
            "foot_zone": sites[0].time_zone if sites else "UTC",
        },
    )


def _signed(one: Record) -> Disposition | None:
    """What the record is of: the signed verdict, or the one whose look was put off."""
    return one.deferral.disposition if one.deferral is not None else one.disposition


@login_required
def record(request: Asked, number: int) -> HttpResponse:
    """A reprint is the stored bytes, never a new rendering."""
    one = access.record_for(request.user, number)
    answer = HttpResponse(stored_bytes(one), content_type="application/pdf")
    answer["Content-Disposition"] = f'attachment; filename="record-{one.number}.pdf"'
    return answer
