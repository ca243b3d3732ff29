"""Inclusion and consistency proofs of RFC 9162, sections 2.1.3 and 2.1.4.

An inclusion proof shows that a leaf is in the tree of a given root. A consistency proof shows that
the tree of a later root only added to the tree of an earlier one. Checking needs hashlib alone.
"""

from collections.abc import Sequence

from . import tree


def _split(n: int) -> int:
    """The largest power of two smaller than n (n > 1)."""
    return 1 << (n - 1).bit_length() - 1


def _root(leaves: Sequence[bytes]) -> bytes:
    return tree.root(tree.root_of(leaves)[1])


def inclusion(leaves: Sequence[bytes], index: int) -> list[bytes]:
    """The audit path of leaf ``index`` in the tree over these leaf hashes, lowest node first."""
    if not 0 <= index < len(leaves):
        raise IndexError(f"leaf {index} is not among {len(leaves)}")
    if len(leaves) == 1:
        return []
    k = _split(len(leaves))
    if index < k:
        return [*inclusion(leaves[:k], index), _root(leaves[k:])]
    return [*inclusion(leaves[k:], index - k), _root(leaves[:k])]


def includes(leaf: bytes, index: int, size: int, path: Sequence[bytes], root: bytes) -> bool:
    """True where the path leads from the leaf hash at ``index`` to the root of ``size`` leaves."""
    if not 0 <= index < size:
        return False
    fn, sn, r = index, size - 1, leaf
    for p in path:
        if sn == 0:
            return False
        if fn & 1 or fn == sn:
            r = tree.node_hash(p, r)
            while not fn & 1 and fn:
                fn >>= 1
                sn >>= 1
        else:
            r = tree.node_hash(r, p)
        fn >>= 1
        sn >>= 1
    return sn == 0 and r == root


def consistency(leaves: Sequence[bytes], old_size: int) -> list[bytes]:
    """Proof that the first ``old_size`` of these leaf hashes are a tree that this one adds to."""
    if not 0 < old_size <= len(leaves):
        raise IndexError(f"no tree of {old_size} within {len(leaves)}")
    return _subproof(leaves, old_size, True)


def _subproof(leaves: Sequence[bytes], m: int, whole: bool) -> list[bytes]:
    n = len(leaves)
    if m == n:
        return [] if whole else [_root(leaves)]
    k = _split(n)
    if m <= k:
        return [*_subproof(leaves[:k], m, whole), _root(leaves[k:])]
    return [*_subproof(leaves[k:], m - k, False), _root(leaves[:k])]


def consistent(
    old_size: int, old_root: bytes, size: int, root: bytes, path: Sequence[bytes]
) -> bool:
    """True where the path shows that the tree of ``root`` only adds to the tree of ``old_root``."""
    if not 0 < old_size <= size:
        return False
    if old_size == size:
        return not path and old_root == root
    nodes = list(path)
    if not old_size & (old_size - 1):  # the old tree is one perfect subtree: its root is known
        nodes.insert(0, old_root)
    if not nodes:
        return False
    fn, sn = old_size - 1, size - 1
    while fn & 1:
        fn >>= 1
        sn >>= 1
    fr = sr = nodes[0]
    for c in nodes[1:]:
        if sn == 0:
            return False
        if fn & 1 or fn == sn:
            fr = tree.node_hash(c, fr)
            sr = tree.node_hash(c, sr)
            while not fn & 1 and fn:
                fn >>= 1
                sn >>= 1
        else:
            sr = tree.node_hash(sr, c)
        fn >>= 1
        sn >>= 1
    return sn == 0 and fr == old_root and sr == root
