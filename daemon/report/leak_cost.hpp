// What a section's leakage above healthy costs a year at its usual duty, and the month in which a replacement has paid
// for itself: read off stored days of the newest four weeks, and off their summaries where a fixed pump runs longer for
// it.
#pragma once

#include <optional>
#include <string>

#include "analytics/course.hpp"
#include "config/plant.hpp"
#include "daemon/ledger/reader.hpp"

namespace slipledger::report {

inline constexpr std::int32_t duty_days = 28;          // usual duty is taken from so many days
inline constexpr double longest_payback_years = 20.0;  // beyond it nobody waits for a month

// Threads: a value, share freely.
struct LeakCost {
    config::MakesUpBy makes_up_by = config::MakesUpBy::nothing;
    double running_h_per_year = analytics::unknown;
    bool planned_duty = false;             // else as the newest four weeks went
    double power_kw = analytics::unknown;  // from the mains, lost while it runs
    double kwh_per_year = analytics::unknown;
    analytics::Ranged per_year;  // currency, by the range of the ratio; never below 0
    double flow_lost_percent =
        analytics::unknown;     // less flow than when healthy, where the stroke does not make up for it
    bool flow_at_rated = true;  // quoted at the rated point, else at the reference point
    double per_year_and_ratio = analytics::unknown;  // currency, for each 1 of ratio above 1
    // What power_kw comes from: hydraulic power of healthy leakage where the stroke makes up, shaft power of full
    // flow where running time does; means over the four weeks.
    double mean_kw = analytics::unknown;
    double healthy_efficiency = analytics::unknown;
    std::optional<double> replacement_cost;
    double ratio_growth_per_year = 0.0;         // 0 where no wear trend is established
    double payback_years = analytics::unknown;  // infinity: never; NaN: no replacement cost given
    std::string pays_in;                        // "2027-03"; empty: not within longest_payback_years, or not known
};

// At `day`, the newest or an earlier one of the track. nullopt where the section has no level, and of a pump whose
// stroke makes up where the plant file gives no `economics`; of others it then tells lost flow alone.
std::optional<LeakCost> query_cost(const ledger::Reader& reader, const config::Plant& plant, const config::Pump& pump,
                                   const config::Section& section, const ledger::TrackEntry& track,
                                   const analytics::DayVerdict& day);

}  // namespace slipledger::report
