"""The commands, one a file: `add` declares the arguments, `run` does it and returns the exit status.

Whatever takes time to import is imported within `run`, so that help and completion start at once.
"""
