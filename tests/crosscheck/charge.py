#!/usr/bin/env python3
# SPDX-License-Identifier: Apache-2.0
"""Self-consistent levels and sheet densities against a finite-difference loop written here with SciPy.

    charge.py PROGRAM

One band, constant mass in each medium and one mass in the plane, so that subbands are parabolic; Hartree with or without
exchange: flux-conserving differences (G. Bastard, Wave Mechanics Applied to Semiconductor Heterostructures (1988)),
damped iteration of the potential. Nothing of the program is used but its result.
"""
import json
import math
import pathlib
import subprocess
import sys
import tempfile

import numpy as np
from scipy.linalg import eigh_tridiagonal
from scipy.optimize import brentq

HBAR2_2M0 = 0.038099821  # eV nm^2, CODATA 2022
E_EPS0 = 18.0951280      # e / eps0 [V nm], CODATA 2022
KB = 8.617333262e-5      # eV / K

IN_PLANE = 0.07
WELL = dict(edge=0.0, mass=0.067, eps=12.9)
BARRIER = dict(edge=0.25, mass=0.0919, eps=12.2)
CASES = [
    # layers (medium, nm, donors cm^-2), K, exchange
    ("modulation doped", [("b", 15, 0), ("b", 5, 6e11), ("b", 5, 0), ("w", 10, 0), ("b", 20, 0)], 77, False),
    ("doped well, cold", [("b", 20, 0), ("w", 18, 1e12), ("b", 20, 0)], 4, False),
    ("two wells, warm", [("b", 15, 0), ("w", 7, 4e11), ("b", 3, 0), ("w", 9, 2e11), ("b", 15, 0)], 300, False),
    ("doped well with exchange", [("b", 20, 0), ("w", 18, 5e11), ("b", 20, 0)], 10, True),
]


def vxc(n, mass, eps):
    """Hedin and Lundqvist, J. Phys. C 4, 2064 (1971)."""
    e2 = E_EPS0 / (4 * math.pi)
    radius = 2 * HBAR2_2M0 / mass * eps / e2
    rydberg = e2 / (2 * eps * radius)
    rs = (3 / (4 * math.pi * np.maximum(n, 1e-12))) ** (1 / 3) / radius
    x = rs / 21
    c = 2 / math.pi / (4 / (9 * math.pi)) ** (1 / 3)
    return np.where(n > 1e-12, -c / rs * (1 + 0.7734 * x * np.log(1 + 1 / x)) * rydberg, 0)


def reference(layers, temperature, exchange, step):
    medium, donors = [], []
    for name, thickness, sheet in layers:
        cells = round(thickness / step)
        medium += [WELL if name == "w" else BARRIER] * cells
        donors += [sheet * 1e-14 / thickness] * cells
    edge, mass, eps = (np.array([m[key] for m in medium]) for key in ("edge", "mass", "eps"))
    donors = np.array(donors)
    kT = KB * temperature
    # Unknowns at the inner cell boundaries; a boundary between media has the mean of its two cells.
    mean = lambda cells: 0.5 * (cells[1:] + cells[:-1])
    U, ND, nodes = mean(edge), mean(donors), len(edge) - 1
    inverse = 1 / mass
    diagonal = HBAR2_2M0 / step**2 * (inverse[1:] + inverse[:-1])
    beside = -HBAR2_2M0 / step**2 * inverse[1:-1]
    V, Vx = np.zeros(nodes), np.zeros(nodes)
    last = None
    for turn in range(400):
        E, psi = eigh_tridiagonal(diagonal + U + V + Vx, beside, select="i", select_range=(0, 25))
        psi /= math.sqrt(step)
        states = IN_PLANE / (2 * math.pi * HBAR2_2M0)
        density = lambda mu: states * kT * np.logaddexp(0, (mu - E) / kT)
        total = ND.sum() * step
        mu = brentq(lambda m: density(m).sum() - total, E[0] - 1, E[-1] + 1, xtol=1e-15)
        N = density(mu)
        n = (psi**2 * N).sum(1)
        # eps V' = (e^2/eps0) integral of (ND - n), no field at the bottom
        charge = np.cumsum(ND - n) * step
        field = E_EPS0 * charge[:-1] / eps[1:-1]
        new = np.concatenate([[0], np.cumsum(field)]) * step
        newx = vxc(n, 1 / mean(inverse), mean(eps)) if exchange else Vx
        if last is not None and abs(E[:3] - last).max() < 1e-9:
            return E[:3] - V[0], N[:3]
        last = E[:3].copy()
        part = 0.15
        V += part * (new - V)
        Vx += part * (newx - Vx)
    raise SystemExit("the reference loop does not settle")


def program(path, layers, temperature, exchange):
    keys = lambda m: (f"{{conduction_band_edge: {m['edge']} eV, electron_mass: {m['mass']}, electron_in_plane_mass: {IN_PLANE}, "
                      f"band_gap: 1.5 eV, "
                      f"spin_orbit_splitting: 0.3 eV, permittivity: {m['eps']}}}")
    text = f"temperature: {temperature} K\nmaterials:\n  W: {keys(WELL)}\n  B: {keys(BARRIER)}\nlayers:\n"
    for name, thickness, sheet in layers:
        text += f"  - {{material: {name.upper()}, thickness: {thickness} nm"
        text += f", donors: {sheet:g} cm^-2}}\n" if sheet else "}\n"
    text += "model: {bands: one, levels: 3, charge: self-consistent"
    text += ", exchange_correlation: hedin-lundqvist}\n" if exchange else "}\n"
    with tempfile.TemporaryDirectory() as folder:
        study = pathlib.Path(folder) / "study.yaml"
        study.write_text(text)
        out = pathlib.Path(folder) / "out.h5"
        done = subprocess.run([path, "run", study, "-o", out, "--quiet"], capture_output=True, text=True, check=False)
        if done.returncode:
            raise SystemExit(done.stderr)
        import h5py
        with h5py.File(out) as file:
            return file["levels/energy"][:3], file["levels/sheet_density"][:3] * 1e-14


failed = False
for title, layers, temperature, exchange in CASES:
    energy, sheet = program(sys.argv[1], layers, temperature, exchange)
    coarse, fine = (reference(layers, temperature, exchange, step) for step in (0.05, 0.025))
    extrapolated = [(4 * f - c) / 3 for c, f in zip(coarse, fine)]  # second order in the step
    difference = abs(energy - extrapolated[0]).max()
    holds = extrapolated[1] > 1e-6
    relative = abs(sheet / extrapolated[1] - 1)[holds].max()
    good = difference < 1e-5 and relative < 1e-3
    failed = failed or not good
    print(f"{title:28} {temperature:4} K   levels within {difference:.1e} eV   densities within {relative:.1e}   "
          f"{'' if good else 'TOO FAR'}")
sys.exit(1 if failed else 0)
