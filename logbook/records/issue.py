"""Numbers without gaps, issue outside the lock, and the stored bytes ever after.

A number is reserved in the transaction of the signature. What dies between that and the issue
leaves it reserved, and ``outstanding`` names it for the sweep; an issue that fails is void, with
its reason. A reprint is the stored bytes, never a new rendering.
"""

import hashlib
import logging
import os
import tempfile
import uuid
from collections.abc import Sequence
from datetime import datetime, timedelta
from pathlib import Path

from django.conf import settings
from django.db import connection, transaction
from django.db.models import Max

from logbook import clock
from logbook.errors import Refusal
from logbook.journal import append
from logbook.models import Deferral, Disposition, Record

from .content import RecordContent
from .gather import gather
from .render import render_record

log = logging.getLogger("logbook.records")
# Taken by those who reserve a number, before the journal's head; any constant of our own does.
NUMBER_LOCK = 7_302_115
ISSUED, VOID = "record-issued", "record-void"


def reserve_number(
    *, disposition: Disposition | None = None, deferral: Deferral | None = None
) -> Record:
    """The next number for what is being signed. Inside the signing transaction, before its leaf.

    Raises RuntimeError outside a transaction: a number taken and then lost would be a gap.
    """
    if not connection.in_atomic_block:
        raise RuntimeError("a record's number belongs inside the signing transaction")
    signed = disposition if deferral is None else deferral.disposition
    if signed is None:
        raise TypeError("a record is kept of a disposition or of a deferral")
    if connection.vendor == "postgresql":
        # SQLite's writers come one after the other; here those who number do.
        with connection.cursor() as cursor:
            cursor.execute("SELECT pg_advisory_xact_lock(%s)", [NUMBER_LOCK])
    last = Record.objects.aggregate(last=Max("number"))["last"] or 0
    return Record.objects.create(
        number=last + 1,
        site=signed.location.component.site,
        disposition=disposition if deferral is None else None,
        deferral=deferral,
    )


def issue(record: Record) -> Record:
    """Render, store and mark as issued; or mark void with the reason. Outside any transaction.

    Calling it again, or from two places at once, is harmless: the first to mark it stands.
    """
    if record.state != Record.State.RESERVED:
        return record
    try:
        content = gather(record)
        pdf = render_record(content)
        digest = _store(record.number, pdf)
    except Exception as error:
        # Whatever it is, the number must not stay open: it is listed void, and the log has all.
        log.exception("record %s could not be issued", record.number)
        _mark(record, state=Record.State.VOID, void_why=f"{type(error).__name__}: {error}")
        return record
    _mark(record, **_issued(content, pdf, digest))
    return record


def outstanding(older_than: timedelta = timedelta(minutes=2)) -> Sequence[Record]:
    """Records whose issue died on the way: the sweep calls ``issue`` on each."""
    before = clock.now() - older_than
    reserved = Record.objects.filter(state=Record.State.RESERVED).order_by("number")
    return [record for record in reserved if _signed_at(record) < before]


def stored_bytes(record: Record) -> bytes:
    """The PDF as it was issued. Raises Refusal where there is none or the file is not the same."""
    if record.state != Record.State.ISSUED:
        why = f": {record.void_why}" if record.void_why else "; it is being written"
        raise Refusal(
            "record-not-issued",
            f"Record {record.number} was not issued{why}.",
            status=409,
        )
    path = path_of(record.number, record.sha256)
    if not path.is_file():
        raise Refusal("record-lost", f"The file of record {record.number} is missing.", status=500)
    body = path.read_bytes()
    if hashlib.sha256(body).hexdigest() != record.sha256:
        raise Refusal(
            "record-changed",
            f"The file of record {record.number} is not the one that was issued.",
            status=500,
        )
    return body


def path_of(number: int, sha256: str) -> Path:
    return Path(settings.DATA_DIR) / "records" / f"{number}-{sha256[:12]}.pdf"


def _issued(content: RecordContent, pdf: bytes, digest: str) -> dict[str, object]:
    return {
        "state": Record.State.ISSUED,
        "sha256": digest,
        "byte_size": len(pdf),
        "journal_size": content.journal_size,
        "journal_root": content.journal_root,
        "issued_at": clock.now(),
    }


def _mark(record: Record, **fields: object) -> None:
    """Only a reserved record changes; one that somebody else has marked is read back. What was
    issued is said in a leaf, so that neither file nor row can be put in another's place."""
    with transaction.atomic():
        reserved = Record.objects.filter(pk=record.pk, state=Record.State.RESERVED)
        if reserved.update(**fields):
            issued = fields["state"] == Record.State.ISSUED
            append(
                ISSUED if issued else VOID,
                {
                    "record": record.number,
                    "sha256": str(fields.get("sha256", "")),
                    "void_why": str(fields.get("void_why", "")),
                },
                act=uuid.uuid4(),
                by=None,
                site=record.site,
                because_of=[_act_of(record).leaf_id],
            )
    record.refresh_from_db()


def _signed_at(record: Record) -> datetime:
    return _act_of(record).leaf.at


def _act_of(record: Record) -> Disposition | Deferral:
    act = record.disposition or record.deferral
    if act is None:
        raise ValueError(f"record {record.number} stands for nothing")
    return act


def _store(number: int, pdf: bytes) -> str:
    """Written beside, fsynced, moved into place, folder fsynced: all there or not there."""
    digest = hashlib.sha256(pdf).hexdigest()
    target = path_of(number, digest)
    target.parent.mkdir(mode=0o700, parents=True, exist_ok=True)
    handle, beside = tempfile.mkstemp(dir=target.parent, prefix=".writing-")
    with os.fdopen(handle, "wb") as file:
        file.write(pdf)
        file.flush()
        os.fsync(file.fileno())
    os.replace(beside, target)
    folder = os.open(target.parent, os.O_RDONLY)
    try:
        os.fsync(folder)
    finally:
        os.close(folder)
    return digest
