# SPDX-License-Identifier: Apache-2.0
"""Levels of a layer stack by another route than the program's, for the numbers of the examples.

The stack is cut into thin slices of constant potential, psi and psi'/m are carried through them by cosine and sine
(cosh and sinh in barriers), and the zeros of psi are counted: psi(E), started at the bottom wall, has as many zeros up
to the top wall as there are levels below E. Bisection on that number finds each level; two slice thicknesses and
Richardson's extrapolation remove the error of the slices, which is of second order.

Nothing of wellwright is used. Material values are those of I. Vurgaftman, J. R. Meyer, L. R. Ram-Mohan, J. Appl. Phys.
89, 5815 (2001), worked out by hand below. Lengths in nm, energies in eV, fields in V/nm, masses in m0.
"""
import numpy as np

K = 6.62607015e-34**2 / (4 * np.pi**2) / (2 * 9.1093837139e-31) / 1.602176634e-19 * 1e18  # hbar^2/2m0, CODATA 2022


class Medium:
    """edge: of this carrier [eV]; mass: at the edge [m0]; gap: of the unstrained medium, None for a constant mass;
    pole: the valence edge on which the mass depends, edge - gap without strain."""

    def __init__(self, edge, mass, gap=None, pole=None):
        self.edge, self.mass, self.gap = edge, mass, gap
        self.pole = pole if pole is not None else None if gap is None else edge - gap

    def inverse_mass(self, E):
        return 1 / self.mass + 0 * E if self.gap is None else self.gap / self.mass / (E - self.pole)


def varshni(E0, alpha, beta, T):
    return E0 - alpha * T * T / (T + beta)


def aluminium_gallium_arsenide(x, T, gap=None):
    """(gap, conduction edge, valence edge, mass) of AlxGa1-xAs; edges on the table's scale (InSb valence = 0)."""
    ends = varshni(1.519, 5.405e-4, 204, T), varshni(3.099, 8.85e-4, 530, T)
    if gap is None:
        gap = (1 - x) * ends[0] + x * ends[1] - x * (1 - x) * (-0.127 + 1.310 * x)
    valence = -0.80 * (1 - x) - 1.33 * x
    return gap, valence + gap, valence, 0.067 + 0.083 * x


def electrons(xs, T, bands):
    """Media of an AlGaAs stack, zero at the lowest conduction edge."""
    rows = [aluminium_gallium_arsenide(x, T) for x in xs]
    zero = min(row[1] for row in rows)
    return [Medium(row[1] - zero, row[3], row[0] if bands == "two" else None) for row in rows]


def heavy_holes(xs):
    """g1 and g2 of GaAs 6.98, 2.06, of AlAs 3.76, 0.82; the masses are interpolated, as in the paper."""
    mass = lambda x: (1 - x) / (6.98 - 2 * 2.06) + x / (3.76 - 2 * 0.82)
    return [Medium(0.53 * (x - min(xs)), mass(x)) for x in xs]


def slices(layers, step):
    """layers: (thickness, medium or function of the part 0..1 of the layer) -> list of (thickness, middle, medium)."""
    out, bottom = [], 0.0
    for thickness, medium in layers:
        n = max(2, int(np.ceil(thickness / step)))
        for i in range(n):
            t = (i + 0.5) / n
            here = medium(t) if callable(medium) else medium
            out.append((thickness / n, bottom + t * thickness, here))
        bottom += thickness
    return out


def zeros(E, parts, field):
    """Zeros of psi inside the stack for each energy of the array E."""
    psi, flux = np.zeros_like(E), np.ones_like(E)
    count = np.zeros(E.shape, int)
    for dz, z, medium in parts:
        here = E - field * z
        inverse, above = medium.inverse_mass(here), here - medium.edge
        k2 = above / (K * inverse)
        k = np.sqrt(np.abs(k2)) + 1e-300
        wave = k2 > 0
        c = np.where(wave, np.cos(k * dz), np.cosh(np.minimum(k * dz, 50)))
        s = np.where(wave, np.sin(k * dz), np.sinh(np.minimum(k * dz, 50)))
        new = c * psi + s / (k * inverse) * flux
        flux = np.where(wave, -s, s) * k * inverse * psi + c * flux
        count += (np.sign(new) != np.sign(psi)) & (psi != 0)
        size = np.maximum(np.abs(new), np.abs(flux))
        psi, flux = new / size, flux / size
    return count


def levels_on(layers, field, count, step):
    parts = slices(layers, step)
    low = np.full(count, min(medium.edge + field * z for _, z, medium in parts))
    high = low + 0.05
    number = np.arange(count)
    while (zeros(high, parts, field) <= number).any():
        high += 0.1
    for _ in range(44):
        middle = 0.5 * (low + high)
        below = zeros(middle, parts, field) > number
        high = np.where(below, middle, high)
        low = np.where(below, low, middle)
    return 0.5 * (low + high)


def levels(layers, field=0.0, count=4, step=0.5):
    """The lowest `count` levels between hard walls [eV]."""
    coarse, fine = levels_on(layers, field, count, step), levels_on(layers, field, count, step / 2)
    return fine + (fine - coarse) / 3


def mirrored_dipole(layers, E1, E2, step):
    """Dipole [nm] between two levels of a stack that is its own mirror image. psi and, where the mass grows with energy,
    chi = sqrt(hbar^2 b / 2m0) psi' / (E - pole) are taken in the middles of the slices of the lower half, where carrying
    them up from the wall loses no digits; an even number of slices is needed in the middle layer."""
    parts = slices(layers, step)
    middle = 0.5 * sum(thickness for thickness, _ in layers)
    half = [part for part in parts if part[1] < middle]
    states = []
    for E in (E1, E2):
        psi, flux, rows = 0.0, 1.0, []
        for dz, _, medium in half:
            inverse = medium.inverse_mass(E)
            k2 = complex((E - medium.edge) / (K * inverse))
            k = np.sqrt(k2)
            c, s = np.cos(k * dz / 2), np.sin(k * dz / 2) / k
            for where in ("middle", "end"):
                psi, flux = (c * psi + s / inverse * flux).real, (-k2 * s * inverse * psi + c * flux).real
                if where == "middle":
                    valence = 0 if medium.gap is None else np.sqrt(K * medium.gap / medium.mass) / (E - medium.pole)
                    rows.append((psi, valence * flux / inverse))
        states.append(np.array(rows))
    dz, z = np.array([part[0] for part in half]), np.array([part[1] for part in half]) - middle
    norm = [2 * ((state**2).sum(axis=1) * dz).sum() for state in states]
    return 2 * ((states[0] * states[1]).sum(axis=1) * z * dz).sum() / np.sqrt(norm[0] * norm[1])


def miniband_edges(well, barrier, a, b, band):
    """Edges (phase 0, phase pi) of band 1, 2, ... of a superlattice with wells of width a and barriers of width b, where
    cos(phase) = cos(ka) cosh(qb) - (r - 1/r) / 2 sin(ka) sinh(qb), r = k m_b / (q m_w) (G. Bastard, Phys. Rev. B 24,
    5693 (1981), doi:10.1103/PhysRevB.24.5693)."""

    def cosine(E):
        w, v = well.inverse_mass(E), barrier.inverse_mass(E)
        k, q = np.sqrt(complex(E - well.edge) / (K * w)), np.sqrt(complex(barrier.edge - E) / (K * v))
        r = k * w / (q * v)
        return (np.cos(k * a) * np.cosh(q * b) - (r - 1 / r) / 2 * np.sin(k * a) * np.sinh(q * b)).real

    E = np.arange(well.edge + 1e-6, barrier.edge + 1.0, 1e-4)
    values = [cosine(e) for e in E]
    found = []
    for target in (1, -1):
        for i in range(len(E) - 1):
            if (values[i] - target) * (values[i + 1] - target) < 0:
                low, high = E[i], E[i + 1]
                for _ in range(60):
                    middle = 0.5 * (low + high)
                    if (cosine(middle) - target) * (cosine(low) - target) > 0:
                        low = middle
                    else:
                        high = middle
                found.append((0.5 * (low + high), target))
    edges = sorted(found)[2 * (band - 1):2 * band]
    return tuple(e for e, target in sorted(edges, key=lambda edge: -edge[1]))
