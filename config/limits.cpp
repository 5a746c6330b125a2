#include "config/limits.hpp"

namespace slipledger::config {
namespace {

using namespace std::chrono_literals;
using analytics::PumpType;

// A drain line carries the whole leakage of a piston pump and, in a vane pump, all but what crosses the vanes; vane and
// gear pumps leak a larger share of their flow when healthy, so raw shares start higher.
Ladder drain_share(PumpType type) {
    const double healthy_allowance = type == PumpType::axial_piston || type == PumpType::radial_piston ? 0.0 : 3.0;
    return {.watch = 8.0 + healthy_allowance,
            .plan = 12.0 + healthy_allowance,
            .act = 16.0 + healthy_allowance,
            .on_delay = 10min,
            .off_delay = 30min,
            .deadband = 1.0};
}

// Where common seals and additives begin to age quickly.
Ladder over_temperature() {
    return {.watch = 70.0, .plan = std::nullopt, .act = 80.0, .on_delay = 60s, .off_delay = 5min, .deadband = 2.0};
}

// Lip seals are commonly rated about 1 bar continuous on piston pumps with soft seals, more on others.
Ladder case_pressure() {
    return {.watch = 1.5, .plan = std::nullopt, .act = 3.0, .on_delay = 30s, .off_delay = 5min, .deadband = 0.2};
}

Ladder inlet_vacuum() {
    return {.watch = 0.2, .plan = std::nullopt, .act = 0.3, .on_delay = 30s, .off_delay = 5min, .deadband = 0.03};
}

}  // namespace

Limits default_limits(PumpType type) {
    Limits limits;
    limits.leakage_ratio = {
        .watch = 1.17, .plan = 2.0, .act = 3.0, .on_delay = 24h, .off_delay = 48h, .deadband = 0.03};
    limits.efficiency_points = {
        .watch = 4.0, .plan = 7.0, .act = 10.0, .on_delay = 24h, .off_delay = 48h, .deadband = 0.5};
    limits.drain_share_percent = drain_share(type);
    limits.over_temperature_c = over_temperature();
    limits.case_pressure_bar = case_pressure();
    limits.inlet_vacuum_bar = inlet_vacuum();
    return limits;
}

}  // namespace slipledger::config
