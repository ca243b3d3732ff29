"""What every test shares: the triggers lifted around each flush. The data folder: own_data.py."""

import pytest
from django.conf import settings as django_settings
from hypothesis import settings

# The real hasher is slow on purpose, eight times a test; what it is set to has its own test.
REAL_HASHERS = django_settings.PASSWORD_HASHERS
django_settings.PASSWORD_HASHERS = ["django.contrib.auth.hashers.MD5PasswordHasher"]

# The same examples at each run: a check that fails does so for everyone, and none is timed.
settings.register_profile("steady", derandomize=True, deadline=None)
settings.load_profile("steady")


@pytest.fixture(scope="session", autouse=True)
def _triggers_lifted_around_flush() -> None:
    """A flush empties the tables between tests, which the triggers would refuse. ``post_migrate``,
    which flush sends at its end, puts them back."""
    from django.core.management.commands import flush

    from logbook.journal import triggers

    wrapped = flush.Command.handle

    def handle(self: flush.Command, **options: object) -> object:
        triggers.remove(str(options["database"]))
        return wrapped(self, **options)

    flush.Command.handle = handle  # type: ignore[method-assign]


def pytest_collection_modifyitems(items: list[pytest.Item]) -> None:
    """Mark what touches the database, so that the second run takes those alone."""
    for item in items:
        fixtures = set(getattr(item, "fixturenames", ()))
        if fixtures & {"db", "transactional_db", "live_server"} or item.get_closest_marker(
            "django_db"
        ):
            item.add_marker(pytest.mark.database)
