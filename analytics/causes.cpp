#include "analytics/causes.hpp"

#include <algorithm>
#include <cmath>

namespace slipledger::analytics {

namespace {

using enum CauseKind;

// How common each cause is among pumps that give reason to look. Common practice, no source: wear is what pumps are
// replaced for; instruments together are about as common; the rest is what remains.
struct Prior {
    CauseKind cause;
    double share;
};
constexpr std::array<Prior, 17> priors{{
    {wear, 0.30},
    {sudden_damage, 0.08},
    {oil_or_operation, 0.05},
    {internal_return, 0.05},
    {bypass, 0.05},
    {thin_oil, 0.10},
    {compensator, 0.05},
    {inlet_starvation, 0.05},
    {blocked_drain, 0.03},
    {vanes, 0.02},
    {air_in_oil, 0.03},
    {sensor_stuck, 0.04},
    {sensor_drifting, 0.08},
    {sensor_off_scale, 0.03},
    {sensor_unit, 0.03},
    {clock_off, 0.02},
    {feed_silent, 0.02},
}};

// Sizes of what a sign adds, as the odds they stand for. Common practice, no source.
constexpr double hint = 0.7;      // 2 to 1
constexpr double fair = 1.5;      // 4.5 to 1
constexpr double strong = 3.0;    // 20 to 1
constexpr double decisive = 5.0;  // 150 to 1

struct Entry {
    Sign sign;
    CauseKind cause;
    double on;
    double off;
};

// One line for each sign that bears on a cause.
constexpr std::array entries{
    // The leakage ratio rises with what opens gaps or loses flow, and with nothing else.
    Entry{Sign::ratio_up, wear, fair, -strong},
    Entry{Sign::ratio_up, sudden_damage, fair, -strong},
    Entry{Sign::ratio_up, internal_return, fair, -strong},
    Entry{Sign::ratio_up, bypass, fair, -strong},
    Entry{Sign::ratio_up, vanes, fair, -strong},
    Entry{Sign::ratio_up, inlet_starvation, hint, -fair},
    Entry{Sign::ratio_up, air_in_oil, hint, -fair},
    Entry{Sign::ratio_up, sensor_drifting, hint, -hint},
    Entry{Sign::ratio_up, compensator, -hint, 0.0},
    Entry{Sign::ratio_up, thin_oil, -decisive, fair},
    Entry{Sign::ratio_up, blocked_drain, -strong, 0.0},
    // Gaps do not heal.
    Entry{Sign::ratio_down, wear, -strong, 0.0},
    Entry{Sign::ratio_down, sudden_damage, -strong, 0.0},
    Entry{Sign::ratio_down, internal_return, -strong, 0.0},
    Entry{Sign::ratio_down, bypass, -strong, 0.0},
    Entry{Sign::ratio_down, vanes, -strong, 0.0},
    Entry{Sign::ratio_down, inlet_starvation, -strong, 0.0},
    Entry{Sign::ratio_down, air_in_oil, -strong, 0.0},
    Entry{Sign::ratio_down, thin_oil, -strong, 0.0},
    Entry{Sign::ratio_down, blocked_drain, fair, -hint},
    Entry{Sign::ratio_down, sensor_drifting, fair, 0.0},
    // Damage comes at once, wear does not.
    Entry{Sign::step, sudden_damage, strong, -strong},
    Entry{Sign::step, wear, -fair, hint},
    Entry{Sign::step, sensor_drifting, fair, 0.0},
    Entry{Sign::step, internal_return, fair, 0.0},
    Entry{Sign::step, bypass, fair, 0.0},
    Entry{Sign::step, inlet_starvation, hint, 0.0},
    Entry{Sign::step, air_in_oil, hint, 0.0},
    Entry{Sign::step, vanes, hint, 0.0},
    Entry{Sign::step_explained, oil_or_operation, decisive, -fair},
    Entry{Sign::step_explained, sudden_damage, -strong, 0.0},
    Entry{Sign::step_explained, wear, -hint, 0.0},
    // Excess leakage of open gaps grows with pressure and thin oil; a zero or a pilot flow stays what it is; vanes that
    // do
    // not come out, and an inlet that cannot follow, are worse in thick oil.
    Entry{Sign::excess_scales, wear, fair, 0.0},
    Entry{Sign::excess_scales, sudden_damage, fair, 0.0},
    Entry{Sign::excess_scales, internal_return, fair, 0.0},
    Entry{Sign::excess_scales, bypass, fair, 0.0},
    Entry{Sign::excess_scales, sensor_drifting, -fair, 0.0},
    Entry{Sign::excess_scales, compensator, -fair, 0.0},
    Entry{Sign::excess_constant, wear, -strong, 0.0},
    Entry{Sign::excess_constant, sudden_damage, -fair, 0.0},
    Entry{Sign::excess_constant, internal_return, -fair, 0.0},
    Entry{Sign::excess_constant, bypass, -fair, 0.0},
    Entry{Sign::excess_constant, sensor_drifting, strong, 0.0},
    Entry{Sign::excess_constant, compensator, fair, 0.0},
    Entry{Sign::worse_when_thick, wear, -strong, 0.0},
    Entry{Sign::worse_when_thick, sudden_damage, -strong, 0.0},
    Entry{Sign::worse_when_thick, internal_return, -fair, 0.0},
    Entry{Sign::worse_when_thick, bypass, -fair, 0.0},
    Entry{Sign::worse_when_thick, vanes, strong, -fair},
    Entry{Sign::worse_when_thick, inlet_starvation, fair, 0.0},
    // What a meter shows while nothing can flow is its own.
    Entry{Sign::zero_moved, sensor_drifting, decisive, -fair},
    Entry{Sign::zero_moved, wear, -fair, hint},
    Entry{Sign::zero_moved, sudden_damage, -fair, hint},
    Entry{Sign::flow_at_standstill, sensor_off_scale, strong, 0.0},
    Entry{Sign::flow_at_standstill, sensor_drifting, hint, 0.0},
    Entry{Sign::flow_at_standstill, wear, -hint, 0.0},
    // Instruments that give themselves away.
    Entry{Sign::unit_jump, sensor_unit, decisive + fair, -decisive},
    Entry{Sign::unit_jump, sudden_damage, -strong, 0.0},
    Entry{Sign::unit_jump, wear, -strong, 0.0},
    Entry{Sign::unit_jump, bypass, -strong, 0.0},
    Entry{Sign::unit_jump, internal_return, -strong, 0.0},
    Entry{Sign::stuck, sensor_stuck, decisive + fair, -decisive},
    Entry{Sign::stuck, wear, -fair, 0.0},
    Entry{Sign::stuck, sudden_damage, -fair, 0.0},
    Entry{Sign::off_the_scale, sensor_off_scale, decisive + fair, -fair},
    Entry{Sign::off_the_scale, wear, -fair, 0.0},
    Entry{Sign::off_the_scale, sudden_damage, -fair, 0.0},
    Entry{Sign::contradicting, sensor_off_scale, strong, -fair},
    Entry{Sign::contradicting, sensor_drifting, hint, 0.0},
    Entry{Sign::contradicting, sensor_unit, hint, 0.0},
    Entry{Sign::contradicting, clock_off, hint, 0.0},
    Entry{Sign::contradicting, wear, -fair, 0.0},
    Entry{Sign::contradicting, sudden_damage, -hint, 0.0},
    Entry{Sign::missing, feed_silent, decisive, -decisive},
    // Oil and duty: more leaks, and no more than they account for. What oil there is, broken instruments do not tell.
    Entry{Sign::unit_jump, thin_oil, -strong, 0.0},
    Entry{Sign::stuck, thin_oil, -strong, 0.0},
    Entry{Sign::off_the_scale, thin_oil, -strong, 0.0},
    Entry{Sign::missing, thin_oil, -strong, 0.0},
    Entry{Sign::pattern_lost, thin_oil, -strong, 0.0},
    Entry{Sign::plateau_moved, thin_oil, -strong, 0.0},
    Entry{Sign::case_pressure_up, thin_oil, -strong, 0.0},
    Entry{Sign::inlet_lower, thin_oil, -strong, 0.0},
    Entry{Sign::share_up, thin_oil, fair, -fair},
    Entry{Sign::share_up, blocked_drain, -strong, 0.0},
    Entry{Sign::share_down, blocked_drain, fair, -fair},
    Entry{Sign::share_down, wear, -hint, 0.0},
    Entry{Sign::oil_thinner, thin_oil, strong, -strong},
    Entry{Sign::pressure_up, oil_or_operation, fair, -hint},
    // Ports and control.
    Entry{Sign::plateau_moved, compensator, decisive, -fair},
    Entry{Sign::case_pressure_up, blocked_drain, decisive, -strong},
    Entry{Sign::inlet_lower, inlet_starvation, strong + hint, -strong},
    Entry{Sign::inlet_lower, air_in_oil, -hint, hint},
    // Scatter within an hour, and whether leakage follows pressure at all.
    Entry{Sign::unsteady, inlet_starvation, fair, -fair},
    Entry{Sign::unsteady, air_in_oil, strong + hint, -strong},
    Entry{Sign::unsteady, vanes, hint, -hint},
    Entry{Sign::unsteady, clock_off, hint, 0.0},
    Entry{Sign::unsteady, wear, -hint, 0.0},
    Entry{Sign::unsteady, sudden_damage, -hint, 0.0},
    Entry{Sign::pattern_lost, clock_off, decisive, -strong},
    Entry{Sign::pattern_lost, wear, -fair, 0.0},
    // A step of which only the expectation knows.
    Entry{Sign::flow_unmoved, sensor_drifting, decisive, 0.0},
    Entry{Sign::flow_unmoved, sudden_damage, -strong, 0.0},
    Entry{Sign::flow_unmoved, wear, -fair, 0.0},
};

// What the other basis says weighs differently on either side.
constexpr std::array by_drain{
    Entry{Sign::other_basis_agrees, wear, fair, 0.0},
    Entry{Sign::other_basis_agrees, sudden_damage, fair, 0.0},
    Entry{Sign::other_basis_agrees, sensor_drifting, -strong, 0.0},
    Entry{Sign::other_basis_differs, sensor_drifting, strong, 0.0},
    Entry{Sign::other_basis_differs, compensator, fair, 0.0},
    Entry{Sign::other_basis_differs, wear, -strong, 0.0},
    Entry{Sign::other_basis_differs, sudden_damage, -strong, 0.0},
};
constexpr std::array by_delivery{
    Entry{Sign::other_basis_agrees, wear, fair, 0.0},
    Entry{Sign::other_basis_agrees, sudden_damage, fair, 0.0},
    Entry{Sign::other_basis_agrees, sensor_drifting, -strong, 0.0},
    Entry{Sign::other_basis_agrees, internal_return, -strong, 0.0},
    Entry{Sign::other_basis_agrees, bypass, -strong, 0.0},
    Entry{Sign::other_basis_agrees, inlet_starvation, -fair, 0.0},
    Entry{Sign::other_basis_agrees, air_in_oil, -fair, 0.0},
    Entry{Sign::other_basis_differs, wear, -strong, 0.0},
    Entry{Sign::other_basis_differs, sudden_damage, -strong, 0.0},
    Entry{Sign::other_basis_differs, internal_return, fair, 0.0},
    Entry{Sign::other_basis_differs, bypass, fair, 0.0},
};

std::span<const Entry> by_basis(Basis basis) {
    return basis == Basis::case_drain ? std::span<const Entry>(by_drain) : std::span<const Entry>(by_delivery);
}

// Some causes need a part the pump does not have, or show only in the other flow.
bool can_be(CauseKind cause, const CauseSetting& setting) {
    const bool delivery = setting.basis == Basis::delivery;
    const bool piston = setting.type == PumpType::axial_piston || setting.type == PumpType::radial_piston;
    switch (cause) {
        case internal_return:
            return delivery && (piston || setting.type == PumpType::vane);
        case bypass:
        case inlet_starvation:
        case air_in_oil:
            return delivery;
        case vanes:
            return delivery && setting.type == PumpType::vane;
        case blocked_drain:
            return !delivery;
        case compensator:
            return setting.control != Control::fixed;
        default:
            return true;
    }
}

double added(const Entry& entry, const Signs& signs) {
    const SignReading& sign = signs[entry.sign];
    return sign.known ? sign.strength * entry.on + (1.0 - sign.strength) * entry.off : 0.0;
}

template <typename Visit>
void each_entry(const CauseSetting& setting, Visit visit) {
    for (const Entry& entry : entries) visit(entry);
    for (const Entry& entry : by_basis(setting.basis)) visit(entry);
}

constexpr double worth_telling = 0.01;
constexpr double worth_a_word = 0.5;  // in the logarithm
constexpr std::size_t most_words = 4;

RankedCause with_evidence(CauseKind kind, double weight, const Signs& signs, const CauseSetting& setting) {
    RankedCause ranked{.kind = kind, .weight = weight, .in_favour = {}, .against = {}};
    each_entry(setting, [&](const Entry& entry) {
        const double adds = entry.cause == kind ? added(entry, signs) : 0.0;
        if (std::abs(adds) < worth_a_word) return;
        const SignReading& sign = signs[entry.sign];
        (adds > 0.0 ? ranked.in_favour : ranked.against)
            .push_back({.sign = entry.sign,
                        .present = sign.strength >= 0.5,
                        .value = static_cast<float>(sign.value),
                        .beside = static_cast<float>(sign.beside),
                        .quantity = sign.quantity,
                        .adds = static_cast<float>(adds)});
    });
    for (auto* evidence : {&ranked.in_favour, &ranked.against}) {
        std::stable_sort(evidence->begin(), evidence->end(),
                         [](const Evidence& a, const Evidence& b) { return std::abs(a.adds) > std::abs(b.adds); });
        evidence->resize(std::min(evidence->size(), most_words));
    }
    return ranked;
}

}  // namespace

bool is_instrument(CauseKind cause) {
    return cause == instrument || cause >= sensor_stuck;
}

std::array<double, cause_count> cause_weights(const Signs& signs, const CauseSetting& setting) {
    std::array<double, cause_count> logs{};
    each_entry(setting,
               [&](const Entry& entry) { logs[static_cast<std::size_t>(entry.cause)] += added(entry, signs); });
    std::array<double, cause_count> weights{};
    double sum = 0.0;
    for (const Prior& prior : priors) {
        if (!can_be(prior.cause, setting)) continue;
        const auto place = static_cast<std::size_t>(prior.cause);
        sum += weights[place] = prior.share * std::exp(logs[place]);
    }
    for (double& weight : weights) weight /= sum;
    return weights;
}

std::vector<RankedCause> rank_causes(const Signs& signs, const CauseSetting& setting) {
    const auto weights = cause_weights(signs, setting);
    double told = 0.0;
    for (const double weight : weights) told += weight >= worth_telling ? weight : 0.0;
    std::vector<RankedCause> ranked;
    for (std::size_t i = 0; i < cause_count; ++i)
        if (weights[i] >= worth_telling)
            ranked.push_back(with_evidence(static_cast<CauseKind>(i), weights[i] / told, signs, setting));
    std::stable_sort(ranked.begin(), ranked.end(),
                     [](const RankedCause& a, const RankedCause& b) { return a.weight > b.weight; });
    return ranked;
}

double instrument_doubt(std::span<const double, cause_count> weights) {
    double doubt = 0.0;
    for (std::size_t i = 0; i < cause_count; ++i) doubt += is_instrument(static_cast<CauseKind>(i)) ? weights[i] : 0.0;
    return doubt;
}

}  // namespace slipledger::analytics
