"""The endpoints: thin. Look-ups go through logbook.access, changes through logbook.actions."""

from collections.abc import Mapping
from typing import Any, ClassVar

from django.db.models import QuerySet
from django.http import FileResponse
from drf_spectacular.utils import extend_schema
from rest_framework import generics, parsers
from rest_framework.exceptions import NotAuthenticated
from rest_framework.request import Request
from rest_framework.response import Response
from rest_framework.views import APIView

from logbook import access
from logbook.actions.add_photo import add_photo, photos_path
from logbook.actions.answer import answer_now
from logbook.actions.strike_out import strike_out
from logbook.actions.take_in import take_in
from logbook.errors import invalid, not_found
from logbook.models import (
    Assessment,
    AssessmentAsked,
    Component,
    Crack,
    Inspection,
    Person,
    Record,
    Site,
    Standing,
)
from logbook.records.issue import stored_bytes

from . import shapes


def _who(request: Request) -> Person:
    """Who asks. Nobody comes this far unsigned: the default permission has refused them."""
    if not isinstance(request.user, Person):
        raise NotAuthenticated
    return request.user


PROBLEMS = dict.fromkeys((400, 403, 404, 409), shapes.Problem)


class Sites(generics.ListAPIView[Site]):
    """The sites that you may see."""

    serializer_class = shapes.SiteShape
    queryset = Site.objects.none()

    def get_queryset(self) -> QuerySet[Site]:
        return access.sites_of(_who(self.request)).order_by("slug")


class Components(generics.ListAPIView[Component]):
    """The components of your sites, with their places in walking order."""

    serializer_class = shapes.ComponentShape
    queryset = Component.objects.none()
    filterset_fields = ("tag",)

    def get_queryset(self) -> QuerySet[Component]:
        rows = Component.objects.filter(site__in=access.sites_of(_who(self.request)))
        return rows.select_related("site").prefetch_related("locations").order_by("site_id", "tag")


class OneComponent(APIView):
    @extend_schema(responses={200: shapes.ComponentShape, **PROBLEMS})
    def get(self, request: Request, pk: int) -> Response:
        component = access.component_for(_who(request), pk)
        return Response(shapes.ComponentShape(component).data)


class Standings(generics.ListAPIView[Standing]):
    """What binds now, soonest due first."""

    serializer_class = shapes.StandingShape
    queryset = Standing.objects.none()
    filterset_fields: ClassVar = {"location__component": ["exact"], "verdict": ["exact"]}

    def get_queryset(self) -> QuerySet[Standing]:
        rows = Standing.objects.filter(site__in=access.sites_of(_who(self.request)))
        return rows.select_related("location__component__site", "crack").order_by("due_on", "pk")


class Cracks(generics.ListAPIView[Crack]):
    serializer_class = shapes.CrackShape
    queryset = Crack.objects.none()
    filterset_fields = ("component", "location")

    def get_queryset(self) -> QuerySet[Crack]:
        sites = access.sites_of(_who(self.request))
        return Crack.objects.filter(component__site__in=sites).order_by("component_id", "number")


class OneCrack(APIView):
    @extend_schema(responses={200: shapes.CrackShape, **PROBLEMS})
    def get(self, request: Request, pk: int) -> Response:
        return Response(shapes.CrackShape(access.crack_for(_who(request), pk)).data)


class Assessments(generics.ListAPIView[Assessment]):
    """Proposals, newest first."""

    serializer_class = shapes.ProposalShape
    queryset = Assessment.objects.none()
    filterset_fields = ("location", "crack", "verdict")

    def get_queryset(self) -> QuerySet[Assessment]:
        sites = access.sites_of(_who(self.request))
        return Assessment.objects.filter(location__component__site__in=sites).order_by("-pk")


class OneAssessment(APIView):
    @extend_schema(responses={200: shapes.AssessmentShape, **PROBLEMS})
    def get(self, request: Request, pk: int) -> Response:
        return Response(shapes.AssessmentShape(access.assessment_for(_who(request), pk)).data)


class Inspections(generics.ListAPIView[Inspection]):
    """Entries, newest first; POST writes one."""

    serializer_class = shapes.InspectionShape
    queryset = Inspection.objects.none()
    filterset_fields = ("component", "found_on", "key")

    def get_queryset(self) -> QuerySet[Inspection]:
        rows = Inspection.objects.filter(component__site__in=access.sites_of(_who(self.request)))
        return rows.select_related("leaf").prefetch_related(
            "findings__photos", "findings__crack", "findings__measurement", "findings__strike_out"
        ).order_by("-pk")  # fmt: skip

    @extend_schema(
        request=shapes.InspectionSent,
        responses={201: shapes.InspectionAnswer, 200: shapes.InspectionAnswer, **PROBLEMS},
    )
    def post(self, request: Request) -> Response:
        """Write an inspection.

        What does not fit is refused with its fields named, and nothing is written. With the query
        parameter ``keep=tray`` such an entry is kept whole for a person to look at (202): a
        sender that cannot ask its author back never loses one. Sent again with the same key and
        content, the first answer comes again (200); the same key with other content is 409, both
        kept in the tray.
        """
        data = request.data
        if not isinstance(data, Mapping):
            raise invalid("An entry is an object of named fields.", {})
        keep = request.query_params.get("keep") == "tray"
        taken = take_in(_who(request), data, keep=keep)
        if taken.refusal is not None:
            return Response({**taken.refusal.as_problem(), "kept": taken.kept}, status=202)
        assert taken.inspection is not None
        return _answer(taken.inspection, 200 if taken.again else 201)


def _answer(inspection: Inspection, status: int) -> Response:
    owed = AssessmentAsked.objects.filter(because_act=inspection.leaf_id).exists()
    proposals = _proposals_since(inspection)
    fresh = (
        Inspection.objects.select_related("leaf")
        .prefetch_related("findings__photos", "findings__crack")
        .get(pk=inspection.pk)
    )
    made = {
        "key": fresh.key,
        "inspection": fresh,
        "pending": owed,
        "proposals": proposals,
    }
    return Response(shapes.InspectionAnswer(made).data, status=status)


def _proposals_since(inspection: Inspection) -> list[Assessment]:
    """The newest proposal for each place or crack of the entry: one computation may have answered
    several entries."""
    found = []
    pairs = inspection.findings.values_list("location", "crack").distinct()
    for location, crack in pairs:
        newest = (
            Assessment.objects.filter(
                location=location, crack=crack, leaf__index__gt=inspection.leaf.index
            )
            .order_by("-leaf__index")
            .first()
        )
        found += [] if newest is None else [newest]
    return sorted(found, key=lambda one: one.pk)


class OneInspection(APIView):
    @extend_schema(responses={200: shapes.InspectionAnswer, **PROBLEMS})
    def get(self, request: Request, pk: int) -> Response:
        return _answer(access.inspection_for(_who(request), pk), 200)


class StrikeOuts(APIView):
    @extend_schema(
        request=shapes.StrikeOutSent, responses={201: shapes.StrikeOutAnswer, **PROBLEMS}
    )
    def post(self, request: Request, pk: int) -> Response:
        """Strike a finding out, and where sizes are given write the right ones in its place."""
        sent = request.data if isinstance(request.data, Mapping) else {}
        right = {name: value for name, value in sent.items() if name != "reason"}
        made = strike_out(_who(request), pk, str(sent.get("reason", "")), right or None)
        answer_now(made.leaf_id)
        answer = {"finding": pk, "replaced_by": made.replaced_by_id, "reason": made.reason}
        return Response(answer, status=201)


class AnyBytes(parsers.BaseParser):
    """The photo itself, as it is."""

    media_type = "application/octet-stream"

    def parse(
        self, stream: Any, media_type: str | None = None, parser_context: Any = None
    ) -> dict[str, bytes]:
        from django.conf import settings

        return {"data": stream.read(settings.PHOTO_MAX_BYTES + 1)}


class OnePhoto(APIView):
    parser_classes = (AnyBytes,)

    @extend_schema(responses={(200, "application/octet-stream"): bytes, **PROBLEMS})
    def get(self, request: Request, pk: int) -> FileResponse:
        photo = access.photo_for(_who(request), pk)
        if photo.arrived_at is None:
            raise not_found("photo")
        return FileResponse(
            photos_path(photo.sha256).open("rb"),
            as_attachment=True,
            filename=f"{photo.sha256[:12]}",
            content_type="application/octet-stream",
        )

    @extend_schema(
        request={"application/octet-stream": bytes},
        responses={200: shapes.PhotoShape, **PROBLEMS},
    )
    def put(self, request: Request, pk: int) -> Response:
        """Send the bytes of a photo that an entry declared by its SHA-256."""
        sent = request.data.get("data") if isinstance(request.data, Mapping) else None
        photo = add_photo(_who(request), pk, sent or b"")
        return Response(shapes.PhotoShape(photo).data)


class Records(generics.ListAPIView[Record]):
    serializer_class = shapes.RecordShape
    queryset = Record.objects.none()
    filterset_fields = ("state",)

    def get_queryset(self) -> QuerySet[Record]:
        sites = access.sites_of(_who(self.request))
        return Record.objects.filter(site__in=sites).order_by("-number")


class RecordFile(APIView):
    @extend_schema(responses={(200, "application/pdf"): bytes, **PROBLEMS})
    def get(self, request: Request, number: int) -> FileResponse:
        """The stored bytes: a reprint is what was issued."""
        import io

        record = access.record_for(_who(request), number)
        return FileResponse(
            io.BytesIO(stored_bytes(record)),
            as_attachment=True,
            filename=f"record-{record.number}.pdf",
            content_type="application/pdf",
        )
