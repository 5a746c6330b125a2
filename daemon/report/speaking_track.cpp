#include "daemon/report/speaking_track.hpp"

#include <utility>

namespace slipledger::report {

namespace {

// A track that has a basis to judge on goes before one that has none, then the higher level.
int weight_of(const SpeakingTrack& candidate) {
    if (!candidate.newest_day) return -1;
    const analytics::DayVerdict& day = candidate.newest_day->verdict;
    if (day.reason == analytics::UnjudgedReason::no_basis) return 0;
    if (day.reason == analytics::UnjudgedReason::no_data) return 1;
    return 2 + static_cast<int>(day.level);
}

}  // namespace

SpeakingTrack speaking_track(const ledger::Reader& reader, const ledger::Directory& directory, std::string_view pump,
                             std::string_view section) {
    const auto read = [&](analytics::Basis basis) {
        SpeakingTrack candidate{directory.track(pump, section, basis), std::nullopt};
        candidate.newest_day = reader.last_day(candidate.track.id);
        return candidate;
    };
    SpeakingTrack drain = read(analytics::Basis::case_drain);
    SpeakingTrack delivery = read(analytics::Basis::delivery);
    return weight_of(delivery) > weight_of(drain) ? std::move(delivery) : std::move(drain);
}

}  // namespace slipledger::report
