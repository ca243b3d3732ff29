"""The proofs at full size, one after the other: python -m tests.full [pytest arguments]

They take minutes to hours and are not part of the suite, which runs each at a reduced size.
"""

import subprocess
import sys
from pathlib import Path

import pytest

# These print their bounds line by line and exit with 1 where one is broken.
BY_THEMSELVES = ("holes", "calibration", "tablet")


def main(arguments: list[str]) -> int:
    broken = [name for name in BY_THEMSELVES if _run(name)]
    modules = sorted(Path(__file__).parent.glob("[!_]*.py"))
    rest = [str(module) for module in modules if module.stem not in BY_THEMSELVES]
    failed = int(pytest.main([*rest, *arguments]))
    for name in broken:
        print(f"BROKEN: tests.full.{name}")
    return 1 if broken else failed


def _run(name: str) -> int:
    print(f"== {name}", flush=True)
    return subprocess.run([sys.executable, "-m", f"tests.full.{name}"]).returncode


if __name__ == "__main__":
    sys.exit(main(sys.argv[1:]))
