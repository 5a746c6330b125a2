// What an engineer would say of a section, in one paragraph of plain English: how much it leaks compared with what, how sure
// that is, how long it has, and what to do. Stands on top of every report and in every notice.
#pragma once

#include <string>

#include "analytics/course.hpp"
#include "analytics/pump_type.hpp"
#include "analytics/section_spec.hpp"

namespace slipledger::report {

// Threads: a value, share freely.
struct SentenceFacts {
    analytics::PumpType type = analytics::PumpType::axial_piston;
    std::string section = "A";
    bool only_section = true;          // then the pump is spoken of, not its section
    analytics::Basis basis = analytics::Basis::case_drain;
    std::string compared_with = "what it did when new";  // see compared_with()
    bool temperature_known = true;
    double least_judged_h = 50.0;      // judged running hours the baseline wants
    double act_ratio = 3.0;            // limits of the level act; NaN: none
    double act_points_lost = 10.0;
    double act_drain_share_percent = analytics::unknown;
    bool spare_in_stock = false;
    std::string silent_since;          // local time; empty: not silent
    std::string time_zone;             // of the plant, for dates; empty: none are told
    analytics::DayVerdict verdict;
};

std::string sentence(const SentenceFacts& facts);

// What the ratio is a multiple of: "what it did when new", "what it did when watching began (2026-01-05)", "what its maker
// measured when it was new" ... `from_new`: watched since it was new; `began`: the local date on which watching began.
std::string compared_with(analytics::BaselineKind baseline, bool from_new, const std::string& began);

// The last sentence of it alone: the one thing to do now.
std::string what_to_do(const SentenceFacts& facts);

}  // namespace slipledger::report
