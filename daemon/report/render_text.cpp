#include "daemon/report/render_text.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>

#include "analytics/units.hpp"
#include "daemon/report/when.hpp"

namespace slipledger::report {

namespace {

std::string rule_off() { return std::string(page_width, '-') + '\n'; }

std::string plain(double value, int decimals) {
    return std::isfinite(value) ? fmt::format("{:.{}f}", value, decimals) : std::string("-");
}

std::string with_range(const Ranged& range, int decimals, double factor = 1.0) {
    if (!std::isfinite(range.value)) return "-";
    return fmt::format("{} ({} to {})", plain(range.value * factor, decimals), plain(range.low * factor, decimals),
                       plain(range.high * factor, decimals));
}

// One line of the table of figures: what, how much, and beside it what to hold it against.
std::string figure(std::string_view name, std::string_view value, std::string_view beside = {}) {
    return paragraph("  " + cell(name, 24), fmt::format("{}{}{}", value, beside.empty() ? "" : "; ", beside));
}

std::string flow(double lpm, const config::Plant& plant) {
    if (!std::isfinite(lpm)) return "-";
    if (plant.display_units == config::DisplayUnits::us) return fmt::format("{:.3f} gpm", lpm / analytics::units::litres_per_us_gallon);
    return fmt::format("{:.2f} L/min", lpm);
}

std::string hours(double h) { return std::isfinite(h) ? fmt::format("{:.0f}", h) : std::string("-"); }

std::string hours_in_hand_text(const analytics::HoursInHand& in_hand) {
    if (!std::isfinite(in_hand.low)) return "-";
    if (!std::isfinite(in_hand.mid)) return fmt::format("at least {} h (no wear trend)", hours(in_hand.low));
    const std::string high = std::isfinite(in_hand.high) ? hours(in_hand.high) : std::string("open");
    return fmt::format("{} h ({} to {}) to the {} limit", hours(in_hand.mid), hours(in_hand.low), high, in_hand.limit);
}

// The same, short enough for a column.
std::string hours_in_hand_cell(const analytics::HoursInHand& in_hand) {
    if (!std::isfinite(in_hand.low)) return "-";
    if (!std::isfinite(in_hand.mid)) return fmt::format("at least {} h", hours(in_hand.low));
    const std::string high = std::isfinite(in_hand.high) ? hours(in_hand.high) : std::string("open");
    return fmt::format("{} h ({} to {})", hours(in_hand.mid), hours(in_hand.low), high);
}

std::string heading(const SectionHealth& health, const config::Plant& plant) {
    std::string out = fmt::format("{}  {}\n", printable(health.pump), printable(health.pump_name));
    out += fmt::format("section {}, {}{}{}, life {}", printable(health.section), printable(health.model),
                       health.model.empty() ? "" : " ", health.part, health.life.number);
    if (!health.machine.empty()) out += fmt::format(", {}", printable(health.machine));
    out += '\n';
    if (health.as_of) out += fmt::format("as of {}\n", local_minute(*health.as_of, plant.time_zone));
    return out;
}

std::string efficiency_line(const SectionHealth& health, const analytics::DayVerdict& day) {
    const std::string_view bound = health.basis == analytics::Basis::case_drain ? ", an upper bound" : "";
    const std::string beside =
        std::isfinite(day.efficiency_baseline)
            ? fmt::format("{:.1f} % when healthy; at the {} point{}", day.efficiency_baseline * 100.0,
                          day.efficiency_at_rated ? "rated" : "reference", bound)
            : std::string();
    return figure("volumetric efficiency", with_range(day.efficiency, 1, 100.0) + " %", beside);
}

std::string trend_text(const analytics::Trend& trend) {
    return fmt::format("{:+.2f} ({:+.2f} to {:+.2f}) in ratio per 1000 h{}", trend.per_1000_h.value,
                       trend.per_1000_h.low, trend.per_1000_h.high, trend.established ? "" : ", not established");
}

std::string payback_words(const LeakCost& cost, const std::string& currency) {
    const std::string price = fmt::format("{:.0f} {}", *cost.replacement_cost, currency);
    if (!cost.pays_in.empty()) return fmt::format("{}; saved again in energy alone by {}", price, cost.pays_in);
    return fmt::format("{}; not saved again in energy alone within {:.0f} years", price, longest_payback_years);
}

std::string cost_figures(const LeakCost& cost, const std::string& currency) {
    std::string out;
    if (cost.flow_lost_percent >= 0.05)
        out += figure("flow lost", fmt::format("{:.1f} % less than when healthy", cost.flow_lost_percent),
                      cost.flow_at_rated ? "at the rated point" : "at the reference point");
    if (!std::isfinite(cost.per_year.value)) return out;
    out += figure("cost of the leak", fmt::format("{} {} a year", with_range(cost.per_year, 0), printable(currency)),
                  fmt::format("{} kW from the mains, {:.0f} running hours a year", plain(cost.power_kw, 2),
                              cost.running_h_per_year));
    if (cost.replacement_cost) out += figure("replacement", payback_words(cost, printable(currency)));
    return out;
}

std::string onset_text(const SectionHealth& health, const config::Plant& plant) {
    const std::string date = local_date(*health.verdict->trend.onset, plant.time_zone);
    const OnsetRange& range = health.onset_range;
    if (!range.high) return date;
    const std::string low = range.low ? local_date(*range.low, plant.time_zone) : std::string("earlier");
    return fmt::format("{} ({} to {})", date, low, local_date(*range.high, plant.time_zone));
}

std::string dates_text(const SectionHealth& health, const config::Plant& plant) {
    const DatesInHand& dates = health.dates_in_hand;
    const double per_week = 7.0 * health.verdict->hours_in_hand.duty_h_per_day;
    if (!dates.low || !dates.mid) return {};
    const std::string high = dates.high ? local_date(*dates.high, plant.time_zone) : std::string("open");
    return fmt::format("{} ({} to {}) at {:.0f} h a week", local_date(*dates.mid, plant.time_zone),
                       local_date(*dates.low, plant.time_zone), high, per_week);
}

// Plain statistics on the days' own ratios, which decide nothing.
std::string witnesses_text(const analytics::Witnesses& told) {
    if (!std::isfinite(told.cumulative_sum)) return {};
    const analytics::Ranged& slope = told.slope_per_1000_h;
    std::string text;
    if (std::isfinite(slope.value))
        text = fmt::format("robust slope {:+.2f} ({:+.2f} to {:+.2f}) per 1000 h, rank test p {:.2g}; ", slope.value,
                           slope.low, slope.high, told.rank_p);
    text += fmt::format("cumulative sum {:.2f} of {:g}", told.cumulative_sum, analytics::sum_limit);
    if (told.sum_passed) text += " passed " + iso_date(*told.sum_passed);
    text += told.changed ? fmt::format("; a {} at {}", name_of(told.shape), iso_date(*told.changed)) : "; no step or bend";
    return figure("second witnesses", text, fmt::format("by {} days' own ratios", told.days));
}

// What is not known has no line.
std::string figures(const SectionHealth& health, const config::Plant& plant) {
    if (!health.verdict) return {};
    const analytics::DayVerdict& day = *health.verdict;
    std::string out;
    if (std::isfinite(day.leakage_ratio.value))
        out += figure("leakage ratio", with_range(day.leakage_ratio, 2), "1 = as new");
    if (std::isfinite(day.efficiency.value)) out += efficiency_line(health, day);
    if (std::isfinite(day.leakage_lpm))
        out += figure("leakage", flow(day.leakage_lpm, plant),
                      fmt::format("{} above healthy, {} kW", flow(day.excess_lpm, plant), plain(day.leakage_kw, 2)));
    if (std::isfinite(day.clearance_growth_percent))
        out += figure("clearance growth", plain(day.clearance_growth_percent, 0) + " %");
    if (std::isfinite(day.trend.per_1000_h.value)) out += figure("trend", trend_text(day.trend));
    if (day.trend.onset) out += figure("since", onset_text(health, plant));
    if (std::isfinite(day.hours_in_hand.low))
        out += figure("hours in hand", hours_in_hand_text(day.hours_in_hand), dates_text(health, plant));
    if (health.witnesses) out += witnesses_text(*health.witnesses);
    if (health.cost) out += cost_figures(*health.cost, health.currency);
    return out;
}

// The first three; what would settle the matter stands under the first.
std::string causes_text(const SectionHealth& health) {
    constexpr std::size_t most = 3;
    constexpr double worth_a_line = 0.05;
    std::string out;
    for (std::size_t i = 0; i < std::min(most, health.causes.size()); ++i) {
        const CauseWords& cause = health.causes[i];
        if (i > 0 && cause.weight < worth_a_line) break;
        out += figure(i == 0 ? "likely cause" : "or else", fmt::format("{}, {:.0f} %", cause.title, cause.weight * 100.0));
        for (const std::string& sentence : cause.in_favour) out += paragraph("    for      ", sentence);
        for (const std::string& sentence : cause.against) out += paragraph("    against  ", sentence);
        if (i == 0) out += paragraph("    settle   ", cause.settles);
    }
    return out;
}

std::string data_text(const SectionHealth& health) {
    std::string aside;
    for (const auto& [reason, count] : health.data.set_aside)
        aside += fmt::format("{}{} {}", aside.empty() ? "" : ", ", reason, count);
    std::string out = figure("life", fmt::format("{:.0f} running hours watched, compared with {}",
                                                 health.life.running_hours, health.life.compared_with));
    out += figure("baseline", health.life.baseline);
    out += figure("readings", fmt::format("{} stored, {} disputed", health.data.readings, health.data.disputed));
    out += figure("operating points", fmt::format("{} judged; set aside: {}", health.data.used,
                                                  aside.empty() ? "none" : aside));
    return out;
}

std::string ratio_cell(const Ranged& ratio) {
    if (!std::isfinite(ratio.value)) return cell("-", 19);
    return cell(fmt::format("{:.2f} ({:.2f} to {:.2f})", ratio.value, ratio.low, ratio.high), 19);
}

// What a person did about it, where one did.
std::string said_of(const Episode& episode) {
    std::string said = episode.acknowledged_by.empty() ? "" : "acknowledged by " + episode.acknowledged_by;
    if (!episode.why.empty()) said += (said.empty() ? "" : ": ") + episode.why;
    return said.empty() ? said : paragraph(std::string(13, ' '), printable(said));
}

std::string episode_line(const Episode& episode, const config::Plant& plant, const Paper& paper) {
    const std::string until = episode.cleared ? local_minute(*episode.cleared, plant.time_zone) : std::string("open");
    return fmt::format("{} {} {} {}\n{:13}{} to {}, {}\n", level_word(episode.level, paper),
                       cell(printable(episode.pump) + "/" + printable(episode.section), 24), cell(episode.rule, 19),
                       episode.cause, "", local_minute(episode.raised, plant.time_zone), until, episode.state) +
           said_of(episode);
}

std::string event_line(const std::string& lead, const DatedEvent& event) {
    const std::string by = event.by.empty() ? "" : ", by " + event.by;
    const std::string text = event.text.empty() ? "" : ": " + event.text;
    return paragraph(lead, printable(event.kind + by + text));
}

std::string event_lines(const SectionHealth& health, const config::Plant& plant) {
    constexpr std::size_t most = 5;
    std::string out;
    for (std::size_t i = 0; i < std::min(most, health.events.size()); ++i)
        out += event_line("  " + local_date(health.events[i].at, plant.time_zone) + "  ", health.events[i]);
    return out;
}

// Offered, not assumed: the words to tell it stand ready.
std::string replacement_lines(const SectionHealth& health, const config::Plant& plant) {
    const analytics::LikelyReplacement likely = likely_replacement(health);
    if (!likely.at) return {};
    return paragraph("  note: ", fmt::format("Looks like a replacement on {}: the ratio fell from {:.1f} to {:.1f}. If so:",
                                             local_date(*likely.at, plant.time_zone), likely.ratio_before, likely.ratio_after)) +
           paragraph("        ", printable(replaced_command(health, *likely.at)));
}

std::string history_events(const HistoryRow& row, const config::Plant& plant) {
    std::string out;
    for (const DatedEvent& event : row.events) out += event_line(local_minute(event.at, plant.time_zone).substr(0, 16) + " - ", event);
    return out;
}

std::string history_line(const HistoryRow& row, const config::Plant& plant, const Paper& paper) {
    return fmt::format("{} {} {} {} {:>8} % {:>8}\n", local_minute(row.time, plant.time_zone).substr(0, 16),
                       cell(printable(row.section), 8), level_word(row.level, paper), ratio_cell(row.leakage_ratio),
                       plain(row.efficiency.value * 100.0, 1), plain(row.excess_lpm, 2));
}

// What all leaks cost together, and where most of it goes; empty where nothing has a price.
std::string fleet_cost(const std::vector<SectionHealth>& fleet) {
    double sum = 0.0;
    const SectionHealth* dearest = nullptr;
    for (const SectionHealth& health : fleet) {
        const double cost = health.cost ? health.cost->per_year.value : analytics::unknown;
        if (!(cost > 0.0)) continue;
        sum += cost;
        if (dearest == nullptr || cost > dearest->cost->per_year.value) dearest = &health;
    }
    if (!(sum >= 1.0)) return {};
    const std::string name = dearest->only_section ? dearest->pump : dearest->pump + "/" + dearest->section;
    return paragraph("", fmt::format("Leakage above healthy costs {:.0f} {} a year at the usual duty, {:.0f} of it at {}.",
                                     sum, printable(dearest->currency), dearest->cost->per_year.value, printable(name)));
}

}  // namespace

std::string health_text(const SectionHealth& health, const config::Plant& plant, const Paper& paper) {
    std::string out = heading(health, plant) + rule_off();
    const std::string lead = level_word(health.level, paper);
    const std::string body = paragraph(std::string(14, ' '), health.sentence);
    out += lead + "  " + body.substr(14);
    out += '\n' + figures(health, plant) + causes_text(health) + data_text(health);
    out += replacement_lines(health, plant);
    for (const std::string& note : health.notes) out += paragraph("  note: ", note);
    for (const Episode& alarm : health.alarms) out += "  alarm: " + alarm.rule + ", " + alarm.state + "\n";
    return out + event_lines(health, plant);
}

std::string health_text(const PumpHealth& health, const config::Plant& plant, const Paper& paper) {
    std::string out;
    for (const SectionHealth& section : health.sections) out += health_text(section, plant, paper) + '\n';
    out += rule_off();
    for (const std::string& caution : cautions()) out += paragraph("! ", caution);
    return out;
}

std::string fleet_text(const std::vector<SectionHealth>& fleet, const config::Plant& plant, const Paper& paper) {
    std::string out = printable(plant.name) + "\n" + rule_off();
    for (const SectionHealth& health : fleet) {
        const analytics::DayVerdict day = health.verdict.value_or(analytics::DayVerdict{});
        const std::string name = health.only_section ? health.pump : health.pump + "/" + health.section;
        out += fmt::format("{} {} {} {}\n", level_word(health.level, paper), cell(printable(name), 24),
                           ratio_cell(day.leakage_ratio), hours_in_hand_cell(day.hours_in_hand));
        out += paragraph(std::string(13, ' '), health.sentence);
    }
    out += rule_off();
    out += fleet_cost(fleet);
    out += paragraph("", "Columns: level, pump, leakage ratio with its 80 % range (1 = as new), hours in hand. `slipledger health PUMP` tells more.");
    for (const std::string& caution : cautions()) out += paragraph("! ", caution);
    return out;
}

std::string history_text(const std::vector<HistoryRow>& history, const config::Plant& plant, const Paper& paper) {
    std::string out = fmt::format("{} {} {} {} {}\n", cell("time", 16), cell("section", 8), cell("level", 12),
                                  cell("ratio (80 % range)", 19), "efficiency  excess");
    for (std::size_t i = 0; i < history.size(); ++i) {
        const std::size_t first = i;
        while (i < history.size() && history[i].stood_still && history[i].events.empty() &&
               history[i].section == history[first].section)
            ++i;
        if (const std::size_t days = i - first; days > 0)
            out += fmt::format("... {} day{} without a verdict\n", days, days == 1 ? "" : "s");
        if (i > first) --i;
        else out += history_line(history[i], plant, paper) + history_events(history[i], plant);
    }
    return out + paragraph("", fmt::format("Excess leakage in L/min; times in {}.", plant.time_zone));
}

std::string alerts_text(const std::vector<Episode>& episodes, const config::Plant& plant, const Paper& paper) {
    if (episodes.empty()) return "no alarms\n";
    std::string out;
    for (const Episode& episode : episodes) out += episode_line(episode, plant, paper);
    return out;
}

}  // namespace slipledger::report
