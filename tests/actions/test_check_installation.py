"""The shipped check values: computed here, reported, journalled; a wrong one is noticed."""

import json
from pathlib import Path
from typing import Any

import pytest
from django.core.management import CommandError, call_command

from logbook.actions import check_installation as checking
from logbook.journal.verify import verify
from logbook.models import Leaf

pytestmark = pytest.mark.django_db(transaction=True)
FIXTURES = Path(__file__).parents[2] / "fixtures"


def test_all_values_fit_and_the_report_is_a_leaf(capsys: pytest.CaptureFixture[str]) -> None:
    call_command("check_installation")
    printed = capsys.readouterr().out
    shipped = json.loads(checking.CHECKS.read_text("utf-8"))
    assert f"All {len(shipped)} values fit" in printed and len(shipped) >= 20
    assert all(one["source"] in printed for one in shipped)
    leaf = Leaf.objects.get()
    said = json.loads(bytes(leaf.payload))
    assert said["kind"] == "check-installation" and said["content"]["misfits"] == 0
    assert len(said["content"]["checks"]) == len(shipped)
    assert verify().sound


def test_a_value_that_differs_is_named_and_journalled(
    tmp_path: Path, monkeypatch: pytest.MonkeyPatch, capsys: pytest.CaptureFixture[str]
) -> None:
    shipped = json.loads(checking.CHECKS.read_text("utf-8"))
    shipped[3]["value"] *= 1.05
    wrong = tmp_path / "checks.json"
    wrong.write_text(json.dumps(shipped), "utf-8")
    monkeypatch.setattr(checking, "CHECKS", wrong)
    with pytest.raises(CommandError, match=r"1 of \d+ values do not fit"):
        call_command("check_installation")
    assert f"DIFFERS {shipped[3]['about']}" in capsys.readouterr().out
    assert json.loads(bytes(Leaf.objects.get().payload))["content"]["misfits"] == 1


def test_the_shipped_values_are_those_of_the_records() -> None:
    """Copied, not invented: each id is a record whose source and kind of evidence it repeats."""
    records: dict[str, Any] = {}
    for file in (FIXTURES / "checks").glob("*.json"):
        for one in json.loads(file.read_text("utf-8")):
            if isinstance(one, dict) and "id" in one:
                records[one["id"]] = one
    for one in json.loads(checking.CHECKS.read_text("utf-8")):
        record = records[one["id"]]
        assert (one["source"], one["how"]) == (record["source"], record["how"])
        if not one["note"]:
            assert one["value"] == record["value"]
