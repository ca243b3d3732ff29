"""Addresses of the API, below /api/v1/."""

from django.urls import path
from drf_spectacular.views import SpectacularAPIView, SpectacularSwaggerView

from . import views

urlpatterns = [
    path("schema", SpectacularAPIView.as_view(), name="api-schema"),
    path("docs", SpectacularSwaggerView.as_view(url_name="api-schema"), name="api-docs"),
    path("sites", views.Sites.as_view(), name="api-sites"),
    path("components", views.Components.as_view(), name="api-components"),
    path("components/<int:pk>", views.OneComponent.as_view(), name="api-component"),
    path("standings", views.Standings.as_view(), name="api-standings"),
    path("cracks", views.Cracks.as_view(), name="api-cracks"),
    path("cracks/<int:pk>", views.OneCrack.as_view(), name="api-crack"),
    path("assessments", views.Assessments.as_view(), name="api-assessments"),
    path("assessments/<int:pk>", views.OneAssessment.as_view(), name="api-assessment"),
    path("inspections", views.Inspections.as_view(), name="api-inspections"),
    path("inspections/<int:pk>", views.OneInspection.as_view(), name="api-inspection"),
    path("findings/<int:pk>/strike-out", views.StrikeOuts.as_view(), name="api-strike-out"),
    path("photos/<int:pk>", views.OnePhoto.as_view(), name="api-photo"),
    path("records", views.Records.as_view(), name="api-records"),
    path("records/<int:number>/pdf", views.RecordFile.as_view(), name="api-record-pdf"),
]
