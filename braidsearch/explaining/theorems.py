"""The theorems that proofs rely on, and where they are published."""

from __future__ import annotations

from dataclasses import dataclass


@dataclass(frozen=True, slots=True)
class Publication:
    """Where a theorem stands: ``tag`` is how a step cites it."""

    tag: str
    author: str
    title: str
    year: int

    def __str__(self) -> str:
        return f"{self.author}, {self.title}, {self.year}"


@dataclass(frozen=True, slots=True)
class Theorem:
    """A statement in a sentence, and the publications that prove it."""

    statement: str
    publications: tuple[Publication, ...]

    @property
    def citation(self) -> str:
        """The tags of the publications: ``Markov 1936; Birman 1974``."""
        return "; ".join(publication.tag for publication in self.publications)


ARTIN_1925 = Publication("Artin 1925", "E. Artin", "Theorie der Zöpfe", 1925)
ARTIN_1947 = Publication("Artin 1947", "E. Artin", "Theory of braids", 1947)
MARKOV = Publication(
    "Markov 1936",
    "A. A. Markov",
    "Über die freie Äquivalenz der geschlossenen Zöpfe (announced in 1935)",
    1936,
)
BIRMAN = Publication("Birman 1974", "J. S. Birman", "Braids, links, and mapping class groups", 1974)
REIDEMEISTER = Publication(
    "Reidemeister 1927", "K. Reidemeister", "Elementare Begründung der Knotentheorie", 1927
)
ALEXANDER = Publication(
    "Alexander 1928", "J. W. Alexander", "Topological invariants of knots and links", 1928
)
FOX = Publication("Fox 1954", "R. H. Fox", "Free differential calculus II", 1954)
JONES = Publication(
    "Jones 1985",
    "V. F. R. Jones",
    "A polynomial invariant for knots via von Neumann algebras",
    1985,
)
HOMFLY = Publication(
    "HOMFLY 1985",
    "P. Freyd, D. Yetter, J. Hoste, W. B. R. Lickorish, K. Millett, A. Ocneanu",
    "A new polynomial invariant of knots and links",
    1985,
)
PRZYTYCKI_TRACZYK = Publication(
    "Przytycki-Traczyk 1987",
    "J. H. Przytycki, P. Traczyk",
    "Invariants of links of Conway type",
    1987,
)
MURASUGI = Publication(
    "Murasugi 1965", "K. Murasugi", "On a certain numerical invariant of link types", 1965
)
LEVINE = Publication("Levine 1969", "J. Levine", "Invariants of knot cobordism", 1969)
TRISTRAM = Publication(
    "Tristram 1969", "A. G. Tristram", "Some cobordism invariants for links", 1969
)
RILEY = Publication("Riley 1971", "R. Riley", "Homomorphisms of knot groups on finite groups", 1971)
EISERMANN = Publication("Eisermann 2007", "M. Eisermann", "Knot colouring polynomials", 2007)
BIRMAN_MENASCO = Publication(
    "Birman-Menasco 1993",
    "J. S. Birman, W. W. Menasco",
    "Studying links via closed braids III: classifying links which are closed 3-braids",
    1993,
)

RELATIONS = Theorem(
    "Two words are the same braid exactly if free insertions and cancellations, far commutations "
    "(i j = j i for |i - j| > 1) and braid relations (i j i = j i j for |i - j| = 1) lead from one "
    "to the other.",
    (ARTIN_1925, ARTIN_1947),
)
MARKOV_MOVES = Theorem(
    "Conjugation, stabilization and destabilization keep the oriented link that a braid closes to; "
    "and any two braids that close to one oriented link are joined by them.",
    (MARKOV, BIRMAN),
)

_SUBLINKS = (
    "Isotopic links have isotopic sublinks, so the values for all sublinks of one number of "
    "components, in any order, are an invariant where those of single links are."
)

INVARIANCE: dict[str, Theorem] = {
    "components": Theorem(
        "An isotopy takes components to components, so their number is an invariant.", ()
    ),
    "linking-numbers": Theorem(
        "The linking number of two components is half the sum of the signs of the crossings "
        "between them, which no Reidemeister move changes.",
        (REIDEMEISTER,),
    ),
    "linking-sums": Theorem(
        "Linking numbers are kept by every Reidemeister move, and so are their sums over all "
        "pairs that one component is in.",
        (REIDEMEISTER,),
    ),
    "alexander": Theorem(
        "The Alexander polynomial, up to units, depends on the oriented link alone.", (ALEXANDER,)
    ),
    "alexander-module": Theorem(
        "The Alexander module, the homology of the infinite cyclic cover, depends on the oriented "
        "link alone, and so do its invariant factors over a field.",
        (ALEXANDER, FOX),
    ),
    "jones": Theorem("The Jones polynomial depends on the oriented link alone.", (JONES,)),
    "homfly": Theorem(
        "The HOMFLY-PT polynomial depends on the oriented link alone.",
        (HOMFLY, PRZYTYCKI_TRACZYK),
    ),
    "signature": Theorem(
        "The signature of V + V^T, for a Seifert matrix V, depends on the oriented link alone.",
        (MURASUGI,),
    ),
    "levine-tristram": Theorem(
        "Signature and nullity of (1 - w) V + (1 - 1/w) V^T, for a Seifert matrix V of a connected "
        "surface and a root of unity w, depend on the oriented link alone.",
        (LEVINE, TRISTRAM),
    ),
    "colouring": Theorem(
        "Homomorphisms of the link's group that send meridians to given classes, counted by the "
        "images of the longitudes, depend on the oriented link alone.",
        (RILEY, EISERMANN),
    ),
    "three-braid": Theorem(
        "Closed 3-braids are classified: the conjugacy classes of 3-braids that close to one "
        "oriented link are known, and are an invariant as a list.",
        (BIRMAN_MENASCO,),
    ),
}
"""Why the value of each invariant, by its name in certificates, is one of the oriented link."""


def invariance_of(invariant: str, parameters: dict[str, object]) -> tuple[Theorem, ...]:
    """The theorems by which the invariant with these parameters is one of oriented links."""
    if invariant != "sublinks":
        return (INVARIANCE[invariant],)
    return (Theorem(_SUBLINKS, ()), INVARIANCE[str(parameters["invariant"])])
