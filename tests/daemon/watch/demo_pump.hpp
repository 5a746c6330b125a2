// Readings of an invented pump that wears, made from a leakage formula, and the plant it stands in: what the end-to-end tests of
// the watch feed through a real ledger.
#pragma once

#include <cmath>
#include <random>
#include <string>
#include <vector>

#include "analytics/fluid.hpp"
#include "config/plant.hpp"
#include "daemon/ledger/records.hpp"

namespace slipledger::watch {

inline constexpr analytics::Instant demo_begin{std::chrono::sys_days(std::chrono::January / 5 / 2026)};

inline config::Pump demo_pump(const std::string& id) {
    config::Pump pump;
    pump.id = id;
    pump.name = "Pump " + id;
    pump.machine = "press";
    pump.reservoir = "tank";
    pump.fluid.name = "HLP 46";
    pump.fluid.iso_vg = 46.0;
    pump.fluid.viscosity_index = 100.0;
    config::Section section;
    section.displacement_cm3 = 71.0;
    section.rated = {280.0, 1480.0, 50.0};
    section.reference = {210.0, 1480.0, 50.0};
    section.baseline = {24.0, 48.0, std::nullopt};
    section.limits = config::default_limits(pump.type);
    pump.sections = {section};
    return pump;
}

inline config::Plant demo_plant(const std::string& folder, const std::vector<std::string>& pumps) {
    config::Plant plant;
    plant.name = "Veneer mill";
    plant.time_zone = "Europe/Berlin";
    plant.store.path = folder + "/ledger.db";
    plant.alerts.log = folder + "/alerts.ndjson";
    config::Reservoir tank;
    tank.id = "tank";
    plant.reservoirs = {tank};
    config::Feed feed;
    feed.id = "plc";
    plant.feeds = {feed};
    for (const std::string& id : pumps) plant.pumps.push_back(demo_pump(id));
    return plant;
}

// How the demo pump's true ratio grows after the day it begins to wear.
struct Wear {
    double begins_on_day = 8.0;
    double per_day = 0.12;
};

// A row each five minutes for `days`: pressure and temperature wander, drain flow = ratio x (laminar + orifice leakage).
inline std::vector<ledger::Row> demo_rows(ledger::PointId point, int days, const Wear& wear, unsigned seed) {
    using analytics::Quantity;
    const analytics::Fluid oil;
    std::mt19937 random(seed);
    std::normal_distribution<double> noise(0.0, 1.0);
    std::vector<ledger::Row> rows;
    for (int i = 0; i < days * 288; ++i) {
        const double day = i / 288.0;
        const double pressure = 180.0 + 60.0 * std::sin(i * 0.37);
        const double temperature = 48.0 + 6.0 * std::sin(2.0 * M_PI * day) + 0.2 * noise(random);
        const double ratio = 1.0 + std::max(0.0, day - wear.begins_on_day) * wear.per_day;
        const double healthy = 2.0 * pressure / 210.0 * 0.0274 / oil.dynamic_pas(temperature) + 0.3 * std::sqrt(pressure / 210.0);
        ledger::Row row;
        row.time = demo_begin + std::chrono::minutes(5) * i;
        row.point = point;
        row.feed = ledger::FeedId{1};
        const auto put = [&](Quantity quantity, double value) {
            row.present = static_cast<std::uint16_t>(row.present | 1U << index_of(quantity));
            row.value[index_of(quantity)] = std::round(value * 1000.0) / 1000.0;
        };
        put(Quantity::outlet_pressure, pressure);
        put(Quantity::shaft_speed, 1480.0 + 2.0 * noise(random));
        put(Quantity::case_drain_flow, ratio * healthy * (1.0 + 0.02 * noise(random)));
        put(Quantity::fluid_temperature, temperature);
        rows.push_back(row);
    }
    return rows;
}

}  // namespace slipledger::watch
