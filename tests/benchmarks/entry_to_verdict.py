"""From a read entry to its verdict, on SQLite: ``python -m tests.benchmarks.entry_to_verdict``.

Printed, never a timed test. One crack is looked at again and again, so that its history grows.
"""

import datetime
import os
import statistics
import tempfile
import time

LOOKS = 40


def main() -> None:
    with tempfile.TemporaryDirectory() as folder:
        os.environ["LOGBOOK_DATA"] = folder
        os.environ["DJANGO_SETTINGS_MODULE"] = "logbook.settings"
        import django

        django.setup()
        from django.core.management import call_command

        call_command("migrate", verbosity=0)
        _measure()


def _measure() -> None:
    from logbook.actions.known import known_of
    from logbook.actions.log_inspection import log_inspection
    from logbook.actions.propose import propose
    from logbook.entry import read_inspection
    from tests.pages.book import crack_seen, entry_data, write_book

    book = write_book()
    intake, both = [], []
    first = datetime.date(2023, 1, 9)
    for n in range(LOOKS):
        day = (first + datetime.timedelta(days=30 * n)).isoformat()
        size = crack_seen(book.heel, f"{3 + n * 0.02:.2f}", "12", "1" if n else "new")
        begun = time.perf_counter()
        draft = read_inspection(entry_data(day, 1000 + 600 * n, size), known_of(book.gate))
        made = log_inspection(book.people["crew"], draft)
        written = time.perf_counter()
        propose(book.heel.pk, made.findings.get().crack_id)
        intake.append(written - begun)
        both.append(time.perf_counter() - begun)
    _print("intake (written and acknowledged)", intake)
    _print("entry to verdict", both)
    print("aim: 95 in 100 entries have their verdict within 300 ms")


def _print(name: str, seconds: list[float]) -> None:
    warm = seconds[1:]
    p95 = statistics.quantiles(warm, n=20)[-1]
    print(
        f"{name:<36} median {statistics.median(warm) * 1e3:6.0f} ms   "
        f"95th percentile {p95 * 1e3:6.0f} ms   first (cold) {seconds[0] * 1e3:6.0f} ms"
    )


if __name__ == "__main__":
    main()
