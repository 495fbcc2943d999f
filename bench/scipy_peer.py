"""The main job as a researcher would do it with SciPy: binary branching at rate 1 with diffusion 1/2 and drift mu, one particle at x.

Prints one line of JSON: processor times of repeated runs in milliseconds, which a busy machine hardly lengthens, and what was found.
Usage: scipy_peer.py mu x up_to runs
"""

import json
import sys
import time

import numpy as np
from scipy.integrate import solve_ivp
from scipy.optimize import brentq

TOLERANCES = {"method": "DOP853", "rtol": 1e-13, "atol": 1e-18}
START = 1e-5


def trajectory(mu):
    """The profile equation w'' / 2 + mu w' + w^2 - w = 0 in u = 1 - w, backward from u = z + c z^2, z small, on both sides of w = 1."""
    decay = mu + np.sqrt(mu * mu - 2)
    c = 1 / (2 * decay**2 - 2 * mu * decay + 1)

    def right(_, y):
        u, v = y
        return [v, -2 * (mu * v + u - u * u)]

    def barrier(_, y):
        return y[0] - 1

    def turning(_, y):
        return y[1]

    branches = []
    for sign, event in ((1, barrier), (-1, turning)):
        event.terminal = True
        z = sign * START
        start = [z + c * z * z, -decay * (z + 2 * c * z * z)]
        branches.append(solve_ivp(right, (0, -60 / decay), start, events=event, dense_output=True, **TOLERANCES))
    return decay, *branches


def circle(mu, s0, up_to, upper):
    """w'(s) = a(s) on the upper half of |s| = r < s0, continued from the real axis: a da/ds = -2 (mu a + s^2 - s)."""
    count = 1 << int(np.ceil(np.log2(4 * up_to)))
    radius = s0 * 10 ** (-14 / count)
    place = brentq(lambda x: 1 - upper.sol(x)[0] - radius, upper.t[-1], 0, xtol=1e-15, rtol=1e-15)
    angles = np.linspace(0, np.pi, count // 2 + 1)

    def right(theta, a):
        s = radius * np.exp(1j * theta)
        return 1j * s * -2 * (mu * a + s * s - s) / a

    start = np.array([-upper.sol(place)[1] + 0j])
    a = solve_ivp(right, (0, np.pi), start, t_eval=angles, method="DOP853", rtol=1e-13, atol=1e-15).y[0]
    return count, radius, radius * np.exp(1j * angles), a


def law(mu, x, s0, up_to, upper):
    """P(K = n) r^n, n = 0, ..., up_to: w(x, s) by the profile equation from each s of the circle, then a Fourier transform."""
    count, radius, s, a = circle(mu, s0, up_to, upper)
    n = len(s)

    def right(_, y):
        w, v = y[:n], y[n:]
        return np.concatenate((v, -2 * (mu * v + w * w - w)))

    end = solve_ivp(right, (0, x), np.concatenate((s, a)), method="DOP853", rtol=1e-12, atol=1e-14).y[:n, -1]
    return radius, np.fft.irfft(np.conj(end), count)[: up_to + 1]


def main_job(mu, x, up_to):
    decay, lower, upper = trajectory(mu)
    amplitude = START * np.exp(-decay * lower.t_events[0][0])
    slope = -lower.y_events[0][0][1]
    top = upper.t_events[0][0]
    s0 = 1 - upper.y_events[0][0][0]
    radius, scaled = law(mu, x, s0, up_to, upper)
    slope_at_start = upper.sol(top + x)[1] if top + x <= 0 else -START * decay * np.exp(-decay * (top + x))
    constant = slope_at_start / (2 * np.sqrt(np.pi * (s0 - 1)))
    return {
        "s0": s0,
        "amplitude": amplitude,
        "slope": slope,
        "constant": constant,
        "radius": radius,
        "scaled": scaled.tolist(),
    }


if __name__ == "__main__":
    mu, x, up_to, runs = float(sys.argv[1]), float(sys.argv[2]), int(sys.argv[3]), int(sys.argv[4])
    times = []
    for _ in range(runs):
        begun = time.process_time()
        found = main_job(mu, x, up_to)
        times.append(1000 * (time.process_time() - begun))
    print(json.dumps({"times": times, **found}))
