"""The command: exit codes, messages without tracebacks, and what each verb loads."""

import json
import math
import os
import signal
import subprocess
import sys
import time
from pathlib import Path

import pytest

from exposure.command_line import VERBS, main
from exposure.site.site_file import read_site
from exposure.station.powers import powers
from exposure.station.sources import source
from tests.exposure.broken_cases import CASES, expected
from tests.exposure.stations import DRAWN, FENCE, STATION, VERTICAL, changed

ROOT = Path(__file__).parents[2]


@pytest.fixture
def lot(tmp_path):
    path = tmp_path / "lot.toml"
    path.write_text(STATION + VERTICAL + DRAWN + FENCE)
    return str(path)


def python(code: str, **more):
    return subprocess.run([sys.executable, "-c", code], cwd=ROOT, text=True, capture_output=True, **more)


def test_check_tells_what_was_understood(lot, capsys):
    code = main(["check", lot])

    told = capsys.readouterr().out
    assert code == 0
    assert "lot.toml: no problem found" in told
    for words in (
        "garden dipole",
        "14.2 MHz",
        "100 W peak envelope power",
        "duty factor 0.2",
        "bedroom",
        "fence",
    ):
        assert words in told


def test_check_tells_of_an_antenna_that_nothing_is_sent_on(lot, capsys):
    main(["check", lot])

    assert "caution: no transmission uses antenna 'vertical'" in capsys.readouterr().out


def test_check_speaks_json(lot, capsys):
    code = main(["check", lot, "--json"])

    told = json.loads(capsys.readouterr().out)
    assert code == 0
    assert [emission["frequency_hz"] for emission in told["transmissions"]] == [14.2e6]


@pytest.mark.parametrize("verb", ["check", "assess", "field"])
@pytest.mark.parametrize("text", CASES[::12])
def test_a_broken_site_file_ends_every_verb_with_code_2_and_its_problems(verb, text, tmp_path, capsys):
    path = tmp_path / "site.toml"
    path.write_text(text)
    more = ["--point", "0", "0", "1"] if verb == "field" else []

    code = main([verb, str(path), *more])

    told = capsys.readouterr()
    assert code == 2 and told.out == ""
    for line, key, _ in expected(text):
        assert f"line {line}, {key}: " in told.err


@pytest.mark.parametrize("text", CASES)
def test_no_broken_site_file_leaves_a_traceback(text, tmp_path, capsys):
    path = tmp_path / "site.toml"
    path.write_text(text)

    code = main(["check", str(path)])

    told = capsys.readouterr().err
    assert code == 2 and "Traceback" not in told and "internal fault" not in told


def test_a_missing_file_is_bad_input(tmp_path, capsys):
    assert main(["check", str(tmp_path / "absent.toml")]) == 2
    assert "absent.toml" in capsys.readouterr().err


@pytest.mark.parametrize(
    "line",
    [
        [],
        ["asess", "x"],
        ["limits", "us_fcc"],
        ["limits", "us_fcc", "0"],
        ["limits", "us_fcc", "nan"],
        ["limits", "us_fcc", "many"],
        ["field", "x"],
        ["field", "x", "--point", "1", "2", "up"],
        ["check", "x", "--jso"],
    ],
)
def test_a_line_that_is_not_understood_is_bad_input(line):
    with pytest.raises(SystemExit) as caught:
        main(line)

    assert caught.value.code == 2


@pytest.mark.parametrize("verb", VERBS)
def test_every_verb_explains_itself(verb, capsys):
    with pytest.raises(SystemExit) as caught:
        main([verb, "--help"])

    assert caught.value.code == 0
    assert VERBS[verb].summary in " ".join(capsys.readouterr().out.split())


def test_limits_are_printed_with_their_clause(capsys):
    """47 CFR 1.1310(e)(1), table 1: at 14.2 MHz 824/f = 58.03 V/m and 2.19/f = 0.1542 A/m for the public."""
    code = main(["limits", "us_fcc", "14.2", "--population", "general_public"])

    told = capsys.readouterr().out
    assert code == 0
    assert "58.03" in told and "0.1542" in told and "1.1310" in told and "30 min" in told


def test_limits_speak_json(capsys):
    code = main(["limits", "icnirp_2020", "14.2", "--json"])

    told = json.loads(capsys.readouterr().out)
    assert code == 0
    assert {level["population"] for level in told["levels"]} == {"general_public", "occupational"}


def test_limits_outside_a_document_are_not_extrapolated(capsys):
    """47 CFR 1.1310 begins at 300 kHz; 0.1 MHz is outside."""
    assert main(["limits", "us_fcc", "0.1"]) == 3
    assert "general_public" in capsys.readouterr().err


def test_an_unknown_limit_set_is_bad_input_with_the_nearest(capsys):
    assert main(["limits", "us_fc", "14.2"]) == 2
    assert "did you mean us_fcc?" in capsys.readouterr().err


def test_antennas_lists_every_kind_with_its_keys(capsys):
    code = main(["antennas"])

    told = capsys.readouterr().out
    assert code == 0
    for words in (
        'kind = "dipole"',
        'kind = "vertical"',
        'kind = "conductors"',
        "length_m or length_ft",
        "radials",
    ):
        assert words in told


def test_antennas_speaks_json(capsys):
    main(["antennas", "--json"])

    assert [kind["kind"] for kind in json.loads(capsys.readouterr().out)] == [
        "dipole",
        "vertical",
        "conductors",
    ]


LOADED = """
import sys
from exposure.command_line import main
try:
    main({})
except SystemExit:
    pass
print(*sys.modules, file=sys.stderr)
"""


@pytest.mark.parametrize(
    ("line", "absent"),
    [
        (["--help"], {"numpy", "scipy", "matplotlib", "reportlab", "shapely", "tomli", "exposure.antennas"}),
        (["assess", "--help"], {"numpy", "scipy", "matplotlib", "reportlab", "shapely", "exposure.antennas"}),
        (
            ["limits", "us_fcc", "14.2"],
            {"numpy", "scipy", "matplotlib", "reportlab", "shapely", "exposure.antennas"},
        ),
        (["check", "sites/garden-dipole.toml"], {"matplotlib", "reportlab"}),
        (["antennas"], {"matplotlib", "reportlab"}),
    ],
)
def test_a_small_job_loads_no_large_library(line, absent):
    """What starts fast must not load what it does not use (issue 2, point 1)."""
    loaded = set(python(LOADED.format(line)).stderr.split())

    assert "exposure.command_line" in loaded
    assert loaded & absent == set()


def test_the_package_gives_its_public_names_without_loading_them_first():
    """The names are those of design, section 6."""
    told = python(
        "import exposure, sys\n"
        "print(exposure.read_site.__name__, exposure.SiteFileError.__name__, 'matplotlib' in sys.modules)"
    )

    assert told.stdout.split() == ["read_site", "SiteFileError", "False"], told.stderr


def opened_once_read(pipe, job) -> int:
    """A pipe's writing end, opened as soon as the job waits at the other one."""
    while job.poll() is None:
        try:
            return os.open(pipe, os.O_WRONLY | os.O_NONBLOCK)
        except OSError:  # nobody reads yet
            time.sleep(0.01)
    raise AssertionError(job.communicate())


def _interrupted(job):
    """Interrupt until it ends: a signal between two instructions is seen only when a waiting read returns."""
    for _ in range(30):
        job.send_signal(signal.SIGINT)
        try:
            job.wait(timeout=2)
            return
        except subprocess.TimeoutExpired:
            continue


def test_an_interrupt_ends_with_code_130_and_a_word(tmp_path):
    """The site file is a pipe, so that the program is certainly waiting for it when it is interrupted."""
    pipe = tmp_path / "pipe.toml"
    os.mkfifo(pipe)
    command = [sys.executable, "-m", "exposure", "check", str(pipe)]
    job = subprocess.Popen(
        command,
        cwd=ROOT,
        stdout=subprocess.PIPE,
        stderr=subprocess.PIPE,
        text=True,
        preexec_fn=lambda: signal.signal(
            signal.SIGINT, signal.SIG_DFL
        ),  # a shell's background jobs ignore it
    )

    writer = opened_once_read(pipe, job)
    _interrupted(job)
    _, told = job.communicate(timeout=60)
    os.close(writer)

    assert job.returncode == 130
    assert "interrupted" in told and "Traceback" not in told


def test_an_internal_fault_ends_with_code_70_and_one_line(lot):
    """Made by taking away the place where answers go, which the program has no answer to."""
    code = (
        "import sys; sys.stdout.close()\n"
        f"from exposure.command_line import main\nsys.exit(main(['check', {lot!r}]))"
    )

    told = python(code)

    assert told.returncode == 70
    assert told.stderr.startswith("exposure: internal fault") and told.stderr.count("\n") == 1


def test_a_frequency_on_which_lengths_are_derived_is_said(tmp_path, capsys):
    path = tmp_path / "lot.toml"
    path.write_text(changed("length_m = 10.1\n", ""))

    main(["check", str(path)])

    assert "note: length 10.05 m derived" in capsys.readouterr().out


SMALL = changed('soil = "average"', 'kind = "perfect"').replace(
    "corners_m = [[18, -4], [26, -4], [26, 4], [18, 4]]\nbottom_m = 2.8\ntop_m = 4.8\n",
    "point_m = [18, 0, 3.8]\n",
)
SMALL = SMALL.replace("[property]\ncorners_m = [[-15, -20], [15, -20], [15, 20], [-15, 20]]\n", "")
VERDICTS = {
    # 100 W at 13 m from a wire end: a few V/m, the level is 58 V/m
    "within limits": (SMALL, 0),
    # a point 0.1 m below the wire
    "exceeds limits": (SMALL.replace("[18, 0, 3.8]", "[4.9, 0, 9.0]"), 1),
    # nobody is anywhere
    "cannot be decided": (SMALL[: SMALL.index("[[area]]")], 3),
}


@pytest.mark.parametrize("verdict", VERDICTS)
def test_assess_ends_with_the_code_of_its_verdict_and_writes_its_files(verdict, tmp_path, capsys):
    text, expected_code = VERDICTS[verdict]
    path, results = tmp_path / "lot.toml", tmp_path / "out" / "lot"
    path.write_text(text)

    code = main(["assess", str(path), "-o", str(results), "--json"])

    told = json.loads(capsys.readouterr().out)
    assert (code, told["verdict"]) == (expected_code, verdict)
    assert json.loads((results / "assessment.json").read_text())["verdict"] == verdict
    assert (results / "report.pdf").read_bytes().startswith(b"%PDF")
    assert sorted(entry.name for entry in results.iterdir()) == ["assessment.json", "figures", "report.pdf"]
    assert [entry.name for entry in results.parent.iterdir()] == ["lot"]


def test_assess_tells_before_the_long_work_that_its_place_is_a_file(tmp_path, capsys):
    path, results = tmp_path / "lot.toml", tmp_path / "taken"
    path.write_text(SMALL)
    results.write_text("mine")

    code = main(["assess", str(path), "-o", str(results)])

    assert code == 2 and "is a file" in capsys.readouterr().err
    assert results.read_text() == "mine"


def test_the_report_is_made_again_from_the_result_alone(tmp_path, capsys):
    path, results = tmp_path / "lot.toml", tmp_path / "lot"
    path.write_text(SMALL)
    main(["assess", str(path), "-o", str(results)])
    first = (results / "report.pdf").read_bytes()
    path.unlink()

    code = main(["report", str(results / "assessment.json")])

    assert code == 0
    assert (results / "report.pdf").read_bytes() == first


def test_a_field_at_a_point_is_that_of_the_solver(tmp_path, capsys):
    """The same currents asked directly, at 100 W less the credited line loss; equal to rounding, 1e-9."""
    path = tmp_path / "lot.toml"
    path.write_text(SMALL)
    site = read_site(path)
    sent = site.transmissions[0]
    accepted = powers(sent).accepted
    electric = math.sqrt(source(sent, site).squared_strengths([(18, 0, 3.8)])[0, 0] * accepted)

    code = main(["field", str(path), "--point", "18", "0", "3.8", "--json"])

    (told,) = json.loads(capsys.readouterr().out)
    assert code == 0
    assert told["fields"][0]["electric_v_per_m"] == pytest.approx(electric, rel=1e-9)
    assert {ratio["limits"] for ratio in told["ratios"]} == {"us_fcc", "icnirp_2020"}


def test_a_field_inside_a_conductor_is_unknown_with_its_reason(tmp_path, capsys):
    path = tmp_path / "lot.toml"
    path.write_text(SMALL)

    main(["field", str(path), "--point", "2", "0", "9.1", "--json"])

    (told,) = json.loads(capsys.readouterr().out)
    assert told["fields"][0]["electric_v_per_m"] is None
    assert "three radii" in told["reason"]


def test_a_point_below_the_ground_is_bad_input(tmp_path, capsys):
    path = tmp_path / "lot.toml"
    path.write_text(SMALL)

    assert main(["field", str(path), "--point", "2", "0", "-1"]) == 2
    assert "below the ground" in capsys.readouterr().err
