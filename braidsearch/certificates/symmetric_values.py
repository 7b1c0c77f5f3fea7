"""The values of invariants for the symmetric images of a link, from the values for the link."""

from __future__ import annotations

from collections.abc import Iterable, Mapping
from functools import lru_cache
from typing import TYPE_CHECKING, Any, TypeAlias

from braidsearch.certificates.grammar import SUBLINKS
from braidsearch.certificates.values import Value, freeze_value
from braidsearch.errors import InputError

if TYPE_CHECKING:
    from braidsearch.invariants.colourings.classes import Centraliser

Parameters: TypeAlias = Mapping[str, Value]
Images: TypeAlias = tuple[int, ...]


def symmetric_parameters(invariant: str, parameters: Parameters, symmetry: str) -> dict[str, Value]:
    """The parameters with which ``symmetric_value`` states the value for the symmetric image.

    Only the meridians of colourings change: mirror and reverse each turn the meridians of a link
    into inverse meridians of its image, so the colourings of the link by a class are colourings of
    the image by the class of the inverses, which is the same class only for some.
    """
    own = dict(parameters)
    of = own["invariant"] if invariant == SUBLINKS else invariant
    if of == "colouring" and symmetry in ("mirror", "reverse"):
        own["meridians"] = tuple(_inverse(images) for images in _entries(own["meridians"]))
    return own


def symmetric_value(invariant: str, parameters: Parameters, value: Value, symmetry: str) -> Value:
    """The value of the invariant for the symmetric image of a link with the given value.

    ``value`` belongs to ``parameters``, the result to ``symmetric_parameters``; nothing is computed
    on a braid. Each symmetry acts on values as a bijection that is its own inverse, so different
    values have different images. Raises InputError for an invariant that is not known here and for
    a value that it cannot have, CapacityError for a group too large for its colourings' entries.
    """
    try:
        if invariant == SUBLINKS:
            inner = {key: item for key, item in parameters.items() if key != "components"}
            name = str(inner.pop("invariant"))
            images = [symmetric_value(name, inner, item, symmetry) for item in _entries(value)]
            return tuple(sorted(images))
        return freeze_value(_image(invariant, parameters, value, symmetry))
    except (AttributeError, LookupError, TypeError, ValueError) as error:
        if isinstance(error, InputError):
            raise
        raise InputError(f"{invariant} {value!r}: expected a value of that invariant") from None


def _image(invariant: str, parameters: Parameters, value: Any, symmetry: str) -> Any:
    is_mirrored = symmetry in ("mirror", "mirror-reverse")
    if invariant == "colouring":
        return _colourings_image(parameters, value, symmetry)
    if invariant == "three-braid":
        return _classes_image(value, symmetry)
    if invariant == "levine-tristram":
        # The mirror image has the Seifert matrix -V; the reverse V^T, with the conjugate form.
        signature, nullity = value
        return (-signature if is_mirrored else signature, nullity)
    if invariant == "alexander-module":
        return value  # the transpose and the negative of V - t V^T have the same factors
    from braidsearch.invariants import mirror_image  # noqa: PLC0415 - not for proofs of sameness

    mirrored = mirror_image(invariant, value)
    return mirrored if is_mirrored else value


def _classes_image(value: Any, symmetry: str) -> list[list[int]]:
    """The conjugacy classes of all 3-braids that close to the image of a link."""
    from braidsearch.three_braids.conjugacy import ThreeBraidClass  # noqa: PLC0415

    classes = [ThreeBraidClass(exponent_sum, tuple(word)) for exponent_sum, *word in value]
    if symmetry in ("mirror", "mirror-reverse"):
        classes = [one.mirror() for one in classes]
    if symmetry in ("reverse", "mirror-reverse"):
        classes = [one.reverse() for one in classes]
    return sorted(one.value for one in classes)


def _colourings_image(parameters: Parameters, value: Any, symmetry: str) -> Any:
    """The counts of colourings of the image, by the inverse meridians but for mirror-reverse.

    A pair (meridian, longitude) of a component of the link is one of its image after the change
    (m^-1, l) for the mirror image, (m^-1, l^-1) for the reverse and (m, l^-1) for both. What
    conjugates m to a given meridian conjugates m^-1 to its inverse, and both have one centraliser:
    the entries of the mirror image are the entries themselves, and those of the reverse hold the
    least conjugates of the inverse longitudes.
    """
    if symmetry in ("identity", "mirror"):
        return value
    generators = tuple(map(tuple, _entries(parameters["generators"])))
    centralisers = _centralisers(generators, tuple(map(tuple, _entries(parameters["meridians"]))))
    width = 1 + len(generators[0])
    rows = []
    for *row, count in value:
        entries = [tuple(row[at : at + width]) for at in range(0, len(row), width)]
        inverted = sorted(_inverted_entry(entry, centralisers) for entry in entries)
        rows.append([integer for entry in inverted for integer in entry] + [count])
    return sorted(rows)


def _inverted_entry(entry: Images, centralisers: tuple[Centraliser, ...]) -> Images:
    """The class of a component's meridian, and the least conjugate of its longitude inverted."""
    from braidsearch.invariants.colourings.permutations import (  # noqa: PLC0415
        from_images,
        images,
    )

    label, *longitude = entry
    least = centralisers[label - 1].least_conjugates[from_images(_inverse(longitude))]
    return (label, *images(least, len(longitude)))


@lru_cache(maxsize=32)
def _centralisers(
    generators: tuple[Images, ...], meridians: tuple[Images, ...]
) -> tuple[Centraliser, ...]:
    """The centraliser of each meridian in the group."""
    from braidsearch.invariants.colourings.classes import (  # noqa: PLC0415 - tables of groups
        centraliser,
        reach_classes,
    )
    from braidsearch.invariants.colourings.colours import Colours  # noqa: PLC0415

    classes = reach_classes(Colours("colours of a distinction", generators, meridians))
    return tuple(centraliser(classes, number) for number in range(len(meridians)))


def _inverse(images: Iterable[int]) -> Images:
    """The images of 1, 2, ... under the inverse permutation."""
    places = {image: place for place, image in enumerate(images, start=1)}
    return tuple(places[image] for image in range(1, len(places) + 1))


def _entries(value: Any) -> Any:
    """The value, which must be a tuple of entries."""
    if not isinstance(value, tuple):
        raise InputError(f"{value!r} in a value: expected a list")
    return value
