#!/usr/bin/python3
"""tools/setup with apt, dpkg and sudo played by scripts that note how they were called: what it asks of a machine that
has everything, of one that lacks something, and of one where it may not install."""
import os
import shutil
import subprocess
import tempfile
import unittest
from pathlib import Path

SETUP = Path(__file__).resolve().parents[2] / "tools" / "setup"
UNPRIVILEGED = 65534

# Says of each package that it is installed, but for those named in ABSENT; an `apt-get install` brings them.
DPKG_QUERY = """#!/bin/bash
for package in "${@:4}"; do
  [[ " $ABSENT " == *" $package "* && ! -e $HERE/installed ]] || echo "$package installed"
done
"""
APT_GET = """#!/bin/bash
echo "apt-get $*" >>"$HERE/calls"
if [[ $1 == install ]]; then [[ -z $APT_FAILS ]] && touch "$HERE/installed"; fi
"""
SUDO = """#!/bin/bash
[[ $1 != -n ]] || shift
[[ -z $SUDO_REFUSES ]] && "$@"
"""
DPKG = "#!/bin/bash\necho dpkg >>\"$HERE/calls\"\n"


class Setup(unittest.TestCase):
    def setUp(self):
        self.folder = tempfile.TemporaryDirectory()
        self.here = Path(self.folder.name)
        (self.here / "tools").mkdir()
        (self.here / "played").mkdir()
        shutil.copy(SETUP, self.here / "tools" / "setup")
        for name, text in (("dpkg-query", DPKG_QUERY), ("apt-get", APT_GET), ("sudo", SUDO), ("dpkg", DPKG)):
            (self.here / "played" / name).write_text(text)
            (self.here / "played" / name).chmod(0o755)

    def tearDown(self):
        self.folder.cleanup()

    def run_setup(self, *arguments, absent="", apt_fails="", may_install=True):
        environment = {"PATH": f"{self.here}/played:{os.environ['PATH']}", "HERE": str(self.here), "ABSENT": absent,
                       "APT_FAILS": apt_fails, "SUDO_REFUSES": "" if may_install else "yes"}
        user = None
        if os.geteuid() == 0 and not may_install:
            user = UNPRIVILEGED
            for path in (self.here, *self.here.rglob("*")):
                os.chown(path, user, user)
        done = subprocess.run([self.here / "tools" / "setup", *arguments], env=environment, user=user, text=True,
                              capture_output=True, cwd="/")
        return done.returncode, done.stdout, done.stderr

    def apt_calls(self):
        calls = self.here / "calls"
        return calls.read_text().splitlines() if calls.exists() else []

    def test_asks_apt_for_nothing_where_nothing_is_missing(self):
        code, said, _ = self.run_setup()
        self.assertEqual(code, 0)
        self.assertIn("everything needed is installed", said)
        self.assertEqual(self.apt_calls(), [])

    def test_installs_what_is_missing_and_removes_nothing(self):
        code, said, _ = self.run_setup(absent="libzstd-dev ninja-build")
        self.assertEqual(code, 0)
        self.assertIn("  libzstd-dev\n  ninja-build\n", said)
        install = self.apt_calls()[-1]
        self.assertRegex(install, r"^apt-get install .*--no-remove.* libzstd-dev ninja-build$")
        code, said, _ = self.run_setup(absent="libzstd-dev ninja-build")
        self.assertEqual((code, len(self.apt_calls())), (0, 2), "the second run asked apt again")

    def test_wants_clang_for_the_thread_sanitizer_only(self):
        absent = "clang libclang-rt-14-dev"
        self.assertEqual(self.run_setup(absent=absent)[0], 0)
        self.assertEqual(self.apt_calls(), [])
        self.assertEqual(self.run_setup("--preset", "tsan", absent=absent)[0], 0)
        self.assertRegex(self.apt_calls()[-1], "install .* clang libclang-rt-14-dev$")

    def test_names_what_is_missing_where_apt_fails(self):
        code, _, complaint = self.run_setup(absent="libzstd-dev", apt_fails="yes")
        self.assertEqual(code, 3)
        self.assertRegex(complaint, r"missing:\n  libzstd-dev\n")

    def test_names_what_is_missing_where_it_may_not_install(self):
        code, _, complaint = self.run_setup(absent="libzstd-dev sqlite3", may_install=False)
        self.assertEqual(code, 3)
        self.assertRegex(complaint, r"missing:\n  libzstd-dev\n  sqlite3\n")
        self.assertIn("apt-get install --no-remove libzstd-dev sqlite3", complaint)
        self.assertEqual([call for call in self.apt_calls() if "install" in call], [])

    def test_unpacks_boost_where_other_headers_are_in_the_way_else_installs_it(self):
        self.assertEqual(self.run_setup(absent="libboost1.81-dev libboost-url1.81-dev")[0], 0)
        calls = self.apt_calls()
        if Path("/usr/include/boost/version.hpp").exists():  # to setup they are another Boost's: ours is "not installed"
            self.assertRegex(calls[1], r"apt-get download .*libboost1\.81-dev")
            self.assertEqual([call for call in calls if "install" in call], [])
            self.assertTrue((self.here / "build" / "boost-1.81" / "complete").exists())
        else:
            self.assertRegex(calls[-1], r"apt-get install .*--no-remove.*libboost-url1\.81-dev libboost1\.81-dev")

    def test_refuses_an_option_it_does_not_know(self):
        code, _, complaint = self.run_setup("--fast")
        self.assertEqual(code, 2)
        self.assertIn("usage:", complaint)


if __name__ == "__main__":
    unittest.main(verbosity=2)
