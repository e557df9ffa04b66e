"""Motion of a load from release to the ground: a planar point mass under canopies that fill one after another.

Any number of cases are flown at once; a single rig is a batch of one. `solve` gives the results, `history` the curves.
"""

from .inputs import Drop, Filling, FillingRule, Row, Values, WhenNextOpens
from .results import History, Motion
from .solver import history, solve

__all__ = ["Drop", "Filling", "FillingRule", "History", "Motion", "Row", "Values", "WhenNextOpens", "history", "solve"]
