"""Judging rigs against a brief: spans, search, concessions."""

from visionplan.solve.concessions import concede
from visionplan.solve.one import judge_one
from visionplan.solve.search import rank
from visionplan.solve.tolls import tolls

__all__ = ["concede", "judge_one", "rank", "tolls"]
