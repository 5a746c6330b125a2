// Lays a run out: one table within 100 columns, or one JSON value.
#pragma once

#include <string>

#include "tools/judging/bench.hpp"
#include "tools/judging/figures.hpp"

namespace slipledger::judging {

std::string table_of(const BenchResult& result);
std::string json_of(const BenchResult& result);

}  // namespace slipledger::judging
