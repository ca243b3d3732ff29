"""cylinder-girth-inside: a crack around the bore of a cylinder, pressure also on its faces.

Loads: axial membrane stress, global bending of the tube (stress at the outer fibre, where the
crack has its middle), pressure. The axial stress of closed ends is not implied by the pressure.
"""

from .girth import surface_kind

KIND = surface_kind("cylinder-girth-inside", "a crack around the inside of a cylinder", inside=True)
