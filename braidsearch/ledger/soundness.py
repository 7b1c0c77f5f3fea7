"""What goes wrong in a ledger that is damaged is said to be damage, and not taken for a defect."""

from __future__ import annotations

from collections.abc import Iterator
from contextlib import contextmanager

from braidsearch.errors import BraidsearchError, InputError
from braidsearch.ledger.schema import EXPECTED_INTACT
from braidsearch.ledger.store import Store


@contextmanager
def blaming_damage(store: Store) -> Iterator[None]:
    """After an error that is no message for a user, check the ledger, and blame what is damaged.

    Raises InputError with the first fault. Where the check finds none, the error is a defect of
    the program, and is raised as it is.
    """
    try:
        yield
    except BraidsearchError:
        raise
    except Exception as error:
        fault = _first_fault(store)
        if fault is None:
            raise
        raise InputError(f"{store.path}: damaged ({fault}): {EXPECTED_INTACT}") from error


def _first_fault(store: Store) -> str | None:
    from braidsearch.ledger.checking import check_ledger  # noqa: PLC0415 - only after an error
    from braidsearch.ledger.executors import SerialExecutor  # noqa: PLC0415 - the same

    with store.reading():
        return next(iter(check_ledger(store, SerialExecutor()).faults), None)
