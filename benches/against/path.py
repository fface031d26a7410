"""Time per point of a path through bow-out against `solve_bvp`, at equal accuracy.

Both find the column's shape at the same shortenings, each from the points before. The error of
each is taken against a third method, shooting with an explicit Runge-Kutta rule of order 8: the
larger of the error of the sideways position at mid-height (share of the length) and of the load
(share of the largest).
"""

import statistics
import time

import numpy as np
from scipy.integrate import solve_bvp, solve_ivp

TOLERANCES = (1e-4, 1e-6, 1e-8, 1e-10)
ELEMENTS = (4, 6, 8, 10, 12, 14, 16, 20, 24, 28, 32)
FIRST_MESH = 11


class Column:
    """Reissner's equations of the clamped column, lengths in its length, forces in EI/L²."""

    def __init__(self, axial_compliance, shear_compliance, tilt):
        self.axial, self.shear, self.tilt = axial_compliance, shear_compliance, tilt

    def slopes(self, angle, fx, fy):
        """x', y', their derivatives by the angle, and by the force: xx, xy, yy."""
        s, c = np.sin(angle), np.cos(angle)
        n, q = fx * c + fy * s, fy * c - fx * s
        dx = (1 + n * self.axial) * c - q * self.shear * s
        dy = (1 + n * self.axial) * s + q * self.shear * c
        by_angle = (q * self.axial * c + n * self.shear * s - dy, q * self.axial * s - n * self.shear * c + dx)
        a, b = self.axial, self.shear
        return dx, dy, by_angle, (a * c * c + b * s * s, (a - b) * s * c, a * s * s + b * c * c)

    def ends(self, shortening):
        return lambda a, b, p: np.hstack([a[:3], b[0] - (1 - shortening), b[1], b[2] - self.tilt])


class Plain:
    """As one would write it: x, y, angle, moment; differences for the Jacobians; the shape found
    before as the guess, on an even mesh."""

    name, parameters = "plain", 2

    def __init__(self, column):
        self.column = column

    def first(self, x):
        return np.array([x, 0 * x, 0 * x, 0 * x])

    def guess(self, shortening, found):
        x = np.linspace(0, 1, FIRST_MESH)
        return x, found[-1][1].sol(x), found[-1][1].p

    def solve(self, shortening, guess, tolerance):
        def fun(_, u, p):
            dx, dy, *_ = self.column.slopes(u[2], *p)
            return np.array([dx, dy, u[3], dy * p[0] - dx * p[1]])

        x, y, p = guess
        ends = self.column.ends(shortening)
        return solve_bvp(fun, ends, x, y, p=p, tol=tolerance, max_nodes=100_000)


class Helped(Plain):
    """With all help found: the moment integrated by hand, so that three functions are left;
    Jacobians by hand; the guess extrapolated from two shapes, on the last mesh."""

    name, parameters = "helped", 3

    def first(self, x):
        return np.array([x, 0 * x, 0 * x])

    def guess(self, shortening, found):
        (d1, one) = found[-1]
        if len(found) < 2:
            return one.x, one.y, one.p
        (d0, zero) = found[-2]
        w = (shortening - d1) / (d1 - d0)
        return one.x, one.y + w * (one.y - zero.sol(one.x)), one.p + w * (one.p - zero.p)

    def solve(self, shortening, guess, tolerance):
        def fun(_, u, p):
            dx, dy, *_ = self.column.slopes(u[2], p[0], p[1])
            return np.array([dx, dy, p[2] + u[1] * p[0] - u[0] * p[1]])

        def jacobian(_, u, p):
            *_, by_angle, (xx, xy, yy) = self.column.slopes(u[2], p[0], p[1])
            of_u, of_p = np.zeros((2, 3, 3, u.shape[1]))
            of_u[0, 2], of_u[1, 2] = by_angle
            of_u[2, 0], of_u[2, 1] = -p[1], p[0]
            of_p[0, 0], of_p[0, 1], of_p[1, 0], of_p[1, 1] = xx, xy, xy, yy
            of_p[2, 0], of_p[2, 1], of_p[2, 2] = u[1], -u[0], 1
            return of_u, of_p

        bottom, top, none = np.eye(6, 3), np.eye(6, 3, -3), np.zeros((6, 3))
        x, y, p = guess
        return solve_bvp(
            fun,
            self.column.ends(shortening),
            x,
            y,
            p=p,
            tol=tolerance,
            fun_jac=jacobian,
            bc_jac=lambda a, b, p: (bottom, top, none),
            max_nodes=100_000,
        )


def judge(column, point):
    """Load and sideways position at mid-height by shooting, at the shortening of `point`."""
    at = np.array([0.5, 1.0])

    def shoot(p):
        def fun(_, u):
            dx, dy, *_ = column.slopes(u[2], p[0], p[1])
            return [dx, dy, p[2] + u[1] * p[0] - u[0] * p[1]]

        return solve_ivp(fun, (0, 1), [0, 0, 0], "DOP853", rtol=1e-12, atol=1e-14, t_eval=at).y

    def miss(p):
        return shoot(p)[:, -1] - [1 - point["shortening"], 0, column.tilt]

    p = np.array([*point["force"], point["moment"]])
    for _ in range(6):
        wrong = miss(p)
        steps = 1e-6 * np.maximum(1, np.abs(p))
        slopes = [(miss(p + h * e) - wrong) / h for h, e in zip(steps, np.eye(3))]
        change = np.linalg.solve(np.transpose(slopes), -wrong)
        p = p + change
        if np.abs(change).max() < 1e-9:
            return p[0], shoot(p)[1, 0]
    raise SystemExit("the judge did not converge")


def error(found, right):
    """Larger of the two errors over all points; each a list of (load, sideways)."""
    found, right = np.array(found), np.array(right)
    return (np.abs(found - right).max(axis=0) / [np.abs(right[:, 0]).max(), 1]).max()


def follow(form, shortenings, tolerance):
    """Seconds per point in solve_bvp alone, and (load, sideways at mid-height) of each point."""
    found, seconds = [], 0.0
    for shortening in shortenings:
        x = np.linspace(0, 1, FIRST_MESH)
        guess = form.guess(shortening, found) if found else (x, form.first(x), np.zeros(form.parameters))
        begin = time.perf_counter()
        solution = form.solve(shortening, guess, tolerance)
        seconds += time.perf_counter() - begin
        if solution.status != 0:
            raise SystemExit(f"solve_bvp: {solution.message}")
        found.append((shortening, solution))
    return seconds / len(found), [(s.p[0], s.sol(0.5)[1]) for _, s in found]


def compare(peer, rounds):
    runs = [peer("path", *ELEMENTS)]
    column = Column(**runs[0][0]["column"])
    errors, truth = {}, None
    for run in runs[0]:
        truth = [judge(column, point) for point in run["points"]]
        ours = [(point["force"][0], point["aside_middle"]) for point in run["points"]]
        errors[run["elements"]] = error(ours, truth)
    # The finest comes last: its points are those that solve_bvp is asked for.
    points = runs[0][-1]["points"]
    shortenings = [point["shortening"] for point in points]
    print(f"\nPath of {len(points)} points to shortening {shortenings[-1]:.3f} L,", end=" ")
    print(f"sideways {abs(points[-1]['aside_middle']):.3f} L; time per point")
    print("  solve_bvp    tol    error       time | ours: elements  error       time |  ratio")
    forms = [Plain(column), Helped(column)]
    theirs = {(form.name, tol): [] for form in forms for tol in TOLERANCES}
    for _ in range(rounds):
        for form in forms:
            for tolerance in TOLERANCES:
                theirs[form.name, tolerance].append(follow(form, shortenings, tolerance))
        runs.append(peer("path", *ELEMENTS))
    for (name, tolerance), passes in theirs.items():
        its_error = error(passes[0][1], truth)
        enough = [n for n in ELEMENTS if errors[n] <= its_error]
        if not enough:
            print(f"  {name:9} {tolerance:7.0e}  {its_error:7.1e}: none of our meshes is as good")
            continue
        place = ELEMENTS.index(enough[0])
        mine = [run[place]["seconds_per_point"] for run in runs[1:]]
        its = [seconds for seconds, _ in passes]
        ratio = statistics.median(b / a for a, b in zip(mine, its))
        print(
            f"  {name:9} {tolerance:7.0e}  {its_error:7.1e} {statistics.median(its) * 1e3:7.2f} ms"
            f" | {enough[0]:14}  {errors[enough[0]]:7.1e} {statistics.median(mine) * 1e6:7.1f} us"
            f" | {ratio:6.0f}"
        )
    for form in forms:
        print(f"  {form.name}: {' '.join(form.__doc__.split())}")
