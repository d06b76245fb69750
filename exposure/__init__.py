"""Radio-frequency exposure near antennas: from a site file to fields, limits, distances and a report."""

import importlib

__version__ = "0.1.0"

_HOMES = {
    "read_site": "exposure.site.site_file",
    "assess": "exposure.assessment.assess",
    "reference_levels": "exposure.limits",
    "write_result": "exposure.outputs.result_file",
    "read_result": "exposure.outputs.result_file",
    "write_report": "exposure.outputs.report",
    "SiteFileError": "exposure.errors",
    "OutOfScopeError": "exposure.errors",
}
__all__ = ["__version__", *_HOMES]


def __getattr__(name: str):
    """The public names, each imported when it is first asked for, so that a small job starts fast."""
    if name in _HOMES:
        return getattr(importlib.import_module(_HOMES[name]), name)
    raise AttributeError(f"module 'exposure' has no attribute {name!r}")


def __dir__():
    return __all__
