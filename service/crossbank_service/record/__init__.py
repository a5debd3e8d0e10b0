"""What is written down of each calculation: one line, from which it can be found and repeated.

`EventLog` writes lines of JSON; `calculation_entry` gathers what belongs into the line of a calculation.
"""

from crossbank_service.record.entry import calculation_entry
from crossbank_service.record.log import EventLog

__all__ = ["EventLog", "calculation_entry"]
