"""The command line: check a design file, issue a notebook, look up sections."""

from __future__ import annotations

import argparse
import json
import sys
from collections.abc import Sequence
from typing import Any

from tensionlib.errors import TensionlibError
from tensionlib.version import __version__

PASSES, FAILS, BAD_INPUT = 0, 1, 2

_CHECK = """examples:
  tensionlib check canopy.toml
  tensionlib check canopy.toml --json > results.json

exit code: 0 every member passes, 1 a check fails or is not covered, 2 bad input"""

_ISSUE = """examples:
  tensionlib issue canopy-package.ipynb
  tensionlib issue canopy-package.ipynb --output issued/canopy-B.pdf --paper Letter

The notebook is executed from top to bottom in a fresh kernel; the PDF is written beside it, whole
or not at all. exit code: 0 written, 1 a member does not pass, 2 bad input or a failing cell"""

_SECTIONS = """examples:
  tensionlib sections "150x90x10 UA"
  tensionlib sections --family UA --min-area "1500 mm2"
  tensionlib sections --family EA --leg "100 mm" --most 5"""


def main(arguments: Sequence[str] | None = None) -> int:
    """Run the command line; gives the exit code."""
    args = _parser().parse_args(arguments)
    try:
        code: int = args.run(args)
        return code
    except TensionlibError as error:
        print(f"tensionlib: {error}", file=sys.stderr)
        return BAD_INPUT
    except BrokenPipeError:
        return PASSES


def _parser() -> argparse.ArgumentParser:
    parser = argparse.ArgumentParser(
        prog="tensionlib",
        description="Design steel tension members and their end connections, every step shown.",
    )
    parser.add_argument("--version", action="version", version=f"tensionlib {__version__}")
    commands = parser.add_subparsers(required=True, metavar="COMMAND")

    check = _command(commands, "check", "check every member of a design file", _CHECK)
    check.add_argument("file", help="design file (TOML); its schedule is read with it")
    check.add_argument("--json", action="store_true", help="print the results as JSON")
    check.add_argument(
        "--good-rows",
        action="store_true",
        help="report the members that can be designed even when others cannot",
    )
    check.set_defaults(run=_check)

    issue = _command(commands, "issue", "execute a notebook and write its package", _ISSUE)
    issue.add_argument("notebook", help="notebook (.ipynb)")
    issue.add_argument("--output", help="the PDF to write; beside the notebook unless given")
    issue.add_argument("--paper", choices=("A4", "Letter"), help="the design file's unless given")
    issue.add_argument(
        "--allow-failing", action="store_true", help="issue even when a member does not pass"
    )
    issue.add_argument("--quiet", action="store_true", help="no progress bar")
    issue.set_defaults(run=_issue)

    sections = _command(commands, "sections", "look up sections", _SECTIONS)
    sections.add_argument("designation", nargs="?", help="one section by its designation")
    sections.add_argument("--family", help="EA, UA, PFC, UB, UC, BT, CT, FL, RB, CHS, SHS, RHS")
    sections.add_argument("--min-area", help='least area, for example "1500 mm2"')
    sections.add_argument("--leg", help='a leg of this length, for example "100 mm"')
    sections.add_argument("--most", type=int, default=20, help="rows to print (20)")
    sections.set_defaults(run=_sections)
    return parser


def _command(commands: Any, name: str, does: str, examples: str) -> argparse.ArgumentParser:
    parser: argparse.ArgumentParser = commands.add_parser(
        name,
        help=does,
        description=does[0].upper() + does[1:] + ".",
        epilog=examples,
        formatter_class=argparse.RawDescriptionHelpFormatter,
    )
    return parser


def _check(args: argparse.Namespace) -> int:
    from tensionlib.package.project import check_file

    checked = check_file(args.file, strict=not args.good_rows)
    if args.json:
        print(json.dumps(results(checked), indent=2, ensure_ascii=False, allow_nan=False))
    else:
        print(checked.text())
    bad = [str(problem) for problem in checked.problems]
    bad += [f"{origin}: {reason}" for origin, reason in checked.failures]
    for line in bad:
        print(f"tensionlib: {line}", file=sys.stderr)
    if bad:
        return BAD_INPUT
    return PASSES if checked.passes else FAILS


def results(checked: Any) -> dict[str, Any]:
    """What ``check --json`` prints: members with checks, governing check, values and verdict."""
    kept = ("part", "name", "clause", "demand", "capacity", "unit", "utilisation", "verdict")
    members = []
    for calc in checked:
        record = calc.record()
        governing = record["verdict"]["governing"]
        members.append(
            {
                "mark": record["mark"],
                "standard": record["standard"]["name"],
                "checks": [{name: check[name] for name in kept} for check in record["checks"]],
                "governing": governing["name"] if governing else None,
                "governing_part": governing["part"] if governing else None,
                "verdict": record["verdict"]["word"],
                "values": record["values"],
            }
        )
    return {"members": members}


def _issue(args: argparse.Namespace) -> int:
    from tensionlib.package.issue import NotPassingError, issue

    try:
        written = issue(
            args.notebook,
            output=args.output,
            paper=args.paper,
            progress=not args.quiet,
            allow_failing=args.allow_failing,
        )
    except NotPassingError as error:
        print(f"tensionlib: {error}", file=sys.stderr)
        return FAILS
    print(written)
    return PASSES


def _sections(args: argparse.Namespace) -> int:
    from tensionlib.quantities import AREA, LENGTH, door
    from tensionlib.steel import find, section

    if args.designation:
        found = [section(args.designation)]
    else:
        found = find(
            family=args.family,
            A_min=door("--min-area", args.min_area, AREA) if args.min_area else None,
            leg=door("--leg", args.leg, LENGTH) if args.leg else None,
        )
    print(f"{'section':<20}{'A, mm²':>10}{'mass, kg/m':>12}{'r_min, mm':>11}  source")
    for row in found[: args.most]:
        r_min = f"{row.r_min:11.1f}" if row.r_min is not None else f"{'':>11}"
        print(f"{row.designation:<20}{row.A:10.0f}{row.mass:12.1f}{r_min}  {row.source}")
    if len(found) > args.most:
        print(f"… {len(found) - args.most} more; raise --most to see them")
    if not found:
        print("no section fits; widen the search")
    return PASSES


if __name__ == "__main__":
    raise SystemExit(main())
