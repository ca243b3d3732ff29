"""Review, signature and what binds: two people, stated grounds, nothing newer, nothing easier."""

import datetime
import json
import threading
from decimal import Decimal

import pytest
from django.db import connections

from logbook import clock
from logbook.actions import standing
from logbook.actions.confirm_restriction import confirm_restriction
from logbook.actions.defer_inspection import approve_deferral, ask_deferral
from logbook.actions.record_repair import record_repair
from logbook.actions.register_licence import revoke_licence
from logbook.actions.return_to_service import return_to_service
from logbook.actions.return_to_service import shown_digest as repair_digest
from logbook.actions.review import review
from logbook.actions.set_unsigned_policy import set_unsigned_policy
from logbook.actions.strike_out import strike_out
from logbook.errors import Refusal
from logbook.journal.verify import verify
from logbook.models import Crack, Disposition, Leaf, Record, Repair, Standing
from tests.pages.book import PASSWORD, Book

from .conftest import Deciding, Leaves, in_days


def refused(call: object, *args: object, **kwargs: object) -> Refusal:
    with pytest.raises(Refusal) as found:
        call(*args, **kwargs)  # type: ignore[operator]
    return found.value


def test_the_whole_way(deciding: Deciding) -> None:
    crack = deciding.found()
    leaves = Leaves()
    d = deciding.sign(deciding.reviewed(crack))
    assert leaves.new() == ["review", "sign-disposition", "record-issued"]
    row = deciding.standing(crack)
    assert (row.state, row.disposition, row.held) == ("in-force", d, False)
    assert d.record.state == Record.State.ISSUED and d.record.number == 1
    assert verify().sound


def test_unsigned_it_is_held_until_the_owner_has_said_otherwise(deciding: Deciding) -> None:
    crack = deciding.found()
    assert (deciding.standing(crack).state, deciding.standing(crack).held) == ("proposed", True)
    book = deciding.book
    set_unsigned_policy(
        book.people["signatory"], book.site, allowed=True, grounds="standing order",
        licence_pk=book.licence.pk, password=PASSWORD,
    )  # fmt: skip
    assert deciding.standing(crack).held is False


def test_who_may_not_review_or_sign(deciding: Deciding) -> None:
    crack = deciding.found()
    newest = deciding.newest(crack)
    for who in ("crew", "signatory", "auditor", "administrator"):
        assert refused(review, deciding.book.people[who], newest.pk, "accept").status == 403
    made = deciding.reviewed(crack)
    for who in ("crew", "engineer", "auditor", "administrator"):
        before = Leaves()
        assert refused(deciding.sign, made, who).status == 403
        assert before.new() == ["signing-refused"]
    assert refused(deciding.sign, made, "stranger").status == 404
    assert not Disposition.objects.exists() and not Record.objects.exists()


def test_a_wrong_password_is_refused_journalled_and_limited(deciding: Deciding) -> None:
    made = deciding.reviewed(deciding.found())
    leaves = Leaves()
    for _ in range(6):
        assert refused(deciding.sign, made, password="not mine").code == "password"
    assert leaves.new() == ["signing-refused"] * 6
    # The limiter is the one of signing in: now even the right one has to rest.
    assert refused(deciding.sign, made).code == "password"
    assert refused(deciding.sign, made, password="").code == "password"


def test_the_digest_must_be_of_what_was_shown(deciding: Deciding) -> None:
    made = deciding.reviewed(deciding.found())
    assert refused(deciding.sign, made, digest="0" * 64).code == "not-what-was-shown"


def test_a_licence_must_be_in_force_and_ones_own(deciding: Deciding) -> None:
    book = deciding.book
    made = deciding.reviewed(deciding.found())
    assert refused(deciding.sign, made, licence_pk=999).status == 404
    revoke_licence(book.people["administrator"], book.site, book.licence.pk, "left the board")
    assert "not in force" in refused(deciding.sign, made).sentence


def test_nothing_newer_may_exist(deciding: Deciding) -> None:
    crack = deciding.found()
    made = deciding.reviewed(crack)
    deciding.found("3.2", "12.5", str(crack.number), counter=1010)
    assert refused(deciding.sign, made).code == "newer"
    assert refused(review, deciding.book.people["engineer"], made.assessment_id, "accept").code == (
        "newer"
    )


def test_who_wrote_the_look_does_not_sign_it(deciding: Deciding) -> None:
    from logbook.models import Membership

    book = deciding.book
    Membership.objects.create(person=book.people["signatory"], site=book.site, role="crew")
    made = book.log(
        clock.today("UTC").isoformat(),
        1000,
        {
            "location": book.heel.pk,
            "what": "crack",
            "crack": "new",
            "depth_basis": "measured",
            "depth_mm": "3",
            "length_mm": "12",
        },
        by="signatory",
    )
    crack = made.findings.get().crack
    assert "someone else has to sign" in refused(deciding.sign, deciding.reviewed(crack)).sentence


def test_an_override_needs_verdict_grounds_and_date(deciding: Deciding) -> None:
    crack = deciding.found()
    engineer, pk = deciding.book.people["engineer"], deciding.newest(crack).pk
    said = refused(review, engineer, pk, "override", verdict="watch", grounds="x")
    assert "until_on" in said.fields
    said = refused(review, engineer, pk, "override", verdict="watch", until_on=in_days(30))
    assert "grounds" in said.fields
    said = refused(
        review, engineer, pk, "override", verdict="restrict", until_on=in_days(30), grounds="x"
    )
    assert "limit" in said.fields
    said = refused(
        review, engineer, pk, "override", verdict="watch", until_on=in_days(-1), grounds="x"
    )
    assert "passed" in said.fields["until_on"][0]


def test_leaving_withdraw_needs_two_people_and_grounds(deciding: Deciding) -> None:
    from logbook.models import Membership

    book = deciding.book
    crack = deciding.found()
    d = deciding.sign(deciding.reviewed(crack, verdict="withdraw", grounds="bent as well"))
    assert deciding.standing(crack).held and d.verdict == "withdraw"
    Membership.objects.create(person=book.people["signatory"], site=book.site, role="engineer")
    eased = deciding.reviewed(
        crack, by="signatory", verdict="watch", until_on=in_days(20), grounds="sized again"
    )
    assert "needs two people" in refused(deciding.sign, eased).sentence
    eased = deciding.reviewed(
        crack, by="engineer", verdict="watch", until_on=in_days(20), grounds="sized again"
    )
    assert deciding.sign(eased).verdict == "watch"
    assert deciding.standing(crack).state == "in-force"


def test_two_signers_at_once_sign_once(deciding: Deciding) -> None:
    made = deciding.reviewed(deciding.found())
    results: list[str] = []

    def sign() -> None:
        try:
            deciding.sign(made)
            results.append("done")
        except Refusal as refusal:
            results.append(refusal.code)
        finally:
            connections.close_all()

    threads = [threading.Thread(target=sign) for _ in range(3)]
    for t in threads:
        t.start()
    for t in threads:
        t.join()
    assert results.count("done") == 1
    assert Record.objects.count() == 1


def test_a_stricter_proposal_binds_at_once_and_an_easier_one_waits(deciding: Deciding) -> None:
    crack = deciding.found()
    signed = deciding.sign(deciding.reviewed(crack))
    deciding.found("15", "90", str(crack.number), counter=1010, confirm_unlikely=True)
    row = deciding.standing(crack)
    assert row.state == "proposed-binding" and row.held
    worse = row.verdict
    deciding.sign(deciding.reviewed(crack))
    deciding.found(
        "3", "12", str(crack.number), counter=1020, confirm_unlikely=True,
        why_smaller="the last size was of the whole weld",
    )  # fmt: skip
    row = deciding.standing(crack)
    assert row.verdict == worse and row.held, "an easier verdict needs a signature"
    assert signed.verdict != worse


def test_it_lapses_by_date_and_by_usage(deciding: Deciding) -> None:
    crack = deciding.found()
    d = deciding.sign(deciding.reviewed(crack))
    row = deciding.standing(crack)
    assert d.until_on is not None and d.until_at is not None
    assert standing.reading(row, d.until_on).lapsed is False
    late = standing.reading(row, d.until_on + datetime.timedelta(days=1))
    assert (late.lapsed, late.held, late.verdict) == (True, True, "refer")
    row.counter = d.until_at
    assert standing.reading(row, d.until_on).lapsed is True


def test_a_restriction_counts_once_it_is_confirmed(deciding: Deciding) -> None:
    crack = deciding.found()
    made = deciding.reviewed(
        crack, verdict="restrict", until_on=in_days(60), limit="12 t", grounds="owner asks"
    )
    d = deciding.sign(made)
    assert deciding.standing(crack).held
    assert refused(confirm_restriction, deciding.book.people["crew"], d.pk, " ").fields
    confirm_restriction(deciding.book.people["crew"], d.pk, "limiter set to 12 t")
    row = deciding.standing(crack)
    assert (row.held, row.limit) == (False, "12 t")
    assert refused(confirm_restriction, deciding.book.people["crew"], d.pk, "again").status == 409


def test_a_deferral_takes_two_people_and_stays_within_the_cracks_life(deciding: Deciding) -> None:
    book = deciding.book
    crack = deciding.found("5", "20")
    soon = in_days(20)
    d = deciding.sign(
        deciding.reviewed(crack, verdict="watch", until_on=soon, grounds="look early")
    )
    engineer, signatory = book.people["engineer"], book.people["signatory"]
    assert refused(ask_deferral, book.people["crew"], d.pk, grounds="x", new_on=soon).status == 403
    assert refused(ask_deferral, engineer, d.pk, grounds="x", new_on=soon).fields["new_on"]
    far = datetime.date(9990, 1, 1)
    assert "life allows" in refused(
        ask_deferral, engineer, d.pk, grounds="x", new_on=far
    ).fields["new_on"][0]  # fmt: skip
    later = in_days(40)
    asked = ask_deferral(engineer, d.pk, grounds="lock drained in May", new_on=later)
    assert deciding.standing(crack).due_on == soon
    approve_deferral(signatory, asked.pk, licence_pk=book.licence.pk, password=PASSWORD)
    assert deciding.standing(crack).due_on == later
    assert Record.objects.filter(deferral__isnull=False, state="issued").count() == 1
    assert refused(
        approve_deferral, signatory, asked.pk, licence_pk=book.licence.pk, password=PASSWORD
    ).status == 409  # fmt: skip


def repair_of(book: Book, crack: Crack, **more: object) -> Repair:
    values: dict[str, object] = {
        "sort": "repair",
        "welded": False,
        "what": "ground out and blended",
        "done_by": "shop",
        "work_order": "W-1",
        "done_on": clock.today("UTC"),
        "counter": Decimal(1100),
        "inspection_after": "magnetic particle, nothing found",
        "closes": True,
    }
    return record_repair(book.people["crew"], book.heel.pk, crack.pk, **(values | more))  # type: ignore[arg-type]


def test_a_repair_holds_the_part_until_its_return_is_signed(deciding: Deciding) -> None:
    book = deciding.book
    crack = deciding.found()
    deciding.sign(deciding.reviewed(crack))
    leaves = Leaves()
    made = Repair.objects.get(pk=repair_of(book, crack).pk)
    assert deciding.standing(crack).held
    sign = {
        "grounds": "looked at after", "licence_pk": book.licence.pk, "password": PASSWORD,
        "digest": repair_digest(made),
    }  # fmt: skip
    assert refused(return_to_service, book.people["crew"], made.pk, **sign).status == 403
    bad = sign | {"digest": "0" * 64}
    assert refused(return_to_service, book.people["signatory"], made.pk, **bad).status == 409
    return_to_service(book.people["signatory"], made.pk, **sign)
    crack.refresh_from_db()
    assert crack.closed_at is not None
    assert not Standing.objects.filter(crack=crack).exists()
    assert leaves.new() == ["record-repair", "return-to-service"]


def test_a_repair_that_does_not_close_needs_a_new_start_with_its_source(deciding: Deciding) -> None:
    crack = deciding.found()
    said = refused(repair_of, deciding.book, crack, closes=False)
    assert {"start_length_mm", "start_source"} <= set(said.fields)
    said = refused(repair_of, deciding.book, crack, done_on=in_days(1), work_order=" ")
    assert said.fields


def test_a_struck_out_size_counts_no_more(deciding: Deciding) -> None:
    crack = deciding.found("3", "12")
    deciding.found("9", "40", str(crack.number), counter=1010)
    wrong = crack.findings.order_by("-pk")[0]
    assert refused(strike_out, deciding.book.people["crew"], wrong.pk, "  ").fields["reason"]
    leaves = Leaves()
    strike_out(
        deciding.book.people["crew"], wrong.pk, "wrong gate",
        {"depth_basis": "measured", "depth_mm": "3.4", "length_mm": "13"},
    )  # fmt: skip
    assert leaves.new() == ["strike-out"]
    assert deciding.standing(crack).state == "not-assessed"
    from logbook.actions.propose import propose

    made = propose(crack.location_id, crack.pk)
    assert made is not None and '"depth_mm":3.4' in str(made.case_text)
    assert '"depth_mm":9' not in str(made.case_text)
    assert refused(strike_out, deciding.book.people["crew"], wrong.pk, "again").status == 409
    assert verify().sound


def test_rebuilding_the_standings_changes_nothing(deciding: Deciding) -> None:
    crack = deciding.found()
    deciding.sign(deciding.reviewed(crack))
    deciding.found("15", "90", str(crack.number), counter=1010, confirm_unlikely=True)

    def rows() -> list[tuple[object, ...]]:
        fields = ("location", "crack", "state", "verdict", "held", "due_on", "due_at", "limit")
        return sorted(Standing.objects.values_list(*fields), key=str)

    before = rows()
    Standing.objects.all().delete()
    standing.rebuild()
    assert rows() == before and before


def test_every_leaf_says_who_and_every_row_fits(deciding: Deciding) -> None:
    crack = deciding.found()
    deciding.sign(deciding.reviewed(crack))
    kinds = set(Leaf.objects.values_list("kind", flat=True))
    assert {"log-inspection", "propose", "review", "sign-disposition", "adopt-basis"} <= kinds
    report = verify()
    assert report.sound, report.faults


def test_a_lower_limit_binds_at_once_and_waits_for_its_own_limiter(
    deciding: Deciding, monkeypatch: pytest.MonkeyPatch
) -> None:
    """A second restriction to less load is stricter than the one that is signed and confirmed."""
    from logbook.actions import propose as proposing

    book = deciding.book

    def restricted(percent: int) -> None:
        outcome = {
            "disposition": {"verdict": "restrict", "reasons": ["less load"]},
            "restriction": {"factor": percent / 100},
            "next_inspection": {"on": "2099-01-01", "usage": None, "governed_by": "rule"},
            "rules": [{"usage": None, "on": None}],
        }
        monkeypatch.setattr(proposing.assessment, "assess", lambda text: outcome)
        monkeypatch.setattr(proposing.assessment, "outcome_text", lambda made: json.dumps(made))

    restricted(84)
    crack = deciding.found()
    d = deciding.sign(deciding.reviewed(crack))
    confirm_restriction(book.people["crew"], d.pk, "limiter set and sealed")
    assert not deciding.standing(crack).held
    restricted(90)
    deciding.found("3.1", "12", str(crack.number), counter=1010)
    row = deciding.standing(crack)
    assert (row.state, row.limit, row.held) == ("in-force", d.limit, False)
    restricted(78)
    deciding.found("3.2", "12", str(crack.number), counter=1020)
    row = deciding.standing(crack)
    assert (row.state, row.held) == ("proposed-binding", True)
    assert row.limit.startswith("78 %")
