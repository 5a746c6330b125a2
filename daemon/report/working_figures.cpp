// What follows from the leakage ratio: efficiency, losses, clearance, hours in hand.
#include <fmt/format.h>

#include <cmath>

#include "analytics/flow.hpp"
#include "analytics/leakage.hpp"
#include "analytics/outlook.hpp"
#include "analytics/rated_efficiency.hpp"
#include "analytics/wear_filter.hpp"
#include "analytics/wear_prior.hpp"
#include "daemon/report/working_chapters.hpp"

namespace slipledger::report {

namespace {

using analytics::Basis;
using analytics::DutyPoint;
using analytics::Ranged;
using analytics::RatedEfficiency;

// Symbols of the point where efficiency is quoted end with this: it is the reference point, or the rated one.
std::string tag_of(const RatedEfficiency& efficiency) {
    return efficiency.at_rated ? "_R" : "_r";
}

RatedEfficiency efficiency_of(const WorkingFacts& facts) {
    return rated_efficiency(facts.course->filter(), facts.spec, facts.basis);
}

void put_rated_point(const WorkingFacts& facts, WorkSheet& sheet) {
    const DutyPoint& rated = facts.spec.rated;
    if (!sheet.has("p_R"))
        sheet.put({.name = "rated pressure",
                   .symbol = "p_R",
                   .value = rated.pressure_bar,
                   .unit = "bar",
                   .source = "plant file"});
    sheet.put(
        {.name = "rated speed", .symbol = "n_R", .value = rated.speed_rpm, .unit = "rpm", .source = "plant file"});
    sheet.put({.name = "rated oil temperature",
               .symbol = "t_R",
               .value = rated.temperature_c,
               .unit = "degC",
               .source = "plant file"});
    write_oil_at(facts, sheet, rated.temperature_c, "_R");
}

// How far the rated point lies outside what was seen decides where efficiency is quoted.
void put_coverage(const WorkingFacts& facts, WorkSheet& sheet, const RatedEfficiency& efficiency) {
    sheet.put({.name = "rated point's distance",
               .symbol = "d_R",
               .value = facts.course->filter().distance_from_seen(facts.spec.rated),
               .source = "from pressures and viscosities seen, in ln; up to 0.1 counts as seen"});
    sheet.remark(efficiency.at_rated
                     ? "Quoted at the rated point, so that days can be compared."
                     : "The rated point lies too far from what this pump has been seen to do (d_R): quoted at the "
                       "reference point.");
}

void put_features(const WorkingFacts& facts, WorkSheet& sheet, const DutyPoint& at, const std::string& tag) {
    const analytics::Features f = features_at(leakage_state(at, facts.spec.fluid), reference_state(facts.spec));
    const std::string source = "as above";
    sheet.put({.name = "laminar feature there",
               .symbol = "F1",
               .value = f.laminar,
               .formula = fmt::format("p{0} / p_r * mu_r / mu{0}", tag),
               .source = source});
    sheet.put({.name = "orifice feature there",
               .symbol = "F2",
               .value = f.orifice,
               .formula = fmt::format("sqrt(p{0} / p_r * rho_r / rho{0})", tag),
               .source = source});
    sheet.put({.name = "speed feature there",
               .symbol = "F3",
               .value = f.speed,
               .formula = fmt::format("n{} / n_r", tag),
               .source = source});
}

void put_displacement(const WorkingFacts& facts, WorkSheet& sheet) {
    if (!sheet.has("V"))
        sheet.put({.name = "displacement",
                   .symbol = "V",
                   .value = facts.spec.displacement_cm3,
                   .unit = "cm3/rev",
                   .source = "name plate"});
}

double theoretical_at(const WorkingFacts& facts, const DutyPoint& at) {
    const double off =
        facts.basis == Basis::delivery ? facts.course->filter().belief().mean(analytics::displacement) : 0.0;
    return analytics::theoretical_flow_lpm(facts.spec.displacement_cm3 - off, at.speed_rpm,
                                           facts.spec.max_stroke_fraction);
}

std::string theoretical_formula(const WorkingFacts& facts, const std::string& tag) {
    std::string formula = facts.basis == Basis::delivery ? "(V - dV) * n" : "V * n";
    formula += tag;
    if (facts.spec.max_stroke_fraction != 1.0) formula += fmt::format(" * {:g}", facts.spec.max_stroke_fraction);
    return formula + " / 1000";
}

void put_efficiency(WorkSheet& sheet, const RatedEfficiency& efficiency, bool by_drain) {
    sheet.put({.name = "efficiency when healthy",
               .symbol = "eta_0",
               .value = efficiency.healthy,
               .formula = "1 - h_q / q_thq",
               .source = "ISO 4409"});
    sheet.put({.name = "efficiency now",
               .symbol = "eta",
               .value = efficiency.now.value,
               .formula = "1 - exp(y_q) / q_thq",
               .source = by_drain ? "an upper bound: by drain" : "ISO 4409"});
    sheet.put({.name = "80 % range, low end",
               .symbol = "eta_low",
               .value = efficiency.now.low,
               .formula = "1 - exp(y_q + 1.281552 * sd_y_q) / q_thq",
               .source = "leakage at its high end"});
    sheet.put({.name = "80 % range, high end",
               .symbol = "eta_high",
               .value = efficiency.now.high,
               .formula = "1 - exp(y_q - 1.281552 * sd_y_q) / q_thq",
               .source = "leakage at its low end"});
    const Ranged& lost = efficiency.points_lost;
    const auto points = [&](const char* name, const char* symbol, double value, const char* ratio) {
        sheet.put({.name = name,
                   .symbol = symbol,
                   .value = value,
                   .unit = "points",
                   .formula = fmt::format("100 * (1 - eta_0) * ({} - 1)", ratio),
                   .source = "per cent of theoretical flow"});
    };
    points("points lost", "lost", lost.value, "w");
    points("points lost, low end", "lost_low", lost.low, "w_low");
    points("points lost, high end", "lost_high", lost.high, "w_high");
}

// Symbols of the judged regime with the most points end with this.
std::string larger_regime(const WorkingFacts& facts) {
    const auto& judged = facts.record->summary.judged;
    return judged[1].count > judged[0].count ? "_k" : "_m";
}

}  // namespace

void write_efficiency(const WorkingFacts& facts, WorkSheet& sheet) {
    const RatedEfficiency efficiency = efficiency_of(facts);
    const std::string tag = tag_of(efficiency);
    const DutyPoint& at = efficiency.at_rated ? facts.spec.rated : facts.spec.reference;
    const analytics::LogEstimate now = facts.course->filter().worn_leakage(at);
    const double healthy = std::exp(facts.course->filter().healthy_leakage(at).ln);
    sheet.chapter("Volumetric efficiency");
    put_coverage(facts, sheet, efficiency);
    if (efficiency.at_rated) put_rated_point(facts, sheet);
    put_features(facts, sheet, at, tag);
    put_displacement(facts, sheet);
    sheet.put({.name = "healthy leakage there",
               .symbol = "h_q",
               .value = healthy,
               .unit = "L/min",
               .formula = "a * F1 + b * F2 + c * F3",
               .source = "model"});
    sheet.put({.name = "theoretical flow there",
               .symbol = "q_thq",
               .value = theoretical_at(facts, at),
               .unit = "L/min",
               .formula = theoretical_formula(facts, tag),
               .source = "definition"});
    sheet.put({.name = "ln of leakage there now",
               .symbol = "y_q",
               .value = now.ln,
               .sd = now.sd,
               .formula = "ln(h_q) + x",
               .source = "sd: from the filter's covariance"});
    put_efficiency(sheet, efficiency, facts.basis == Basis::case_drain);
}

void write_losses(const WorkingFacts& facts, WorkSheet& sheet) {
    const analytics::SummaryVerdict& verdict = facts.record->verdict;
    const std::string tag = larger_regime(facts);
    sheet.chapter("What leaks above healthy");
    sheet.put({.name = "excess leakage",
               .symbol = "e",
               .value = verdict.excess_lpm,
               .unit = "L/min",
               .formula = "q_w - h",
               .source = "this summary, at its own operating point"});
    sheet.put({.name = "power of the leakage",
               .symbol = "P_w",
               .value = verdict.leakage_kw,
               .unit = "kW",
               .formula = fmt::format("dp{} * q_w / 600", tag),
               .source = "definition of hydraulic power"});
    const double growth = facts.so_far->clearance_growth_percent;
    if (!std::isfinite(growth)) {
        sheet.remark("No clearance growth is given after a step: one part broke, the others did not.");
        return;
    }
    sheet.put({.name = "clearance growth",
               .symbol = "g",
               .value = growth,
               .unit = "%",
               .source = "the g that makes the next line equal to w"});
    sheet.put({.name = "check: ratio at that growth",
               .symbol = "w_g",
               .value = verdict.filtered_ratio.value,
               .formula = "(a * (1 + g / 100) ^ 3 + (b + c) * (1 + g / 100)) / (a + b + c)",
               .source = "laminar flow goes with the cube of the gap"});
}

void write_hours_in_hand(const WorkingFacts& facts, WorkSheet& sheet) {
    const RatedEfficiency efficiency = efficiency_of(facts);
    const analytics::RatioLimit limit = first_limit(facts.course->filter(), facts.spec, facts.basis, efficiency);
    const analytics::HoursInHand& left = facts.so_far->hours_in_hand;
    const analytics::Trend& trend = facts.so_far->trend;
    sheet.chapter("Trend and hours in hand");
    const auto put_trend = [&](const char* name, const char* symbol, double value, const char* drift) {
        sheet.put({.name = name,
                   .symbol = symbol,
                   .value = value,
                   .unit = "per 1000 h",
                   .formula = fmt::format("w * {} * 1000 / 24", drift),
                   .source = "x grows by v each 24 running hours"});
    };
    put_trend("growth of the ratio", "G", trend.per_1000_h.value, "v");
    put_trend("80 % range, low end", "G_low", trend.per_1000_h.low, "(v - 1.281552 * sd_v)");
    put_trend("80 % range, high end", "G_high", trend.per_1000_h.high, "(v + 1.281552 * sd_v)");
    sheet.remark(trend.established ? "The trend is established: for seven judged days its low end was above 0."
                                   : "The trend is not established (its low end has not been above 0 for seven judged "
                                     "days): only a lower bound of the hours in hand is given.");
    const analytics::RuleLimits& limits = facts.spec.limits;
    const auto put_limit = [&](const char* name, const char* symbol, double value, const char* unit) {
        if (std::isfinite(value))
            sheet.put(
                {.name = name, .symbol = symbol, .value = value, .unit = unit, .source = "plant file, else by type"});
    };
    put_limit("act limit on the ratio", "L_w", limits.leakage_ratio.act, "");
    put_limit("act limit on points lost", "L_e", limits.efficiency_points_lost.act, "points");
    if (sheet.has("L_e"))
        sheet.put({.name = "ratio at which they are lost",
                   .symbol = "w_e",
                   .value = 1.0 + limits.efficiency_points_lost.act / efficiency.points_per_ratio,
                   .formula = "1 + L_e / (100 * (1 - eta_0))",
                   .source = "from the points lost above"});
    if (facts.basis == Basis::case_drain)
        put_limit("act limit on drain share", "L_d", limits.drain_share_percent.act, "%");
    if (!std::isfinite(limit.ratio)) return;
    sheet.put({.name = "first limit, as a ratio",
               .symbol = "L",
               .value = limit.ratio,
               .source = fmt::format("the least of them: {}", limit.rule)});
    if (std::isnan(left.low)) return;
    sheet.remark(
        "Hours are quantiles of the first time x reaches ln L, over wear laws dw/dt = rate w^k (k = -0.6, 0, 0.6 "
        "and 1.2 equally likely) and over what is not known of x and v; they are found by quadrature, not by a "
        "formula.");
    const auto put_hours = [&](const char* name, const char* symbol, double value) {
        sheet.put({.name = name, .symbol = symbol, .value = value, .unit = "running h", .source = "first passage"});
    };
    put_hours("hours in hand, 10 %", "H_low", left.low);
    if (std::isfinite(left.mid)) put_hours("hours in hand, 50 %", "H_mid", left.mid);
    if (std::isfinite(left.high)) put_hours("hours in hand, 90 %", "H_high", left.high);
}

}  // namespace slipledger::report
