"""The crack kinds by their plain names, one file each."""

from .bar_surface import KIND as BAR_SURFACE
from .base import Body, Kind, Loads, WorkingStep
from .cylinder_axial_inside import KIND as CYLINDER_AXIAL_INSIDE
from .cylinder_axial_outside import KIND as CYLINDER_AXIAL_OUTSIDE
from .cylinder_axial_through import KIND as CYLINDER_AXIAL_THROUGH
from .cylinder_girth_inside import KIND as CYLINDER_GIRTH_INSIDE
from .cylinder_girth_outside import KIND as CYLINDER_GIRTH_OUTSIDE
from .cylinder_girth_through import KIND as CYLINDER_GIRTH_THROUGH
from .hole_corner import ONE as HOLE_CORNER_ONE
from .hole_corner import TWO as HOLE_CORNER_TWO
from .hole_through import ONE as HOLE_THROUGH_ONE
from .hole_through import TWO as HOLE_THROUGH_TWO
from .lug_corner import KIND as LUG_CORNER
from .lug_through import KIND as LUG_THROUGH
from .plate_corner import KIND as PLATE_CORNER
from .plate_embedded import KIND as PLATE_EMBEDDED
from .plate_surface import KIND as PLATE_SURFACE
from .plate_through_both_edges import KIND as PLATE_THROUGH_BOTH_EDGES
from .plate_through_centre import KIND as PLATE_THROUGH_CENTRE
from .plate_through_edge import KIND as PLATE_THROUGH_EDGE
from .specimen_compact_tension import KIND as SPECIMEN_COMPACT_TENSION
from .specimen_edge_bend import KIND as SPECIMEN_EDGE_BEND
from .tabulated import KIND as TABULATED
from .weld_toe_surface import KIND as WELD_TOE_SURFACE

KINDS: dict[str, Kind] = {
    kind.name: kind
    for kind in (
        PLATE_THROUGH_CENTRE,
        PLATE_THROUGH_EDGE,
        PLATE_THROUGH_BOTH_EDGES,
        PLATE_SURFACE,
        PLATE_CORNER,
        PLATE_EMBEDDED,
        HOLE_THROUGH_ONE,
        HOLE_THROUGH_TWO,
        CYLINDER_AXIAL_INSIDE,
        CYLINDER_AXIAL_OUTSIDE,
        CYLINDER_AXIAL_THROUGH,
        CYLINDER_GIRTH_INSIDE,
        CYLINDER_GIRTH_OUTSIDE,
        CYLINDER_GIRTH_THROUGH,
        BAR_SURFACE,
        WELD_TOE_SURFACE,
        HOLE_CORNER_ONE,
        HOLE_CORNER_TWO,
        LUG_THROUGH,
        LUG_CORNER,
        SPECIMEN_COMPACT_TENSION,
        SPECIMEN_EDGE_BEND,
        TABULATED,
    )
}

__all__ = ["KINDS", "Body", "Kind", "Loads", "WorkingStep"]
