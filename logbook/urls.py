"""Every address of the application: pages at the root, the API below /api/v1/."""

from django.urls import include, path

urlpatterns = [
    path("api/v1/", include("logbook.api.urls")),
    path("", include("logbook.pages.urls")),
]
