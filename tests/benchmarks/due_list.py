"""The due list over 10,000 places and 100,000 sizes: ``python -m tests.benchmarks.due_list``.

Printed, never a timed test. The rows are written in bulk behind the actions, since only reading is
measured; the journal of such a book would not verify.
"""

import datetime
import os
import statistics
import tempfile
import time
import uuid
from decimal import Decimal

PARTS, PLACES, LOOKS = 500, 20, 10


def main() -> None:
    with tempfile.TemporaryDirectory() as folder:
        os.environ["LOGBOOK_DATA"] = folder
        os.environ["DJANGO_SETTINGS_MODULE"] = "logbook.settings"
        import django

        django.setup()
        from django.core.management import call_command

        call_command("migrate", verbosity=0)
        person = _fill()
        _measure(person)


def _fill() -> object:
    from django.utils import timezone

    from logbook.models import (
        Component,
        Crack,
        Finding,
        Inspection,
        Leaf,
        Location,
        Measurement,
        Membership,
        Person,
        Site,
        Standing,
    )

    now = timezone.now()
    person = Person.objects.create(username="crew", full_name="Crew")
    site = Site.objects.create(
        slug="s", name="S", time_zone="UTC", on_call_name="N", on_call_phone="1",
        working_weekdays="12345",
    )  # fmt: skip
    Membership.objects.create(person=person, site=site, role="crew")
    parts = Component.objects.bulk_create(
        Component(site=site, tag=f"P-{n}", name="part", counter_name="lifts", counter_unit="lift",
                  per_day=Decimal(20)) for n in range(PARTS)
    )  # fmt: skip
    places = Location.objects.bulk_create(
        Location(component=p, number=n + 1, name=f"place {n + 1}")
        for p in parts
        for n in range(PLACES)
    )
    cracks = Crack.objects.bulk_create(
        Crack(component=p.component, location=p, number=p.number) for p in places
    )
    acts = [uuid.uuid4() for _ in range(PARTS * LOOKS)]
    Leaf.objects.bulk_create(
        (
            Leaf(index=n, act=act, schema=1, kind="log-inspection", payload=b"{}",
                 leaf_hash=b"\0" * 32, at=now)
            for n, act in enumerate(acts)
        ),
        batch_size=2000,
    )  # fmt: skip
    today = now.date()
    looks = [
        Inspection(
            leaf_id=acts[p * LOOKS + n], component=part, key=uuid.uuid4(), content_digest="0",
            found_on=today - datetime.timedelta(days=30 * (LOOKS - n)), in_book_at=now,
            counter=Decimal(1000 + 600 * n), method="ultrasound", procedure="U",
            procedure_revision="A", instrument="12", surface="bare", coverage="all",
            inspector_name="Crew", qualification_level="2", author=person,
        )
        for p, part in enumerate(parts)
        for n in range(LOOKS)
    ]  # fmt: skip
    Inspection.objects.bulk_create(looks, batch_size=2000)
    findings = [
        Finding(leaf_id=looks[(i // PLACES) * LOOKS + n].leaf_id,
                inspection=looks[(i // PLACES) * LOOKS + n], location=place, what="crack",
                crack=cracks[i])
        for i, place in enumerate(places)
        for n in range(LOOKS)
    ]  # fmt: skip
    Finding.objects.bulk_create(findings, batch_size=5000)
    Measurement.objects.bulk_create(
        (
            Measurement(leaf_id=f.leaf_id, finding=f, crack=f.crack, depth_basis="measured",
                        depth_mm=Decimal("3.1"), length_mm=Decimal(12), typed="3.1")
            for f in findings
        ),
        batch_size=5000,
    )  # fmt: skip
    verdicts = ("continue", "watch", "restrict", "repair", "refer", "withdraw")
    Standing.objects.bulk_create(
        (
            Standing(site=site, location=place, crack=cracks[i], state="in-force",
                     last_finding=findings[i * LOOKS + LOOKS - 1], verdict=verdicts[i % 6],
                     held=i % 6 > 2, due_on=today + datetime.timedelta(days=i % 700 - 20),
                     due_at=Decimal(9000 + i), counter=Decimal(6400), since=now)
            for i, place in enumerate(places)
        ),
        batch_size=2000,
    )  # fmt: skip
    print(f"{len(places):,} places, {len(findings):,} sizes")
    return person


def _measure(person: object) -> None:
    from django.db import connection
    from django.test import Client
    from django.test.utils import CaptureQueriesContext

    client = Client()
    client.force_login(person, backend="logbook.accounts.Accounts")  # type: ignore[arg-type]
    times = []
    for _ in range(30):
        with CaptureQueriesContext(connection) as caught:
            begun = time.perf_counter()
            assert client.get("/", HTTP_HOST="localhost").status_code == 200
            times.append(time.perf_counter() - begun)
    warm = times[1:]
    print(
        f"the due list: median {statistics.median(warm) * 1e3:.0f} ms, 95th percentile "
        f"{statistics.quantiles(warm, n=20)[-1] * 1e3:.0f} ms, {len(caught)} queries"
    )
    print("aim: under 150 ms, the same number of queries however many places")


if __name__ == "__main__":
    main()
