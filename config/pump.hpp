// A pump of the plant file with everything resolved: defaults filled in, fluid looked up, and always at least one
// section, so that whoever judges a section reads `section` alone and never asks whether the plant file wrote it at the
// pump.
#pragma once

#include <chrono>
#include <map>
#include <optional>
#include <string>
#include <string_view>
#include <vector>

#include "analytics/instant.hpp"
#include "analytics/pump_type.hpp"
#include "analytics/quantity.hpp"
#include "config/fluid.hpp"
#include "config/limits.hpp"

namespace slipledger::config {

// Where figures are quoted: the maker's rated point, or the reference point of the leakage ratio.
// Threads: a value, share freely.
struct Duty {
    double pressure_bar = 0.0;
    double speed_rpm = 0.0;
    double fluid_temperature_c = 0.0;

    bool operator==(const Duty&) const = default;
};

// How the shaft turns where no speed is measured. Threads: a value, share freely.
struct Motor {
    double nominal_rpm = 1500.0;   // synchronous speed
    double slip_at_rated = 0.015;  // fraction of nominal speed lost at the section's rated pressure; 0 = constant speed

    bool operator==(const Motor&) const = default;
};

// Hours of a life by what they are used for. Threads: a value, share freely.
struct Baseline {
    double run_in_h = 50.0;       // running hours shown but not fed to the filter
    double min_h = 100.0;         // judged running hours until the section is judged at all
    std::optional<double> max_h;  // judged running hours after which the healthy coefficients are frozen

    bool operator==(const Baseline&) const = default;
};

// One line of the maker's test record. Threads: a value, share freely.
struct MakerTestPoint {
    double pressure_bar = 0.0;
    double speed_rpm = 0.0;
    double viscosity_cst = 0.0;
    std::optional<double> case_drain_lpm;
    std::optional<double> delivery_lpm;

    bool operator==(const MakerTestPoint&) const = default;
};

enum class MeasuredAt { pressure_side, return_side };

// What is known about one instrument; all in the quantity's canonical unit. Threads: a value, share freely.
struct Sensor {
    std::optional<double> range_low;
    std::optional<double> range_high;
    std::optional<double> accuracy;          // +- one standard deviation of a fixed error (zero)
    std::optional<double> accuracy_percent;  // +- one standard deviation of a gain error, percent of the reading
    std::optional<double> least;             // a flow meter's least flow: below it a reading is "less than", not zero
    MeasuredAt measured_at = MeasuredAt::pressure_side;  // of `delivery_flow`: where the meter sits
    std::optional<std::chrono::seconds> hold;  // how long a reading stands; not given: 1.5 times its usual interval

    bool operator==(const Sensor&) const = default;
};

using Sensors = std::map<analytics::Quantity, Sensor>;

// How fast things may move before an operating point is `transient`. Threads: a value, share freely.
struct Steady {
    double pressure_bar_per_s = 5.0;
    double speed_rpm_per_s = 20.0;
    double temperature_c_per_min = 2.0;

    bool operator==(const Steady&) const = default;
};

// Threads: a value, share freely.
struct Spare {
    std::string part_number;
    int in_stock = 0;
    double lead_days = 0.0;

    bool operator==(const Spare&) const = default;
};

// What a new cartridge, rotating group or gear set costs, fitted; in the plant's currency. Threads: a value, share
// freely.
struct Replacement {
    double part_cost = 0.0;
    double work_cost = 0.0;
    double downtime_h = 0.0;  // hours the machine stands still for it

    bool operator==(const Replacement&) const = default;
};

// One pumping element with its own outlet, complete: what the plant file left out is the pump's.
// Threads: a value, share freely.
struct Section {
    std::string id = "A";
    std::string model;
    double displacement_cm3 = 0.0;
    double displacement_accuracy_percent = 1.2;  // +- one standard deviation of the name plate
    Duty rated;
    Duty reference;  // default: 75 % of rated pressure, rated speed, rated fluid temperature
    std::optional<double> compensator_bar;
    double plateau_percent = 3.0;  // half width of the band around the compensator's plateau
    std::optional<double> relief_bar;
    double max_stroke_fraction = 1.0;  // volume stop
    bool full_stroke = false;          // the plant file vouches that it always runs at its largest stroke
    std::string drain_group;           // empty: its drain flow is its own, or the pump's
    double case_flushing_lpm = 0.0;
    std::vector<MakerTestPoint> maker_test;
    Baseline baseline;
    Sensors sensors;
    Limits limits;
    std::optional<Spare> spare;
    std::optional<Replacement> replacement;

    bool operator==(const Section&) const = default;
};

enum class Drain { external, internal };
enum class Criticality { low, medium, high };
// How the machine gets the flow that leaks away: by a longer stroke, by running longer, or not at all (it is slower).
enum class MakesUpBy { stroke, time, nothing };

// One housing on one shaft. Threads: a value, share freely.
struct Pump {
    std::string id;
    std::string name;
    std::string machine;
    std::string area;
    Criticality criticality = Criticality::medium;
    std::string model;
    std::string reservoir;  // id of a reservoir of the plant
    Fluid fluid;            // what is in that reservoir
    analytics::PumpType type = analytics::PumpType::axial_piston;
    analytics::Control control = analytics::Control::fixed;
    double minimum_speed_rpm = 0.0;  // default by type: vane 600, else 0
    Motor motor;
    std::chrono::seconds settling{10};  // how long after a transient or a change of regime nothing is judged
    Steady steady;
    Drain drain = Drain::external;
    MakesUpBy makes_up_by = MakesUpBy::nothing;  // default by control: fixed nothing, else stroke
    std::optional<Spare> spare;
    std::optional<analytics::Instant> since;  // since when the facts written here hold; not given: the newest reading
    std::vector<Section> sections;            // never empty

    bool operator==(const Pump&) const = default;

    // The section of that id, or null.
    const Section* find_section(std::string_view section_id) const;
};

// The dated facts of a pump as canonical JSON (sorted keys, no spaces): oil, displacement, compensator setting, volume
// stop, sensors. Two plant files tell the same story about a pump exactly when these texts are equal, so a change can
// be noticed and stored as an event.
std::string pump_facts(const Pump& pump);

// What of an oil is in these facts, alone, in the same form: how an event carries the oil that was filled in.
std::string fluid_facts(const Fluid& fluid);

}  // namespace slipledger::config
