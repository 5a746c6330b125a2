// The short judge: a small run with a fixed seed, and for each figure the worst value that is still taken. A floor lies
// a little beyond what was measured when it was set; raise it when the statistics get better, and never lower one to
// get a change in.
#pragma once

#include <string>
#include <vector>

#include "tools/judging/figures.hpp"

namespace slipledger::judging {

BenchOrder short_order();
BenchOrder full_order();

// One sentence for each figure that fell through its floor.
std::vector<std::string> fallen(const std::vector<Figure>& figures);

}  // namespace slipledger::judging
