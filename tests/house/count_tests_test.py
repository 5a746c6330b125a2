#!/usr/bin/python3
"""tools/count-tests: the closing lines of a test run, and what counts as a success."""
import subprocess
import tempfile
import unittest
from pathlib import Path

COUNT = Path(__file__).resolve().parents[2] / "tools" / "count-tests"

PASSED = '<testcase name="a" status="run"><system-out>[  SKIPPED ] is only a word here</system-out></testcase>'
FAILED = '<testcase name="b" status="fail"><failure message=""/><system-out/></testcase>'
BROKEN = '<testcase name="c" status="notrun"><skipped message="Unable to find executable: c"/><system-out/></testcase>'
SKIPPED = ('<testcase name="d" status="notrun"><skipped message="SKIP_REGULAR_EXPRESSION_MATCHED"/><system-out>'
           "[ RUN ] x\n/a/b_test.cpp:7: Skipped\nno shared data\n\n[  SKIPPED ] x</system-out></testcase>")
BY_CODE = ('<testcase name="e" status="notrun"><skipped message="SKIP_RETURN_CODE=77"/>'
           "<system-out>skipped: needs root</system-out></testcase>")


def run(*cases):
    """(exit code, lines) for a results file with these cases; no file where there are none."""
    with tempfile.TemporaryDirectory() as folder:
        results = Path(folder) / "tests.xml"
        if cases:
            results.write_text(f"<testsuite>{''.join(cases)}</testsuite>")
        done = subprocess.run([COUNT, results], text=True, capture_output=True)
        return done.returncode, done.stdout.rstrip("\n").split("\n")


class CountTests(unittest.TestCase):
    def test_all_passed_is_a_success(self):
        self.assertEqual(run(PASSED, PASSED), (0, ["2 passed, 0 failed, 0 skipped"]))

    def test_a_failure_is_named_and_counted(self):
        self.assertEqual(run(PASSED, FAILED), (1, ["FAILED   b", "1 passed, 1 failed, 0 skipped"]))

    def test_a_program_that_is_not_there_is_a_failure(self):
        self.assertEqual(run(PASSED, BROKEN), (1, ["FAILED   c", "1 passed, 1 failed, 0 skipped"]))

    def test_a_skip_says_why(self):
        code, lines = run(PASSED, SKIPPED, BY_CODE)
        self.assertEqual(code, 0)
        self.assertEqual(lines, ["SKIPPED  d", "         because: no shared data", "SKIPPED  e",
                                 "         because: needs root", "1 passed, 0 failed, 2 skipped"])

    def test_nothing_executed_is_a_failure(self):
        for cases in ((), (SKIPPED,)):
            with self.subTest(cases=len(cases)):
                code, lines = run(*cases)
                self.assertEqual(code, 1)
                self.assertRegex(lines[-1], r"^0 passed, 0 failed, \d skipped$")


if __name__ == "__main__":
    unittest.main(verbosity=2)
