"""The tree against a slow plain reading of RFC 9162, and proofs that must fail."""

from hashlib import sha256

import pytest
from hypothesis import given
from hypothesis import strategies as st

from logbook.journal import proof, tree

hashes = st.lists(st.binary(max_size=8).map(tree.leaf_hash), max_size=70)


def plain_root(leaves: list[bytes]) -> bytes:
    """MTH of RFC 9162, section 2.1.1, word for word."""
    n = len(leaves)
    if n == 0:
        return sha256(b"").digest()
    if n == 1:
        return leaves[0]
    k = 1
    while k * 2 < n:
        k *= 2
    return sha256(b"\x01" + plain_root(leaves[:k]) + plain_root(leaves[k:])).digest()


# The hashes of the empty tree and of an empty leaf: RFC 6962 test values, from memory; the first
# is SHA-256 of nothing (FIPS 180-4), the second SHA-256 of one zero byte.
def test_empty_tree_and_empty_leaf() -> None:
    assert tree.root([]).hex().startswith("e3b0c44298fc1c149afbf4c8996fb924")
    assert tree.leaf_hash(b"").hex().startswith("6e340b9cffb37a989ca544e6bb780a2c")


def test_leaf_and_node_differ() -> None:
    a, b = tree.leaf_hash(b"a"), tree.leaf_hash(b"b")
    assert tree.node_hash(a, b) != tree.leaf_hash(a + b)


@given(hashes)
def test_frontier_gives_the_plain_root(leaves: list[bytes]) -> None:
    size, frontier = tree.root_of(leaves)
    assert size == len(leaves)
    assert tree.root(frontier) == plain_root(leaves)
    assert tree.unpack(tree.pack(frontier)) == frontier


@given(hashes.filter(bool), st.data())
def test_inclusion(leaves: list[bytes], data: st.DataObject) -> None:
    index = data.draw(st.integers(0, len(leaves) - 1))
    path = proof.inclusion(leaves, index)
    root = plain_root(leaves)
    assert proof.includes(leaves[index], index, len(leaves), path, root)
    other = tree.leaf_hash(b"not in the tree at all")
    assert not proof.includes(other, index, len(leaves), path, root)
    assert not proof.includes(leaves[index], len(leaves), len(leaves), path, root)
    assert not proof.includes(leaves[index], index, len(leaves), [*path, other], root)
    if path:
        assert not proof.includes(leaves[index], index, len(leaves), path[:-1], root)
        bent = [bytes([path[0][0] ^ 1]) + path[0][1:], *path[1:]]
        assert not proof.includes(leaves[index], index, len(leaves), bent, root)


@given(hashes.filter(bool), st.data())
def test_consistency(leaves: list[bytes], data: st.DataObject) -> None:
    old = data.draw(st.integers(1, len(leaves)))
    path = proof.consistency(leaves, old)
    old_root, root = plain_root(leaves[:old]), plain_root(leaves)
    assert proof.consistent(old, old_root, len(leaves), root, path)
    forged = tree.leaf_hash(b"another history")
    assert not proof.consistent(old, forged, len(leaves), root, path)
    assert not proof.consistent(old, old_root, len(leaves), forged, path)
    assert not proof.consistent(old, old_root, len(leaves), root, [*path, forged])


def test_a_frontier_of_the_wrong_size_is_refused() -> None:
    with pytest.raises(ValueError, match="perfect subtrees"):
        tree.append([tree.leaf_hash(b"a")], 3, tree.leaf_hash(b"b"))
    with pytest.raises(ValueError, match="32-byte"):
        tree.unpack(b"short")
