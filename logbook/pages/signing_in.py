"""Signing in and out, the look of this tablet, and one's own page."""

from typing import Any

from django import forms
from django.contrib import messages
from django.contrib.auth import update_session_auth_hash
from django.contrib.auth.decorators import login_not_required, login_required
from django.contrib.auth.forms import AuthenticationForm
from django.contrib.auth.views import LoginView, LogoutView
from django.http import HttpRequest, HttpResponse
from django.shortcuts import redirect, render
from django.urls import reverse
from django.utils.http import url_has_allowed_host_and_scheme
from django.utils.translation import gettext_lazy as _
from django.views.decorators.http import require_POST

from logbook import clock
from logbook.actions.change_password import change_password
from logbook.models import Licence, Membership

from .asked import Asked
from .forms.fields import MISSING, Password
from .frame import LOOKS
from .refusals import attempt, form_status

A_YEAR = 365 * 24 * 3600


class SignInForm(AuthenticationForm):
    error_messages = {
        "invalid_login": _("This name and password do not belong together. Try again."),
        "inactive": _("This account is closed."),
    }
    username = forms.CharField(
        label=_("Sign-in name"),
        error_messages=MISSING,
        widget=forms.TextInput(attrs={"autocomplete": "username", "autocapitalize": "none"}),
    )
    password = forms.CharField(
        label=_("Password"),
        strip=False,
        error_messages=MISSING,
        widget=forms.PasswordInput(attrs={"autocomplete": "current-password"}),
    )


class SignIn(LoginView):
    authentication_form = SignInForm
    template_name = "logbook/sign_in.html"
    redirect_authenticated_user = True


sign_in = login_not_required(SignIn.as_view())
sign_out = LogoutView.as_view()


@login_not_required
@require_POST
def set_look(request: HttpRequest) -> HttpResponse:
    """Day, lamp or sun, kept on this tablet."""
    back = request.POST.get("next", "")
    if not url_has_allowed_host_and_scheme(back, {request.get_host()}, request.is_secure()):
        back = reverse("today")
    answer = redirect(back)
    look = request.POST.get("look", "")
    if look in LOOKS:
        answer.set_cookie(
            "look", look, max_age=A_YEAR, samesite="Lax", secure=request.is_secure(), httponly=True
        )
    return answer


@login_required
def me(request: HttpRequest) -> HttpResponse:
    """Who I am here: roles, licences, how I write numbers."""
    person: Any = request.user
    if request.method == "POST":
        sign = request.POST.get("decimal_sign", "")
        if sign in person.DecimalSign.values:
            person.decimal_sign = sign
            person.save(update_fields=["decimal_sign"])
        return redirect("me")
    today = clock.now().date()
    licences = [
        (one, one.in_force(today))
        for one in Licence.objects.filter(person=person).order_by("valid_to")
    ]
    roles = Membership.objects.filter(person=person, ended_at__isnull=True).select_related("site")
    return render(
        request,
        "logbook/me.html",
        {"roles": roles, "licences": licences, "signs": person.DecimalSign.choices},
    )


class PasswordForm(forms.Form):
    password = Password(_("The password you have now"))
    new = Password(_("The new password"))
    again = Password(_("The new password again"))

    def clean(self) -> dict[str, Any]:
        typed = super().clean() or {}
        if typed.get("new") and typed.get("again") and typed["new"] != typed["again"]:
            self.add_error("again", _("This is not the same as the line above."))
        return typed


@login_required
def new_password(request: Asked) -> HttpResponse:
    form = PasswordForm(request.POST or None)
    if request.method == "POST" and form.is_valid():
        typed = form.cleaned_data
        changed = attempt(
            form, change_password, request.user, typed["password"], typed["new"], request
        )
        if changed is not None:
            update_session_auth_hash(request, changed)
            messages.success(request, _("Your password was changed."))
            return redirect("me")
    return render(
        request,
        "logbook/form.html",
        {"form": form, "heading": _("A new password"), "verb": _("Change it"), "about": []},
        status=form_status(form),
    )
