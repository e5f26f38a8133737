#!/usr/bin/env python3
# SPDX-License-Identifier: Apache-2.0
"""Runs the commands of docs/tutorial.md in one folder and compares what they print; the same for the README's first run.

    pages.py WELLWRIGHT SOURCE_FOLDER

In the tutorial a fenced block that begins ```yaml NAME or ```python NAME is a file, written as it stands. In a block
that begins ```console a line "$ ..." is a command, what follows is all it prints, on both streams; a line "..." stands
for any lines. Sizes of files, versions and error estimates differ between machines and are compared by form alone. With
WELLWRIGHT_WRITE_PAGES set the outputs without "..." are written anew: read them before they are committed.
"""
import difflib
import os
import pathlib
import re
import shlex
import shutil
import subprocess
import sys
import tempfile

SECONDS = 60
LOOSE = [(r"\(\d[\d.]* [kM]B\)", "(SIZE)"), (r"error estimate \d[\d.e-]* eV", "error estimate ERROR eV")]
FENCE = re.compile(r"^```(\w+) ?([^\n]*)\n(.*?)^```$", re.M | re.S)


def plain(text):
    for pattern, word in LOOSE:
        text = re.sub(pattern, word, text)
    return text


def matches(wanted, got):
    """Whether `got` is `wanted`, in which "..." stands for any lines."""
    parts = [re.escape(part) for part in re.split(r"^\.\.\.\n", plain(wanted), flags=re.M)]
    return re.fullmatch(r"(?:.*\n)*?".join(parts), plain(got)) is not None


def run(command, folder, tools):
    done = subprocess.run(["/bin/sh", "-c", command], cwd=folder, stdin=subprocess.DEVNULL, stdout=subprocess.PIPE,
                          stderr=subprocess.STDOUT, timeout=SECONDS, text=True,
                          env={"PATH": f"{tools}:/usr/bin:/bin", "LC_ALL": "C.UTF-8", "HOME": str(folder)})
    return done.stdout


def complain(page, command, wanted, got):
    print(f"{page}: $ {command}")
    print("".join(difflib.unified_diff(plain(wanted).splitlines(True), plain(got).splitlines(True), "page", "printed")))


def tutorial(source, folder, tools):
    """The number of commands, and of those that print something else than the page says."""
    path = source / "docs/tutorial.md"
    page = path.read_text()
    commands = failed = 0

    def as_printed(block):  # the block with the outputs of now
        nonlocal commands, failed
        kind, name, body = block.groups()
        if name:
            (folder / name).write_text(body)
            return block.group()
        if kind != "console":
            raise SystemExit(f"docs/tutorial.md: a block `{kind}` without a name is neither a file nor a run")
        text = "```console\n"
        for part in re.split(r"^\$ ", body, flags=re.M)[1:]:
            command, _, wanted = part.partition("\n")
            commands += 1
            got = run(command, folder, tools)
            if not matches(wanted, got):
                failed += 1
                complain("docs/tutorial.md", command, wanted, got)
                wanted = wanted if "...\n" in wanted else got
            text += f"$ {command}\n{wanted}"
        return text + "```"

    now = FENCE.sub(as_printed, page)
    if os.environ.get("WELLWRIGHT_WRITE_PAGES"):
        path.write_text(now)
    return commands, failed


def first_run(source, folder, tools):
    """The summary that the README shows after "It prints" is that of the first example."""
    page = (source / "README.md").read_text()
    block = page.split("It prints\n\n", 1)[1].split("\n\n\n")[0]
    lines = []
    for line in block.split("\n"):
        if line and not line.startswith("    "):
            break
        lines.append(line[4:])
    wanted = "\n".join(lines).rstrip("\n") + "\n"
    shutil.copytree(source / "examples", folder / "examples", ignore=shutil.ignore_patterns("*.h5"))
    command = f"wellwright run {shlex.quote('examples/010-coupled-wells/study.yaml')}"
    got = run(command, folder, tools)
    if not matches(wanted, got):
        complain("README.md", command, wanted, got)
        return 1, 1
    return 1, 0


def main():
    program, source = os.path.abspath(sys.argv[1]), pathlib.Path(sys.argv[2])
    missing = [tool for tool in ("h5dump",) if not shutil.which(tool)]
    if subprocess.run(["/usr/bin/python3", "-c", "import xarray, h5netcdf"], capture_output=True).returncode:
        missing.append("xarray")
    if missing:
        print(f"skipped: not installed: {', '.join(missing)}")
        return 77
    commands = failed = 0
    with tempfile.TemporaryDirectory() as tools:
        os.symlink(program, f"{tools}/wellwright")
        os.symlink("/usr/bin/python3", f"{tools}/python3")
        for page in (tutorial, first_run):
            with tempfile.TemporaryDirectory() as folder:
                run_here, failed_here = page(source, pathlib.Path(folder), tools)
                commands, failed = commands + run_here, failed + failed_here
    print(f"{commands - failed} of {commands} commands print what the pages say")
    return 1 if failed or commands < 2 else 0


if __name__ == "__main__":
    sys.exit(main())
