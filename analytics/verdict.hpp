// From estimates to words: which limit an estimate passes, what a section may be told at most on its basis, and why it
// has no level. Pure decisions on values; the course of a section calls them in order.
#pragma once

#include "analytics/alarm.hpp"
#include "analytics/course.hpp"
#include "analytics/wear_filter.hpp"

namespace slipledger::analytics {

// An estimate as it is quoted: exp(ln), low and high at 80 %:
//
//   value = exp(ln),   low, high = exp(ln -+ 1.2816 sd)
//
// Example: ln 0, sd 0.1 -> 1.00 (0.88 to 1.14).
// Source: method.md, 5.
Ranged quoted(const LogEstimate& estimate);

// How far the low end of a leakage ratio must reach for a limit L to be passed: 1 + (L - 1) / 2, half way from healthy.
//
// Returns a ratio. Example: limit 2 -> 1.5. Source: the rule's definition (design.md, 7).
double ratio_low_wanted(double limit);

// The same for points of efficiency lost: L / 2, half way from none.
//
// Returns points, 1 % of theoretical flow. Example: limit 7 -> 3.5. Source: by analogy with the ratio (common practice,
// no source).
double points_low_wanted(double limit);

// A limit L on the leakage ratio is passed when the value is above L and its low end above 1 + (L - 1) / 2; it is left
// once the value is below L less the deadband (at least 2 % of L, the scatter of a day). Example: 2.1 (1.6 to 2.7)
// passes 2; 2.1 (1.4 to 3.0) passes only watch, at 1.17. Source: the rule's definition (design.md, 7).
RuleJudgement judge_ratio(const Ranged& ratio, const Ladder& ladder);

// The same for efficiency points lost: passed when the value is above L and its low end above L / 2.
// Example: 7.5 (4 to 11) passes 7; 7.5 (3 to 12) passes only 4.
// Source: by analogy with the ratio (common practice, no source).
RuleJudgement judge_points_lost(const Ranged& points, const Ladder& ladder);

// The judgement with no level above `most`. Not computed: a bound.
RuleJudgement capped(RuleJudgement judgement, Level most);

// The most urgent level the section may be given: `watch` without a temperature, and by delivery while dp/mu has varied
// by less than a factor 1.5, since displacement and leakage are then not told apart. Source: method.md, 3.
Level most_urgent_allowed(const SectionSpec& spec, Basis basis, double laminar_span);

// What is known of a section, as far as it decides whether it can have a level.
struct Knowledge {
    bool temperature = true;
    bool shared_drain = false;
    bool judged_yet = false;
    double learning_h_left = 0.0;
    double share_judged = unknown;  // of the last 30 days' running hours; NaN while it has not run
};

// The first reason that holds, in the order: no basis, shared drain, no data, learning, seldom judged (under 10 %).
// Source: design.md, 2.
UnjudgedReason unjudged_reason(const Knowledge& knowledge);

}  // namespace slipledger::analytics
