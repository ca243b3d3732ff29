"""The web server's entrance."""

import os

from django.core.wsgi import get_wsgi_application

os.environ.setdefault("DJANGO_SETTINGS_MODULE", "logbook.settings")
application = get_wsgi_application()
