"""What a tablet asks and sends. Every answer is JSON and echoes the key that was sent: a tablet
takes nothing else for success, whatever stands between."""

from collections.abc import Mapping
from typing import Any

from django.middleware.csrf import get_token
from drf_spectacular.utils import extend_schema
from rest_framework import parsers
from rest_framework.request import Request
from rest_framework.response import Response

from logbook import access
from logbook.actions import photo_pieces
from logbook.actions.crew_words import verdict_sentence
from logbook.actions.tablets import at_contact, live, register_tablet, tablet_for
from logbook.actions.take_in_from_tablet import (
    declare_round,
    note_stop,
    take_in_from_tablet,
)
from logbook.errors import Refusal, invalid
from logbook.models import Assessment, AssessmentAsked, Device, Inspection, Person, Site, Verdict
from logbook.records.sentences import until

from .asked import TabletView, sent, who
from .package import package

SESSION_KEY = "tablet"


@extend_schema(exclude=True)
class Me(TabletView):
    """Who is signed in, at which sites, and the token that a send must carry."""

    def get(self, request: Request) -> Response:
        person = who(request)
        return Response(
            {
                "person": {"id": person.pk, "name": str(person)},
                "csrf": get_token(request._request),
                "sites": [
                    {"slug": site.slug, "name": site.name}
                    for site in access.sites_of(person, "log").order_by("slug")
                ],
            }
        )


@extend_schema(exclude=True)
class Register(TabletView):
    def post(self, request: Request, slug: str) -> Response:
        person = who(request)
        data = sent(request)
        site = access.site_for(person, slug, "log")
        _not_a_revoked_session(request, site)
        device = register_tablet(person, site, key=data.get("key"), name=str(data.get("name", "")))
        request.session[SESSION_KEY] = str(device.key)
        return Response({"key": device.key, "name": device.name})


def _not_a_revoked_session(request: Request, site: Site) -> None:
    """A revoked tablet does not come back under another key by the session that it still holds."""
    held = request.session.get(SESSION_KEY)
    if held is not None:
        for device in Device.objects.filter(key=held, site=site, revoked_at__isnull=False):
            live(device)


@extend_schema(exclude=True)
class Package(TabletView):
    def get(self, request: Request, slug: str) -> Response:
        person = who(request)
        site = access.site_for(person, slug, "log")
        _not_a_revoked_session(request, site)
        device = live(tablet_for(site, request.query_params.get("tablet")))
        request.session[SESSION_KEY] = str(device.key)
        waiting = request.query_params.get("waiting", "")
        at_contact(device, int(waiting) if waiting.isdecimal() and len(waiting) < 7 else None)
        answer = Response(package(person, site))
        answer["Cache-Control"] = "no-store"
        return answer


@extend_schema(exclude=True)
class Send(TabletView):
    """One thing that waited: an entry, a note of a stop, the end of a round."""

    def post(self, request: Request, slug: str, kind: str) -> Response:
        person, data = who(request), sent(request)
        site = access.site_once_for(person, slug)
        if kind == "entry":
            return self._entry(person, site, data, "more" in request.query_params)
        if kind == "stop-note":
            note = note_stop(person, site, data)
            return Response({"key": note.key, "entry_number": note.entry_number})
        if kind == "round":
            made = declare_round(person, site, data)
            return Response({"key": made.key, "entry_number": made.entry_number})
        raise invalid("A tablet sends an entry, a stop-note or a round.", {})

    def _entry(self, person: Person, site: Site, data: Mapping[str, Any], more: bool) -> Response:
        entry = data.get("entry")
        key = entry.get("key") if isinstance(entry, dict) else None
        try:
            taken = take_in_from_tablet(person, site, data, more=more)
        except Refusal as refusal:
            if refusal.code != "same-key-other-content":
                raise
            # Both are kept: the tablet need not hold it any longer, and shows it to the person.
            return Response({"key": key, "tray": None, "problem": refusal.as_problem()}, status=202)
        if taken.inspection is None:
            assert taken.refusal is not None
            return Response(
                {"key": key, "tray": taken.kept, "problem": taken.refusal.as_problem()}, status=202
            )
        return Response(answer(taken.inspection), status=200 if taken.again else 201)


@extend_schema(exclude=True)
class Answer(TabletView):
    """The verdict of an entry that was sent, for the tablet that waits for it."""

    def get(self, request: Request, key: Any) -> Response:
        person = who(request)
        found = Inspection.objects.filter(key=key).first()
        return Response(answer(access.inspection_for(person, found.pk if found else None)))


def answer(inspection: Inspection) -> dict[str, Any]:
    """The entry by its key, its number, its photos by digest, and the verdicts it has so far."""
    site, component = inspection.component.site, inspection.component
    pending = AssessmentAsked.objects.filter(because_act=inspection.leaf_id).exists()
    findings = list(inspection.findings.select_related("crack").order_by("pk"))
    verdicts = []
    for finding in findings:
        made = (
            Assessment.objects.filter(
                location=finding.location_id,
                crack=finding.crack_id,
                leaf__index__gt=inspection.leaf.index,
            )
            .order_by("-leaf__index")
            .first()
        )
        if made is not None:
            by = until(made.until_on, made.until_at, component.counter_unit)
            verdicts.append(
                {
                    "location": finding.location_id,
                    "crack": finding.crack.number if finding.crack else None,
                    "verdict": made.verdict,
                    "word": str(Verdict(made.verdict).label),
                    "sentence": verdict_sentence(
                        made.verdict, by, made.limit, site.on_call_name, site.on_call_phone
                    ),
                    # Unsigned, easy verdicts bind only where the owner has said so.
                    "held": site.unsigned_may_be_acted_on is not True
                    or made.verdict not in (Verdict.CONTINUE, Verdict.WATCH),
                }
            )
    return {
        "key": str(inspection.key),
        "entry_number": inspection.entry_number,
        "in_book_at": inspection.in_book_at.isoformat(),
        "inspection": inspection.pk,
        "findings": [finding.pk for finding in findings],
        "photos": {
            photo.sha256: {"id": photo.pk, "arrived": photo.arrived_at is not None}
            for finding in findings
            for photo in finding.photos.all()
        },
        "pending": pending,
        "verdicts": verdicts,
    }


class PieceParser(parsers.BaseParser):
    media_type = "application/octet-stream"

    def parse(
        self, stream: Any, media_type: str | None = None, parser_context: Any = None
    ) -> dict[str, bytes]:
        return {"data": stream.read(photo_pieces.LARGEST_PIECE + 1)}


@extend_schema(exclude=True)
class Piece(TabletView):
    parser_classes = (PieceParser,)

    def get(self, request: Request, pk: int) -> Response:
        """How far the photo has come."""
        return Response({"photo": pk, "have": photo_pieces.have(who(request), pk)})

    def put(self, request: Request, pk: int) -> Response:
        access.photo_for(who(request), pk, "log")
        said = [request.query_params.get(name, "") for name in ("start", "whole")]
        if not all(one.isascii() and one.isdecimal() and len(one) < 12 for one in said):
            raise invalid("Say where the piece starts and how large the photo is.", {})
        piece = request.data.get("data") if isinstance(request.data, dict) else b""
        photo = photo_pieces.add_piece(who(request), pk, int(said[0]), int(said[1]), piece or b"")
        return Response(
            {
                "photo": photo.pk,
                "sha256": photo.sha256,
                "arrived": photo.arrived_at is not None,
                "have": photo_pieces.have(who(request), pk),
            }
        )
