"""The values from outside, each with its source, that the tests of relations read."""

import json
from pathlib import Path
from typing import Any

FOLDER = Path(__file__).parents[2] / "fixtures/checks"
FURTHER: list[dict[str, Any]] = json.loads((FOLDER / "further-relations.json").read_text("utf-8"))
BY_ID = {check["id"]: check for check in FURTHER}


def starting(*starts: str) -> list[str]:
    """The ids that start so; a family without any is a mistake in the test."""
    found = [check["id"] for check in FURTHER if check["id"].startswith(starts)]
    assert found, starts
    return found


def given(check: dict[str, Any], name: str) -> float:
    return float(check["inputs"][name][0])
