#include "daemon/report/render_json.hpp"

#include <nlohmann/json.hpp>
#include <string>

#include "daemon/report/number.hpp"
#include "daemon/report/when.hpp"

namespace slipledger::report {

using nlohmann::ordered_json;

namespace {

template <typename Time>
ordered_json time_or_null(const std::optional<Time>& at) {
    return at ? ordered_json(rfc3339(*at)) : ordered_json(nullptr);
}

ordered_json text_or_null(const std::string& text) { return text.empty() ? ordered_json(nullptr) : ordered_json(text); }

ordered_json efficiency_json(const analytics::DayVerdict& day, analytics::Basis basis) {
    ordered_json out = ranged(day.efficiency);
    out["baseline"] = number(day.efficiency_baseline);
    out["basis"] = name_of(basis);
    out["at"] = day.efficiency_at_rated ? "rated" : "reference";
    return out;
}

ordered_json hours_json(const analytics::HoursInHand& hours) {
    return {{"low", number(hours.low)},
            {"mid", number(hours.mid)},
            {"high", number(hours.high)},
            {"limit", text_or_null(std::string(hours.limit))}};
}

ordered_json dated_hours_json(const analytics::HoursInHand& hours, const DatesInHand& dates) {
    ordered_json out = hours_json(hours);
    out["duty_h_per_week"] = number(7.0 * hours.duty_h_per_day);
    out["date"] = {{"low", time_or_null(dates.low)}, {"mid", time_or_null(dates.mid)}, {"high", time_or_null(dates.high)}};
    return out;
}

ordered_json witnesses_json(const analytics::Witnesses& told) {
    const auto date_or_null = [](const std::optional<std::int32_t>& date) {
        return date ? ordered_json(iso_date(*date)) : ordered_json(nullptr);
    };
    return {{"days", told.days},
            {"theil_sen",
             {{"per_1000_h", number(told.slope_per_1000_h.value)},
              {"low", number(told.slope_per_1000_h.low)},
              {"high", number(told.slope_per_1000_h.high)}}},
            {"mann_kendall", {{"z", number(told.rank_z)}, {"p", number(told.rank_p)}}},
            {"cumulative_sum",
             {{"value", number(told.cumulative_sum)},
              {"limit", number(analytics::sum_limit)},
              {"passed", date_or_null(told.sum_passed)}}},
            {"weighted_mean", ranged(told.weighted_mean)},
            {"shape", {{"name", name_of(told.shape)}, {"changed", date_or_null(told.changed)}}}};
}

ordered_json trend_json(const SectionHealth& health, const analytics::Trend& trend) {
    return {{"per_1000_h", number(trend.per_1000_h.value)},
            {"low", number(trend.per_1000_h.low)},
            {"high", number(trend.per_1000_h.high)},
            {"established", trend.established},
            {"onset", time_or_null(trend.onset)},
            {"onset_range",
             {{"low", time_or_null(health.onset_range.low)}, {"high", time_or_null(health.onset_range.high)}}},
            {"witnesses", health.witnesses ? witnesses_json(*health.witnesses) : ordered_json(nullptr)}};
}

ordered_json causes_json(const SectionHealth& health) {
    ordered_json causes = ordered_json::array();
    for (const CauseWords& cause : health.causes)
        causes.push_back({{"cause", name_of(cause.kind)},
                          {"weight", number(cause.weight)},
                          {"title", cause.title},
                          {"for", cause.in_favour},
                          {"against", cause.against},
                          {"settles", cause.settles}});
    return causes;
}

std::string_view name_of(config::MakesUpBy by) {
    return by == config::MakesUpBy::stroke ? "stroke" : by == config::MakesUpBy::time ? "time" : "nothing";
}

ordered_json cost_json(const std::optional<LeakCost>& cost) {
    if (!cost) return nullptr;
    return {{"makes_up_by", name_of(cost->makes_up_by)},
            {"flow_lost_percent", number(cost->flow_lost_percent)},
            {"power_kw", number(cost->power_kw)},
            {"running_h_per_year", number(cost->running_h_per_year)},
            {"kwh_per_year", number(cost->kwh_per_year)},
            {"per_year", ranged(cost->per_year)},
            {"replacement", number(cost->replacement_cost.value_or(analytics::unknown))},
            {"payback_years", number(cost->payback_years)},
            {"pays_for_itself", text_or_null(cost->pays_in)}};
}

ordered_json data_json(const DataFacts& data) {
    ordered_json set_aside = ordered_json::object();
    for (const auto& [reason, count] : data.set_aside) set_aside[reason] = count;
    return {{"readings", data.readings}, {"used", data.used}, {"disputed", data.disputed}, {"set_aside", set_aside}};
}

ordered_json event_json(const DatedEvent& event) {
    return {{"at", rfc3339(event.at)},
            {"kind", event.kind},
            {"section", text_or_null(event.section)},
            {"by", text_or_null(event.by)},
            {"text", text_or_null(event.text)}};
}

ordered_json events_json(const std::vector<DatedEvent>& events) {
    ordered_json out = ordered_json::array();
    for (const DatedEvent& event : events) out.push_back(event_json(event));
    return out;
}

ordered_json replacement_json(const SectionHealth& health) {
    const analytics::LikelyReplacement likely = likely_replacement(health);
    if (!likely.at) return nullptr;
    return {{"at", rfc3339(*likely.at)},
            {"ratio_before", number(likely.ratio_before)},
            {"ratio_after", number(likely.ratio_after)},
            {"if_so", replaced_command(health, *likely.at)}};
}

ordered_json life_json(const SectionHealth& health) {
    const LifeFacts& life = health.life;
    ordered_json events = ordered_json::array();
    for (const DatedEvent& event : health.events)
        if (!life.started || event.at >= *life.started) events.push_back(event_json(event));
    return {{"number", life.number},
            {"started", time_or_null(life.started)},
            {"running_hours", number(life.running_hours)},
            {"baseline", life.baseline},
            {"compared_with", life.compared_with},
            {"unrecorded_replacement", replacement_json(health)},
            {"events", events}};
}

}  // namespace

ordered_json to_json(const SectionHealth& health) {
    const analytics::DayVerdict day = health.verdict.value_or(analytics::DayVerdict{});
    return {{"pump", health.pump},
            {"section", health.section},
            {"name", health.pump_name},
            {"machine", health.machine},
            {"area", health.area},
            {"model", health.model},
            {"as_of", time_or_null(health.as_of)},
            {"level", name_of(health.level)},
            {"reason", text_or_null(health.reason)},
            {"sentence", health.sentence},
            {"leakage_ratio", ranged(day.leakage_ratio)},
            {"volumetric_efficiency", efficiency_json(day, health.basis.value_or(analytics::Basis::case_drain))},
            {"clearance_growth_percent", number(day.clearance_growth_percent)},
            {"leakage_lpm", number(day.leakage_lpm)},
            {"excess_lpm", number(day.excess_lpm)},
            {"leakage_kw", number(day.leakage_kw)},
            {"slip_coefficient", number(day.slip_coefficient)},
            {"yearly_cost", number(health.cost ? health.cost->per_year.value : analytics::unknown)},
            {"currency", text_or_null(health.currency)},
            {"cost", cost_json(health.cost)},
            {"trend", trend_json(health, day.trend)},
            {"hours_in_hand", dated_hours_json(day.hours_in_hand, health.dates_in_hand)},
            {"causes", causes_json(health)},
            {"data", data_json(health.data)},
            {"life", life_json(health)},
            {"alarms", to_json(health.alarms)},
            {"events", events_json(health.events)},
            {"notes", health.notes},
            {"cautions", cautions()}};
}

ordered_json to_json(const PumpHealth& health) {
    ordered_json out = to_json(health.most_urgent());
    if (health.sections.size() > 1) out["sections"] = to_json(health.sections);
    return out;
}

ordered_json to_json(const std::vector<SectionHealth>& fleet) {
    ordered_json out = ordered_json::array();
    for (const SectionHealth& section : fleet) out.push_back(to_json(section));
    return out;
}

ordered_json to_json(const std::vector<HistoryRow>& history) {
    ordered_json out = ordered_json::array();
    for (const HistoryRow& row : history) {
        ordered_json line{{"time", rfc3339(row.time)},
                          {"pump", row.pump},
                          {"section", row.section},
                          {"basis", name_of(row.basis)},
                          {"life", row.life},
                          {"level", name_of(row.level)},
                          {"reason", text_or_null(row.reason)},
                          {"leakage_ratio", ranged(row.leakage_ratio)}};
        if (row.filtered_ratio) line["filtered_ratio"] = ranged(*row.filtered_ratio);
        line["volumetric_efficiency"] = ranged(row.efficiency);
        line["excess_lpm"] = number(row.excess_lpm);
        line["hours_in_hand"] = row.hours_in_hand ? hours_json(*row.hours_in_hand) : ordered_json(nullptr);
        line["cause"] = text_or_null(row.cause);
        if (!row.events.empty()) line["events"] = events_json(row.events);
        out.push_back(std::move(line));
    }
    return out;
}

ordered_json to_json(const Episode& episode) {
    return {{"id", episode.id},
            {"pump", episode.pump},
            {"section", episode.section},
            {"basis", name_of(episode.basis)},
            {"rule", episode.rule},
            {"level", name_of(episode.level)},
            {"cause", text_or_null(episode.cause)},
            {"state", episode.state},
            {"raised", rfc3339(episode.raised)},
            {"cleared", time_or_null(episode.cleared)},
            {"life", episode.life},
            {"value", number(episode.value)},
            {"limit", number(episode.limit)},
            {"acknowledged_by", text_or_null(episode.acknowledged_by)},
            {"shelved_until", time_or_null(episode.shelved_until)},
            {"why", text_or_null(episode.why)}};
}

ordered_json to_json(const std::vector<Episode>& episodes) {
    ordered_json out = ordered_json::array();
    for (const Episode& episode : episodes) out.push_back(to_json(episode));
    return out;
}

}  // namespace slipledger::report
