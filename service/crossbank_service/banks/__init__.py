"""Geometry of tube banks: areas, free-flow sections, volumes, masses; no contract and no fluids."""

from crossbank_service.banks.geometry import FinKind, FinSet, TubeBank

__all__ = ["FinKind", "FinSet", "TubeBank"]
