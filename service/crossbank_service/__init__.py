"""The crossbank service: rates crossflow tube banks over HTTP."""
