"""Prints the ratios of docs/performance.md; one BLAS thread, processor time, best of some runs."""

import subprocess
import sys
import tempfile
import time
from pathlib import Path

import numpy as np
from scipy.linalg import lapack
from threadpoolctl import threadpool_limits

import fieldsolver as fs
from fieldsolver.impedance_matrix import impedance_matrix
from fieldsolver.problem import problem
from fieldsolver.radiation import Elements, fields_of_elements
from tests.benchmarks.plain_fields import plain_fields

RUNS = 5
ROOT = Path(__file__).parents[2]
IMPORTS = "import numpy, scipy.linalg, shapely, matplotlib.figure, reportlab.platypus"


def best(work) -> float:
    """Least processor time of some runs. [s]"""
    times = []
    for _ in range(RUNS):
        start = time.process_time()
        work()
        times.append(time.process_time() - start)
    return min(times)


def wires(unknowns: int):
    """Wires of 49 unknowns in random directions, half a metre apart, at a wavelength of one metre."""
    random = np.random.default_rng(0)
    for i in range(unknowns // 49):
        direction = random.normal(size=3)
        start = np.array([i % 10 * 0.5, i // 10 * 0.5, 0.0])
        yield fs.Wire(start, start + 0.45 * direction / np.linalg.norm(direction), 1e-3)


def factorisation(unknowns: int) -> float:
    matrix = np.random.default_rng(1).normal(size=(unknowns, unknowns)) + 1j
    matrix = np.asfortranarray(matrix + matrix.T)
    return best(lambda: lapack.zsytrf(matrix, lower=1))


def fill(unknowns: int):
    case = problem(tuple(wires(unknowns)), (), 299_792_458.0, fs.FREE_SPACE, (), 110.0)
    return case.basis.shape[1], best(lambda: impedance_matrix(case))


def fields():
    random = np.random.default_rng(2)
    points, sources = random.uniform(0, 10, (2000, 3)), random.uniform(20, 30, (400, 3))
    moments = random.normal(size=(400, 3)) + 1j * random.normal(size=(400, 3))
    elements = Elements(sources, moments, moments, random.normal(size=400) + 0j)
    ours = best(lambda: fields_of_elements(2.0, points, elements))
    plain = best(lambda: plain_fields(2.0, points, elements))
    return len(points) * len(sources) / ours / 1e6, plain / ours


def half_space_table(frequency: float) -> float:
    """Real ground under a dipole and fields over a 60 m lot, minus the same from a filled table. [s]"""
    wavelength = 299_792_458.0 / frequency
    dipole = fs.Wire((-wavelength / 4, 0, 9.1), (wavelength / 4, 0, 9.1), 1e-3)
    random = np.random.default_rng(3)
    points = random.uniform([-30, -30, 0], [30, 30, 9], (400, 3))

    def work():
        currents = fs.solve([dipole], [fs.Feed(0)], frequency, fs.LossyGround(13, 0.005))
        fs.near_field(currents, points)
        return currents

    currents = work()
    return best(work) - best(lambda: fs.near_field(currents, points))


def processor_time(*arguments) -> float:
    """User and system time of a child process. [s]"""
    import resource

    before = resource.getrusage(resource.RUSAGE_CHILDREN)
    subprocess.run(arguments, check=False, cwd=ROOT, stdout=subprocess.DEVNULL, stderr=subprocess.DEVNULL)
    after = resource.getrusage(resource.RUSAGE_CHILDREN)
    return after.ru_utime + after.ru_stime - before.ru_utime - before.ru_stime


def assessment():
    imports = min(processor_time(sys.executable, "-c", IMPORTS) for _ in range(3))
    with tempfile.TemporaryDirectory() as folder:
        command = (
            sys.executable,
            "-m",
            "exposure.command_line",
            "assess",
            "sites/garden-dipole.toml",
            "-o",
            folder,
        )
        whole = min(processor_time(*command) for _ in range(3))
    return imports, whole


def main():
    with threadpool_limits(1):
        for unknowns in (1000, 2000):
            count, ours = fill(unknowns)
            reference = factorisation(count)
            print(f"fill / zsytrf at {count}: {ours / reference:.2f}   ({ours:.3f} s / {reference:.3f} s)")
        speed, ratio = fields()
        print(f"E and H: {speed:.1f} million pairs a second, {ratio:.1f} times the plain way")
        reference = factorisation(2000)
        for frequency in (1.9e6, 3.6e6, 14.2e6, 28.5e6):
            table = half_space_table(frequency)
            share = table / reference
            print(f"half-space table at {frequency / 1e6:g} MHz / zsytrf(2000): {share:.2f} ({table:.2f} s)")
    imports, whole = assessment()
    print(f"garden dipole / imports: {whole / imports:.2f}   ({whole:.1f} s / {imports:.1f} s)")


if __name__ == "__main__":
    main()
