"""The tablet's page, its worker at the root (so that it looks after every page), its labels."""

from django.urls import path

from . import pages, shell

urlpatterns = [
    path("tablet/", shell.shell, name="tablet"),
    path("worker.js", shell.worker, name="tablet-worker"),
    path("manifest.webmanifest", shell.manifest, name="tablet-manifest"),
    path("site/<slug:slug>/tablets/", pages.tablets, name="tablets"),
    path("site/<slug:slug>/tablets/rules/", pages.rules, name="tablet-rules"),
    path("site/<slug:slug>/tablets/file/", pages.from_file, name="tablet-file"),
    path("site/<slug:slug>/tablets/<int:pk>/revoke/", pages.revoke, name="revoke-tablet"),
    path("site/<slug:slug>/labels/", pages.labels, name="labels"),
]
