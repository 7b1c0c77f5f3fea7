"""What was drawn up: which link every entry of the two catalogues is, and how it was disguised.

Only ``make_catalogues.py`` and the tests read this file. What the ledger finds must be what stands
here, and ``merge.py`` never looks at it.
"""

from __future__ import annotations

from dataclasses import dataclass

Word = tuple[int, ...]

LINKS: dict[str, tuple[int, Word]] = {
    "unknot": (1, ()),
    "3_1": (2, (1, 1, 1)),
    "4_1": (3, (1, -2, 1, -2)),
    "5_1": (2, (1, 1, 1, 1, 1)),
    "5_2": (3, (1, 1, 1, 2, -1, 2)),
    "6_1": (4, (1, 1, 2, -1, -3, 2, -3)),
    "6_2": (3, (1, 1, 1, -2, 1, -2)),
    "6_3": (3, (1, 1, -2, 1, -2, -2)),
    "7_4": (4, (1, 1, 2, -1, 2, 2, 3, -2, 3)),
    "7_7": (4, (1, -2, 1, -2, 3, -2, 3)),
    "8_17": (3, (-1, -1, 2, -1, 2, -1, 2, 2)),
    "8_19": (3, (1, 1, 1, 2, 1, 1, 1, 2)),
    "8_20": (3, (1, 1, 1, -2, -1, -1, -1, -2)),
    "9_32": (4, (1, 1, -2, 1, -2, 1, 3, -2, 3)),
    "10_161": (3, (-1, -1, -1, -2, 1, -2, -1, -1, -2, -2)),
    "11n_34": (4, (-1, -1, 2, -1, 2, -1, 3, -2, -2, 3, 3)),
    "11n_42": (4, (-1, -1, -1, -1, 2, 2, 1, -3, 2, 2, -3, 2, -3)),
    "3_1 # 3_1": (3, (1, 1, 1, 2, 2, 2)),
    "3_1 # mirror 3_1": (3, (1, 1, 1, -2, -2, -2)),
    "3_1 # 4_1": (4, (1, 1, 1, 2, -3, 2, -3)),
    "Hopf link": (2, (1, 1)),
    "L4a1": (2, (1, 1, 1, 1)),
    "L4a1, one component reversed": (2, (1, 1, 1, 1)),
    "Whitehead link": (3, (1, -2, 1, -2, -2)),
    "Borromean rings": (3, (1, -2, 1, -2, 1, -2)),
    "chain of three": (3, (1, 1, 2, 2)),
    "unlink of three": (3, ()),
    "Hopf link and a free ring": (3, (1, 1)),
    "3_1 and a free ring": (3, (1, 1, 1)),
    "3_1 and mirror 3_1, apart": (4, (1, 1, 1, -3, -3, -3)),
}
"""The links by names of the trade, each with strands and word; a link is kept whole in scrambles.

The words of mutants are those of Kinoshita, Terasaka (On unions of knots, 1957) and Conway (An
enumeration of knots and links, 1970), 11n_42 and 11n_34 in today's tables.
"""

MORTON: tuple[int, Word] = (4, (3, 3, -2, 3, -2, -1, -1, -1, 2, -1, 2))
"""A braid for the unknot that no sequence of destabilizations undoes (Morton, An irreducible
4-string braid with unknotted closure, 1983)."""


@dataclass(frozen=True)
class Recipe:
    """One entry: its name, the link in it, and which image of the link stands there.

    ``image`` is identity, mirror, reverse or mirror-reverse. ``form`` is word, pd or polygon.
    ``moves`` are the steps of the scramble, of which at most ``more_strands`` add a strand.
    """

    name: str
    link: str
    image: str = "identity"
    form: str = "word"
    moves: int = 40
    more_strands: int = 1
    note: str = ""

    @property
    def kind(self) -> tuple[str, str]:
        """The oriented link: no two images that occur here are the same one."""
        return self.link, self.image


REGISTER = (
    Recipe("Q-01", "unknot", moves=0, note="looks knotted; is it?"),
    Recipe("Q-02", "3_1", moves=0, note="the common plait"),
    Recipe("Q-03", "3_1", "mirror", note="the common plait, left hand"),
    Recipe("Q-04", "4_1"),
    Recipe("Q-05", "5_1", moves=16),
    Recipe("Q-06", "5_2"),
    Recipe("Q-07", "10_161", note="from a pedlar's basket"),
    Recipe("Q-08", "6_1"),
    Recipe("Q-09", "6_2", more_strands=2),
    Recipe("Q-10", "6_3"),
    Recipe("Q-11", "7_4"),
    Recipe("Q-12", "11n_42", moves=20, more_strands=0, note="the herring net; polynomial 1"),
    Recipe("Q-13", "7_7"),
    Recipe("Q-14", "8_17", note="reads otherwise from behind"),
    Recipe("Q-15", "8_19", more_strands=2),
    Recipe("Q-16", "8_20"),
    Recipe("Q-18", "9_32"),
    Recipe("Q-19", "3_1 # 3_1", note="two common plaits in one ring"),
    Recipe("Q-20", "3_1 # mirror 3_1", note="the same, one of them left hand"),
    Recipe("Q-21", "3_1 # 4_1"),
    Recipe("Q-22", "Hopf link", moves=0, note="two rings"),
    Recipe("Q-23", "Hopf link", "mirror", moves=16),
    Recipe("Q-24", "L4a1"),
    Recipe("Q-25", "Whitehead link"),
    Recipe("Q-26", "10_161", moves=160, more_strands=2, note="sent in by a reader in 1941"),
    Recipe("Q-27", "Borromean rings", note="three rings, no two of them linked"),
    Recipe("Q-28", "chain of three"),
    Recipe("Q-29", "unlink of three", moves=60, more_strands=2),
    Recipe("Q-30", "Hopf link and a free ring"),
    Recipe("Q-31", "3_1 and a free ring"),
)
"""The printed register, but for Q-17, of which a letter is smudged."""

SMUDGED = ("Q-17", 3, "1 -2 1 ? -2 1", "smudged in both copies")

FIELD_LIST = (
    Recipe("avocet", "unknot", form="polygon", moves=160, more_strands=2, note="no knot at all?"),
    Recipe("bittern", "3_1", form="polygon", note="same as Q-02"),
    Recipe("brent goose", "4_1", form="pd", note="same as Q-04"),
    Recipe("coot", "5_1", "mirror", form="polygon"),
    Recipe("curlew", "5_2", form="pd", more_strands=2),
    Recipe("dunlin", "6_2", "mirror", form="pd"),
    Recipe("eider", "6_3", form="polygon"),
    Recipe("garganey", "7_4", form="pd", note="same as Q-11"),
    Recipe("godwit", "8_17", "reverse", form="pd", note="Q-14 from behind?"),
    Recipe("greenshank", "8_19", form="polygon"),
    Recipe("heron", "8_20", form="pd"),
    Recipe("knot", "9_32", "reverse", form="pd", note="named after the bird"),
    Recipe("lapwing", "10_161", form="pd"),
    Recipe("osprey", "11n_42", form="pd", moves=20, note="polynomial 1, as has ruff"),
    Recipe("oystercatcher", "3_1 # 3_1", "mirror", form="polygon"),
    Recipe("plover", "3_1 # mirror 3_1", form="pd"),
    Recipe("pochard", "3_1 # 4_1", form="pd"),
    Recipe("redshank", "Hopf link", "mirror", form="polygon"),
    Recipe("ruff", "11n_34", form="pd", moves=20, note="same as Q-12: all polynomials agree"),
    Recipe("sanderling", "L4a1, one component reversed", form="pd", note="Q-24, a ring turned"),
    Recipe("shoveler", "Whitehead link", form="pd"),
    Recipe("snipe", "Borromean rings", form="polygon", note="same as Q-27"),
    Recipe("teal", "chain of three", form="pd"),
    Recipe("turnstone", "Hopf link and a free ring", form="polygon", note="same as Q-30"),
    Recipe("wigeon", "3_1 and mirror 3_1, apart", form="pd"),
)
"""The list of the group, by the names of birds."""

WRONG_CLAIM = ("ruff", "Q-12")
"""The one note that is mistaken: mutants, which share all polynomials."""
