"""Rules on how C++ is written here: traps of the compiler, time, threads, exceptions, interfaces."""
import re

import cpp
from tree import Finding

ROOMS = ("analytics", "schema", "config", "daemon", "tools")
SOURCES = (".hpp", ".cpp")


def no_throw_in_analytics(tree):
    """analytics/ does not throw: an estimate that cannot be made is empty or NaN."""
    for path, line, _ in tree.matches(tree.under(("analytics",), *SOURCES), re.compile(r"\bthrow\b")):
        yield Finding(path, line, "throws", "nullopt or NaN, as the header says")


def clock_is_an_argument(tree):
    """Only daemon/clock.cpp reads a clock (and the simulator, benchmarks and tests)."""
    paths = [path for path in tree.under(ROOMS, *SOURCES)
             if path != "daemon/clock.cpp" and not path.startswith(("tools/plantsim/", "tools/bench/"))]
    asks = re.compile(r"::\s*now\s*\(\s*\)|\b(gettimeofday|clock_gettime)\s*\(|\btime\s*\(\s*(nullptr|NULL|0)\s*\)")
    for path, line, found in tree.matches(paths, asks):
        yield Finding(path, line, f"reads a clock: {found.group(0)}", "take `now` or a `const Clock&`")


def no_getenv(tree):
    """Rooms get their settings as values; only main and the tools look at the environment."""
    paths = [path for path in tree.under(("analytics", "schema", "daemon"), *SOURCES) if path != "daemon/main.cpp"]
    for path, line, _ in tree.matches(paths, re.compile(r"\bgetenv\b")):
        yield Finding(path, line, "reads the environment", "a value passed in")


def no_detached(tree):
    """No coroutine is detached: an exception in it would vanish."""
    for path, line, _ in tree.matches(tree.under(ROOMS + ("tests",), *SOURCES), re.compile(r"\bdetached\b")):
        yield Finding(path, line, "detached", "spawn(name, awaitable), which logs how it ended")


def no_context_stop(tree):
    """The io_context is never stopped: what is in flight ends by itself."""
    asks = re.compile(r"\b\w*(io|context|ctx)_?(\.|->)stop\s*\(")
    for path, line, found in tree.matches(tree.under(ROOMS, *SOURCES), asks):
        yield Finding(path, line, found.group(0) + ")", "close acceptors and sessions, let run() return")


def awaited(code, start):
    """The rest of the statement or parenthesised condition after a co_await."""
    depth = 0
    for position in range(start, len(code)):
        sign = code[position]
        if sign in "([":
            depth += 1
        elif sign in ")]":
            depth -= 1
        if depth < 0 or (sign == ";" and depth == 0):
            return code[start:position]
    return code[start:]


def plain_co_await(tree):
    """No brace and no capturing lambda inside a co_await statement: g++ 12 destroys them twice."""
    for path, line, found in tree.matches(tree.under(ROOMS + ("tests",), *SOURCES), re.compile(r"\bco_await\b")):
        rest = awaited(tree.code(path), found.end())
        if "{" in rest or re.search(r"(?<![\w\])])\[[^\]]", rest):
            yield Finding(path, line, "a brace or a capturing lambda in a co_await", "name it on the line before")


def caught_means_told(tree):
    """catch (...) logs, keeps or passes on what it caught."""
    for path, line, found in tree.matches(tree.under(ROOMS, ".hpp", ".cpp"), re.compile(r"catch\s*\(\s*\.\.\.\s*\)\s*")):
        code = tree.code(path)
        body = code[found.end():cpp.closing(code, found.end())]
        if not re.search(r"log|complain|throw|terminate|current_exception|abort", body):
            yield Finding(path, line, "catch (...) in silence", "log it, keep current_exception() or throw on")


def says_who_may_touch(tree):
    """Every class in a header of analytics/ and daemon/ says `Threads: ...` (or the head of its file does)."""
    for path in tree.under(("analytics", "daemon"), ".hpp"):
        head = tree.text(path).split("#pragma once")[0]
        if "Threads:" in head:
            continue
        for record in tree.declared(path).classes:
            thrown = any(re.search(r"(error|exception|Failure)$", base) for base in record.bases)
            if record.keyword == "class" and not record.nested and not thrown and "Threads:" not in record.comment:
                yield Finding(path, record.line, f"class {record.name}", "a comment with `Threads: who may touch it`")


def interface_has_two_users(tree):
    """Each class with a pure virtual function has two implementations in the tree, tests included."""
    everywhere = tree.under(ROOMS + ("tests",), *SOURCES)
    implementers = {}
    for path in everywhere:
        for record in tree.declared(path).classes:
            for base in record.bases:
                implementers.setdefault(base.split("::")[-1], set()).add((path, record.name))
    for path in everywhere:
        for record in tree.declared(path).classes:
            count = len(implementers.get(record.name, ()))
            if record.pure and count < 2:
                yield Finding(path, record.line, f"interface {record.name} has {count} implementations",
                              "two, or plain functions and values instead")
