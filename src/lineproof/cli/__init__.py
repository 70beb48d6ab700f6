"""The command ``lineproof``: parsing and exit codes; each command's work is imported when run.

Exit codes: 0 done; 1 a check does not hold or a finding; 2 wrong input.
"""

from __future__ import annotations

import argparse
import os
import sys
from collections.abc import Sequence
from importlib import import_module
from pathlib import Path

from lineproof.errors import UserError

DONE, STOPPED = 0, 130


class _Version(argparse.Action):
    """Print the installed version; looked up only when asked for."""

    def __call__(self, parser: argparse.ArgumentParser, *_: object) -> None:
        from importlib.metadata import version  # noqa: PLC0415 - 20 ms

        sys.stdout.write(f"lineproof {version('lineproof')}\n")
        parser.exit()


def _path(text: str) -> Path:
    """Return a path as typed; an empty one, of a variable that is not set, would be this folder."""
    if not text.strip():
        raise argparse.ArgumentTypeError(f"{text!r} is no path; write the name of a file or folder")
    return Path(text)


def parser() -> argparse.ArgumentParser:
    """Return the parser of all commands."""
    made = argparse.ArgumentParser(
        prog="lineproof",
        description="Printable, checkable calculations of reinforced concrete beams.",
        epilog="Exit codes: 0 done; 1 a check does not hold or a finding; 2 wrong input.",
    )
    made.add_argument("--version", action=_Version, nargs=0, help="show the version and stop")
    commands = made.add_subparsers(dest="command", metavar="COMMAND", required=True)
    _add_issue(commands)
    _add_recheck(commands)
    _add_compare(commands)
    _add_lines(commands)
    _add_audit(commands)
    _add_verify(commands)
    _add_review(commands)
    for own in commands.choices.values():
        own.set_defaults(own=own)
    return made


_Commands = argparse._SubParsersAction  # noqa: SLF001 - argparse has no public name for it


def _add_issue(commands: _Commands[argparse.ArgumentParser]) -> None:
    issue = commands.add_parser(
        "issue",
        help="re-execute calcs, compare them with what is stored, print the package",
        description="Re-execute calc notebooks, compare every line with what is stored, and print "
        "the package: PDF, HTML, record, and the drawings (DXF) and tables (CSV) of the calcs, all "
        "of them or none. Several notebooks of one project make one package.",
    )
    issue.add_argument("notebooks", nargs="+", type=_path, metavar="CALC.ipynb")
    issue.add_argument(
        "--into", type=_path, metavar="DIR", help="folder to print into (default: issued, beside"
        " the first notebook)",
    )  # fmt: skip
    issue.add_argument(
        "--paper", choices=("letter", "a4"), help="paper size (default: the project's, else letter)"
    )
    issue.add_argument(
        "--update", action="store_true",
        help="where stored values disagree with the re-run, store the new ones in the notebook",
    )  # fmt: skip


def _add_recheck(commands: _Commands[argparse.ArgumentParser]) -> None:
    recheck = commands.add_parser(
        "recheck",
        help="re-execute calcs and compare every line with what is stored; change nothing",
        description="Re-execute calc notebooks and compare every line with what is stored. "
        "Nothing is changed. Exit code 1 when a line differs or a check does not hold.",
    )
    recheck.add_argument("notebooks", nargs="+", type=_path, metavar="CALC.ipynb")


def _add_compare(commands: _Commands[argparse.ArgumentParser]) -> None:
    made = commands.add_parser(
        "compare",
        help="say what changed from one issue of a calc to the next; runs nothing",
        description="Name the inputs, choices and verdicts that changed from one issue of a calc "
        "to the next, with both values. Nothing in the files is run. Exit code 1 when a line "
        "differs.",
    )
    made.add_argument("old", type=_path, metavar="OLD", help="notebook, PDF, HTML or record")
    made.add_argument("new", type=_path, metavar="NEW", help="the later issue, of any such kind")
    made.add_argument("--all", action="store_true", help="name every line that differs")


def _add_lines(commands: _Commands[argparse.ArgumentParser]) -> None:
    lines = commands.add_parser(
        "lines",
        help="show the lines of a notebook, a printed PDF or HTML, or a record; runs nothing",
        description="Show every recorded line of a calc. Nothing in the file is run.",
    )
    lines.add_argument("file", type=_path, metavar="FILE")
    lines.add_argument("--json", action="store_true", help="print JSON instead of a table")


def _add_audit(commands: _Commands[argparse.ArgumentParser]) -> None:
    audit = commands.add_parser(
        "audit",
        help="check claims of another calculation against a calc, or search a calc; runs nothing",
        description="With --claims: judge every value that somebody else claims, and name the "
        "origin of each error, the likely slip, and what it does to the checks; the table is "
        "the one that --blank writes, with the column 'claimed' filled in. Without: search "
        "the calc itself for wrong lines and for what is missing; of a notebook of plain Python, "
        "its code. Nothing in a file is run.",
    )
    audit.add_argument(
        "record", type=_path, metavar="RECORD", help="notebook, PDF, HTML or record of the calc"
    )
    table = audit.add_mutually_exclusive_group()
    table.add_argument("--claims", type=_path, metavar="FILE", help="filled table, .csv or .xlsx")
    table.add_argument(
        "--blank", type=_path, metavar="FILE", help="write a blank table of what governs, and stop"
    )
    table.add_argument(
        "--blank-full", type=_path, metavar="FILE", help="write a blank table of every line"
    )
    table.add_argument(
        "--blank-drawing", type=_path, metavar="FILE", help="write a blank table of what is drawn"
    )
    audit.add_argument(
        "--drawing", type=_path, metavar="FILE", help="filled table of what is drawn, .csv or .xlsx"
    )
    audit.add_argument("--calc", metavar="ID", help="which calc of a package of several")
    audit.add_argument("--json", action="store_true", help="print JSON instead of text")
    audit.add_argument("--into", type=_path, metavar="DIR", help="print the report into a folder")
    audit.add_argument(
        "--review", type=_path, metavar="FILE",
        help="raise the findings in a review record, each that does not stand there yet",
    )  # fmt: skip
    audit.add_argument("--checker", default="", metavar="NAME", help="who audits")
    audit.add_argument("--date", default="", metavar="YYYY-MM-DD", help="date of the report")


def _add_verify(commands: _Commands[argparse.ArgumentParser]) -> None:
    verify = commands.add_parser(
        "verify",
        help="compare what a PDF or HTML package prints with the record inside it; runs nothing",
        description="Recompute the record inside a package, print it again and compare what is "
        "printed, mark for mark. Exit code 1 when something has been altered or the record has "
        "been taken out, 2 when the file is no package.",
    )
    verify.add_argument("file", type=_path, metavar="FILE")
    verify.add_argument(
        "--against", type=_path, metavar="RECORD",
        help="a record, a package or a notebook to compare with as well; a notebook proves the "
        "prose too",
    )  # fmt: skip
    verify.add_argument("--json", action="store_true", help="print JSON instead of text")


def _add_review(commands: _Commands[argparse.ArgumentParser]) -> None:
    review = commands.add_parser(
        "review",
        help="how the review of a calc stands; merge the files of two reviewers, sign off",
        description="Show how a review stands against its calc: lines marked, marks older than a "
        "change and what has changed, findings, conflicts. Exit code 1 while anything stands open. "
        "Marks are made in the HTML package: open it in a browser and choose Review.",
    )
    review.add_argument("calc", type=_path, metavar="CALC", help="notebook, PDF, HTML or record")
    review.add_argument(
        "files", type=_path, nargs="*", metavar="FILE",
        help="files of reviewers (default: the .review.json beside CALC, else what is printed in "
        "the package)",
    )  # fmt: skip
    review.add_argument(
        "--marks", type=_path, nargs="+", default=[], metavar="FILE", help="the same",
    )  # fmt: skip
    review.add_argument("--merge", type=_path, metavar="OUT", help="write all marks into one file")
    review.add_argument("--sign", metavar="NAME", help="sign off, if nothing stands open")
    review.add_argument("--on", metavar="DATE", help="day of the sign-off (default: today)")


def main(arguments: Sequence[str] | None = None) -> int:
    """Run a command and return its exit code; a user's mistake shows no traceback."""
    for stream in (sys.stdout, sys.stderr):
        reconfigure = getattr(stream, "reconfigure", None)
        if reconfigure is not None:  # a terminal without a character shows its code
            reconfigure(errors="backslashreplace")
    try:
        options = _parsed(parser(), arguments)
        code = import_module(f"lineproof.cli.{options.command}").run(options)
        sys.stdout.flush()
    except UserError as error:
        sys.stdout.flush()
        for fault in error.faults:
            sys.stderr.write(f"{_visible(fault)}\n")
        return error.exit_code
    except KeyboardInterrupt:
        sys.stderr.write("stopped; nothing has been written\n")
        return STOPPED
    except BrokenPipeError:  # the reader of our output, such as head, has closed it
        os.dup2(os.open(os.devnull, os.O_WRONLY), sys.stdout.fileno())
        return DONE
    except OSError as error:  # met before reading or writing: a name too long, a closed folder
        place = error.filename or "what is printed here"  # a full disk behind > FILE
        sys.stderr.write(f"{_visible(f'{place}: cannot be reached ({error.strerror or error})')}\n")
        return UserError.exit_code
    return int(code)


def _parsed(made: argparse.ArgumentParser, arguments: Sequence[str] | None) -> argparse.Namespace:
    """Return the options; raises :class:`UserError` that names those there are instead."""
    options, left = made.parse_known_args(arguments)
    if not left:
        return options
    import difflib  # noqa: PLC0415 - only where something is wrong

    own = _names_of(options.own)
    faults = []
    for word in left:
        if word.startswith("-"):
            near = difflib.get_close_matches(word, own, n=1, cutoff=0.75)
            hint = f"did you mean {near[0]}? " if near else ""
            faults.append(
                f"{word}: is no option of {options.own.prog}; {hint}there are {', '.join(own)}"
            )
    if not faults:
        faults = [f"{word}: is one word too many for {options.own.prog}" for word in left]
    raise UserError([*faults, f"all of them are shown by {options.own.prog} --help"])


def _names_of(own: argparse.ArgumentParser) -> list[str]:
    actions = own._actions  # noqa: SLF001 - argparse has no public name for it
    return [name for action in actions for name in action.option_strings if name != "-h"]


def _visible(text: str) -> str:
    """Show control characters by their code: text of a file must not steer the terminal."""
    return "".join(c if c.isprintable() or c in "\n\u202f" else f"<U+{ord(c):04X}>" for c in text)
