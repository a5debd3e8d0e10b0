"""The HTTP interface: routes, problem documents, limits, health and the description; no physics.

The front door is `create_app`. Where to look:

=====================  =======================================================================
module                 what it does
=====================  =======================================================================
``settings``           what an operator can set, and the environment variables for it
``app``                puts the application together
``outer``              request id and the one access line, around everything else
``warm_up``            worker threads; ready only after one rating
``keys``               API keys, where the operator has set some
``media``              reads bodies strictly, writes them in the form asked for
``faults``             finds what is wrong with a body, member by member
``type_words``         what a type accepts and what was given, in words
``hints``              the sentences: what was probably meant, what would be accepted
``problems``           the one table from refusals to problem documents
``calls``              carries a calculation to a worker thread, times it, writes it down
``routes_*``           the routes, a module a topic
``method_inputs``      closed bodies for each method, made from its record
``catalogue_records``  property catalogues as the contract writes them
``document``           the OpenAPI document; ``vocabulary`` adds the words accepted here
``page``               the page for people, rendered from the document
``examples``           the example bodies of the client
=====================  =======================================================================
"""

from crossbank_service.http.app import create_app, served_app
from crossbank_service.http.settings import Settings

__all__ = ["Settings", "create_app", "served_app"]
