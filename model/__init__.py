"""The model: quantities, physics, rig files, checks, studies and reports; it knows no screen."""
