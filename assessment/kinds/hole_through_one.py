"""hole-through-one: a through crack at one side of a round hole, bypass stress and pin load."""

from . import at_hole

KIND = at_hole.of("hole-through-one", "a crack through the plate, at one side of a hole", 1)
