"""Physics as pure functions on SI floats or arrays; it knows nothing of rigs, files or limits."""
