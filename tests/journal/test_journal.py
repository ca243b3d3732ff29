"""The log on a real database: appending, refusing change, finding what was tampered with."""

import threading
import uuid
from collections.abc import Callable

import pytest
from django.db import DatabaseError, IntegrityError, connection, connections, transaction
from django.utils import timezone

from logbook.journal import append, canonical, triggers
from logbook.journal.append import name_digest
from logbook.journal.verify import verify
from logbook.models import Head, Leaf, Material, NameBeside, Person, Site
from logbook.models.protected import NeverChanged

pytestmark = pytest.mark.django_db(transaction=True)


@pytest.fixture
def person() -> Person:
    return Person.objects.create(username="otto", full_name="O. Varga")


@pytest.fixture
def site() -> Site:
    return Site.objects.create(
        slug="lower-mill", name="Lower Mill lock", time_zone="UTC", on_call_name="O. Varga",
        on_call_phone="555 0101", working_weekdays="12345",
    )  # fmt: skip


def write(person: Person, site: Site, name: str = "S355 plate") -> Leaf:
    """One real act: a material and its leaf."""
    act = uuid.uuid4()
    with transaction.atomic():
        Material.objects.create(
            leaf_id=act, site=site, name=name, revision=1, body="{}", source="certificate 88",
            author=person,
        )  # fmt: skip
        return append("register-material", {"name": name}, act=act, by=person, site=site)


def test_leaves_count_up_without_gap_and_everything_fits(person: Person, site: Site) -> None:
    for n in range(5):
        assert write(person, site, f"plate {n}").index == n
    report = verify()
    assert report.sound, report.faults
    assert report.size == 5
    assert report.checked["rows"] == 5
    assert report.checked["triggers"] > 40
    assert report.root == bytes(Head.objects.get().root).hex()


def test_names_stand_beside_and_only_a_digest_within(person: Person, site: Site) -> None:
    leaf = write(person, site)
    assert "Varga" not in bytes(leaf.payload).decode()
    beside = NameBeside.objects.get(leaf=leaf, key="by")
    assert beside.details == "O. Varga"
    assert name_digest(beside.salt, beside.details) in bytes(leaf.payload).decode()


def test_a_failed_act_leaves_nothing(person: Person, site: Site) -> None:
    write(person, site)
    with pytest.raises(IntegrityError):
        write(person, site)  # the same name and revision again
    assert Leaf.objects.count() == Material.objects.count() == 1
    assert verify().sound


def test_a_row_without_its_leaf_cannot_be_committed(person: Person, site: Site) -> None:
    with pytest.raises(IntegrityError), transaction.atomic():
        Material.objects.create(
            leaf_id=uuid.uuid4(), site=site, name="x", revision=1, body="{}", source="s",
            author=person,
        )  # fmt: skip


def test_append_outside_a_transaction_is_a_fault(person: Person, site: Site) -> None:
    with pytest.raises(RuntimeError, match="transaction"):
        append("x", {}, act=uuid.uuid4(), by=person, site=site)


def test_only_exact_values_are_written() -> None:
    with pytest.raises(TypeError, match="float"):
        canonical.text({"depth": 8.4})
    with pytest.raises(TypeError, match="offset"):
        canonical.text({"at": timezone.now().replace(tzinfo=None)})
    assert canonical.text({"b": 1, "a": "ü"}) == '{"a":"ü","b":1}'


@pytest.mark.parametrize("model", triggers.protected_models(), ids=lambda m: m.__name__)
def test_model_queryset_and_database_refuse_change(model: type) -> None:
    with pytest.raises(NeverChanged):
        model.objects.all().update(pk=1)
    with pytest.raises(NeverChanged):
        model.objects.all().delete()
    table = model._meta.db_table
    found = triggers.present(connection)
    events = ["update", "delete", *(["truncate"] if connection.vendor == "postgresql" else [])]
    assert all(f"{table}_no_{event}" in found for event in events)


def test_sql_is_refused_by_the_database(person: Person, site: Site) -> None:
    write(person, site)
    for statement in (
        "UPDATE logbook_material SET source = 'other'",
        "DELETE FROM logbook_material",
        "UPDATE logbook_leaf SET kind = 'x'",
        "DELETE FROM logbook_leaf",
        "DELETE FROM logbook_head",
        "INSERT OR REPLACE INTO logbook_leaf SELECT * FROM logbook_leaf"
        if connection.vendor == "sqlite"
        else "TRUNCATE logbook_leaf CASCADE",
    ):
        with (
            pytest.raises(DatabaseError, match="written once"),
            transaction.atomic(),
            connection.cursor() as cursor,
        ):
            cursor.execute(statement)
    assert verify().sound


def _sql(statement: str) -> Callable[[], None]:
    def run() -> None:
        with connection.cursor() as cursor:
            cursor.execute(statement)

    return run


def _rebuild_payload() -> None:
    """The clumsier forger: new bytes, with their right hash beside them."""
    leaf = Leaf.objects.get(index=1)
    payload = bytes(leaf.payload).replace(b"plate 1", b"plate 9")
    from logbook.journal import tree

    with connection.cursor() as cursor:
        cursor.execute(
            'UPDATE logbook_leaf SET payload = %s, leaf_hash = %s WHERE "index" = 1',
            [payload, tree.leaf_hash(payload)],
        )


TAMPERINGS: dict[str, tuple[Callable[[], None], str]] = {
    "row edited": (_sql("UPDATE logbook_material SET source = 'x' WHERE id > 0"), "changed from"),
    "row removed": (_sql("DELETE FROM logbook_material WHERE name = 'plate 1'"), "was removed"),
    "leaf payload edited": (_rebuild_payload, "root"),
    "leaf hash edited": (
        _sql("UPDATE logbook_leaf SET leaf_hash = payload WHERE kind = 'register-material'"),
        "do not hash",
    ),
    "name beside edited": (_sql("UPDATE logbook_namebeside SET details = 'X'"), "digest"),
    "kind column edited": (_sql("UPDATE logbook_leaf SET kind = 'x'"), "the bytes say"),
    "head wound back": (_sql("UPDATE logbook_head SET size = 2"), "counts 2"),
}


@pytest.mark.parametrize("name", TAMPERINGS)
def test_what_a_superuser_changes_is_found(name: str, person: Person, site: Site) -> None:
    for n in range(4):
        write(person, site, f"plate {n}")
    tamper, words = TAMPERINGS[name]
    triggers.remove()
    tamper()
    triggers.install()
    report = verify()
    assert not report.sound
    assert any(words in fault.what for fault in report.faults), report.faults


def _remove_leaf(index: int) -> None:
    with connection.cursor() as cursor:
        for table, column in (("logbook_namebeside", "leaf_id"), ("logbook_leaf", '"index"')):
            cursor.execute(f"DELETE FROM {table} WHERE {column} = {index}")


@pytest.mark.parametrize(("index", "words"), [(1, "missing or out of order"), (3, "counts 4")])
def test_a_leaf_that_was_taken_out_is_found(
    index: int, words: str, person: Person, site: Site
) -> None:
    for n in range(4):
        write(person, site, f"plate {n}")
    triggers.remove()
    with connection.cursor() as cursor:
        cursor.execute(f"DELETE FROM logbook_material WHERE name = 'plate {index}'")
    _remove_leaf(index)
    triggers.install()
    report = verify()
    assert any(words in fault.what for fault in report.faults), report.faults


def test_a_missing_trigger_is_reported(person: Person, site: Site) -> None:
    write(person, site)
    triggers.remove()
    report = verify()
    assert sum("trigger" in fault.where for fault in report.faults) > 40
    triggers.install()
    assert verify().sound


def test_a_head_held_outside_finds_a_tree_built_anew(person: Person, site: Site) -> None:
    for n in range(3):
        write(person, site, f"plate {n}")
    held = verify()
    write(person, site, "plate 3")
    assert verify(held.size, held.root).sound
    wrong = "00" * 32
    assert not verify(held.size, wrong).sound
    assert not verify(9, wrong).sound


def test_twenty_writers_at_once_leave_no_gap_and_no_fork(person: Person, site: Site) -> None:
    errors: list[Exception] = []

    def one(n: int) -> None:
        try:
            write(person, site, f"plate {n}")
        except Exception as error:  # noqa: BLE001 (shown below, whatever it is)
            errors.append(error)
        finally:
            connections.close_all()

    threads = [threading.Thread(target=one, args=(n,)) for n in range(20)]
    for t in threads:
        t.start()
    for t in threads:
        t.join()
    assert not errors
    assert list(Leaf.objects.order_by("index").values_list("index", flat=True)) == list(range(20))
    assert verify().sound
