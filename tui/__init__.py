"""The full screen and the command line."""
