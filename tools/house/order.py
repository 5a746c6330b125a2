"""Rules on the order of files: twins, tests, lists of sources, headers that explain themselves, forbidden words."""
import posixpath
import re

import references
from tree import Finding

VAGUE = re.compile(r"(^|_|-)(utils?|common|helpers?|misc|stuff)(_|-|\.|$)")

# Written so that this file does not contain what it looks for.
FORBIDDEN = re.compile(r"(?<![\w.])/wor[k]/|/tmp/buil[d]|/roo[t]/|/home/[a-z]+/|\bTOD[O]\b|\bFIXM[E]\b|\bXX[X]\b")

# What may stand behind `Returns`: a canonical unit, or a word for a number without one.
UNIT = re.compile(r"\b(bar|L/min|rpm|degC|K|mm2/s|cm3/rev|cm3|m3|kW|h|s|ms|kg/m3|Pa s|GPa|years?|days?|unit|per"
                  r"|fraction|ratio|number|share|probability|logarithm)\b|%")


def twins_in_analytics(tree):
    """Each .cpp of analytics/ has its header beside it and its test in tests/analytics/."""
    for path in tree.under(("analytics",), ".cpp"):
        stem = path.removesuffix(".cpp")
        for twin in (stem + ".hpp", f"tests/{stem}_test.cpp"):
            if twin not in tree.paths:
                yield Finding(path, 1, "has no twin", twin)


def lists_of_sources(tree):
    """{source: [(CMakeLists.txt, line)]}: every .cpp named outside comments, as a path from the root."""
    named = {}
    for path in tree.paths:
        if not path.endswith(("CMakeLists.txt", ".cmake")):
            continue
        folder = path.rpartition("/")[0]
        for number, line in enumerate(tree.text(path).split("\n"), 1):
            for source in re.findall(r"[\w./{}$-]+\.cpp\b", line.split("#")[0]):
                source = source.replace("${CMAKE_CURRENT_SOURCE_DIR}/", "")
                full = re.sub(r"^\$\{\w+_SOURCE_DIR\}/", "", source)
                full = full if full != source else posixpath.normpath(f"./{folder}/{source}")
                named.setdefault(full, []).append((path, number))
    return named


def no_dead_source(tree):
    """Every .cpp, tests above all, stands in a CMakeLists.txt."""
    named = lists_of_sources(tree)
    for path in tree.under(("analytics", "schema", "config", "daemon", "tools", "tests"), ".cpp"):
        if path not in named:
            yield Finding(path, 1, "stands in no CMakeLists.txt", "list it, or delete it")


def no_commented_source(tree):
    """No source is commented out in CMake."""
    for path in tree.paths:
        if not path.endswith(("CMakeLists.txt", ".cmake")):
            continue
        for number, line in enumerate(tree.text(path).split("\n"), 1):
            if re.match(r"\s*#\s*[\w/.-]+\.(cpp|hpp)\s*\)?\s*$|\s*#\s*(add_subdirectory|add_test|room_test)\b.*\)\s*$", line):
                yield Finding(path, number, line.strip(), "build it, or delete it and say why in the commit")


def header_opens_with_why(tree):
    """A header opens with a comment: why the file exists and what to use instead."""
    for path in tree.under(("analytics", "schema", "config", "daemon", "tools"), ".hpp"):
        if not tree.text(path).startswith("//"):
            yield Finding(path, 1, "opens without a comment", "two lines on why the file exists")


def physics_explained(tree):
    """Every public function of analytics/ returning double says `Returns` with a unit, and `Source:`, in its comment."""
    for path in tree.under(("analytics",), ".hpp"):
        for function in tree.declared(path).functions:
            if function.result not in ("double", "std::optional<double>") or not references.computes(function):
                continue
            returns = re.search(r"\bReturns\b(.*?)(\.\s|\n\s*\n|$)", function.comment, re.S)
            for word, said in (("Returns", returns), ("Source:", "Source:" in function.comment),
                               ("the unit it returns", not returns or UNIT.search(returns.group(1)))):
                if not said:
                    yield Finding(path, function.line, f"{function.name} is explained without {word}",
                                  "the fixed form of a physical function's comment")


def no_vague_names(tree):
    """No file is called utils, common or helpers: it would attract whatever has no home."""
    for path in tree.paths:
        if VAGUE.search(path.rpartition("/")[2]):
            yield Finding(path, 1, "a name that says nothing", "the name of the concept in it")


def no_forbidden_words(tree):
    """No path of one person's machine, no note of work left undone."""
    for path in tree.paths:
        for number, line in enumerate(tree.text(path).split("\n"), 1):
            found = FORBIDDEN.search(line)
            if found:
                yield Finding(path, number, f'"{found.group(0)}"', "what holds on every machine; finished work")
