#include "tools/judging/truth.hpp"

#include <cmath>
#include <limits>

#include "tools/plantsim/section.hpp"

namespace slipledger::judging {
namespace {

constexpr double nothing = std::numeric_limits<double>::quiet_NaN();
constexpr double forever_h = 200000.0;  // a pump that lasts so long lasts for ever

}  // namespace

ActLimits act_limits_of(const config::Section& section) {
    return {.ratio = section.limits.leakage_ratio.act.value_or(nothing),
            .points_lost = section.limits.efficiency_points.act.value_or(nothing),
            .drain_share_percent = section.limits.drain_share_percent.act.value_or(nothing)};
}

Truth::Truth(const plantsim::Mill& mill, const SectionStory& story)
    : mill_(mill),
      pump_(story.pump),
      section_(story.section),
      begins_(story.fitted_at.value_or(mill.plant().year_begins)),
      seen_(story.inside ? Seen::everything
                         : plantsim::seen_by(mill.plant().pumps[story.pump].sections[story.section].fitted)),
      drawing_(mill.plant().pumps[story.pump]),
      oil_(mill.plant().reservoirs[drawing_.reservoir].oil) {}

double Truth::ratio(Seen seen, Millis at) const {
    return plantsim::true_ratio(mill_.life(pump_, section_, at), seen, oil_, drawing_.rated,
                                mill_.growth(pump_, section_, at));
}

double Truth::efficiency(Seen seen, bool at_rated, Millis at) const {
    return efficiency_at(seen, at_rated, at, mill_.growth(pump_, section_, at));
}

double Truth::efficiency_at(Seen seen, bool at_rated, Millis at, double growth) const {
    const plantsim::Strain point =
        at_rated ? plantsim::rated_point(drawing_.rated) : plantsim::reference_point(drawing_.rated);
    return plantsim::true_efficiency(mill_.life(pump_, section_, at), seen, oil_, point, drawing_.rated.pressure_bar,
                                     growth);
}

double Truth::points_lost(Seen seen, bool at_rated, Millis at) const {
    return 100.0 * (efficiency_at(seen, at_rated, at, 1.0) - efficiency(seen, at_rated, at));
}

// Wear never heals, so halving the span finds the moment to the minute.
template <typename Passed>
std::optional<Millis> Truth::first(Passed passed) const {
    Millis before = begins_;
    Millis after = mill_.plant().year_ends;
    if (!passed(after)) return std::nullopt;
    if (passed(before)) return before;
    while (after - before > plantsim::minute_ms) {
        const Millis middle = before + (after - before) / 2;
        (passed(middle) ? after : before) = middle;
    }
    return after;
}

std::optional<Millis> Truth::ratio_passes(double value) const {
    return first([&](Millis at) { return ratio(seen_, at) >= value; });
}

std::optional<Millis> Truth::points_pass(double value) const {
    return first([&](Millis at) { return points_lost(seen_, true, at) >= value; });
}

std::optional<Millis> Truth::hours_pass(double wanted_h) const {
    return first([&](Millis at) { return running_h(at) >= wanted_h; });
}

bool Truth::is_over(Seen seen, bool at_rated, const ActLimits& limits, Millis at, double growth) const {
    const plantsim::Life& life = mill_.life(pump_, section_, at);
    if (plantsim::true_ratio(life, seen, oil_, drawing_.rated, growth) >= limits.ratio) return true;
    const double healthy = efficiency_at(seen, at_rated, at, 1.0);
    if (100.0 * (healthy - efficiency_at(seen, at_rated, at, growth)) >= limits.points_lost) return true;
    const double share = 100.0 * (1.0 - efficiency_at(Seen::drain, false, at, growth));
    return seen == Seen::drain && share >= limits.drain_share_percent;
}

double Truth::life_h(Seen seen, bool at_rated, const ActLimits& limits, Millis at) const {
    const auto over = [&](double hours) {
        return is_over(seen, at_rated, limits, at, mill_.growth(pump_, section_, at, hours));
    };
    if (over(0.0)) return 0.0;
    if (!over(forever_h)) return std::numeric_limits<double>::infinity();
    double low = 0.0;
    double high = forever_h;
    while (high - low > 0.5) (over(0.5 * (low + high)) ? high : low) = 0.5 * (low + high);
    return high;
}

double Truth::healthy_slip(Seen seen) const {
    const plantsim::Life& life = mill_.life(pump_, section_, begins_);
    const plantsim::Strain point = plantsim::reference_point(drawing_.rated);
    const plantsim::Leakage lost = plantsim::leakage(life, oil_, point, drawing_.rated.pressure_bar);
    const double theoretical = life.displacement_cm3 * life.true_share * point.speed_rpm / 1000.0;
    return (lost.to_drain_lpm + (seen == Seen::drain ? 0.0 : lost.inside_lpm)) / theoretical;
}

}  // namespace slipledger::judging
