"""Everything needed to try the application: database, scenario, web server, worker, one address."""

import contextlib
import signal
import socket
import subprocess
import sys
import time
from types import FrameType
from typing import Any

from django.conf import settings
from django.core.management import call_command
from django.core.management.base import BaseCommand, CommandError, CommandParser

from logbook.management.scenario import load


class Command(BaseCommand):
    help = (
        "Migrates, loads the demo scenario if it is not there, starts web and worker; Ctrl-C stops."
    )

    def add_arguments(self, parser: CommandParser) -> None:
        parser.add_argument("--port", type=int, default=8000, help="0 takes any free one")
        parser.add_argument(
            "--load-only", action="store_true", help="load the scenario, start nothing"
        )

    def _say(self, line: str) -> None:
        """At once, also where the output is a file: the address is what a person waits for."""
        self.stdout.write(line)
        self.stdout.flush()

    def handle(self, *args: Any, **options: Any) -> None:
        if settings.SERVICE:
            raise CommandError("The demo runs in trial mode only: unset LOGBOOK_MODE.")
        call_command("migrate", verbosity=0)
        load.load_scenario(self._say)
        if options["load_only"]:
            return
        serve(_free_port(options["port"]), self._say)


def _free_port(wanted: int) -> int:
    with contextlib.closing(socket.socket()) as s:
        s.setsockopt(socket.SOL_SOCKET, socket.SO_REUSEADDR, 1)
        try:
            s.bind(("127.0.0.1", wanted))
        except OSError:
            raise CommandError(
                f"Port {wanted} is taken. Stop what listens there, or say --port with another one."
            ) from None
        return int(s.getsockname()[1])


def serve(port: int, say: Any) -> None:
    """Run web server and worker until a signal, or until one of them ends."""
    web = subprocess.Popen(  # noqa: S603 (our own interpreter and arguments)
        [
            *(sys.executable, "-m", "gunicorn", "logbook.wsgi"),
            *("--workers", "2", "--threads", "4", "--bind", f"127.0.0.1:{port}"),
            *("--log-level", "warning"),
        ],
        cwd=settings.BASE_DIR,
        start_new_session=True,
    )
    worker = subprocess.Popen(  # noqa: S603
        [sys.executable, "manage.py", "worker"], cwd=settings.BASE_DIR, start_new_session=True
    )
    both = (web, worker)

    def stop(number: int, frame: FrameType | None) -> None:
        raise KeyboardInterrupt

    signal.signal(signal.SIGTERM, stop)
    try:
        _wait_until_open(port, both)
        say(f"\n  http://127.0.0.1:{port}/\n")
        for line in load.logins():
            say(f"  {line}")
        say("\n  Ctrl-C stops web and worker.")
        while all(p.poll() is None for p in both):
            time.sleep(0.3)
        raise CommandError("Web server or worker ended by itself; what it said stands above.")
    except KeyboardInterrupt:
        say("\nStopping.")
    finally:
        _end(both)


def _wait_until_open(port: int, both: tuple[subprocess.Popen[bytes], ...]) -> None:
    deadline = time.monotonic() + 60
    while time.monotonic() < deadline and all(p.poll() is None for p in both):
        with contextlib.closing(socket.socket()) as s:
            if s.connect_ex(("127.0.0.1", port)) == 0:
                return
        time.sleep(0.1)
    raise CommandError("The web server did not start; what it said stands above.")


def _end(both: tuple[subprocess.Popen[bytes], ...]) -> None:
    for p in both:
        if p.poll() is None:
            p.terminate()
    for p in both:
        try:
            p.wait(timeout=20)
        except subprocess.TimeoutExpired:
            p.kill()
            p.wait()
