#!/usr/bin/env python3
# SPDX-License-Identifier: Apache-2.0
"""Draws a result file as SVG: layers, band edge and levels above, the carpet of the probability density below, on one z
axis. Two files are written, for light and for dark pages: draw.py RESULT.h5 docs/pictures/NAME [--levels 4] [--until 2]
needs h5py and numpy only."""
import argparse
import base64
import struct
import zlib

import h5py
import numpy as np

INK = {
    "light": dict(ink="#22252a", soft="#70757d", well="#f7f5f1", barrier="#e7e3dc", line="#c9c4ba", accent="#0a66b7"),
    "dark": dict(ink="#e3e5e8", soft="#9a9fa7", well="#1c1f24", barrier="#2c3037", line="#454b55", accent="#5fb0f5"),
}
WIDTH, LEFT, RIGHT = 760, 64, 26
FONT = "font-family='Helvetica, Arial, sans-serif'"


def text(value):
    return value.decode() if isinstance(value, bytes) else str(value)


class Drawing:
    def __init__(self, colours, height):
        self.c, self.height, self.parts = colours, height, []

    def add(self, part):
        self.parts.append(part)

    def words(self, x, y, words, colour="ink", anchor="start", size=12, turn=None):
        rotate = f" transform='rotate({turn} {x:.1f} {y:.1f})'" if turn else ""
        words = words.replace("&", "&amp;").replace("<", "&lt;").replace(">", "&gt;")
        self.add(f"<text x='{x:.1f}' y='{y:.1f}' fill='{self.c[colour]}' font-size='{size}' "
                 f"text-anchor='{anchor}'{rotate}>{words}</text>")

    def line(self, points, colour="ink", width=1.2, dash="", fill="none", opacity=1):
        d = "M" + "L".join(f"{x:.2f},{y:.2f}" for x, y in points)
        dash = f" stroke-dasharray='{dash}'" if dash else ""
        stroke = f"stroke='{self.c[colour]}' stroke-width='{width}'" if width else "stroke='none'"
        shape = fill if fill == "none" else self.c[fill]
        self.add(f"<path d='{d}' {stroke}{dash} fill='{shape}' fill-opacity='{opacity}' stroke-linejoin='round'/>")

    def save(self, path, title):
        with open(path, "w", encoding="utf-8") as file:
            file.write(f"<svg xmlns='http://www.w3.org/2000/svg' viewBox='0 0 {WIDTH} {self.height}' {FONT} role='img'>\n"
                       f"<title>{title}</title>\n" + "\n".join(self.parts) + "\n</svg>\n")


def png(alpha, colour):
    """A picture of one colour whose opacity is `alpha` (row, column) from 0 to 255."""
    r, g, b = (int(colour[i:i + 2], 16) for i in (1, 3, 5))
    rows = b"".join(b"\0" + np.stack([np.full_like(row, v) for v in (r, g, b)] + [row], axis=-1).tobytes() for row in alpha)

    def chunk(kind, data):
        return struct.pack(">I", len(data)) + kind + data + struct.pack(">I", zlib.crc32(kind + data))

    head = struct.pack(">IIBBBBB", alpha.shape[1], alpha.shape[0], 8, 6, 0, 0, 0)
    return b"\x89PNG\r\n\x1a\n" + chunk(b"IHDR", head) + chunk(b"IDAT", zlib.compress(rows, 9)) + chunk(b"IEND", b"")


def lobatto(degree):
    """The Gauss-Lobatto-Legendre nodes on [-1, 1]: the ends and the extrema of the Legendre polynomial."""
    return np.concatenate([[-1], np.sort(np.polynomial.legendre.Legendre.basis(degree).deriv().roots().real), [1]])


def degree_of(z):
    """The degree of the elements whose nodes stand in `z`; 1 where they are no such nodes."""
    layers = np.split(z, np.where(np.diff(z) < 1e-5)[0] + 1)  # an interface stands as two points
    for degree in range(2, min(len(part) for part in layers)):
        if all((len(part) - 1) % degree == 0 for part in layers):
            first = layers[0][:degree + 1]
            seen = 2 * (first - first[0]) / (first[-1] - first[0]) - 1
            if np.allclose(seen, lobatto(degree), atol=1e-4):
                return degree
    return 1


def smooth(z, values, pieces=24):
    """`values` (row, z) between the nodes, by the polynomial of each element in barycentric form (J.-P. Berrut, L. N.
    Trefethen, SIAM Rev. 46, 501 (2004)): a curve drawn through the nodes alone would show its corners."""
    degree = degree_of(z)
    at, out = [], []
    start = 0
    while start + degree < len(z):
        nodes, known = z[start:start + degree + 1], values[:, start:start + degree + 1]
        weight = 1 / np.prod(nodes[:, None] - nodes[None, :] + np.eye(degree + 1), axis=1)
        fine = np.linspace(nodes[0], nodes[-1], pieces + 1)
        apart = fine[:, None] - nodes[None, :]
        hit = np.abs(apart) < 1e-12
        share = weight / np.where(hit, 1, apart)
        share = np.where(hit.any(axis=1)[:, None], hit, share)
        at.append(fine)
        out.append(known @ (share / share.sum(axis=1)[:, None]).T)
        start += degree
        if start + 1 < len(z) and z[start + 1] - z[start] < 1e-5:
            start += 1
    return np.concatenate(at), np.concatenate(out, axis=1)


def layers(d, file, x, top, bottom):
    """Neutral tints, the lower edge the lighter one; name and thickness above."""
    names, materials = file["layers/name"][...], file["layers/material"][...]
    at, thick = file["layers/bottom"][...], file["layers/thickness"][...]
    edge = file["layers/conduction_band_edge"][...]
    low = edge < 0.5 * (edge.min() + edge.max())
    for i in range(len(at)):
        left, right = x(at[i]), x(at[i] + thick[i])
        d.add(f"<rect x='{left:.1f}' y='{top}' width='{right - left:.1f}' height='{bottom - top}' "
              f"fill='{d.c['well' if low[i] else 'barrier']}'/>")
        middle, name = 0.5 * (left + right), text(names[i]) or text(materials[i])
        if right - left > 7.2 * len(name):
            d.words(middle, top - 22, name, "ink", "middle")
            d.words(middle, top - 7, f"{thick[i]:g} nm", "soft", "middle", 11)
        else:  # a thin layer is named one storey higher
            d.line([(middle, top), (middle, top - 36)], "line", 1)
            d.words(middle, top - 56, name, "ink", "middle")
            d.words(middle, top - 42, f"{thick[i]:g} nm", "soft", "middle", 11)
    for z in at[1:]:
        d.line([(x(z), top), (x(z), bottom)], "line", 0.8)


def levels(d, file, x, top, bottom, shown, marked):
    z, edge = file["profile/z"][...], 1e3 * file["profile/conduction_band_edge"][...]
    energy = 1e3 * file["levels/energy"][...][:shown]
    zl, density = smooth(file["levels/z"][...], file["levels/probability_density"][...][:shown])
    low, high = min(edge.min(), energy.min()), energy.max()
    low, high = low - 0.12 * (high - low), high + 0.35 * (high - low)
    y = lambda e: bottom - (e - low) / (high - low) * (bottom - top)
    step = 10 ** np.floor(np.log10((high - low) / 3))
    step *= 2 if (high - low) / step > 6 else 1
    for e in np.arange(np.ceil(low / step) * step, high, step):
        d.line([(LEFT - 5, y(e)), (LEFT, y(e))], "soft", 1)
        d.words(LEFT - 9, y(e) + 4, f"{e:g}", "soft", "end", 11)
    d.words(18, 0.5 * (top + bottom), "energy (meV)", "soft", "middle", 11, -90)
    inside = edge < high
    for part in np.split(np.arange(len(z)), np.where(np.diff(inside.astype(int)))[0] + 1):
        if inside[part[0]]:
            points = [(x(z[i]), y(edge[i])) for i in part]
            if part[0] > 0:
                points.insert(0, (points[0][0], top))
            if part[-1] < len(z) - 1:
                points.append((points[-1][0], top))
            d.line(points, "ink", 1.6)
    lift = 0.16 * (bottom - top) / density.max()
    for n in range(shown):
        colour = "accent" if n + 1 in marked else "ink"
        points = [(x(a), y(energy[n]) - lift * b) for a, b in zip(zl, density[n]) if b > 0.004 * density.max()]
        d.line([(points[0][0], y(energy[n]))] + points + [(points[-1][0], y(energy[n]))], colour, 0, fill=colour, opacity=0.16)
        d.line(points, colour, 1.1)
        d.line([(points[0][0], y(energy[n])), (points[-1][0], y(energy[n]))], colour, 0.8)
    places = [y(e) + 4 for e in energy]  # labels at the line, kept apart
    for n in range(1, shown):
        places[n] = min(places[n], places[n - 1] - 13)
    for n in range(shown):
        colour = "accent" if n + 1 in marked else "ink"
        d.words(WIDTH - RIGHT - 6, places[n], f"{n + 1}   {energy[n]:.2f} meV", colour, "end")


def carpet(d, file, x, top, bottom, until):
    group = file["dynamics/density"]
    time, z, density = group["time"][...], group["z"][...], group["probability_density"][...]
    keep = time <= until
    time, density = time[keep], density[keep]
    rows = np.linspace(0, len(time) - 1, min(len(time), 220)).round().astype(int)
    columns = np.linspace(0, len(z) - 1, min(len(z), 330)).round().astype(int)
    part = density[np.ix_(rows, columns)]
    data = base64.b64encode(png(np.clip(235 * part / part.max(), 0, 255).astype(np.uint8), d.c["accent"])).decode()
    d.add(f"<image x='{x(z[0]):.1f}' y='{top}' width='{x(z[-1]) - x(z[0]):.1f}' height='{bottom - top}' "
          f"preserveAspectRatio='none' href='data:image/png;base64,{data}'/>")
    y = lambda t: top + t / time[-1] * (bottom - top)
    for t in np.arange(0, time[-1] + 1e-9, 0.5 if time[-1] > 1.2 else 0.2):
        d.line([(LEFT - 5, y(t)), (LEFT, y(t))], "soft", 1)
        d.words(LEFT - 9, y(t) + 4, f"{t:g}", "soft", "end", 11)
    d.words(18, 0.5 * (top + bottom), "time (ps)", "soft", "middle", 11, -90)
    when, mean = file["dynamics/time"][...], file["dynamics/mean_position"][...]
    d.line([(x(m), y(t)) for t, m in zip(when, mean) if t <= time[-1]], "ink", 1.2, "4 3")
    period = float(file["beats/period"][0])
    if 2 * period < time[-1]:
        at = WIDTH - RIGHT - 70
        for t in (period, 2 * period):
            d.line([(at - 6, y(t)), (at + 6, y(t))], "ink", 1)
        d.line([(at, y(period)), (at, y(2 * period))], "ink", 1)
        d.words(at + 10, y(1.5 * period) - 3, f"{period:.3f} ps", "ink")
        d.words(at + 10, y(1.5 * period) + 12, f"{1e3 * float(file['beats/energy'][0]):.2f} meV", "soft", size=11)


def main():
    words = argparse.ArgumentParser(description=__doc__)
    words.add_argument("result")
    words.add_argument("target", help="without the ending; NAME-light.svg and NAME-dark.svg are written")
    words.add_argument("--levels", type=int, default=4)
    words.add_argument("--marked", type=int, nargs="*", default=[])
    words.add_argument("--until", type=float, default=2.0, help="end of the carpet (ps)")
    given = words.parse_args()
    with h5py.File(given.result, "r") as file:
        length = float((file["layers/bottom"][...] + file["layers/thickness"][...])[-1])
        x = lambda z: LEFT + z / length * (WIDTH - LEFT - RIGHT)
        moving = "dynamics/density" in file
        marked = given.marked or ([int(file["beats/lower"][0]), int(file["beats/upper"][0])] if moving else [])
        for name, colours in INK.items():
            top, middle, bottom = 74, 330, 560 if moving else 330
            d = Drawing(colours, bottom + 46)
            layers(d, file, x, top, bottom)
            levels(d, file, x, top, middle, min(given.levels, len(file["levels/energy"])), marked)
            if moving:
                d.line([(LEFT, middle + 8), (WIDTH - RIGHT, middle + 8)], "line", 0.8)
                carpet(d, file, x, middle + 16, bottom, given.until)
            for z in np.arange(0, length + 1e-9, 10 if length < 120 else 50):
                d.line([(x(z), bottom), (x(z), bottom + 5)], "soft", 1)
                d.words(x(z), bottom + 19, f"{z:g}", "soft", "middle", 11)
            d.words(0.5 * (LEFT + WIDTH - RIGHT), bottom + 38, "height above the substrate (nm)", "soft", "middle", 11)
            d.save(f"{given.target}-{name}.svg", text(file.attrs["title"]))


if __name__ == "__main__":
    main()
