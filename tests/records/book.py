"""A small invented book: one crack with three looks, a proposal, a review, a signature."""

import json
import uuid
from datetime import UTC, date, datetime
from decimal import Decimal
from hashlib import sha256

from django.db import transaction

from logbook import clock
from logbook.journal import append
from logbook.models import (
    Assessment,
    Basis,
    BasisAdoption,
    Component,
    Crack,
    Disposition,
    Finding,
    Inspection,
    Licence,
    Location,
    Measurement,
    Person,
    Review,
    Site,
    StrikeOut,
)
from logbook.records.issue import reserve_number
from tests.figures.documents import CASE, OUTCOME

SIGNED = datetime(2026, 5, 5, 14, 20, tzinfo=UTC)


class Book:
    """Rows are written as actions write them: rows of an act, then its leaf, in a transaction."""

    def __init__(self):
        self.site = Site.objects.create(
            slug="lower-mill",
            name="Lower Mill lock",
            time_zone="Europe/Berlin",
            on_call_name="M. Ito",
            on_call_phone="0555 0100",
            working_weekdays="12345",
        )
        self.crew = self.person("varga", "O. Varga")
        self.engineer = self.person("brandt", "J. Brandt")
        self.signatory = self.person("wojcik", "Á. Wójcik")
        self.licence = Licence.objects.create(
            person=self.signatory,
            site=self.site,
            body="Board of Lifting Engineers",
            number="4471",
            discipline="cranes",
            valid_from=date(2020, 1, 1),
            valid_to=date(2030, 1, 1),
        )
        self.component = Component.objects.create(
            site=self.site,
            tag="C-17",
            name="Quay crane",
            counter_name="lifts",
            counter_unit="lift",
            per_day=8,
        )
        self.location = Location.objects.create(
            component=self.component, number=4, name="Lower chord, weld at gusset"
        )
        self.crack = Crack.objects.create(
            component=self.component, location=self.location, number=2
        )

    @staticmethod
    def person(username, full_name):
        return Person.objects.create(username=username, full_name=full_name)

    def act(self, kind, make, by=None, at=SIGNED):
        """make(act) writes the rows and gives the first of them back."""
        act = uuid.uuid4()
        with clock.told(at), transaction.atomic():
            made = make(act)
            append(kind, {"of": kind}, act=act, by=by or self.crew, site=self.site)
        return made

    def look(self, on, counter, depth, length, *, depth_basis="measured", remarks=""):
        def make(act):
            inspection = Inspection.objects.create(
                leaf_id=act, component=self.component, key=uuid.uuid4(), content_digest="0" * 64,
                found_on=on, in_book_at=SIGNED, counter=counter, method="ultrasonic",
                procedure="UT-12", procedure_revision="3", instrument="flaw detector 3",
                calibration_valid_until=date(2026, 11, 1), surface="bare", coverage="all",
                inspector_name="O. Varga", qualification_level="level 2",
                qualification_valid_until=date(2027, 1, 1), author=self.crew,
            )  # fmt: skip
            finding = Finding.objects.create(
                leaf_id=act, inspection=inspection, location=self.location, what="crack",
                crack=self.crack, remarks=remarks,
            )  # fmt: skip
            Measurement.objects.create(
                leaf_id=act, finding=finding, crack=self.crack, depth_basis=depth_basis,
                depth_mm=depth, length_mm=length, typed=f"{depth} {length}",
            )  # fmt: skip
            return finding

        return self.act("log-inspection", make)

    def strike(self, finding, reason):
        return self.act(
            "strike-out",
            lambda act: StrikeOut.objects.create(
                leaf_id=act, finding=finding, reason=reason, by=self.crew, at=SIGNED
            ),
        )

    def basis(self, **body):
        text = json.dumps(body)
        basis = self.act(
            "revise-basis",
            lambda act: Basis.objects.create(
                leaf_id=act, location=self.location, revision=1, author=self.engineer,
                reason="first", body=text, digest="0" * 64, created_at=SIGNED,
            ),
        )  # fmt: skip
        self.act(
            "adopt-basis",
            lambda act: BasisAdoption.objects.create(
                leaf_id=act, basis=basis, by=self.signatory, at=SIGNED
            ),
        )
        return basis

    def proposal(self, verdict="watch", *, case=CASE, outcome=OUTCOME, basis=None, crack=True):
        case_text = None if case is None else json.dumps(case)
        outcome_text = None if outcome is None else json.dumps(outcome)

        def digest(text):
            return "" if text is None else sha256(text.encode()).hexdigest()

        return self.act(
            "propose",
            lambda act: Assessment.objects.create(
                leaf_id=act, location=self.location, crack=self.crack if crack else None,
                basis=basis, because_act=uuid.uuid4(), case_text=case_text,
                case_digest=digest(case_text), outcome_text=outcome_text,
                outcome_digest=digest(outcome_text), engine="assessment 0.1", verdict=verdict,
                reasons=json.dumps(["The governing interval is shorter than the longest."]),
                until_on=date(2026, 12, 14), until_at=Decimal(14400), governed_by="life",
                in_book_at=SIGNED,
            ),
        )  # fmt: skip

    def signed(self, assessment, *, until_on=date(2026, 12, 14), until_at=Decimal(14400), limit=""):
        """Reviewed, signed, and its record's number reserved: nothing issued yet."""
        review = self.act(
            "review",
            lambda act: Review.objects.create(
                leaf_id=act, assessment=assessment, by=self.engineer, decision="accept",
                verdict=assessment.verdict, until_on=until_on, until_at=until_at, limit=limit,
                grounds="agrees with the log", at=SIGNED,
            ),
        )  # fmt: skip

        def make(act):
            made = Disposition.objects.create(
                leaf_id=act, review=review, assessment=assessment, location=self.location,
                crack=assessment.crack, signatory=self.signatory, licence=self.licence,
                meaning="approved", shown_digest="0" * 64, verdict=assessment.verdict,
                until_on=until_on, until_at=until_at, limit=limit, signed_at=SIGNED,
            )  # fmt: skip
            reserve_number(disposition=made)
            return made

        return self.act("sign-disposition", make, by=self.signatory)


def usual():
    """Three sizes, one of them struck, on a basis, with a signed "watch"."""
    book = Book()
    book.look(date(2024, 1, 15), Decimal(6100), Decimal("5.1"), Decimal("18"))
    wrong = book.look(date(2025, 5, 12), Decimal(9900), Decimal("7.8"), Decimal("24"))
    book.strike(wrong, "read from the wrong edge")
    book.look(
        date(2026, 5, 4), Decimal(12600), Decimal("8.4"), Decimal("24"), remarks="under paint"
    )
    basis = book.basis(
        sizing={"ultrasonic": {"depth_sd_mm": 0.6, "length_sd_mm": 1.5, "source": "trial 12"}},
        sources={"material": "mill certificate 4471", "loading.peak": "strain gauges 2024"},
    )
    return book, book.signed(book.proposal(basis=basis))
