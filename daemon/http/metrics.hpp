// The fleet and the feeds as OpenMetrics text, for whoever graphs the plant's systems.
#pragma once

#include <string>
#include <vector>

#include "daemon/ledger/reader.hpp"
#include "daemon/report/health.hpp"

namespace slipledger::http {

// OpenMetrics 1.0 text, "# EOF" included. Levels are 0 unjudged to 4 act; unknown values are left out.
std::string open_metrics(const std::vector<report::SectionHealth>& fleet, const ledger::Reader& reader);

}  // namespace slipledger::http
