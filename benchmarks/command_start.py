"""How long the command takes from start to exit, as a user at a shell prompt waits for it.

    python -m benchmarks.command_start [--runs N]

Each command is run as a process of its own, in turn with the others, and the median wall time is
taken; the first round, which fills the caches of the disk, does not count. ``python -c pass`` is
the part that no Python program can go below.

Measured on two shared cores of a cloud machine, Python 3.11, with the load of one other process,
31 runs:

    command                                 median s   least s
    python -c pass                             0.009     0.008
    python -c 'import numpy'                   0.113     0.102
    braidsearch --help                         0.033     0.031
    braidsearch compare "1 1 1" "-1 -1 -1"     0.191     0.183
    braidsearch compare "2: 1 1" "3: 1 1"      0.191     0.185
    braidsearch compare "1 1 1" "1 2 1 2"      0.193     0.185

More than half of it is the import of numpy. With both cores busy the median was 0.30 s.
"""

from __future__ import annotations

import argparse
import statistics
import subprocess
import sys
import time

PYTHON = (sys.executable,)
COMMAND = (sys.executable, "-m", "braidsearch")

CASES: dict[str, tuple[str, ...]] = {
    "python -c pass": (*PYTHON, "-c", "pass"),
    "python -c 'import numpy'": (*PYTHON, "-c", "import numpy"),
    "braidsearch --help": (*COMMAND, "--help"),
    'braidsearch compare "1 1 1" "-1 -1 -1"': (*COMMAND, "compare", "1 1 1", "-1 -1 -1"),
    'braidsearch compare "2: 1 1" "3: 1 1"': (*COMMAND, "compare", "2: 1 1", "3: 1 1"),
    'braidsearch compare "1 1 1" "1 2 1 2"': (*COMMAND, "compare", "1 1 1", "1 2 1 2"),
}
EXPECTED_STATUS = (0, 0, 0, 1, 1, 0)
BOUND_SECONDS = 0.3
BOUNDED = 'braidsearch compare "1 1 1" "-1 -1 -1"'


def seconds_of(command: tuple[str, ...], status: int) -> float:
    """Wall time of one run; raises RuntimeError when it ends with another exit status."""
    begin = time.perf_counter()
    finished = subprocess.run(command, capture_output=True, check=False)
    taken = time.perf_counter() - begin
    if finished.returncode != status:
        raise RuntimeError(f"{command}: exit status {finished.returncode}, expected {status}")
    return taken


def measure(runs: int) -> dict[str, list[float]]:
    """The times of each case, the cases taken in turn so that noise falls on all alike."""
    times: dict[str, list[float]] = {name: [] for name in CASES}
    for turn in range(runs + 1):
        for (name, command), status in zip(CASES.items(), EXPECTED_STATUS, strict=True):
            taken = seconds_of(command, status)
            if turn:
                times[name].append(taken)
    return times


def main() -> int:
    """Print the table; exit status 1 when the bound is not kept."""
    parser = argparse.ArgumentParser(description=__doc__.splitlines()[0])
    parser.add_argument("--runs", type=int, default=21, help="runs of each command (21)")
    times = measure(parser.parse_args().runs)
    width = max(map(len, times))
    print(f"{'command':<{width}}  median s   least s")
    for name, taken in times.items():
        print(f"{name:<{width}}  {statistics.median(taken):8.3f}  {min(taken):8.3f}")
    median = statistics.median(times[BOUNDED])
    print(
        f"bound for {BOUNDED}: {BOUND_SECONDS} s, {'kept' if median < BOUND_SECONDS else 'BROKEN'}"
    )
    return 0 if median < BOUND_SECONDS else 1


if __name__ == "__main__":
    sys.exit(main())
