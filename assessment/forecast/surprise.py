"""Growth that the basis does not explain: how improbable, and the growth law to go by until it
does."""

from dataclasses import dataclass


@dataclass(frozen=True)
class Surprise:
    """probability : of measuring at least this growth, were the basis right

    factor : upper 95 % of the measured growth over that of the mean law; None where the mean law
    does not bring the crack to that size at all
    """

    probability: float
    factor: float | None

    def words(self) -> str:
        return (
            "The measured growth is faster than its basis explains: on the basis, "
            f"{chance(self.probability)} cracks would have grown this much."
        )


def chance(probability: float) -> str:
    """A probability in words: "about 3 in 10,000", "fewer than 1 in a million"."""
    if probability < 1e-6:
        return "fewer than 1 in a million"
    if probability >= 0.1:
        return f"about {round(100 * probability)} in 100"
    base = 100
    while probability * base < 1.0:
        base *= 10
    return f"about {round(probability * base)} in {base:,}"
