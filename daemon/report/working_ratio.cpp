// From the summary's means and the estimate as it stood at the summary's end to the leakage ratio.
#include <fmt/format.h>

#include <array>
#include <cmath>

#include "analytics/wear_filter.hpp"
#include "daemon/report/when.hpp"
#include "daemon/report/working_chapters.hpp"

namespace slipledger::report {

namespace {

using analytics::Basis;
using analytics::Moments;
using analytics::Standing;
using analytics::Summary;
using analytics::WearState;

// The judged regimes: what their symbols end with, and their name. Order as in Summary::judged.
struct RegimeTag {
    const char* tag;
    const char* name;
};
constexpr std::array<RegimeTag, analytics::judged_regimes> regimes{{{"_m", "full-flow"}, {"_k", "compensating"}}};

bool by_delivery(const WorkingFacts& facts) {
    return facts.basis == Basis::delivery;
}

std::string counts_words(const Summary& summary) {
    std::string words;
    for (std::size_t i = 0; i < summary.counts.size(); ++i)
        if (summary.counts[i] > 0)
            words +=
                fmt::format("{}{} {}", words.empty() ? "" : ", ", summary.counts[i], name_of(static_cast<Standing>(i)));
    return words;
}

std::uint32_t judged_points(const Summary& summary) {
    return summary.judged[0].count + summary.judged[1].count;
}

// One regime's means on the page. Threads: one.
class RegimeMeans {
public:
    RegimeMeans(const WorkingFacts& facts, WorkSheet& sheet, std::size_t regime)
        : facts_(facts),
          sheet_(sheet),
          moments_(facts.record->summary.judged[regime]),
          seen_(facts.record->summary.counts[regime]),
          tag_(regimes[regime].tag),
          name_(regimes[regime].name) {}

    void write() {
        const std::uint32_t trimmed = (seen_ - moments_.count) / 2;
        sheet_.remark(
            fmt::format("{}: {} points, {} left out at each end by how far they lie from a line of leakage on f1 "
                        "(5 % of 20 points or more), {} in the means.",
                        name_, seen_, trimmed, moments_.count));
        mean("leakage seen", "q", moments_.leakage_lpm, "L/min");
        mean("laminar feature", "f1", moments_.feature[0], "");
        mean("orifice feature", "f2", moments_.feature[1], "");
        mean("speed feature", "f3", moments_.feature[2], "");
        mean("pressure rise", "dp", moments_.dp_bar, "bar");
        mean("fluid temperature", "t", moments_.temperature_c, "degC");
        mean("kinematic viscosity", "nu", moments_.viscosity_cst, "mm2/s");
        mean("shaft speed", "n", moments_.speed_rpm, "rpm");
        if (by_delivery(facts_)) mean("delivery", "qd", moments_.delivery_lpm, "L/min");
        mean("theoretical flow", "qth", moments_.theoretical_lpm, "L/min");
    }

private:
    void mean(const char* what, const char* symbol, double value, const char* unit) {
        sheet_.put({.name = fmt::format("{}, {}", what, name_),
                    .symbol = std::string(symbol) + tag_,
                    .value = value,
                    .unit = unit,
                    .source = fmt::format("mean of {} points", moments_.count)});
    }

    const WorkingFacts& facts_;
    WorkSheet& sheet_;
    const Moments& moments_;
    std::uint32_t seen_;
    const char* tag_;
    const char* name_;
};

Stop why_nothing_to_feed(const WorkingFacts& facts) {
    const double run_in_h = facts.spec.baseline.run_in.h;
    if (facts.so_far->life_running_h < run_in_h)
        return fmt::format(
            "it is still run in: {:.1f} of {:g} running hours; such hours are shown but not learned from.",
            facts.so_far->life_running_h, run_in_h);
    return std::string(
        "this summary cannot be of a pump (leakage above theoretical flow, far below nothing, or a feature "
        "that is no number): it was not learned from.");
}

void put_state(const WorkingFacts& facts, WorkSheet& sheet, WearState state, WorkStep step) {
    const analytics::WearBelief& belief = facts.course->filter().belief();
    step.value = belief.mean(state);
    step.sd = std::sqrt(belief.covariance(state, state));
    step.source = "wear filter";
    sheet.put(std::move(step));
}

void put_coefficients(const WorkingFacts& facts, WorkSheet& sheet) {
    const analytics::LeakageCoefficients healthy = facts.course->filter().coefficients();
    put_state(facts, sheet, analytics::ln_laminar, {.name = "laminar, ln a", .symbol = "ln_a"});
    put_state(facts, sheet, analytics::ln_orifice, {.name = "orifice, ln b", .symbol = "ln_b"});
    put_state(facts, sheet, analytics::ln_speed, {.name = "speed, ln c", .symbol = "ln_c"});
    const auto put = [&](const char* name, const char* symbol, double value) {
        sheet.put({.name = name,
                   .symbol = symbol,
                   .value = value,
                   .unit = "L/min",
                   .formula = fmt::format("exp(ln_{})", symbol),
                   .source = "at the reference point, healthy"});
    };
    put("laminar leakage", "a", healthy.laminar_lpm);
    put("orifice leakage", "b", healthy.orifice_lpm);
    put("speed leakage", "c", healthy.speed_lpm);
}

bool saw(const WorkingFacts& facts, std::size_t regime) {
    return facts.record->summary.judged[regime].count > 0;
}

// Healthy and wear-dependent leakage of one regime's means, in symbols that end with its tag.
struct RegimeFormulas {
    std::string healthy;
    std::string worn;
};

RegimeFormulas formulas_of(const WorkingFacts& facts, std::size_t regime) {
    const std::string tag = regimes[regime].tag;
    std::string worn = "q" + tag;
    if (by_delivery(facts)) worn += " - dV * n" + tag + " / 1000";
    worn += " - z";
    if (regime == 1) worn += " - k";
    return {fmt::format("a * f1{0} + b * f2{0} + c * f3{0}", tag), worn};
}

// Both regimes weigh by their points.
RegimeFormulas formulas_of_both(const WorkingFacts& facts) {
    const auto weighed = [&](const std::string& one, const std::string& other) {
        const auto& judged = facts.record->summary.judged;
        return fmt::format("({0} * ({2}) + {1} * ({3})) / ({0} + {1})", judged[0].count, judged[1].count, one, other);
    };
    const RegimeFormulas full = formulas_of(facts, 0);
    const RegimeFormulas compensating = formulas_of(facts, 1);
    return {weighed(full.healthy, compensating.healthy), weighed(full.worn, compensating.worn)};
}

void put_range(WorkSheet& sheet, const WorkStep& value, const analytics::Ranged& range, const std::string& low,
               const std::string& high) {
    sheet.put(value);
    sheet.put({.name = "80 % range, low end",
               .symbol = value.symbol + "_low",
               .value = range.low,
               .unit = value.unit,
               .formula = low,
               .source = "10 % quantile of the normal"});
    sheet.put({.name = "80 % range, high end",
               .symbol = value.symbol + "_high",
               .value = range.high,
               .unit = value.unit,
               .formula = high,
               .source = "90 % quantile"});
}

void put_own_ratio(const WorkingFacts& facts, WorkSheet& sheet, const analytics::OwnReading& own) {
    const RegimeFormulas formulas =
        saw(facts, 0) && saw(facts, 1) ? formulas_of_both(facts) : formulas_of(facts, saw(facts, 0) ? 0 : 1);
    sheet.put({.name = "healthy leakage",
               .symbol = "h",
               .value = own.healthy_lpm,
               .unit = "L/min",
               .formula = formulas.healthy,
               .source = "model, at the hour's own features"});
    sheet.put({.name = "leakage that wears",
               .symbol = "q_w",
               .value = own.leakage_lpm,
               .unit = "L/min",
               .formula = formulas.worn,
               .source = "seen, less what does not grow with wear"});
    put_range(sheet,
              {.name = "the summary's own ratio",
               .symbol = "w_own",
               .value = own.ratio,
               .sd = own.ratio_sd,
               .formula = "q_w / h",
               .source = "sd: scatter, and what is not known of the states"},
              facts.record->verdict.leakage_ratio, "w_own - 1.281552 * sd_w_own", "w_own + 1.281552 * sd_w_own");
}

}  // namespace

Stop write_summary(const WorkingFacts& facts, WorkSheet& sheet) {
    const Summary& summary = facts.record->summary;
    sheet.chapter(fmt::format("Summary of {} to {}", local_minute(summary.start, facts.plant.time_zone),
                              local_minute(summary.start + summary.length, facts.plant.time_zone)));
    sheet.remark(fmt::format("Points by what was made of them: {}.", counts_words(summary)));
    if (judged_points(summary) == 0) return std::string("none of this summary's points could be judged.");
    for (std::size_t regime = 0; regime < analytics::judged_regimes; ++regime)
        if (saw(facts, regime)) RegimeMeans(facts, sheet, regime).write();
    return std::nullopt;
}

Stop write_estimate(const WorkingFacts& facts, WorkSheet& sheet) {
    if (!facts.course->filter().primed() || !std::isfinite(facts.record->verdict.leakage_ratio.value))
        return why_nothing_to_feed(facts);
    sheet.chapter("The estimate at the summary's end");
    sheet.remark(
        "A Kalman filter holds healthy leakage and wear together and is led on summary by summary; the states and "
        "their standard deviations below are its own, everything after them can be worked out. It was led here "
        "again from the newest checkpoint before this day.");
    put_coefficients(facts, sheet);
    if (by_delivery(facts))
        put_state(facts, sheet, analytics::displacement,
                  {.name = "name plate less true", .symbol = "dV", .unit = "cm3/rev"});
    put_state(facts, sheet, analytics::meter_zero, {.name = "meter's zero", .symbol = "z", .unit = "L/min"});
    if (saw(facts, 1))
        put_state(facts, sheet, analytics::pilot, {.name = "constant, compensating", .symbol = "k", .unit = "L/min"});
    put_state(facts, sheet, analytics::ln_wear, {.name = "wear, ln of the ratio", .symbol = "x"});
    put_state(facts, sheet, analytics::drift, {.name = "drift of x", .symbol = "v", .unit = "per running day"});
    put_state(facts, sheet, analytics::disturbance, {.name = "slow disturbance", .symbol = "u"});
    return std::nullopt;
}

void write_ratio(const WorkingFacts& facts, WorkSheet& sheet) {
    const analytics::WearFilter& filter = facts.course->filter();
    sheet.chapter("The leakage ratio");
    sheet.remark(
        fmt::format("Leakage that grows with wear, now over {}. First by this summary alone, then as the filter "
                    "holds it, which weighs all summaries up to here.",
                    facts.compared_with));
    put_own_ratio(facts, sheet, filter.own_reading(facts.record->summary));
    put_range(sheet,
              {.name = "filtered ratio",
               .symbol = "w",
               .value = facts.record->verdict.filtered_ratio.value,
               .formula = "exp(x)",
               .source = "definition of x"},
              facts.record->verdict.filtered_ratio, "exp(x - 1.281552 * sd_x)", "exp(x + 1.281552 * sd_x)");
}

}  // namespace slipledger::report
