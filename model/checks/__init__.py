"""The steps of the checklist: from a rig and a limit set to findings."""
