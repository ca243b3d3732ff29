"""The first site of a real installation, with its first administrator."""

from getpass import getpass
from typing import Any

from django.contrib.auth.password_validation import validate_password
from django.core.exceptions import ValidationError
from django.core.management.base import BaseCommand, CommandError
from django.db import transaction

from logbook.actions.grant_role import grant_role
from logbook.actions.register_person import register_person
from logbook.actions.register_site import register_site
from logbook.errors import Refusal
from logbook.models import Person, Site

QUESTIONS = {
    "name": "Name of the site",
    "time_zone": "Time zone, such as Europe/Vienna",
    "on_call_name": "Who is called when a part must stand still",
    "on_call_phone": "At which number",
    "working_weekdays": "Working weekdays, 1 is Monday: such as 12345",
}


class Command(BaseCommand):
    help = "Asks for a site and its first administrator, and puts both on the books."

    def handle(self, *args: Any, **options: Any) -> None:
        answers = {name: input(f"{question}: ") for name, question in QUESTIONS.items()}
        username = input("The administrator signs in as: ")
        full_name = input("Full name: ")
        password = getpass("First password: ")
        if getpass("Once more: ") != password:
            raise CommandError("The two passwords differ. Nothing was written.")
        try:
            validate_password(password)
            site = first_site(answers, username, full_name, password)
        except ValidationError as error:
            raise CommandError(" ".join(error.messages)) from None
        except Refusal as refusal:
            said = "; ".join(f"{k}: {' '.join(v)}" for k, v in refusal.fields.items())
            raise CommandError(f"{refusal.sentence} {said} Nothing was written.") from None
        self.stdout.write(f"{site} is on the books; {username} grants the other roles.")


def first_site(answers: dict[str, str], username: str, full_name: str, password: str) -> Site:
    """In one transaction: the keeper of the installation, the site, its administrator."""
    with transaction.atomic():
        keeper, made = Person.objects.get_or_create(
            username="keeper",
            defaults={"full_name": "Keeper of the installation", "is_superuser": True},
        )
        if made:
            keeper.set_unusable_password()
            keeper.save()
        site = register_site(keeper, **answers)
        person = register_person(
            keeper, site, username=username, full_name=full_name, password=password
        )
        grant_role(keeper, site, person.pk, "administrator")
    return site
