"""The stored description of the API changes on purpose or not at all, and the API keeps to it."""

import json
from pathlib import Path
from typing import Any

import pytest
import schemathesis
from django.core.management import call_command
from django.test import Client
from hypothesis import HealthCheck, given, settings
from hypothesis import strategies as st

from logbook.wsgi import application
from tests.pages.book import Book, crack_seen

STORED = Path(__file__).parents[2] / "fixtures" / "api" / "schema.json"
TOKEN = "a" * 32


def described(folder: Path) -> dict[str, Any]:
    made = folder / "schema.json"
    call_command("spectacular", file=str(made), format="openapi-json", validate=True)
    schema: dict[str, Any] = json.loads(made.read_text())
    return schema


def test_the_stored_schema_is_today_s(tmp_path: Path) -> None:
    """To change it on purpose: manage.py spectacular --format openapi-json --file
    fixtures/api/schema.json"""
    assert described(tmp_path) == json.loads(STORED.read_text())


@pytest.fixture
def session(book: Book) -> str:
    """The session of a crew member whose book has one of most things."""
    book.log("2026-03-02", 1200, crack_seen(book.heel, "3.1", "14"))
    client = Client()
    client.force_login(book.people["crew"], backend="logbook.accounts.Accounts")
    return str(client.cookies["sessionid"].value)


@pytest.mark.parametrize("method", ["GET", "POST", "PUT"])
def test_no_request_however_odd_makes_a_fault(session: str, method: str) -> None:
    """Every operation, drawn from its own description and beside it: no answer of 500 or above,
    and every refusal in the one shape."""
    schema = schemathesis.openapi.from_dict(json.loads(STORED.read_text()))
    schema.app = application
    cookies = {"sessionid": session, "csrftoken": TOKEN}
    tried = 0
    for found in schema.get_all_operations():
        operation = found.ok()
        if operation.method.upper() == method:
            tried += 1
            _ask_oddly(operation, cookies)
    assert tried


def _ask_oddly(operation: Any, cookies: dict[str, str]) -> None:
    modes = list(schemathesis.GenerationMode)
    answers: list[int] = []

    @settings(max_examples=25, suppress_health_check=list(HealthCheck), database=None)
    @given(case=st.one_of([operation.as_strategy(generation_mode=mode) for mode in modes]))
    def ask(case: Any) -> None:
        answer = case.call(cookies=cookies, headers={"X-CSRFToken": TOKEN})
        assert answer.status_code < 500, (operation.label, answer.status_code, answer.text[:500])
        answers.append(answer.status_code)
        if answer.status_code >= 400:
            said = answer.json()
            assert {"code", "title", "status", "fields"} <= set(said), (operation.label, said)

    ask()
    assert set(answers) - {401, 403}, operation.label  # signed in: it was truly asked
