"""Rules on who may know whom: includes between rooms, and what the analytics library may ask of the system."""
import re
import subprocess

from tree import Finding

INNER = ("analytics", "config", "schema")
ARROWS = {  # a room -> the rooms it may include, besides itself
    "analytics": (),
    "schema": (),
    "config": ("analytics", "schema"),
    "daemon/ledger": INNER + ("daemon",),
    "daemon/report": INNER + ("daemon", "daemon/ledger"),
}
for _room in ("intake", "watch", "notify", "http"):
    ARROWS["daemon/" + _room] = INNER + ("daemon", "daemon/ledger", "daemon/report")

# Standard headers that bring files, streams to the outside, threads or signals.
NOT_PURE = set("iostream fstream filesystem thread mutex shared_mutex condition_variable future atomic semaphore latch "
               "barrier stop_token csignal ctime random_device syncstream coroutine".split())

# What C calls outside, by whole name; what C++ calls, by a part of it.
IMPURE_C = set("clock_gettime gettimeofday time localtime localtime_r fopen fopen64 open open64 openat socket connect bind "
               "listen send recv pthread_create pthread_mutex_lock pthread_cond_wait printf puts fwrite fputs "
               "getenv secure_getenv".split())
IMPURE_CPP = re.compile(r"_clock::now|basic_(filebuf|ifstream|ofstream|fstream)|std::filesystem|std::thread"
                        r"|std::(cout|cerr|clog|cin)\b|std::random_device|boost::asio|sqlite3_|spdlog::|nlohmann::")


def room_of(path):
    """The room a file belongs to: `daemon/ledger`, `daemon` for what lies directly in it, else the top folder."""
    parts = path.split("/")
    return "/".join(parts[:2]) if parts[0] == "daemon" and len(parts) > 2 else parts[0]


def includes(tree, path):
    """(line, header) of each include in quotes."""
    for number, line in enumerate(tree.text(path).split("\n"), 1):
        found = re.match(r'\s*#\s*include\s*"([^"]+)"', line)
        if found:
            yield number, found.group(1)


def includes_a_daemon_room(tree, path):
    return path in tree.paths and any(room_of(header) in ARROWS and header.startswith("daemon/")
                                      for _, header in includes(tree, path))


def include_direction(tree):
    """Includes run one way: tools -> daemon's rooms -> config -> analytics; schema knows nobody."""
    for path in tree.under(("analytics", "schema", "config", "daemon", "tools"), ".hpp", ".cpp"):
        room = room_of(path)
        for line, header in includes(tree, path):
            found = f'includes "{header}"'
            if "/" not in header:
                yield Finding(path, line, found, "the path from the root of the checkout")
            elif header.startswith("tests/"):
                yield Finding(path, line, found, "nothing outside tests/ knows the tests")
            elif room in ARROWS and room_of(header) not in (room,) + ARROWS[room]:
                yield Finding(path, line, found, f"{room}/ may include {', '.join(ARROWS[room]) or 'nobody'}")
            elif room in ARROWS and room_of(header) == "daemon" and includes_a_daemon_room(tree, header):
                yield Finding(path, line, found, f"{header} knows daemon's rooms, so they may not know it")
            elif room == "daemon" and room_of(header) in ("tools", "tests"):
                yield Finding(path, line, found, "daemon/ may include its rooms, config, schema, analytics")


def analytics_headers(tree):
    """analytics/ includes only the standard library's pure parts, Eigen and Boost.Math."""
    for path in tree.under(("analytics",), ".hpp", ".cpp"):
        for number, line in enumerate(tree.text(path).split("\n"), 1):
            found = re.match(r"\s*#\s*include\s*<([^>]+)>", line)
            if not found:
                continue
            header = found.group(1)
            pure = re.fullmatch(r"[a-z_0-9]+", header) and header not in NOT_PURE
            if not pure and not header.startswith(("Eigen/", "boost/math/")):
                yield Finding(path, number, f"includes <{header}>",
                              "std without files, clocks and threads; Eigen; Boost.Math")


def sqlite_behind_the_seam(tree):
    """Only daemon/ledger/ and tests know SQLite."""
    for path in tree.under(("analytics", "schema", "config", "daemon", "tools"), ".hpp", ".cpp"):
        if room_of(path) == "daemon/ledger":
            continue
        for number, line in enumerate(tree.text(path).split("\n"), 1):
            if re.match(r"\s*#\s*include\s*[<\"](SQLiteCpp/|sqlite3\.h)", line):
                yield Finding(path, number, line.strip(), "ask daemon/ledger/, which alone knows the store")


def analytics_symbols(library):
    """The built analytics library asks the system for no clock, file, socket, thread or output."""
    listing = subprocess.run(["nm", "--demangle", "--print-file-name", library], check=True, text=True,
                             capture_output=True).stdout
    for line in listing.split("\n"):
        found = re.match(r"(?:.*/)?(.*\.o):\s*[0-9a-f]*\s+\w (.*)", line)
        if found and (found.group(2) in IMPURE_C or IMPURE_CPP.search(found.group(2))):
            yield Finding(found.group(1), 0, f"uses {found.group(2)}", "analytics/ computes from values alone")
