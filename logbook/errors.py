"""The one shape of a refusal: page, API, importer and command all show the same object."""

from collections.abc import Mapping, Sequence


class Refusal(Exception):
    """Something that cannot be done as asked, in words that say how to mend it.

    code : short and stable, for programs ("not-found", "entry-invalid", "not-permitted" …)
    sentence : one clear sentence for people
    fields : field name to sentences, shown beside each field; a field inside a list is named by
        its path, e.g. ``findings.2.depth_mm``
    status : the HTTP status that carries it
    """

    def __init__(
        self,
        code: str,
        sentence: str,
        *,
        fields: Mapping[str, Sequence[str]] | None = None,
        status: int = 400,
    ) -> None:
        super().__init__(sentence)
        self.code = code
        self.sentence = sentence
        self.fields = {name: list(said) for name, said in (fields or {}).items()}
        self.status = status

    def as_problem(self) -> dict[str, object]:
        """The body of an API answer: ``title`` and ``status`` of RFC 9457, with ours beside."""
        return {
            "code": self.code,
            "title": self.sentence,
            "fields": self.fields,
            "status": self.status,
        }


def not_found(what: str = "page") -> Refusal:
    """A record that is not there, or not for this person: the two answer alike."""
    return Refusal("not-found", f"There is no such {what} here.", status=404)


def not_permitted(sentence: str) -> Refusal:
    return Refusal("not-permitted", sentence, status=403)


def conflict(
    code: str, sentence: str, fields: Mapping[str, Sequence[str]] | None = None
) -> Refusal:
    return Refusal(code, sentence, fields=fields, status=409)


def invalid(sentence: str, fields: Mapping[str, Sequence[str]]) -> Refusal:
    return Refusal("invalid", sentence, fields=fields, status=400)
