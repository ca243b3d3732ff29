"""The database's own refusal to change or remove what is protected.

Installed after every migrate, since SQLite drops triggers when it rebuilds a table. Each trigger is
made only where it is missing or differs, so installing twice is harmless.
"""

from typing import Any

from django.apps import apps
from django.db import connections, transaction
from django.db.backends.base.base import BaseDatabaseWrapper
from django.db.models import Model

from logbook.models import Head, ProtectedModel

MESSAGE = "rows of this table are written once: strike out or supersede instead"
FUNCTION = "logbook_refuse_change"


def protected_models() -> list[type[Model]]:
    """Every concrete model that is written once, in a stable order."""
    found = [
        m for m in apps.get_app_config("logbook").get_models() if issubclass(m, ProtectedModel)
    ]
    return sorted(found, key=lambda m: m._meta.db_table)


def expected(connection: BaseDatabaseWrapper) -> dict[str, str]:
    """Trigger name to the statement that makes it."""
    made: dict[str, str] = {}
    for model in protected_models():
        table = model._meta.db_table
        made |= _statements(connection, table, ("UPDATE", "DELETE"))
    # The head moves forward, but is never removed.
    return made | _statements(connection, Head._meta.db_table, ("DELETE",))


def _statements(
    connection: BaseDatabaseWrapper, table: str, events: tuple[str, ...]
) -> dict[str, str]:
    if connection.vendor == "postgresql":
        return {
            f"{table}_no_{event.lower()}": (
                f'CREATE TRIGGER "{table}_no_{event.lower()}" BEFORE {event} ON "{table}" '
                f"FOR EACH STATEMENT EXECUTE FUNCTION {FUNCTION}()"
            )
            for event in (*events, "TRUNCATE")
        }
    return {
        f"{table}_no_{event.lower()}": (
            f'CREATE TRIGGER "{table}_no_{event.lower()}" BEFORE {event} ON "{table}" '
            f"BEGIN SELECT RAISE(ABORT, '{MESSAGE}'); END"
        )
        for event in events
    }


def present(connection: BaseDatabaseWrapper) -> dict[str, str]:
    """Trigger name to the statement (SQLite) or state (PostgreSQL) found in the database."""
    with connection.cursor() as cursor:
        if connection.vendor == "postgresql":
            cursor.execute(
                "SELECT t.tgname, pg_get_triggerdef(t.oid), t.tgenabled FROM pg_trigger t "
                "JOIN pg_class c ON c.oid = t.tgrelid "
                "JOIN pg_namespace n ON n.oid = c.relnamespace "
                "WHERE NOT t.tgisinternal AND n.nspname = current_schema()"
            )
            # A trigger that was switched off is as good as missing.
            return {name: text for name, text, on in cursor.fetchall() if on in ("O", "A")}
        cursor.execute("SELECT name, sql FROM sqlite_master WHERE type = 'trigger'")
        return dict(cursor.fetchall())


def missing(connection: BaseDatabaseWrapper) -> list[str]:
    """Names of the triggers that are not there, are switched off, or do something else."""
    found = present(connection)
    wrong = []
    for name, statement in expected(connection).items():
        same = (
            found.get(name) == statement
            if connection.vendor == "sqlite"
            else FUNCTION in found.get(name, "")
        )
        if not same:
            wrong.append(name)
    if connection.vendor == "postgresql" and not _function_refuses(connection):
        wrong.append(FUNCTION)
    return wrong


def _function_refuses(connection: BaseDatabaseWrapper) -> bool:
    with connection.cursor() as cursor:
        cursor.execute("SELECT prosrc FROM pg_proc WHERE proname = %s", [FUNCTION])
        row = cursor.fetchone()
    return row is not None and row[0].strip() == _body()


def _body() -> str:
    return f"BEGIN RAISE EXCEPTION '{MESSAGE}'; END"


def install(using: str = "default", **kwargs: Any) -> None:
    """Put every trigger in place. Receiver of ``post_migrate``; may be run at any time."""
    connection = connections[using]
    tables = set(connection.introspection.table_names())
    found = present(connection)
    # One transaction: all of them or none, and one wait for the disk.
    with transaction.atomic(using=using), connection.cursor() as cursor:
        if connection.vendor == "postgresql":
            cursor.execute(
                f"CREATE OR REPLACE FUNCTION {FUNCTION}() RETURNS trigger "
                f"LANGUAGE plpgsql AS $$ {_body()} $$"
            )
        for name, statement in expected(connection).items():
            table = name.rsplit("_no_", 1)[0]
            if table not in tables:  # a migration half-way back
                continue
            if name in found:
                _drop(cursor, connection, name, table)
            cursor.execute(statement)
    _first_head(using, tables)


def _drop(cursor: Any, connection: BaseDatabaseWrapper, name: str, table: str) -> None:
    on = f' ON "{table}"' if connection.vendor == "postgresql" else ""
    cursor.execute(f'DROP TRIGGER "{name}"{on}')


def _first_head(using: str, tables: set[str]) -> None:
    """The head of an empty tree, so that the first append finds a row to lock."""
    from .tree import EMPTY_ROOT

    if Head._meta.db_table in tables:
        Head.objects.using(using).get_or_create(pk=1, defaults={"root": EMPTY_ROOT})


def remove(using: str = "default") -> None:
    """Lift every trigger. For the tests' flush, and for the tests that tamper; nothing else."""
    connection = connections[using]
    found = present(connection)
    with transaction.atomic(using=using), connection.cursor() as cursor:
        for name in expected(connection):
            if name in found:
                _drop(cursor, connection, name, name.rsplit("_no_", 1)[0])
