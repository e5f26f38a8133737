# SPDX-License-Identifier: Apache-2.0
"""The numbers of the examples by another route: shooting, closed forms, arithmetic by hand. Each function returns
{name: value} in the unit that the example's expected.yaml gives; check.py compares them with the values there.
Run it to see them: python3 tests/examples/estimates.py 010"""
import sys

import numpy as np

from shooting import (K, Medium, aluminium_gallium_arsenide, electrons, heavy_holes, levels, miniband_edges,
                      mirrored_dipole)

h = 4.135667696  # eV fs
hc = 1239.841984  # eV nm


def coupled(bands, T, F, wide, thin, narrow, count, x=0.3, outer=20):
    b, w = electrons([x, 0.0], T, bands)
    return levels([(outer, b), (wide, w), (thin, b), (narrow, w), (outer, b)], F * 1e-4, count)


def coupled_wells():
    E = coupled("two", 10, -7.5, 11.8, 2, 9.4, 4)
    return {f"level {i + 1}": E[i] for i in range(4)} | {
        "beat energy": E[1] - E[0], "beat period": h * 1e-3 / (E[1] - E[0]), "frequency": (E[1] - E[0]) / (h * 1e-3)}


def infrared_absorber():
    out = {}
    for bands in ("two", "one"):
        b, w = electrons([0.3, 0.0], 300, bands)
        E = levels([(15, b), (7, w), (15, b)], 0, 2, step=1.0)
        z = mirrored_dipole([(15, b), (7, w), (15, b)], E[0], E[1], step=0.02)
        out |= {f"line, {bands}": E[1] - E[0], f"wavelength, {bands}": hc / (E[1] - E[0]),
                f"strength, {bands}": z * z * (E[1] - E[0]) / K}
    return out


def strained(x, ends, bowing, substrate):
    """(strain, conduction edge, pole, gap, mass) of an alloy on the substrate's lattice at 300 K; ends: two dicts of
    the binaries, the second one with the fraction x; model-solid shifts of C. G. Van de Walle, Phys. Rev. B 39, 1871
    (1989), doi:10.1103/PhysRevB.39.1871."""
    mix = {key: (1 - x) * ends[0][key] + x * ends[1][key] - x * (1 - x) * bowing.get(key, 0) for key in ends[0]}
    e = (substrate - mix["a"]) / mix["a"]
    trace = 2 * e * (1 - mix["c12"] / mix["c11"])
    conduction = mix["v"] + mix["gap"] + mix["ac"] * trace
    return e, conduction, mix["v"] + mix["av"] * trace, mix["gap"], mix["m"]


GaAs = dict(a=0.565325, gap=1.519 - 5.405e-4 * 300**2 / 504, v=-0.80, m=0.067, ac=-7.17, av=1.16, c11=122.1, c12=56.6)
AlAs = dict(a=0.56611, gap=3.099 - 8.85e-4 * 300**2 / 830, v=-1.33, m=0.15, ac=-5.64, av=2.47, c11=125.0, c12=53.4)
InAs = dict(a=0.60583, gap=0.417 - 2.76e-4 * 300**2 / 393, v=-0.59, m=0.026, ac=-5.08, av=1.00, c11=83.29, c12=45.26)
on_gallium = dict(gap=0.477, v=-0.38, m=0.0091, ac=2.61)
on_aluminium = dict(gap=0.70, v=-0.64, m=0.049, ac=-1.4)


def strained_well():
    InP = 0.58697
    rows = {"buffer": strained(0.52, (AlAs, InAs), on_aluminium, InP),
            "barrier": strained(0.45, (AlAs, InAs), on_aluminium, InP),
            "well": strained(0.65, (GaAs, InAs), on_gallium, InP)}
    zero = min(row[1] for row in rows.values())
    # the weight Eg/m* of the pole is that of the unstrained medium
    media = {name: Medium(row[1] - zero, row[4], row[3], row[2] - zero) for name, row in rows.items()}
    E = levels([(10, media["buffer"]), (4, media["barrier"]), (5, media["well"]), (4, media["barrier"]),
                (10, media["buffer"])], 0, 2, step=1.0)
    return {"strain of the well": rows["well"][0], "strain of a barrier": rows["barrier"][0],
            "edge of a barrier": media["barrier"].edge, "level 1": E[0], "level 2": E[1], "line": E[1] - E[0]}


def parabolic_well():
    def medium(s):  # s: distance from the vertex, 0 to 1
        x = 0.3 * s * s
        return Medium((1.247 - 0.53) * x, 0.067 + 0.083 * x)

    E = levels([(40, lambda t: medium(1 - t)), (40, medium)], 0, 5, step=0.25)
    spacing = np.sqrt(4 * K * (1.247 - 0.53) * 0.3 / 0.067) / 40
    return {"spacing of the parabola": spacing, "period of the parabola": h * 1e-3 / spacing,
            "spacing 1-2": E[1] - E[0], "spacing 4-5": E[4] - E[3], "level 1": E[0]}


def superlattice():
    b, w = electrons([0.3, 0.0], 10, "two")
    out = {}
    for band in (1, 2):
        centre, edge = miniband_edges(w, b, 6, 2.5, band)
        out |= {f"band {band}, phase 0": centre, f"band {band}, phase pi": edge}
    return out


def anticrossing():
    out = {}
    for F in (6, 9, 12):
        E = coupled("two", 10, F, 8, 4, 10, 2)
        out[f"splitting at {F} kV/cm"] = E[1] - E[0]
    return out


def light_start():
    F = -7.5
    E = coupled("two", 10, F, 11.8, 2, 9.4, 2)
    b, w = heavy_holes([0.3, 0.0])
    H = levels([(20, b), (11.8, w), (2, b), (9.4, w), (20, b)], -F * 1e-4, 1)
    gap = aluminium_gallium_arsenide(0, 10)[0]
    return {"gap": gap, "hole level 1": H[0], "line 1-1": gap + E[0] + H[0], "line 2-1": gap + E[1] + H[0]}


by_example = {"010": coupled_wells, "020": infrared_absorber, "030": strained_well, "040": parabolic_well,
              "050": superlattice, "060": anticrossing, "070": light_start}

if __name__ == "__main__":
    for number in sys.argv[1:] or sorted(by_example):
        for name, value in by_example[number]().items():
            print(f"{number}  {name:28} {value:.9g}")
