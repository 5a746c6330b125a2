#include "daemon/status.hpp"

#include <nlohmann/json.hpp>

#include "daemon/ledger/reader.hpp"
#include "daemon/report/when.hpp"

namespace slipledger {

using nlohmann::ordered_json;

namespace {

ordered_json time_json(analytics::Instant at) {
    return at == analytics::Instant::min() ? ordered_json(nullptr) : ordered_json(report::rfc3339(at));
}

ordered_json feed_json(const intake::FeedStatus& feed) {
    return {{"feed", feed.feed},
            {"connections", feed.connections},
            {"turned_away", feed.turned_away},
            {"stored", feed.stored},
            {"repeated", feed.repeated},
            {"refused", feed.refused},
            {"files", feed.files},
            {"last_reading", time_json(feed.last_reading)},
            {"last_received", time_json(feed.last_received)}};
}

}  // namespace

std::string status_json(const std::vector<intake::FeedStatus>& feeds, const CommitTimes::Longest& commits,
                        const std::string& ledger_path, std::uint16_t http_port) {
    const ledger::Reader reader(ledger_path);
    ordered_json out{{"feeds", ordered_json::array()},
                     {"marks", reader.marks().size()},
                     {"longest_commit_ms", {{"last_minute", commits.of_last_minute_ms}, {"since_start", commits.since_start_ms}}},
                     {"deliveries", ordered_json::array()},
                     {"http_port", http_port}};
    for (const intake::FeedStatus& feed : feeds) out["feeds"].push_back(feed_json(feed));
    for (const ledger::DeliveryCount& target : reader.deliveries())
        out["deliveries"].push_back({{"target", target.target},
                                     {"pending", target.pending},
                                     {"failed", target.failed},
                                     {"last_error", target.last_error}});
    return out.dump(-1, ' ', false, ordered_json::error_handler_t::replace);
}

}  // namespace slipledger
