"""The real server of a book of its own: gunicorn in a process that can be killed and started."""

import os
import signal
import socket
import sqlite3
import subprocess
import sys
import time
import urllib.error
import urllib.request
from collections.abc import Iterable
from dataclasses import dataclass
from pathlib import Path

PLACES = 30
MAKE = f"""
import django; django.setup()
from django.core.management import call_command
call_command("migrate", verbosity=0)
from logbook.actions.register_component import add_location
from tests.pages.book import write_book
book = write_book()
for n in range({PLACES}):
    add_location(book.people["engineer"], book.gate.pk, name=f"Rib {{n + 1}}")
"""


def free_port() -> int:
    with socket.socket() as s:
        s.bind(("127.0.0.1", 0))
        return int(s.getsockname()[1])


@dataclass
class Served:
    data: Path
    port: int
    process: subprocess.Popen[bytes] | None = None
    # Whether LOGBOOK_DATABASE counts; else the book is in the data folder.
    keep_database: bool = False

    @property
    def env(self) -> dict[str, str]:
        left_out = () if self.keep_database else ("LOGBOOK_DATABASE",)
        own = {name: value for name, value in os.environ.items() if name not in left_out}
        return own | {
            "LOGBOOK_DATA": str(self.data),
            "LOGBOOK_MODE": "trial",
            "DJANGO_SETTINGS_MODULE": "logbook.settings",
        }

    def make(self) -> None:
        subprocess.run([sys.executable, "-c", MAKE], env=self.env, check=True)

    def run(self, code: str) -> str:
        """What a piece of code prints in the served book."""
        ran = subprocess.run(
            [sys.executable, "-c", code], env=self.env, check=True, capture_output=True, text=True
        )
        return ran.stdout

    def start(self) -> None:
        log = (self.data / "server.log").open("ab")
        self.process = subprocess.Popen(
            [sys.executable, "-m", "gunicorn", "--workers", "2", "--bind",
             f"127.0.0.1:{self.port}", "--log-level", "warning", "--timeout", "60",
             "logbook.wsgi:application"],
            env=self.env, stdout=log, stderr=log, start_new_session=True,
        )  # fmt: skip
        log.close()
        deadline = time.monotonic() + 60
        while time.monotonic() < deadline:
            try:
                urllib.request.urlopen(f"http://127.0.0.1:{self.port}/tablet/", timeout=5).close()
                return
            except (urllib.error.URLError, OSError):
                time.sleep(0.1)
        raise RuntimeError("the server did not start")

    def kill(self) -> None:
        """SIGKILL to the whole group that was started here: nothing gets to finish."""
        if self.process is not None:
            os.killpg(self.process.pid, signal.SIGKILL)
            self.process.wait()
            self.process = None

    def ask(self, sql: str, values: Iterable[object] = ()) -> list[tuple[object, ...]]:
        with sqlite3.connect(self.data / "logbook.sqlite3", timeout=30) as db:
            return db.execute(sql, tuple(values)).fetchall()
