// For whoever tunes: a row for each section with all its marks, and one section's year day by day, as CSV.
#pragma once

#include <string>

#include "tools/judging/bench.hpp"

namespace slipledger::judging {

std::string details_csv(const BenchResult& result);

// What was told each day beside what was true, for every section of the story.
std::string trace_csv(const Story& story, Spoil spoil, const std::filesystem::path& folder);

}  // namespace slipledger::judging
