#include "daemon/watch/section_spec.hpp"

#include <algorithm>
#include <cmath>

namespace slipledger::watch {
namespace {

using analytics::Instant;
using analytics::Quantity;
using analytics::SectionSpec;
using analytics::unknown;

analytics::DutyPoint duty_of(const config::Duty& duty) {
    return {duty.pressure_bar, duty.speed_rpm, duty.fluid_temperature_c};
}

analytics::Ladder ladder_of(const config::Ladder& ladder) {
    return {ladder.watch.value_or(unknown), ladder.plan.value_or(unknown), ladder.act.value_or(unknown),
            ladder.on_delay,                ladder.off_delay,              ladder.deadband};
}

analytics::RuleLimits limits_of(const config::Limits& limits) {
    analytics::RuleLimits rules;
    rules.leakage_ratio = ladder_of(limits.leakage_ratio);
    rules.step_lasting = analytics::RunningHours{limits.step_lasting_h};
    rules.efficiency_points_lost = ladder_of(limits.efficiency_points);
    rules.drain_share_percent = ladder_of(limits.drain_share_percent);
    rules.over_temperature_c = ladder_of(limits.over_temperature_c);
    rules.case_pressure_bar = ladder_of(limits.case_pressure_bar);
    rules.inlet_vacuum_bar = ladder_of(limits.inlet_vacuum_bar);
    return rules;
}

analytics::FlowMeter meter_of(const config::Section& section, Quantity quantity) {
    analytics::FlowMeter meter;
    const auto found = section.sensors.find(quantity);
    if (found == section.sensors.end()) return meter;
    const config::Sensor& sensor = found->second;
    meter.accuracy_lpm = sensor.accuracy.value_or(unknown);
    if (sensor.accuracy_percent) meter.gain_error = *sensor.accuracy_percent / 100.0;
    meter.least_lpm = sensor.least.value_or(0.0);
    meter.on_pressure_side = sensor.measured_at == config::MeasuredAt::pressure_side;
    return meter;
}

double leakage_of(const config::MakerTestPoint& point, double displacement_cm3) {
    if (point.case_drain_lpm) return *point.case_drain_lpm;
    if (point.delivery_lpm) return displacement_cm3 * point.speed_rpm / 1000.0 - *point.delivery_lpm;
    return unknown;
}

// The record has several points, the filter takes one: that nearest to the reference pressure says most there.
std::optional<analytics::MakerTest> maker_test_of(const config::Section& section) {
    const auto nearest = std::ranges::min_element(section.maker_test, {}, [&](const config::MakerTestPoint& point) {
        return std::abs(point.pressure_bar - section.reference.pressure_bar);
    });
    if (nearest == section.maker_test.end()) return std::nullopt;
    const double leakage = leakage_of(*nearest, section.displacement_cm3);
    if (!(leakage > 0.0)) return std::nullopt;
    return analytics::MakerTest{leakage, {nearest->pressure_bar, nearest->speed_rpm, unknown}, nearest->viscosity_cst};
}

bool is_fitted(const config::Section& section, Quantity quantity) { return section.sensors.contains(quantity); }

void lay_pump(SectionSpec& spec, const config::Pump& pump) {
    spec.type = pump.type;
    spec.control = pump.control;
    spec.minimum_speed_rpm = pump.minimum_speed_rpm;
    spec.motor_nominal_rpm = pump.motor.nominal_rpm;
    spec.motor_slip_at_rated = pump.motor.slip_at_rated;
    spec.settling = pump.settling;
    spec.steady = {pump.steady.pressure_bar_per_s, pump.steady.speed_rpm_per_s, pump.steady.temperature_c_per_min};
    spec.fluid = oil_of(pump.fluid).value_or(analytics::Fluid());  // the reader has refused oils that cannot be
}

void lay_section(SectionSpec& spec, const config::Section& section) {
    spec.displacement_cm3 = section.displacement_cm3;
    spec.displacement_accuracy = section.displacement_accuracy_percent / 100.0;
    spec.rated = duty_of(section.rated);
    spec.reference = duty_of(section.reference);
    spec.compensator_bar = section.compensator_bar.value_or(unknown);
    spec.plateau_fraction = section.plateau_percent / 100.0;
    spec.relief_bar = section.relief_bar.value_or(unknown);
    spec.max_stroke_fraction = section.max_stroke_fraction;
    spec.full_stroke = section.full_stroke;
    spec.case_flushing_lpm = section.case_flushing_lpm;
    spec.drain_meter = meter_of(section, Quantity::case_drain_flow);
    spec.delivery_meter = meter_of(section, Quantity::delivery_flow);
    spec.baseline.run_in = analytics::RunningHours(section.baseline.run_in_h);
    spec.baseline.least = analytics::RunningHours(section.baseline.min_h);
    if (section.baseline.max_h) spec.baseline.most = analytics::RunningHours(*section.baseline.max_h);
    spec.limits = limits_of(section.limits);
}

// The plant file's maker's test is of the part fitted today; an earlier or later life brings its own or none.
void lay_life(SectionSpec& spec, const config::Section& section, const ledger::Life& life) {
    spec.maker_test = life.maker_test;
    if (!life.maker_test && !life.ended) spec.maker_test = maker_test_of(section);
    if (life.displacement_cm3) spec.displacement_cm3 = *life.displacement_cm3;
}

}  // namespace

void heed_as_new(SectionSpec& spec, const analytics::ReferenceTest& test) {
    const auto tested = analytics::tested_leakage(test, spec);
    if (!tested || !(tested->leakage_lpm > 0.0)) return;
    const double accuracy = tested->sd_lpm / tested->leakage_lpm;
    if (spec.maker_test && spec.maker_test->accuracy <= accuracy) return;
    spec.maker_test = analytics::MakerTest{tested->leakage_lpm, test.at, test.viscosity_cst, accuracy, true};
}

std::optional<analytics::Fluid> oil_of(const config::Fluid& fluid) {
    const analytics::FluidTraits traits{fluid.density_15_kgm3, fluid.minimum_cst, fluid.maximum_cst,
                                        fluid.bulk_modulus_gpa};
    const auto point = [&](std::size_t i) {
        return analytics::ViscosityAt{fluid.points[i].temperature_c, fluid.points[i].viscosity_cst};
    };
    if (fluid.points.size() == 2) return analytics::Fluid::from_points(point(0), point(1), traits);
    return analytics::Fluid::from_grade(fluid.iso_vg.value_or(analytics::unknown),
                                        fluid.viscosity_index.value_or(analytics::unknown), traits);
}

std::optional<Instant> second_next_stop(const config::Plant& plant, const std::string& area, Instant at) {
    bool passed_one = false;
    for (const config::PlannedStop& stop : plant.planned_stops) {
        const bool stops_it = stop.areas.empty() || std::ranges::find(stop.areas, area) != stop.areas.end();
        if (!stops_it || stop.from < at) continue;
        if (passed_one) return stop.from;
        passed_one = true;
    }
    return std::nullopt;
}

std::array<analytics::Milliseconds, analytics::quantity_count> given_holds(const config::Section& section) {
    std::array<analytics::Milliseconds, analytics::quantity_count> holds{};
    for (const auto& [quantity, sensor] : section.sensors)
        if (sensor.hold) holds[index_of(quantity)] = *sensor.hold;
    return holds;
}

bool drains_with_others(const config::Plant& plant, const config::Section& section) {
    if (section.drain_group.empty()) return false;
    int sharing = 0;
    for (const config::Pump& pump : plant.pumps)
        for (const config::Section& other : pump.sections) sharing += other.drain_group == section.drain_group ? 1 : 0;
    return sharing > 1;
}

SectionSpec section_spec_of(const config::Plant& plant, const config::Pump& pump, const config::Section& section,
                            const ledger::Life& life, bool watched_from_new, const SeenSensors& seen, Instant day) {
    SectionSpec spec;
    lay_pump(spec, pump);
    lay_section(spec, section);
    lay_life(spec, section, life);
    spec.shared_drain = drains_with_others(plant, section);
    spec.has_speed_sensor = seen.speed || is_fitted(section, Quantity::shaft_speed);
    spec.has_temperature_sensor = seen.temperature || is_fitted(section, Quantity::fluid_temperature);
    spec.duty_h_per_week = plant.duty_h_per_week.value_or(unknown);
    if (const auto& spare = section.spare) spec.spare_lead_days = spare->in_stock > 0 ? 0.0 : spare->lead_days;
    spec.second_next_planned_stop = second_next_stop(plant, pump.area, day);
    spec.watched_from_new = watched_from_new;
    return spec;
}

}  // namespace slipledger::watch
