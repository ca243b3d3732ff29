"""The crack kinds by their plain names, one file each."""

from .bar_surface import KIND as BAR_SURFACE
from .base import Body, Kind, Loads, WorkingStep
from .cylinder_axial_inside import KIND as CYLINDER_AXIAL_INSIDE
from .plate_surface import KIND as PLATE_SURFACE
from .plate_through_centre import KIND as PLATE_THROUGH_CENTRE
from .plate_through_edge import KIND as PLATE_THROUGH_EDGE
from .tabulated import KIND as TABULATED

KINDS: dict[str, Kind] = {
    kind.name: kind
    for kind in (
        PLATE_THROUGH_CENTRE,
        PLATE_THROUGH_EDGE,
        PLATE_SURFACE,
        CYLINDER_AXIAL_INSIDE,
        BAR_SURFACE,
        TABULATED,
    )
}

__all__ = ["KINDS", "Body", "Kind", "Loads", "WorkingStep"]
