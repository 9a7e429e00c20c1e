"""Judging rigs against a brief: spans, search, concessions."""

from visionplan.solve.search import rank

__all__ = ["rank"]
