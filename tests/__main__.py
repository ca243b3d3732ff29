"""Runs the whole suite on SQLite, then everything that touches the database on PostgreSQL.

python -m tests [pytest arguments]
"""

import os
import subprocess
import sys

from tests.postgresql import cluster


def main(arguments: list[str]) -> int:
    python = [sys.executable, "-m", "pytest"]
    without = {k: v for k, v in os.environ.items() if k != "LOGBOOK_DATABASE"}
    print("== SQLite: the whole suite", flush=True)
    first = subprocess.run([*python, *arguments], env=without).returncode
    print("== PostgreSQL: all that touches the database", flush=True)
    with cluster() as address:
        second = subprocess.run(
            [*python, "-m", "database", *arguments], env={**without, "LOGBOOK_DATABASE": address}
        ).returncode
    return first or second


if __name__ == "__main__":
    sys.exit(main(sys.argv[1:]))
