// What a logger is told after a durable commit: one JSON line.
#pragma once

#include <string>

#include "daemon/intake/batch_builder.hpp"

namespace slipledger::intake {

// {"stored":1200,"repeated":3,"refused":1,"through":1204,"faults":[{"line":17,"reason":"..."}]} and a line end; where more
// faults were found than are listed, "more_faults" says how many.
std::string reply_line(const LineAccount& account, std::uint64_t stored, std::uint64_t repeated);

// {"failed":"..."}: what came since the last reply may not be stored; the logger connects again and repeats it.
std::string failure_line(const std::string& failure);

}  // namespace slipledger::intake
