#include "tools/judging/pump_yard.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <array>
#include <cmath>

#include "tools/plantsim/gap_sets.hpp"

namespace slipledger::judging {
namespace {

using plantsim::Gap;
using plantsim::Life;
using plantsim::PumpDrawing;
using plantsim::SectionDrawing;

// Kinematic viscosity at 100 degC of usual oils by grade and index (ASTM D2270 inverted, rounded).
struct Grade {
    int number;
    double index_100_cst;
    double index_150_cst;
};
constexpr std::array<Grade, 4> grades{{{32, 5.35, 6.25}, {46, 6.76, 8.1}, {68, 8.73, 10.7}, {100, 11.2, 14.1}}};

constexpr double drawn_axial_cm3 = 140.0;
constexpr double drawn_radial_cm3 = 90.0;
constexpr double drawn_vane_cm3 = 67.0;
constexpr double drawn_external_cm3 = 63.0;
constexpr double drawn_internal_cm3 = 80.0;

bool is_gear(PumpKind kind) {
    return kind == PumpKind::external_gear || kind == PumpKind::internal_gear;
}

bool is_piston(PumpKind kind) {
    return kind == PumpKind::axial_piston || kind == PumpKind::radial_piston;
}

double displacement_of(PumpKind kind, double size) {
    switch (kind) {
        case PumpKind::axial_piston:
            return drawn_axial_cm3 * size;
        case PumpKind::radial_piston:
            return drawn_radial_cm3 * size;
        case PumpKind::vane:
            return drawn_vane_cm3 * size;
        case PumpKind::external_gear:
            return drawn_external_cm3 * size;
        case PumpKind::internal_gear:
            return drawn_internal_cm3 * size;
    }
    return 0.0;
}

std::vector<Gap> scaled(std::vector<Gap> gaps, double size) {
    for (Gap& gap : gaps) {
        gap.conductance_m3 *= size;
        gap.area_m2 *= size;
        gap.drag_cm3 *= size;
        gap.hole_m2 *= size;
    }
    return gaps;
}

std::vector<Gap> drawn_gaps(PumpKind kind, double size) {
    switch (kind) {
        case PumpKind::axial_piston:
            return plantsim::axial_piston_gaps(size);
        case PumpKind::radial_piston:
            return scaled(plantsim::radial_piston_gaps(), size);
        case PumpKind::vane:
            return plantsim::vane_gaps(size);
        case PumpKind::external_gear:
            return scaled(plantsim::external_gear_gaps(), size);
        case PumpKind::internal_gear:
            return scaled(plantsim::internal_gear_gaps(), size);
    }
    return {};
}

// Within the maker's tolerances: a clearance a few per cent wider or narrower leaks that much three times over.
std::vector<Gap> as_built(std::vector<Gap> gaps, Dice& dice) {
    for (Gap& gap : gaps) {
        const double clearance = std::clamp(dice.normal(1.0, 0.06), 0.85, 1.15);
        gap.conductance_m3 *= clearance * clearance * clearance;
        gap.area_m2 *= clearance;
        gap.hole_m2 *= dice.between(0.85, 1.15);
        gap.drag_cm3 *= dice.between(0.8, 1.2);
        gap.opens_with_pressure += dice.between(-0.04, 0.04);
        if (gap.eccentricity > 0.0) gap.eccentricity = std::clamp(gap.eccentricity + dice.between(-0.1, 0.1), 0.0, 1.0);
    }
    return gaps;
}

// Across the lands of the port plate or pintle, back to the inlet: no drain meter sees it.
Gap across_the_lands(double size) {
    return {.name = "across the lands",
            .conductance_m3 = size * plantsim::slot_conductance(2, 0.03, 0.008, 14e-6),
            .area_m2 = size * 2 * 0.03 * 14e-6,
            .opens_with_pressure = 0.1,
            .to_drain = false};
}

Life life_of(PumpKind kind, double size, Dice& dice) {
    std::vector<Gap> gaps = drawn_gaps(kind, size);
    if (is_piston(kind)) gaps.push_back(across_the_lands(size));
    return {.displacement_cm3 = std::round(displacement_of(kind, size)),
            .true_share = std::clamp(dice.normal(1.0, 0.01), 0.975, 1.025),
            .dead_share = dice.between(0.2, 0.4),
            .gaps = as_built(std::move(gaps), dice)};
}

PumpKind kind_for(const Wanted& wanted, Dice& dice) {
    if (wanted.kind) return *wanted.kind;
    if (wanted.sections > 1) return PumpKind::vane;
    if (wanted.compensated.value_or(false))
        return dice.one_of(
            {PumpKind::axial_piston, PumpKind::axial_piston, PumpKind::axial_piston, PumpKind::radial_piston});
    const double draw = dice.between(0.0, 1.0);
    if (wanted.drain.value_or(false))
        return draw < 0.6 ? PumpKind::axial_piston : draw < 0.7 ? PumpKind::radial_piston : PumpKind::vane;
    if (draw < 0.42) return PumpKind::axial_piston;
    if (draw < 0.50) return PumpKind::radial_piston;
    if (draw < 0.74) return PumpKind::vane;
    return draw < 0.88 ? PumpKind::external_gear : PumpKind::internal_gear;
}

double size_of(PumpKind kind, Dice& dice) {
    switch (kind) {
        case PumpKind::axial_piston:
            return dice.one_of({0.32, 0.51, 0.64, 1.0, 1.29});
        case PumpKind::radial_piston:
            return dice.one_of({0.7, 1.0, 1.56});
        case PumpKind::vane:
            return dice.one_of({0.67, 0.87, 1.0, 1.25});
        default:
            return dice.one_of({0.8, 1.0, 1.25});
    }
}

double rated_bar_of(PumpKind kind) {
    switch (kind) {
        case PumpKind::axial_piston:
            return 280.0;
        case PumpKind::radial_piston:
            return 350.0;
        case PumpKind::vane:
            return 175.0;
        case PumpKind::external_gear:
            return 210.0;
        case PumpKind::internal_gear:
            return 250.0;
    }
    return 0.0;
}

// Delivery tells leakage only where all of the stroke is known to go out.
plantsim::Fitted meters_for(PumpKind kind, const Wanted& wanted, bool compensated, Dice& dice) {
    plantsim::Fitted fitted;
    fitted.delivery_on_return = dice.happens(0.3);
    if (is_gear(kind)) {
        fitted.delivery = true;
        return fitted;
    }
    const double draw = dice.between(0.0, 1.0);
    fitted.drain = wanted.drain.value_or(compensated || draw < 0.8);
    fitted.delivery = wanted.delivery.value_or(!compensated && (draw > 0.65 || !fitted.drain));
    return fitted;
}

std::vector<double> products(double rated_bar, Dice& dice) {
    std::vector<double> bars;
    const double lowest = dice.between(0.35, 0.5);
    const double highest = dice.between(0.65, 0.8);
    for (int i = 0; i < 4; ++i) bars.push_back(std::round(rated_bar * (lowest + (highest - lowest) * i / 3.0)));
    return bars;
}

plantsim::Compensator compensator_for(double rated_bar, double rated_lpm, Dice& dice) {
    const double pilot_lpm = rated_lpm * dice.between(0.004, 0.011);
    return {.setting_bar = std::round(rated_bar * dice.between(0.84, 0.92)),
            .droop_bar = rated_bar * dice.between(0.01, 0.025),
            .pilot_lpm = pilot_lpm,
            .idle_pilot_lpm = pilot_lpm * dice.between(0.1, 0.3),
            .hold_share = dice.between(0.35, 0.7)};
}

void fit_instruments(PumpDrawing& pump, Dice& dice) {
    pump.gauge_behind_check_valve = dice.happens(0.2);
    pump.has_speed = dice.happens(0.85);
    pump.has_running = !pump.has_speed || dice.happens(0.3);
    pump.has_inlet_pressure = dice.happens(0.3);
    pump.has_case_pressure = pump.sections.front().fitted.drain && dice.happens(0.4);
    pump.thermometer_lag = static_cast<plantsim::Millis>(dice.between(0.0, 8.0)) * plantsim::minute_ms;
}

}  // namespace

std::string_view name_of(PumpKind kind) {
    constexpr std::array<std::string_view, 5> names{"axial-piston", "radial-piston", "vane", "external-gear",
                                                    "internal-gear"};
    return names[static_cast<std::size_t>(kind)];
}

YardPump pump_from_yard(Dice& dice, const Wanted& wanted) {
    const PumpKind kind = kind_for(wanted, dice);
    const bool compensated =
        is_piston(kind) && !wanted.delivery.value_or(false) && wanted.compensated.value_or(dice.happens(0.6));
    const double rated_bar = rated_bar_of(kind);
    const double synchronous_rpm = dice.one_of({1500.0, 1500.0, 1500.0, 1800.0, 1000.0});

    YardPump made{.kind = kind, .relief_bar = std::round(rated_bar * dice.between(1.0, 1.15))};
    PumpDrawing& pump = made.drawing;
    pump.slip_at_rated = dice.between(0.008, 0.018);
    pump.synchronous_rpm = synchronous_rpm;
    pump.rated = {rated_bar, std::round(synchronous_rpm * 0.987), 50.0};
    pump.shifts = dice.happens(0.7) ? plantsim::Shifts::three : plantsim::Shifts::two;
    pump.idle_bar = dice.between(10.0, 25.0);
    const plantsim::Fitted fitted = meters_for(kind, wanted, compensated, dice);
    double rated_lpm = 0.0;
    for (std::size_t s = 0; s < wanted.sections; ++s) {
        const double size = size_of(kind, dice);
        const Life life = life_of(kind, size, dice);
        rated_lpm = life.displacement_cm3 * pump.rated.speed_rpm / 1000.0;
        made.model = fmt::format("{} {:.0f}", name_of(kind), life.displacement_cm3);
        pump.sections.push_back(
            {.id = s == 0 ? "A" : "B", .fitted = fitted, .product_bar = products(rated_bar, dice), .lives = {life}});
    }
    if (compensated) pump.compensator = compensator_for(rated_bar, rated_lpm, dice);
    fit_instruments(pump, dice);
    return made;
}

YardPump sister_of(const YardPump& pump, Dice& dice) {
    YardPump sister = pump;
    for (SectionDrawing& section : sister.drawing.sections) {
        const double size = section.lives.front().displacement_cm3 / displacement_of(pump.kind, 1.0);
        section.lives = {life_of(pump.kind, size, dice)};
        section.product_bar = products(sister.drawing.rated.pressure_bar, dice);
    }
    return sister;
}

plantsim::ReservoirDrawing tank_for(const PumpDrawing& pump, std::size_t pumps, Dice& dice) {
    double displacement = 0.0;
    for (const SectionDrawing& section : pump.sections) displacement += section.lives.front().displacement_cm3;
    const double hydraulic_kw = pump.rated.pressure_bar * displacement * pump.rated.speed_rpm / 600000.0;
    const double scale = static_cast<double>(pumps) * hydraulic_kw / 97.0;  // of the pump for which the tank was drawn
    return {.id = "tank",
            .heat_capacity_kj_per_k = scale * dice.between(1200.0, 3000.0),
            .wall_w_per_k = scale * dice.between(80.0, 180.0),
            .cooler_w_per_k = scale * dice.between(350.0, 1100.0),
            .air_cooled = dice.happens(0.35),
            .cooler_opens_c = dice.between(38.0, 47.0),
            .machine_losses = dice.between(0.1, 0.28)};
}

plantsim::Oil oil_of(int grade, int index, Dice& dice) {
    const auto row = std::ranges::find(grades, grade, &Grade::number);
    const double at_100 = index > 125 ? row->index_150_cst : row->index_100_cst;
    const double thick = dice.between(0.95, 1.05);
    return {.at_40_cst = row->number * thick,
            .at_100_cst = at_100 * std::pow(thick, 0.6) * dice.between(0.985, 1.015),
            .density_15_kgm3 = dice.between(862.0, 882.0),
            .barus_per_gpa = dice.between(15.0, 21.0),
            .thinning_per_year = index > 125 ? dice.between(0.03, 0.08) : dice.between(0.0, 0.03)};
}

int grade_of(const plantsim::Oil& oil) {
    return std::ranges::min_element(
               grades, {}, [&](const Grade& grade) { return std::abs(std::log(grade.number / oil.at_40_cst)); })
        ->number;
}

}  // namespace slipledger::judging
