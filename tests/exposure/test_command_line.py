"""The command: exit codes, messages without tracebacks, and what each verb loads."""

import json
import os
import signal
import subprocess
import sys
import time
from pathlib import Path

import pytest

from exposure.command_line import VERBS, main
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


def test_an_interrupt_ends_with_code_130_and_a_word(tmp_path):
    """The site file is a pipe, so that the program is certainly waiting for it when it is interrupted."""
    pipe = tmp_path / "pipe.toml"
    os.mkfifo(pipe)
    command = [sys.executable, "-m", "exposure", "check", str(pipe)]
    job = subprocess.Popen(command, cwd=ROOT, stdout=subprocess.PIPE, stderr=subprocess.PIPE, text=True)

    writer = opened_once_read(pipe, job)
    job.send_signal(signal.SIGINT)
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
