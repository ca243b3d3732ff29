"""Runs the whole suite on SQLite, then everything that touches the database on PostgreSQL.

python -m tests [pytest arguments]

Without arguments the computation, which knows no database, is tested beside the book: two
processes, one after the other told apart in the output.
"""

import os
import subprocess
import sys
import tempfile
from collections.abc import Mapping, Sequence

from tests.postgresql import cluster

PYTEST = (sys.executable, "-m", "pytest")
COMPUTATION = ("tests/assessment", "tests/external")


def main(arguments: Sequence[str]) -> int:
    # One thread each: two processes that share the cores must not fight over them.
    without = {k: v for k, v in os.environ.items() if k != "LOGBOOK_DATABASE"}
    without |= {"OMP_NUM_THREADS": "1", "OPENBLAS_NUM_THREADS": "1"}
    if arguments:
        _say("SQLite: what the arguments name")
        return _run(arguments, without) or _on_postgresql(arguments, without)
    with tempfile.TemporaryFile() as said:
        beside = subprocess.Popen(
            [*PYTEST, *COMPUTATION], env=without, stdout=said, stderr=subprocess.STDOUT
        )
        try:
            _say("SQLite: the book, its pages and its files; the computation is tested beside it")
            ignored = [f"--ignore={folder}" for folder in COMPUTATION]
            book = _run(ignored, without) or _on_postgresql((), without)
        finally:
            computation = beside.wait()
        _say("The computation")
        said.seek(0)
        print(said.read().decode(errors="replace"), flush=True)
    return book or computation


def _on_postgresql(arguments: Sequence[str], environment: Mapping[str, str]) -> int:
    _say("PostgreSQL: all that touches the database")
    with cluster() as address:
        return _run(("-m", "database", *arguments), {**environment, "LOGBOOK_DATABASE": address})


def _run(arguments: Sequence[str], environment: Mapping[str, str]) -> int:
    return subprocess.run([*PYTEST, *arguments], env=dict(environment)).returncode


def _say(what: str) -> None:
    print(f"== {what}", flush=True)


if __name__ == "__main__":
    sys.exit(main(sys.argv[1:]))
