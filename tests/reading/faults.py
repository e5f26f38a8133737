# SPDX-License-Identifier: Apache-2.0
"""A disk that fills up, a kill while writing, files that are not ours: the old result stays whole.

Usage: faults.py WELLWRIGHT SOURCE_FOLDER
"""
import os
import pathlib
import resource
import shutil
import signal
import subprocess
import sys
import tempfile
import time

PROGRAM, SOURCE = sys.argv[1], pathlib.Path(sys.argv[2])
WORK = pathlib.Path(tempfile.mkdtemp())
SMALL = """
layers: [{material: Al0.3Ga0.7As, thickness: 20 nm}, {material: GaAs, thickness: 8 nm}, {material: Al0.3Ga0.7As, thickness: 20 nm}]
model: {levels: 2}
"""
# A map of some 100 MB.
LARGE = SMALL + """
dynamics: {start: {mix: [{level: 1, amplitude: 1}, {level: 2, amplitude: 1}]}, duration: 10 ps, samples: 60000}
"""


def run(*arguments, **keywords):
    return subprocess.run([PROGRAM, "run", *map(str, arguments)], capture_output=True, text=True, cwd=WORK, **keywords)


def limited(size):
    def prepare():
        signal.signal(signal.SIGXFSZ, signal.SIG_IGN)
        resource.setrlimit(resource.RLIMIT_FSIZE, (size, size))
    return prepare


def leftovers():
    return [path.name for path in WORK.iterdir() if "unfinished" in path.name]


def same_motion(one, other):
    """Two files of one size and, where the tool is installed, of equal numbers; the times in them differ."""
    if one.stat().st_size != other.stat().st_size:
        return False
    tool = shutil.which("h5diff")
    return not tool or subprocess.run([tool, one, other, "/dynamics", "/dynamics"]).returncode == 0


def main():
    small, large, out = WORK / "small.yaml", WORK / "large.yaml", WORK / "out.h5"
    small.write_text(SMALL)
    large.write_text(LARGE)
    assert run(small, "-o", out).returncode == 0
    whole = out.read_bytes()

    for study, size in ((small, 20_000), (large, 5_000_000)):
        full = run(study, "-o", out, preexec_fn=limited(size))
        assert full.returncode == 4, (full.returncode, full.stderr)
        assert "cannot be written" in full.stderr and "HDF5" not in full.stderr, full.stderr
        assert len(full.stderr.splitlines()) == 1, full.stderr
        assert out.read_bytes() == whole and not leftovers()
        fresh = WORK / "fresh.h5"
        assert run(study, "-o", fresh, preexec_fn=limited(size)).returncode == 4
        assert not fresh.exists() and not leftovers()

    # A kill that comes after the renaming finds the new result in place: that one is whole then.
    new = WORK / "new.h5"
    assert run(large, "-o", new).returncode == 0
    killed = 0
    for wait in (0.05, 0.1, 0.15, 0.2, 0.3, 0.4, 0.6):
        process = subprocess.Popen([PROGRAM, "run", large, "-o", out, "--quiet"], cwd=WORK)
        time.sleep(wait)
        process.kill()
        killed += process.wait() == -signal.SIGKILL
        assert out.read_bytes() == whole or same_motion(out, new), f"neither old nor new after {wait} s"
        for name in leftovers():
            (WORK / name).unlink()
        out.write_bytes(whole)
    assert killed > 0, "no run was slow enough to be killed"

    foreign = WORK / "foreign.h5"
    for content in (b"", b"measured by hand, keep me", whole[:100]):
        foreign.write_bytes(content)
        refused = run(small, "-o", foreign)
        assert refused.returncode == 4 and foreign.read_bytes() == content, refused.stderr
    (WORK / "folder.h5").mkdir()
    assert run(small, "-o", WORK / "folder.h5").returncode == 4
    assert run(small, "-o", WORK / "nowhere" / "out.h5").returncode == 4
    os.mkfifo(WORK / "pipe.h5")
    for special, kind in ((WORK / "pipe.h5", "a named pipe"), ("/dev/null", "a device")):
        refused = run(small, "-o", special, timeout=20)
        assert refused.returncode == 4 and f"{special}: this is {kind}" in refused.stderr, refused.stderr
    (WORK / "link.h5").symlink_to("out.h5")
    assert run(small, "-o", WORK / "link.h5").returncode == 0
    assert (WORK / "link.h5").is_symlink() and not out.is_symlink()
    damaged = WORK / "damaged.h5"
    damaged.write_bytes(whole[:len(whole) // 2])
    refused = run(small, "-o", damaged)
    assert refused.returncode == 4 and "is damaged" in refused.stderr, refused.stderr
    assert not leftovers()

    tables = WORK / "tables"
    tables.mkdir()
    (tables / "levels.csv").write_text("my own notes\n")
    refused = run(small, "-o", out, "--csv", tables)
    assert refused.returncode == 4, refused.stderr
    assert (tables / "levels.csv").read_text() == "my own notes\n"
    assert [path.name for path in tables.iterdir()] == ["levels.csv"]

    if os.geteuid() == 0:
        print("note: as root every folder can be written to; the unwritable one was not tried")
    else:
        closed = WORK / "closed"
        closed.mkdir(mode=0o555)
        assert run(small, "-o", closed / "out.h5").returncode == 4
    print("the old result stayed whole")


try:
    main()
finally:
    shutil.rmtree(WORK, ignore_errors=True)
