#include "analytics/swing_pattern.hpp"

#include <algorithm>
#include <cmath>

namespace slipledger::analytics {

namespace {
constexpr double settled_in_h = 10.0;
constexpr double learned_in_h = 50.0;
constexpr double lately_h = 36.0;
constexpr double fresh_h = 2.0;
constexpr double usually_follows = 0.5;  // slope and correlation when learned: less is no pattern
constexpr Pace by_shifts{.learn = learned_in_h, .memory = 12.0};
}  // namespace

SwingPattern::SwingPattern() : ln_scatter_(by_shifts) {}

void SwingPattern::add(const Moments& m, const LeakageCoefficients& coefficients, double hours) {
    if (settling_h_ < settled_in_h) {
        coefficients_ = coefficients;
        settling_h_ += hours;
        return;
    }
    const auto& c = m.covariance;
    const auto [a, b, s] = coefficients_;
    const Sums seen{
        .predicted = a * a * c[2] + b * b * c[5] + s * s * c[9] + 2.0 * (a * b * c[4] + a * s * c[7] + b * s * c[8]),
        .along = a * c[1] + b * c[3] + s * c[6],
        .seen = c[0],
        .points = static_cast<double>(m.count) / std::max(hours, 1e-9)};
    if (m.count < 3 || !(seen.predicted > 0.0) || !std::isfinite(seen.along)) return;
    if (seen.rest() > 0.0) ln_scatter_.add(0.5 * std::log(seen.rest()) - std::log(m.theoretical_lpm), hours);
    lately_.add(seen, std::exp(-hours / lately_h), hours);
    fresh_.add(seen, std::exp(-hours / fresh_h), hours);
    if (learned_h_ >= learned_in_h) return;
    learned_.add(seen, 1.0, hours);
    learned_h_ += hours;
}

void SwingPattern::Sums::add(const Sums& other, double keep, double hours) {
    predicted = keep * predicted + hours * other.predicted;
    along = keep * along + hours * other.along;
    seen = keep * seen + hours * other.seen;
    points = keep * points + hours * other.points;
}

double SwingPattern::Sums::correlation() const {
    return along / std::sqrt(predicted * seen);
}

std::optional<Slope> SwingPattern::slope(bool fresh) const {
    const bool follows =
        learned_h_ >= learned_in_h && learned_.slope() > usually_follows && learned_.correlation() > usually_follows;
    const Sums& now = fresh ? fresh_ : lately_;
    if (!follows || !(now.predicted > 0.0)) return std::nullopt;
    const double error = std::sqrt(std::max(now.rest(), 0.0) / now.predicted / now.points) / learned_.slope();
    return slope_of(now.slope() / learned_.slope(), error);
}

double SwingPattern::scatter_grown() const {
    return std::exp(ln_scatter_.moved());
}

}  // namespace slipledger::analytics
