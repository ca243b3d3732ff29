"""What a tablet asks and sends, below /api/v1/tablet/."""

from django.urls import path

from . import sending

urlpatterns = [
    path("me", sending.Me.as_view(), name="tablet-me"),
    path("<slug:slug>/register", sending.Register.as_view(), name="tablet-register"),
    path("<slug:slug>/package", sending.Package.as_view(), name="tablet-package"),
    path("<slug:slug>/send/<slug:kind>", sending.Send.as_view(), name="tablet-send"),
    path("answer/<uuid:key>", sending.Answer.as_view(), name="tablet-answer"),
    path("photo/<int:pk>", sending.Piece.as_view(), name="tablet-photo"),
]
