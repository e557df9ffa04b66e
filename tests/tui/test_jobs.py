"""Job numbers and their order."""

from pathlib import Path

from tui.jobs import JobBook

A, B, C = Path("a.toml"), Path("b.toml"), Path("c.toml")


def test_only_the_first_request_starts_a_worker_until_it_has_ended() -> None:
    book = JobBook()
    assert book.ask([A])
    assert not book.ask([B])
    assert book.take() is not None
    assert book.take() is not None
    assert book.take() is None
    assert book.ask([C])


def test_nothing_to_ask_starts_nothing() -> None:
    assert not JobBook().ask([])


def test_an_older_result_never_counts() -> None:
    book = JobBook()
    book.ask([A])
    first = book.take()
    assert first is not None
    book.ask([A])
    assert not book.accept(*first)
    assert book.under_way(A)
    second = book.take()
    assert second is not None
    assert book.accept(*second)
    assert not book.under_way(A)


def test_preferred_rigs_come_first_then_the_order_of_asking() -> None:
    book = JobBook()
    book.ask([A, B, C])
    book.prefer([C])
    assert [job[0] for job in (book.take(), book.take(), book.take()) if job] == [C, A, B]


def test_a_forgotten_rig_is_neither_done_nor_under_way() -> None:
    book = JobBook()
    book.ask([A, B])
    assert book.left == 2
    book.forget(A)
    assert book.left == 1
    assert not book.under_way(A)


def test_a_worker_that_was_stopped_is_started_again() -> None:
    book = JobBook()
    book.ask([A])
    book.stop()
    assert book.ask([B])
