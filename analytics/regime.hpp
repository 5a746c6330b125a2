// What a pump was doing at each operating point, whether that can be judged, and what of its leakage was seen there.
// Everything a point's standing depends on lies in the two hours before it, so that the summaries of a span can be made
// again from a known span of readings and come out the same to the bit.
#pragma once

#include <array>
#include <cstdint>
#include <string_view>
#include <vector>

#include "analytics/leakage.hpp"
#include "analytics/motion.hpp"
#include "analytics/operating_point.hpp"
#include "analytics/section_spec.hpp"

namespace slipledger::analytics {

// What became of an operating point: judged in one of the two judged regimes, or set aside for a reason.
enum class Standing : std::uint8_t {
    full_flow,
    compensating,
    stopped,
    below_minimum_speed,
    cold,
    thin,
    transient,
    part_stroke,
    relieving,
    motoring,
    variable_speed,
    no_pressure,
    no_speed,
    no_temperature,
    below_least_flow,
    impossible,  // readings contradict each other: an instrument first
};

inline constexpr std::size_t standing_count = 16;
inline constexpr std::array<std::string_view, standing_count> standing_names{
    "full-flow",        "compensating", "stopped",  "below-minimum-speed", "cold",        "thin",     "transient",
    "part-stroke",      "relieving",    "motoring", "variable-speed",      "no-pressure", "no-speed", "no-temperature",
    "below-least-flow", "impossible"};

constexpr std::string_view name_of(Standing standing) {
    return standing_names[static_cast<std::size_t>(standing)];
}
// Not computed: a property of the name.
constexpr bool is_judged(Standing standing) {
    return standing <= Standing::compensating;
}

// An operating point with what was made of it. NaN where the point does not tell. `leakage_lpm` and `features` mean
// something only where the standing is judged.
struct JudgedPoint {
    Instant time;
    Standing standing = Standing::no_pressure;
    double hours = 0.0;             // that the point stands for: since the one before it
    double flow_lpm = unknown;      // as read
    double pressure_bar = unknown;  // of the port the pump delivers into
    double case_bar = unknown;
    double inlet_bar = unknown;
    double pressure_rise_bar = unknown;  // over the case (drain) or the inlet (delivery)
    double speed_rpm = unknown;          // measured, else the motor's
    double temperature_c = unknown;
    double viscosity_cst = unknown;
    double theoretical_lpm = unknown;  // by the name plate; at full stroke while the stroke is unknown
    double delivery_lpm = 0.0;         // at inlet density; 0 on the drain basis
    double leakage_lpm = unknown;      // drain less flushing, or theoretical flow less delivery
    Features features;
    Milliseconds stopped_for{0};  // how long the pump had stood still, `longest_gap` at most; 0 while it runs
};

// Gives the operating points of a section with their standings, one by one. Rules, each with its reason, in regime.cpp
// and method.md, 2. Readings and spec must outlive it.
// Threads: one at a time.
class PointJudge {
public:
    PointJudge(const SectionReadings& readings, const SectionSpec& spec, const Usual& usual, Basis basis, Instant from,
               Instant to);

    // The next point with time in [from, to), ascending; null after the last. Valid until the next call.
    const JudgedPoint* next();

private:
    enum class Phase : std::uint8_t { unsure, stopped, slow, motoring, relieving, compensating, full };

    const JudgedPoint* judge(const OperatingPoint& point);
    void take_ports(const OperatingPoint& point);
    void take_speed(const OperatingPoint& point);
    void take_oil(const OperatingPoint& point);
    void take_leakage(const OperatingPoint& point);
    void take_time(Instant time);
    void take_phase(const OperatingPoint& point);
    bool is_stopped(const OperatingPoint& point) const;
    bool is_motoring(const OperatingPoint& point) const;
    Phase phase_of(const OperatingPoint& point) const;
    Standing standing_of(const OperatingPoint& point);
    Standing standing_when_steady(const OperatingPoint& point) const;
    bool is_settling();
    bool is_impossible() const;

    const SectionSpec& spec_;
    Basis basis_;
    Aligner aligner_;
    Motion pressure_;
    Motion speed_;
    Motion temperature_;
    LeakageState reference_;
    Instant from_;
    Milliseconds flow_hold_;
    Milliseconds settling_;
    double plateau_begins_bar_ = unknown;  // NaN: no plateau
    double rated_power_kw_ = unknown;
    double dynamic_pas_ = unknown;  // of the oil at `oil_at_c_`
    double kinematic_cst_ = unknown;
    double density_kgm3_ = unknown;
    double oil_at_c_ = unknown;
    Instant previous_ = Instant::min();
    Phase phase_ = Phase::unsure;
    Instant phase_began_ = Instant::min();
    bool reversed_ = false;  // flow runs from the outlet to the inlet port: an over-centre pump
    JudgedPoint point_;
};

// All points of [from, to) at once, for showing the working behind a summary.
// Not computed: PointJudge does.
std::vector<JudgedPoint> judge_points(const SectionReadings& readings, const SectionSpec& spec, const Usual& usual,
                                      Basis basis, Instant from, Instant to);

}  // namespace slipledger::analytics
