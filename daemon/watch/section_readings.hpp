// Readings of one section, gathered from wherever its quantities are measured: its own point, its pump's, its drain
// group's, its reservoir's, the nearer outranking the farther. What is gathered for an instant depends on the readings of the
// four hours before it and nothing else, so that late rows touch a known span.
#pragma once

#include <cstdint>
#include <optional>
#include <vector>

#include "analytics/operating_point.hpp"
#include "analytics/summary.hpp"
#include "config/plant.hpp"
#include "daemon/ledger/directory.hpp"
#include "daemon/ledger/reader.hpp"

namespace slipledger::watch {

// A farther point's reading stands only where the nearer ones have had none for so long.
inline constexpr analytics::Milliseconds outranked_for = analytics::summary_lead_in;
// How far back a summary's readings reach, and so how far ahead a late reading is felt.
inline constexpr analytics::Milliseconds reach = analytics::summary_lead_in + outranked_for;

// Threads: a value, share freely.
struct Source {
    ledger::PointId point{};
    std::uint16_t quantities = 0;  // bits index_of(quantity): what may be taken from it
    bool shared_drain = false;     // its drain flow is that of several sections
};

// Nearest first.
std::vector<Source> sources_of(const ledger::Directory& directory, const config::Plant& plant, const config::Pump& pump,
                               const config::Section& section);

// Puts into `nearer` what `farther` knows of times at which nearer has had no reading for `outranked_for`.
void fill_from(analytics::Series& nearer, const analytics::Series& farther);

// Threads: the analysis thread, as the reader it asks.
class SectionReadings {
public:
    // `end`: nothing from there on is read.
    SectionReadings(const ledger::Reader& reader, std::vector<Source> sources, analytics::Instant end);

    // At least what summaries of [from, to) need. Valid until the next call. Ask in time order: some days are read at once.
    const analytics::SectionReadings& covering(analytics::Instant from, analytics::Instant to);

    // First reading of a drain flow shared with other sections among those read so far.
    std::optional<analytics::Instant> first_shared_drain() const { return first_shared_drain_; }

private:
    void load(analytics::Instant from, analytics::Instant to);

    const ledger::Reader& reader_;
    std::vector<Source> sources_;
    analytics::Instant end_;
    analytics::Instant from_{};
    analytics::Instant to_{};
    analytics::SectionReadings readings_;
    std::optional<analytics::Instant> first_shared_drain_;
};

}  // namespace slipledger::watch
