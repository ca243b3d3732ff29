"""Life in batches against a general-purpose solver at full size: python -m tests.full.growth

200 random cracks of each part-through kind by each law, some of it a spectrum of 20 bins with sharp
thresholds. Hours on two cores; give kinds and a count to run less: ``... plate-surface 50``.
"""

import sys

from tests.assessment.growth.tight import CASES, LAWS, worst

BOUND = 0.005


def main(arguments: list[str]) -> None:
    count = next((int(word) for word in arguments if word.isdigit()), 200)
    broken = []
    for kind in [word for word in arguments if word in CASES] or CASES:
        for law in LAWS:
            error, others = worst(kind, law, count)
            print(f"{kind:<24} {law:<14} {error:8.5f}  other ends: {others}", flush=True)
            if error > BOUND or others:
                broken.append((kind, law))
    if broken:
        raise SystemExit(f"beyond {BOUND:.1%} of life or another end: {broken}")


if __name__ == "__main__":
    main(sys.argv[1:])
