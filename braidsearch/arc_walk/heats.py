"""Heats of a walk, drawn from ranges by a seed: a few splits among swaps, then cooling."""

from __future__ import annotations

from dataclasses import dataclass

from braidsearch.arc_walk.walking import Phase


@dataclass(frozen=True, slots=True)
class HeatRange:
    """How hot heats are: least and most tries and splits, and the tries of the cooling after."""

    tries: tuple[int, int]
    splits: tuple[int, int]
    settling: int

    def plan(self, seed: int, exchanges: float, times: int = 1) -> tuple[Phase, Phase]:
        """A heat and the cooling after it; ``exchanges`` is the share of exchange moves made.

        ``times`` as many tries and splits as the ranges say are made.
        """
        least, most = self.tries
        fewest, largest = self.splits
        tries = least + seed % (most - least + 1)
        splits = fewest + seed // 1024 % (largest - fewest + 1)
        heat = Phase(times * tries, times * splits, merges=0.0, exchanges=exchanges)
        return heat, Phase(times * self.settling, exchanges=exchanges)
