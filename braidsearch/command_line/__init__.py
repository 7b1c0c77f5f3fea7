"""The command line: main, and one file for each command."""
