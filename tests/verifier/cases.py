"""The three folders of cases: accepted, rejected, malformed.

Each folder holds certificates and ``expected.json``, which gives for every file a part of the
claim or reason that the verifier must report. A hole found once stays here as a case.
"""

from __future__ import annotations

import json
from pathlib import Path

HERE = Path(__file__).parent
STATUSES = {"accepted": "valid", "rejected": "rejected", "malformed": "unreadable"}
EXIT_STATUSES = {"accepted": 0, "rejected": 1, "malformed": 2}


def expected(folder: str) -> dict[str, str]:
    """File name -> what the report must say."""
    reasons = json.loads((HERE / folder / "expected.json").read_text(encoding="utf-8"))
    assert isinstance(reasons, dict)
    return reasons


CASES = [(folder, name) for folder in STATUSES for name in expected(folder)]


def path_of(folder: str, name: str) -> Path:
    """The file of a case, its name with or without .json."""
    return HERE / folder / f"{name.removesuffix('.json')}.json"
