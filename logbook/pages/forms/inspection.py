"""The inspection form: a head, then a block for each place in walking order.

What was typed stays text until logbook/entry reads it, so that everything can be shown again.
"""

import uuid
from collections.abc import Iterable, Mapping, Sequence
from dataclasses import dataclass, field
from typing import Any

from django.utils.translation import gettext_lazy as _

from logbook.errors import Refusal
from logbook.models import Component, Crack, Location

PIECES = (
    "what",
    "why",
    "part_not_seen",
    "remarks",
    "depth_basis",
    "depth_mm",
    "length_mm",
    "why_smaller",
    "confirm_unlikely",
)
# (name, label, help, kind of box)
HEAD: tuple[tuple[str, Any, Any, str], ...] = (
    ("found_on", _("Day you looked"), "", "date"),
    ("counter", _("Counter reading"), "", "decimal"),
    ("method", _("How you looked"), _("such as: eye, dye, magnetic particles, ultrasound"), "text"),
    ("procedure", _("Procedure"), "", "text"),
    ("procedure_revision", _("Its revision"), "", "text"),
    ("instrument", _("Instrument"), _("its number; “none” if you used none"), "text"),
    ("calibration_valid_until", _("Its calibration is valid until"), "", "date"),
    ("surface", _("Surface"), _("bare, painted, wet, dirty"), "text"),
    ("coverage", _("How much of it you covered"), _("all of it, or which part"), "text"),
    (
        "fell_short",
        _("What was not as the procedure asks"),
        _("surface, light, reach, coverage; leave it empty if all was"),
        "text",
    ),
    ("inspector_name", _("Who looked"), "", "text"),
    ("qualification_level", _("Level of the qualification"), "", "text"),
    ("qualification_valid_until", _("The qualification is valid until"), "", "date"),
)
LATER = (
    ("confirm_counter", _("If the counter was asked back: this reading is right"), "", "tick"),
    ("late_why", _("Why so late, if the look was before the last one"), "", "text"),
    (
        "counter_replaced_why",
        _("Counter replaced or reset: what happened, if it now reads less"),
        "",
        "text",
    ),
)


@dataclass(frozen=True)
class Box:
    """One named box with what was typed in it and what is said beside it."""

    name: str
    label: Any
    hint: Any
    kind: str
    value: str
    said: Sequence[str] = ()
    before: Sequence[str] = ()


@dataclass
class Block:
    """One question at one place: what do you see here?"""

    prefix: str
    location: Location | None
    crack: Crack | None
    further: bool
    typed: dict[str, str]
    last: str = ""
    said: dict[str, list[str]] = field(default_factory=dict)
    # Its number among the findings that are sent, None where nothing was answered.
    sent_as: int | None = None

    @property
    def answered(self) -> bool:
        """“No, nothing new” takes back what was typed under another answer."""
        if self.further and not self.typed.get("what"):
            return False
        return any(value.strip() for value in self.typed.values())

    @property
    def confirm_asked(self) -> bool:
        """A size was asked back, or its tick is already set."""
        asked = any("this size is right" in one for all_ in self.said.values() for one in all_)
        return asked or bool(self.typed.get("confirm_unlikely"))

    def finding(self) -> dict[str, Any]:
        """This block as logbook/entry reads it."""
        what = self.typed.get("what", "")
        crack = ""
        if what in ("crack", "known-not-seen"):
            crack = str(self.crack.number) if self.crack is not None else "new"
        said: dict[str, Any] = {name: self.typed.get(name, "") for name in PIECES}
        if what != "crack":
            # Sizes of an answer that was changed afterwards do not travel.
            said |= {"depth_basis": "", "depth_mm": "", "length_mm": "", "why_smaller": ""}
        where: dict[str, Any] = (
            {"location": self.location.pk}
            if self.location is not None
            else {
                "new_location": {
                    "name": self.typed.get("new_name", ""),
                    "described": self.typed.get("new_described", ""),
                }
            }
        )
        return {**where, **said, "crack": crack}


class InspectionForm:
    """posted : what came back from the page, or nothing at the first showing."""

    def __init__(
        self,
        component: Component,
        locations: Iterable[Location],
        cracks: Iterable[Crack],
        posted: Mapping[str, Any] | None = None,
        before: Mapping[str, Sequence[str]] | None = None,
    ) -> None:
        self.component = component
        self.posted = {} if posted is None else posted
        self.before = before or {}
        self.key = self._typed("key") or str(uuid.uuid4())
        self.sentence = ""
        self.said: dict[str, list[str]] = {}
        self.blocks = list(self._blocks(list(locations), list(cracks)))

    def _typed(self, name: str) -> str:
        value = self.posted.get(name, "")
        return value if isinstance(value, str) else ""

    def _blocks(self, locations: list[Location], cracks: list[Crack]) -> Iterable[Block]:
        for location in locations:
            here = [crack for crack in cracks if crack.location_id == location.pk]
            for crack in here:
                yield self._block(f"c{crack.number}", location, crack)
            yield self._block(f"p{location.pk}", location, None, further=bool(here))
        yield self._block("new", None, None)

    def _block(
        self, prefix: str, location: Location | None, crack: Crack | None, further: bool = False
    ) -> Block:
        names = PIECES + (() if location is not None else ("new_name", "new_described"))
        typed = {name: self._typed(f"{prefix}-{name}") for name in names}
        return Block(prefix, location, crack, further, typed)

    @property
    def places(self) -> list[tuple[Location | None, list[Block]]]:
        """Blocks gathered by place, in walking order; the unlisted place last."""
        gathered: dict[int | None, tuple[Location | None, list[Block]]] = {}
        for block in self.blocks:
            at = block.location.pk if block.location is not None else None
            gathered.setdefault(at, (block.location, []))[1].append(block)
        return list(gathered.values())

    @property
    def head(self) -> list[Box]:
        return [self._box(*one) for one in HEAD]

    @property
    def later(self) -> list[Box]:
        return [self._box(*one) for one in LATER]

    def _box(self, name: str, label: Any, hint: Any, kind: str) -> Box:
        return Box(
            name,
            label,
            hint,
            kind,
            self._typed(name),
            self.said.get(name, ()),
            self.before.get(name, ()),
        )

    def data(self) -> dict[str, Any]:
        """The whole entry as logbook/entry reads it. A place without an answer is left out."""
        answered = [block for block in self.blocks if block.answered]
        for number, block in enumerate(answered):
            block.sent_as = number
        return {
            "key": self.key,
            "component": self.component.pk,
            **{name: self._typed(name) for name, *_rest in HEAD + LATER},
            "findings": [block.finding() for block in answered],
        }

    def show(self, refusal: Refusal) -> None:
        """Keep the refusal's sentences, each for its own box."""
        self.sentence = refusal.sentence
        by_number = {block.sent_as: block for block in self.blocks if block.sent_as is not None}
        for path, sentences in refusal.fields.items():
            parts = path.split(".")
            if parts[0] == "findings" and len(parts) > 2 and int(parts[1]) in by_number:
                name = parts[2] if parts[2] != "new_location" else f"new_{parts[-1]}"
                by_number[int(parts[1])].said.setdefault(name, []).extend(sentences)
            else:
                self.said.setdefault(path, []).extend(sentences)

    def hidden(self) -> list[tuple[str, str]]:
        """Everything typed, for the page that asks "is this right?"."""
        pairs = [("key", self.key)]
        pairs += [(name, self._typed(name)) for name, *_rest in HEAD + LATER]
        for block in self.blocks:
            pairs += [(f"{block.prefix}-{name}", value) for name, value in block.typed.items()]
        return [(name, value) for name, value in pairs if value]
