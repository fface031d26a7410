"""Our solver against SciPy and LAPACK, on the same problem and in the same run.

    python3 benches/against_scipy.py

Needs Python 3.10 or later with `venv`, and cargo. Makes a virtual environment in `.venv`, installs
numpy, scipy and threadpoolctl there, builds the bench program `peer`, and prints

1. time per point of a path through bow-out against `scipy.integrate.solve_bvp` at equal accuracy;
2. a whole Newton step of 64 elements against LAPACK's `dgbsv` of the same linear systems.

Times are medians, ratios medians of the ratios of interleaved rounds: on a busy machine trust the
ratios. One thread everywhere.
"""

import json
import os
import pathlib
import subprocess
import sys
import tempfile
import venv

ROOT = pathlib.Path(__file__).resolve().parent.parent
ROUNDS = 5


def prepare():
    """Makes the virtual environment and runs this file again inside it."""
    home = ROOT / ".venv"
    python = home / ("Scripts/python.exe" if os.name == "nt" else "bin/python")
    if not python.exists():
        venv.create(home, with_pip=True)
    packages = ["numpy", "scipy", "threadpoolctl"]
    subprocess.run([python, "-m", "pip", "install", "--quiet", *packages], check=True)
    environment = dict(os.environ, OPENBLAS_NUM_THREADS="1", AGAINST_SCIPY_INSIDE="1")
    # Settings for old OpenBLAS builds that some machines carry; they slow a current one down.
    for name in ("OPENBLAS_CORETYPE", "OPENBLAS_L2_SIZE"):
        environment.pop(name, None)
    sys.exit(subprocess.run([python, __file__], env=environment).returncode)


def build():
    """Builds the bench program; returns where it is."""
    command = ["cargo", "bench", "--no-run", "--bench", "peer", "--message-format", "json"]
    built = subprocess.run(command, cwd=ROOT, check=True, stdout=subprocess.PIPE, text=True)
    for line in built.stdout.splitlines():
        message = json.loads(line)
        if message.get("target", {}).get("name") == "peer" and message.get("executable"):
            return message["executable"]
    raise SystemExit("cargo did not say where it put the bench program")


def run(program, *arguments):
    """Lines of the bench program's output, as data."""
    out = subprocess.run([program, *map(str, arguments)], check=True, stdout=subprocess.PIPE, text=True)
    return [json.loads(line) for line in out.stdout.splitlines()]


def main():
    sys.path.insert(0, str(pathlib.Path(__file__).parent))
    from against import banded, path

    program = build()
    report_libraries()
    path.compare(lambda *a: run(program, *a), ROUNDS)
    with tempfile.TemporaryDirectory() as directory:
        banded.compare(lambda *a: run(program, *a), pathlib.Path(directory), ROUNDS)


def report_libraries():
    import numpy
    import scipy
    import scipy.linalg  # noqa: F401  so that its library is loaded and listed
    import threadpoolctl

    print(f"numpy {numpy.__version__}, scipy {scipy.__version__}, Python {sys.version.split()[0]}")
    for library in threadpoolctl.threadpool_info():
        print(
            f"  {library['internal_api']} {library['version']}, kernel "
            f"{library.get('architecture')}, threads {library['num_threads']}"
        )


if __name__ == "__main__":
    if os.environ.get("AGAINST_SCIPY_INSIDE"):
        main()
    else:
        prepare()
