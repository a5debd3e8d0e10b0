"""Banks of tubes through continuous flat plate fins: the front of the correlations.

Wang, Chi & Chang 2000 for small staggered tubes, Gray & Webb 1986 for larger ones and, indicative only, in-line.
"""

from crossbank_service.methods import finned_plate_gray, finned_plate_wang
from crossbank_service.methods.finned_plate_gray import gray_webb_1986, gray_webb_1986_drop
from crossbank_service.methods.finned_plate_wang import wang_chi_chang_2000, wang_chi_chang_2000_drop

RECORDS = (*finned_plate_wang.RECORDS, *finned_plate_gray.RECORDS)

__all__ = [
    "RECORDS",
    "gray_webb_1986",
    "gray_webb_1986_drop",
    "wang_chi_chang_2000",
    "wang_chi_chang_2000_drop",
]
