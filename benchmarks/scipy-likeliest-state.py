"""The likeliest one-qubit state by scipy's BFGS, for a ratio against the kernel.

Reads a JSON list of {projectors: [[s1, s2, s3], ..], counts: [..], exposures: [..], darkCounts: [..]} on stdin. The state is
rho = T^dagger T with T lower triangular and a real diagonal (James et al., Phys. Rev. A 64, 052312), which keeps it physical:
four real numbers without constraints, from unpolarised light. Once with the gradient by differences, scipy's default, and once
with the exact one. Prints {differences, exactGradient}, each {secondsEach, logLikelihoods}, as JSON.
"""

import json
import sys
import time

import numpy
from scipy.optimize import minimize


def likelihood_of(problem):
    projectors = numpy.array(problem["projectors"], dtype=float)
    counts = numpy.array(problem["counts"], dtype=float)
    exposures = numpy.array(problem["exposures"], dtype=float)
    dark = numpy.array(problem["darkCounts"], dtype=float)
    rows = numpy.hstack([numpy.ones((len(counts), 1)), projectors]) * exposures[:, None] / 2
    counted = counts > 0
    some, rows_some, dark_some = counts[counted], rows[counted], dark[counted]
    exposed, all_dark = rows.sum(axis=0), dark.sum()

    # T = [[a, 0], [c + i d, b]]; (S0, S1, S2, S3) of T^dagger T.
    def stokes(t):
        a, b, c, d = t
        return numpy.array([a * a + b * b + c * c + d * d, a * a + c * c + d * d - b * b, 2 * b * c, 2 * b * d])

    def value(t):
        light = stokes(t)
        return exposed @ light + all_dark - some @ numpy.log(rows_some @ light + dark_some)

    def gradient(t):
        a, b, c, d = t
        by_stokes = exposed - (some / (rows_some @ stokes(t) + dark_some)) @ rows_some
        jacobian = numpy.array(
            [[2 * a, 2 * b, 2 * c, 2 * d], [2 * a, -2 * b, 2 * c, 2 * d], [0, 2 * c, 2 * b, 0], [0, 2 * d, 0, 2 * b]]
        )
        return by_stokes @ jacobian

    size = numpy.sqrt(counts.sum() / exposures.sum())
    return value, gradient, numpy.array([size, size, 0.0, 0.0])


def search(problems, exact):
    def solve(problem):
        value, gradient, start = likelihood_of(problem)
        return minimize(value, start, method="BFGS", jac=gradient if exact else None)

    solve(problems[0])  # the first call loads what it needs
    begin = time.perf_counter()
    ends = [solve(problem) for problem in problems]
    seconds = time.perf_counter() - begin
    return {"secondsEach": seconds / len(problems), "logLikelihoods": [-float(end.fun) for end in ends]}


def main():
    numpy.seterr(all="ignore")  # line searches may leave the domain; BFGS turns back
    problems = json.load(sys.stdin)
    print(json.dumps({"differences": search(problems, False), "exactGradient": search(problems, True)}))


main()
