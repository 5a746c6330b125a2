// What the running daemon is doing, for `slipledger status`: feeds, marks left to judge, deliveries waiting.
#pragma once

#include <cstdint>
#include <string>
#include <vector>

#include "daemon/intake/feed_counters.hpp"
#include "daemon/timed_ledger.hpp"

namespace slipledger {

// One JSON object without line breaks. Asks the ledger, so not on the network thread.
std::string status_json(const std::vector<intake::FeedStatus>& feeds, const CommitTimes::Longest& commits,
                        const std::string& ledger_path, std::uint16_t http_port);

}  // namespace slipledger
