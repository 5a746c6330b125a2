#include "tools/judging/tally.hpp"

#include <algorithm>
#include <cmath>

#include "analytics/stats/garwood.hpp"

namespace slipledger::judging {
namespace {

double median(std::vector<double> values) {
    if (values.empty()) return not_told;
    std::ranges::sort(values);
    const std::size_t middle = values.size() / 2;
    return values.size() % 2 == 1 ? values[middle] : 0.5 * (values[middle - 1] + values[middle]);
}

double mean_of_squares(const std::vector<double>& values) {
    double sum = 0.0;
    for (const double value : values) sum += value * value;
    return sum / static_cast<double>(values.size());
}

double mean(const std::vector<double>& values) {
    double sum = 0.0;
    for (const double value : values) sum += value;
    return sum / static_cast<double>(values.size());
}

}  // namespace

double FalseAlerts::at_most() const {
    constexpr double tail = 0.05;
    const auto count = static_cast<std::uint64_t>(alerts);
    return years > 0.0 ? analytics::stats::garwood_bounds(count, tail).high / years : not_told;
}

FalseAlerts false_alerts(const std::vector<SectionOutcome>& all, Teller teller, const Chosen& chosen) {
    FalseAlerts sum;
    for (const SectionOutcome& section : all) {
        if (!chosen(section)) continue;
        const Marks& marks = section.of(teller);
        ++sum.sections;
        sum.years += marks.sound_years;
        sum.alerts += marks.false_alerts;
        sum.sections_alerted += marks.false_alerts > 0 ? 1 : 0;
    }
    return sum;
}

Timeliness timeliness(const std::vector<SectionOutcome>& all, Teller teller, const Chosen& chosen) {
    Timeliness sum;
    std::vector<double> delays;
    for (const SectionOutcome& section : all) {
        if (!chosen(section)) continue;
        const Marks& marks = section.of(teller);
        if (marks.told_before_2) sum.before_2.add(*marks.told_before_2);
        if (marks.told_before_10_points) sum.before_10_points.add(*marks.told_before_10_points);
        if (marks.delay_days) delays.push_back(*marks.delay_days);
    }
    sum.delays = static_cast<int>(delays.size());
    sum.median_delay_days = median(std::move(delays));
    sum.early = false_alerts(all, teller, chosen);
    return sum;
}

Accuracy accuracy(const std::vector<SectionOutcome>& all, Teller teller, Seen seen, const Chosen& chosen) {
    std::vector<double> ratios;
    std::vector<double> efficiencies;
    std::vector<double> limits;
    for (const SectionOutcome& section : all) {
        if (!chosen(section)) continue;
        for (const ErrorMark& error : section.of(teller).errors) {
            if (error.seen != seen) continue;
            if (std::isfinite(error.ratio)) ratios.push_back(100.0 * error.ratio);
            if (std::isfinite(error.efficiency)) efficiencies.push_back(error.efficiency);
        }
        if (std::isfinite(section.of(teller).meter_limit_percent))
            limits.push_back(section.of(teller).meter_limit_percent);
    }
    Accuracy made{.days = static_cast<int>(std::max(ratios.size(), efficiencies.size()))};
    if (!ratios.empty()) {
        made.bias_percent = mean(ratios);
        made.rms_percent = std::sqrt(mean_of_squares(ratios));
    }
    if (!efficiencies.empty()) made.efficiency_rms_points = std::sqrt(mean_of_squares(efficiencies));
    if (seen == Seen::everything) made.meter_limit_percent = median(std::move(limits));
    return made;
}

Lives lives(const std::vector<SectionOutcome>& all, Teller teller, const Chosen& chosen) {
    Lives sum;
    std::vector<LifeMark> first;
    std::vector<LifeMark> half;
    for (const SectionOutcome& section : all) {
        if (!chosen(section)) continue;
        const Marks& marks = section.of(teller);
        if (marks.first_life) {
            first.push_back(*marks.first_life);
            sum.before_wear.add(marks.life_before_wear);
        }
        if (marks.half_life) half.push_back(*marks.half_life);
        if (marks.life_wanted) sum.none_given.add(!marks.first_life);
    }
    const auto medians = [](const std::vector<LifeMark>& marks, double LifeMark::*what) {
        std::vector<double> values;
        for (const LifeMark& mark : marks) values.push_back(mark.*what);
        return median(std::move(values));
    };
    for (const LifeMark& mark : first) sum.hold_first.add(mark.holds);
    for (const LifeMark& mark : half) sum.hold_half.add(mark.holds);
    sum.width_first = medians(first, &LifeMark::width);
    sum.width_half = medians(half, &LifeMark::width);
    sum.score_first = medians(first, &LifeMark::score);
    sum.score_half = medians(half, &LifeMark::score);
    return sum;
}

Steps steps(const std::vector<SectionOutcome>& all, Teller teller, const Chosen& chosen) {
    Steps sum;
    for (const SectionOutcome& section : all) {
        if (!chosen(section)) continue;
        const Marks& marks = section.of(teller);
        if (marks.step_told) sum.told.add(*marks.step_told);
        if (marks.step_called) sum.called.add(*marks.step_called);
    }
    return sum;
}

Confusion confusion(const std::vector<SectionOutcome>& all) {
    Confusion counts;
    for (const SectionOutcome& section : all) {
        const Marks& marks = section.of(Teller::ours);
        if (marks.cause_counts) ++counts[marks.true_cause][marks.told_cause];
    }
    return counts;
}

Share right_causes_of_what_was_told(const Confusion& counts) {
    Share share;
    for (const auto& [true_cause, told] : counts)
        for (const auto& [told_cause, count] : told)
            if (told_cause != "nothing") share.add(is_right_cause(true_cause, told_cause), count);
    return share;
}

Share right_causes_of_confounders(const Confusion& counts) {
    Share share;
    for (const auto& [true_cause, told] : counts) {
        if (std::ranges::find(confounder_names, true_cause) == confounder_names.end()) continue;
        for (const auto& [told_cause, count] : told) share.add(is_right_cause(true_cause, told_cause), count);
    }
    return share;
}

Share instruments_as_wear(const std::vector<SectionOutcome>& all) {
    Share share;
    for (const SectionOutcome& section : all)
        if (std::ranges::any_of(section.story.confounders, is_of_instrument) && !section.story.wears())
            share.add(section.of(Teller::ours).instrument_as_wear);
    return share;
}

Share taken_over_told(const std::vector<SectionOutcome>& all) {
    Share share;
    for (const SectionOutcome& section : all)
        if (section.story.taken_over) share.add(section.of(Teller::ours).told_at_end);
    return share;
}

Share hidden_comparisons(const std::vector<SectionOutcome>& all) {
    Share share;
    for (const SectionOutcome& section : all)
        if (section.story.taken_over) share.add(section.of(Teller::ours).hides_what_it_is_compared_with);
    return share;
}

}  // namespace slipledger::judging
