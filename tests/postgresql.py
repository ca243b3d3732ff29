"""A PostgreSQL server of our own, in a temporary folder on a free port, gone afterwards.

PostgreSQL refuses to run as root, so as root it runs as the user that its Debian package makes.
The cluster which that package makes on port 5432 is left alone.
"""

import contextlib
import os
import pwd
import shutil
import socket
import subprocess
import tempfile
from collections.abc import Iterator
from pathlib import Path


def _binaries() -> Path:
    found = shutil.which("initdb")
    if found and Path(found).with_name("pg_ctl").exists():
        return Path(found).parent
    versions = sorted(Path("/usr/lib/postgresql").glob("*/bin/initdb"))
    if not versions:
        raise SystemExit("PostgreSQL is not installed: run .ci/setup tests first.")
    return versions[-1].parent


def _as_server_user(folder: str) -> list[str]:
    if os.geteuid() != 0:
        return []
    user = pwd.getpwnam("postgres")
    os.chown(folder, user.pw_uid, user.pw_gid)
    return ["setpriv", "--reuid=postgres", "--regid=postgres", "--init-groups"]


def _free_port() -> int:
    with contextlib.closing(socket.socket()) as s:
        s.bind(("127.0.0.1", 0))
        return int(s.getsockname()[1])


@contextlib.contextmanager
def cluster() -> Iterator[str]:
    """Start a server; yield the address of its own database; stop and remove it."""
    binaries = _binaries()
    with tempfile.TemporaryDirectory(prefix="logbook-pg-") as folder:
        run_as = _as_server_user(folder)
        data, port = f"{folder}/data", _free_port()

        def run(*command: str) -> None:
            subprocess.run(
                [*run_as, *command], check=True, cwd=folder, stdout=subprocess.DEVNULL,
                env={**os.environ, "HOME": folder, "LC_ALL": "C.UTF-8"},
            )  # fmt: skip

        run(
            str(binaries / "initdb"), "-D", data, "-U", "logbook", "--auth=trust",
            "-E", "UTF8", "--locale=C.UTF-8", "--no-sync",
        )  # fmt: skip
        options = (
            f"-p {port} -k {folder} -c listen_addresses=127.0.0.1 -c fsync=off "
            "-c max_connections=100"
        )
        run(
            str(binaries / "pg_ctl"),
            "-D",
            data,
            "-l",
            f"{folder}/log",
            "-w",
            "-o",
            options,
            "start",
        )
        try:
            yield f"postgres://logbook@127.0.0.1:{port}/postgres"
        finally:
            run(str(binaries / "pg_ctl"), "-D", data, "-m", "immediate", "stop")
