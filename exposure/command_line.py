"""The command ``exposure VERB ...``: what may be asked, and the exit codes.

Each verb is a module of ``exposure.verbs``, imported when it is asked for, so that ``--help`` and
``limits`` start without numpy, scipy, matplotlib or reportlab.

Exit codes: 2 bad input, 130 interrupted, 70 internal fault; no result is written by these.  The others
are the verbs' own: assess 0 within limits, 1 exceeds, 3 cannot be decided; limits 3 outside a document.
"""

import argparse
import importlib
import os
import sys
from collections.abc import Callable
from dataclasses import dataclass

from exposure import __version__
from exposure.errors import ExposureError

BAD_INPUT, INTERNAL_FAULT, INTERRUPTED = 2, 70, 130
# matrices are small and products many: a second linear-algebra thread mostly waits, and costs as much again
ONE_THREAD = ("OPENBLAS_NUM_THREADS", "MKL_NUM_THREADS", "VECLIB_MAXIMUM_THREADS", "OMP_NUM_THREADS")
SHOW_FAULTS = "EXPOSURE_TRACEBACK"  # environment variable: internal faults show where they arose


@dataclass(frozen=True)
class Verb:
    """What it does in a line, its arguments, and the module whose ``run(arguments) -> exit code`` does it."""

    summary: str
    arguments: Callable[[argparse.ArgumentParser], None]
    module: str


def main(argv=None) -> int:
    """Run the command; the exit code comes back."""
    for name in ONE_THREAD:
        os.environ.setdefault(name, "1")
    arguments = _parser().parse_args(argv)
    try:
        return importlib.import_module(VERBS[arguments.verb].module).run(arguments)
    except ExposureError as error:
        return _stop(str(error), BAD_INPUT)
    except KeyboardInterrupt:
        return _stop("interrupted; no result was written", INTERRUPTED)
    except BrokenPipeError:
        os.dup2(os.open(os.devnull, os.O_WRONLY), sys.stdout.fileno())
        return 0
    except OSError as error:
        return _stop(f"{error.filename or 'a file'}: {error.strerror or error}", BAD_INPUT)
    except Exception as error:
        if os.environ.get(SHOW_FAULTS):
            raise
        text = " ".join(f"{type(error).__name__}: {error}".split())
        return _stop(f"internal fault, no result: {text} ({SHOW_FAULTS}=1 shows where)", INTERNAL_FAULT)


def _stop(message: str, code: int) -> int:
    print(f"exposure: {message}", file=sys.stderr)
    return code


def _parser() -> argparse.ArgumentParser:
    parser = argparse.ArgumentParser(
        prog="exposure",
        description="Radio-frequency exposure near antennas: from a site file to fields and a report.",
        epilog="exposure VERB --help tells more. docs/site-file.md describes the site file.",
    )
    parser.add_argument("--version", action="version", version=f"exposure {__version__}")
    verbs = parser.add_subparsers(dest="verb", metavar="VERB", required=True)
    for name, verb in VERBS.items():
        sub = verbs.add_parser(name, help=verb.summary, description=f"{verb.summary}.", allow_abbrev=False)
        verb.arguments(sub)
    return parser


# --- arguments -----------------------------------------------------------------------------------


def _site(parser):
    parser.add_argument("site", metavar="SITE", help="the site file (TOML)")


def _json(parser):
    parser.add_argument("--json", action="store_true", help="print JSON instead of words")


def _check(parser):
    _site(parser)
    _json(parser)


def _assess(parser):
    _site(parser)
    parser.add_argument(
        "-o", "--output", metavar="DIR", help="where results go (default: results/<name of the file>)"
    )
    _json(parser)


def _limits(parser):
    parser.add_argument("id", metavar="ID", help="limit set, such as us_fcc")
    parser.add_argument("frequency", metavar="FREQUENCY_MHZ", type=_positive, help="in megahertz")
    parser.add_argument("--population", choices=("general_public", "occupational"), help="only these levels")
    _json(parser)


def _report(parser):
    parser.add_argument("result", metavar="RESULT", help="an assessment.json")
    parser.add_argument(
        "-o", "--output", metavar="FILE", help="the PDF (default: report.pdf beside the result)"
    )


def _field(parser):
    _site(parser)
    where = parser.add_mutually_exclusive_group(required=True)
    where.add_argument(
        "--point", nargs=3, type=_number, metavar=("E", "N", "U"), help="east, north, up in metres"
    )
    where.add_argument("--points", metavar="FILE.csv", help="a table with columns east_m, north_m, up_m")
    _json(parser)


def _positive(text: str) -> float:
    value = _number(text)
    if value <= 0:
        raise argparse.ArgumentTypeError(f"must be more than 0; found {text}")
    return value


def _number(text: str) -> float:
    try:
        value = float(text)
    except ValueError:
        raise argparse.ArgumentTypeError(f"must be a number; found {text!r}") from None
    if value != value or value in (float("inf"), float("-inf")):
        raise argparse.ArgumentTypeError(f"must be a finite number; found {text}")
    return value


VERBS = {
    "check": Verb(
        "Read a site file and tell what was understood, or every problem in it",
        _check,
        "exposure.verbs.check",
    ),
    "assess": Verb(
        "Assess a station: verdict, result file, boundaries, figures and report",
        _assess,
        "exposure.verbs.assess",
    ),
    "limits": Verb(
        "Print every exposure limit of a document at a frequency", _limits, "exposure.verbs.limits"
    ),
    "report": Verb("Write the PDF report of a result file again", _report, "exposure.verbs.report"),
    "field": Verb("Print field strengths and exposure ratios at points", _field, "exposure.verbs.field"),
    "antennas": Verb(
        "List the kinds of antenna and their keys in a site file", _json, "exposure.verbs.antennas"
    ),
}

if __name__ == "__main__":
    sys.exit(main())
