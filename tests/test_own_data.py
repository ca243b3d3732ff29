"""The tests' own data folder, for their database and their files."""

import tempfile
from pathlib import Path

from django.conf import settings
from django.db import connection


def test_tests_stay_out_of_the_data_of_the_checkout() -> None:
    temporary = Path(tempfile.gettempdir())
    assert settings.DATA_DIR.parent == temporary.resolve()
    if connection.vendor == "sqlite":
        assert Path(connection.settings_dict["TEST"]["NAME"]).parent == settings.DATA_DIR
