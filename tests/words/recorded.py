#!/usr/bin/env python3
# SPDX-License-Identifier: Apache-2.0
"""Recorded runs of the command: one file a mistake or a warning, with its exit code and the exact text on standard error.

    recorded.py PROGRAM [--record] [CASE...]

A case holds what the mistake is, the files it needs, the command line, the exit code and the texts:

    A thickness without its unit.
    == file study.yaml
    layers: [{material: GaAs, thickness: 10}]
    == command
    wellwright run study.yaml
    == exit 2
    == errors
    study.yaml:1:38: ...

`== bytes NAME` holds a Python expression for the bytes of a file, `== output` the text on standard output
(empty where it is left out). Each case runs in a folder of its own, and nothing in it may change but for the
files that `== writes NAME` names. With --record the exit code and the texts are written into the case instead of
compared: read them as a user would.
"""
import difflib
import os
import pathlib
import shlex
import subprocess
import sys
import tempfile

SECONDS = 60  # generous for a build with sanitizers


def sections(text):
    """The description and the list of (head, body)."""
    parts = [["", []]]
    for line in text.split("\n"):
        if line.startswith("== "):
            parts.append([line[3:].strip(), []])
        else:
            parts[-1][1].append(line)
    bodies = [(head, "\n".join(lines)) for head, lines in parts]
    # A section ends where the next one begins: its last line feed belongs to the file format.
    return bodies[0][1], [(head, body + "\n" if body else "") for head, body in bodies[1:]]


class Case:
    def __init__(self, path):
        self.path = path
        self.about, parts = sections(path.read_text().removesuffix("\n"))
        self.files, self.exit, self.errors, self.output, self.command = {}, None, "", "", None
        self.writes = []
        for head, body in parts:
            word, _, rest = head.partition(" ")
            if word == "file":
                self.files[rest] = body.encode()
            elif word == "bytes":
                self.files[rest] = eval(body.strip(), {})  # an expression of this repository
            elif word == "writes":
                self.writes.append(rest)
            elif word == "command":
                self.command = body.strip()
            elif word == "exit":
                self.exit = int(rest)
            elif word == "errors":
                self.errors = body
            elif word == "output":
                self.output = body
            else:
                raise SystemExit(f"{path}: unknown section `== {head}`")
        if self.command is None:
            raise SystemExit(f"{path}: no command")

    def run(self, program):
        with tempfile.TemporaryDirectory() as folder:
            root = pathlib.Path(folder)
            for name, content in self.files.items():
                (root / name).parent.mkdir(parents=True, exist_ok=True)
                (root / name).write_bytes(content)
            before = state(root)
            words = shlex.split(self.command)
            if words[0] != "wellwright":
                raise SystemExit(f"{self.path}: the command is not wellwright")
            done = subprocess.run([program, *words[1:]], cwd=root, capture_output=True, timeout=SECONDS,
                                  stdin=subprocess.DEVNULL)
            changed = describe_change(before, state(root))
        return done.returncode, done.stderr.decode(errors="replace"), done.stdout.decode(errors="replace"), changed

    def record(self, code, errors, output):
        text = self.path.read_text()
        text = text[: text.index("\n== exit") + 1] if "\n== exit" in text else text.rstrip("\n") + "\n"
        text += f"== exit {code}\n== errors\n{errors}"
        if output:
            text += f"== output\n{output}"
        self.path.write_text(text)


def state(root):
    return {str(p.relative_to(root)): (p.read_bytes() if p.is_file() else None, p.stat().st_mtime_ns if p.is_file() else 0)
            for p in root.rglob("*")}


def describe_change(before, after):
    return sorted(name for name in before.keys() | after.keys() if before.get(name) != after.get(name))


def difference(what, wanted, got):
    return "".join(difflib.unified_diff(wanted.splitlines(True), got.splitlines(True), f"recorded {what}", f"this {what}"))


def main():
    arguments = [a for a in sys.argv[1:] if a != "--record"]
    recording = "--record" in sys.argv
    program = os.path.abspath(arguments[0])
    here = pathlib.Path(__file__).parent
    cases = [pathlib.Path(a) for a in arguments[1:]] or sorted(here.glob("*/*.txt"))
    failed = 0
    for path in cases:
        case = Case(path)
        try:
            code, errors, output, changed = case.run(program)
        except subprocess.TimeoutExpired:
            code, errors, output, changed = None, f"still running after {SECONDS} s\n", "", []
        trouble = ""
        if changed != sorted(case.writes):
            trouble += f"changed on disk: {', '.join(changed) or 'nothing'}; recorded: {', '.join(case.writes) or 'nothing'}\n"
        if recording:
            case.record(code, errors, output)
        else:
            if code != case.exit:
                trouble += f"exit code {code}, recorded {case.exit}\n"
            trouble += difference("errors", case.errors, errors) + difference("output", case.output, output)
        if code not in (2, 3, 4) and not (code == 0 and errors.startswith("warning: ")):
            trouble += f"exit code {code} is none of a mistake, and no warning was given\n"
        if trouble:
            failed += 1
            print(f"{path.parent.name}/{path.stem}: {case.about.strip()}\n{trouble}")
    print(f"{len(cases) - failed} of {len(cases)} mistakes and warnings answered as recorded")
    return 1 if failed or not cases else 0


if __name__ == "__main__":
    sys.exit(main())
