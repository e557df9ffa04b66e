"""Studies that repeat the checks."""
