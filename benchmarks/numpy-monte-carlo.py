"""The Monte Carlo budget of benchmarks/monte-carlo.ts, vectorised in numpy: the same parameters drawn from the same
distributions, the same exact propagation, the same figures out. Prints JSON with the best of five runs in seconds for whole
arrays and for blocks that stay in the cache."""

import json
import sys
import time

import numpy as np

DEGREE = np.pi / 180
DRAWS = int(sys.argv[1]) if len(sys.argv) > 1 else 100_000
BLOCK = 4_096

# retardance, fast axis; sigma of retardance, zero, repeatability; dial step. Degrees.
PLATES = [
    (89.4, 31.0, 0.4, 0.05, 0.06, 0.1),
    (178.8, 74.0, 0.5, 0.05, 0.06, 0.1),
    (90.7, 118.0, 0.4, 0.05, 0.06, 0.1),
]
SIGMA_POLARISER = 0.05 * DEGREE
EXTINCTION = 1e-5
DRIFT_SIGMA = 1.0
DRIFT_PER_UNIT = [-0.11 * DEGREE, -0.22 * DEGREE, -0.11 * DEGREE]
INPUT = (1.0, 0.0, 0.0)
EDGES = np.linspace(-12, 0, 121)


def plate(delta, theta, s1, s2, s3):
    sine, cosine = np.sin(delta), np.cos(delta)
    n2, n1 = np.sin(2 * theta), np.cos(2 * theta)
    along = (1 - cosine) * (n1 * s1 + n2 * s2)
    return (
        cosine * s1 + sine * n2 * s3 + along * n1,
        cosine * s2 - sine * n1 * s3 + along * n2,
        cosine * s3 + sine * (n1 * s2 - n2 * s1),
    )


def target():
    state = INPUT
    for delta, theta, *_ in PLATES:
        state = plate(delta * DEGREE, theta * DEGREE, *state)
    return state


def draw_block(rng, count, goal):
    drift = rng.standard_normal(count) * DRIFT_SIGMA
    turn = 2 * SIGMA_POLARISER * rng.standard_normal(count)
    sine, cosine = np.sin(turn), np.cos(turn)
    s1 = cosine * INPUT[0] - sine * INPUT[1]
    s2 = sine * INPUT[0] + cosine * INPUT[1]
    s3 = np.full(count, INPUT[2])
    for (delta, theta, sigma_delta, sigma_zero, sigma_dial, step), per_unit in zip(PLATES, DRIFT_PER_UNIT):
        sigma_angle = np.hypot(sigma_zero, sigma_dial) * DEGREE
        retardance = delta * DEGREE + sigma_delta * DEGREE * rng.standard_normal(count) + per_unit * drift
        angle = (
            theta * DEGREE
            + sigma_angle * rng.standard_normal(count)
            + step * DEGREE * (rng.random(count) - 0.5)
        )
        s1, s2, s3 = plate(retardance, angle, s1, s2, s3)
    q = ((s1 - goal[0]) ** 2 + (s2 - goal[1]) ** 2 + (s3 - goal[2]) ** 2) / 4
    return q + EXTINCTION / (1 + EXTINCTION) * (1 - 2 * q)


def run(seed, block):
    rng = np.random.Generator(np.random.SFC64(seed))
    goal = target()
    if block >= DRAWS:
        values = draw_block(rng, DRAWS, goal)
    else:
        values = np.empty(DRAWS)
        for start in range(0, DRAWS, block):
            stop = min(start + block, DRAWS)
            values[start:stop] = draw_block(rng, stop - start, goal)
    low, median, high = np.percentile(values, [5, 50, 95], method="inverted_cdf")
    counts, _ = np.histogram(np.log10(values), bins=EDGES)
    return {
        "mean": float(values.mean()),
        "standardError": float(values.std(ddof=1) / np.sqrt(DRAWS)),
        "low": float(low),
        "median": float(median),
        "high": float(high),
        "largest": float(values.max()),
        "counted": int(counts.sum()),
    }


def best(block):
    least = float("inf")
    for _ in range(5):
        start = time.perf_counter()
        result = run(7, block)
        least = min(least, time.perf_counter() - start)
    return least, result


whole, summary = best(DRAWS)
blocks, _ = best(BLOCK)
print(json.dumps({"draws": DRAWS, "secondsWhole": whole, "secondsBlocks": blocks, "summary": summary}))
