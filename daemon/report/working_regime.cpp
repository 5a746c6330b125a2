// What the pump was doing at the instant shown, in words, and the numbers that decided it.
#include <fmt/format.h>

#include <cmath>

#include "daemon/report/when.hpp"
#include "daemon/report/working_chapters.hpp"

namespace slipledger::report {

namespace {

using analytics::Control;
using analytics::SectionSpec;
using analytics::Standing;

std::string transient_words(const SectionSpec& spec) {
    return fmt::format(
        "pressure, speed or temperature moved faster than {:g} bar/s, {:g} rpm/s or {:g} K/min, or the "
        "pump changed what it was doing, less than {} before",
        spec.steady.pressure_bar_per_s, spec.steady.speed_rpm_per_s, spec.steady.temperature_c_per_min,
        span_words(spec.settling));
}

std::string running_words(const WorkingFacts& facts) {
    const bool by_delivery = facts.basis == analytics::Basis::delivery;
    if (facts.spec.control == Control::pressure_compensated)
        return "it turns, steadily, below the compensator's plateau";
    if (by_delivery && std::isfinite(facts.spec.relief_bar))
        return "it turns, steadily, below 90 % of the relief valve's setting, so that all its flow passes the meter";
    return "it turns, steadily; where its flow goes is of no matter to the drain";
}

std::string words_on(const WorkingFacts& facts) {
    const SectionSpec& spec = facts.spec;
    const analytics::JudgedPoint& point = facts.point->point;
    switch (point.standing) {
        case Standing::full_flow:
            return running_words(facts);
        case Standing::compensating:
            return "pressure stands on the compensator's plateau. The stroke is not known there and does not matter: "
                   "the "
                   "leakage terms are the same, and a constant k (pilot flow) is allowed for";
        case Standing::stopped:
            return "the shaft does not turn";
        case Standing::below_minimum_speed:
            return fmt::format("it turns more slowly than {:g} rpm", spec.minimum_speed_rpm);
        case Standing::cold:
            return fmt::format("the oil is thicker than {:g} mm2/s", spec.fluid.maximum_cst());
        case Standing::thin:
            return fmt::format("the oil is thinner than {:g} mm2/s", spec.fluid.minimum_cst());
        case Standing::transient:
            return transient_words(spec);
        case Standing::part_stroke:
            return "by delivery a pump is judged at full stroke only, and neither a stroke sensor nor the plant file "
                   "proves that it was";
        case Standing::relieving:
            return fmt::format(
                "pressure is over 90 % of the relief valve's setting of {:g} bar: part of the flow may "
                "not pass the meter",
                spec.relief_bar);
        case Standing::motoring:
            return "pressure falls in the direction of flow: it is driven as a motor";
        case Standing::variable_speed:
            return "it turns at less than a fifth of its rated speed: a drive holds pressure with it";
        case Standing::no_pressure:
            return "there is no outlet pressure young enough";
        case Standing::no_speed:
            return "there is no shaft speed young enough";
        case Standing::no_temperature:
            return "there is no fluid temperature young enough, so the oil's viscosity is not known";
        case Standing::below_least_flow:
            return "the flow is below what its meter can show";
        case Standing::impossible:
            return "the readings contradict each other: no pump can do this";
    }
    return {};
}

}  // namespace

void write_regime(const WorkingFacts& facts, WorkSheet& sheet) {
    const Standing standing = facts.point->point.standing;
    sheet.chapter("What the pump was doing: " + std::string(name_of(standing)));
    sheet.remark(fmt::format("{}: {}.", name_of(standing), words_on(facts)));
    if (!is_judged(standing)) sheet.remark("This point is set aside: it is counted, but no part of what follows.");
    if (!std::isfinite(facts.point->plateau_bar)) return;
    sheet.put({.name = "compensator's plateau",
               .symbol = "p_k",
               .value = facts.point->plateau_bar,
               .unit = "bar",
               .source = "as seen the seven days before, else the plant file"});
    sheet.put({.name = "compensating from",
               .symbol = "p_k0",
               .value = facts.point->plateau_bar * (1.0 - facts.spec.plateau_fraction),
               .unit = "bar",
               .formula = fmt::format("p_k * (1 - {:g})", facts.spec.plateau_fraction),
               .source = "method"});
}

}  // namespace slipledger::report
