"""The proofs at full size, one after the other: python -m tests.full

They take long and are not part of the suite, which runs each at a reduced size.
"""

import runpy

MODULES = ("tests.full.holes",)

for name in MODULES:
    print(f"== {name}", flush=True)
    runpy.run_module(name, run_name="__main__")
