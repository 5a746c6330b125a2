"""The checkout as the rules see it: which files there are, their text, and what they declare. Read once, kept."""
from collections import namedtuple
from functools import cache
from pathlib import Path

import cpp

# One breach of a rule: what stands where, and what is wanted instead.
Finding = namedtuple("Finding", "path line found wanted")

FOLDERS = ("analytics", "schema", "config", "daemon", "tools", "tests", "cmake", ".ci")


class Tree:
    """Paths are strings relative to the root, with forward slashes."""

    def __init__(self, root):
        self.root = Path(root)
        files = [path for path in self.root.iterdir() if path.is_file() and path.name != ".git"]
        for folder in FOLDERS:
            files += [path for path in (self.root / folder).rglob("*") if path.is_file()]
        self.paths = sorted(path.relative_to(self.root).as_posix() for path in files
                            if "__pycache__" not in path.parts)

    def under(self, folders, *endings):
        """Files in one of the folders whose name has one of the endings."""
        return [path for path in self.paths
                if path.startswith(tuple(folder + "/" for folder in folders)) and path.endswith(endings)]

    @cache
    def text(self, path):
        """The text of a file; nothing for one that is not text."""
        try:
            return (self.root / path).read_text(encoding="utf-8")
        except UnicodeDecodeError:
            return ""

    @cache
    def code(self, path):
        """The text without comments, strings and preprocessor lines."""
        return cpp.blank(self.text(path))

    @cache
    def declared(self, path):
        """What the file declares."""
        return cpp.Reader(self.text(path))

    def matches(self, paths, pattern):
        """(path, line, match) of each place in the code of the paths where the compiled pattern is found."""
        for path in paths:
            code = self.code(path)
            for found in pattern.finditer(code):
                yield path, cpp.line_of(code, found.start()), found
