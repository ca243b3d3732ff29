"""Nothing strict is forgotten: what binds is folded from a signature and every proposal since."""

import datetime
from dataclasses import replace
from decimal import Decimal
from typing import Any

from logbook.actions.binding import Binding, Claim, fold
from logbook.actions.defer_inspection import approve_deferral, ask_deferral
from logbook.actions.log_inspection import log_inspection
from logbook.actions.register_licence import revoke_licence
from logbook.actions.return_to_service import return_to_service
from logbook.actions.return_to_service import shown_digest as repair_digest
from logbook.actions.strike_out import strike_out
from logbook.entry import read_inspection
from logbook.models import Assessment, Crack, Measurement, Membership, Repair, Standing
from tests.pages.book import PASSWORD, crack_seen, entry_data

from .conftest import Deciding, in_days
from .test_deciding import refused, repair_of

DAY = datetime.date(2027, 1, 1)


def claim(verdict: str, days: int | None = None, factor: float | None = None, **more: Any) -> Claim:
    until = None if days is None else DAY + datetime.timedelta(days=days)
    return Claim(verdict, until, None, "", factor, Assessment(verdict=verdict), **more)


def folded(signed: Claim | None, *since: Claim) -> Binding:
    found = fold(signed, since)
    assert found is not None
    return found


def test_an_easier_look_does_not_take_a_withdraw_back() -> None:
    withdraw, easy = claim("withdraw"), claim("continue", 400)
    for signed in (None, claim("continue", 300)):
        found = folded(signed, withdraw, easy)
        assert (found.claim, found.signed, found.claim.held) == (withdraw, False, True)


def test_a_signature_newer_than_all_ends_it() -> None:
    signed = claim("continue", 300)
    assert folded(signed).signed and not folded(signed).claim.held


def test_a_repair_that_may_not_wait_is_stricter_than_one_that_may() -> None:
    found = folded(claim("repair", 100), claim("repair"))
    assert found.claim.stands_still and not found.signed
    assert folded(claim("repair"), claim("repair", 100)).signed


def test_the_lower_limit_binds_and_the_higher_does_not() -> None:
    signed = claim("restrict", 100, 0.84, confirmed=True)
    assert folded(signed, claim("restrict", 100, 0.9)).claim is signed
    lower = folded(signed, claim("restrict", 100, 0.78), claim("restrict", 100, 0.95))
    assert lower.claim.factor == 0.78 and lower.claim.held
    own_words = claim("restrict", 100, None, confirmed=True)
    assert folded(own_words, claim("restrict", 100, 0.9)).claim.factor == 0.9


def test_a_restriction_stays_as_a_condition_under_a_stricter_verdict() -> None:
    signed = Claim(
        "restrict", DAY, None, "84 % of the largest load", 0.84, Assessment(), confirmed=True
    )
    found = folded(signed, claim("repair", 50))
    assert (found.claim.verdict, found.limit, found.held) == ("repair", signed.limit, False)
    unconfirmed = folded(replace(signed, confirmed=False), claim("repair", 50))
    assert unconfirmed.held


def test_the_earliest_date_binds_whatever_came_after() -> None:
    found = folded(claim("continue", 300), claim("continue", 100), claim("continue", 500))
    assert found.due_on == DAY + datetime.timedelta(days=100) and not found.signed


def test_unsigned_and_nothing_strict_the_newest_is_proposed() -> None:
    found = folded(None, claim("watch", 50), claim("continue", 400))
    assert found.proposed and found.claim.verdict == "continue"
    assert fold(None, ()) is None


def seen_large(deciding: Deciding, crack: Crack, counter: int, **more: Any) -> None:
    deciding.found("18", "120", str(crack.number), counter=counter, confirm_unlikely=True, **more)


def withdrawn(deciding: Deciding) -> Crack:
    """Signed to stay in use, then seen at a size that is withdrawn at once."""
    crack = deciding.found(counter=1000)
    deciding.sign(deciding.reviewed(crack))
    seen_large(deciding, crack, 1010)
    assert deciding.standing(crack).held and deciding.standing(crack).verdict == "withdraw"
    return crack


def test_neither_a_smaller_look_nor_a_strike_out_returns_the_part(deciding: Deciding) -> None:
    crack = withdrawn(deciding)
    deciding.found(
        "3", "12", str(crack.number), counter=1020, why_smaller="measured wrong",
        confirm_unlikely=True,
    )  # fmt: skip
    row = deciding.standing(crack)
    assert (row.state, row.verdict, row.held) == ("proposed-binding", "withdraw", True)
    wrong = Measurement.objects.get(depth_mm=Decimal(18)).finding
    strike_out(deciding.book.people["crew"], wrong.pk, "wrong gate")
    from logbook.actions.propose import propose

    propose(crack.location_id, crack.pk)
    assert deciding.standing(crack).verdict == "withdraw" and deciding.standing(crack).held


def test_leaving_it_takes_two_people_and_not_the_one_who_corrected_the_size(
    deciding: Deciding,
) -> None:
    book = deciding.book
    crack = withdrawn(deciding)
    signatory = book.people["signatory"]
    Membership.objects.create(person=signatory, site=book.site, role="engineer")
    wrong = Measurement.objects.get(depth_mm=Decimal(18)).finding
    right = {
        "depth_basis": "measured", "depth_mm": "3.2", "length_mm": "12",
    }  # fmt: skip
    strike_out(signatory, wrong.pk, "wrong gate", right)
    from logbook.actions.propose import propose

    propose(crack.location_id, crack.pk)
    alone = deciding.reviewed(crack, "signatory")
    assert "wrote the look" in refused(deciding.sign, alone).sentence
    # Reviewed and signed by one person, even one who logged nothing: leaving takes two.
    other = deciding.reviewed(
        crack, "signatory", verdict="continue", until_on=in_days(20), grounds="as I see it"
    )
    assert refused(deciding.sign, other).status == 403


def test_an_exchange_holds_every_crack_of_its_place(deciding: Deciding) -> None:
    book = deciding.book
    crack = deciding.found(counter=1000)
    deciding.sign(deciding.reviewed(crack))
    assert not deciding.standing(crack).held
    said = refused(
        repair_of, book, crack, sort="exchange", closes=False, start_length_mm=Decimal(5),
        start_source="x",
    )  # fmt: skip
    assert said.fields["closes"]
    made = repair_of(book, crack, sort="exchange")
    assert deciding.standing(crack).held
    assert Repair.objects.get(pk=made.pk).sort == "exchange"


def test_a_repair_without_its_crack_is_refused_where_cracks_are_open(deciding: Deciding) -> None:
    from logbook import clock
    from logbook.actions.record_repair import record_repair

    book = deciding.book
    deciding.found(counter=1000)
    said = refused(
        record_repair, book.people["crew"], book.heel.pk, None, sort="repair", welded=True,
        what="welded", done_by="shop", work_order="W", done_on=clock.today("UTC"),
        counter=Decimal(1100), inspection_after="none", closes=True,
    )  # fmt: skip
    assert said.fields["crack"]


def test_what_was_found_after_the_work_is_not_closed_by_it(deciding: Deciding) -> None:
    book = deciding.book
    crack = deciding.found(counter=1000)
    made = Repair.objects.get(pk=repair_of(book, crack, sort="exchange").pk)
    digest = repair_digest(made)
    deciding.found("18", "120", counter=1200)
    said = refused(
        return_to_service, book.people["signatory"], made.pk, grounds="looked at after",
        licence_pk=book.licence.pk, password=PASSWORD, digest=digest,
    )  # fmt: skip
    assert said.code == "newer"
    assert not Crack.objects.filter(closed_at__isnull=False).exists()


def test_a_deferral_is_not_approved_over_a_newer_look(deciding: Deciding) -> None:
    book = deciding.book
    crack = deciding.found("5", "20", counter=1000)
    d = deciding.sign(
        deciding.reviewed(
            crack,
            verdict="watch",
            until_on=in_days(20),
            grounds="look early",
        )  # fmt: skip
    )
    asked = ask_deferral(book.people["engineer"], d.pk, grounds="lock drained", new_on=in_days(40))
    from logbook.actions.known import known_of

    data = entry_data(
        in_days(0).isoformat(), 1010, crack_seen(book.heel, "6", "24", str(crack.number))
    )
    log_inspection(book.people["crew"], read_inspection(data, known_of(book.gate)))
    said = refused(
        approve_deferral, book.people["signatory"], asked.pk, licence_pk=book.licence.pk,
        password=PASSWORD,
    )  # fmt: skip
    assert said.code == "newer"


def test_of_two_sizes_of_one_day_the_larger_counts_whichever_was_last(deciding: Deciding) -> None:
    import json

    crack = deciding.found("3.1", "40", counter=1000)
    deciding.found("5", "12", str(crack.number), counter=1000, why_smaller="other end")
    case = json.loads(str(deciding.newest(crack).case_text))
    assert (case["crack"]["depth_mm"], case["crack"]["length_mm"]) == (5, 40)
    assert "history" not in case


def test_another_sites_administrator_has_no_say_in_licences_here(deciding: Deciding) -> None:
    from logbook.actions.register_licence import register_licence

    book = deciding.book
    signatory, stranger = book.people["signatory"], book.people["stranger"]
    Membership.objects.create(person=stranger, site=book.elsewhere, role="administrator")
    Membership.objects.create(person=signatory, site=book.elsewhere, role="crew")
    assert refused(
        revoke_licence, stranger, book.elsewhere, book.licence.pk, "ours now"
    ).status == 404  # fmt: skip
    made = register_licence(
        stranger, book.elsewhere, signatory.pk, body="Far Board", number="1", discipline="all",
        valid_from=in_days(-1), valid_to=in_days(100),
    )  # fmt: skip
    crack = deciding.found()
    review = deciding.reviewed(crack)
    assert refused(deciding.sign, review, licence_pk=made.pk).status == 404


def test_a_policy_that_changes_while_it_is_computed_is_read_anew(deciding: Deciding) -> None:
    from logbook.actions import standing

    crack = deciding.found()
    deciding.book.site.unsigned_may_be_acted_on = True
    deciding.book.site.save()
    location = crack.location
    assert location.component.site.unsigned_may_be_acted_on in (None, True)
    type(deciding.book.site).objects.update(unsigned_may_be_acted_on=False)
    standing.refresh(location, crack)
    assert deciding.standing(crack).held


def test_a_closed_crack_gets_no_row_from_a_stale_copy(deciding: Deciding) -> None:
    from logbook import clock
    from logbook.actions import standing

    crack = deciding.found()
    stale = Crack.objects.get(pk=crack.pk)
    Crack.objects.filter(pk=crack.pk).update(closed_at=clock.now(), closed_why="ground out")
    standing.refresh(stale.location, stale)
    assert not Standing.objects.filter(crack=crack).exists()


def test_an_override_without_a_counter_keeps_the_proposals(deciding: Deciding) -> None:
    crack = deciding.found()
    proposed = deciding.newest(crack).until_at
    assert proposed is not None
    made = deciding.reviewed(crack, verdict="watch", until_on=in_days(20), grounds="early")
    assert made.until_at == proposed
    later = refused(
        deciding.reviewed, crack, verdict="watch", until_on=in_days(20), grounds="early",
        until_at=Decimal(10) ** 9,
    )  # fmt: skip
    assert later.fields["until_at"]
