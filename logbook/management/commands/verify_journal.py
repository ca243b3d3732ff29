"""Checks the journal and everything it speaks for; says where it breaks."""

from typing import Any

from django.core.management.base import BaseCommand, CommandError, CommandParser

from logbook.journal.verify import verify


class Command(BaseCommand):
    help = (
        "Checks leaves, tree, names, rows, triggers, photos and records. Exit status 1 on a break."
    )

    def add_arguments(self, parser: CommandParser) -> None:
        parser.add_argument("--held-size", type=int, help="size of a head kept elsewhere")
        parser.add_argument("--held-root", help="its root, in hexadecimal")

    def handle(self, *args: Any, **options: Any) -> None:
        size, root = options["held_size"], options["held_root"]
        if (size is None) != (root is None):
            raise CommandError("--held-size and --held-root go together.")
        report = verify(size, root, lambda n: self.stderr.write(f"{n:,} leaves read"))
        for name, count in report.checked.items():
            self.stdout.write(
                f"{count:>9,} {name} fit" if name != "leaves" else f"{count:>9,} {name}"
            )
        self.stdout.write(f"size {report.size}\nroot {report.root}")
        for fault in report.faults[:50]:
            self.stdout.write(f"BROKEN  {fault}")
        if not report.sound:
            raise CommandError(
                f"{len(report.faults)} things do not fit; the first: {report.faults[0]}"
            )
        self.stdout.write("Everything fits.")
