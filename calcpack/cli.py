"""The command line: ``calcpack COMMAND [JOB]``.

Exit status: 0 all is well; 1 the work was done and something is not OK; 2 bad input or a refused request, the
reason on standard error, nothing written or changed.
"""

from __future__ import annotations

import argparse
import json
import os
import sys
from collections.abc import Callable, Sequence
from pathlib import Path
from types import ModuleType
from typing import TYPE_CHECKING, TextIO, cast

from calcpack.errors import CalcpackError

if TYPE_CHECKING:
    from calcpack.job import Job
    from calcpack.package.gate import Open

__all__ = ["main"]

OK, NOT_OK, REFUSED = 0, 1, 2


def main(arguments: Sequence[str] | None = None) -> int:
    """Run one command and return its exit status."""
    for stream in (sys.stdout, sys.stderr):
        if hasattr(stream, "reconfigure"):
            stream.reconfigure(encoding="utf-8", errors="replace")
    # A URI checker that notebooks do not need compiles its grammars for over a second when jsonschema finds it.
    sys.modules.setdefault("rfc3987_syntax", cast(ModuleType, None))
    options = _parser().parse_args(arguments)
    try:
        status = int(options.run(options))
        sys.stdout.flush()
        return status
    except CalcpackError as error:
        print(f"{type(error).__name__}: {error}", file=sys.stderr)
    except KeyboardInterrupt:
        print("stopped; nothing was written", file=sys.stderr)
    except BrokenPipeError:
        # Printing comes last, so the work is done; what is in the buffer must not be tried again when Python ends.
        os.dup2(os.open(os.devnull, os.O_WRONLY), sys.stdout.fileno())
        return NOT_OK
    except OSError as error:
        print(f"cannot read or write {error.filename or 'a file'}: {error.strerror or error}", file=sys.stderr)
    return REFUSED


def _parser() -> argparse.ArgumentParser:
    parser = argparse.ArgumentParser(prog="calcpack", description="Calculation packages for reinforced concrete.")
    parser.add_argument("--version", action="version", version=_version())
    commands = parser.add_subparsers(title="commands", required=True, metavar="COMMAND")
    for name, run, text in _COMMANDS:
        command = commands.add_parser(name, help=text, description=text[0].upper() + text[1:] + ".")
        command.set_defaults(run=run)
        if name == "compare":
            _add_compare(command)
        elif name != "validation":
            command.add_argument("job", nargs="?", default=".", type=Path, help="job folder (default: where you stand)")
        if name in ("check", "bars"):
            command.add_argument("--json", action="store_true", help="one JSON object on standard output")
        if name == "trace":
            command.add_argument("name", help="an entry id such as A-03/l_d, or a symbol")
        if name == "bars":
            command.add_argument("mark", help="the mark of a column in the schedule")
            command.add_argument("--limit", type=int, default=10, metavar="N", help="list at most N (default: 10)")
        if name == "lengths":
            for kind in ("csv", "xlsx"):
                default = f"draft/lengths.{kind}"
                told = f"write it to FILE of the job folder as {kind.upper()} (default: {default})"
                command.add_argument(f"--{kind}", nargs="?", const=default, metavar="FILE", help=told)
    return parser


def _add_compare(command: argparse.ArgumentParser) -> None:
    told = "a draft or issued folder, or a package.pdf or ledger.json"
    for name, what in (("old", "what it was"), ("new", "what it is now")):
        command.add_argument(name, metavar=name.upper(), type=Path, help=f"{what}: {told}")
    command.add_argument("--json", action="store_true", help="one JSON object on standard output")
    command.add_argument("--all", action="store_true", help="list every value, not the ten that moved most")
    command.epilog = (
        "Exit status: 0 compared, whether or not they differ; 1 a verdict is NG in NEW that was not in OLD; 2 bad "
        "input. Texts and figures that no value of the ledger holds are not compared."
    )


def _version() -> str:
    from calcpack.package.release import release

    return f"calcpack {release()}"


def _start(options: argparse.Namespace) -> int:
    from calcpack.job.starting import start

    made = start(options.job)
    print(f"made {options.job}:")
    for path in made:
        print(f"  {path}")
    print(f"next: fill in job.toml, then: calcpack draft {options.job}")
    return OK


def _check(options: argparse.Namespace) -> int:
    from calcpack.package.gate import open_items
    from calcpack.package.members import check_members
    from calcpack.package.reporting import check_json, check_text

    job = _job(options)
    checks = check_members(job)
    found = open_items(job, None, checks)
    if options.json:
        print(json.dumps(check_json(job, checks, found), indent=1, ensure_ascii=False, allow_nan=False))
    else:
        print(check_text(job, checks, found))
    return _status(job, found)


def _bars(options: argparse.Namespace) -> int:
    from calcpack.package.arranging import arrange, bars_json, bars_text

    job = _job(options)
    _progress()(f"looking through the bars of {options.mark}")
    arranged = arrange(job, options.mark, options.limit)
    if options.json:
        print(json.dumps(bars_json(job, arranged), indent=1, ensure_ascii=False, allow_nan=False))
    else:
        print(bars_text(job, arranged))
    return OK if arranged.found.found else NOT_OK


def _draft(options: argparse.Namespace) -> int:
    from calcpack.package.build import draft
    from calcpack.package.reporting import build_text

    job = _job(options)
    built, folder = draft(job, _progress())
    print(build_text(built, folder, "draft written"))
    return _status(job, built.open)


def _issue(options: argparse.Namespace) -> int:
    from calcpack.package.build import issue
    from calcpack.package.reporting import build_text

    job = _job(options)
    built, folder, written = issue(job, _progress())
    assert job.newest is not None
    what = (
        f"revision {job.newest.letter} issued"
        if written
        else f"revision {job.newest.letter} is issued already, unchanged"
    )
    print(build_text(built, folder, what))
    return _status(job, built.open)


def _trace(options: argparse.Namespace) -> int:
    from calcpack.package.build import ledger_of
    from calcpack.package.tracing import trace

    print(trace(ledger_of(_job(options), _progress()).ledger, options.name))
    return OK


def _compare(options: argparse.Namespace) -> int:
    from calcpack.package.compare import compare
    from calcpack.package.differences import compare_json, compare_text
    from calcpack.package.issued import read_pair

    old, new = read_pair(options.old, options.new)
    found = compare(old.ledger, new.ledger, old.sheets, new.sheets)
    if options.json:
        print(json.dumps(compare_json(found, old, new), indent=1, ensure_ascii=False, allow_nan=False))
    else:
        print(compare_text(found, old, new, options.all))
    return NOT_OK if found.failing else OK


def _lengths(options: argparse.Namespace) -> int:
    from calcpack.package import length_files

    job = _job(options)
    makers = {".csv": (options.csv, length_files.to_csv), ".xlsx": (options.xlsx, length_files.to_xlsx)}
    asked = [(suffix, name, make) for suffix, (name, make) in makers.items() if name is not None]
    targets = [length_files.target(job.root, name, suffix) for suffix, name, _ in asked]
    schedule = length_files.schedule_of(job)
    made = [make(schedule) for _, _, make in asked]
    for path, data in zip(targets, made, strict=True):
        length_files.write_file(path, data)
    print(length_files.to_text(schedule))
    for path in targets:
        print(f"written: {path}")
    return OK


def _validation(options: argparse.Namespace) -> int:
    from calcpack import validation

    del options
    print(validation.table())
    return OK if all(case.holds for case in validation.run()) else NOT_OK


def _status(job: Job, found: Sequence[Open]) -> int:
    from calcpack.package.gate import is_final

    final = job.newest is not None and is_final(job.newest.purpose)
    return NOT_OK if any(item.kind == "ratio" or (final and item.blocks) for item in found) else OK


def _job(options: argparse.Namespace) -> Job:
    from calcpack.job import load

    return load(options.job.absolute())


def _progress(stream: TextIO | None = None) -> Callable[[str], None]:
    """A printer of progress for a person at a terminal; silent in a pipe."""
    out = stream or sys.stderr
    if not out.isatty():
        return lambda _: None

    def say(text: str) -> None:
        """Print a line of progress."""
        print(f"  {text}", file=out, flush=True)

    return say


_COMMANDS: tuple[tuple[str, Callable[[argparse.Namespace], int], str], ...] = (
    ("start", _start, "make a job folder that already issues"),
    ("check", _check, "check the members of the schedules"),
    ("bars", _bars, "list arrangements of longitudinal bars that would satisfy every check of a column"),
    ("draft", _draft, "run the sheets and write the package as it stands to draft/"),
    ("issue", _issue, "issue the newest revision of job.toml to record/issued/"),
    ("lengths", _lengths, "print the development and lap schedule for the general notes, or write it as a table"),
    ("trace", _trace, "print where a value comes from and what it goes into"),
    ("compare", _compare, "compare two packages: values, verdicts and sheets added, dropped and changed"),
    ("validation", _validation, "run the published cases this release is validated against"),
)


if __name__ == "__main__":
    sys.exit(main())
