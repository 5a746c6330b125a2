#include "tools/judging/details.hpp"

#include <fmt/format.h>

#include <cmath>

#include "tools/judging/pipeline.hpp"

namespace slipledger::judging {
namespace {

using plantsim::day_ms;

std::string cell(double value) {
    return std::isnan(value) ? std::string() : fmt::format("{:.4g}", value);
}

std::string cell(const std::optional<double>& value) {
    return value ? cell(*value) : std::string();
}

std::string cell(const std::optional<bool>& value) {
    return !value ? "" : *value ? "yes" : "no";
}

std::string confounders_of(const SectionStory& story) {
    std::string names;
    for (const Confounder confounder : story.confounders) {
        if (!names.empty()) names += " + ";
        names += name_of(confounder);
    }
    return names;
}

std::string_view shape_of(const SectionStory& story) {
    constexpr std::array<std::string_view, 5> names{"", "linear", "accelerating", "decelerating", "late"};
    return story.steps ? "step" : names[static_cast<std::size_t>(story.shape)];
}

std::string bias_of(const Marks& marks, Seen seen) {
    double sum = 0.0;
    int count = 0;
    for (const ErrorMark& error : marks.errors) {
        if (error.seen != seen || std::isnan(error.ratio)) continue;
        sum += error.ratio;
        ++count;
    }
    return count > 0 ? cell(100.0 * sum / count) : std::string();
}

std::string life_of(const std::optional<LifeMark>& life) {
    return life ? fmt::format("{},{}", life->holds ? "yes" : "no", cell(life->width)) : ",";
}

std::string day_of(const DayTold& day, const Truth& truth, const ActLimits& limits, double noon_c) {
    return fmt::format("{},{},{:.1f},{},{},{},{},{},{},{},{},{},{},{:.1f}\n", plantsim::rfc3339(day.end),
                       day.seen == Seen::drain ? "drain" : "delivery", truth.running_h(day.end),
                       !day.judged    ? "unjudged"
                       : day.alerting ? "alert"
                                      : "sound",
                       cell(day.ratio), cell(truth.ratio(day.seen, day.end)), cell(100.0 * day.efficiency),
                       cell(100.0 * truth.efficiency(day.seen, day.at_rated, day.end)), cell(day.life_low_h),
                       cell(day.life_mid_h), cell(day.life_high_h),
                       cell(truth.life_h(day.seen, day.at_rated, limits, day.end)), day.cause, noon_c);
}

}  // namespace

std::string details_csv(const BenchResult& result) {
    std::string text =
        "fleet,number,pump,section,shape,confounders,judged_years,false_alerts,before_2,before_10_points,delay_d,"
        "step_24h,step_called,bias_drain,bias_delivery,life_holds,life_width,half_holds,half_width,true_cause,"
        "told_cause,fixed_false,notebook_false,notebook_delay_d\n";
    for (const SectionOutcome& section : result.sections) {
        const Marks& ours = section.of(Teller::ours);
        const Marks& notebook = section.of(Teller::notebook);
        text += fmt::format(
            "{},{},{},{},{},{},{},{},{},{},{},{},{},{},{},{},{},{},{},{},{},{}\n", name_of(section.fleet),
            section.number, section.story.pump, section.story.section, shape_of(section.story),
            confounders_of(section.story), cell(ours.judged_years), ours.false_alerts, cell(ours.told_before_2),
            cell(ours.told_before_10_points), cell(ours.delay_days), cell(ours.step_told), cell(ours.step_called),
            bias_of(ours, Seen::drain), bias_of(ours, Seen::everything), life_of(ours.first_life),
            life_of(ours.half_life), ours.true_cause, ours.told_cause, section.of(Teller::fixed_limit).false_alerts,
            notebook.false_alerts, cell(notebook.delay_days));
    }
    return text;
}

std::string trace_csv(const Story& story, Spoil spoil, const std::filesystem::path& folder) {
    const plantsim::Mill mill(story.plant, story.seed);
    const PipelineResult result = run_pipeline(story, mill, spoil, folder, [](std::span<const plantsim::Row>) {});
    std::string text =
        "pump,section,day_ends,basis,running_h,level,ratio,true_ratio,efficiency,true_efficiency,life_low,life_mid,"
        "life_high,true_life,cause,tank_c\n";
    for (std::size_t i = 0; i < story.sections.size(); ++i) {
        const SectionStory& section = story.sections[i];
        const plantsim::PumpDrawing& pump = story.plant.pumps[section.pump];
        const Truth truth(mill, section);
        const std::string& part = pump.sections[section.section].id;
        const ActLimits limits = act_limits_of(*result.plant.find_pump(pump.id)->find_section(part));
        for (const std::vector<DayTold>* days : {&result.told[i].days, &result.told[i].other_days})
            for (const DayTold& day : *days)
                text += fmt::format("{},{},{}", pump.id, part,
                                    day_of(day, truth, limits, mill.tank_c(pump.reservoir, day.end - day_ms / 2)));
    }
    return text;
}

}  // namespace slipledger::judging
