"""Just enough understanding of C++ to check the house rules: what a header declares, and the comment above it.

No preprocessor and no templates are worked out; it reads the plain style of this project, where a declaration is one
statement and a comment stands right above what it speaks of."""
import re
from dataclasses import dataclass, field


@dataclass
class Function:
    """A function declared or defined: `name` is `function` or `Class::method`, `body` is None for a declaration."""
    name: str
    result: str
    line: int
    comment: str
    statement: str
    public: bool = True
    pure: bool = False
    body: str | None = None


@dataclass
class Class:
    """A class or struct with a body."""
    name: str
    keyword: str
    line: int
    comment: str
    bases: list = field(default_factory=list)
    nested: bool = False
    pure: bool = False


@dataclass
class Scope:
    kind: str  # namespace, class or function
    name: str = ""
    access: str = "public"
    record: Class | None = None


def blank(text):
    """The text with comments, strings and preprocessor lines overwritten by spaces; lines and columns stay."""
    def spaces(found):
        return re.sub(r"[^\n]", " ", found.group(0))

    def quoted(found):
        part = found.group(0)
        return spaces(found) if part.startswith("/") else part[0] + re.sub(r"[^\n]", " ", part[1:-1]) + part[-1]

    pattern = (r'//[^\n]*|/\*.*?\*/|R"(?P<mark>[^(\s]*)\(.*?\)(?P=mark)"|"(?:\\.|[^"\\\n])*"'
               r"|(?<![0-9a-fA-F])'(?:\\.|[^'\\\n])+'")
    text = re.sub(pattern, quoted, text, flags=re.S)
    return re.sub(r"(?m)^[ \t]*#(?:[^\n]*\\\n)*[^\n]*", spaces, text)


def line_of(text, position):
    return text.count("\n", 0, position) + 1


def comment_above(lines, line):
    """The comment that speaks of the declaration at `line`: right above it, or above the group it stands in."""
    at = line - 2
    while at >= 0 and lines[at].strip() and not lines[at].lstrip().startswith("//"):
        at -= 1
    found = []
    while at >= 0 and lines[at].lstrip().startswith("//"):
        found.append(lines[at].lstrip().lstrip("/"))
        at -= 1
    trailing = re.search(r"//(.*)", lines[line - 1])
    return "\n".join(reversed(found)) + ("\n" + trailing.group(1) if trailing else "")


def closing(code, at, opener="{", closer="}"):
    """Position of the bracket that closes the one at `at`."""
    depth = 0
    for position in range(at, len(code)):
        depth += (code[position] == opener) - (code[position] == closer)
        if depth == 0:
            return position
    return len(code) - 1


def without_template(statement):
    """The statement without `template <...>`, requires clauses in front and attributes."""
    statement = re.sub(r"\[\[.*?\]\]", " ", statement, flags=re.S).strip()
    while statement.startswith("template"):
        start = statement.find("<")
        statement = statement[closing(statement, start, "<", ">") + 1:].strip()
    return statement


def first_parenthesis(statement):
    """Position of the first ( outside template arguments, or -1."""
    depth = 0
    for position, sign in enumerate(statement):
        if sign == "<":
            depth += 1
        elif sign == ">" and statement[position - 1] != "-":
            depth -= 1
        elif sign == "(" and depth <= 0:
            return position
    return -1


def read_function(statement):
    """(name, result) of a function's statement, or None if it is something else."""
    statement = without_template(statement)
    if re.match(r"(using|typedef|static_assert|friend|return|concept|enum|if|for|while|switch)\b", statement):
        return None
    at = first_parenthesis(statement)
    if at < 0 or "=" in re.sub(r"operator\s*\S*", "", statement[:at]):
        return None
    found = re.match(r"(.*?)([\w:]*(?:operator\s*\S+|~?\w+))\s*$", statement[:at], flags=re.S)
    if not found:
        return None
    result = " ".join(re.sub(r"\b(static|constexpr|inline|virtual|explicit|consteval|extern)\b", " ",
                             found.group(1)).split())
    trailing = re.search(r"\)[^()]*->\s*([\w:<>, ]+)", statement[at:])
    return found.group(2), trailing.group(1).strip() if trailing and result == "auto" else result


def opens_body(statement):
    """Whether the { after this function statement opens its body, not a member's initial value or a default."""
    if re.search(r"\)\s*(const|noexcept|override|final|mutable|&|\s)*:(?!:)", statement):
        return statement.rstrip()[-1] in ")}"
    return True


class Reader:
    """Reads one file; `functions` and `classes` hold what was found outside function bodies."""

    def __init__(self, text):
        self.lines = text.split("\n")
        self.code = blank(text)
        self.functions = []
        self.classes = []
        self.scopes = []
        self.begin = 0
        self.read()

    def read(self):
        at = parens = 0
        while at < len(self.code):
            sign = self.code[at]
            if sign in "([":
                parens += 1
            elif sign in ")]":
                parens -= 1
            elif parens == 0:
                at = self.structural(sign, at)
            at += 1

    def structural(self, sign, at):
        """Handles ; { } and access labels; returns the position to go on from."""
        statement = self.code[self.begin:at]
        if sign == ";":
            self.declaration(statement, None)
            self.begin = at + 1
        elif sign == "}":
            if self.scopes:
                self.scopes.pop()
            self.begin = at + 1
        elif sign == ":" and self.scopes and re.fullmatch(r"\s*(public|private|protected)\s*", statement):
            self.scopes[-1].access = statement.strip()
            self.begin = at + 1
        elif sign == "{":
            return self.opening(statement, at)
        return at

    def opening(self, statement, at):
        plain = without_template(statement)
        if re.match(r"(inline\s+)?namespace\b|extern\s*$|extern\s+\"", plain):
            self.scopes.append(Scope("namespace"))
            self.begin = at + 1
            return at
        found = re.match(r"(class|struct|union)\b\s*([\w:]*)\s*(?:final)?\s*(?::(?!:)(.*))?$", plain, flags=re.S)
        if found and "=" not in plain:
            self.open_class(statement, found)
            self.begin = at + 1
            return at
        end = closing(self.code, at)
        if read_function(statement) and not plain.startswith("enum"):
            if not opens_body(statement):
                return end
            self.declaration(statement, self.code[at + 1:end])
            self.begin = end + 1
        return end

    def open_class(self, statement, found):
        line = self.first_line(statement)
        bases = [re.sub(r"<.*", "", re.sub(r"\b(public|private|protected|virtual)\b", "", base)).strip()
                 for base in (found.group(3) or "").split(",")]
        nested = any(scope.kind == "class" for scope in self.scopes)
        record = Class(found.group(2), found.group(1), line, comment_above(self.lines, line),
                       [base for base in bases if base], nested)
        self.classes.append(record)
        access = "private" if found.group(1) == "class" else "public"
        self.scopes.append(Scope("class", found.group(2), access, record))

    def first_line(self, statement):
        offset = len(statement) - len(statement.lstrip())
        return line_of(self.code, self.begin + offset)

    def declaration(self, statement, body):
        head = read_function(statement)
        if not head:
            return
        name, result = head
        owners = [scope for scope in self.scopes if scope.kind == "class"]
        pure = body is None and bool(re.search(r"=\s*0\s*$", statement))
        if owners and pure:
            owners[-1].record.pure = True
        if re.search(r"=\s*(default|delete)\s*$", statement):
            return
        line = self.first_line(statement)
        public = all(scope.access == "public" for scope in owners)
        full = "::".join([scope.name for scope in owners] + [name])
        self.functions.append(Function(full, result, line, comment_above(self.lines, line), statement, public, pure,
                                       body))
