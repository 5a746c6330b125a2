#include "analytics/prognosis.hpp"

#include <algorithm>
#include <cmath>
#include <limits>
#include <vector>

#include "analytics/stats/normal_mixture.hpp"

namespace slipledger::analytics {

namespace {

using stats::NormalPart;

constexpr double hours_per_day = 24.0;
constexpr double shortest_h = 0.1;  // stands for "at once"
constexpr double least_h = 1.0;
constexpr double longest_h = 1.0e6;
constexpr double least_sd = 1e-4;
constexpr double least_rate_sd = 1e-9;
constexpr double most_variance = 1.0;  // from what is not known of x, near the limit
constexpr double least_weight = 1e-3;  // of a law: less does not move a quantile
constexpr int newton_steps = 12;

// Gauss-Hermite, seven points for a standard normal (probabilists' form): exact for polynomials to degree 13.
constexpr std::array<double, 7> node{-3.7504397177257425, -2.3667594107345416, -1.1544053947399682, 0.0,
                                     1.1544053947399682,  2.3667594107345416,  3.7504397177257425};
constexpr std::array<double, 7> node_weight{5.4826885597221837e-4, 3.0757123967586497e-2, 0.24012317860501272,
                                            0.45714285714285713,   0.24012317860501272,   3.0757123967586497e-2,
                                            5.4826885597221837e-4};

double square(double v) {
    return v * v;
}

// (e^(q left) - 1) / q: distance in the law's own scale, in units of w^q.
double stretched(double left, double q) {
    return std::abs(q) < 1e-9 ? left : std::expm1(q * left) / q;
}

// ln of the rate: lognormal beforehand, normal in the rate itself by the days.
struct RatePosterior {
    double ln_before;
    double variance_before;
    double rate;
    double variance;

    double ln_density(double ln_rate) const {
        return -0.5 * square(ln_rate - ln_before) / variance_before - 0.5 * square(std::exp(ln_rate) - rate) / variance;
    }
    double slope(double ln_rate) const {
        const double r = std::exp(ln_rate);
        return -(ln_rate - ln_before) / variance_before - (r - rate) * r / variance;
    }
    // Of the log density, positive; the part that may turn it over left out where that would happen.
    double curvature(double ln_rate) const {
        const double r = std::exp(ln_rate);
        return 1.0 / variance_before + square(r) / variance +
               std::max((r - rate) * r / variance, -0.7 * square(r) / variance);
    }
    double mode() const {
        double at = rate > 0.0 ? std::log(rate) : ln_before;
        for (int i = 0; i < newton_steps; ++i) at += std::clamp(slope(at) / curvature(at), -1.0, 1.0);
        return at;
    }
};

// Hours to the limit at one rate, as a normal part of ln hours.
NormalPart part_of(const WearOutlook& outlook, const LawBelief& law, double ln_rate, double weight) {
    const double rate = std::exp(ln_rate);
    const double along = law.covariance / std::max(law.rate_variance, square(least_rate_sd));
    const double x = law.ln_ratio + along * (rate - law.rate);
    const double left = outlook.ln_limit - x;
    if (left <= 0.0) return {weight, std::log(shortest_h), least_sd};
    const double q = 1.0 - law.power;
    const double distance = stretched(left, q);
    const double own = std::max(law.ratio_variance - along * law.covariance, 0.0);
    const double speed = std::exp(-q * x);  // of ln w over that at ratio 1
    const double jitter = std::log1p(square(outlook.jitter) / (rate * speed * left));
    const double variance =
        square(outlook.wander) * left / 3.0 + std::min(own / square(distance), most_variance) + jitter;
    return {weight, std::log(hours_per_day * distance / (rate * speed)) - 0.5 * jitter,
            std::sqrt(variance + square(least_sd))};
}

void add_parts(std::vector<NormalPart>& parts, const WearOutlook& outlook, const LawBelief& law) {
    const RatePosterior rates{.ln_before = std::log(rate_of_life(law.power, outlook.prior.median_h)),
                              .variance_before = square(outlook.prior.ln_sd),
                              .rate = law.rate,
                              .variance = std::max(law.rate_variance, square(least_rate_sd))};
    const double mode = rates.mode();
    const double spread = 1.0 / std::sqrt(rates.curvature(mode));
    std::array<double, node.size()> weights{};
    double all = 0.0;
    for (std::size_t i = 0; i < node.size(); ++i) {
        weights[i] = node_weight[i] * std::exp(rates.ln_density(mode + spread * node[i]) - rates.ln_density(mode) +
                                               0.5 * square(node[i]));
        all += weights[i];
    }
    for (std::size_t i = 0; i < node.size(); ++i)
        parts.push_back(part_of(outlook, law, mode + spread * node[i], law.weight * weights[i] / all));
}

bool known(const WearOutlook& outlook) {
    if (!std::isfinite(outlook.ln_limit) || !(outlook.prior.median_h > 0.0) || !(outlook.prior.ln_sd > 0.0))
        return false;
    return std::ranges::all_of(outlook.laws, [](const LawBelief& law) {
        return std::isfinite(law.ln_ratio + law.rate + law.covariance + law.weight) && law.ratio_variance >= 0.0 &&
               law.rate_variance >= 0.0;
    });
}

std::vector<NormalPart> parts_of(const WearOutlook& outlook) {
    std::vector<NormalPart> parts;
    parts.reserve(wear_laws * node.size());
    for (const LawBelief& law : outlook.laws)
        if (law.weight >= least_weight) add_parts(parts, outlook, law);
    return parts;
}

double hours_at(std::span<const NormalPart> parts, double share) {
    const double hours = std::exp(stats::mixture_quantile(parts, share));
    if (hours < least_h) return 0.0;
    return hours > longest_h ? std::numeric_limits<double>::infinity() : hours;
}

}  // namespace

double rate_of_life(double power, double life_h) {
    return hours_per_day * stretched(std::log(3.0), 1.0 - power) / life_h;
}

double passage_share(const WearOutlook& outlook, double hours) {
    if (!known(outlook) || !(hours > 0.0)) return unknown;
    return stats::mixture_share(parts_of(outlook), std::log(hours));
}

PassageQuantiles passage_quantiles(const WearOutlook& outlook) {
    if (!known(outlook)) return {};
    const std::vector<NormalPart> parts = parts_of(outlook);
    return {.low_h = hours_at(parts, 0.1), .mid_h = hours_at(parts, 0.5), .high_h = hours_at(parts, 0.9)};
}

}  // namespace slipledger::analytics
