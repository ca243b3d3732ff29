"""Two hundred seeded runs of the tablet on a bad line: python -m tests.full.tablet [runs [first]]

Prints each run and the counts; exits with 1 where an acknowledged entry is not in the book once.
"""

import os
import sys
import tempfile
from pathlib import Path

RUNS = 200


def main(arguments: list[str]) -> int:
    os.environ.setdefault("DJANGO_ALLOW_ASYNC_UNSAFE", "true")
    with tempfile.TemporaryDirectory(prefix="tablet-data-") as own:
        # The settings are read as the harness is imported; the served book has its own folder.
        os.environ["LOGBOOK_DATA"] = own
        os.environ["DJANGO_SETTINGS_MODULE"] = "logbook.settings"
        import django

        django.setup()
        from playwright.sync_api import sync_playwright

        from tests.tablet.faults import runs

        first = int(arguments[1]) if len(arguments) > 1 else 0
        many = int(arguments[0]) if arguments else RUNS
        served = Path(own) / "served"
        served.mkdir()
        with sync_playwright() as playwright:
            count = runs(playwright, served, range(first, first + many), _say)
    for one in count.wrong:
        print(one)
    return 1 if count.wrong or count.acknowledged != count.in_the_book else 0


def _say(line: str) -> None:
    print(line, flush=True)


if __name__ == "__main__":
    # Run by tests.full, the arguments are pytest's; none of those is a bare number.
    failed = main([one for one in sys.argv[1:] if one.isdecimal()])
    if failed:
        sys.exit(failed)
