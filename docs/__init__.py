"""Documentation, and the scripts that write its generated parts."""
