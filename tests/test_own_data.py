"""The tests' own data folder, for their database and their files."""

import tempfile
from pathlib import Path

from django.conf import settings
from django.db import connection

from tests.conftest import REAL_HASHERS


def test_tests_stay_out_of_the_data_of_the_checkout() -> None:
    temporary = Path(tempfile.gettempdir())
    assert settings.DATA_DIR.parent == temporary.resolve()
    if connection.vendor == "sqlite":
        assert Path(connection.settings_dict["TEST"]["NAME"]).parent == settings.DATA_DIR


def test_passwords_are_kept_by_argon2() -> None:
    """The tests themselves take a fast hasher; the settings must not."""
    assert REAL_HASHERS == ["django.contrib.auth.hashers.Argon2PasswordHasher"]
