"""Numbers and dates as they are written in figures, one way everywhere."""

from datetime import date

MONTHS = ("Jan", "Feb", "Mar", "Apr", "May", "Jun", "Jul", "Aug", "Sep", "Oct", "Nov", "Dec")
_NO_BREAK = "\N{NO-BREAK SPACE}"


def number(value: float, decimals: int = 0, decimal_sign: str = ".") -> str:
    """14950.04, 1 → "14,950.0"; with a decimal comma the thousands stand apart by a space."""
    text = f"{value:,.{decimals}f}"
    if decimal_sign == ",":
        text = text.replace(",", _NO_BREAK).replace(".", ",")
    return text.replace("-", "\N{MINUS SIGN}")


def millimetres(value: float, decimal_sign: str = ".") -> str:
    """8.44 → "8.4 mm". One decimal is what a hand-held method can tell."""
    return f"{number(value, 1, decimal_sign)}{_NO_BREAK}mm"


def day(on: date) -> str:
    """14 Sep 2027."""
    return f"{on.day} {MONTHS[on.month - 1]} {on.year}".replace(" ", _NO_BREAK)


def locale_format(decimal_sign: str) -> dict[str, object]:
    """The axis labels' number format."""
    thousands = _NO_BREAK if decimal_sign == "," else ","
    return {
        "decimal": decimal_sign,
        "thousands": thousands,
        "grouping": [3],
        "currency": ["", ""],
    }


def counts(unit: str) -> str:
    """hour → "hours"; a word that ends in s stays as the site wrote it."""
    return unit if unit.endswith("s") else f"{unit}s"
