"""What a link may be coloured with: some conjugacy classes of a finite group."""

from __future__ import annotations

from dataclasses import dataclass, field

from braidsearch.errors import InputError
from braidsearch.invariants.colourings.permutations import LARGEST_DEGREE

Images = tuple[int, ...]
"""A permutation of 1, ..., d as the tuple of its images."""


@dataclass(frozen=True)
class Colours:
    """Conjugacy classes of a permutation group, from which the colours of arcs are taken.

    ``name`` says which group and which classes, for people. ``generators`` generate the group G,
    a permutation being the tuple of the images of 1, ..., d. ``meridians`` are elements of G, no
    two of them conjugate in G: the colours are all their conjugates. ``class_sizes``, where it is
    known beforehand, is the number of conjugates of each; it serves estimates of cost alone.

    Raises InputError for what is no permutation, and for degrees that differ or exceed 200. That
    the meridians lie in G and are not conjugate is found when the classes are made.
    """

    name: str
    generators: tuple[Images, ...]
    meridians: tuple[Images, ...]
    class_sizes: tuple[int, ...] | None = field(default=None, compare=False, repr=False)

    def __post_init__(self) -> None:
        if not self.generators or not self.meridians:
            raise InputError(f"colours {self.name!r}: expected a generator and a meridian")
        for images in self.generators + self.meridians:
            if sorted(images) != list(range(1, self.degree + 1)):
                raise InputError(f"images {images!r}: expected a permutation of 1 to {self.degree}")
        if self.degree > LARGEST_DEGREE:
            raise InputError(f"degree {self.degree}: expected at most {LARGEST_DEGREE}")

    @property
    def degree(self) -> int:
        """The number of points that the group moves about."""
        return len(self.generators[0])

    @property
    def parameters(self) -> dict[str, list[list[int]]]:
        """The generators and the meridians as they stand in a certificate."""
        return {
            "generators": [list(images) for images in self.generators],
            "meridians": [list(images) for images in self.meridians],
        }
