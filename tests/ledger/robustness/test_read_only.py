"""Ledgers that may be read and not written: on a disk or in a folder of somebody else."""

import ctypes
import os
import shutil
import subprocess
import sys
import tempfile
from collections.abc import Iterator
from pathlib import Path

import pytest

from tests.command_line.running import environment
from tests.ledger.ledgers import make_ledger

PR_CAPBSET_DROP, CAP_DAC_OVERRIDE = 24, 1  # linux/prctl.h, linux/capability.h

pytestmark = pytest.mark.skipif(
    sys.platform != "linux", reason="permissions bind the superuser only where they can be dropped"
)


@pytest.fixture
def ledger() -> Iterator[Path]:
    """A sorted ledger in a folder in which nobody but the superuser may write."""
    folder = Path(tempfile.mkdtemp())
    path = make_ledger(folder / "plants ?.ledger")
    path.chmod(0o444)
    folder.chmod(0o555)
    yield path
    folder.chmod(0o755)
    shutil.rmtree(folder)


def obey_permissions() -> None:
    """Let permissions bind the process that is started now, even that of the superuser."""
    if os.geteuid() == 0:
        ctypes.CDLL(None).prctl(PR_CAPBSET_DROP, CAP_DAC_OVERRIDE, 0, 0, 0)


def run(*arguments: str) -> subprocess.CompletedProcess[str]:
    """Run a command as somebody who may not do all."""
    return subprocess.run(
        [sys.executable, "-m", "braidsearch", "ledger", *arguments],
        capture_output=True,
        text=True,
        check=False,
        timeout=120,
        preexec_fn=obey_permissions,
        env=environment(),
    )


@pytest.mark.parametrize(
    ("action", "arguments", "status"),
    [
        ("report", (), 0),
        ("find", ("1 2 1 2",), 0),
        ("proof", ("burdock", "bench/thistle"), 0),
        ("check", (), 0),
    ],
)
def test_a_ledger_in_a_folder_without_permission_is_read(
    action: str, arguments: tuple[str, ...], status: int, ledger: Path
):
    """Whatever changes nothing works, and leaves nothing behind."""
    done = run(action, str(ledger), *arguments)
    assert (done.returncode, done.stderr) == (status, "")
    assert [one.name for one in ledger.parent.iterdir()] == [ledger.name]


def test_what_would_change_it_is_refused_in_one_line(ledger: Path, tmp_path: Path):
    """A link cannot be entered there."""
    file = tmp_path / "one.txt"
    file.write_text("1 1 1 1 1 1 1\n", encoding="utf-8")
    before = ledger.read_bytes()
    done = run("add", str(ledger), str(file))
    assert done.returncode == 2
    assert "no permission to write" in done.stderr
    assert done.stderr.count("\n") == 1
    assert ledger.read_bytes() == before
