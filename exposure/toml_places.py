"""Where things stand in a TOML text: the line of every key, table and array element.

The parser gives values without places.  This walk gives places without values; it is made only when
a file has a problem to report, on a text that the parser has already accepted, so it need not check
anything.  TOML 1.0 and 1.1 (line breaks inside inline tables).
"""

import re

_TOKEN = re.compile(
    r'(?P<string>"""(?:\\[\s\S]|[^\\])*?"""+|\'\'\'[\s\S]*?\'\'\'+|"(?:\\.|[^"\\\n])*"|\'[^\'\n]*\')'
    r"|(?P<comment>#[^\n]*)|(?P<newline>\n)|(?P<mark>[\[\]{}=,.])|(?P<bare>[^\s\[\]{}=,.#\"']+)"
)


def lines(text: str) -> dict[tuple, int]:
    """Line, from 1, of every path; a path is names and, from 0, indices: ``("antenna", 0, "height_m")``."""
    walk = _Walk(text)
    walk.document()
    return walk.lines


def line_of(found: dict[tuple, int], path: tuple) -> int | None:
    """Line of a path, or of the nearest table around it; None for the whole file."""
    while path and path not in found:
        path = path[:-1]
    return found.get(path)


class _Walk:
    def __init__(self, text: str):
        self.lines: dict[tuple, int] = {}
        self.tokens = list(_tokens(text))
        self.next = 0
        self.counts: dict[tuple, int] = {}

    def document(self):
        table = ()
        while not self.at("end"):
            if self.at("newline"):
                self.take()
            elif self.at("["):
                table = self.header()
            else:
                self.pair(table)

    def header(self) -> tuple:
        line = self.line()
        self.take()
        many = self.at("[")
        if many:
            self.take()
        path = ()
        for part in self.name():
            path = self.inside(path) + (part,)
            self.lines.setdefault(path, line)
        self.take_all("]")
        if many:
            self.counts[path] = self.counts.get(path, -1) + 1
            self.lines[self.inside(path)] = line
        return self.inside(path)

    def pair(self, table: tuple):
        line, path = self.line(), table
        for part in self.name():
            path += (part,)
            self.lines.setdefault(path, line)
        self.take()
        self.value(path)

    def value(self, path: tuple):
        if self.at("["):
            self.sequence("]", path, self.element)
        elif self.at("{"):
            self.sequence("}", path, lambda path, _: self.pair(path))
        else:
            while not any(self.at(mark) for mark in ("newline", ",", "]", "}", "end")):
                self.take()

    def sequence(self, end: str, path: tuple, member):
        self.take()
        index = 0
        while not self.at(end):
            if self.at("newline") or self.at(","):
                self.take()
            else:
                member(path, index)
                index += 1
        self.take()

    def element(self, path: tuple, index: int):
        self.lines[path + (index,)] = self.line()
        self.value(path + (index,))

    def name(self) -> list[str]:
        """The parts of a dotted key, up to the mark that ends it."""
        parts = []
        while not (self.at("=") or self.at("]")):
            text = self.take()
            parts += [] if text == "." else [text.strip("\"'")]
        return parts

    def inside(self, path: tuple) -> tuple:
        return path + (self.counts[path],) if path in self.counts else path

    def at(self, mark: str) -> bool:
        return self.tokens[self.next][0] == mark

    def line(self) -> int:
        return self.tokens[self.next][2]

    def take(self) -> str:
        self.next += 1
        return self.tokens[self.next - 1][1]

    def take_all(self, mark: str):
        while self.at(mark):
            self.take()


def _tokens(text: str):
    line = 1
    for match in _TOKEN.finditer(text):
        kind, token = match.lastgroup, match.group()
        if kind != "comment":
            yield (token if kind == "mark" else kind), token, line
        line += token.count("\n")
    yield "end", "", line
