"""A crack's spread: what was seen of it at left, what follows at right."""

import json
from typing import Any

from django.contrib.auth.decorators import login_required
from django.http import HttpResponse
from django.shortcuts import render

from logbook import access
from logbook.actions import standing as standings
from logbook.figures.drawing import Figure
from logbook.figures.of_assessment import figures_of
from logbook.models import Assessment, Crack, Disposition, Finding, Repair, Verdict

from .asked import Asked, may
from .lines import Line, finding_words
from .outlook import outlook
from .places import standing_line


@login_required
def crack(request: Asked, pk: int) -> HttpResponse:
    one = access.crack_for(request.user, pk)
    sign = request.user.decimal_sign
    site = one.component.site
    findings = (
        Finding.objects.filter(crack=one)
        .select_related("inspection", "measurement", "strike_out__leaf", "strike_out__by", "leaf")
        .prefetch_related("photos")
        .order_by("-inspection__found_on", "-leaf__index")
    )
    line = standing_line(one.location, one, sign)
    proposal = standings.latest_assessment(one.location, one)
    signed = standings.latest_disposition(one.location, one)
    return render(
        request,
        "logbook/crack.html",
        {
            "tab": "index",
            "site": site,
            "component": one.component,
            "location": one.location,
            "crack": one,
            "foot_zone": site.time_zone,
            "line": line,
            "findings": [(finding, finding_words(finding, sign)) for finding in findings],
            "proposal": proposal,
            "signed": signed,
            "figures": figures(one, proposal, signed, sign, line),
            "shown": _shown(one, proposal),
            "working": working(proposal),
            "outlook": outlook(outcome_of(proposal)),
            "to_measure": to_measure(proposal),
            "repairs": Repair.objects.filter(crack=one).select_related("leaf"),
            "may_log": may(request, site, "log"),
            "may_engineer": may(request, site, "engineer"),
        },
    )


def figures(
    one: Crack,
    proposal: Assessment | None,
    signed: Disposition | None,
    decimal_sign: str,
    line: Line | None = None,
) -> tuple[Figure, ...]:
    """What is signed is drawn as signed only while nothing newer was proposed. With ``line`` the
    next look is the one that binds: a later one that is only proposed is no permission."""
    binding = signed if signed is not None and signed.assessment == proposal else None
    binds = None
    if line is not None:
        stands_still = line.verdict in (Verdict.REFER, Verdict.WITHDRAW)
        binds = (None, None) if stands_still else (line.reading.due_on, line.reading.due_at)
        if line.reading.signed:
            binding = signed
    return figures_of(one, proposal, disposition=binding, binds=binds, decimal_sign=decimal_sign)


def _shown(one: Crack, proposal: Assessment | None) -> Assessment | None:
    """Whose reasons stand beside the verdict: those of what binds."""
    binds = standings.what_binds(one.location, one)
    return proposal if binds is None else binds.claim.assessment


def outcome_of(proposal: Assessment | None) -> dict[str, Any]:
    if proposal is None or proposal.outcome_text is None:
        return {}
    return json.loads(proposal.outcome_text)


def working(proposal: Assessment | None) -> list[dict[str, Any]]:
    """The steps of the working; the document's word "with" is a word of the template language."""
    return [
        {**step, "numbers": step.get("with"), "value": _value(step.get("value"))}
        for step in outcome_of(proposal).get("working", [])
    ]


def _value(value: Any) -> str:
    if value is None:
        return ""
    return f"{value:.4g}" if isinstance(value, float) else str(value)


def to_measure(proposal: Assessment | None) -> list[str]:
    """What the crew brings back next time: the questions that the proposal left open."""
    if proposal is None:
        return []
    reasons = json.loads(proposal.reasons)
    asking = ("missing", "not measured", "assumed", "at least")
    return [one for one in reasons if any(word in one for word in asking)]
