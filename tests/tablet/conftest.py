"""A book, a registered tablet, and what a tablet sends."""

import io
import uuid
from collections.abc import Callable
from typing import Any

import pytest
from django.test import Client
from PIL import Image

from logbook import clock
from logbook.actions.tablets import register_tablet
from logbook.models import Device
from tests.pages.book import Book, crack_seen, entry_data, write_book


@pytest.fixture
def book(transactional_db: None) -> Book:
    return write_book()


@pytest.fixture
def device(book: Book) -> Device:
    return register_tablet(book.people["crew"], book.site, key=uuid.uuid4(), name="tablet 3")


@pytest.fixture
def as_(book: Book) -> Callable[[str], Client]:
    def signed_in(name: str) -> Client:
        client = Client(raise_request_exception=True)
        client.force_login(book.people[name], backend="logbook.accounts.Accounts")
        return client

    return signed_in


@pytest.fixture
def sent(book: Book, device: Device) -> Callable[..., dict[str, Any]]:
    """An entry as a tablet sends it, written by the crew."""

    def made(*findings: dict[str, Any], who: str = "crew", **more: Any) -> dict[str, Any]:
        seen = findings or (crack_seen(book.heel, "3", "12"),)
        entry = {"component": book.gate.pk} | entry_data(
            clock.today("Europe/Budapest").isoformat(), 1000, *seen
        )
        return {
            "entry": entry,
            "person": book.people[who].pk,
            "tablet": str(device.key),
            "round": str(uuid.uuid4()),
            "shown": {"page": "treat-as-stop", "sentences": ["No verdict yet."]},
        } | more

    return made


@pytest.fixture
def send(as_: Callable[[str], Client]) -> Callable[..., Any]:
    def post(data: dict[str, Any], who: str = "crew", kind: str = "entry") -> Any:
        where = f"/api/v1/tablet/lower-mill/send/{kind}"
        return as_(who).post(where, data, "application/json")

    return post


def jpeg(side: int = 40, shade: str = "grey") -> bytes:
    out = io.BytesIO()
    Image.new("RGB", (side, side), shade).save(out, "JPEG")
    return out.getvalue()
