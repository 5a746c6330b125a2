// What a page of working is made from: one summary of one section on one basis with everything that went into it and
// came out of it. Gathered from the ledger by watch/working_query.hpp, which leads the estimate there again.
#pragma once

#include <optional>
#include <string>
#include <vector>

#include "analytics/course.hpp"
#include "analytics/operating_point.hpp"
#include "analytics/regime.hpp"
#include "analytics/section_spec.hpp"
#include "analytics/usual.hpp"
#include "config/plant.hpp"
#include "daemon/ledger/records.hpp"
#include "daemon/report/leak_cost.hpp"
#include "daemon/report/working.hpp"

namespace slipledger::report {

// How a feed writes a quantity where it is not as stored: stored = ((written * scale + offset) + shift) * factor.
// Threads: a value, share freely.
struct EdgeConversion {
    std::string feed;
    std::string unit;
    double scale = 1.0;
    double offset = 0.0;
    double shift = 0.0;
    double factor = 1.0;
};

// Threads: a value, share freely.
struct ReadCell {
    analytics::JoinedReading reading;
    std::string place;                        // where it is measured: "press-1", "lathe-1 section A", "reservoir hpu-2"
    std::vector<EdgeConversion> conversions;  // of the feeds that may have brought it
};

// One instant of the summary, made again from the raw readings. Threads: a value, share freely.
struct PointFacts {
    analytics::JudgedPoint point;
    analytics::OperatingPoint joined;
    std::vector<ReadCell> cells;
    double plateau_bar = analytics::unknown;  // the compensator's, as usual that day; NaN: no such
};

// Threads: a value, but for `course`, which is used by one at a time.
struct WorkingFacts {
    const config::Plant& plant;
    const config::Pump& pump;        // as the plant file tells of it today
    const config::Section& section;  // the same
    analytics::Basis basis = analytics::Basis::case_drain;
    config::Fluid oil;            // in the reservoir at that time
    std::string compared_with;    // "when new", "when watching began (2026-01-05)"
    std::string remark;           // on how the time was chosen, or what is not as usual; may be empty
    std::string nothing_because;  // there is no summary at all to show; empty otherwise

    std::optional<ledger::SummaryRecord> record;  // everything below is about it
    analytics::SectionSpec spec;                  // that held then
    std::optional<PointFacts> point;              // none: the raw readings are gone
    std::vector<analytics::JudgedPoint> points;   // all of the summary's
    std::optional<analytics::Course> course;      // at the summary's end
    analytics::DaySpan day;
    std::optional<analytics::DayVerdict> so_far;  // what it says of the day up to then
    std::vector<ledger::DayRecord> judged_days;   // the last two finished ones that decided the level; ascending
    std::optional<ledger::DayRecord> day_record;  // of the summary's day
    std::vector<analytics::AlarmChange>
        changes;  // of the life up to the summary's end, or its day's where that is over
    std::optional<LeakCost> cost;
};

Working working_of(const WorkingFacts& facts);

}  // namespace slipledger::report
