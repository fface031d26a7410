"""A whole Newton step against LAPACK's general banded solve of the same linear systems."""

import ctypes
import statistics
import time

import numpy as np
import scipy.linalg.cython_lapack as cython_lapack

CALLS = 1500


def dgbsv_routine():
    """LAPACK's dgbsv itself, from SciPy's table of low-level routines, as a ctypes function."""
    capsule = cython_lapack.__pyx_capi__["dgbsv"]
    api = ctypes.pythonapi
    api.PyCapsule_GetName.restype = ctypes.c_char_p
    api.PyCapsule_GetName.argtypes = [ctypes.py_object]
    api.PyCapsule_GetPointer.restype = ctypes.c_void_p
    api.PyCapsule_GetPointer.argtypes = [ctypes.py_object, ctypes.c_char_p]
    address = api.PyCapsule_GetPointer(capsule, api.PyCapsule_GetName(capsule))
    return ctypes.CFUNCTYPE(None, *[ctypes.c_void_p] * 10)(address)


class Banded:
    """A banded system in LAPACK's storage, to be solved again and again in place."""

    def __init__(self, matrix, right):
        size = len(right)
        rows, columns = np.nonzero(matrix)
        self.width = int(np.abs(rows - columns).max())
        self.stored = np.zeros((3 * self.width + 1, size), order="F")
        for row, column in zip(rows, columns):
            self.stored[2 * self.width + row - column, column] = matrix[row, column]
        self.right = right
        self.band, self.answer = self.stored.copy(order="F"), right.copy()
        pivots = np.zeros(size, np.int32)
        numbers = [size, self.width, self.width, 1, 3 * self.width + 1, size, 0]
        self.kept = (pivots, [ctypes.c_int(n) for n in numbers])
        n, lower, upper, columns, rows, rows_right, self.info = self.kept[1]
        at = ctypes.addressof
        self.arguments = (at(n), at(lower), at(upper), at(columns), self.band.ctypes.data, at(rows))
        self.arguments += (pivots.ctypes.data, self.answer.ctypes.data, at(rows_right), at(self.info))

    def seconds(self, routine):
        """Median time of a call; the matrix is copied back outside the time, and is in cache."""
        times = []
        for _ in range(CALLS):
            np.copyto(self.band, self.stored)
            np.copyto(self.answer, self.right)
            begin = time.perf_counter_ns()
            routine(*self.arguments)
            times.append(time.perf_counter_ns() - begin)
        if self.info.value != 0:
            raise SystemExit(f"dgbsv reported {self.info.value}")
        return statistics.median(times) * 1e-9


def compare(peer, directory, rounds):
    routine = dgbsv_routine()
    nothing = Banded(np.ones((1, 1)), np.ones(1))
    ours, systems, times = [], {}, {}
    for turn in range(rounds):
        ours.append(peer("step", directory)[0])
        overhead = nothing.seconds(routine)
        for name in ("uncondensed", "condensed"):
            if turn == 0:
                systems[name] = load(directory, name)
            taken = systems[name].seconds(routine) - overhead
            times.setdefault(name, []).append(taken)
    step = statistics.median(o["whole_step_s"] for o in ours)
    print(f"\nNewton step, {ours[0]['elements']} elements, past bow-out")
    print(f"  ours, whole step         {step * 1e6:8.1f} us")
    for part in ("assemble", "factor", "solve"):
        print(f"    {part:8}               {statistics.median(o[part + '_s'] for o in ours) * 1e6:8.1f} us")
    print(f"  a call's own overhead    {overhead * 1e6:8.1f} us, taken off below")
    for name, system in systems.items():
        ratio = statistics.median(t / o["whole_step_s"] for t, o in zip(times[name], ours))
        print(
            f"  bare dgbsv, {name:12} {statistics.median(times[name]) * 1e6:8.1f} us"
            f" = {ratio:.2f} of our whole step; {len(system.right)} rows, {system.width} bands a side"
        )


def load(directory, name):
    """The system as handed over, after checking that both solve it alike."""
    read = lambda what: np.fromfile(directory / f"{what}.f64")
    right, expected = read(f"{name}_right"), read(f"{name}_answer")
    matrix = read(name).reshape(len(right), len(right)).T
    system = Banded(matrix, right)
    system.seconds(dgbsv_routine())
    for who, x in (("dgbsv", system.answer), ("ours", expected)):
        residual = np.abs(matrix @ x - right).max() / (np.abs(matrix).max() * np.abs(x).max())
        print(f"  {name}: residual of {who:5} {residual:.1e} of |A||x|")
        if residual > 1e-13:
            raise SystemExit("that is not the same problem")
    apart = np.abs(system.answer - expected).max() / np.abs(expected).max()
    print(f"  {name}: answers differ by {apart:.1e}")
    if apart > 1e-8:
        raise SystemExit("that is not the same problem")
    return system
