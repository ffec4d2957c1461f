"""The same two steps by NumPy and SciPy, timed here on request.

First line of stdin: JSON with x (nm), potential (eV), hbar (eV fs), mass (eV fs^2/nm^2), timeStep (fs), psi (re, im, ...).
Then one line a request, "cn COUNT" or "fft COUNT": advances that state and answers with JSON: seconds and mean position.
"""

import json
import sys
import time

import numpy as np
import scipy
from scipy.linalg import solve_banded

print(json.dumps({"python": sys.version.split()[0], "numpy": np.__version__, "scipy": scipy.__version__}), flush=True)

setup = json.loads(sys.stdin.readline())
x = np.array(setup["x"])
potential = {name: np.array(values) for name, values in setup["potential"].items()}
hbar, mass, dt = setup["hbar"], setup["mass"], setup["timeStep"]
start = np.array(setup["psi"])[0::2] + 1j * np.array(setup["psi"])[1::2]
n, h = len(x), x[1] - x[0]

# Crank-Nicolson on three points: (1 + i dt H / 2 hbar) psi' = (1 - i dt H / 2 hbar) psi, psi = 0 beyond the ends.
coupling = hbar**2 / (2 * mass * h**2)
half = 0.5j * dt / hbar
ahead = half * (2 * coupling + potential["cn"])
band = np.zeros((3, n), dtype=complex)
band[0, 1:] = band[2, :-1] = -half * coupling
band[1] = 1 + ahead
keep = 1 - ahead
side = half * coupling


def crank_nicolson(psi):
    right = keep * psi
    right[1:] += side * psi[:-1]
    right[:-1] += side * psi[1:]
    # The options that save SciPy its copies and checks: its fastest way.
    return solve_banded((1, 1), band, right, overwrite_b=True, check_finite=False)


# Strang splitting with neighbouring half kicks joined into one: the density is that of the unjoined steps.
k = 2 * np.pi * np.fft.fftfreq(n, h)
drift = np.exp(-0.5j * hbar * k**2 * dt / mass)
kick = np.exp(-1j * potential["fft"] * dt / hbar)


def strang(psi):
    return kick * np.fft.ifft(drift * np.fft.fft(psi))


steps = {"cn": crank_nicolson, "fft": strang}
states = {"cn": start.copy(), "fft": start * np.exp(-0.5j * potential["fft"] * dt / hbar)}
for line in sys.stdin:
    name, count = line.split()
    step, psi = steps[name], states[name]
    begin = time.perf_counter()
    for _ in range(int(count)):
        psi = step(psi)
    seconds = time.perf_counter() - begin
    states[name] = psi
    density = np.abs(psi) ** 2
    print(json.dumps({"seconds": seconds, "meanNm": float((density * x).sum() / density.sum())}), flush=True)
