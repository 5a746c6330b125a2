// The mill's readings as files: one CSV for all, the truth beside it, and the drop folder's weekly files.
#pragma once

#include <filesystem>

#include "tools/plantsim/span.hpp"

namespace slipledger::plantsim {

// All of them throw std::runtime_error where a file cannot be written. Each returns how many rows it wrote.

// One file, ordered by time and within a time by pump as listed.
std::size_t write_csv(const Mill& mill, const std::vector<std::size_t>& pumps, const Span& span,
                      const std::filesystem::path& file);

// time,pump,section,running_h,leakage_ratio at the end of each of the plant's calendar days.
std::size_t write_truth(const Mill& mill, const std::vector<std::size_t>& pumps, const Span& span,
                        const std::filesystem::path& file);

// One pump's files, each of `days` days: written as NAME.csv.part, then renamed, so that nobody sees half a file.
std::size_t drop_files(const Mill& mill, std::size_t pump, const Span& span, int days, const Pace& pace,
                       const std::filesystem::path& folder);

}  // namespace slipledger::plantsim
