"""What an answer asks for, and keys that repeat."""

import pytest

from tui.answering import Draft, RepeatGuard


def test_a_plain_pass_asks_only_for_initials() -> None:
    draft = Draft("a.b", "pass")
    assert draft.fields == ("who",)
    assert draft.having("who", " AM ").who == "AM"
    assert draft.having("who", "AM").next_field is None


def test_known_initials_are_not_asked_for_again() -> None:
    assert Draft("a.b", "pass", who="AM").next_field is None


@pytest.mark.parametrize("choice", ["fail", "does not apply"])
def test_fail_and_does_not_apply_need_a_remark(choice: str) -> None:
    draft = Draft("a.b", choice, who="AM")  # type: ignore[arg-type]
    assert draft.next_field == "remark"
    assert draft.problem("remark", "   ") is not None
    assert draft.having("remark", "strap cut").next_field is None


def test_a_value_is_asked_for_where_the_inspection_wants_one() -> None:
    draft = Draft("a.b", "pass", wants_value="turns", who="AM")
    assert draft.fields == ("value", "who")
    assert draft.question("value") == "turns"
    assert draft.problem("value", "") is not None
    assert draft.having("value", "3").value == "3"


def test_a_failed_step_may_leave_the_value_empty_but_not_the_remark() -> None:
    draft = Draft("a.b", "fail", wants_value="turns", who="AM")
    assert draft.fields == ("value", "remark", "who")
    assert draft.problem("value", "") is None


def test_does_not_apply_asks_for_no_value() -> None:
    assert "value" not in Draft("a.b", "does not apply", wants_value="turns").fields


def test_two_persons_must_be_two() -> None:
    draft = Draft("a.b", "pass", two_person=True, who="AM")
    assert draft.next_field == "second"
    for same in ("AM", "am", " a m "):
        assert draft.problem("second", same) == "the second person must be somebody else"
    with pytest.raises(ValueError, match="somebody else"):
        draft.having("second", "Am")
    assert draft.having("second", "RB").next_field is None


def test_taking_back_needs_a_remark_and_one_name() -> None:
    assert Draft("a.b", "withdrawal", wants_value="turns", two_person=True).fields == ("remark", "who")


def test_a_text_that_is_too_long_is_refused_with_both_numbers() -> None:
    problem = Draft("a.b", "fail").problem("remark", "x" * 401)
    assert problem is not None
    assert "401" in problem
    assert "400" in problem


def test_the_same_key_within_three_tenths_of_a_second_is_a_repeat() -> None:
    guard = RepeatGuard()
    assert not guard.repeats("p", 10.0)
    assert guard.repeats("p", 10.29)
    assert not guard.repeats("enter", 10.3)
    assert not guard.repeats("p", 10.6)


def test_a_held_key_stays_a_repeat_however_long_it_is_held() -> None:
    guard = RepeatGuard()
    guard.repeats("enter", 0.0)
    assert all(guard.repeats("enter", 0.03 * count) for count in range(1, 200))


def test_text_typed_in_between_makes_the_next_key_a_new_one() -> None:
    guard = RepeatGuard()
    guard.repeats("enter", 1.0)
    guard.forget()
    assert not guard.repeats("enter", 1.1)
