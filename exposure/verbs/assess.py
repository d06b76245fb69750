"""``exposure assess SITE``: the whole job, and its files all at once or not at all."""

import os
import shutil
import tempfile
from contextlib import contextmanager
from dataclasses import asdict
from pathlib import Path

from exposure.antennas.trial import ModelError
from exposure.assessment.assess import assess
from exposure.errors import ExposureError
from exposure.outputs.figures import figures, write_drawings
from exposure.outputs.report import write_report
from exposure.outputs.result_file import read_result, write_geojson, write_result
from exposure.site.site_file import read_site
from exposure.verbs.screen import figures as digits
from exposure.verbs.screen import print_json, print_table, progress

EXIT_CODES = {"within limits": 0, "exceeds limits": 1, "cannot be decided": 3}
CAUTION = (
    "a calculation is no permission: local rules, the authority's current text and licensed or qualified "
    "persons come first; never work near an antenna that can transmit"
)
FILES = ("assessment.json", "boundaries.geojson", "report.pdf", "figures")


def run(arguments) -> int:
    """Assess, write the files, print the verdict; its exit code."""
    site = read_site(arguments.site)
    directory = Path(arguments.output or Path("results") / Path(arguments.site).stem)
    with _fresh(directory) as fresh:
        assessment = _assessment(site)
        _write(assessment, fresh)
        directory.mkdir(exist_ok=True)
        for name in FILES:
            _move(fresh / name, directory / name)
    if arguments.json:
        print_json(_summary(assessment, directory))
    else:
        _print(assessment, directory)
    return EXIT_CODES[assessment.verdict]


def _assessment(site):
    try:
        return assess(site, progress=progress)
    except ModelError as error:
        raise ExposureError(f"{site.file} cannot be modelled: {error}") from None


@contextmanager
def _fresh(directory: Path):
    """A new directory beside the one for results, made before the long work begins, gone afterwards."""
    if directory.exists() and not directory.is_dir():
        raise ExposureError(f"results go into a directory, but {directory} is a file")
    directory.parent.mkdir(parents=True, exist_ok=True)
    fresh = Path(tempfile.mkdtemp(prefix=f".{directory.name}-", dir=directory.parent))
    try:
        yield fresh
    finally:
        shutil.rmtree(fresh, ignore_errors=True)


def _write(assessment, directory: Path):
    """All files; drawings and report come from the result file, as ``exposure report`` makes them again."""
    write_result(assessment, directory / "assessment.json")
    assessment = read_result(directory / "assessment.json")
    if assessment.site.place_deg is not None:
        write_geojson(assessment, directory / "boundaries.geojson")
    drawings = figures(assessment)
    write_drawings(drawings, directory / "figures")
    write_report(assessment, directory / "report.pdf", drawings)


def _move(new: Path, old: Path):
    """Put a new file or directory in the place of the old one; an old one without a new one is stale."""
    if old.is_dir():
        shutil.rmtree(old)
    elif old.exists():
        old.unlink()
    if new.exists():
        os.replace(new, old)


def _print(assessment, directory: Path):
    print(f"{assessment.site.name}: {assessment.verdict.upper()}")
    for words in (*assessment.reasons, *assessment.conditions):
        print(f"  {words}")
    rows = [
        (area.name, result.limits, digits(result.exposure_ratio), _cause(result), result.verdict)
        for area in assessment.areas
        for result in area.results
    ]
    if rows:
        print()
        print_table(("area", "limits", "exposure ratio", "mostly from", "verdict"), rows)
    for caution in assessment.warnings:
        print(f"caution: {caution}")
    for thing in assessment.not_assessed:
        print(f"not assessed: {thing}")
    print(f"caution: {CAUTION}")
    print(f"written: {directory}/ ({', '.join(name for name in FILES if (directory / name).exists())})")


def _cause(result) -> str:
    return "-" if result.governing is None else result.governing.transmission


def _summary(assessment, directory: Path) -> dict:
    kept = ("verdict", "reasons", "conditions", "areas", "property", "warnings", "not_assessed")
    everything = asdict(assessment)
    return {"directory": str(directory), **{name: everything[name] for name in kept}}
