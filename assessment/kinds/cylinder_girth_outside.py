"""cylinder-girth-outside: a crack around the outside of a cylinder, free of pressure on its faces.

Loads: axial membrane stress, global bending of the tube (stress at the outer fibre, where the
crack has its middle), pressure, which loads the wall alone. The axial stress of closed ends is not
implied by it.
"""

from .girth import surface_kind

KIND = surface_kind(
    "cylinder-girth-outside", "a crack around the outside of a cylinder", inside=False
)
