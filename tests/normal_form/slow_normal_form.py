"""A second, slow left normal form: positive words, divided letter by letter by word reversing.

No permutations take part: divisibility is decided by reversing sigma_i^-1 w with the rules
i^-1 i -> (nothing), i^-1 j -> j i^-1 for distant, i^-1 j -> j i j^-1 i^-1 for neighbouring
indices (Dehornoy, Groups with a complemented presentation, 1997); a positive prefix stays simple
as long as it divides the half twist.
"""

from braidsearch.words import Braid

Word = list[int]


def slow_normal_form(braid: Braid) -> tuple[int, list[Word]]:
    """The infimum and the factors, each a positive word."""
    strands = braid.strands
    word, power = _positive(list(braid.word), strands)
    factors: list[Word] = []
    while word:
        head, word = _split_head(word, strands)
        factors.append(head)
    full = strands * (strands - 1) // 2
    deltas = 0
    while factors and len(factors[0]) == full > 0:
        factors.pop(0)
        deltas += 1
    return deltas - power, factors


def half_twist(strands: int) -> Word:
    """A positive word for delta."""
    return [index for top in range(strands - 1, 0, -1) for index in range(1, top + 1)]


def _positive(word: Word, strands: int) -> tuple[Word, int]:
    """A positive word for delta^power * word, and the power."""
    positive: Word = []
    power = 0
    for letter in reversed(word):  # the deltas already in front of the rest flip this letter
        index = abs(letter)
        shown = index if power % 2 == 0 else strands - index
        if letter > 0:
            positive.insert(0, shown)
        else:
            # delta * sigma_i^-1 = sigma_(n-i)^-1 * delta, and sigma_i divides delta on the left
            positive = _divide(half_twist(strands), strands - shown) + positive
            power += 1
    return positive, power


def _divide(word: Word, letter: int) -> Word:
    """The positive word letter^-1 * word, for a letter that divides it."""
    quotient = _left_quotient(word, letter)
    if quotient is None:
        raise ValueError("the letter does not divide the word")
    return quotient


def _left_quotient(word: Word, letter: int) -> Word | None:
    """The positive word letter^-1 * word, or None when the letter does not divide the word."""
    pending = [-letter, *word]
    while True:
        place = next((i for i in range(len(pending) - 1) if pending[i] < 0 < pending[i + 1]), None)
        if place is None:
            return pending if all(item > 0 for item in pending) else None
        i, j = -pending[place], pending[place + 1]
        if i == j:
            pending[place : place + 2] = []
        elif abs(i - j) > 1:
            pending[place : place + 2] = [j, -i]
        else:
            pending[place : place + 2] = [j, i, -j, -i]


def _split_head(word: Word, strands: int) -> tuple[Word, Word]:
    """The greatest common divisor with delta, letter by letter, and what remains of the word."""
    head: Word = []
    twist = half_twist(strands)  # what is left of delta after the head
    grown = True
    while grown:
        grown = False
        for letter in range(1, strands):
            rest, room = _left_quotient(word, letter), _left_quotient(twist, letter)
            if rest is not None and room is not None:
                head, word, twist, grown = [*head, letter], rest, room, True
                break
    return head, word
