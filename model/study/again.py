"""A value worked out again with some of the given terms changed."""

from __future__ import annotations

from collections.abc import Mapping

from model.checks.term import Term, lines


def evaluate(result: Term, changed: Mapping[Term, float]) -> float:
    """The value of ``result`` with other values of some given terms; what does not rest on them is not worked out anew.

    Args:
        result: The term wanted.
        changed: New values in SI by given term.
    """
    values: dict[int, float] = {}
    moved: set[int] = set()
    for term in lines(result):
        if term in changed:
            values[id(term)] = changed[term]
            moved.add(id(term))
        elif term.how is not None and any(id(one) in moved for one in term.inputs):
            values[id(term)] = float(term.how.function(*(values[id(one)] for one in term.inputs)))
            moved.add(id(term))
        else:
            values[id(term)] = term.value
    return values[id(result)]
