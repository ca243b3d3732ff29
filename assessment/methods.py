"""Every published relation that is computed with, read from the code itself.

The entries come from the validity records and the docstrings, so that what a reader is told cannot
differ from what is computed. Nothing is listed by hand here.
"""

import importlib
import inspect
import pkgutil
from collections.abc import Iterator
from dataclasses import dataclass
from functools import cache
from types import ModuleType

from assessment.kinds import KINDS
from assessment.validity import Validity

PACKAGES = (
    ("Stress intensity and reference stress", "assessment.relations"),
    ("Cracks beside each other", "assessment.interaction"),
    ("Failure", "assessment.failure"),
    ("Fracture toughness", "assessment.toughness"),
    ("Crack growth", "assessment.growth"),
)


@dataclass(frozen=True)
class Formula:
    """A public function or law of the file: its name with its arguments, and its docstring."""

    name: str
    text: str


@dataclass(frozen=True)
class Method:
    """One relation: where it stands in the code, its record, and the kinds that use it."""

    key: str
    validity: Validity
    kinds: tuple[str, ...]


@dataclass(frozen=True)
class Chapter:
    """One file: what it says of itself, its relations and its formulas."""

    key: str
    part: str
    about: str
    methods: tuple[Method, ...]
    formulas: tuple[Formula, ...]

    @property
    def title(self) -> str:
        """What the file is about: the first sentence."""
        return " ".join(self.about.split("\n\n")[0].split()).rstrip(".")

    @property
    def paragraphs(self) -> tuple[str, ...]:
        """The rest in paragraphs. One that is indented keeps its lines: it is a formula."""
        parts = self.about.split("\n\n")[1:]
        return tuple(p if p.startswith("    ") else " ".join(p.split()) for p in parts)


@cache
def chapters() -> tuple[Chapter, ...]:
    """Every file that holds a published relation, in the order of the computation."""
    return tuple(
        _chapter(part, module)
        for part, package in PACKAGES
        for module in _modules(package)
        if _records(module) or _formulas(module)
    )


def _modules(package: str) -> Iterator[ModuleType]:
    root = importlib.import_module(package)
    if not hasattr(root, "__path__"):
        yield root
        return
    for found in sorted(pkgutil.iter_modules(root.__path__), key=lambda one: one.name):
        yield importlib.import_module(f"{package}.{found.name}")


def _chapter(part: str, module: ModuleType) -> Chapter:
    key = module.__name__.removeprefix("assessment.").replace(".", "-").replace("_", "-")
    methods = tuple(
        Method(f"{key}-{name.lower().replace('_', '-')}", record, _kinds(record))
        for name, record in _records(module)
    )
    return Chapter(key, part, inspect.getdoc(module) or "", methods, _formulas(module))


def _records(module: ModuleType) -> list[tuple[str, Validity]]:
    """The records that this file owns: those that it imports stand in their own file."""
    source = inspect.getsource(module)
    return [
        (name, value)
        for name, value in vars(module).items()
        if isinstance(value, Validity) and f"\n{name} = Validity(" in source
    ]


def _kinds(record: Validity) -> tuple[str, ...]:
    return tuple(name for name, kind in KINDS.items() if record in kind.relations)


def _formulas(module: ModuleType) -> tuple[Formula, ...]:
    """Public functions and laws with a docstring that gives a formula or a source."""
    found = []
    for name, value in vars(module).items():
        if name.startswith("_") or getattr(value, "__module__", None) != module.__name__:
            continue
        text = inspect.getdoc(value) or ""
        if not _says_how(value, text):
            continue
        arguments = ", ".join(inspect.signature(value).parameters)
        found.append(Formula(f"{name}({arguments})", text))
    return tuple(found)


def _says_how(value: object, text: str) -> bool:
    is_law = inspect.isclass(value) and "Source:" in text
    return is_law or (inspect.isfunction(value) and ("=" in text or "√" in text))
