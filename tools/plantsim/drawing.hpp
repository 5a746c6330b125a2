// A plant as its drawings have it: what the simulator is told, and nothing it works out. veneer_mill.cpp fills these
// in; mill.hpp brings them to life. All plain values. Threads: share freely once filled.
#pragma once

#include <array>
#include <optional>
#include <string>
#include <vector>

#include "tools/plantsim/clock_time.hpp"
#include "tools/plantsim/gap.hpp"
#include "tools/plantsim/oil.hpp"
#include "tools/plantsim/trouble.hpp"

namespace slipledger::plantsim {

struct Duty {
    double pressure_bar = 0.0;
    double speed_rpm = 0.0;
    double fluid_temperature_c = 0.0;
};

// Whose leakage a meter sees: what runs out of the case, or what is missing at the outlet.
enum class Seen { drain, everything };

// How wear goes on, s being the share of its running hours that is over (wear.hpp has the formulas).
enum class WearLaw {
    gap_power,    // the fastest gap grows as s^bend, so that the leak, which goes with the cube, speeds up by itself
    ratio_power,  // the leakage ratio grows as s^bend
    ratio_rate,   // the ratio grows the faster the higher it is: dw/ds goes with w^bend
    ratio_exponential,  // the ratio grows as exp(bend s): above 0 ever faster, below ever slower
};

// How a section's gaps open over a life. Before `begins` (a share of the pump's running hours in the simulated span)
// nothing happens; from then on they follow the law, also beyond the span. A step is a piece broken out at one moment.
struct Wear {
    double end_ratio = 1.0;  // of leakage at the span's end, without the step; 1: never wears
    double begins = 0.2;
    double bend = 1.1;
    std::optional<Millis> step_at{};
    double step_ratio = 1.0;
    WearLaw law = WearLaw::gap_power;
    double first_ratio = 1.0;  // where it stands when the life is first seen
    bool inside =
        false;  // its ratios are of all leakage, though the drain is metered: it wears where that sees nothing
};

// A cartridge, rotating group or gear set in service from `from` on.
struct Life {
    Millis from = 0;
    double displacement_cm3 = 0.0;  // on the name plate
    double true_share = 1.0;        // true displacement / name plate
    double dead_share = 0.3;        // volume that goes round full of oil under pressure / displacement
    std::vector<Gap> gaps{};
    Wear wear{};
    double run_in_share = 0.0;  // by which the fastest gap is wider at first, until its surfaces have bedded in
};

// The meters of a section and of its pump: what one row can carry.
struct Fitted {
    bool drain = false;
    bool delivery = false;
    bool delivery_on_return = false;  // the meter sits in the return line, where the oil has expanded again
};

struct SectionDrawing {
    std::string id{};
    Fitted fitted{};
    std::vector<double> product_bar{};  // pressures its products ask for
    std::vector<Life> lives{};
};

// What a pressure compensator does beside holding pressure.
struct Compensator {
    double setting_bar = 0.0;
    double droop_bar = 0.0;       // pressure lost from no flow to full flow
    double pilot_lpm = 0.0;       // through the control to the drain while it holds pressure
    double idle_pilot_lpm = 0.0;  // the same while the pump runs at full stroke
    double hold_share = 0.6;      // of production lots in which it holds pressure
};

enum class Shifts { three, two };  // Monday 06:00 to Saturday 06:00 through; Monday to Friday 06:00 to 22:00

struct PumpDrawing {
    std::string id{};
    std::size_t reservoir = 0;
    Duty rated{};
    double synchronous_rpm = 1500.0;
    double slip_at_rated = 0.012;
    std::optional<Compensator> compensator{};  // without: fixed displacement
    Shifts shifts = Shifts::three;
    Millis thermometer_lag = 0;  // the thermometer shows the oil of so long ago
    double idle_bar = 15.0;
    bool gauge_behind_check_valve = false;  // shows pressure while the pump stands
    bool has_speed = true;
    bool has_temperature = true;
    bool has_running = false;
    bool one_drain_meter = false;  // for all sections together
    bool has_inlet_pressure = false;
    bool has_case_pressure = false;
    std::optional<Millis> starts{};  // commissioned then; not given: before the year
    std::optional<Millis> falls_silent{};
    std::optional<std::array<Millis, 2>> overhaul{};  // stands from, to
    std::vector<SectionDrawing> sections{};
    Troubles troubles{};
};

// What a tank was filled with, from when on.
struct OilFill {
    Millis from = 0;
    Oil oil{};
};

struct ReservoirDrawing {
    std::string id{};
    Oil oil{};  // at first
    std::vector<OilFill> oil_changes{};
    double heat_capacity_kj_per_k = 1200.0;  // oil and steel
    double wall_w_per_k = 120.0;             // to the hall's air
    double cooler_w_per_k = 900.0;           // to the cooling water, thermostat open
    bool air_cooled = false;                 // by the air outside, so that a hot summer makes hot oil
    double cooler_opens_c = 43.0;
    double machine_losses = 0.25;  // share of hydraulic power that stays in the oil
    Troubles troubles{};
};

struct PlantDrawing {
    std::string time_zone{};
    Millis year_begins = 0;  // what is simulated; need not be a year
    Millis year_ends = 0;
    double season_at_begin = 0.0;                // share of the calendar year that is over then
    std::vector<std::array<Millis, 2>> stops{};  // of the whole mill: holidays and maintenance
    std::vector<ReservoirDrawing> reservoirs{};
    std::vector<PumpDrawing> pumps{};
};

}  // namespace slipledger::plantsim
