// What analysis must know of one section: the facts of the plant file that hold from one dated fact to the next, in
// canonical units and already resolved. `watch` builds it; nothing in here asks where a number came from.
// NaN stands for "not known" throughout.
#pragma once

#include <array>
#include <cmath>
#include <cstdint>
#include <limits>
#include <optional>
#include <string_view>

#include "analytics/fluid.hpp"
#include "analytics/instant.hpp"
#include "analytics/life_prior.hpp"
#include "analytics/pump_type.hpp"

namespace slipledger::analytics {

inline constexpr double unknown = std::numeric_limits<double>::quiet_NaN();

// What is seen of the leakage: what runs out of the case, or what is missing at the outlet.
enum class Basis : std::uint8_t { case_drain, delivery };

constexpr std::string_view name_of(Basis basis) {
    return basis == Basis::case_drain ? "case-drain" : "delivery";
}

enum class Level : std::uint8_t { unjudged, sound, watch, plan, act };

constexpr std::string_view name_of(Level level) {
    constexpr std::array<std::string_view, 5> names{"unjudged", "sound", "watch", "plan", "act"};
    return names[static_cast<std::size_t>(level)];
}

struct DutyPoint {
    double pressure_bar = unknown;
    double speed_rpm = unknown;
    double temperature_c = unknown;
};

// Where the three levels of one rule begin, least to most urgent; a level without a limit (NaN) is never raised.
struct Ladder {
    double watch = unknown;
    double plan = unknown;
    double act = unknown;
    Milliseconds on_delay{0};   // data time the value must stay beyond the limit before the level is raised
    Milliseconds off_delay{0};  // data time it must stay inside before the level is cleared
    double deadband = 0.0;      // how far inside the limit it must come, in the rule's own unit
};

struct RuleLimits {
    Ladder leakage_ratio{.watch = 1.17, .plan = 2.0, .act = 3.0};
    Ladder efficiency_points_lost{.watch = 4.0, .plan = 7.0, .act = 10.0};  // common practice, no source
    Ladder drain_share_percent;                                             // raw case drain over theoretical flow
    Ladder over_temperature_c;
    Ladder case_pressure_bar;
    Ladder inlet_vacuum_bar;  // how far below 0 bar gauge, positive
    RunningHours step_lasting{12.0};  // that a sudden change must last before it is told as a step
};

// How fast things may move before a point is `transient`.
struct Steady {
    double pressure_bar_per_s = 5.0;
    double speed_rpm_per_s = 20.0;
    double temperature_c_per_min = 2.0;
};

struct FlowMeter {
    double accuracy_lpm = unknown;  // of zero: one standard deviation
    double gain_error = 0.01;       // fraction of reading, one standard deviation
    double resolution_lpm = 0.0;
    double least_lpm = 0.0;        // below it a reading is "less than", not zero
    bool on_pressure_side = true;  // of a delivery meter: brought to inlet density if so
};

struct BaselineRule {
    RunningHours run_in{50.0};
    RunningHours least{50.0};          // judged running hours until then: unjudged, learning
    std::optional<RunningHours> most;  // after it the coefficients are kept, no longer updated
};

// Leakage measured on this cartridge / rotating group when new, by its maker or by a reference test here.
struct MakerTest {
    double leakage_lpm = unknown;
    DutyPoint at;
    double viscosity_cst = unknown;  // else from the fluid at at.temperature_c
    double accuracy = 0.15;  // one standard deviation, fraction: the maker's bench against the plant's meter, one pump
                             // against the next
    bool made_here = false;  // a reference test, not the maker's
};

// What other parts of the model leak when healthy, at this section's reference point (sisters.hpp).
struct SistersFigure {
    double leakage_lpm = unknown;
    double sd = unknown;  // of its logarithm, for one more part
    int count = 0;
};

// What the healthy leakage of a life rests on, and so what its ratio is compared with. Stored by number: append only.
enum class BaselineKind : std::uint8_t {
    watching_began,  // its own readings, of a part already in service: "since watching began"
    from_new,        // its own readings from new
    maker_test,
    reference_test,
    sisters,
};

constexpr std::string_view name_of(BaselineKind kind) {
    constexpr std::array<std::string_view, 5> names{"own, since watching began", "own, from new", "maker-test",
                                                    "reference-test", "sisters"};
    return names[static_cast<std::size_t>(kind)];
}

struct SectionSpec {
    PumpType type = PumpType::axial_piston;
    Control control = Control::fixed;
    double displacement_cm3 = unknown;     // name plate
    double displacement_accuracy = 0.012;  // one standard deviation, fraction
    DutyPoint rated;
    DutyPoint reference;  // resolved: the plant file's, else 75 % of rated pressure at rated speed, temperature
    double compensator_bar = unknown;
    double plateau_fraction = 0.03;  // half width of the band around the compensator's plateau
    double relief_bar = unknown;
    double max_stroke_fraction = 1.0;  // a volume stop
    bool full_stroke = false;          // proven: it always runs at its largest stroke
    double minimum_speed_rpm = 0.0;
    double motor_nominal_rpm = unknown;  // used where no speed is measured
    double motor_slip_at_rated = 0.0;    // fraction, at rated pressure
    Milliseconds settling{10000};
    Steady steady;
    double case_flushing_lpm = 0.0;
    bool shared_drain = false;  // one drain meter for several sections
    bool has_speed_sensor = true;
    bool has_temperature_sensor = true;
    Fluid fluid;
    FlowMeter drain_meter;
    FlowMeter delivery_meter;
    BaselineRule baseline;
    std::optional<MakerTest> maker_test;
    std::optional<SistersFigure> sisters;
    RuleLimits limits;
    double duty_h_per_week = unknown;  // planned running hours; else the usual duty
    double spare_lead_days = unknown;  // 0: one is in stock
    std::optional<Instant> second_next_planned_stop;
    LifePrior life_prior;           // by past lives of the model, as they stood at the end of the day before
    bool watched_from_new = false;  // the life began with a replacement told to the ledger, or `since` says new
};

}  // namespace slipledger::analytics
