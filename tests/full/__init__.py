"""Full-size proofs, left out of the normal suite."""
