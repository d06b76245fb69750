"""Errors of the package.

::

    ExposureError
    ├── SiteFileError     a site file has problems: .problems [(line, key, message)]
    └── OutOfScopeError   a question outside what a document or the program covers
"""


class ExposureError(Exception):
    """Base of every error that the operator can do something about."""


class SiteFileError(ExposureError):
    """A site file that cannot be used, with every problem found in it.

    Attributes
    ----------
    problems : list of (line, key, message)
        Line number from 1 (None where no line applies), dotted key, and text.
    """

    def __init__(self, file: str, problems):
        self.file = file
        self.problems = sorted(problems, key=lambda p: (p[0] is None, p[0] or 0))
        super().__init__(self._text())

    def _text(self) -> str:
        count = len(self.problems)
        head = f"{self.file} has {count} problem{'s' if count != 1 else ''}:"
        return "\n".join([head, *(f"  {_place(line, key)}{text}" for line, key, text in self.problems)])


class OutOfScopeError(ExposureError):
    """A question that a document, or this program, does not answer; never extrapolated."""


def _place(line, key) -> str:
    parts = [f"line {line}"] if line else []
    parts += [key] if key else []
    return ", ".join(parts) + (": " if parts else "")
