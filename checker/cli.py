"""The command `linelist`: one short function a command."""

from __future__ import annotations

import sys
import threading
from collections.abc import Callable, Iterator
from contextlib import contextmanager
from pathlib import Path
from typing import Any

import click

from checker import __version__
from checker.errors import LineListError

__all__ = ["main"]

PATH = click.Path(path_type=Path)
CONTEXT = {"help_option_names": ["-h", "--help"], "max_content_width": 100}
FAULT_STATUS = 3
REFUSED_STATUS = 2
STOPPED_STATUS = 130
SLOW_AFTER = 2.0
MOST_CASES_EXPLAINED = 5_000
GATE_STATUS = {"no comments": 0, "comments": 0, "revise and resubmit": 1, "incomplete": 1}


class _Commands(click.Group):
    """A group in which every refusal is a sentence and an exit status, never a traceback."""

    def invoke(self, ctx: click.Context) -> Any:
        try:
            return super().invoke(ctx)
        except LineListError as error:
            for problem in error.problems:
                click.echo(f"linelist: {_harmless(str(problem))}", err=True)
            ctx.exit(error.status)
        except (click.ClickException, click.exceptions.Exit):
            raise
        except (click.Abort, KeyboardInterrupt):
            click.echo("linelist: stopped; no file was left half-written.", err=True)
            ctx.exit(STOPPED_STATUS)
        except BrokenPipeError:
            ctx.exit(0)
        except OSError as error:
            click.echo(f"linelist: {_harmless(str(error))}. Free the place it names, or name another.", err=True)
            ctx.exit(REFUSED_STATUS)
        except Exception as error:
            sentence = f"linelist: a fault in the tool: {type(error).__name__}: {_harmless(str(error))}"
            click.echo(
                f"{sentence}\nNothing was judged by this run. Please report it with the list's header row.", err=True
            )
            ctx.exit(FAULT_STATUS)


def _harmless(text: str) -> str:
    """Show control characters of a cell as text, so that none reaches a terminal."""
    return "".join(
        mark if mark.isprintable() or mark == "\n" else mark.encode("unicode_escape").decode() for mark in text
    )


def _progress(quiet: bool) -> Callable[[str], None]:
    def say(sentence: str) -> None:
        if not quiet:
            click.echo(f"... {sentence}", err=True)

    return say


def _inputs(command: Callable[..., None]) -> Callable[..., None]:
    """Add the options that every command on a list shares."""
    options = (
        click.option("--criteria", type=PATH, help="Criteria file (TOML). Without one: the bundled default criteria."),
        click.option("--classes", type=PATH, help="Class file (CSV): schedule, wall and material by class and size."),
        click.option("--deviations", type=PATH, help="Approved deviations (CSV)."),
        click.option("--rules", type=PATH, help="Folder of further rule modules."),
        click.option("--sheet", metavar="NAME", help="Sheet of a workbook. Without it: the one like a line list."),
        click.option("--quiet", is_flag=True, help="Say nothing but the answer."),
    )
    for option in reversed(options):
        command = option(command)
    return click.argument("line_list", metavar="LIST", type=PATH)(command)


def _drawing_lines(command: Callable[..., None]) -> Callable[..., None]:
    """Add the option that holds the list against the drawings."""
    return click.option(
        "--drawing-lines",
        metavar="FILE",
        type=PATH,
        help="Lines on the drawings, a number a row: is the list complete?",
    )(command)


def _spare_the_inputs(targets: list[Path], line_list: Path, options: dict[str, Any]) -> None:
    """Refuse, before anything is computed, an output that would stand where an input stands.

    Raises
    ------
    InputError
        If a target is one of the inputs.
    """
    from checker.errors import InputError, Problem

    given = [line_list, *(path for path in options.values() if isinstance(path, Path))]
    inputs = {path.resolve() for path in given}
    for target in targets:
        if target.resolve() in inputs:
            remedy = "Name another place to write to: inputs are never touched."
            raise InputError(Problem("is an input of this run and would be written over.", str(target), remedy))


def _reviewed(line_list: Path, options: dict[str, Any], say: Callable[[str], None]) -> Any:
    from checker.review import review

    say(f"reading and checking {_harmless(line_list.name)}")
    return review(line_list, **options)


@contextmanager
def _progress_if_slow(quiet: bool) -> Iterator[Callable[[str], None]]:
    """Give what to say progress with: its last sentence is said once the work has lasted for two seconds."""
    sentences: list[str] = []
    timer = threading.Timer(SLOW_AFTER, lambda: [_progress(quiet)(sentence) for sentence in sentences[-1:]])
    timer.daemon = True
    timer.start()
    try:
        yield sentences.append
    finally:
        timer.cancel()


@click.group(cls=_Commands, context_settings=CONTEXT)
@click.version_option(__version__, prog_name="linelist")
def main() -> None:
    """Check a contractor's piping line list: hydraulics, criteria, outcomes, exception report.

    \b
    Example:
      linelist review list.csv --criteria criteria.toml --classes classes.csv

    A screening check. It does not replace the codes in force, hazard studies and the judgement of a
    licensed engineer; local codes prevail.
    """


@main.command()
@_inputs
@_drawing_lines
@click.option("--out", type=PATH, help="Folder for the files. Without it: review/ beside the list.")
def review(line_list: Path, out: Path | None, quiet: bool, **options: Any) -> None:
    """Read LIST, compute, check, and write the report.

    LIST is a CSV, TSV, semicolon or pipe text, or a workbook (XLSX, XLSM, XLS, ODS).

    \b
    Example:
      linelist review list.xlsx --sheet "Line list" --criteria criteria.toml --classes classes.csv
    """
    from checker.report.atomic import check_places
    from checker.report.terminal import summary
    from checker.report.write import OUTPUT_NAMES, write_report
    from checker.review import require_no_fault

    say = _progress(quiet)
    folder = out or line_list.parent / "review"
    _spare_the_inputs([folder / name for name in OUTPUT_NAMES], line_list, options)
    check_places(folder, OUTPUT_NAMES)
    done = _reviewed(line_list, options, say)
    files = write_report(done, folder, progress=say)
    click.echo(summary(done, files))
    require_no_fault(done)


@main.command()
@_inputs
@_drawing_lines
@click.option("--json", "json_file", type=PATH, help="Also write outcomes.json to this file.")
def gate(line_list: Path, json_file: Path | None, quiet: bool, **options: Any) -> None:
    """Check LIST for CI: no report, the exit status is the answer.

    \b
    0  no comments, or comments
    1  revise and resubmit, or incomplete
    2  the input or the call cannot be used
    3  a fault in the tool or in a rule

    \b
    Example:
      linelist gate list.csv --criteria criteria.toml --classes classes.csv --json outcomes.json
    """
    from checker.review import require_no_fault

    if json_file is not None:
        from checker.report.atomic import check_places

        _spare_the_inputs([json_file], line_list, options)
        check_places(json_file.parent, (json_file.name,))
    with _progress_if_slow(quiet) as say:
        done = _reviewed(line_list, options, say)
    if json_file is not None:
        from checker.report.atomic import write_text
        from checker.report.json_file import outcomes_json

        write_text(json_file, outcomes_json(done))
    click.echo(f"{done.coverage_text}\n{done.recommendation_text}")
    if not quiet:
        click.echo("\n".join(f"  {_harmless(reason)}" for reason in (*done.reasons, *_commonest_gaps(done))))
    require_no_fault(done)
    sys.exit(GATE_STATUS[done.recommendation])


def _commonest_gaps(done: Any) -> list[str]:
    """Return the three commonest reasons for `not checked`; a long list leaves them to `review`."""
    if done.line_cases > MOST_CASES_EXPLAINED:
        return []
    return [f"not checked {group.count} times: {group.rule}: {group.example}" for group in done.not_checked_groups[:3]]


@main.command()
@_inputs
@click.argument("line_number", metavar="LINE")
def calculation(line_list: Path, line_number: str, quiet: bool, **options: Any) -> None:
    """Print the calculation sheet of one LINE of LIST.

    \b
    Example:
      linelist calculation list.csv '6"-CWS-1203-B1A' --classes classes.csv
    """
    from checker.report.calculation_sheet import calculation_sheet
    from checker.review import require_no_fault

    with _progress_if_slow(quiet) as say:
        done = _reviewed(line_list, options, say)
    click.echo(calculation_sheet(done, line_number))
    require_no_fault(done)


@main.command()
@click.argument("rule_id", metavar="[ID]", required=False)
@click.option("--rules", "folder", type=PATH, help="Folder of further rule modules.")
def rules(rule_id: str | None, folder: Path | None) -> None:
    """List every rule, or print one in full.

    \b
    Example:
      linelist rules npsh-margin
    """
    from checker.evaluation import known_fields
    from checker.report.catalogue_text import all_rules_text, one_rule_text
    from checker.ruling.catalogue import load_rules

    found = load_rules(known_fields=known_fields(), folder=folder)
    click.echo(all_rules_text(found) if rule_id is None else one_rule_text(found, rule_id))


@main.command()
@click.argument("name", metavar="[NAME]", required=False)
def fields(name: str | None) -> None:
    """List every field of a list: meaning, units, header spellings; or one NAME in full.

    \b
    Example:
      linelist fields flow_mass
    """
    from checker.report.catalogue_text import fields_text, one_field_text

    click.echo(fields_text() if name is None else one_field_text(name))


@main.command()
@click.argument("folder", metavar="DIR", type=PATH)
def template(folder: Path) -> None:
    """Write a blank list (CSV and XLSX), criteria, class, equipment and deviations files into DIR.

    Files that are there already are left alone, and named.

    \b
    Example:
      linelist template new_project/
    """
    from checker.report.templates_out import write_templates

    for sentence in write_templates(folder):
        click.echo(_harmless(sentence))


if __name__ == "__main__":
    main()
