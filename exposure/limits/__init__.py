"""Published limits: one module for each edition of a document."""

from types import ModuleType

from exposure.errors import OutOfScopeError
from exposure.limits import icnirp_2020, us_fcc
from exposure.limits.types import Level

_MODULES = {"us_fcc": us_fcc, "icnirp_2020": icnirp_2020}
DOCUMENTS = tuple(_MODULES)


def document(limits_id: str) -> ModuleType:
    """The module of a document: TITLE, EDITION, REFERENCE, POPULATIONS, SUMMATION, reference_levels.

    Raises
    ------
    OutOfScopeError
        An id that is not known.
    """
    if limits_id not in _MODULES:
        raise OutOfScopeError(f"there are no limits called {limits_id!r}; known are {', '.join(DOCUMENTS)}")
    return _MODULES[limits_id]


def reference_levels(limits_id: str, population: str, frequency_hz: float) -> tuple[Level, ...]:
    """Every row of a document that applies at a frequency [Hz], in printed order.

    Raises
    ------
    OutOfScopeError
        An unknown document, a population it has no levels for, or a frequency outside it.
    """
    module = document(limits_id)
    if population not in module.POPULATIONS:
        raise OutOfScopeError(
            f"{limits_id} has no levels for {population!r}; it has {', '.join(module.POPULATIONS)}"
        )
    return module.reference_levels(population, float(frequency_hz))
