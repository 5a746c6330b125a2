"""Pairs every public function of analytics/ that computes something with the test that checks it against a value from
outside or one worked by hand. A test says so in a comment right above it:

   // reference: viscosity_index - outside: ASTM D2270, worked examples (quoted from memory)
   // reference: Fluid::kinematic_cst, Fluid::density_kgm3 - hand-worked: line through both points, on paper below

A function that computes nothing of the method says `Not computed: why` in the comment in its header. Constructors,
operators, words for a value and functions that only hand out a member need nothing."""
import re
from collections import namedtuple

Reference = namedtuple("Reference", "name kind source test path line")

LINE = re.compile(r"\s*//\s*reference:\s*(.+?)\s+-\s+(outside|hand-worked):\s*(.+)")
TEST = re.compile(r"\s*(?:TEST|TEST_F|TEST_P|TYPED_TEST)\(\s*(\w+)\s*,\s*(\w+)")
WORDS = ("std::string", "std::string_view", "const std::string&", "const char*")


def hands_out_a_value(body):
    """Whether an inline body is one return without arithmetic."""
    return bool(re.fullmatch(r"\s*return\s[^;]*;\s*", body)) and not re.search(
        r"[-+*/%]|\b(exp|log|sqrt|cbrt|pow|fabs|abs|hypot)\b", re.sub(r"->", ".", body))


def computes(function):
    """Whether a function needs a reference value."""
    parts = function.name.split("::")
    if not function.public or function.result in WORDS or "operator" in parts[-1]:
        return False
    if len(parts) > 1 and parts[-1].lstrip("~") == parts[-2]:
        return False
    if "Not computed:" in function.comment:
        return False
    return function.body is None or not hands_out_a_value(function.body)


def wanted(tree):
    """{name: (path, line)} of the functions that need a reference; overloads count as one."""
    found = {}
    for path in tree.under(("analytics",), ".hpp"):
        for function in tree.declared(path).functions:
            if computes(function):
                found.setdefault(function.name, (path, function.line))
    return found


def test_below(lines, number):
    """(the comment's further lines, name of the test it stands above or None)."""
    more = []
    for line in lines[number:]:
        if not line.lstrip().startswith("//"):
            found = TEST.match(line)
            return " ".join(more), f"{found.group(1)}.{found.group(2)}" if found else None
        if LINE.match(line):
            return " ".join(more), test_below(lines, lines.index(line, number) + 1)[1]
        more.append(line.strip().lstrip("/ "))
    return "", None


def given(tree):
    """Every reference comment of the tests; `test` is None where it stands above no test."""
    for path in tree.under(("tests/analytics", "tests/reference"), ".cpp"):
        lines = tree.text(path).split("\n")
        for number, line in enumerate(lines, 1):
            found = LINE.match(line)
            if not found:
                continue
            more, test = test_below(lines, number)
            source = f"{found.group(3)} {more}".strip()
            for name in re.split(r"\s*,\s*", found.group(1)):
                yield Reference(name, found.group(2), source, test, path, number)


def names(reference, function):
    """Whether the reference means the function; namespaces in front may be written or left out."""
    return reference.name == function or reference.name.endswith("::" + function)
