"""What the API answers with: one serializer a noun. Names are dull and stay."""

import json
from typing import Any

from drf_spectacular.types import OpenApiTypes
from drf_spectacular.utils import extend_schema_field
from rest_framework import serializers

from logbook import clock
from logbook.actions import standing
from logbook.models import (
    Assessment,
    Component,
    Crack,
    DepthBasis,
    Disposition,
    Finding,
    Inspection,
    Location,
    Measurement,
    Photo,
    Record,
    Site,
    Standing,
)


class SiteShape(serializers.ModelSerializer[Site]):
    class Meta:
        model = Site
        fields = (
            "slug",
            "name",
            "time_zone",
            "on_call_name",
            "on_call_phone",
            "unsigned_may_be_acted_on",
        )


class LocationShape(serializers.ModelSerializer[Location]):
    class Meta:
        model = Location
        fields = ("id", "component", "number", "name", "provisional", "described",
                  "picture_x", "picture_y")  # fmt: skip


class ComponentShape(serializers.ModelSerializer[Component]):
    site = serializers.SlugRelatedField[Site](slug_field="slug", read_only=True)
    locations = LocationShape(many=True, read_only=True)

    class Meta:
        model = Component
        fields = ("id", "site", "tag", "name", "description", "serial", "counter_name",
                  "counter_unit", "per_day", "locations")  # fmt: skip


class StandingShape(serializers.ModelSerializer[Standing]):
    """What binds now for a place or crack, as it reads today."""

    component = serializers.CharField(source="location.component.tag")
    place = serializers.CharField(source="location.name")
    crack_number = serializers.IntegerField(source="crack.number", allow_null=True)
    verdict = serializers.SerializerMethodField()
    held = serializers.SerializerMethodField()
    today = serializers.SerializerMethodField()

    class Meta:
        model = Standing
        fields = ("location", "crack", "component", "place", "crack_number", "state", "verdict",
                  "held", "due_on", "due_at", "counter", "limit", "since", "today")  # fmt: skip

    def _read(self, row: Standing) -> standing.Reading:
        return standing.reading(row, clock.today(row.location.component.site.time_zone))

    def get_verdict(self, row: Standing) -> str:
        """As it reads today: past its date it has lapsed."""
        return str(self._read(row).verdict)

    def get_held(self, row: Standing) -> bool:
        return self._read(row).held

    @extend_schema_field(OpenApiTypes.OBJECT)
    def get_today(self, row: Standing) -> dict[str, Any]:
        read = self._read(row)
        return {
            "verdict": str(read.verdict),
            "held": read.held,
            "lapsed": read.lapsed,
            "overdue": read.overdue,
            "signed": read.signed,
        }


class MeasurementShape(serializers.ModelSerializer[Measurement]):
    class Meta:
        model = Measurement
        fields = ("depth_basis", "depth_mm", "length_mm", "why_smaller", "typed")


class PhotoShape(serializers.ModelSerializer[Photo]):
    class Meta:
        model = Photo
        fields = ("id", "sha256", "caption", "arrived_at", "media_type", "byte_size")


class FindingShape(serializers.ModelSerializer[Finding]):
    crack_number = serializers.IntegerField(source="crack.number", allow_null=True)
    measurement = MeasurementShape(allow_null=True)
    photos = PhotoShape(many=True)
    struck_out = serializers.SerializerMethodField()

    class Meta:
        model = Finding
        fields = ("id", "location", "what", "why", "part_not_seen", "remarks", "crack",
                  "crack_number", "measurement", "photos", "struck_out")  # fmt: skip

    def to_representation(self, row: Finding) -> dict[str, Any]:
        made = super().to_representation(row)
        made.setdefault("measurement", None)
        made.setdefault("crack_number", None)
        return made

    @extend_schema_field(OpenApiTypes.STR)
    def get_struck_out(self, row: Finding) -> str | None:
        return row.strike_out.reason if hasattr(row, "strike_out") else None


class AssessmentShape(serializers.ModelSerializer[Assessment]):
    """A proposal. Case and outcome are the exact documents; null where none could be made."""

    entry_number = serializers.IntegerField()
    reasons = serializers.SerializerMethodField()
    case = serializers.SerializerMethodField()
    outcome = serializers.SerializerMethodField()

    class Meta:
        model = Assessment
        fields = ("id", "entry_number", "location", "crack", "basis", "engine", "verdict",
                  "reasons", "until_on", "until_at", "governed_by", "limit", "stop_depth_mm",
                  "stop_length_mm", "case", "case_digest", "outcome", "outcome_digest",
                  "in_book_at")  # fmt: skip

    @extend_schema_field({"type": "array", "items": {"type": "string"}})
    def get_reasons(self, row: Assessment) -> Any:
        return json.loads(row.reasons)

    @extend_schema_field(OpenApiTypes.OBJECT)
    def get_case(self, row: Assessment) -> Any:
        return json.loads(row.case_text) if row.case_text else None

    @extend_schema_field(OpenApiTypes.OBJECT)
    def get_outcome(self, row: Assessment) -> Any:
        return json.loads(row.outcome_text) if row.outcome_text else None


class ProposalShape(serializers.ModelSerializer[Assessment]):
    """The verdict of a proposal alone, as an inspection's answer carries it."""

    reasons = serializers.SerializerMethodField()

    class Meta:
        model = Assessment
        fields = ("id", "location", "crack", "verdict", "reasons", "until_on", "until_at",
                  "governed_by", "limit")  # fmt: skip

    @extend_schema_field({"type": "array", "items": {"type": "string"}})
    def get_reasons(self, row: Assessment) -> Any:
        return json.loads(row.reasons)


class InspectionShape(serializers.ModelSerializer[Inspection]):
    entry_number = serializers.IntegerField()
    findings = FindingShape(many=True)

    class Meta:
        model = Inspection
        fields = ("id", "entry_number", "key", "component", "found_on", "late_why", "written_at",
                  "in_book_at", "counter", "counter_replaced_why", "method", "procedure",
                  "procedure_revision", "instrument", "calibration_valid_until", "surface",
                  "coverage", "fell_short", "inspector_name", "qualification_level",
                  "qualification_valid_until", "findings")  # fmt: skip


class CrackShape(serializers.ModelSerializer[Crack]):
    class Meta:
        model = Crack
        fields = ("id", "component", "location", "number", "closed_at", "closed_why")


class DispositionShape(serializers.ModelSerializer[Disposition]):
    signatory = serializers.CharField()
    licence = serializers.CharField()

    class Meta:
        model = Disposition
        fields = ("id", "verdict", "until_on", "until_at", "limit", "meaning", "signatory",
                  "licence", "signed_at")  # fmt: skip


class RecordShape(serializers.ModelSerializer[Record]):
    class Meta:
        model = Record
        fields = ("number", "state", "void_why", "sha256", "byte_size", "journal_size",
                  "journal_root", "issued_at", "disposition", "deferral")  # fmt: skip


class NewLocationSent(serializers.Serializer[Any]):
    name = serializers.CharField(max_length=120)
    described = serializers.CharField(max_length=500)


class FindingSent(serializers.Serializer[Any]):
    """Documents what is sent; logbook.entry reads and checks it."""

    location = serializers.IntegerField(required=False)
    new_location = NewLocationSent(required=False)
    what = serializers.ChoiceField(["nothing", "could-not-look", "known-not-seen", "crack"])
    why = serializers.CharField(required=False)
    part_not_seen = serializers.CharField(required=False)
    remarks = serializers.CharField(required=False)
    crack = serializers.CharField(required=False, help_text='its number on the part, or "new"')
    depth_basis = serializers.ChoiceField(DepthBasis.choices, required=False)
    depth_mm = serializers.CharField(required=False)
    length_mm = serializers.CharField(required=False)
    why_smaller = serializers.CharField(required=False)
    confirm_unlikely = serializers.BooleanField(required=False)
    photos = serializers.ListField(child=serializers.CharField(), required=False)


class InspectionSent(serializers.Serializer[Any]):
    key = serializers.UUIDField(help_text="made by the sender: the same entry is written once")
    component = serializers.IntegerField()
    found_on = serializers.DateField()
    late_why = serializers.CharField(required=False)
    written_at = serializers.DateTimeField(required=False)
    counter = serializers.CharField()
    counter_replaced_why = serializers.CharField(required=False)
    method = serializers.CharField()
    procedure = serializers.CharField()
    procedure_revision = serializers.CharField()
    instrument = serializers.CharField()
    calibration_valid_until = serializers.DateField(required=False)
    surface = serializers.CharField()
    coverage = serializers.CharField()
    fell_short = serializers.CharField(required=False, allow_blank=True)
    confirm_counter = serializers.BooleanField(required=False)
    inspector_name = serializers.CharField()
    qualification_level = serializers.CharField()
    qualification_valid_until = serializers.DateField(required=False)
    findings = FindingSent(many=True)


class InspectionAnswer(serializers.Serializer[Any]):
    """The entry as it stands in the book, and what it answered so far."""

    key = serializers.UUIDField()
    inspection = InspectionShape()
    pending = serializers.BooleanField(help_text="no verdict yet: not to be used")
    proposals = ProposalShape(many=True)


class StrikeOutSent(serializers.Serializer[Any]):
    reason = serializers.CharField()
    depth_basis = serializers.ChoiceField(DepthBasis.choices, required=False)
    depth_mm = serializers.CharField(required=False)
    length_mm = serializers.CharField(required=False)
    why_smaller = serializers.CharField(required=False)
    confirm_unlikely = serializers.BooleanField(required=False)


class StrikeOutAnswer(serializers.Serializer[Any]):
    finding = serializers.IntegerField()
    replaced_by = serializers.IntegerField(allow_null=True)
    reason = serializers.CharField()


class Problem(serializers.Serializer[Any]):
    """Every refusal."""

    code = serializers.CharField()
    title = serializers.CharField()
    fields = serializers.DictField(child=serializers.ListField(child=serializers.CharField()))  # type: ignore[assignment]
    status = serializers.IntegerField()
