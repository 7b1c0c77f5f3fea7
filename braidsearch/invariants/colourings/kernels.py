"""The inner loop that counts colourings: backtracking along a plan of steps.

``tables`` are ClassArrays, ``plan`` PlanArrays and ``walk`` WalkArrays, named tuples of arrays.
"""

from typing import Any, NamedTuple

import numpy as np

from braidsearch.compiling import compiled
from braidsearch.invariants.colourings.plans import PlanArrays

Array = Any

# The kinds of steps, as in StepKind.
FIRST, SECOND, ANY, CHOOSE, FORWARD, BACKWARD, CHECK, COMPLETE = range(8)

# The columns of a step: its kind, the arcs over, x and y, and the last branching step before it.
KIND, OVER, BEFORE, AFTER, RETURN = range(5)

# The places of the state: where to go on, whether the walk has begun, leaves and nodes.
DEPTH, BEGUN, LEAVES, NODES = range(4)

LEAVES_AT_ONCE = 1 << 12


class WalkArrays(NamedTuple):
    """What a walk remembers: a colour for each arc, a cursor for each step, weights, leaves.

    ``leaf_entries`` has a row for each leaf, with a place for each component.
    """

    state: Array
    colour: Array
    cursor: Array
    weights: Array
    leaf_entries: Array
    leaf_weights: Array


def new_walk(arcs: int, steps: int, components: int) -> WalkArrays:
    """A walk that has not begun."""
    return WalkArrays(
        state=np.zeros(4, dtype=np.int64),
        colour=np.zeros(arcs, dtype=np.int64),
        cursor=np.zeros(steps, dtype=np.int64),
        weights=np.zeros(2, dtype=np.int64),
        leaf_entries=np.zeros((LEAVES_AT_ONCE, components), dtype=np.int32),
        leaf_weights=np.zeros(LEAVES_AT_ONCE, dtype=np.int64),
    )


@compiled
def next_colour(tables: Any, plan: Any, walk: Any, depth: int, returning: bool) -> int:
    """The next colour that a branching step tries, or -1."""
    kind, over = plan.steps[depth, KIND], plan.steps[depth, OVER]
    below = plan.steps[depth, BEFORE]
    if kind == CHOOSE:
        if returning:
            return int(tables.next_over[walk.colour[over], walk.colour[below]])
        return int(tables.first_over[walk.colour[below], walk.colour[plan.steps[depth, AFTER]]])
    place = walk.cursor[depth] + 1 if returning else 0
    walk.cursor[depth] = place
    if kind == ANY:
        return place if place < len(tables.class_of) else -1
    if kind == FIRST:
        if place == len(tables.meridians):
            return -1
        walk.weights[0] = tables.class_sizes[place]
        walk.weights[1] = 1
        return int(tables.meridians[place])
    number = tables.class_of[walk.colour[below]]
    place += tables.orbit_starts[number]
    if place == tables.orbit_starts[number + 1]:
        return -1
    walk.weights[1] = tables.orbit_sizes[place]
    return int(tables.orbit_members[place])


@compiled
def longitude_key(tables: Any, plan: Any, colour: Array, component: int) -> int:
    """The key of the longitude in the centraliser of the meridian of its class.

    The longitude is followed at the base points alone.
    """
    own = colour[plan.starts[component]]
    number = tables.class_of[own]
    turns = plan.writhes[component] % tables.class_orders[number]
    key = 0
    for place in range(tables.base_starts[number], tables.base_starts[number + 1]):
        point = tables.from_class[own, tables.base_points[place]]
        for passage in range(plan.passage_starts[component], plan.passage_starts[component + 1]):
            over = colour[plan.passages[passage, 0]]
            if plan.passages[passage, 1] > 0:
                point = tables.images[over, point]
            else:
                point = tables.inverse_images[over, point]
        for _ in range(turns):
            point = tables.inverse_images[own, point]
        key = key * tables.images.shape[1] + int(tables.to_class[own, point])
    return key


@compiled
def entry_of_component(tables: Any, plan: Any, colour: Array, component: int) -> int:
    """The entry of a component: the class of its colour, and its longitude up to conjugation."""
    key = longitude_key(tables, plan, colour, component)
    number = tables.class_of[colour[plan.starts[component]]]
    low, high = tables.key_starts[number], tables.key_starts[number + 1]
    while high - low > 1:
        middle = (low + high) // 2
        if tables.keys[middle] <= key:
            low = middle
        else:
            high = middle
    return int(tables.key_entries[low])


@compiled
def record_leaf(tables: Any, plan: Any, walk: Any) -> None:
    """Write down a complete colouring: the entries of its components, sorted, and its weight."""
    leaf = walk.state[LEAVES]
    for component in range(len(plan.starts)):
        entry = entry_of_component(tables, plan, walk.colour, component)
        place = component
        while place > 0 and walk.leaf_entries[leaf, place - 1] > entry:
            walk.leaf_entries[leaf, place] = walk.leaf_entries[leaf, place - 1]
            place -= 1
        walk.leaf_entries[leaf, place] = entry
    walk.leaf_weights[leaf] = walk.weights[0] * walk.weights[1]
    walk.state[LEAVES] = leaf + 1


@compiled
def walk_plan(tables: Any, plan: Any, walk: Any, most_nodes: int) -> None:
    """Go on from the walk's state until leaves are full, ``most_nodes`` passed, or all is done.

    A leaf is a colouring up to conjugation: its weight is the number of colourings that it stands
    for. At the end the depth in the state is -1.
    """
    steps, colour, conjugate = plan.steps, walk.colour, tables.conjugate
    depth = walk.state[DEPTH]
    returning = walk.state[BEGUN] > 0
    nodes = 0
    while depth >= 0:
        kind, over = steps[depth, KIND], steps[depth, OVER]
        before, after = steps[depth, BEFORE], steps[depth, AFTER]
        onwards = True
        if kind <= CHOOSE:
            nodes += 1
            found = next_colour(tables, plan, walk, depth, returning)
            if found >= 0:
                colour[over] = found
            else:
                onwards = False
        elif kind == FORWARD:
            colour[after] = conjugate[colour[over], colour[before]]
        elif kind == BACKWARD:
            colour[before] = tables.unconjugate[colour[over], colour[after]]
        elif kind == CHECK:
            onwards = conjugate[colour[over], colour[before]] == colour[after]
        else:
            record_leaf(tables, plan, walk)
            onwards = False
        returning = not onwards
        if onwards:
            depth += 1
        else:
            depth = steps[depth, RETURN]
            if walk.state[LEAVES] == len(walk.leaf_weights) or nodes >= most_nodes:
                break
    walk.state[DEPTH] = depth
    walk.state[BEGUN] = 1
    walk.state[NODES] += nodes


def compile_for(tables: Any) -> None:
    """Compile the loop, or load it compiled, by colouring a circle."""
    steps = np.array([[FIRST, 0, 0, 0, -1], [COMPLETE, 0, 0, 0, 0]], dtype=np.int64)
    circle = PlanArrays(
        steps=steps,
        starts=np.zeros(1, dtype=np.int64),
        passage_starts=np.zeros(2, dtype=np.int64),
        passages=np.zeros((0, 2), dtype=np.int64),
        writhes=np.zeros(1, dtype=np.int64),
    )
    walk_plan(tables, circle, new_walk(1, 2, 1), 1)
