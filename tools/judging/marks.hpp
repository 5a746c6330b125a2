// What one teller earned on one section: told held against truth, as method.md, 9 counts. Small, so that marks of
// hundreds of pump-years can be added up in whatever order they come.
#pragma once

#include <optional>
#include <string>
#include <vector>

#include "tools/judging/story.hpp"
#include "tools/judging/told.hpp"
#include "tools/judging/truth.hpp"

namespace slipledger::judging {

// One day's error against truth. Threads: a value.
struct ErrorMark {
    Seen seen = Seen::drain;
    double ratio = not_told;       // told / true - 1, up to a true ratio of 3
    double efficiency = not_told;  // told less true, in points
};

// One range of hours in hand against the true life. Threads: a value.
struct LifeMark {
    bool holds = false;
    double width = 0.0;  // over the true life; infinite where no end was given
    double score = 0.0;  // interval score over the true life
};

// Threads: a value, share freely.
struct Marks {
    double sound_years = 0.0;  // judged while its true ratio was below 1.1 (all of them where it never wore)
    int false_alerts = 0;      // raised in that time
    double judged_years = 0.0;

    std::optional<bool> told_before_2{};          // where the true ratio passed 2 in the span
    std::optional<bool> told_before_10_points{};  // where the true loss did
    std::optional<double> delay_days{};           // where the true ratio passed 1.25; infinite: never told
    std::optional<bool> step_told{};              // within 24 running hours
    std::optional<bool> step_called{};            // a step, within ten running days

    std::vector<ErrorMark> errors{};
    double meter_limit_percent = not_told;  // of the ratio's RMS, by delivery

    bool life_wanted = false;  // it wore, and far enough that a range should have been given
    std::optional<LifeMark> first_life{};
    bool life_before_wear = false;  // the first range was given while nothing wore yet
    std::optional<LifeMark> half_life{};

    std::string true_cause{};
    std::string told_cause{};   // "nothing" where nothing was told
    bool cause_counts = false;  // it has one true cause
    bool instrument_as_wear = false;
    bool told_at_end = false;                     // above sound
    bool hides_what_it_is_compared_with = false;  // a taken-over pump called sound
};

Marks mark(const SectionStory& story, const Truth& truth, const ActLimits& limits, const SectionTold& told);

}  // namespace slipledger::judging
