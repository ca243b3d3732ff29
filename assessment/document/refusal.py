"""What a case document is refused with: the key, and the reason in words."""


class CaseRefused(ValueError):
    """A case that cannot be computed at all. ``where`` is the key, ``why`` a plain sentence."""

    def __init__(self, where: str, why: str) -> None:
        super().__init__(f"{where}: {why}")
        self.where = where
        self.why = why

    def as_error(self) -> dict[str, dict[str, str]]:
        """The place of a refused case in a list of outcomes."""
        return {"error": {"where": self.where, "why": self.why}}
