#!/usr/bin/env python
"""The command line. ``assess`` computes without the web: no settings, no database."""

import os
import sys


def main(arguments: list[str]) -> int:
    if arguments[1:2] == ["assess"]:
        from assessment.command import run

        return run(arguments[2:])
    os.environ.setdefault("DJANGO_SETTINGS_MODULE", "logbook.settings")
    from django.core.management import execute_from_command_line

    execute_from_command_line(arguments)
    return 0


if __name__ == "__main__":
    sys.exit(main(sys.argv))
