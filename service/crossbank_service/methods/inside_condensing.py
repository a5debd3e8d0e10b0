"""Condensation inside tubes: the front door of the correlations and their records."""

from crossbank_service.methods import (
    inside_condensing_cavallini,
    inside_condensing_chato,
    inside_condensing_shah,
    inside_condensing_thome,
)
from crossbank_service.methods.inside_condensing_cavallini import cavallini_2006, cavallini_transition
from crossbank_service.methods.inside_condensing_chato import chato_1962, dobson_chato_1998, soliman_froude
from crossbank_service.methods.inside_condensing_film import falling_film_local, falling_film_mean
from crossbank_service.methods.inside_condensing_gas import (
    colburn_hougen,
    silver_bell_ghaly,
    steam_air_diffusivity,
)
from crossbank_service.methods.inside_condensing_shah import shah_1979, shah_2016
from crossbank_service.methods.inside_condensing_thome import stratified_angle, thome_2003

RECORDS = (
    *inside_condensing_cavallini.RECORDS,
    *inside_condensing_chato.RECORDS,
    *inside_condensing_shah.RECORDS,
    *inside_condensing_thome.RECORDS,
)

__all__ = [
    "RECORDS",
    "cavallini_2006",
    "cavallini_transition",
    "chato_1962",
    "colburn_hougen",
    "dobson_chato_1998",
    "falling_film_local",
    "falling_film_mean",
    "shah_1979",
    "shah_2016",
    "silver_bell_ghaly",
    "soliman_froude",
    "steam_air_diffusivity",
    "stratified_angle",
    "thome_2003",
]
