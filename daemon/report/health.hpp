// The health of a pump as one value: what the command prints, the API sends and the page shows, so that they cannot
// disagree. health_query.hpp makes it from the ledger; render_text, render_json and render_page only lay it out.
#pragma once

#include <cstdint>
#include <map>
#include <optional>
#include <string>
#include <vector>

#include "analytics/course.hpp"
#include "analytics/instant.hpp"
#include "daemon/report/cause_words.hpp"
#include "analytics/witnesses.hpp"
#include "daemon/report/dated_event.hpp"
#include "daemon/report/episodes.hpp"
#include "daemon/report/leak_cost.hpp"

namespace slipledger::report {

using analytics::Instant;
using analytics::Ranged;

// Threads: a value, share freely.
struct LifeFacts {
    std::int32_t number = 1;
    std::optional<Instant> started;  // fitting, or when watching began
    double running_hours = 0.0;
    std::string baseline;       // what its healthy leakage rests on: "maker-test", "own, from new" ...
    std::string compared_with;  // the same in a sentence: "what it did when new"
};

// How many rows went where. Threads: a value, share freely.
struct DataFacts {
    std::uint64_t readings = 0;  // cells with a value, all quantities
    std::uint64_t used = 0;      // operating points judged in this life
    std::uint64_t disputed = 0;
    std::map<std::string, std::uint64_t> set_aside;  // operating points by reason
};

// When wear began, looked back on: local days begin here. Threads: a value, share freely.
struct OnsetRange {
    std::optional<Instant> low;  // none: it was there on the first day looked at
    std::optional<Instant> high;
};

// Hours in hand as dates, at the duty planned or usual; none where not known. Threads: a value, share freely.
struct DatesInHand {
    std::optional<Instant> low;
    std::optional<Instant> mid;
    std::optional<Instant> high;
};

// One section on the basis that speaks for it (the more urgent one where both are fitted). Threads: a value, share freely.
struct SectionHealth {
    std::string pump;
    std::string section;
    std::string pump_name;
    std::string machine;
    std::string area;
    std::string model;
    std::string part;      // "rotating group", "cartridge", "gear set"
    bool only_section = true;
    std::optional<Instant> as_of;  // newest reading of the pump
    analytics::Level level = analytics::Level::unjudged;
    std::string reason;    // why unjudged; empty otherwise
    std::string sentence;
    std::optional<analytics::Basis> basis;
    std::optional<analytics::DayVerdict> verdict;  // of the newest day; none before anything was judged
    std::vector<CauseWords> causes;  // the heaviest first; empty where nothing asks for one
    std::optional<LeakCost> cost;  // of leakage above healthy, at the usual duty; none: unjudged, or no prices given
    OnsetRange onset_range;                        // of verdict->trend.onset
    DatesInHand dates_in_hand;
    std::optional<analytics::Witnesses> witnesses;  // of one pump's report; a list of many goes without
    std::string currency;
    DataFacts data;
    LifeFacts life;
    std::vector<Episode> alarms;   // open ones, most urgent first
    std::vector<DatedEvent> events;  // the newest ones, newest first
    std::vector<std::string> notes;  // limits of the basis, conventions; plain sentences
};

// Threads: a value, share freely.
struct PumpHealth {
    std::string pump;
    std::vector<SectionHealth> sections;  // as in the plant file; never empty

    // The section whose level is the most urgent; the first of equals.
    const SectionHealth& most_urgent() const;
};

// A replacement that nobody told, where the newest judgement says that it looks like one.
analytics::LikelyReplacement likely_replacement(const SectionHealth& health);

// The command that tells of it.
std::string replaced_command(const SectionHealth& health, Instant at);

// What stands under every report and page.
const std::vector<std::string>& cautions();

}  // namespace slipledger::report
