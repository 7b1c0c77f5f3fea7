"""Without a working compiler the plain loops give the same diagrams."""

import os
import subprocess
import sys
from pathlib import Path

import pytest

import braidsearch

SCRIPT = """
import sys
{prelude}
import numpy as np
from braidsearch.diagrams.polygons import polygon_diagram
from braidsearch.diagrams.polygons.loops import load_loops
generator = np.random.default_rng(3)
first, second = generator.uniform(size=(2, 12, 3))
for polygons in ([first], [first, second], [np.round(20 * first), 20 * second]):
    for is_simplified in (True, False):
        print(polygon_diagram(polygons, directions=2, is_simplified=is_simplified))
print(hasattr(load_loops().find_crossings, "signatures"), file=sys.stderr)
"""


@pytest.mark.parametrize(
    "prelude",
    [
        "sys.modules['numba'] = None",
        "import os; os.environ['NUMBA_DISABLE_JIT'] = '1'",
        "import numba\nnumba.njit = lambda *a, **k: (lambda f: lambda *b: 1 / 0)",
    ],
    ids=["not installed", "switched off", "failing"],
)
def test_plain_loops_draw_the_same_diagrams(prelude: str) -> None:
    """Doubles are doubles: compiled and plain loops agree on every decision."""
    plain = _run(SCRIPT.format(prelude=prelude))
    assert plain.stderr.strip().endswith("False")
    compiled = _run(SCRIPT.format(prelude=""))
    assert compiled.stderr.strip().endswith("True")
    assert plain.stdout == compiled.stdout
    assert len(plain.stdout.splitlines()) == 6


def _run(script: str) -> subprocess.CompletedProcess[str]:
    place = str(Path(braidsearch.__file__).parents[1])
    return subprocess.run(
        [sys.executable, "-c", script],
        capture_output=True,
        text=True,
        check=True,
        timeout=600,
        env=os.environ | {"PYTHONPATH": place},
    )
