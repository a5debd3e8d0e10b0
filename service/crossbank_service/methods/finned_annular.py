"""Banks of tubes with annular fins: the front of the correlations, heat transfer and pressure drop.

Solid welded fins after Weierman stand with the serrated ones in ``finned_serrated``.
"""

from crossbank_service.methods import finned_area_ratio, finned_briggs, finned_esdu
from crossbank_service.methods.finned_area_ratio import ganguli_1985, schmidt_1963
from crossbank_service.methods.finned_briggs import (
    briggs_young_1963,
    briggs_young_low_reynolds_blend,
    robinson_briggs_1966,
    stasiulevicius_1988,
)
from crossbank_service.methods.finned_esdu import (
    contraction_loss,
    esdu_84016,
    esdu_84016_drop,
    esdu_86022,
    esdu_86022_drop,
)

RECORDS = (*finned_briggs.RECORDS, *finned_esdu.RECORDS, *finned_area_ratio.RECORDS)

__all__ = [
    "RECORDS",
    "briggs_young_1963",
    "briggs_young_low_reynolds_blend",
    "contraction_loss",
    "esdu_84016",
    "esdu_84016_drop",
    "esdu_86022",
    "esdu_86022_drop",
    "ganguli_1985",
    "robinson_briggs_1966",
    "schmidt_1963",
    "stasiulevicius_1988",
]
