#include "tools/judging/figures.hpp"

#include <cmath>

namespace slipledger::judging {
namespace {

using All = std::vector<SectionOutcome>;

// A figure asked of each teller in turn.
template <typename Ask>
Figure by_teller(Figure figure, const Ask& ask) {
    figure.value = ask(Teller::ours);
    figure.fixed_limit = ask(Teller::fixed_limit);
    figure.notebook = ask(Teller::notebook);
    return figure;
}

Figure false_rate(const All& all, std::string name, std::string what, double aim, const Chosen& chosen) {
    return by_teller({.name = std::move(name), .what = std::move(what), .aim = aim},
                     [&](Teller teller) { return false_alerts(all, teller, chosen).rate(); });
}

void add_alerts(const All& all, std::vector<Figure>& figures) {
    figures.push_back(
        false_rate(all, "false-healthy", "false wear alerts a section-year, healthy", 0.02, is_healthy_fleet));
    figures.push_back(false_rate(all, "false-confounded", "the same, one confounder", 0.05, is_confounded_alone));
    figures.push_back(false_rate(all, "false-hard", "the same, several at once", 0.05, is_hard_alone));
    figures.push_back(by_teller({.name = "early", .what = "worn: alerts before ratio 1.1, a year", .aim = 0.05},
                                [&](Teller teller) { return timeliness(all, teller, is_worn_plainly).early.rate(); }));
}

void add_timeliness(const All& all, std::vector<Figure>& figures) {
    figures.push_back(
        by_teller({.name = "told-before-2", .what = "told before ratio 2.0, %", .better = Better::higher, .aim = 98.0},
                  [&](Teller teller) { return timeliness(all, teller, is_worn_plainly).before_2.percent(); }));
    figures.push_back(
        by_teller({.name = "told-before-10-points",
                   .what = "told before 10 points lost, %",
                   .better = Better::higher,
                   .aim = 98.0},
                  [&](Teller teller) { return timeliness(all, teller, is_worn_plainly).before_10_points.percent(); }));
    figures.push_back(
        by_teller({.name = "delay", .what = "median days from ratio 1.25 to alert", .aim = 0.0},
                  [&](Teller teller) { return timeliness(all, teller, is_worn_plainly).median_delay_days; }));
    figures.push_back(by_teller(
        {.name = "step-told", .what = "steps told within 24 running hours, %", .better = Better::higher, .aim = 90.0},
        [&](Teller teller) { return steps(all, teller, is_honest).told.percent(); }));
    figures.push_back(
        by_teller({.name = "step-called", .what = "steps called a step, %", .better = Better::higher, .aim = 90.0},
                  [&](Teller teller) { return steps(all, teller, is_honest).called.percent(); }));
}

void add_accuracy(const All& all, std::vector<Figure>& figures) {
    const auto ask = [&](Seen seen, double Accuracy::*what) {
        return [&all, seen, what](Teller teller) { return accuracy(all, teller, seen, is_honest).*what; };
    };
    figures.push_back(by_teller({.name = "bias-drain",
                                 .what = "bias of the ratio by drain, %",
                                 .better = Better::inside,
                                 .aim = -3.0,
                                 .aim_high = 3.0},
                                ask(Seen::drain, &Accuracy::bias_percent)));
    figures.push_back(by_teller({.name = "rms-drain", .what = "spread (RMS) of the ratio by drain, %", .aim = 6.0},
                                ask(Seen::drain, &Accuracy::rms_percent)));
    figures.push_back(by_teller({.name = "bias-delivery",
                                 .what = "bias of the ratio by delivery, %",
                                 .better = Better::inside,
                                 .aim = -3.0,
                                 .aim_high = 3.0},
                                ask(Seen::everything, &Accuracy::bias_percent)));
    const double meter = accuracy(all, Teller::ours, Seen::everything, is_honest).meter_limit_percent;
    figures.push_back(by_teller({.name = "rms-delivery", .what = "spread of the ratio by delivery, %", .aim = meter},
                                ask(Seen::everything, &Accuracy::rms_percent)));
    figures.push_back(by_teller({.name = "efficiency-drain", .what = "efficiency by drain, RMS points"},
                                ask(Seen::drain, &Accuracy::efficiency_rms_points)));
    figures.push_back(by_teller({.name = "efficiency-delivery", .what = "efficiency by delivery, RMS points"},
                                ask(Seen::everything, &Accuracy::efficiency_rms_points)));
}

void add_lives(const All& all, std::vector<Figure>& figures) {
    const auto ask = [&](auto what) {
        return [&all, what](Teller teller) { return what(lives(all, teller, is_worn_plainly)); };
    };
    figures.push_back(by_teller({.name = "life-holds-first",
                                 .what = "80 % range of life holds, first given, %",
                                 .better = Better::inside,
                                 .aim = 75.0,
                                 .aim_high = 85.0},
                                ask([](const Lives& all_lives) { return all_lives.hold_first.percent(); })));
    figures.push_back(by_teller({.name = "life-holds-half",
                                 .what = "the same at half the life then left, %",
                                 .better = Better::inside,
                                 .aim = 75.0,
                                 .aim_high = 85.0},
                                ask([](const Lives& all_lives) { return all_lives.hold_half.percent(); })));
    figures.push_back(by_teller({.name = "life-width-first", .what = "median width over true life, first", .aim = 2.0},
                                ask([](const Lives& all_lives) { return all_lives.width_first; })));
    figures.push_back(by_teller({.name = "life-width-half", .what = "median width over true life, half", .aim = 2.0},
                                ask([](const Lives& all_lives) { return all_lives.width_half; })));
    figures.push_back(by_teller({.name = "life-score-first", .what = "median interval score over life, first"},
                                ask([](const Lives& all_lives) { return all_lives.score_first; })));
    figures.push_back(by_teller({.name = "life-score-half", .what = "median interval score over life, half"},
                                ask([](const Lives& all_lives) { return all_lives.score_half; })));
    figures.push_back(by_teller({.name = "life-before-wear", .what = "first range given before anything wore, %"},
                                ask([](const Lives& all_lives) { return all_lives.before_wear.percent(); })));
    figures.push_back(by_teller({.name = "life-none", .what = "worn, no range ever given, %"},
                                ask([](const Lives& all_lives) { return all_lives.none_given.percent(); })));
}

void add_causes(const All& all, std::vector<Figure>& figures) {
    figures.push_back({.name = "first-cause",
                       .what = "first cause right, of what was told, %",
                       .value = right_causes_of_what_was_told(confusion(all)).percent(),
                       .better = Better::higher,
                       .aim = 90.0});
    figures.push_back({.name = "cause-confounded",
                       .what = "the same of confounders, silence counted, %",
                       .value = right_causes_of_confounders(confusion(all)).percent(),
                       .better = Better::higher,
                       .aim = 90.0});
    figures.push_back({.name = "instrument-as-wear",
                       .what = "sensor faults told as wear, %",
                       .value = instruments_as_wear(all).percent(),
                       .aim = 1.0});
    figures.push_back({.name = "taken-over-hidden",
                       .what = "taken over, called sound without saying since when, %",
                       .value = hidden_comparisons(all).percent(),
                       .aim = 0.0});
    figures.push_back({.name = "taken-over-told",
                       .what = "taken over worn, told above sound at the end, %",
                       .value = taken_over_told(all).percent(),
                       .better = Better::higher});
}

}  // namespace

bool Figure::meets_aim() const {
    if (std::isnan(value) || std::isnan(aim)) return true;
    if (better == Better::lower) return value <= aim;
    if (better == Better::higher) return value >= aim;
    return value >= aim && value <= aim_high;
}

bool is_honest(const SectionOutcome& section) {
    return section.story.confounders.empty() && section.fleet != Fleet::taken_over;
}

bool is_healthy_fleet(const SectionOutcome& section) {
    return is_honest(section) && !section.story.wears();
}

bool is_confounded_alone(const SectionOutcome& section) {
    return section.story.confounders.size() == 1 && !section.story.wears() &&
           section.story.confounders.front() != Confounder::bypass;
}

bool is_hard_alone(const SectionOutcome& section) {
    return section.story.confounders.size() > 1 && !section.story.wears();
}

bool is_worn_plainly(const SectionOutcome& section) {
    return is_honest(section) && section.story.wears() && !section.story.steps && !section.story.inside;
}

std::vector<Figure> figures_of(const std::vector<SectionOutcome>& all) {
    std::vector<Figure> figures;
    add_alerts(all, figures);
    add_timeliness(all, figures);
    add_accuracy(all, figures);
    add_lives(all, figures);
    add_causes(all, figures);
    return figures;
}

}  // namespace slipledger::judging
