"""The finer invariants with parameters, as the tests of laws and of second routes take them."""

from __future__ import annotations

from typing import Any

from tests.verifier.permutation_groups import A4, A4_BOTH, S3, S3_ROTATIONS

SAMPLES: dict[str, tuple[str, dict[str, Any]]] = {
    "colouring S3": ("colouring", S3),
    "colouring S3, two classes": ("colouring", S3_ROTATIONS),
    "colouring A4": ("colouring", A4),
    "colouring A4, three classes": ("colouring", A4_BOTH),
    "signature at -1": ("levine-tristram", {"order": 2, "power": 1}),
    "signature at order 3": ("levine-tristram", {"order": 3, "power": 1}),
    "signature at order 10": ("levine-tristram", {"order": 10, "power": 3}),
    "signature at order 60": ("levine-tristram", {"order": 60, "power": 17}),
    "module over F_2": ("alexander-module", {"prime": 2}),
    "module over F_3": ("alexander-module", {"prime": 3}),
    "module over F_7": ("alexander-module", {"prime": 7}),
    "Jones of pairs": ("sublinks", {"components": 2, "invariant": "jones"}),
    "colourings of knots": ("sublinks", {"components": 1, "invariant": "colouring", **S3}),
}
