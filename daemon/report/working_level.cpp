// How the level followed: each rule that decides it, its limits, and the judged days that passed them or did not.
#include <fmt/format.h>

#include <algorithm>
#include <array>
#include <cmath>

#include "analytics/rated_efficiency.hpp"
#include "analytics/verdict.hpp"
#include "analytics/wear_filter.hpp"
#include "daemon/report/when.hpp"
#include "daemon/report/working_chapters.hpp"

namespace slipledger::report {

namespace {

using analytics::AlarmChange;
using analytics::DayVerdict;
using analytics::Level;
using analytics::Ranged;
using analytics::Rule;
using analytics::UnjudgedReason;

constexpr std::array<Level, 3> levels{Level::watch, Level::plan, Level::act};

// A rule on days, as the page tells of it. Threads: one.
struct DayRule {
    const char* what;                                      // "leakage ratio"
    const char* limit;                                     // its limits' symbols begin with this
    std::string (*low_formula)(const std::string& limit);  // how far a low end must reach
    const char* unit;
    const analytics::Ladder& ladder;
    double (*low_wanted)(double limit);
    analytics::RuleJudgement (*judge)(const Ranged&, const analytics::Ladder&);
};

void put_limits(const DayRule& rule, WorkSheet& sheet) {
    for (const Level level : levels) {
        const double limit = limit_of(rule.ladder, level);
        if (!std::isfinite(limit)) continue;
        const std::string symbol = fmt::format("{}_{}", rule.limit, name_of(level));
        sheet.put({.name = fmt::format("{}: {} above", rule.what, name_of(level)),
                   .symbol = symbol,
                   .value = limit,
                   .unit = rule.unit,
                   .source = "plant file, else by type"});
        sheet.put({.name = "and its low end above",
                   .symbol = symbol + "_low",
                   .value = rule.low_wanted(limit),
                   .unit = rule.unit,
                   .formula = rule.low_formula(symbol),
                   .source = "half way from healthy: the range must say so too"});
    }
}

std::string range_words(const Ranged& range) {
    return fmt::format("{} ({} to {})", written(range.value), written(range.low), written(range.high));
}

std::string judged_words(const DayRule& rule, const DayVerdict& day, const Ranged& value) {
    const Level passed = rule.judge(value, rule.ladder).beyond;
    return fmt::format("{}: {} {} passes {}.", iso_date(day.day.date), rule.what, range_words(value),
                       passed == Level::unjudged ? "no limit" : fmt::format("the limit of {}", name_of(passed)));
}

// The state of one rule's alarm after these changes, in words.
std::string alarm_words(Rule rule, const std::vector<AlarmChange>& changes, const std::string& zone) {
    const auto last =
        std::find_if(changes.rbegin(), changes.rend(), [&](const AlarmChange& change) { return change.rule == rule; });
    if (last == changes.rend() || last->edge == analytics::AlarmEdge::returned)
        return fmt::format("Rule {}: nothing raised.", name_of(rule));
    return fmt::format("Rule {}: {} since {} ({} at {}{}).", name_of(rule), name_of(last->level),
                       local_minute(last->at, zone), name_of(last->edge), written(last->value),
                       std::isfinite(last->limit) ? fmt::format(", limit {}", written(last->limit)) : std::string());
}

void write_day_rule(const WorkingFacts& facts, WorkSheet& sheet, const DayRule& rule,
                    Ranged (*value_of)(const DayVerdict&)) {
    put_limits(rule, sheet);
    for (const ledger::DayRecord& day : facts.judged_days)
        sheet.remark(judged_words(rule, day.verdict, value_of(day.verdict)));
}

std::string unjudged_words(const WorkingFacts& facts, const DayVerdict& day) {
    switch (day.reason) {
        case UnjudgedReason::learning:
            return fmt::format("learning: of {:g} judged running hours wanted after run-in, {:.1f} are still to come",
                               facts.spec.baseline.least.h, day.learning_h_left);
        case UnjudgedReason::seldom_judged:
            return fmt::format("seldom judged: {:.1f} % of the last 30 days' running hours could be, under 10 %",
                               100.0 * day.share_judged_30d);
        default:
            return std::string(name_of(day.reason));
    }
}

void remark_cap(const WorkingFacts& facts, WorkSheet& sheet) {
    const double span = facts.course->filter().laminar_span();
    const Level most = most_urgent_allowed(facts.spec, facts.basis, span);
    if (most == Level::act) return;
    sheet.remark(
        fmt::format("No level above {} is given: {}.", name_of(most),
                    facts.spec.has_temperature_sensor
                        ? fmt::format("dp/mu has varied by a factor of {:.2f} only, under 1.5, so displacement "
                                      "and leakage are not told apart",
                                      span)
                        : "the oil's temperature is not measured"));
}

std::string level_words(const WorkingFacts& facts, Level level, const DayVerdict& day) {
    if (level == Level::unjudged) return "unjudged, " + unjudged_words(facts, day);
    return std::string(name_of(level));
}

}  // namespace

void write_level(const WorkingFacts& facts, WorkSheet& sheet) {
    const DayVerdict& day = facts.day_record ? facts.day_record->verdict : *facts.so_far;
    const bool day_is_over = facts.day_record && facts.day_record->finished;
    sheet.chapter(fmt::format("The level: {}", name_of(day.level)));
    sheet.remark(fmt::format("At this summary's end the level was {}; {} {}: {}.",
                             level_words(facts, facts.record->verdict.level, *facts.so_far),
                             day_is_over ? "at the end of its day," : "so far its day's,", iso_date(facts.day.date),
                             level_words(facts, day.level, day)));
    sheet.remark(
        "Ratio, efficiency and hours in hand are judged at the end of each day: two judged days in a row beyond a "
        "limit raise a level, two inside it (less a deadband) end it. The level is the most urgent of the rules "
        "leakage-ratio, efficiency, hours-in-hand and step-change.");
    write_day_rule(facts, sheet,
                   {"leakage ratio", "R", [](const std::string& limit) { return "1 + (" + limit + " - 1) / 2"; }, "",
                    facts.spec.limits.leakage_ratio, analytics::ratio_low_wanted, analytics::judge_ratio},
                   [](const DayVerdict& of) { return of.leakage_ratio; });
    write_day_rule(
        facts, sheet,
        {"points lost", "E", [](const std::string& limit) { return limit + " / 2"; }, "points",
         facts.spec.limits.efficiency_points_lost, analytics::points_low_wanted, analytics::judge_points_lost},
        [](const DayVerdict& of) { return analytics::points_lost(of.efficiency_baseline, of.leakage_ratio); });
    for (const Rule rule : {Rule::leakage_ratio, Rule::efficiency, Rule::hours_in_hand, Rule::step_change})
        sheet.remark(alarm_words(rule, facts.changes, facts.plant.time_zone));
    remark_cap(facts, sheet);
}

}  // namespace slipledger::report
