"""The commands, one a module: `SUMMARY`, `TEXT` for --help, `arguments(parser)` and `run(arguments) -> exit status`.

A module imports what it needs when it runs, so that --help costs nothing.
"""
