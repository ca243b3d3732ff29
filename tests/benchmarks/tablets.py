"""Twenty tablets send fifty entries each at once: ``python -m tests.benchmarks.tablets [20 [50]]``.

Against gunicorn as it is served, on SQLite or on the database of LOGBOOK_DATABASE. Printed, never a
timed test. The verdicts are worked out with the entries or left to a worker; none is missing after.
"""

import http.client
import json
import os
import statistics
import sys
import tempfile
import threading
import time
import uuid
from pathlib import Path

from tests.tablet.served import Served, free_port

TABLETS = int(sys.argv[1]) if len(sys.argv) > 1 else 20
ENTRIES = int(sys.argv[2]) if len(sys.argv) > 2 else 50
SEED = """
import django; django.setup()
from django.test import Client
from logbook.actions.tablets import register_tablet
from logbook.models import Location, Person, Site
import json, uuid
crew, site = Person.objects.get(username="crew"), Site.objects.get(slug="lower-mill")
key = uuid.uuid4()
register_tablet(crew, site, key=key, name="bench")
client = Client(); client.force_login(crew, backend="logbook.accounts.Accounts")
places = Location.objects.order_by("pk")
print(json.dumps({"session": client.cookies["sessionid"].value, "person": crew.pk,
    "tablet": str(key), "component": places[0].component_id, "places": [p.pk for p in places]}))
"""
LEFT = """
import django; django.setup()
from logbook.jobs.tasks import propose_one
from logbook.models import AssessmentAsked, Assessment, Inspection
from logbook.actions.propose import propose
owed = list(AssessmentAsked.objects.values_list("location_id", "crack_id"))
for place, crack in owed: propose(place, crack)
print(Inspection.objects.count(), len(owed), AssessmentAsked.objects.count(),
      Assessment.objects.count())
"""


def main() -> None:
    with tempfile.TemporaryDirectory(prefix="tablets-") as folder:
        served = Served(Path(folder), free_port(), keep_database=True)
        served.make()
        served.start()
        try:
            seed = json.loads(served.run(SEED))
            took = _send_all(served.port, seed)
        finally:
            served.kill()
        written, owed, missing, verdicts = map(int, served.run(LEFT).split())
        p95 = statistics.quantiles(took, n=20)[-1]
        where = "the database of LOGBOOK_DATABASE" if "LOGBOOK_DATABASE" in os.environ else "SQLite"
        print(
            f"{TABLETS} tablets × {ENTRIES} entries on {where}: {len(took)} acknowledged, {written}"
            f" in the book; intake median {statistics.median(took) * 1e3:.0f} ms, 95th percentile "
            f"{p95 * 1e3:.0f} ms; {owed} places waited for a worker, {missing} without a verdict "
            f"after it, {verdicts} verdicts"
        )


def _send_all(port: int, seed: dict[str, object]) -> list[float]:
    took: list[float] = []
    threads = [threading.Thread(target=_tablet, args=(port, seed, n, took)) for n in range(TABLETS)]
    for thread in threads:
        thread.start()
    for thread in threads:
        thread.join()
    return took


def _tablet(port: int, seed: dict[str, object], n: int, took: list[float]) -> None:
    """Entries one after the other, as a tablet sends them; each place is one tablet's own."""
    token = "a" * 32
    headers = {
        "Content-Type": "application/json",
        "Cookie": f"sessionid={seed['session']}; csrftoken={token}",
        "X-CSRFToken": token,
    }
    places = seed["places"]
    assert isinstance(places, list)
    for turn in range(ENTRIES):
        more = "?more" if turn + 1 < ENTRIES else ""
        body = json.dumps(_entry(seed, places[n % len(places)]))
        begun = time.perf_counter()
        line = http.client.HTTPConnection("127.0.0.1", port, timeout=120)
        line.request("POST", f"/api/v1/tablet/lower-mill/send/entry{more}", body, headers)
        answer = line.getresponse()
        said = json.loads(answer.read())
        line.close()
        if answer.status not in (200, 201):
            raise RuntimeError(f"{answer.status} {said}")
        took.append(time.perf_counter() - begun)


def _entry(seed: dict[str, object], place: object) -> dict[str, object]:
    from tests.pages.book import entry_data

    finding = {"location": place, "what": "could-not-look", "why": "under water"}
    entry = entry_data(time.strftime("%Y-%m-%d"), 1000, finding)
    entry |= {"component": seed["component"], "key": str(uuid.uuid4())}
    return {"entry": entry, "person": seed["person"], "tablet": seed["tablet"], "shown": {}}


if __name__ == "__main__":
    os.environ.setdefault("DJANGO_SETTINGS_MODULE", "logbook.settings")
    with tempfile.TemporaryDirectory() as own:
        os.environ["LOGBOOK_DATA"] = own
        import django

        django.setup()
        main()
