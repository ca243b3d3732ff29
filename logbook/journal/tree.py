"""Tree hashing of RFC 9162, section 2.1: an append-only Merkle tree over the leaves.

Needs nothing but hashlib. A leaf and a node are hashed under different prefixes, so neither can
be passed off as the other. The *frontier* is the list of perfect subtrees, largest first, that a
tree of a given size falls into; it is all that is needed to append a leaf or give the root.
"""

from collections.abc import Iterable, Sequence
from hashlib import sha256

LEAF = b"\x00"
NODE = b"\x01"
EMPTY_ROOT = sha256(b"").digest()


def leaf_hash(payload: bytes) -> bytes:
    """HASH(0x00 || payload)."""
    return sha256(LEAF + payload).digest()


def node_hash(left: bytes, right: bytes) -> bytes:
    """HASH(0x01 || left || right)."""
    return sha256(NODE + left + right).digest()


def append(frontier: Sequence[bytes], size: int, leaf: bytes) -> list[bytes]:
    """The frontier of ``size + 1`` leaves, from that of ``size`` and the new leaf hash."""
    if len(frontier) != size.bit_count():
        raise ValueError(f"a tree of {size} leaves has {size.bit_count()} perfect subtrees")
    peaks = list(frontier)
    peak = leaf
    while size & 1:  # two perfect subtrees of one height become one of the next
        peak = node_hash(peaks.pop(), peak)
        size >>= 1
    return [*peaks, peak]


def root(frontier: Sequence[bytes]) -> bytes:
    """The root over a frontier; the hash of nothing for an empty tree."""
    if not frontier:
        return EMPTY_ROOT
    peaks = list(frontier)
    top = peaks.pop()
    while peaks:
        top = node_hash(peaks.pop(), top)
    return top


def root_of(leaves: Iterable[bytes]) -> tuple[int, list[bytes]]:
    """Size and frontier over leaf hashes, one pass, memory of the logarithm of their number."""
    size = 0
    frontier: list[bytes] = []
    for leaf in leaves:
        frontier = append(frontier, size, leaf)
        size += 1
    return size, frontier


def pack(frontier: Sequence[bytes]) -> bytes:
    return b"".join(frontier)


def unpack(stored: bytes) -> list[bytes]:
    """The inverse of ``pack``. ValueError if the bytes are no whole number of hashes."""
    if len(stored) % 32:
        raise ValueError("a frontier is a whole number of 32-byte hashes")
    return [stored[i : i + 32] for i in range(0, len(stored), 32)]
