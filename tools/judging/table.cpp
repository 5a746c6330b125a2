#include "tools/judging/table.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <nlohmann/json.hpp>

namespace slipledger::judging {
namespace {

using Json = nlohmann::ordered_json;

constexpr std::size_t widest = 100;

std::string number(double value) {
    if (std::isnan(value)) return "-";
    if (std::isinf(value)) return value > 0 ? "never" : "-never";
    return fmt::format("{:.{}f}", value, std::abs(value) < 1.0 ? 3 : std::abs(value) < 10.0 ? 2 : 1);
}

std::string aim_of(const Figure& figure) {
    if (std::isnan(figure.aim)) return "";
    if (figure.better == Better::inside) return fmt::format("{:g} to {:g}", figure.aim, figure.aim_high);
    return fmt::format("{} {:.3g}", figure.better == Better::lower ? "<=" : ">=", figure.aim);
}

std::string figures_part(const std::vector<Figure>& figures) {
    std::string text =
        fmt::format("{:<52}{:>11}{:>12}{:>10}   {}\n", "", "slipledger", "fixed limit", "notebook", "aim");
    for (const Figure& figure : figures)
        text += fmt::format("{:<52}{:>11}{:>12}{:>10}   {:<10} {}\n", figure.what, number(figure.value),
                            number(figure.fixed_limit), number(figure.notebook), aim_of(figure),
                            figure.meets_aim() ? "" : "*");
    return text + "* short of the aim\n";
}

std::string alerts_cell(const FalseAlerts& alerts) {
    if (!(alerts.years > 0.0)) return "-";
    return fmt::format("{:>4} {:.3f} <{:.3f}", alerts.alerts, alerts.rate(), alerts.at_most());
}

std::string alerts_row(const std::vector<SectionOutcome>& all, std::string_view name, const Chosen& chosen) {
    const FalseAlerts ours = false_alerts(all, Teller::ours, chosen);
    if (ours.sections == 0) return {};
    return fmt::format("{:<18}{:>8}{:>8.1f}{:>20}{:>6}{:>20}{:>20}\n", name, ours.sections, ours.years,
                       alerts_cell(ours), ours.sections_alerted,
                       alerts_cell(false_alerts(all, Teller::fixed_limit, chosen)),
                       alerts_cell(false_alerts(all, Teller::notebook, chosen)));
}

std::string false_alerts_part(const std::vector<SectionOutcome>& all) {
    std::string text =
        "\nFalse wear alerts: count, a judged section-year, 95 % surely below (Garwood); sections alerted\n";
    text += fmt::format("{:<18}{:>8}{:>8}{:>20}{:>6}{:>20}{:>20}\n", "", "sections", "years", "slipledger", "on",
                        "fixed limit", "notebook");
    text += alerts_row(all, "healthy", is_healthy_fleet);
    text += alerts_row(all, "worn, below 1.1", is_worn_plainly);
    text += alerts_row(all, "one confounder", is_confounded_alone);
    text += alerts_row(all, "several (hard)", is_hard_alone);
    for (std::size_t i = 0; i < confounder_names.size(); ++i)
        text += alerts_row(all, fmt::format("  {}", confounder_names[i]), [&](const SectionOutcome& section) {
            return is_confounded_alone(section) && section.story.confounders.front() == static_cast<Confounder>(i);
        });
    return text;
}

struct Slice {
    std::string name;
    Chosen chosen;
};

std::vector<Slice> worn_slices() {
    std::vector<Slice> slices;
    constexpr std::array<std::string_view, 5> shapes{"", "linear", "accelerating", "decelerating", "late onset"};
    for (std::size_t i = 1; i < shapes.size(); ++i)
        slices.push_back({std::string(shapes[i]), [i](const SectionOutcome& section) {
                              return is_worn_plainly(section) && section.story.shape == static_cast<WearShape>(i);
                          }});
    slices.push_back({"double pumps", [](const SectionOutcome& section) {
                          return section.fleet == Fleet::double_pumps && is_worn_plainly(section);
                      }});
    slices.push_back(
        {"second life", [](const SectionOutcome& section) { return section.story.fitted_at.has_value(); }});
    slices.push_back({"internal return", [](const SectionOutcome& section) { return section.story.inside; }});
    slices.push_back({"worn, confounded", [](const SectionOutcome& section) {
                          return section.story.wears() && !section.story.confounders.empty();
                      }});
    return slices;
}

std::string worn_part(const std::vector<SectionOutcome>& all) {
    std::string text =
        fmt::format("\n{:<18}{:>9}{:>9}{:>10}{:>9}{:>9}{:>9}{:>9}{:>9}{:>8}\n", "Worn", "sections", "before 2",
                    "10 points", "delay d", "holds 1", "width 1", "holds h", "width h", "none");
    for (const Slice& slice : worn_slices()) {
        const Timeliness times = timeliness(all, Teller::ours, slice.chosen);
        const Lives life = lives(all, Teller::ours, slice.chosen);
        if (times.early.sections == 0) continue;
        text +=
            fmt::format("{:<18}{:>9}{:>9}{:>10}{:>9}{:>9}{:>9}{:>9}{:>9}{:>8}\n", slice.name, times.early.sections,
                        number(times.before_2.percent()), number(times.before_10_points.percent()),
                        number(times.median_delay_days), number(life.hold_first.percent()), number(life.width_first),
                        number(life.hold_half.percent()), number(life.width_half), number(life.none_given.percent()));
    }
    return text;
}

std::string causes_part(const std::vector<SectionOutcome>& all) {
    std::string text = "\nCauses: what was true, and what was told of it (+ right)\n";
    for (const auto& [truth, row] : confusion(all)) {
        std::string line = fmt::format("{:<18}", truth);
        for (const auto& [cause, count] : row) {
            const std::string part = fmt::format(" {:>4}{} {}", count, is_right_cause(truth, cause) ? '+' : ' ', cause);
            if (line.size() + part.size() > widest) {
                text += line + '\n';
                line = std::string(18, ' ');
            }
            line += part;
        }
        text += line + '\n';
    }
    return text;
}

Json value_of(double value) {
    if (std::isnan(value)) return nullptr;
    if (std::isinf(value)) return "never";
    return value;
}

Json counts_of(const FalseAlerts& alerts) {
    return {{"sections", alerts.sections},
            {"years", alerts.years},
            {"alerts", alerts.alerts},
            {"a_year", value_of(alerts.rate())},
            {"at_most", value_of(alerts.at_most())}};
}

}  // namespace

std::string table_of(const BenchResult& result) {
    std::string text = fmt::format("{} sections, {:.0f} pump-years, {:.1f} million rows\n\n", result.sections.size(),
                                   result.pump_years, static_cast<double>(result.rows) / 1e6);
    text += figures_part(figures_of(result.sections));
    text += false_alerts_part(result.sections);
    text += worn_part(result.sections);
    text += causes_part(result.sections);
    return text;
}

std::string json_of(const BenchResult& result) {
    Json json{{"sections", result.sections.size()}, {"pump_years", result.pump_years}, {"rows", result.rows}};
    for (const Figure& figure : figures_of(result.sections))
        json["figures"][figure.name] = {{"what", figure.what},
                                        {"slipledger", value_of(figure.value)},
                                        {"fixed_limit", value_of(figure.fixed_limit)},
                                        {"notebook", value_of(figure.notebook)},
                                        {"aim", aim_of(figure)},
                                        {"meets_aim", figure.meets_aim()}};
    for (std::size_t i = 0; i < confounder_names.size(); ++i)
        json["false_alerts"][std::string(confounder_names[i])] =
            counts_of(false_alerts(result.sections, Teller::ours, [&](const SectionOutcome& section) {
                return is_confounded_alone(section) && section.story.confounders.front() == static_cast<Confounder>(i);
            }));
    for (const auto& [truth, row] : confusion(result.sections)) json["causes"][truth] = row;
    return json.dump(2) + "\n";
}

}  // namespace slipledger::judging
