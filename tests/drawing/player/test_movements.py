"""The parts into which a step is taken for the eye lead from its word to its word."""

from typing import Any

from hypothesis import given

from braidsearch.drawing.player.movements import MOST_PARTS, Budget, movement_parts
from braidsearch.moves import Conjugate, MoveChain, Rewrite
from braidsearch.moves.elementary_relations import Relation, apply_relation
from braidsearch.words import Braid
from tests.strategies import move_chains

Word = tuple[int, ...]


def apply_part(word: Word, part: list[Any]) -> Word:
    """The word after a part, by what its kind says."""
    kind, *values = part
    if kind == "relation":
        at, before, after = values
        return apply_relation(word, Relation(at, tuple(before), tuple(after)))
    if kind == "turn":
        turn = values[0] % len(word)
        return word[turn:] + word[:turn]
    if kind == "conjugation":
        return (-values[0], *word, values[0])
    if kind == "stabilization":
        return (*word, values[0])
    if kind == "destabilization":
        assert word[-1] == values[0]
        return word[:-1]
    if kind == "stay":
        return word
    assert kind == "rewriting"
    return tuple(values[0])


@given(move_chains())
def test_parts_lead_from_word_to_word(chain: MoveChain) -> None:
    """Of every move of any chain; each relation is one, and applies where it says."""
    for before, move in zip(chain.braids, chain.moves, strict=False):
        components = list(range(9))
        parts = movement_parts(before, move, components, Budget())
        assert parts
        word = before.word
        for part in parts:
            word = apply_part(word, part)
        assert word == move.word


def test_rotations_turn_at_once() -> None:
    """A conjugation that turns the word as a cycle is one part, the shorter way around."""
    braid = Braid([1, 2, 3, -2, 1])
    for turn, expected in ((1, 1), (2, 2), (3, -2), (4, -1)):
        word = braid.word[turn:] + braid.word[:turn]
        move = Conjugate(braid.word[:turn], word)
        assert movement_parts(braid, move, [], Budget()) == [["turn", expected]]


def test_what_is_too_much_is_one_change() -> None:
    """Long words, many relations, and what is beyond the page's budget, change in one part."""
    twist = Braid((1, 2, 3) * 40, 4)
    move = Rewrite((3, 2, 1) * 40)
    assert movement_parts(twist, move, [0], Budget()) == [["rewriting", list(move.word), [0]]]
    braid, small = Braid([1, 2, 1]), Rewrite((2, 1, 2))
    assert movement_parts(braid, small, [0], Budget(0)) == [["rewriting", [2, 1, 2], [0]]]
    budget = Budget()
    assert movement_parts(braid, small, [0], budget) == [["relation", 0, [1, 2, 1], [2, 1, 2]]]
    assert budget.parts == Budget().parts - 1
    assert Budget().parts > MOST_PARTS
