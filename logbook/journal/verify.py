"""Does everything still fit? Re-hashes what is stored; never writes it anew and compares.

Each check yields faults in words, the first thing that does not fit first. Nothing here trusts a
number that it could recompute from bytes.
"""

import json
from collections.abc import Callable, Iterator
from dataclasses import dataclass
from hashlib import file_digest
from pathlib import Path

from django.conf import settings
from django.db import connection

from logbook.models import Head, Leaf, NameBeside, Photo, Record

from . import rows, tree, triggers
from .append import name_digest

CHUNK = 2000


@dataclass(frozen=True)
class Fault:
    where: str
    what: str

    def __str__(self) -> str:
        return f"{self.where}: {self.what}"


@dataclass(frozen=True)
class Report:
    size: int
    root: str
    checked: dict[str, int]
    faults: tuple[Fault, ...]

    @property
    def sound(self) -> bool:
        return not self.faults


def verify(
    held_size: int | None = None,
    held_root: str | None = None,
    progress: Callable[[int], None] | None = None,
) -> Report:
    """Check leaves, tree, head, names, rows, triggers, photos and records.

    held_size, held_root : a size and root (hex) kept outside the database; the tree must still
        lead to that root at that size. Without one, a tree rebuilt as a whole cannot be told from
        the true one.
    """
    faults: list[Fault] = []
    checked: dict[str, int] = {}
    size, root = _leaves(faults, held_size, held_root, progress)
    checked["leaves"] = size
    for name, check in (
        ("names", _names),
        ("rows", _rows),
        ("triggers", _triggers),
        ("photos", _photos),
        ("records", _records),
    ):
        count = 0
        for fault in check():
            if fault is None:
                count += 1
            else:
                faults.append(fault)
        checked[name] = count
    return Report(size, root.hex(), checked, tuple(faults))


def _leaves(
    faults: list[Fault],
    held_size: int | None,
    held_root: str | None,
    progress: Callable[[int], None] | None,
) -> tuple[int, bytes]:
    frontier: list[bytes] = []
    size = 0
    before = None
    for leaf in Leaf.objects.order_by("index").iterator(chunk_size=CHUNK):
        where = f"leaf {leaf.index} (entry {leaf.entry_number})"
        if leaf.index != size:
            faults.append(
                Fault(where, f"expected leaf {size} here: leaves are missing or out of order")
            )
            break
        payload = bytes(leaf.payload)
        hashed = tree.leaf_hash(payload)
        if hashed != bytes(leaf.leaf_hash):
            faults.append(Fault(where, "its bytes do not hash to what was stored with it"))
        faults.extend(Fault(where, what) for what in _header(leaf, payload))
        if before is not None and leaf.at < before:
            faults.append(Fault(where, "is dated before the leaf that precedes it: clock set back"))
        before = leaf.at
        frontier = tree.append(frontier, size, hashed)
        size += 1
        if held_size == size and tree.root(frontier).hex() != held_root:
            faults.append(
                Fault(f"the tree of {size} leaves", "does not lead to the root held outside")
            )
        if progress is not None and size % 10_000 == 0:
            progress(size)
    if held_size is not None and held_size > size:
        faults.append(
            Fault("the tree", f"has {size} leaves; a head of {held_size} is held outside")
        )
    _head(faults, size, frontier)
    return size, tree.root(frontier)


def _header(leaf: Leaf, payload: bytes) -> Iterator[str]:
    """The columns beside the bytes must say what the bytes say."""
    try:
        said = json.loads(payload)
    except ValueError:
        yield "its bytes are not a JSON text"
        return
    if said.get("kind") != leaf.kind:
        yield f'the column says kind "{leaf.kind}", the bytes say "{said.get("kind")}"'
    if said.get("act") != str(leaf.act):
        yield "the column names another act than the bytes"
    if said.get("schema") != leaf.schema:
        yield "the column names another schema than the bytes"


def _head(faults: list[Fault], size: int, frontier: list[bytes]) -> None:
    head = Head.objects.filter(pk=1).first()
    if head is None:
        faults.append(Fault("the head", "is missing"))
        return
    if head.size != size:
        faults.append(Fault("the head", f"counts {head.size} leaves, and {size} fit"))
    elif bytes(head.root) != tree.root(frontier) or bytes(head.frontier) != tree.pack(frontier):
        faults.append(Fault("the head", "its root is not the root of the leaves"))


def _said(kind: str, name: str) -> dict[int, str]:
    """What the leaves of a kind say of a digest: number or id → SHA-256."""
    held = {}
    for leaf in Leaf.objects.filter(kind=kind).iterator(chunk_size=CHUNK):
        try:
            content = json.loads(bytes(leaf.payload))["content"]
            held[int(content[name])] = str(content["sha256"])
        except (ValueError, KeyError, TypeError):
            continue  # a leaf that does not read is a fault of its own
    return held


def _all_names() -> Iterator[Fault | None]:
    """Every name that a leaf holds the digest of stands beside it."""
    beside: dict[int, set[str]] = {}
    for leaf_id, key in NameBeside.objects.values_list("leaf_id", "key"):
        beside.setdefault(leaf_id, set()).add(key)
    for leaf in Leaf.objects.order_by("index").iterator(chunk_size=CHUNK):
        try:
            held = set(json.loads(bytes(leaf.payload)).get("names") or {})
        except (ValueError, AttributeError):
            continue
        for key in sorted(held - beside.get(leaf.pk, set())):
            yield Fault(f"entry {leaf.entry_number}", f'the name "{key}" beside it is missing')
        yield None


def _names() -> Iterator[Fault | None]:
    yield from _all_names()
    names = NameBeside.objects.select_related("leaf").order_by("leaf_id", "key")
    for row in names.iterator(chunk_size=CHUNK):
        try:
            held = json.loads(bytes(row.leaf.payload))["names"].get(row.key)
        except (ValueError, KeyError, AttributeError):
            held = None
        if held == name_digest(row.salt, row.details):
            yield None
        else:
            yield Fault(
                f"the name beside entry {row.leaf.entry_number}",
                f'"{row.key}" is not the name whose digest the leaf holds',
            )


def _rows() -> Iterator[Fault | None]:
    """Every row of an act against the digest in its leaf."""
    claimed: dict[tuple[str, str], tuple[str, str]] = {}
    for leaf in Leaf.objects.order_by("index").iterator(chunk_size=CHUNK):
        try:
            tables = json.loads(bytes(leaf.payload))["rows"]
        except (ValueError, KeyError, TypeError):
            yield Fault(f"leaf {leaf.index}", "does not say which rows it wrote")
            continue
        for table, held in tables.items():
            for pk, digest in held.items():
                claimed[(table, pk)] = (str(leaf.act), digest)
    for what in rows.differences(claimed):
        yield None if what is None else Fault("the tables", what)


def _triggers() -> Iterator[Fault | None]:
    wrong = triggers.missing(connection)
    for name in triggers.expected(connection):
        if name not in wrong:
            yield None
    for name in wrong:
        yield Fault(f"trigger {name}", "is missing or altered: the table could be changed")


def _photos() -> Iterator[Fault | None]:
    arrived = Photo.objects.filter(arrived_at__isnull=False).order_by("pk")
    said = _said("photo-arrived", "photo")
    for photo in arrived.iterator(chunk_size=CHUNK):
        if said.get(photo.pk) != photo.sha256:
            yield Fault(f"photo {photo.pk}", "is not the one whose digest its leaf holds")
        path = Path(settings.DATA_DIR) / "photos" / photo.sha256[:2] / photo.sha256
        yield _file(f"photo {photo.pk}", path, photo.sha256)


def _records() -> Iterator[Fault | None]:
    expected, said = 1, _said("record-issued", "record")
    for record in Record.objects.order_by("number"):
        if record.number != expected:
            yield Fault(f"record {record.number}", f"record {expected} is missing before it")
        expected = record.number + 1
        if said.get(record.number, "") != record.sha256:
            yield Fault(
                f"record {record.number}",
                "is not the one whose digest was written as it was issued",
            )
        if record.state == Record.State.ISSUED:
            path = record_path(record)
            yield _file(f"record {record.number}", path, record.sha256)


def record_path(record: Record) -> Path:
    """Where the stored bytes of a record lie."""
    folder = Path(settings.DATA_DIR) / "records"
    return folder / f"{record.number}-{record.sha256[:12]}.pdf"


def _file(where: str, path: Path, sha256: str) -> Fault | None:
    try:
        with path.open("rb") as f:
            found = file_digest(f, "sha256").hexdigest()
    except FileNotFoundError:
        return Fault(where, f"its file {path.name} is missing")
    return None if found == sha256 else Fault(where, "its file is not the one that was stored")
