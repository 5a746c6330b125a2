// The readings' side of a pass: makes the summaries of one section that the pass touches, and the facts of its days. Days
// whose usual values a late row has changed are made anew whole.
#pragma once

#include <array>
#include <cstdint>
#include <map>
#include <optional>
#include <span>
#include <vector>

#include "analytics/summary.hpp"
#include "analytics/usual.hpp"
#include "config/plant.hpp"
#include "daemon/ledger/reader.hpp"
#include "daemon/watch/pass_span.hpp"
#include "daemon/watch/section_spec.hpp"
#include "daemon/watch/stretches.hpp"

namespace slipledger::watch {

inline constexpr std::array<analytics::Basis, 2> both_bases{analytics::Basis::case_drain, analytics::Basis::delivery};

using FactsByDate = std::map<std::int32_t, analytics::DayFacts>;

// Which of speed and temperature readings of the seven days before a date tell; nullopt: there are none yet.
std::optional<SeenSensors> seen_before(const FactsByDate& facts, std::int32_t date);

// What is usual on a day, as the seven days before it tell. A plateau seen under another setting is none of this one's, and
// on the day of the change both were seen.
analytics::Usual usual_on(const FactsByDate& facts, const PlantDays& days, std::int32_t date, const Stretch& stretch,
                          const analytics::SectionSpec& spec);

// Which of speed and temperature readings around one summary tell: what counts in the first days, of which no day before
// tells anything.
SeenSensors seen_in(const analytics::SectionReadings& readings, const Span& summary);

// One section as a pass sees it; the same for both sides of the pass. Threads: immutable while the pass runs.
struct SectionView {
    const config::Plant& plant;
    const PlantDays& days;
    const PassSpan& pass;
    std::vector<Stretch> stretches;
    std::vector<DatedTest> tests;  // reference tests, ascending
    FactsByDate facts;  // by the end of the pass; reaches back over the days before it

    analytics::SectionSpec spec(const Stretch& stretch, const analytics::DaySpan& day, const SeenSensors& seen) const;
};

// Threads: a value, share freely.
struct RemadeSummaries {
    std::vector<Span> spans;  // ascending: where summaries of both bases are replaced by these
    std::array<std::vector<analytics::Summary>, 2> summaries;  // by basis, ascending
    std::vector<ledger::DayFactsRecord> facts;                 // of finished days, new or changed
    std::optional<analytics::Instant> first_shared_drain;      // among the readings looked at

    bool replaces(analytics::Instant start) const;
};

// Reads what the pass touches and brings `view.facts`, on entry what is stored, up to date.
RemadeSummaries remake_summaries(const ledger::Reader& reader, const ledger::Directory& directory,
                                 const config::Pump& pump, const config::Section& section, SectionView& view);

}  // namespace slipledger::watch
