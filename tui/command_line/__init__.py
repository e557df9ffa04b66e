"""The command line: plain text in and out, no screen."""
