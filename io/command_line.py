"""The command line: which commands there are, and what a user sees when something is wrong.

Exit status: 0 all members pass; 1 designed or checked, but something fails; 2 the input is wrong; 130 interrupted;
141 the reader of the output left; 70 a fault of the program.
"""

from __future__ import annotations

import os
import sys
from argparse import ArgumentParser, Namespace, RawDescriptionHelpFormatter
from collections.abc import Callable, Sequence
from difflib import get_close_matches
from importlib import import_module
from io import StringIO

from spanwright import __version__

_COMMANDS = ("design", "check", "wireframe", "strut", "sections", "starter")
_WRONG_INPUT = 2
_NOT_SHOWN = 1
_FAULT = 70
_INTERRUPTED = 130
_BROKEN_PIPE = 141
_SHOW_TRACEBACK = "SPANWRIGHT_TRACEBACK"

_TEXT = """\
Steel roof trusses from span and pitch to a design that can be checked, drawn and cut: geometry, loads, bar forces,
buckling lengths from what really holds the chords, a section for every member, schedules and pictures.
"""
_EPILOGUE = """\
to begin:
  spanwright starter roof.toml      write a commented project file
  spanwright design roof.toml       design it; results go to roof.out/
  spanwright COMMAND --help         what a command does, with examples

Results are for review by a competent, licensed engineer. Local codes and the printed standard take precedence.
The truss is taken as simply supported with no moment to columns. Erection stability is not covered.
"""


def main(arguments: Sequence[str] | None = None) -> int:
    """Run a command; `arguments` as on the command line, without the program's name. Returns the exit status."""
    _settle_streams()
    parser = _parser()
    words = list(sys.argv[1:] if arguments is None else arguments)
    if words and words[0] not in _COMMANDS and not words[0].startswith("-"):
        return _complain(_no_such_command(words[0]), _WRONG_INPUT)
    given = parser.parse_args(words)
    if given.command is None:
        parser.print_help()
        return _WRONG_INPUT
    return _guarded(given.run, given)


def _settle_streams() -> None:
    """Let a terminal that lacks a sign of a title show "?" for it; a stream that is closed takes what comes to it."""
    sys.stdout = sys.stdout or StringIO()
    sys.stderr = sys.stderr or StringIO()
    for stream in (sys.stdout, sys.stderr):
        if hasattr(stream, "reconfigure"):
            stream.reconfigure(errors="replace")


def _no_such_command(word: str) -> str:
    close = get_close_matches(word, _COMMANDS, n=1)
    remedy = f'did you mean "spanwright {close[0]}"?' if close else f"commands: {', '.join(_COMMANDS)}"
    return f'there is no command "{word}"\n  {remedy}'


def _parser() -> ArgumentParser:
    parser = _described(ArgumentParser(prog="spanwright", allow_abbrev=False), _TEXT, _EPILOGUE)
    parser.add_argument("--version", action="version", version=f"spanwright {__version__}")
    commands = parser.add_subparsers(dest="command", metavar="COMMAND", title="commands")
    for name in _COMMANDS:
        module = import_module(f"spanwright.io.commands.{name}")
        text, _, epilogue = module.TEXT.partition("\nexample")
        command = commands.add_parser(name, help=module.SUMMARY, allow_abbrev=False)
        module.arguments(_described(command, text, f"example{epilogue}"))
        command.set_defaults(run=module.run)
    return parser


def _described(parser: ArgumentParser, text: str, epilogue: str) -> ArgumentParser:
    parser.description = text
    parser.epilog = epilogue
    parser.formatter_class = RawDescriptionHelpFormatter
    return parser


def _guarded(run: Callable[[Namespace], int], given: Namespace) -> int:
    """Run a command so that no traceback reaches a user."""
    from spanwright.truss.errors import SpanwrightError

    try:
        status = run(given)
        sys.stdout.flush()
    except SpanwrightError as error:
        return _complain(f"{error}", _WRONG_INPUT)
    except KeyboardInterrupt:
        return _complain("interrupted; every file that was written is whole", _INTERRUPTED)
    except (BrokenPipeError, SystemExit):  # the reader of our output, such as `head`, left; rich then raises SystemExit
        os.dup2(os.open(os.devnull, os.O_WRONLY), sys.stdout.fileno())
        return _BROKEN_PIPE
    except OSError as error:  # files are guarded where they are written: this is the screen or the pipe behind it
        return _complain(f"the output cannot be shown: {error.strerror or error}", _NOT_SHOWN)
    except Exception as error:  # the last guard: no traceback reaches a user, and the status tells a fault of ours
        if os.environ.get(_SHOW_TRACEBACK):
            raise
        return _complain(
            f"a fault of the program, not of your input: {type(error).__name__}: {error}\n"
            f"  please report it with the project file; {_SHOW_TRACEBACK}=1 shows where it happened",
            _FAULT,
        )
    return status


def _complain(message: str, status: int) -> int:
    """Write a message; what a hostile file could send to the terminal is shown as an escape."""
    plain = "".join(c if c.isprintable() or c == "\n" else c.encode("unicode_escape").decode() for c in message)
    sys.stderr.write(f"spanwright: {plain}\n")
    return status
