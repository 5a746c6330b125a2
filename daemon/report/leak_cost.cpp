#include "daemon/report/leak_cost.hpp"

#include <algorithm>
#include <cmath>

#include "analytics/flow.hpp"
#include "analytics/money.hpp"
#include "daemon/report/when.hpp"

namespace slipledger::report {

namespace {

using analytics::DayVerdict;
using analytics::Ranged;
using config::MakesUpBy;

constexpr double days_a_year = 365.25;
constexpr double days_a_week = 7.0;

// A mean weighted by hours.
struct HourlyMean {
    double sum = 0.0;
    double hours = 0.0;

    void add(double value, double h) {
        if (!std::isfinite(value) || !(h > 0.0)) return;
        sum += value * h;
        hours += h;
    }
    double value() const { return hours > 0.0 ? sum / hours : analytics::unknown; }
};

double running_h_per_year(const std::vector<ledger::DayRecord>& days) {
    double running_h = 0.0;
    for (const ledger::DayRecord& day : days) running_h += day.verdict.running_h;
    return days.empty() ? analytics::unknown : running_h / static_cast<double>(days.size()) * days_a_year;
}

// Hydraulic power of what the pump would leak if it were healthy, while it was judged.
double healthy_leak_kw(const std::vector<ledger::DayRecord>& days, std::int32_t life) {
    HourlyMean mean;
    for (const auto& [day, finished] : days) {
        if (day.life != life || !(day.leakage_lpm > 0.0)) continue;
        mean.add(day.leakage_kw * (day.leakage_lpm - day.excess_lpm) / day.leakage_lpm, day.judged_h);
    }
    return mean.value();
}

// Hydraulic power of the whole displacement, while it ran.
double full_flow_kw(const std::vector<ledger::SummaryRecord>& summaries) {
    HourlyMean mean;
    for (const ledger::SummaryRecord& record : summaries) {
        const auto& [full, compensating] = record.summary.judged;
        const analytics::Moments& judged = compensating.count > full.count ? compensating : full;
        if (judged.count == 0) continue;
        mean.add(analytics::hydraulic_power_kw(record.summary.mean_pressure_bar, judged.theoretical_lpm),
                 record.summary.running_h);
    }
    return mean.value();
}

std::optional<double> replacement_cost(const config::Economics& economics, const config::Section& section) {
    if (!section.replacement) return std::nullopt;
    const config::Replacement& costs = *section.replacement;
    return costs.part_cost + costs.work_cost + costs.downtime_h * economics.downtime_cost_per_h;
}

// Electric power at a ratio; what was won back by a ratio below 1 is scatter, not money.
double power_kw(const LeakCost& cost, const config::Economics& economics, double ratio) {
    const double worn = std::max(ratio, 1.0);
    if (cost.makes_up_by == MakesUpBy::stroke)
        return analytics::leak_power_kw(
            {.healthy_kw = cost.mean_kw, .leakage_ratio = worn, .motor_efficiency = economics.motor_efficiency});
    return analytics::stretched_power_kw({.full_flow_kw = cost.mean_kw,
                                          .flow_lost_share = analytics::flow_lost_share(worn, cost.healthy_efficiency),
                                          .motor_efficiency = economics.motor_efficiency});
}

void add_money(LeakCost& cost, const config::Economics& economics, const DayVerdict& day) {
    const auto per_year = [&](double ratio) {
        return analytics::cost_per_year(power_kw(cost, economics, ratio), cost.running_h_per_year,
                                        economics.energy_price_per_kwh);
    };
    cost.power_kw = power_kw(cost, economics, day.leakage_ratio.value);
    cost.kwh_per_year = cost.power_kw * cost.running_h_per_year;
    cost.per_year = {per_year(day.leakage_ratio.value), per_year(day.leakage_ratio.low),
                     per_year(day.leakage_ratio.high)};
    cost.per_year_and_ratio = per_year(2.0);  // both ways of losing power grow with the ratio in a straight line
    if (!cost.replacement_cost) return;
    if (day.trend.established)
        cost.ratio_growth_per_year = std::max(day.trend.per_1000_h.value * cost.running_h_per_year / 1000.0, 0.0);
    cost.payback_years = analytics::payback_years({.replacement_cost = *cost.replacement_cost,
                                                   .cost_per_year_and_ratio = cost.per_year_and_ratio,
                                                   .leakage_ratio = day.leakage_ratio.value,
                                                   .ratio_growth_per_year = cost.ratio_growth_per_year});
    if (cost.payback_years <= longest_payback_years)
        cost.pays_in = iso_date(day.day.date + static_cast<std::int32_t>(std::ceil(cost.payback_years * days_a_year)))
                           .substr(0, std::string_view("2027-03").size());
}

}  // namespace

std::optional<LeakCost> query_cost(const ledger::Reader& reader, const config::Plant& plant, const config::Pump& pump,
                                   const config::Section& section, const ledger::TrackEntry& track,
                                   const DayVerdict& day) {
    if (day.level == analytics::Level::unjudged) return std::nullopt;
    if (!plant.economics && pump.makes_up_by == MakesUpBy::stroke) return std::nullopt;
    const std::int32_t to = day.day.date + 1;
    const std::vector<ledger::DayRecord> days = reader.days(track.id, to - duty_days, to);
    LeakCost cost;
    cost.makes_up_by = pump.makes_up_by;
    cost.healthy_efficiency = day.efficiency_baseline;
    cost.flow_at_rated = day.efficiency_at_rated;
    cost.planned_duty = plant.duty_h_per_week.has_value();
    cost.running_h_per_year =
        cost.planned_duty ? *plant.duty_h_per_week / days_a_week * days_a_year : running_h_per_year(days);
    if (pump.makes_up_by != MakesUpBy::stroke)
        cost.flow_lost_percent =
            100.0 * std::max(analytics::flow_lost_share(day.leakage_ratio.value, day.efficiency_baseline), 0.0);
    if (pump.makes_up_by == MakesUpBy::nothing || !plant.economics) return cost;
    cost.replacement_cost = replacement_cost(*plant.economics, section);
    cost.mean_kw = pump.makes_up_by == MakesUpBy::stroke
                       ? healthy_leak_kw(days, day.life)
                       : full_flow_kw(reader.summaries(track.id, days.front().verdict.day.begin, day.day.end));
    add_money(cost, *plant.economics, day);
    return cost;
}

}  // namespace slipledger::report
