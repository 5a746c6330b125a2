#include "analytics/regime.hpp"

#include <algorithm>
#include <cmath>

#include "analytics/flow.hpp"

namespace slipledger::analytics {
namespace {

using std::chrono::hours;
using std::chrono::minutes;
using std::chrono::seconds;

constexpr Milliseconds memory = hours(1);  // what lies further back than this has no say
constexpr Milliseconds longest_settling = longest_gap;
constexpr Milliseconds stands_after_gap = minutes(1);
constexpr double stopped_below_rpm = 5.0;       // a speed sensor's noise at standstill
constexpr double stopped_below_power = 0.02;    // of rated hydraulic power: a motor not running
constexpr double stopped_below_bar = 2.0;       // zero error of a 400 bar gauge; an unloaded pump shows more
constexpr double relieving_from = 0.9;          // of the relief setting: where relief valves begin to pass
constexpr double variable_speed_below = 0.2;    // of rated speed: no motor on the mains turns a pump so slowly
constexpr double motoring_below_bar = -5.0;     // pressure drop in flow direction beyond any gauge's error
constexpr double motoring_below_power = -0.02;  // of rated hydraulic power
constexpr double negative_drain_share = 0.02;   // of theoretical flow: a meter's zero error may read this
constexpr double negative_leakage_share = 0.1;  // name plate, meter and speed together are never this far out
constexpr double meter_sigmas = 3.0;

double or_zero(double gauge_bar) {
    return std::isnan(gauge_bar) ? 0.0 : gauge_bar;
}

}  // namespace

PointJudge::PointJudge(const SectionReadings& readings, const SectionSpec& spec, const Usual& usual, Basis basis,
                       Instant from, Instant to)
    : spec_(spec),
      basis_(basis),
      aligner_(readings, basis, usual, from - memory, to),
      pressure_(readings[index_of(Quantity::outlet_pressure)], {spec.steady.pressure_bar_per_s, seconds(1)},
                from - memory),
      speed_(readings[index_of(Quantity::shaft_speed)], {spec.steady.speed_rpm_per_s, seconds(1)}, from - memory),
      temperature_(readings[index_of(Quantity::fluid_temperature)],
                   {spec.steady.temperature_c_per_min / 60.0, minutes(1)}, from - memory),
      reference_(reference_state(spec)),
      from_(from),
      flow_hold_(hold_of(usual, flow_quantity(basis))),
      settling_(std::min(spec.settling, longest_settling)),
      rated_power_kw_(hydraulic_power_kw(spec.rated.pressure_bar,
                                         theoretical_flow_lpm(spec.displacement_cm3, spec.rated.speed_rpm))) {
    const double plateau_bar = usual.plateau_bar > 0.0 ? usual.plateau_bar : spec.compensator_bar;
    if (spec.control == Control::pressure_compensated)
        plateau_begins_bar_ = plateau_bar * (1.0 - spec.plateau_fraction);
}

// Points of the hour before `from` are walked through unseen: they tell what came before the first.
const JudgedPoint* PointJudge::next() {
    while (const OperatingPoint* point = aligner_.next()) {
        const JudgedPoint* judged = judge(*point);
        if (judged->time >= from_) return judged;
    }
    return nullptr;
}

const JudgedPoint* PointJudge::judge(const OperatingPoint& point) {
    take_ports(point);
    take_speed(point);
    take_oil(point);
    take_leakage(point);
    take_phase(point);
    take_time(point.time);
    point_.standing = standing_of(point);
    return &point_;
}

// The outlet of an over-centre pump is whichever port it pushes into. Its meter may show a sign or not.
void PointJudge::take_ports(const OperatingPoint& point) {
    reversed_ = point.stroke < 0.0;
    point_.flow_lpm = point.flow_lpm;
    point_.case_bar = point.case_bar;
    point_.inlet_bar = point.inlet_bar;
    point_.pressure_bar = reversed_ ? point.inlet_bar : point.outlet_bar;
    const double suction_bar = or_zero(reversed_ ? point.outlet_bar : point.inlet_bar);
    const double against_bar = basis_ == Basis::case_drain ? or_zero(point.case_bar) : suction_bar;
    point_.pressure_rise_bar = point_.pressure_bar - against_bar;
}

void PointJudge::take_speed(const OperatingPoint& point) {
    point_.speed_rpm = spec_.has_speed_sensor ? std::abs(point.speed_rpm)
                                              : motor_speed_rpm({.nominal_rpm = spec_.motor_nominal_rpm,
                                                                 .slip_at_rated = spec_.motor_slip_at_rated,
                                                                 .pressure_bar = point_.pressure_bar,
                                                                 .rated_bar = spec_.rated.pressure_bar});
    const bool stroke_counts = basis_ == Basis::delivery && !std::isnan(point.stroke);
    const double stroke = stroke_counts ? std::abs(point.stroke) : spec_.max_stroke_fraction;
    point_.theoretical_lpm = theoretical_flow_lpm(spec_.displacement_cm3, point_.speed_rpm, stroke);
}

// Oil changes slowly: most rows repeat the temperature of the row before.
void PointJudge::take_oil(const OperatingPoint& point) {
    point_.temperature_c = point.temperature_c;
    if (point.temperature_c != oil_at_c_) {
        oil_at_c_ = point.temperature_c;
        kinematic_cst_ = spec_.fluid.kinematic_cst(oil_at_c_);
        density_kgm3_ = spec_.fluid.density_kgm3(oil_at_c_);
        dynamic_pas_ = 1e-6 * kinematic_cst_ * density_kgm3_;
    }
    point_.viscosity_cst = kinematic_cst_;
    point_.features = features_at({.pressure_rise_bar = point_.pressure_rise_bar,
                                   .viscosity_pas = dynamic_pas_,
                                   .density_kgm3 = density_kgm3_,
                                   .speed_rpm = point_.speed_rpm},
                                  reference_);
}

void PointJudge::take_leakage(const OperatingPoint& point) {
    if (basis_ == Basis::case_drain) {
        point_.leakage_lpm = point.flow_lpm - spec_.case_flushing_lpm;
        return;
    }
    const double flow_lpm = reversed_ ? std::abs(point.flow_lpm) : point.flow_lpm;
    point_.delivery_lpm = spec_.delivery_meter.on_pressure_side
                              ? to_inlet_density_lpm(flow_lpm, point_.pressure_rise_bar, spec_.fluid.bulk_modulus_gpa())
                              : flow_lpm;
    point_.leakage_lpm = point_.theoretical_lpm - point_.delivery_lpm;
}

// A point stands for the time since the one before it; after a gap nobody knows.
void PointJudge::take_time(Instant time) {
    const bool follows = previous_ != Instant::min() && time - previous_ <= flow_hold_;
    const Milliseconds stands = follows ? time - previous_ : std::min(flow_hold_, stands_after_gap);
    point_.time = time;
    point_.hours = static_cast<double>(stands.count()) / 3.6e6;
    point_.stopped_for = phase_ == Phase::stopped ? std::min(time - phase_began_, longest_gap) : Milliseconds{0};
    previous_ = time;
}

// A change of phase is taken to lie half way between the two rows that show it.
void PointJudge::take_phase(const OperatingPoint& point) {
    const Phase phase = phase_of(point);
    const bool follows =
        previous_ != Instant::min() && point.time - previous_ <= longest_gap && phase_ != Phase::unsure;
    if (!follows)
        phase_began_ = phase == Phase::stopped ? point.time : Instant::min();
    else if (phase != phase_)
        phase_began_ = previous_ + (point.time - previous_) / 2;
    phase_ = phase;
}

bool PointJudge::is_stopped(const OperatingPoint& point) const {
    if (!std::isnan(point.running)) return point.running < 0.5;
    if (!std::isnan(point.speed_rpm)) return std::abs(point.speed_rpm) < stopped_below_rpm;
    if (spec_.has_speed_sensor) return false;
    if (!std::isnan(point.power_kw) && !std::isnan(rated_power_kw_))
        return std::abs(point.power_kw) < stopped_below_power * rated_power_kw_;
    return point.outlet_bar < stopped_below_bar;
}

bool PointJudge::is_motoring(const OperatingPoint& point) const {
    const double along_bar =
        reversed_ ? point.inlet_bar - or_zero(point.outlet_bar) : point.outlet_bar - or_zero(point.inlet_bar);
    return along_bar < motoring_below_bar || point.power_kw < motoring_below_power * rated_power_kw_;
}

PointJudge::Phase PointJudge::phase_of(const OperatingPoint& point) const {
    if (is_stopped(point)) return Phase::stopped;
    if (std::isnan(point_.pressure_bar) || std::isnan(point_.speed_rpm)) return Phase::unsure;
    if (point_.speed_rpm < spec_.minimum_speed_rpm) return Phase::slow;
    if (is_motoring(point)) return Phase::motoring;
    if (point_.pressure_bar >= plateau_begins_bar_) return Phase::compensating;
    // The drain does not care where the flow goes; a delivery meter does not see what a relief valve passes.
    const bool relief_opens = spec_.control == Control::fixed && basis_ == Basis::delivery &&
                              point_.pressure_bar >= relieving_from * spec_.relief_bar;
    return relief_opens ? Phase::relieving : Phase::full;
}

Standing PointJudge::standing_of(const OperatingPoint& point) {
    const bool settling = is_settling();
    if (phase_ == Phase::stopped) return Standing::stopped;
    if (std::isnan(point_.pressure_bar)) return Standing::no_pressure;
    if (std::isnan(point_.speed_rpm)) return Standing::no_speed;
    if (phase_ == Phase::slow) return Standing::below_minimum_speed;
    if (spec_.has_speed_sensor && spec_.control == Control::fixed &&
        point_.speed_rpm < variable_speed_below * spec_.rated.speed_rpm)
        return Standing::variable_speed;
    if (phase_ == Phase::motoring) return Standing::motoring;
    if (std::isnan(point_.viscosity_cst)) return Standing::no_temperature;
    if (point_.viscosity_cst > spec_.fluid.maximum_cst()) return Standing::cold;
    if (point_.viscosity_cst < spec_.fluid.minimum_cst()) return Standing::thin;
    return settling ? Standing::transient : standing_when_steady(point);
}

Standing PointJudge::standing_when_steady(const OperatingPoint& point) const {
    if (basis_ == Basis::delivery) {
        if (phase_ == Phase::relieving) return Standing::relieving;
        const bool stroke_known = !std::isnan(point.stroke);
        const bool at_full_stroke =
            spec_.control == Control::fixed || (spec_.full_stroke && phase_ != Phase::compensating);
        if (!stroke_known && !at_full_stroke) return Standing::part_stroke;
    }
    const FlowMeter& meter = basis_ == Basis::case_drain ? spec_.drain_meter : spec_.delivery_meter;
    if (std::abs(point.flow_lpm) < meter.least_lpm) return Standing::below_least_flow;
    if (is_impossible()) return Standing::impossible;
    return phase_ == Phase::compensating ? Standing::compensating : Standing::full_flow;
}

// Every watch must see every point, so none of the three is left out once one has spoken.
bool PointJudge::is_settling() {
    const Instant moved = std::max({pressure_.last_until(point_.time), speed_.last_until(point_.time),
                                    temperature_.last_until(point_.time), phase_began_});
    return moved != Instant::min() && point_.time - moved < settling_;
}

bool PointJudge::is_impossible() const {
    if (point_.pressure_rise_bar < motoring_below_bar) return true;
    const bool drain = basis_ == Basis::case_drain;
    const FlowMeter& meter = drain ? spec_.drain_meter : spec_.delivery_meter;
    const double zero_error_lpm = std::isnan(meter.accuracy_lpm) ? 0.0 : meter_sigmas * meter.accuracy_lpm;
    const double share = drain ? negative_drain_share : negative_leakage_share;
    return !(point_.leakage_lpm <= point_.theoretical_lpm) ||
           point_.leakage_lpm < -(share * point_.theoretical_lpm + zero_error_lpm);
}

std::vector<JudgedPoint> judge_points(const SectionReadings& readings, const SectionSpec& spec, const Usual& usual,
                                      Basis basis, Instant from, Instant to) {
    std::vector<JudgedPoint> points;
    PointJudge judge(readings, spec, usual, basis, from, to);
    while (const JudgedPoint* point = judge.next()) points.push_back(*point);
    return points;
}

}  // namespace slipledger::analytics
