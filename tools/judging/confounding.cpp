#include "tools/judging/confounding.hpp"

#include <algorithm>
#include <cmath>
#include <vector>

#include "tools/plantsim/section.hpp"

namespace slipledger::judging {
namespace {

using plantsim::Column;
using plantsim::day_ms;
using plantsim::PlantDrawing;
using plantsim::PumpDrawing;
using plantsim::Trouble;
using plantsim::TroubleKind;

Millis days(double count) {
    return static_cast<Millis>(count * static_cast<double>(day_ms));
}

const plantsim::Fitted& meters(const PumpDrawing& pump) {
    return pump.sections.front().fitted;
}

double healthy_drain_lpm(const PlantDrawing& plant, const PumpDrawing& pump) {
    const plantsim::Strain strain = plantsim::reference_point(pump.rated);
    return plantsim::leakage(pump.sections.front().lives.front(), plant.reservoirs.front().oil, strain,
                             pump.rated.pressure_bar)
        .to_drain_lpm;
}

double theoretical_lpm(const PumpDrawing& pump) {
    return pump.sections.front().lives.front().displacement_cm3 * pump.rated.speed_rpm / 1000.0;
}

// One instrument of the pump, at random.
Column some_column(const PumpDrawing& pump, Dice& dice) {
    std::vector<Column> fitted{Column::outlet_pressure, Column::fluid_temperature};
    if (pump.has_speed) fitted.push_back(Column::shaft_speed);
    if (meters(pump).drain) fitted.insert(fitted.end(), 2, Column::case_drain_flow);
    if (meters(pump).delivery) fitted.insert(fitted.end(), 2, Column::delivery_flow);
    return dice.one_of(fitted);
}

Column some_flow(const PumpDrawing& pump, Dice& dice) {
    if (!meters(pump).delivery) return Column::case_drain_flow;
    return meters(pump).drain && dice.happens(0.6) ? Column::case_drain_flow : Column::delivery_flow;
}

// What a drifting instrument comes to be off by.
Trouble drift_of(Column column, Dice& dice) {
    switch (column) {
        case Column::outlet_pressure:
            return {.kind = TroubleKind::reads_more_by_share, .size = dice.sign() * dice.between(0.05, 0.12)};
        case Column::fluid_temperature:
            return {.kind = TroubleKind::reads_more_by, .size = dice.sign() * dice.between(3.0, 8.0)};
        case Column::shaft_speed:
            return {.kind = TroubleKind::reads_more_by_share, .size = dice.sign() * dice.between(0.006, 0.02)};
        case Column::delivery_flow:
            return {.kind = TroubleKind::reads_more_by_share, .size = dice.sign() * dice.between(0.01, 0.03)};
        default:
            return {.kind = TroubleKind::reads_more_by_share, .size = dice.sign() * dice.between(0.1, 0.25)};
    }
}

// What a transmitter with a broken wire or a short shows, and what a logger makes of it.
double nonsense_of(Column column, Dice& dice) {
    switch (column) {
        case Column::outlet_pressure:
            return dice.one_of({-100.0, 500.0, 3276.7});
        case Column::fluid_temperature:
            return dice.one_of({-70.0, 150.0, 850.0});
        case Column::shaft_speed:
            return dice.one_of({9999.0, 65535.0});
        default:
            return dice.one_of({999.9, 3276.7});
    }
}

// The factor between the unit meant and the unit sent.
std::vector<Trouble> wrong_unit_of(Column column, Dice& dice) {
    const auto times = [](double factor) {
        return Trouble{.kind = TroubleKind::reads_more_by_share, .size = factor - 1.0};
    };
    switch (column) {
        case Column::outlet_pressure:
            return {times(dice.one_of({14.504, 0.1, 100.0}))};
        case Column::fluid_temperature:
            return {times(1.8), {.kind = TroubleKind::reads_more_by, .size = 32.0}};
        case Column::shaft_speed:
            return {times(1.0 / 60.0)};
        default:
            return {times(dice.one_of({1.0 / 3.785, 1.0 / 60.0, 1000.0, 60.0, 3.785}))};
    }
}

// Threads: one at a time, for one call of confound().
struct Place {
    PlantDrawing& plant;
    PumpDrawing& pump;
    Millis from;
    Dice& dice;

    Trouble spell(TroubleKind kind, double size, double lasts_days, double ramp_days) const {
        return {.kind = kind,
                .from = from,
                .to = std::min(plant.year_ends + day_ms, from + days(lasts_days)),
                .ramp = days(ramp_days),
                .size = size};
    }
    void at_pump(TroubleKind kind, double size, double lasts_days, double ramp_days) const {
        pump.troubles.push_back(spell(kind, size, lasts_days, ramp_days));
    }
    void at_tank(TroubleKind kind, double size, double lasts_days, double ramp_days) const {
        plant.reservoirs.front().troubles.push_back(spell(kind, size, lasts_days, ramp_days));
    }
    void at_instrument(Column column, const Trouble& what, double lasts_days, double ramp_days) const {
        Trouble trouble = spell(what.kind, what.size, lasts_days, ramp_days);
        trouble.column = column;
        pump.troubles.push_back(trouble);
    }
};

constexpr double to_the_end = 10000.0;  // days

void change_oil(const Place& at) {
    plantsim::Oil other = at.plant.reservoirs.front().oil;
    const bool multigrade = other.at_100_cst > 0.163 * other.at_40_cst;
    other = oil_of(grade_of(other), multigrade ? 100 : 150, at.dice);
    at.plant.reservoirs.front().oil_changes.push_back({at.from, other});
}

void age_oil(const Place& at) {
    at.plant.reservoirs.front().oil.thinning_per_year = at.dice.between(0.14, 0.24);
}

void confuse_clock(const Place& at) {
    const double minutes = at.dice.sign() * std::round(at.dice.between(5.0, 60.0));
    at.at_instrument(some_flow(at.pump, at.dice), {.kind = TroubleKind::clock_off, .size = minutes},
                     at.dice.between(40.0, 150.0), 0.0);
}

void shift_zero(const Place& at) {
    const Column flow = some_flow(at.pump, at.dice);
    const double lpm = flow == Column::delivery_flow
                           ? theoretical_lpm(at.pump) * at.dice.between(0.003, 0.01)
                           : healthy_drain_lpm(at.plant, at.pump) * at.dice.between(0.08, 0.3);
    at.at_instrument(flow, {.kind = TroubleKind::reads_more_by, .size = at.dice.sign() * lpm}, to_the_end,
                     at.dice.between(20.0, 120.0));
}

void spoil_instrument(const Place& at, Confounder confounder) {
    const Column column = some_column(at.pump, at.dice);
    const double lasts = at.dice.between(8.0, 60.0);
    if (confounder == Confounder::stuck_sensor)
        return at.at_instrument(column, {.kind = TroubleKind::stuck}, lasts, 0.0);
    if (confounder == Confounder::silent_sensor)
        return at.at_instrument(column, {.kind = TroubleKind::silent}, lasts, 0.0);
    if (confounder == Confounder::drifting_sensor)
        return at.at_instrument(column, drift_of(column, at.dice), to_the_end, at.dice.between(50.0, 150.0));
    if (confounder == Confounder::out_of_range)
        return at.at_instrument(column, {.kind = TroubleKind::reads_nothing_but, .size = nonsense_of(column, at.dice)},
                                lasts, 0.0);
    for (const Trouble& step : wrong_unit_of(column, at.dice)) at.at_instrument(column, step, lasts, 0.0);
}

}  // namespace

Wanted wanted_for(Confounder confounder, Dice& dice) {
    switch (confounder) {
        case Confounder::compensator:
            return {.drain = true, .delivery = false, .compensated = true};
        case Confounder::pilot_flow:
            return {.drain = true, .delivery = false, .compensated = true};
        case Confounder::blocked_drain:
            return {.drain = true};
        case Confounder::vanes:
            return {.kind = PumpKind::vane, .delivery = true, .compensated = false};
        case Confounder::bypass:
            return {.drain = true, .delivery = true, .compensated = false};
        case Confounder::starved_inlet:
        case Confounder::air_in_oil:
            return {.drain = dice.happens(0.4), .delivery = true, .compensated = false};
        default:
            return {};
    }
}

bool can_be_felt(Confounder confounder, const PumpDrawing& pump) {
    switch (confounder) {
        case Confounder::compensator:
        case Confounder::pilot_flow:
            return pump.compensator.has_value();
        case Confounder::blocked_drain:
            return meters(pump).drain;
        case Confounder::bypass:
            return meters(pump).drain && meters(pump).delivery;
        case Confounder::starved_inlet:
        case Confounder::air_in_oil:
            return meters(pump).delivery;
        default:
            return true;
    }
}

bool is_of_tank(Confounder confounder) {
    return confounder == Confounder::hot_oil || confounder == Confounder::other_oil ||
           confounder == Confounder::ageing_oil || confounder == Confounder::air_in_oil;
}

void confound(PlantDrawing& plant, std::size_t pump, Confounder confounder, Millis from, Dice& dice) {
    const Place at{plant, plant.pumps[pump], from, dice};
    const double setting = at.pump.compensator ? at.pump.compensator->setting_bar : 0.0;
    switch (confounder) {
        case Confounder::hot_oil:
            return at.at_tank(TroubleKind::cooler_fouled, dice.between(0.5, 0.85), dice.between(60.0, 200.0),
                              dice.between(5.0, 40.0));
        case Confounder::other_oil:
            return change_oil(at);
        case Confounder::ageing_oil:
            return age_oil(at);
        case Confounder::shifted_work:
            return at.at_pump(TroubleKind::heavier_work,
                              dice.happens(0.5) ? dice.between(0.12, 0.2) : dice.between(-0.35, -0.15),
                              dice.between(60.0, 160.0), dice.between(0.0, 10.0));
        case Confounder::compensator:
            return at.at_pump(TroubleKind::compensator_moved, dice.sign() * setting * dice.between(0.03, 0.08),
                              to_the_end, dice.happens(0.5) ? 0.0 : dice.between(10.0, 60.0));
        case Confounder::starved_inlet:
            return at.at_pump(TroubleKind::inlet_starved, dice.between(0.15, 0.45), dice.between(10.0, 80.0),
                              dice.between(1.0, 20.0));
        case Confounder::blocked_drain:
            return at.at_pump(TroubleKind::drain_blocked, dice.between(0.15, 0.6), dice.between(20.0, 120.0),
                              dice.between(1.0, 30.0));
        case Confounder::air_in_oil:
            return at.at_tank(TroubleKind::air_in_oil, dice.between(0.015, 0.06), dice.between(15.0, 90.0),
                              dice.between(0.0, 10.0));
        case Confounder::vanes:
            return at.at_pump(TroubleKind::vanes_stick, dice.between(0.03, 0.15), dice.between(30.0, 150.0),
                              dice.between(0.0, 20.0));
        case Confounder::bypass:
            return at.at_pump(TroubleKind::valve_passes, dice.between(0.01, 0.05), to_the_end,
                              dice.happens(0.5) ? 0.0 : dice.between(20.0, 90.0));
        case Confounder::clock_off:
            return confuse_clock(at);
        case Confounder::zero_drift:
            return shift_zero(at);
        case Confounder::pilot_flow:
            return at.at_pump(TroubleKind::pilot_flow, healthy_drain_lpm(plant, at.pump) * dice.between(0.08, 0.3),
                              to_the_end, dice.happens(0.5) ? 0.0 : dice.between(20.0, 90.0));
        case Confounder::silent_sensor:
        case Confounder::stuck_sensor:
        case Confounder::drifting_sensor:
        case Confounder::out_of_range:
        case Confounder::wrong_unit:
            return spoil_instrument(at, confounder);
    }
}

}  // namespace slipledger::judging
