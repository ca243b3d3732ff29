"""The proofs at full size, one after the other: python -m tests.full [pytest arguments]

They take minutes and are not part of the suite, which runs each at a reduced size.
"""

import runpy
import sys
from pathlib import Path

import pytest

# These print their bounds line by line and raise or exit where one is broken.
BY_THEMSELVES = ("holes", "tablet")


def main(arguments: list[str]) -> int:
    for name in BY_THEMSELVES:
        print(f"== {name}", flush=True)
        runpy.run_module(f"tests.full.{name}", run_name="__main__")
    modules = sorted(Path(__file__).parent.glob("[!_]*.py"))
    rest = [str(module) for module in modules if module.stem not in BY_THEMSELVES]
    return int(pytest.main([*rest, *arguments]))


if __name__ == "__main__":
    sys.exit(main(sys.argv[1:]))
