# SPDX-License-Identifier: Apache-2.0
"""Opens results with h5dump, ncdump, netCDF4 and xarray, and holds their numbers against the command's JSON.

Usage: reading.py WELLWRIGHT SOURCE_FOLDER
"""
import json
import os
import pathlib
import shutil
import subprocess
import sys
import tempfile

try:
    import netCDF4
    import numpy as np
    import xarray as xr
except ImportError as missing:
    print(f"skipped: {missing}")
    sys.exit(77)
for tool in ("h5dump", "ncdump"):
    if not shutil.which(tool):
        print(f"skipped: {tool} is not installed")
        sys.exit(77)

PROGRAM, SOURCE = sys.argv[1], pathlib.Path(sys.argv[2])
WORK = pathlib.Path(tempfile.mkdtemp())

PERIODIC = """
title: a cell, with "quotes", commas and größe
layers:
  - {material: Al0.3Ga0.7As, thickness: 3 nm}
  - {material: GaAs, thickness: 7 nm, name: well}
model: {carrier: [electron, heavy hole, light hole], ends: periodic, levels: 3, bloch_phases: 7}
"""
EMPTY = """
layers: [{material: Al0.3Ga0.7As, thickness: 10 nm}, {material: GaAs, thickness: 8 nm}, {material: Al0.3Ga0.7As, thickness: 10 nm}]
model: {bands: one, levels: {above: 5 meV, below: 10 meV}}
"""
PAIRS = """
substrate: GaAs
layers:
  - {material: Al0.3Ga0.7As, thickness: 12 nm, donors: 2e11 cm^-2}
  - {graded: {from: GaAs, to: Al0.2Ga0.8As, shape: parabolic}, thickness: 9 nm}
  - {material: Al0.3Ga0.7As, thickness: 12 nm}
model: {carrier: [electron, heavy hole], bands: three, levels: 3}
dynamics: {start: {photoexcited: {hole: heavy hole, level: 1, duration: 80 fs}}, duration: 1 ps, samples: 301}
"""


def run(name, text):
    study = WORK / f"{name}.yaml"
    study.write_text(text)
    out = WORK / f"{name}.h5"
    done = subprocess.run([PROGRAM, "run", study, "-o", out, "--json"], capture_output=True, text=True)
    assert done.returncode == 0, done.stderr
    return out, json.loads(done.stdout)


def groups(dataset, path=""):
    yield path or "/"
    for name, group in dataset.groups.items():
        yield from groups(group, f"{path}/{name}")


def check_whole(file):
    """Every tool reads everything; every dataset is described and its axes are the group's own."""
    for command in (["h5dump", file], ["ncdump", file]):
        subprocess.run(command, check=True, stdout=subprocess.DEVNULL)
    with netCDF4.Dataset(file) as dataset:
        names = list(groups(dataset))
        for name in names:
            group = dataset[name] if name != "/" else dataset
            for variable in group.variables.values():
                assert variable.long_name, (name, variable.name)
                if variable.dtype is not str:
                    assert variable.units, (name, variable.name)
                for dimension in variable.dimensions:
                    assert dimension in group.dimensions, (name, variable.name, dimension)
                    assert dimension in group.variables, (name, dimension)
    for name in names:
        for engine in ("h5netcdf", "netcdf4"):
            xr.open_dataset(file, group=name, engine=engine).load().close()
    return names


HEAD = """# The result file

HDF5, and valid netCDF-4. Energies eV, lengths nm, times ps, sheet densities cm-2, fields kV/cm, frequencies THz. Groups of
holes carry the suffix `_heavy_hole` or `_light_hole` and hold the same datasets. Undefined doubles are NaN; an empty
answer is an axis of length 0. Groups of later steps (absorption, lifetimes, planning) are not there yet.

Root attributes: `title`, `program`, `version`, `format` ("wellwright result"), `format_version`, `created` (UTC),
`study` (the whole text), `settings` (the --set list), `materials` (YAML of the entries used, with sources),
`assumptions`, `warnings`, `converged`, `default` (the group to look at first). `/levels` carries `certified`,
`count_below`, `window_bottom`, `window_top` and, where not certified, `reason`; `/interband` carries `gap`; `/dynamics`
carries `captured_norm` and, where defined, `classical_period` and `revival_time`.
"""


def describe(file, pages):
    """Collects dimensions, units and words of every dataset, hole groups under their electron name."""
    with netCDF4.Dataset(file) as dataset:
        for name in groups(dataset):
            if name == "/":
                continue
            page = pages.setdefault(name.replace("_heavy_hole", "").replace("_light_hole", ""), {})
            for variable in dataset[name].variables.values():
                words = variable.long_name + ("; " + variable.comment if "comment" in variable.ncattrs() else "")
                units = variable.units if "units" in variable.ncattrs() else ""
                page.setdefault(variable.name, (", ".join(variable.dimensions), units, words))


def check_page(pages):
    """docs/reference/result-file.md lists what real files hold; WELLWRIGHT_WRITE_PAGES writes it anew."""
    text = HEAD
    for name, datasets in pages.items():
        text += f"\n## {name}\n\n| dataset | axes | unit | content |\n|---|---|---|---|\n"
        for dataset, (axes, units, words) in datasets.items():
            text += f"| {dataset} | {axes} | {units} | {words.replace('|', chr(92) + '|')} |\n"
    page = SOURCE / "docs" / "reference" / "result-file.md"
    if os.environ.get("WELLWRIGHT_WRITE_PAGES"):
        page.write_text(text)
    assert page.read_text() == text, "docs/reference/result-file.md differs from what files hold"


def check_levels(file, answer):
    for part in answer["carriers"]:
        suffix = "" if part["carrier"] == "electron" else "_" + part["carrier"].replace(" ", "_")
        levels = xr.open_dataset(file, group="levels" + suffix)
        assert np.array_equal(levels.level, np.arange(1, len(part["levels"]) + 1))
        assert levels.energy.attrs["units"] == "eV"
        assert np.allclose(levels.energy, [row["energy_eV"] for row in part["levels"]], rtol=0, atol=0)
        assert np.all(np.diff(levels.z) > 0)
        norm = (levels.weight * levels.probability_density).sum("z")
        assert np.allclose(norm, 1, atol=1e-12), norm
        assert np.allclose(levels.layer_probability.sum("layer"), 1, atol=1e-12)
        density = levels.envelope**2 + (levels.companion_envelope**2).sum("component")
        assert np.allclose(density, levels.probability_density, atol=1e-9)
        assert levels.attrs["certified"] == int(part["certificate"]["certified"])
        pairs = xr.open_dataset(file, group="transitions" + suffix)
        for row in part["transitions"]:
            at = dict(initial=row["initial"], final=row["final"])
            assert pairs.energy.sel(at) == row["energy_eV"]
            assert pairs.energy.sel(initial=at["final"], final=at["initial"]) == -row["energy_eV"]
            if row["dipole_nm"] is not None:
                assert abs(pairs.dipole.sel(at)) == abs(row["dipole_nm"])
            # h c = 1239.841984 eV nm (CODATA 2018)
            assert abs(pairs.wavelength.sel(at) * abs(row["energy_eV"]) / 1239.841984 - 1) < 1e-9


def main():
    pages = {}
    example = next((SOURCE / "examples").glob("010-*/study.yaml"))
    file, answer = run("example", example.read_text())
    names = check_whole(file)
    describe(file, pages)
    for name in ("/layers", "/profile", "/levels", "/dispersion", "/sensitivity", "/transitions", "/dynamics", "/dynamics/density", "/beats"):
        assert name in names, name
    check_levels(file, answer)
    root = xr.open_dataset(file)
    assert root.attrs["format"] == "wellwright result" and root.attrs["format_version"] == "1.0"
    assert root.attrs["study"] == example.read_text()
    beats = xr.open_dataset(file, group="beats")
    assert np.allclose(beats.period, [b["period_ps"] for b in answer["dynamics"]["beats"]], rtol=1e-15)
    assert np.all(np.diff(beats.dipole_amplitude) <= 0)
    motion = xr.open_dataset(file, group="dynamics")
    assert np.allclose((motion.population).sum("level"), 1, atol=1e-12)
    assert np.allclose(motion.amplitude_real**2 + motion.amplitude_imag**2, motion.population, atol=1e-15)
    assert motion.survival[0] == 1 or abs(motion.survival[0] - 1) < 1e-12
    layers = xr.open_dataset(file, group="layers")
    assert abs(layers.thickness.sum() - (layers.bottom[-1] + layers.thickness[-1])) < 1e-12
    carpet = xr.open_dataset(file, group="dynamics/density")
    assert carpet.probability_density.dims == ("time", "z")
    assert np.all(carpet.time.values == motion.time.values)
    width = np.diff(carpet.z)
    area = ((carpet.probability_density[:, 1:].values + carpet.probability_density[:, :-1].values) / 2 * width).sum(axis=1)
    assert np.allclose(area, 1, atol=1e-2), area

    file, answer = run("periodic", PERIODIC)
    names = check_whole(file)
    describe(file, pages)
    for name in ("/minibands", "/levels_heavy_hole", "/levels_light_hole", "/interband_heavy_hole", "/interband_light_hole", "/minibands_heavy_hole"):
        assert name in names, name
    check_levels(file, answer)
    bands = xr.open_dataset(file, group="minibands")
    assert bands.energy.dims == ("band", "bloch_phase") and bands.sizes["bloch_phase"] == 7
    assert np.isclose(bands.bloch_phase[-1], np.pi)

    file, answer = run("pairs", PAIRS)
    check_whole(file)
    describe(file, pages)
    check_levels(file, answer)
    pairs = xr.open_dataset(file, group="interband_heavy_hole")
    electrons = xr.open_dataset(file, group="levels").energy.values
    holes = xr.open_dataset(file, group="levels_heavy_hole").energy.values
    assert np.allclose(pairs.energy, electrons[:, None] + holes[None, :] + pairs.attrs["gap"], atol=1e-14)
    profile = xr.open_dataset(file, group="profile")
    # 2e11 cm^-2 over 12 nm
    assert np.isclose((profile.weight * profile.donor_density).sum() * 1e-7, 2e11, rtol=1e-12)

    file, answer = run("empty", EMPTY)
    check_whole(file)
    assert xr.open_dataset(file, group="levels").sizes["level"] == 0
    check_page(pages)
    print("all results were read by h5dump, ncdump, netCDF4, h5netcdf and xarray")


main()
shutil.rmtree(WORK)
