"""The tablet's page, its worker at the root (so that it looks after every page), its labels."""

from django.urls import path

from . import shell

urlpatterns = [
    path("tablet/", shell.shell, name="tablet"),
    path("worker.js", shell.worker, name="tablet-worker"),
    path("manifest.webmanifest", shell.manifest, name="tablet-manifest"),
]
