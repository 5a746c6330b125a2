#include "analytics/instrument_watch.hpp"

#include <algorithm>
#include <cmath>

namespace slipledger::analytics {

namespace {

constexpr Pace lately{.learn = 50.0, .memory = 3.0};      // running hours: an instrument fails at once
constexpr Pace by_shifts{.learn = 50.0, .memory = 16.0};  // running hours
constexpr double duty_moves_by = 0.05;                    // of the mean: swing that another instrument must show
constexpr double most_missing_learned = 0.1;              // share: more is its usual way
constexpr double lowest_outlet_bar = -1.5;                // below a vacuum, with a gauge's own error
constexpr double most_over_rated = 1.6;                   // of rated pressure: relief valves open long before
constexpr double fastest_over_rated = 1.5;                // of rated speed
constexpr double coldest_c = -30.0;
constexpr double hottest_c = 120.0;  // seals and oil do not stand it

double share(const Summary& summary, Standing standing) {
    double running = 0.0;
    for (std::size_t i = 0; i < standing_count; ++i)
        if (static_cast<Standing>(i) != Standing::stopped) running += summary.counts[i];
    return running > 0.0 ? summary.counts[static_cast<std::size_t>(standing)] / running : unknown;
}

bool moves(const Extent& extent) {
    return extent.high - extent.low > duty_moves_by * std::abs(extent.high + extent.low) / 2.0;
}

struct Scale {
    Quantity quantity;
    double value;
    double lowest;
    double highest;
};

}  // namespace

InstrumentWatch::InstrumentWatch()
    : contradicting_(lately),
      missing_pressure_(lately),
      missing_speed_(lately),
      missing_temperature_(lately),
      running_flow_(by_shifts) {}

void InstrumentWatch::add(const Summary& summary, const SectionSpec& spec) {
    basis_ = summary.basis;
    take_runs(summary);
    take_jumps(summary);
    take_counts(summary);
    take_scale(summary, spec);
}

// Whether the duty moves is told by another instrument than the one that is looked at.
void InstrumentWatch::take_runs(const Summary& summary) {
    const bool pressure_moves = moves(summary.pressure_bar);
    const bool flow_moves = summary.flow_lpm.high > summary.flow_lpm.low;
    flow_run_.add(summary.flow_lpm.low, summary.flow_lpm.high, pressure_moves);
    pressure_run_.add(summary.pressure_bar.low, summary.pressure_bar.high, flow_moves);
    speed_run_.add(summary.speed_rpm.low, summary.speed_rpm.high, pressure_moves);
    temperature_run_.add(summary.temperature_c.low, summary.temperature_c.high, pressure_moves);
}

void InstrumentWatch::take_jumps(const Summary& summary) {
    const bool drain = basis_ == Basis::case_drain;
    const double goes_with_flow = drain ? summary.mean_pressure_bar : summary.mean_speed_rpm;
    flow_jump_.add(summary.mean_flow_lpm, goes_with_flow);
    // By delivery pressure may fall to a tenth and the flow not care: a pump running idle.
    if (drain) pressure_jump_.add(summary.mean_pressure_bar, summary.mean_flow_lpm);
    speed_jump_.add(summary.mean_speed_rpm, drain ? 1.0 : summary.mean_flow_lpm);
    temperature_jump_.add(summary.mean_temperature_c, 1.0);
}

void InstrumentWatch::take_counts(const Summary& summary) {
    contradicting_.add(share(summary, Standing::impossible), summary.running_h);
    missing_pressure_.add(share(summary, Standing::no_pressure), summary.running_h);
    missing_speed_.add(share(summary, Standing::no_speed), summary.running_h);
    missing_temperature_.add(share(summary, Standing::no_temperature), summary.running_h);
    if (!flow_run_.stuck()) running_flow_.add(summary.mean_flow_lpm, summary.running_h);
    if (summary.stop_count > 0) stop_flow_ = summary.stop_flow_lpm;
}

void InstrumentWatch::take_scale(const Summary& summary, const SectionSpec& spec) {
    const std::array<Scale, 3> scales{{
        {Quantity::outlet_pressure, summary.mean_pressure_bar, lowest_outlet_bar,
         most_over_rated * spec.rated.pressure_bar},
        {Quantity::fluid_temperature, summary.mean_temperature_c, coldest_c, hottest_c},
        {Quantity::shaft_speed, summary.mean_speed_rpm, 0.0, fastest_over_rated * spec.rated.speed_rpm},
    }};
    if (!(summary.running_h > 0.0)) return;
    for (const Scale& scale : scales) {
        const bool below = scale.value < scale.lowest;
        if (!below && !(scale.value > scale.highest)) continue;
        off_value_ = scale.value;
        off_limit_ = below ? scale.lowest : scale.highest;
        off_quantity_ = scale.quantity;
        ++off_in_a_row_;
        return;
    }
    off_in_a_row_ = 0;
}

Quantity InstrumentWatch::flow() const {
    return basis_ == Basis::case_drain ? Quantity::case_drain_flow : Quantity::delivery_flow;
}

SignReading InstrumentWatch::jumped() const {
    SignReading sign{.known = true};
    const std::array<std::pair<const Jumps*, Quantity>, 4> all{{{&temperature_jump_, Quantity::fluid_temperature},
                                                                {&pressure_jump_, Quantity::outlet_pressure},
                                                                {&speed_jump_, Quantity::shaft_speed},
                                                                {&flow_jump_, flow()}}};
    for (const auto& [jumps, quantity] : all) {
        if (!jumps->told()) continue;
        const UnitJump& jump = jumps->alone.jump();
        return {.known = true, .strength = 1.0, .value = jump.after, .beside = jump.before, .quantity = quantity};
    }
    return sign;
}

SignReading InstrumentWatch::stands_still(bool where_it_had_been) const {
    SignReading sign{.known = true};
    const std::array<std::pair<const StuckRun*, Quantity>, 4> all{{{&flow_run_, flow()},
                                                                   {&pressure_run_, Quantity::outlet_pressure},
                                                                   {&speed_run_, Quantity::shaft_speed},
                                                                   {&temperature_run_, Quantity::fluid_temperature}}};
    for (const auto& [run, quantity] : all) {
        if (!run->stuck() || run->where_it_had_been() != where_it_had_been) continue;
        if (sign.strength > 0.0 && run->length() <= sign.beside) continue;
        sign = {.known = true,
                .strength = 1.0,
                .value = run->value(),
                .beside = static_cast<double>(run->length()),
                .quantity = quantity};
    }
    return sign;
}

SignReading InstrumentWatch::off_the_scale() const {
    SignReading sign = stands_still(false);
    if (sign.strength > 0.0) {
        sign.beside = unknown;
        return sign;
    }
    if (off_in_a_row_ < 2) return sign;
    return {.known = true, .strength = 1.0, .value = off_value_, .beside = off_limit_, .quantity = off_quantity_};
}

SignReading InstrumentWatch::missing() const {
    SignReading sign;
    const std::array<std::pair<const OwnUsual*, Quantity>, 3> all{
        {{&missing_pressure_, Quantity::outlet_pressure},
         {&missing_speed_, Quantity::shaft_speed},
         {&missing_temperature_, Quantity::fluid_temperature}}};
    for (const auto& [share, quantity] : all) {
        if (!share->known() || share->learned() > most_missing_learned) continue;
        const double strength = strength_between(share->recent(), 0.3, 0.7);
        if (sign.known && strength <= sign.strength) continue;
        sign = {.known = true,
                .strength = strength,
                .value = 100.0 * share->recent(),
                .beside = 100.0 * share->learned(),
                .quantity = quantity};
    }
    return sign;
}

SignReading InstrumentWatch::at_standstill() const {
    if (!std::isfinite(stop_flow_) || !(running_flow_.recent() > 0.0)) return {};
    const double share = std::abs(stop_flow_) / running_flow_.recent();
    return {.known = true,
            .strength = strength_between(share, 0.15, 0.4),
            .value = stop_flow_,
            .beside = running_flow_.recent(),
            .quantity = flow()};
}

void InstrumentWatch::fill(Signs& signs) const {
    signs[Sign::unit_jump] = jumped();
    signs[Sign::stuck] = stands_still(true);
    // A reading in another unit is often off the scale too; then the unit says more.
    if (signs[Sign::unit_jump].strength == 0.0) signs[Sign::off_the_scale] = off_the_scale();
    signs[Sign::missing] = missing();
    signs[Sign::flow_at_standstill] = at_standstill();
    signs[Sign::contradicting] = {.known = std::isfinite(contradicting_.recent()),
                                  .strength = strength_between(contradicting_.recent(), 0.1, 0.5),
                                  .value = 100.0 * contradicting_.recent(),
                                  .quantity = flow()};
}

bool InstrumentWatch::broken() const {
    return jumped().strength > 0.0 || stands_still(true).strength > 0.0 || off_the_scale().strength > 0.0;
}

}  // namespace slipledger::analytics
