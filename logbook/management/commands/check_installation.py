"""Runs the shipped check values on this machine, prints the report and journals it."""

from typing import Any

from django.core.management.base import BaseCommand, CommandError

from logbook.actions.check_installation import Checked, check_installation

# How a value came to be shipped, in words.
HOW = {
    "read": "read in the source",
    "memory": "from memory",
    "computed": "independent computation, not published",
}


class Command(BaseCommand):
    help = (
        "Computes the shipped check values here, prints them beside their sources, and journals "
        "the dated report. Exit status 1 where one does not fit."
    )

    def handle(self, *args: Any, **options: Any) -> None:
        report = check_installation()
        engine = ", ".join(f"{name} {value}" for name, value in report.engine.items())
        self.stdout.write(f"Installation check of {report.at:%Y-%m-%d %H:%M} UTC")
        self.stdout.write(f"{engine}; {report.machine}")
        for one in report.checks:
            self.stdout.write(_line(one))
        if report.misfits:
            first = report.misfits[0]
            raise CommandError(
                f"{len(report.misfits)} of {len(report.checks)} values do not fit; the first: "
                f"{first.about}. Do not rely on this installation: find out what differs in "
                "Python, NumPy or SciPy, and run this again."
            )
        self.stdout.write(f"All {len(report.checks)} values fit. Written into the journal.")


def _line(one: Checked) -> str:
    word = "fits  " if one.fits else "DIFFERS"
    return (
        f"{word} {one.about}: {one.found:.6g} for {one.value:.6g} ({100 * one.apart:+.3f} %, "
        f"allowed {100 * one.within:g} %)\n       {HOW[one.how]}: {one.source}"
    )
