"""The page that opens with no signal, its worker and its manifest. They hold nothing of anybody."""

import json
from functools import cache
from hashlib import sha256
from pathlib import Path

from django.conf import settings
from django.contrib.auth.decorators import login_not_required
from django.http import HttpRequest, HttpResponse, JsonResponse
from django.shortcuts import render
from django.templatetags.static import static
from django.utils.translation import gettext as _
from django.views.decorators.http import require_safe

STATIC = Path(settings.BASE_DIR) / "logbook" / "static"
STYLES = ("css/fonts.css", "css/tokens.css", "css/base.css", "tablet/tablet.css")
FONTS = ("b612-regular", "b612-bold", "bitter-latin-400", "bitter-latin-700")
WORKER = STATIC / "logbook" / "tablet" / "worker.js"


def modules() -> list[str]:
    """The scripts of the page; the worker itself is served from the root."""
    folder = STATIC / "logbook" / "tablet"
    return sorted(f"tablet/{path.name}" for path in folder.glob("*.js") if path.name != WORKER.name)


@cache
def _assets() -> tuple[str, ...]:
    fonts = [f"fonts/{name}.woff2" for name in FONTS]
    names = [*STYLES, *modules(), *fonts, "icon.svg"]
    return tuple(f"logbook/{name}" for name in names)


@cache
def version() -> str:
    """Changes with any file of the page, so that a tablet never mixes old and new."""
    digest = sha256()
    for path in (*(STATIC / name for name in _assets()), WORKER):
        digest.update(path.read_bytes())
    template = Path(settings.BASE_DIR) / "logbook" / "templates" / "logbook" / "tablet"
    digest.update((template / "shell.html").read_bytes())
    return digest.hexdigest()[:16]


@login_not_required
@require_safe
def shell(request: HttpRequest) -> HttpResponse:
    return render(request, "logbook/tablet/shell.html")


@login_not_required
@require_safe
def worker(request: HttpRequest) -> HttpResponse:
    files = json.dumps(["/tablet/", "/manifest.webmanifest", *(static(one) for one in _assets())])
    head = f'const VERSION = "{version()}";\nconst FILES = {files};\n'
    answer = HttpResponse(head + WORKER.read_text(), content_type="text/javascript")
    answer["Cache-Control"] = "no-cache"
    return answer


@login_not_required
@require_safe
def manifest(request: HttpRequest) -> JsonResponse:
    return JsonResponse(
        {
            "name": _("Crack logbook"),
            "short_name": _("Logbook"),
            "start_url": "/tablet/",
            "scope": "/",
            "display": "standalone",
            # The look's paper by day, as tokens.css has it.
            "background_color": "#edf2ec",
            "theme_color": "#edf2ec",
            "icons": [{"src": static("logbook/icon.svg"), "sizes": "any", "type": "image/svg+xml"}],
        },
        content_type="application/manifest+json",
    )
