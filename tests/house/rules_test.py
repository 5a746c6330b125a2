#!/usr/bin/python3
"""Every house rule can fail: a small breach planted in a copy of the checkout is found, by file and line; and what only
looks like a breach is let through."""
import os
import re
import shutil
import subprocess
import tempfile
import unittest
from pathlib import Path

ROOT = Path(__file__).resolve().parents[2]
CHECK = ROOT / "tools" / "check-rooms"

# rule, file, text that breaches it, line of the breach in that text
BREACHES = [
    ("include-direction", "analytics/planted.cpp", '#include "config/plant.hpp"\n', 1),
    ("include-direction", "schema/planted.cpp", '#include "analytics/fluid.hpp"\n', 1),
    ("include-direction", "config/planted.hpp", '// Why.\n#include "daemon/clock.hpp"\n', 2),
    ("include-direction", "daemon/ledger/planted.cpp", '#include "daemon/report/health.hpp"\n', 1),
    ("include-direction", "daemon/intake/planted.cpp", '#include "daemon/watch/analyst.hpp"\n', 1),
    ("include-direction", "daemon/planted.cpp", '#include "tools/slipledger/options.hpp"\n', 1),
    ("include-direction", "tools/slipledger/planted.cpp", '#include "tests/support/manual_clock.hpp"\n', 1),
    ("include-direction", "daemon/http/planted.cpp", '#include "routes.hpp"\n', 1),
    ("analytics-headers", "analytics/planted.hpp", "#include <vector>\n#include <fstream>\n", 2),
    ("analytics-headers", "analytics/planted.hpp", "#include <boost/asio.hpp>\n", 1),
    ("analytics-headers", "analytics/planted.cpp", "#include <nlohmann/json.hpp>\n", 1),
    ("sqlite-behind-the-seam", "daemon/watch/planted.cpp", "#include <SQLiteCpp/SQLiteCpp.h>\n", 1),
    ("no-throw-in-analytics", "analytics/planted.cpp", "void f() {\n    throw 1;\n}\n", 2),
    ("clock-is-an-argument", "daemon/watch/planted.cpp", "auto t = std::chrono::system_clock::now();\n", 1),
    ("clock-is-an-argument", "config/planted.cpp", "auto t = ::time(nullptr);\n", 1),
    ("no-getenv", "daemon/http/planted.cpp", 'auto e = std::getenv("HOME");\n', 1),
    ("no-detached", "daemon/http/planted.cpp", "net::co_spawn(ex, f(), net::detached);\n", 1),
    ("no-context-stop", "daemon/http/planted.cpp", "void f() { io_context.stop(); }\n", 1),
    ("plain-co-await", "daemon/http/planted.cpp", "void f() {\n    co_await g({.name = s});\n}\n", 2),
    ("plain-co-await", "daemon/http/planted.cpp", "auto r = co_await net::co_spawn(ex,\n    [x] { g(x); }, t);\n", 1),
    ("caught-means-told", "daemon/http/planted.cpp", "void f() {\n    try { g(); } catch (...) { }\n}\n", 2),
    ("says-who-may-touch", "daemon/http/planted.hpp", "// Why.\n#pragma once\n\n// A thing.\nclass Thing {\n};\n", 5),
    ("interface-has-two-users", "daemon/http/planted.hpp",
     "// Why.\nclass Lonely {\n    virtual void f() = 0;\n};\nclass Only : public Lonely {\n    void f() override;\n};\n", 2),
    ("twins-in-analytics", "analytics/planted.cpp", "int f() { return 1; }\n", 1),
    ("no-dead-source", "tests/daemon/planted_test.cpp", "TEST(A, B) {}\n", 1),
    ("no-commented-source", "tests/planted/CMakeLists.txt", "room_test(a\n  SOURCES\n  # b_test.cpp\n)\n", 3),
    ("header-opens-with-why", "config/planted.hpp", "#pragma once\n", 1),
    ("physics-explained", "analytics/planted.hpp",
     "// Why.\n#pragma once\n\n// Power.\n//\n// Returns kW.\ndouble power_kw(double x);\n", 7),
    ("physics-explained", "analytics/planted.hpp",
     "// Why.\n#pragma once\n\n// Power. Returns it.\n// Source: from memory.\ndouble power_kw(double x);\n", 6),
    ("no-vague-names", "daemon/string_utils.hpp", "// Why.\n", 1),
    ("no-forbidden-words", "daemon/planted.cpp", "// see /wor" + "k/notes\n", 1),
    ("no-forbidden-words", "schema/planted.md", "Keys.\n\nTO" + "DO: the rest\n", 3),
]

INNOCENT = [
    ("include-direction", "daemon/report/planted.cpp", '#include "daemon/ledger/reader.hpp"\n#include "analytics/fluid.hpp"\n'),
    ("analytics-headers", "analytics/planted.cpp", "#include <cmath>\n#include <Eigen/Dense>\n#include <boost/math/tools/roots.hpp>\n"),
    ("no-throw-in-analytics", "analytics/planted.cpp", '// does not throw\nauto s = "throw";\n'),
    ("no-detached", "daemon/http/planted.cpp", "// never detached\n"),
    ("plain-co-await", "daemon/http/planted.cpp",
     "void f() {\n    if (auto n = co_await g(a[1], s[i]); n) {\n        h();\n    }\n"
     "    auto r = co_await (std::move(read) || timer.async_wait(as_values));\n"
     "    while (co_await next()) { k([x] {}); }\n}\n"),
    ("caught-means-told", "daemon/http/planted.cpp", "void f() { try { g(); } catch (...) { log(std::current_exception()); } }\n"),
    ("says-who-may-touch", "daemon/http/planted.hpp",
     "// Why.\n\nenum class Level { low };\nclass Later;\n\n// Threads: any.\nclass Thing {\n    class Inner {};\n};\n"),
    ("interface-has-two-users", "daemon/http/planted.hpp",
     "// Why.\nclass Seam {\n    virtual void f() = 0;\n};\nclass A : public Seam {\n};\nclass B final : public x::Seam {\n};\n"),
    ("physics-explained", "analytics/planted.hpp",
     "// Why.\n\n// Power.\n//\n// Returns kW.\n// Source: from memory.\ndouble power_kw(double x);\n\n"
     "class A {\npublic:\n    double held() const { return held_; }\nprivate:\n    double inner(int x);\n};\n"),
    ("no-forbidden-words", "daemon/planted.cpp", '#include "net/wor' + 'k/queue.hpp"\n'),
]

IMPURE = {
    "clock": "#include <chrono>\nlong long f() { return std::chrono::system_clock::now().time_since_epoch().count(); }\n",
    "file": "#include <cstdio>\nvoid* f() { return fopen(\"a\", \"r\"); }\n",
    "stream": "#include <fstream>\nint f() { std::ifstream in(\"a\"); return in.get(); }\n",
    "socket": "#include <sys/socket.h>\nint f() { return socket(AF_INET, SOCK_STREAM, 0); }\n",
    "thread": "#include <thread>\nvoid g(); void f() { std::thread(g).join(); }\n",
}
PURE = "#include <cmath>\n#include <vector>\ndouble f(std::vector<double> v) { v.push_back(1); return std::exp(v[0]); }\n"


def check(*arguments):
    """(exit code, output) of the checker."""
    done = subprocess.run([CHECK, *arguments], text=True, capture_output=True)
    return done.returncode, done.stdout + done.stderr


def named_apart(path, number):
    """The path with a number in it, so that many can be planted at once; CMakeLists.txt keeps its name."""
    return path.replace("planted", f"planted{number}", 1).replace("/string_", f"/string{number}_")


class HouseRules(unittest.TestCase):
    @classmethod
    def setUpClass(cls):
        cls.folder = tempfile.TemporaryDirectory()
        cls.copy = Path(cls.folder.name) / "copy"
        shutil.copytree(ROOT, cls.copy, ignore=shutil.ignore_patterns("build", ".git", "__pycache__"), symlinks=True)
        cls.breaches = [(rule, named_apart(path, number), text, line)
                        for number, (rule, path, text, line) in enumerate(BREACHES, 100)]
        cls.innocent = [(rule, named_apart(path, number), text)
                        for number, (rule, path, text) in enumerate(INNOCENT, 200)]
        for _, path, text, *_ in cls.breaches + cls.innocent:
            (cls.copy / path).parent.mkdir(parents=True, exist_ok=True)
            (cls.copy / path).write_text(text)
        cls.code, cls.output = check("--root", cls.copy)

    @classmethod
    def tearDownClass(cls):
        cls.folder.cleanup()

    def test_a_planted_breach_is_found_with_its_line(self):
        self.assertEqual(self.code, 1)
        for rule, path, _, line in self.breaches:
            with self.subTest(rule=rule, path=path):
                self.assertRegex(self.output, rf"(?m)^{re.escape(path)}:{line}: .+\n    wanted: .+ \({rule}\)$")

    def test_what_only_looks_like_a_breach_is_let_through(self):
        for rule, path, _ in self.innocent:
            with self.subTest(rule=rule, path=path):
                self.assertNotRegex(self.output, rf"(?m)^{re.escape(path)}:\d+: .+\n    wanted: .+ \({rule}\)$")

    def test_every_rule_has_a_planted_breach(self):
        listed = check("--list")[1]
        rules = {line for line in listed.split("\n") if line and not line.startswith(" ")}
        self.assertEqual(rules - {rule for rule, *_ in BREACHES}, {"analytics-symbols"})

    def check_library(self, text):
        """What the checker says of a static library made of the text."""
        folder = Path(tempfile.mkdtemp(dir=self.folder.name))
        (folder / "planted.cpp").write_text(text)
        compiler = os.environ.get("CXX", "c++")
        subprocess.run([compiler, "-std=c++20", "-O1", "-c", "planted.cpp", "-o", "planted.o"], cwd=folder, check=True)
        subprocess.run(["ar", "rc", "planted.a", "planted.o"], cwd=folder, check=True)
        return check("--only", "analytics-symbols", "--library", folder / "planted.a")

    def test_a_library_that_touches_the_world_is_found(self):
        for name, text in IMPURE.items():
            with self.subTest(name):
                code, output = self.check_library(text)
                self.assertEqual(code, 1, output)
                self.assertIn("planted.o", output)

    def test_a_library_that_only_computes_is_let_through(self):
        code, output = self.check_library(PURE)
        self.assertEqual(code, 0, output)


if __name__ == "__main__":
    unittest.main(verbosity=2)
