#!/usr/bin/env python3
# SPDX-License-Identifier: Apache-2.0
"""What the command does on a terminal and off it: widths, the progress bar, warnings, an interrupt, JSON, threads.

    terminal.py PROGRAM
"""
import fcntl
import json
import os
import pathlib
import pty
import re
import signal
import struct
import subprocess
import sys
import tempfile
import termios
import time

PROGRAM = os.path.abspath(sys.argv[1])
WELL = """title: A well with a graded side
substrate: InP
layers:
  - {material: Al0.48In0.52As, thickness: 10 nm}
  - repeat: 2
    layers:
      - {material: In0.6Ga0.4As, thickness: 6 nm, name: a well with a rather long name}
      - {material: Al0.48In0.52As, thickness: 8 nm, donors: 1e17 cm^-3}
  - {graded: {from: Al0.48In0.52As, to: In0.53Ga0.47As, shape: parabolic}, thickness: 5 nm}
  - {material: Al0.48In0.52As, thickness: 10 nm}
model: {carrier: [electron, heavy hole], levels: 3}
"""
WARNED = "layers:\n  - {material: GaAs, thickness: 20 nm, donors: 1e10 cm^-2}\n"  # dopants at the hard faces
# Work of some seconds: many levels of a long stack of unequal wells.
LONG = "layers:\n" + "".join(f"  - {{material: Al0.3Ga0.7As, thickness: 3 nm}}\n  - {{material: GaAs, thickness: {6 + 0.001 * i:.3f} nm}}\n"
                             for i in range(1200)) + "model: {levels: 40, bands: one}\n"


def on_terminal(columns, *arguments, interrupt_after=None):
    """Exit code and text of the command with both outputs on one terminal of that width."""
    master, slave = pty.openpty()
    fcntl.ioctl(slave, termios.TIOCSWINSZ, struct.pack("HHHH", 24, columns, 0, 0))
    process = subprocess.Popen([PROGRAM, *arguments], stdout=slave, stderr=slave, stdin=subprocess.DEVNULL)
    os.close(slave)
    if interrupt_after is not None:
        time.sleep(interrupt_after)
        process.send_signal(signal.SIGINT)
    text = b""
    while True:
        try:
            part = os.read(master, 1 << 16)
        except OSError:
            break
        if not part:
            break
        text += part
    os.close(master)
    return process.wait(), text.decode().replace("\r\n", "\n")


def piped(*arguments):
    done = subprocess.run([PROGRAM, *arguments], capture_output=True, text=True, stdin=subprocess.DEVNULL)
    return done.returncode, done.stdout, done.stderr


def require(holds, what):
    if not holds:
        raise SystemExit(f"not so: {what}")
    print(f"fine: {what}")


def widths():
    for command in (["run", "well.yaml", "-o", "width.h5"], ["check", "well.yaml"], ["materials", "In0.6Ga0.4As", "--substrate", "InP"],
                    ["materials"]):
        for columns in (60, 80, 100, 160):
            code, text = on_terminal(columns, *command)
            widest = max(text.split("\n"), key=len)
            require(code == 0 and len(widest) <= columns, f"{command[0]} fits {columns} columns ({len(widest)}: {widest!r})")
    code, output, _ = piped("run", "well.yaml", "-o", "width.h5")
    require(max(map(len, output.split("\n"))) <= 100, "without a terminal 100 columns are kept")


def warnings():
    code, output, errors = piped("run", "warned.yaml")
    require("warning: " in errors and "Warnings" in output, "warnings go to standard error and stand in the summary")
    code, text = on_terminal(100, "run", "warned.yaml")
    require("Warnings" in text and "warning: " not in text, "on one terminal they are printed once")
    code, output, errors = piped("run", "warned.yaml", "--quiet")
    require(output == "" and "warning: " in errors, "--quiet keeps them on standard error")


def progress():
    code, output, errors = piped("run", "long.yaml", "--quiet")
    require(code == 0 and "\x1b" not in errors, "no bar where standard error is no terminal")
    code, text = on_terminal(80, "run", "well.yaml")
    require("[K" not in text, "no bar for work shorter than a second")


def interrupt():
    before = sorted(os.listdir("."))
    code, text = on_terminal(80, "run", "long.yaml", "-o", "stopped.h5", interrupt_after=0.5)
    require(code == 130 and "stopped; nothing was written" in text, f"an interrupt stops the work ({code})")
    require(sorted(os.listdir(".")) == before, "and leaves nothing behind")


def objects():
    code, output, _ = piped("run", "well.yaml", "-o", "json.h5", "--json")
    require(code == 0 and json.loads(output), "run --json is one JSON object")
    code, output, _ = piped("check", "well.yaml", "--json")
    checked = json.loads(output)
    require(len(checked["layers"]) == 7 and abs(checked["length"] - 53) < 1e-9, "check --json has the layers")
    code, output, _ = piped("materials", "Al0.3Ga0.7As", "--temperature", "77K", "--json")
    keys = {value["key"]: value for value in json.loads(output)["values"]}
    require(keys["band_gap"]["unit"] == "eV" and keys["band_gap"]["source"], "materials --json has values with sources")
    code, output, _ = piped("materials", "InGaAs", "--matched-to", "InP", "--json")
    # In0.53Ga0.47As on InP: common practice.
    require(abs(json.loads(output)["composition"] - 0.53) < 0.01, "In0.53Ga0.47As matches InP")


def threads():
    one = piped("run", "well.yaml", "-o", "threads.h5", "--json", "--threads", "1")[1]
    four = piped("run", "well.yaml", "-o", "threads.h5", "--json", "--threads", "4")[1]
    require(one == four, "the answer does not depend on the number of threads")


def output_lost():
    with open("/dev/full", "w") as full:
        done = subprocess.run([PROGRAM, "check", "well.yaml"], stdout=full, stderr=subprocess.PIPE, text=True)
    require(done.returncode == 4 and "standard output" in done.stderr, "a full disk behind standard output is said")


def main():
    with tempfile.TemporaryDirectory() as folder:
        os.chdir(folder)
        for name, text in (("well", WELL), ("warned", WARNED), ("long", LONG)):
            pathlib.Path(f"{name}.yaml").write_text(text)
        for test in (widths, warnings, progress, interrupt, objects, threads, output_lost):
            test()
        code, text = on_terminal(80, "run", "long.yaml")
        require(code == 0 and re.search(r"\[=* *\] +\d+ %", text), "a bar for longer work on a terminal")
        os.chdir("/")


if __name__ == "__main__":
    main()
