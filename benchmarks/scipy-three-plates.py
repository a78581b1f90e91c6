"""Three-plate unitaries by multi-start least squares, for a ratio against the solver.

Reads a JSON list of {target: {w, x, y, z}, retardancesRad: [..], settings: [[..], ..]} on stdin. Each problem is solved from
seeded random starts until every one of `settings` is found (angles mod 180 degrees), which is kinder than a real search: that
would not know when to stop. Prints {secondsEach, startsEach, complete} as JSON.
"""

import json
import math
import random
import sys
import time

from scipy.optimize import least_squares

MOST_STARTS = 2000
SAME = 1e-5


def residual_of(problem):
    halves = [(math.cos(d / 2), math.sin(d / 2)) for d in problem["retardancesRad"]]
    t = problem["target"]
    tw, tx, ty, tz = t["w"], -t["x"], -t["y"], -t["z"]

    def residual(angles):
        # target inverse first, then the plates: the same vector part up to a turn.
        w, x, y, z = tw, tx, ty, tz
        for (c, s), angle in zip(halves, angles):
            px, pz = s * math.sin(2 * angle), s * math.cos(2 * angle)
            w, x, y, z = (
                c * w - px * x - pz * z,
                c * x + px * w - pz * y,
                c * y - px * z + pz * x,
                c * z + px * y + pz * w,
            )
        return (x, y, z)

    return residual


def same(one, other):
    for a, b in zip(one, other):
        apart = abs(a - b) % math.pi
        if min(apart, math.pi - apart) > SAME:
            return False
    return True


def solve(problem, draw):
    residual = residual_of(problem)
    found = []
    starts = 0
    while len(found) < len(problem["settings"]) and starts < MOST_STARTS:
        starts += 1
        guess = [math.pi * draw.random() for _ in range(3)]
        end = least_squares(residual, guess, method="lm", xtol=1e-12, ftol=1e-12, gtol=1e-12)
        if end.cost < 1e-20 and not any(same(end.x, other) for other in found):
            found.append(list(end.x))
    complete = all(any(same(setting, other) for other in found) for setting in problem["settings"])
    return starts, complete


def main():
    problems = json.load(sys.stdin)
    draw = random.Random(7)
    solve(problems[0], random.Random(1))  # the first call loads what it needs
    start = time.perf_counter()
    answers = [solve(problem, draw) for problem in problems]
    seconds = time.perf_counter() - start
    count = len(problems)
    print(
        json.dumps(
            {
                "secondsEach": seconds / count,
                "startsEach": sum(starts for starts, _ in answers) / count,
                "complete": sum(1 for _, complete in answers if complete),
            }
        )
    )


main()
