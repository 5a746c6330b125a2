#include "analytics/prognosis.hpp"

#include <array>
#include <cmath>
#include <limits>
#include <numbers>

namespace slipledger::analytics {

namespace {

constexpr std::array<double, 4> wear_powers{-0.6, 0.0, 0.6, 1.2};
constexpr double hours_per_day = 24.0;
constexpr double shortest_h = 0.1;
constexpr double longest_h = 1.0e6;
constexpr int halvings = 26;  // of ln 10^7: to some 10^-7 of the hours
constexpr double least_spread = 1e-12;

// Gauss-Hermite, five points for a standard normal (probabilists' form): exact for polynomials to degree nine.
constexpr std::array<double, 5> node{-2.8569700138728056, -1.3556261799742659, 0.0, 1.3556261799742659,
                                     2.8569700138728056};
constexpr std::array<double, 5> weight{0.011257411327720689, 0.22207592200561266, 0.53333333333333333,
                                       0.22207592200561266, 0.011257411327720689};

double normal_share(double z) {
    return 0.5 * std::erfc(-z / std::numbers::sqrt2);
}

// Days times drift from ln ratio x to the limit.
double distance_in_days(double ln_left, double power) {
    const double k = 1.0 - power;
    return std::abs(k) < 1e-9 ? ln_left : std::expm1(k * ln_left) / k;
}

// All that does not depend on the hours, worked out once: for each law and x, distance and mean drift given x.
struct Passage {
    std::array<double, wear_powers.size() * node.size()> distance{};
    std::array<double, node.size()> drift{};
    double drift_sd = 0.0;

    explicit Passage(const WearOutlook& o) {
        const double sd = std::sqrt(o.ratio_variance);
        const double slope = o.ratio_variance > 0.0 ? o.covariance / o.ratio_variance : 0.0;
        drift_sd = std::sqrt(std::fmax(o.drift_variance - slope * o.covariance, 0.0)) + least_spread;
        for (std::size_t i = 0; i < node.size(); ++i) {
            drift[i] = o.drift_per_day + slope * sd * node[i];
            for (std::size_t j = 0; j < wear_powers.size(); ++j)
                distance[i * wear_powers.size() + j] =
                    distance_in_days(o.ln_limit - o.ln_ratio - sd * node[i], wear_powers[j]);
        }
    }

    double share(double hours) const {
        double sum = 0.0;
        for (std::size_t i = 0; i < node.size(); ++i) {
            double over_laws = 0.0;
            for (std::size_t j = 0; j < wear_powers.size(); ++j) {
                const double left = distance[i * wear_powers.size() + j];
                const double needed = left * hours_per_day / hours;
                over_laws += left <= 0.0 ? 1.0 : normal_share((drift[i] - needed) / drift_sd);
            }
            sum += weight[i] * over_laws;
        }
        return sum / static_cast<double>(wear_powers.size());
    }
};

double quantile_h(const Passage& passage, double share) {
    if (passage.share(longest_h) < share) return std::numeric_limits<double>::infinity();
    if (passage.share(shortest_h) >= share) return 0.0;
    double low = std::log(shortest_h);
    double high = std::log(longest_h);
    for (int i = 0; i < halvings; ++i) {
        const double middle = 0.5 * (low + high);
        (passage.share(std::exp(middle)) < share ? low : high) = middle;
    }
    return std::exp(0.5 * (low + high));
}

bool known(const WearOutlook& o) {
    return std::isfinite(o.ln_ratio + o.drift_per_day + o.covariance + o.ln_limit) && o.ratio_variance >= 0.0 &&
           o.drift_variance >= 0.0;
}

}  // namespace

double passage_share(const WearOutlook& outlook, double hours) {
    if (!known(outlook) || !(hours > 0.0)) return unknown;
    return Passage(outlook).share(hours);
}

PassageQuantiles passage_quantiles(const WearOutlook& outlook) {
    if (!known(outlook)) return {};
    const Passage passage(outlook);
    return {.low_h = quantile_h(passage, 0.1), .mid_h = quantile_h(passage, 0.5), .high_h = quantile_h(passage, 0.9)};
}

}  // namespace slipledger::analytics
