"""The computation on this machine, held against values from outside; the report is a leaf."""

import datetime
import json
import platform
import uuid
from dataclasses import dataclass
from pathlib import Path
from typing import Any

from django.conf import settings
from django.db import transaction

import assessment
from logbook import clock
from logbook.journal import append

KIND = "check-installation"
CHECKS = Path(settings.BASE_DIR) / "fixtures/installation/checks.json"


@dataclass(frozen=True)
class Checked:
    """One value from outside and what this machine computes for it.

    within : how far apart they may lie, as a part of the value: the accuracy that either states
    """

    name: str
    about: str
    source: str
    how: str
    value: float
    found: float
    within: float

    @property
    def apart(self) -> float:
        """Found less value, as a part of the value."""
        return self.found / self.value - 1.0

    @property
    def fits(self) -> bool:
        """Not a number does not fit."""
        return abs(self.apart) <= self.within


@dataclass(frozen=True)
class Report:
    """What was checked, when, with what."""

    at: datetime.datetime
    engine: dict[str, str]
    machine: str
    checks: tuple[Checked, ...]

    @property
    def misfits(self) -> tuple[Checked, ...]:
        return tuple(one for one in self.checks if not one.fits)


def check_installation() -> Report:
    """Compute every shipped check value and append the dated report to the journal."""
    checks = tuple(_checked(one) for one in json.loads(CHECKS.read_text("utf-8")))
    machine = f"Python {platform.python_version()}, {platform.system()} {platform.machine()}"
    report = Report(clock.now(), dict(assessment.ENGINE), machine, checks)
    with transaction.atomic():
        append(KIND, _content(report), act=uuid.uuid4(), by=None, site=None)
    return report


def _checked(shipped: dict[str, Any]) -> Checked:
    found: Any = assessment.assess(shipped["case"])
    for key in shipped["read"]:
        found = found[key]
    return Checked(
        shipped["id"],
        shipped["about"],
        shipped["source"],
        shipped["how"],
        float(shipped["value"]),
        float("nan") if found is None else float(found),
        float(shipped["within"]),
    )


def _content(report: Report) -> dict[str, Any]:
    return {
        "at": report.at,
        "engine": report.engine,
        "machine": report.machine,
        "misfits": len(report.misfits),
        "checks": [
            {
                "name": one.name,
                "value": repr(one.value),
                "found": repr(one.found),
                "within": repr(one.within),
                "fits": one.fits,
            }
            for one in report.checks
        ],
    }
