"""The command line: reads arguments, prints results, chooses the exit status.

Results go to standard output, everything else to standard error. Exit status 0: nothing at
or above ``--fail-on``; 1: findings at or above it; 2: the layout or the command line is
wrong; 3: the program itself failed.
"""

from __future__ import annotations

import argparse
import gc
import os
import sys
from collections.abc import Sequence
from datetime import date
from typing import Any, NoReturn, TextIO

_DEBUG = "BENCHLAY_DEBUG"
_INTERRUPTED = 130  # as shells write "ended by the interrupt signal"
_FAILED = 3
_WRONG = 2
_USUAL_WIDTH = 80
_NARROWEST = 20

_LATER = {
    "compare": "what changed between two revisions",
    "watch": "a local page that follows a layout while it is edited",
    "new": "a first layout to start from",
}


def main() -> NoReturn:
    """Be the console command."""
    # Matrices here are 2 by 2: threads of a linear algebra library only cost their start.
    # They are read when numpy is loaded, so they are set before anything imports it.
    for library in ("OPENBLAS", "OMP", "MKL"):
        os.environ.setdefault(f"{library}_NUM_THREADS", "1")
    # A command makes objects and ends; looking for cycles among them only costs time.
    gc.disable()
    status = run(sys.argv[1:])
    # All is written and flushed. To take apart what the system frees at once would cost
    # a twentieth of a plain check.
    os._exit(status)


def run(arguments: Sequence[str]) -> int:
    """Carry out one command line and return its exit status."""
    try:
        return _run(arguments)
    except KeyboardInterrupt:
        return _INTERRUPTED
    except Exception as error:  # the last stop: a person gets a line, never a traceback
        if os.environ.get(_DEBUG):
            raise
        return _apologise(error)


def _run(arguments: Sequence[str]) -> int:
    options = _parser(arguments[0] if arguments else "").parse_args(arguments)
    if options.command in _LATER:
        _say(f"benchlay: {options.command}: not yet ({_LATER[options.command]})\n", sys.stderr)
        return _WRONG
    if getattr(options, "sarif", None):
        _say("benchlay: check --sarif: not yet; use --json\n", sys.stderr)
        return _WRONG
    later = [n for n in ("samples", "seed", "workers", "cluster") if getattr(options, n, None)]
    if later:
        words = "random misalignment is not sampled yet; without it single faults are reviewed"
        _say(f"benchlay: faults --{later[0]}: not yet ({words})\n", sys.stderr)
        return _WRONG
    from benchlay import commands
    from benchlay.report.words import Ink

    work = {
        "review": commands.run_review,
        "check": commands.run_check,
        "trace": commands.run_trace,
        "draw": commands.run_draw,
        "faults": commands.run_faults,
        "explain": commands.run_explain,
        "schema": commands.run_schema,
        "exposure": commands.run_exposure,
    }[options.command]
    if getattr(options, "on", date.min) is None:
        options.on = date.today()  # the one clock of the program
    shows = _takes_colour(sys.stderr)  # where there is no colour there is no progress either
    options.progress = _show_progress if shows else None
    outcome = work(options, Ink(coloured=_takes_colour(sys.stdout)))
    if shows and options.command in ("faults", "review"):
        _say("\r\x1b[K", sys.stderr)
    _say(outcome.out, sys.stdout)
    _say(outcome.err, sys.stderr)
    return int(outcome.status)


def _say(text: str, stream: TextIO) -> None:
    if not text:
        return
    # A name in letters that the stream's encoding lacks is written as an escape.
    encoding = stream.encoding or "utf-8"
    try:
        print(text.encode(encoding, "backslashreplace").decode(encoding), end="", file=stream)
        stream.flush()
    except BrokenPipeError:
        # The reader has gone, as `head` does. What was found still decides the exit status,
        # and Python must not fail again when it flushes the stream at its end.
        os.dup2(os.open(os.devnull, os.O_WRONLY), stream.fileno())


def _show_progress(done: int, total: int) -> None:
    """Say how far the review of faults is; more cases may turn up as it goes."""
    _say(f"\rbenchlay: faults: {done} of {total} cases\x1b[K", sys.stderr)


def _apologise(error: Exception) -> int:
    what = " ".join(f"{type(error).__name__}: {error}".split())
    if isinstance(error, OSError):
        _say(f"benchlay: the system refused: {what}\n", sys.stderr)
    else:
        _say(
            f"benchlay: this is a mistake of the program, not of the layout ({what}); please "
            f"report it to those who maintain it, with the layout and what {_DEBUG}=1 shows\n",
            sys.stderr,
        )
    return _FAILED


def _takes_colour(stream: TextIO) -> bool:
    if os.environ.get("NO_COLOR") or os.environ.get("TERM") == "dumb":
        return False
    return stream.isatty()


class _Help(argparse.HelpFormatter):
    """Help as wide as the terminal.

    Left to itself, argparse asks `shutil` for the width while the arguments are being
    declared, which loads five archive libraries on every run.
    """

    def __init__(self, prog: str) -> None:
        super().__init__(prog, width=_columns() - 2)


def _columns() -> int:
    try:
        columns = int(os.environ.get("COLUMNS", 0)) or os.get_terminal_size().columns
    except (ValueError, OSError):
        columns = 0
    return columns if columns > _NARROWEST else _USUAL_WIDTH


class _Parser(argparse.ArgumentParser):
    """A parser whose commands' parsers write help alike."""

    def __init__(self, **options: Any) -> None:  # noqa: ANN401 - as argparse has it
        super().__init__(formatter_class=_Help, **options)


def _parser(first: str) -> argparse.ArgumentParser:
    """Return a parser of all commands; of one alone where the first argument names it.

    To declare them all would take a hundredth of the time of a plain check.
    """
    parser = _Parser(
        prog="benchlay",
        description="Reviews laser benches written as YAML: places, traces, checks and draws.",
        epilog="Exit status: 0 nothing at or above --fail-on, 1 findings at or above it, "
        "2 the layout or the command line is wrong, 3 the program itself failed.",
    )
    parser.add_argument("--version", action="version", version=_version())
    commands = parser.add_subparsers(dest="command", required=True, metavar="COMMAND")
    declared = {
        "review": (_add_review, "the main job: everything, into a folder"),
        "check": (_add_check, "findings only; writes nothing else"),
        "trace": (_add_trace, "the beams and where their power goes"),
        "draw": (_add_draw, "drawings only"),
        "faults": (_add_faults, "what every credible single fault would do"),
        "explain": (_add_explain, "what a check, a kind of element or a part of a layout means"),
        "schema": (_add_nothing, "JSON Schema of the layout language, for editors"),
        "exposure": (_add_exposure, "limits, class, distances and eyewear of one beam"),
    }
    later = _LATER
    if first in declared:
        declared, later = {first: declared[first]}, {}
    for name, (add, what) in declared.items():
        add(commands.add_parser(name, help=what))
    for name, what in later.items():
        not_yet = commands.add_parser(name, help=f"not yet: {what}", prefix_chars="\0")
        not_yet.add_argument("rest", nargs="*")
    return parser


def _version() -> str:
    from benchlay import __version__

    return f"benchlay {__version__}"


def _add_review(parser: argparse.ArgumentParser) -> None:
    _add_layouts(parser)
    _add_checking(parser)
    _add_output(parser)
    parser.add_argument(
        "--force", action="store_true", help="write into a folder that holds other things"
    )


def _add_check(parser: argparse.ArgumentParser) -> None:
    _add_layouts(parser)
    _add_checking(parser)
    parser.add_argument("--json", action="store_true", help="one JSON document, nothing else")
    parser.add_argument("--sarif", metavar="FILE", help="not yet")


def _add_trace(parser: argparse.ArgumentParser) -> None:
    _add_layout(parser)
    parser.add_argument("--json", action="store_true", help="one JSON document, nothing else")
    parser.add_argument("--state", metavar="NAME", help="the state to trace (as drawn)")


def _add_draw(parser: argparse.ArgumentParser) -> None:
    _add_layout(parser)
    _add_output(parser)
    parser.add_argument("--sheet", metavar="NAME", help="one sheet only, such as plan")
    parser.add_argument("--format", choices=("dxf", "svg", "pdf"), help="one format only")


def _add_explain(parser: argparse.ArgumentParser) -> None:
    parser.add_argument("name", nargs="?", help="a check, a kind or a part (all of them)")


def _add_nothing(parser: argparse.ArgumentParser) -> None:
    """Declare a command that takes no arguments."""


def _add_exposure(parser: argparse.ArgumentParser) -> None:
    from benchlay.results.one_beam import FORMS, flag

    parser.description = (
        "Say of one beam what exposure limits, class, hazard distances and eyewear follow. "
        "Continuous light has a --power; pulses have energy, duration and rate. The beam's "
        "--diameter and --divergence go together; without them no hazard distance follows."
    )
    for name, form in FORMS.items():
        # A figure may be written as two words; one that is given twice is refused later.
        parser.add_argument(
            flag(name),
            nargs="+",
            action="append",
            metavar=(form.metavar, "UNIT"),
            help=form.meaning,
        )
    parser.add_argument("--json", action="store_true", help="one JSON document, nothing else")


def _add_faults(parser: argparse.ArgumentParser) -> None:
    _add_layout(parser)
    _add_checking(parser)
    parser.add_argument("--json", action="store_true", help="one JSON document, nothing else")
    for name, metavar in (
        ("samples", "N"),
        ("seed", "S"),
        ("workers", "N"),
        ("cluster", "ADDRESS"),
    ):
        parser.add_argument(f"--{name}", metavar=metavar, help="not yet: random misalignment")


def _add_layouts(parser: argparse.ArgumentParser) -> None:
    parser.add_argument("layouts", nargs="+", metavar="LAYOUT", help="a YAML file, or -")


def _add_layout(parser: argparse.ArgumentParser) -> None:
    parser.add_argument("layout", metavar="LAYOUT", help="a YAML file, or -")


def _add_output(parser: argparse.ArgumentParser) -> None:
    parser.add_argument(
        "-o", dest="output", metavar="DIR", help="folder (exports/<name of layout>)"
    )


def _add_checking(parser: argparse.ArgumentParser) -> None:
    parser.add_argument("--state", metavar="NAME", help="check this state only (all of them)")
    parser.add_argument(
        "--on", type=_day, metavar="DATE", help="day for accept entries, YYYY-MM-DD (today)"
    )
    parser.add_argument(
        "--fail-on",
        choices=("fail", "warn", "never"),
        default="fail",
        help="the least severity that makes the exit status 1 (fail)",
    )


def _day(text: str) -> date:
    try:
        return date.fromisoformat(text)
    except ValueError:
        msg = f"{text!r} is no date; expected YYYY-MM-DD, such as 2027-06-30"
        raise argparse.ArgumentTypeError(msg) from None
