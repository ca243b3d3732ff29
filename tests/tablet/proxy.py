"""A line that breaks: a TCP proxy between a browser and the server, with one fault at a time.

The server closes each connection after its answer, so one connection carries one request, and a
fault at a byte of a connection is a fault at a byte of that request or reply.
"""

import contextlib
import random
import socket
import threading
import time
from dataclasses import dataclass, field

SENDS = (b"POST /api/v1/tablet/", b"PUT /api/v1/tablet/")
CUT_REQUEST, CUT_REPLY, DELAY, DUPLICATE, LATE = (
    "request cut",
    "reply cut",
    "delayed",
    "sent twice",
    "sent again later",
)
FAULTS = (CUT_REQUEST, CUT_REPLY, DELAY, DUPLICATE, LATE)


@dataclass
class Proxy:
    """Forwards from ``port`` to ``server``; what ``plan`` holds befalls the next sends."""

    server: int
    chance: random.Random
    plan: list[str] = field(default_factory=list)
    done: dict[str, int] = field(default_factory=dict)

    def __post_init__(self) -> None:
        self.cut_off = False
        self.kept: list[bytes] = []
        self.lock = threading.Lock()
        self.listener = socket.create_server(("127.0.0.1", 0))
        self.port = self.listener.getsockname()[1]
        threading.Thread(target=self._listen, daemon=True).start()

    def close(self) -> None:
        self.listener.close()

    def _listen(self) -> None:
        while True:
            try:
                client, _where = self.listener.accept()
            except OSError:
                return
            threading.Thread(target=self._serve, args=(client,), daemon=True).start()

    def _serve(self, client: socket.socket) -> None:
        with client, contextlib.suppress(OSError):
            client.settimeout(60)
            request = _whole(client)
            if not request or self.cut_off:
                return
            fault = self._next() if request.startswith(SENDS) else ""
            self._carry(client, request, fault)

    def _next(self) -> str:
        with self.lock:
            fault = self.plan.pop(0) if self.plan else ""
            if fault:
                self.done[fault] = self.done.get(fault, 0) + 1
            return fault

    def _carry(self, client: socket.socket, request: bytes, fault: str) -> None:
        if fault == CUT_REQUEST:
            with self._to_server() as server:
                server.sendall(request[: self.chance.randrange(len(request))])
            return
        if fault == DELAY:
            time.sleep(self.chance.uniform(0.1, 1.0))
        if fault == DUPLICATE:
            twin = threading.Thread(target=self._again, args=(request,), daemon=True)
            twin.start()
        if fault == LATE:
            self.kept.append(request)
        reply = self._ask(request)
        if fault == CUT_REPLY:
            reply = reply[: self.chance.randrange(max(len(reply), 1))]
        client.sendall(reply)

    def _to_server(self) -> socket.socket:
        return socket.create_connection(("127.0.0.1", self.server), timeout=60)

    def _ask(self, request: bytes) -> bytes:
        with self._to_server() as server:
            server.sendall(request)
            got = bytearray()
            while piece := server.recv(65536):
                got += piece
            return bytes(got)

    def _again(self, request: bytes) -> None:
        with contextlib.suppress(OSError):
            self._ask(request)

    def replay(self) -> None:
        """The sends that were kept arrive once more, after all that came later."""
        for request in reversed(self.kept):
            self._again(request)
        self.kept.clear()


def _whole(client: socket.socket) -> bytes:
    """One request: its head, and as much of a body as the head says."""
    got = bytearray()
    while b"\r\n\r\n" not in got:
        piece = client.recv(65536)
        if not piece:
            return bytes(got)
        got += piece
    head, _sep, body = bytes(got).partition(b"\r\n\r\n")
    length = 0
    for line in head.split(b"\r\n"):
        name, _colon, value = line.partition(b":")
        if name.lower() == b"content-length":
            length = int(value)
    while len(body) < length:
        piece = client.recv(65536)
        if not piece:
            break
        body += piece
        got += piece
    return bytes(got)
