"""Published relations: stress intensity and reference stress, one file each.

Units inside: m, MPa, MPa√m. Each file owns the Validity that its code obeys.
"""
