// Adds up marks: the figures of the table, for any choice of sections and either teller.
#pragma once

#include <functional>
#include <map>
#include <string>
#include <vector>

#include "tools/judging/bench.hpp"

namespace slipledger::judging {

// Alerts that should not have been raised, and the years in which they could have been. Threads: a value.
struct FalseAlerts {
    std::size_t sections = 0;
    double years = 0.0;
    int alerts = 0;
    std::size_t sections_alerted = 0;

    double rate() const { return years > 0.0 ? alerts / years : not_told; }
    double at_most() const;  // one-sided 95 %, per section-year
};

// Threads: a value.
struct Share {
    int of = 0;
    int are = 0;

    void add(bool is, int times = 1) {
        of += times;
        are += is ? times : 0;
    }
    double percent() const { return of > 0 ? 100.0 * are / of : not_told; }
};

// Threads: a value.
struct Timeliness {
    Share before_2;
    Share before_10_points;
    double median_delay_days = not_told;
    int delays = 0;
    FalseAlerts early;  // while the true ratio was below 1.1
};

// Threads: a value.
struct Accuracy {
    double bias_percent = not_told;
    double rms_percent = not_told;
    double efficiency_rms_points = not_told;
    double meter_limit_percent = not_told;  // median, by delivery
    int days = 0;
};

// Threads: a value.
struct Lives {
    Share hold_first;
    Share hold_half;
    double width_first = not_told;  // medians, over the true life
    double width_half = not_told;
    double score_first = not_told;
    double score_half = not_told;
    Share none_given;
    Share before_wear;  // first ranges given while nothing wore yet
};

// Threads: a value.
struct Steps {
    Share told;
    Share called;
};

using Chosen = std::function<bool(const SectionOutcome&)>;

FalseAlerts false_alerts(const std::vector<SectionOutcome>& all, Teller teller, const Chosen& chosen);
Timeliness timeliness(const std::vector<SectionOutcome>& all, Teller teller, const Chosen& chosen);
Accuracy accuracy(const std::vector<SectionOutcome>& all, Teller teller, Seen seen, const Chosen& chosen);
Lives lives(const std::vector<SectionOutcome>& all, Teller teller, const Chosen& chosen);
Steps steps(const std::vector<SectionOutcome>& all, Teller teller, const Chosen& chosen);

// How often each told cause stands beside each true one; ours only.
using Confusion = std::map<std::string, std::map<std::string, int>>;
Confusion confusion(const std::vector<SectionOutcome>& all);

// Whether what was told is right for what was true, or, of a trouble that needs no word, silence is.
bool is_right_cause(const std::string& true_cause, const std::string& told_cause);
Share right_causes_of_what_was_told(const Confusion& confusion);
Share right_causes_of_confounders(const Confusion& confusion);  // silence counted as it should be

Share instruments_as_wear(const std::vector<SectionOutcome>& all);
Share hidden_comparisons(const std::vector<SectionOutcome>& all);
Share taken_over_told(const std::vector<SectionOutcome>& all);  // above sound at the end

}  // namespace slipledger::judging
