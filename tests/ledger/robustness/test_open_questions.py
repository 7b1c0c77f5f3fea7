"""Questions that limits leave open: kept with them, not asked twice, settled by higher ones."""

from concurrent.futures import Executor
from pathlib import Path
from typing import Any

import pytest

from braidsearch.ledger.executors import SerialExecutor
from braidsearch.ledger.findings import Effort
from braidsearch.ledger.ledger import Ledger
from braidsearch.ledger.placing import ask, place_all
from tests.ledger.robustness.ledgers import (
    ENOUGH_NODES,
    IMAGES,
    STAGES,
    Life,
    ledger_text,
    partition,
)

SORT, _, RETRY = STAGES[1:]


class Listening(SerialExecutor):
    """Does each task here, and remembers what was asked."""

    def __init__(self) -> None:
        self.asked: list[tuple[Any, ...]] = []

    def submit(self, function: Any, /, *arguments: Any) -> Any:  # type: ignore[override]
        if function in (ask, place_all):
            self.asked.append((function.__name__, *arguments))
        return super().submit(function, *arguments)


def listen(path: Path, **limits: Any) -> list[tuple[Any, ...]]:
    """Sort, and return the questions about two forms that were asked."""
    executor: Executor = Listening()
    with Ledger(path) as ledger:
        ledger.sort(executor=executor, **limits)
    assert isinstance(executor, Listening)
    return executor.asked


@pytest.fixture
def path(life: Life, tmp_path: Path) -> Path:
    """A ledger that is entered and not sorted."""
    return life.copy_before(SORT, tmp_path / "ledger")


@pytest.mark.parametrize("limits", [{"nodes": 0}, {"nodes": 1}, {"nodes": 0, "max_strands": 6}])
def test_open_questions_are_kept_with_their_limits_and_not_asked_again(
    limits: dict[str, int], path: Path
):
    """With the same limits a sort asks nothing again, and with lower ones neither."""
    assert listen(path, **limits)
    with Ledger(path) as ledger:
        questions = ledger.report().open_questions
    assert questions
    assert {question.tried for question in questions} == {Effort(**limits)}
    text = ledger_text(path)
    assert listen(path, **limits) == []
    assert listen(path, **(limits | {"nodes": 0})) == []
    assert ledger_text(path) == text


def test_higher_limits_ask_what_is_open_first_and_settle_it(path: Path):
    """With enough nodes every open question is asked, before anything new, and is answered."""
    listen(path, nodes=0)
    with Ledger(path) as ledger:
        count = len(ledger.report().open_questions)
        assert count >= 3
        more = partition(ledger)
    asked = listen(path, nodes=ENOUGH_NODES)
    assert [question[0] for question in asked[:count]] == ["ask"] * count
    assert {question[-1] for question in asked[:count]} == {Effort(ENOUGH_NODES)}
    with Ledger(path) as ledger:
        assert ledger.report().open_questions == ()
        assert ledger.report().contradictions == ()
        assert len(partition(ledger)) < len(more)
        assert ledger.check().valid


def test_the_classes_are_those_of_high_limits_from_the_start(
    life: Life, path: Path, tmp_path: Path
):
    """Whether limits rise step by step or are high at once, the classes and groups are the same."""
    for nodes in (0, 1, 50, ENOUGH_NODES):
        listen(path, nodes=nodes)
    at_once = life.copy_before(SORT, tmp_path / "at once")
    listen(at_once, nodes=ENOUGH_NODES)
    with Ledger(path) as slowly, Ledger(at_once) as quickly:
        assert partition(slowly) == partition(quickly)
        assert slowly.check().valid
        assert quickly.check().valid


def test_images_left_open_are_settled_by_higher_limits(life: Life, tmp_path: Path):
    """Questions about symmetric images are kept, and retried, as those about the links are."""
    path = life.copy_before(RETRY, tmp_path / "ledger")
    with Ledger(path) as ledger:
        symmetries = {question.symmetry for question in ledger.report().open_questions}
    assert symmetries == {"identity", *IMAGES}
    assert listen(path, nodes=0, up_to=IMAGES) == []
    text = life.text_after[RETRY.name]
    assert listen(path, nodes=ENOUGH_NODES, up_to=IMAGES)
    assert ledger_text(path) == text


def test_a_question_that_an_answer_before_has_settled_is_not_asked(life: Life, tmp_path: Path):
    """Every merge has one proof: what follows from the answers before is neither asked nor open."""
    path = life.copy_before(RETRY, tmp_path / "ledger")
    with Ledger(path) as ledger:
        store = ledger.store
        open_count = store.count("undecided", "symmetry = 'identity'")
        classes, proofs = store.count("classes"), count_proofs(ledger)
        ledger.sort(nodes=ENOUGH_NODES)
        merges = classes - store.count("classes")
        assert 0 < merges < open_count
        assert count_proofs(ledger) - proofs == merges
        assert store.count("undecided") == 0


def count_proofs(ledger: Ledger) -> int:
    """The proofs that two forms are one link."""
    forms = "(SELECT braid FROM forms)"
    condition = f"symmetry = 'identity' AND left IN {forms} AND right IN {forms}"
    return ledger.store.count("evidence", condition)
