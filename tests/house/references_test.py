#!/usr/bin/python3
"""tools/check-references pairs functions with their tests, and ends 1 on a gap or on a reference to nothing."""
import subprocess
import tempfile
import unittest
from pathlib import Path

CHECK = Path(__file__).resolve().parents[2] / "tools" / "check-references"

HEADER = """// Why.
#pragma once
namespace slipledger::analytics {
std::string_view name_of(Level level);
// Not computed: a list kept elsewhere.
int rules();

double power_kw(double dp_bar, double flow_lpm);
constexpr double hp(double kw) { return kw / 0.7457; }
class Filter {
public:
    Filter(int n);
    double held() const { return held_; }
    bool operator==(const Filter&) const = default;
    void feed(double x);
private:
    void inner();
};
}
"""
POWER = "// reference: analytics::power_kw, hp - outside: exact unit conversion,\n// SI brochure\nTEST(Power, OfAPump) {}\n"
FEED = "// reference: Filter::feed - hand-worked: two steps on paper\n// 1 + 1 = 2\nTEST_F(Filter, Learns) {}\n"


def run(test_text, header=HEADER):
    """(exit code, output) on a small checkout of one header and one test."""
    with tempfile.TemporaryDirectory() as folder:
        for path, text in (("analytics/power.hpp", header), ("tests/analytics/power_test.cpp", test_text)):
            target = Path(folder) / path
            target.parent.mkdir(parents=True, exist_ok=True)
            target.write_text(text)
        done = subprocess.run([CHECK, "--root", folder], text=True, capture_output=True)
        return done.returncode, done.stdout + done.stderr


class References(unittest.TestCase):
    def test_each_function_with_its_reference_is_fine(self):
        code, output = run(POWER + FEED)
        self.assertEqual(code, 0, output)
        self.assertIn("outside, Power.OfAPump", output)
        self.assertIn("exact unit conversion, SI brochure", output)
        self.assertIn("hand-worked, Filter.Learns", output)
        self.assertIn("3 computing functions: 2 checked against the outside, 1 hand-worked", output)

    def test_a_function_without_one_is_a_gap(self):
        code, output = run(POWER)
        self.assertEqual(code, 1)
        self.assertIn("analytics/power.hpp:15: Filter::feed", output)

    def test_a_reference_to_nothing_is_told(self):
        code, output = run(POWER + FEED + FEED.replace("Filter::feed", "Filter::starve"))
        self.assertEqual(code, 1)
        self.assertIn("Filter::starve is no public computing function", output)

    def test_a_reference_above_no_test_counts_for_nothing(self):
        code, output = run(POWER + FEED.replace("TEST_F(Filter, Learns) {}", "int x;"))
        self.assertEqual(code, 1)
        self.assertIn("stands above no TEST", output)
        self.assertIn("1 gaps", output)

    def test_a_checkout_without_functions_proves_nothing(self):
        self.assertEqual(run("", "// Why.\n")[0], 1)

    def test_two_references_may_stand_above_one_test(self):
        both = POWER.split("TEST")[0] + FEED
        self.assertEqual(run(both)[0], 0)


if __name__ == "__main__":
    unittest.main(verbosity=2)
