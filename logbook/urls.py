"""Every address of the application: pages and tablet at the root, the API below /api/v1/."""

from django.urls import include, path

urlpatterns = [
    path("api/v1/tablet/", include("logbook.tablet.api_urls")),
    path("api/v1/", include("logbook.api.urls")),
    path("", include("logbook.tablet.urls")),
    path("", include("logbook.pages.urls")),
]

handler400 = "logbook.faults.bad_request"
handler403 = "logbook.faults.forbidden"
handler404 = "logbook.faults.not_found"
handler500 = "logbook.faults.fault"
