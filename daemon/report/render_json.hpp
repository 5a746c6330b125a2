// Reports as JSON: the outer contract of `--json` and the API. NaN is null, times are RFC 3339 in UTC, numbers carry six
// significant digits.
#pragma once

#include <nlohmann/json_fwd.hpp>
#include <vector>

#include "daemon/report/episodes.hpp"
#include "daemon/report/health.hpp"
#include "daemon/report/history.hpp"

namespace slipledger::report {

nlohmann::ordered_json to_json(const SectionHealth& health);
// The most urgent section's health; a pump of several sections has them all in `sections` besides.
nlohmann::ordered_json to_json(const PumpHealth& health);
nlohmann::ordered_json to_json(const std::vector<SectionHealth>& fleet);
nlohmann::ordered_json to_json(const std::vector<HistoryRow>& history);
nlohmann::ordered_json to_json(const Episode& episode);
nlohmann::ordered_json to_json(const std::vector<Episode>& episodes);

}  // namespace slipledger::report
