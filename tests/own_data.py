"""Tests never touch the data of the checkout: each run has a data folder of its own.

Loaded by ``-p tests.own_data`` (pyproject.toml), since a conftest is too late: pytest-django has
read the settings before it.
"""

import os
import sys
import tempfile

if "logbook.settings" in sys.modules:
    raise RuntimeError("the settings were read before the tests chose their data folder")

_folder = tempfile.TemporaryDirectory(prefix="logbook-tests-")  # removed as the run ends
os.environ["LOGBOOK_DATA"] = _folder.name
os.environ["LOGBOOK_MODE"] = "trial"
os.environ.setdefault("DJANGO_ALLOW_ASYNC_UNSAFE", "true")
