"""hole-through-two: equal through cracks at both sides of a round hole, bypass and pin load."""

from . import at_hole

KIND = at_hole.of("hole-through-two", "equal cracks through the plate, at both sides of a hole", 2)
