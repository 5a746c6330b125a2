// The hour summary: the only thing that trends, verdicts and reports ever read. It keeps, of the operating points of
// one section, basis and hour (or other summary length), counts by what was made of them and, for each judged regime,
// means and second moments of leakage and of the model's features. The model is linear in the features, so their means
// are exact where the leakage of a mean operating point is not.
#pragma once

#include <array>
#include <cstdint>
#include <string_view>
#include <vector>

#include "analytics/instant.hpp"
#include "analytics/operating_point.hpp"
#include "analytics/regime.hpp"
#include "analytics/section_spec.hpp"
#include "analytics/usual.hpp"

namespace slipledger::analytics {

inline constexpr std::size_t judged_regimes = 2;  // full_flow, compensating: the first two standings

// Moments over the points of one judged regime that were left after trimming. Order of leakage and features in
// `covariance`: leakage, f1, f2, f3; packed lower triangle by rows (yy, 1y, 11, 2y, 21, 22, 3y, 31, 32, 33). Population
// moments.
struct Moments {
    std::uint32_t count = 0;          // points in the means; 0: regime not seen, all else meaningless
    double leakage_lpm = 0.0;         // mean; drain less flushing, or name-plate theoretical flow less delivery
    std::array<double, 3> feature{};  // means of dp/mu, sqrt(dp/rho), n, each over its value at the reference point
    std::array<double, 10> covariance{};
    double standard_error_lpm =
        0.0;  // of mean leakage about a line on f1, successive points taken as correlated; 0 under 3 points
    double dp_bar = 0.0;
    double temperature_c = 0.0;
    double dp_variance = 0.0;
    double dp_temperature_covariance = 0.0;
    double temperature_variance = 0.0;
    double viscosity_cst = 0.0;
    double speed_rpm = 0.0;
    double delivery_lpm = 0.0;     // mean, at inlet density; 0 on the drain basis
    double theoretical_lpm = 0.0;  // mean by the name plate; at full stroke while compensating
};

// Lowest and highest of a reading. NaN: there was none.
struct Extent {
    double low = unknown;
    double high = unknown;
};

struct Summary {
    Instant start;
    Milliseconds length{0};  // may be cut short where a life or a dated fact begins or ends
    Basis basis = Basis::case_drain;
    std::int32_t life = 1;
    std::array<std::uint32_t, standing_count> counts{};
    double running_h = 0.0;
    double judged_h = 0.0;
    std::uint32_t stop_count = 0;    // readings of a settled stop: the meter's zero
    double stop_flow_lpm = unknown;  // their median
    double drain_share = unknown;    // raw drain over theoretical flow, mean while running
    double highest_temperature_c = unknown;
    double highest_case_bar = unknown;
    double lowest_inlet_bar = unknown;
    double mean_pressure_bar = unknown;  // while running, whatever the standing: for excess and kW
    // What the instruments showed while the pump ran, whatever the standing, wild or not: a sensor that stands still or
    // speaks in another unit shows here even where nothing can be judged.
    double mean_flow_lpm = unknown;
    double mean_speed_rpm = unknown;
    double mean_temperature_c = unknown;
    Extent flow_lpm;
    Extent pressure_bar;
    Extent speed_rpm;
    Extent temperature_c;
    std::array<Moments, judged_regimes> judged;
};

// Readings needed before the first summary so that every summary depends only on a bounded past (hold, settling, stop).
inline constexpr Milliseconds summary_lead_in = std::chrono::hours(2);

// Summaries of [from, to), cut at multiples of `length` since the epoch (UTC); stretches without an operating point
// give none. `readings` reach from `from - summary_lead_in` to `to` at least and may hold more.
std::vector<Summary> summarise(const SectionReadings& readings, const SectionSpec& spec, const Usual& usual,
                               Basis basis, std::int32_t life, Instant from, Instant to, Milliseconds length);

}  // namespace slipledger::analytics
