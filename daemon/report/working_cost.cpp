// What the leak costs, where the plant file gives prices.
#include <fmt/format.h>

#include <cmath>

#include "daemon/report/when.hpp"
#include "daemon/report/working_chapters.hpp"

namespace slipledger::report {

namespace {

using config::MakesUpBy;

// The ratio of the day the money is counted at; its symbols are apart from the summary's.
void put_day_ratio(const WorkingFacts& facts, WorkSheet& sheet) {
    const analytics::Ranged& ratio = facts.day_record->verdict.leakage_ratio;
    const auto put = [&](const char* name, const char* symbol, double value) {
        sheet.put({.name = name, .symbol = symbol, .value = value, .source = "verdict of " + iso_date(facts.day.date)});
    };
    put("leakage ratio of the day", "w_d", ratio.value);
    put("80 % range, low end", "w_d_low", ratio.low);
    put("80 % range, high end", "w_d_high", ratio.high);
}

void put_flow_lost(const LeakCost& cost, WorkSheet& sheet) {
    sheet.put(
        {.name = "healthy efficiency",
         .symbol = "eta_d",
         .value = cost.healthy_efficiency,
         .source = cost.flow_at_rated ? "of that day, at the rated point" : "of that day, at the reference point"});
    if (cost.flow_lost_percent > 0.0)
        sheet.put({.name = "less flow",
                   .symbol = "l",
                   .value = cost.flow_lost_percent,
                   .unit = "%",
                   .formula = "100 * (w_d - 1) * (1 - eta_d) / eta_d",
                   .source = "against what it gave when healthy"});
}

// Formula of the electric power lost at a ratio.
std::string power_formula(MakesUpBy by, const std::string& ratio) {
    return by == MakesUpBy::stroke ? fmt::format("P_0 * ({} - 1) / eta_m", ratio)
                                   : fmt::format("P_0 * ({} - 1) * (1 - eta_d) / eta_d / eta_m", ratio);
}

void put_energy(const WorkingFacts& facts, const LeakCost& cost, WorkSheet& sheet) {
    const config::Economics& economics = *facts.plant.economics;
    const bool by_stroke = cost.makes_up_by == MakesUpBy::stroke;
    sheet.put({.name = by_stroke ? "power of healthy leakage" : "power of full flow",
               .symbol = "P_0",
               .value = cost.mean_kw,
               .unit = "kW",
               .source = by_stroke ? "mean of dp q_healthy / 600 over the judged hours of four weeks"
                                   : "mean of p q_th / 600 over the running hours of four weeks"});
    sheet.put(
        {.name = "motor efficiency", .symbol = "eta_m", .value = economics.motor_efficiency, .source = "plant file"});
    if (cost.power_kw > 0.0)
        sheet.put({.name = "power lost",
                   .symbol = "P_x",
                   .value = cost.power_kw,
                   .unit = "kW",
                   .formula = power_formula(cost.makes_up_by, "w_d"),
                   .source = "from the mains, while it runs"});
    sheet.put({.name = "running hours a year",
               .symbol = "H",
               .value = cost.running_h_per_year,
               .unit = "h",
               .source = cost.planned_duty ? "planned duty" : "as the last four weeks went"});
    sheet.put({.name = "price of energy",
               .symbol = "price",
               .value = economics.energy_price_per_kwh,
               .unit = economics.currency + "/kWh",
               .source = "plant file"});
    const auto put_cost = [&](const char* name, const char* symbol, double value, const char* ratio) {
        if (!(value > 0.0)) return;  // a ratio below 1 costs nothing, whatever the formula says
        sheet.put({.name = name,
                   .symbol = symbol,
                   .value = value,
                   .unit = economics.currency + " a year",
                   .formula = power_formula(cost.makes_up_by, ratio) + " * H * price",
                   .source = "a year at usual duty"});
    };
    put_cost("cost of the leak", "cost", cost.per_year.value, "w_d");
    put_cost("80 % range, low end", "cost_low", cost.per_year.low, "w_d_low");
    put_cost("80 % range, high end", "cost_high", cost.per_year.high, "w_d_high");
}

std::string payback_formula() {
    return "2 * C / r / (w_d - 1 + sqrt((w_d - 1) ^ 2 + 2 * g_y * C / r))";
}

void put_payback(const WorkingFacts& facts, const LeakCost& cost, WorkSheet& sheet) {
    const config::Economics& economics = *facts.plant.economics;
    const config::Replacement& costs = *facts.section.replacement;
    const auto put = [&](const char* name, const char* symbol, double value, const std::string& unit) {
        sheet.put({.name = name, .symbol = symbol, .value = value, .unit = unit, .source = "plant file"});
    };
    put("new part", "C_p", costs.part_cost, economics.currency);
    put("work", "C_w", costs.work_cost, economics.currency);
    put("standstill", "h_d", costs.downtime_h, "h");
    put("cost of standstill", "c_d", economics.downtime_cost_per_h, economics.currency + "/h");
    sheet.put({.name = "cost of replacing",
               .symbol = "C",
               .value = *cost.replacement_cost,
               .unit = economics.currency,
               .formula = "C_p + C_w + h_d * c_d",
               .source = "definition"});
    sheet.put({.name = "cost per 1 of ratio above 1",
               .symbol = "r",
               .value = cost.per_year_and_ratio,
               .unit = economics.currency + " a year",
               .formula = power_formula(cost.makes_up_by, "2") + " * H * price",
               .source = "cost grows in a straight line with the ratio"});
    sheet.put({.name = "growth of the ratio",
               .symbol = "g_y",
               .value = cost.ratio_growth_per_year,
               .unit = "a year",
               .source = cost.ratio_growth_per_year > 0.0 ? "the day's trend at the usual duty"
                                                          : "no wear trend is established"});
    if (!std::isfinite(cost.payback_years)) {
        sheet.remark("A replacement today would never pay for itself in energy alone.");
        return;
    }
    sheet.put({.name = "pays for itself in",
               .symbol = "T_p",
               .value = cost.payback_years,
               .unit = "years",
               .formula = payback_formula(),
               .source = "the T that solves r ((w - 1) T + g T^2 / 2) = C"});
    if (!cost.pays_in.empty())
        sheet.remark(fmt::format("A replacement on {} would have paid for itself in {}, in energy alone.",
                                 iso_date(facts.day.date), cost.pays_in));
}

}  // namespace

void write_cost(const WorkingFacts& facts, WorkSheet& sheet) {
    if (!facts.cost) return;
    const LeakCost& cost = *facts.cost;
    sheet.chapter("What the leak costs");
    sheet.remark("Leakage above healthy only.");
    put_day_ratio(facts, sheet);
    if (cost.makes_up_by != MakesUpBy::stroke) put_flow_lost(cost, sheet);
    if (cost.makes_up_by == MakesUpBy::nothing) {
        sheet.remark(
            "A pump of fixed stroke takes no more power for leaking: it gives less flow, and the machine is slower. "
            "Where it runs longer instead, `makes_up_by` \"time\" in the plant file puts a price on it.");
        return;
    }
    if (!std::isfinite(cost.per_year.value)) return;
    put_energy(facts, cost, sheet);
    if (cost.replacement_cost) put_payback(facts, cost, sheet);
}

}  // namespace slipledger::report
