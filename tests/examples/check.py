# SPDX-License-Identifier: Apache-2.0
"""Runs the command on one example and compares the result file with the example's expected.yaml; then compares the
estimates of estimates.py with the same numbers. Usage: check.py PROGRAM EXAMPLE_FOLDER

A number of expected.yaml names a dataset and, by the values of its axes, one element of it: {dataset: levels/energy,
at: {level: 2}}; `minus` names a second element that is taken off; or a group's attribute: {group: /, attribute: title}.
`from` says where the value comes from; `estimate` names the entry of estimates.py that gives it too."""
import os
import subprocess
import sys
import tempfile

import h5py
import yaml

sys.path.insert(0, os.path.dirname(os.path.abspath(__file__)))
import estimates  # noqa: E402

allowed = {"name", "dataset", "at", "minus", "group", "attribute", "unit", "value", "tolerance", "from", "estimate"}


def element(dataset, at):
    index = []
    for dimension in dataset.dims:
        scale = dimension[0]
        axis = scale.name.split("/")[-1]
        wanted = at.pop(axis) if axis in at else None
        if wanted is None:
            raise KeyError(f"{dataset.name} has an axis {axis} that `at` does not name")
        values = scale[...]
        nearest = abs(values - wanted).argmin()
        if abs(values[nearest] - wanted) > 1e-6 + 1e-3 * abs(wanted):
            raise KeyError(f"{dataset.name}: no {axis} = {wanted}")
        index.append(nearest)
    if at:
        raise KeyError(f"{dataset.name} has no axis {', '.join(at)}")
    return float(dataset[tuple(index)])


def computed(file, number):
    if "attribute" in number:
        return float(file[number["group"]].attrs[number["attribute"]])
    dataset = file[number["dataset"]]
    unit = dataset.attrs["units"]
    unit = unit.decode() if isinstance(unit, bytes) else unit
    if unit != number["unit"]:
        raise KeyError(f"{number['dataset']} is in {unit}, not {number['unit']}")
    value = element(dataset, dict(number.get("at", {})))
    if "minus" in number:
        value -= element(dataset, dict(number["minus"]))
    return value


def main(program, folder):
    with open(os.path.join(folder, "expected.yaml"), encoding="utf-8") as text:
        expected = yaml.safe_load(text)
    guessed = estimates.by_example[os.path.basename(folder)[:3]]()
    used, wrong = set(), 0
    for run in expected["runs"]:
        with tempfile.TemporaryDirectory() as scratch:
            target = os.path.join(scratch, "result.h5")
            command = [program, "run", os.path.join(folder, "study.yaml"), "-o", target, "--quiet"]
            for setting in run.get("set", []):
                command += ["--set", setting]
            done = subprocess.run(command, capture_output=True, text=True)
            if done.returncode != 0:
                print(" ".join(command), "ended with", done.returncode, done.stdout, done.stderr, sep="\n")
                return 1
            print("settings:", ", ".join(run.get("set", [])) or "none")
            with h5py.File(target, "r") as file:
                for number in run["numbers"]:
                    if set(number) - allowed or "from" not in number:
                        raise KeyError(f"{number['name']}: wants `from`, knows no {set(number) - allowed}")
                    checks = [("program", computed(file, number))]
                    if "estimate" in number:
                        used.add(number["estimate"])
                        checks.append(("estimate", guessed[number["estimate"]]))
                    expected, tolerance = float(number["value"]), float(number["tolerance"])  # YAML 1.1: 1e-7 is text
                    for who, value in checks:
                        fine = abs(value - expected) <= tolerance
                        wrong += not fine
                        print(f"  {'' if fine else 'WRONG '}{number['name']}: {who} {value:.9g}, expected "
                              f"{expected:.9g} within {tolerance:.2g} {number['unit']}")
    unused = set(guessed) - used
    if unused:
        print("estimates that no number uses:", ", ".join(sorted(unused)))
        wrong += 1
    return 1 if wrong else 0


if __name__ == "__main__":
    sys.exit(main(sys.argv[1], os.path.abspath(sys.argv[2])))
