"""Plain tube banks, outside heat transfer: every method's record, and the choice ``auto`` stands for."""

from crossbank_service.methods import (
    outside_plain_auto,
    outside_plain_comparison,
    outside_plain_gnielinski,
    outside_plain_grimison,
    outside_plain_zukauskas,
)
from crossbank_service.methods.outside_plain_auto import auto_outside_heat_transfer
from crossbank_service.methods.record import Method

RECORDS: tuple[Method, ...] = (
    *outside_plain_auto.RECORDS,
    *outside_plain_gnielinski.RECORDS,
    *outside_plain_zukauskas.RECORDS,
    *outside_plain_grimison.RECORDS,
    *outside_plain_comparison.RECORDS,
)

__all__ = ["RECORDS", "auto_outside_heat_transfer"]
