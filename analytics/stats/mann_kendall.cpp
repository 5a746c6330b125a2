#include "analytics/stats/mann_kendall.hpp"

#include <algorithm>
#include <cmath>
#include <limits>
#include <numbers>
#include <numeric>
#include <vector>

#include "analytics/stats/theil_sen.hpp"

namespace slipledger::analytics::stats {

namespace {

constexpr double nan = std::numeric_limits<double>::quiet_NaN();
constexpr double significant = 1.959963984540054;  // two-sided 5 % of the standard normal
constexpr double any_share = 0.8;                  // only the slope itself is asked for

double kendall_s(std::span<const double> values) {
    double s = 0.0;
    for (std::size_t j = 1; j < values.size(); ++j)
        for (std::size_t i = 0; i < j; ++i)
            s += (values[j] > values[i] ? 1.0 : 0.0) - (values[j] < values[i] ? 1.0 : 0.0);
    return s;
}

void judge(MannKendall& test) {
    const double moved = test.s > 0.0 ? test.s - 1.0 : test.s < 0.0 ? test.s + 1.0 : 0.0;
    test.z = test.variance > 0.0 ? moved / std::sqrt(test.variance) : 0.0;
    test.p = std::erfc(std::abs(test.z) / std::numbers::sqrt2);
}

// Equal values share the mean of their ranks.
std::vector<double> ranks_of(const std::vector<double>& values) {
    std::vector<std::size_t> order(values.size());
    std::iota(order.begin(), order.end(), std::size_t{0});
    std::ranges::sort(order, {}, [&](std::size_t i) { return values[i]; });
    std::vector<double> ranks(values.size());
    for (std::size_t first = 0; first < order.size();) {
        std::size_t end = first;
        while (end < order.size() && values[order[end]] == values[order[first]]) ++end;
        for (std::size_t i = first; i < end; ++i) ranks[order[i]] = 0.5 * static_cast<double>(first + end + 1);
        first = end;
    }
    return ranks;
}

std::vector<double> less_its_line(std::span<const double> values) {
    std::vector<double> place(values.size());
    std::iota(place.begin(), place.end(), 0.0);
    const double slope = theil_sen(place, values, any_share).value;
    std::vector<double> left(values.begin(), values.end());
    for (std::size_t i = 0; i < left.size(); ++i) left[i] -= slope * place[i];
    return left;
}

double factor_of(std::vector<double> ranks) {
    const double n = static_cast<double>(ranks.size());
    const double mean = 0.5 * (n + 1.0);
    for (double& rank : ranks) rank -= mean;
    const double square = std::inner_product(ranks.begin(), ranks.end(), ranks.begin(), 0.0);
    if (!(square > 0.0)) return 1.0;
    double sum = 0.0;
    for (std::size_t lag = 1; lag + 2 < ranks.size(); ++lag) {
        const auto ahead = ranks.begin() + static_cast<std::ptrdiff_t>(lag);
        const double r = std::inner_product(ahead, ranks.end(), ranks.begin(), 0.0) / square;
        const double left = n - static_cast<double>(lag);
        if (std::abs(r) > significant / std::sqrt(n)) sum += left * (left - 1.0) * (left - 2.0) * r;
    }
    return std::fmax(1.0 + 2.0 * sum / (n * (n - 1.0) * (n - 2.0)), 1.0);
}

}  // namespace

double tie_sum(std::span<const double> values) {
    std::vector<double> ordered(values.begin(), values.end());
    std::ranges::sort(ordered);
    double sum = 0.0;
    for (auto first = ordered.begin(); first != ordered.end();) {
        const auto end = std::upper_bound(first, ordered.end(), *first);
        const auto t = static_cast<double>(end - first);
        sum += t * (t - 1.0) * (2.0 * t + 5.0);
        first = end;
    }
    return sum;
}

MannKendall mann_kendall(std::span<const double> values) {
    if (values.size() < 3) return {.variance = nan, .z = nan, .p = nan};
    const double n = static_cast<double>(values.size());
    MannKendall test;
    test.s = kendall_s(values);
    test.variance = (n * (n - 1.0) * (2.0 * n + 5.0) - tie_sum(values)) / 18.0;
    judge(test);
    return test;
}

MannKendall mann_kendall_autocorrelated(std::span<const double> values) {
    if (values.size() < 4) return {.variance = nan, .z = nan, .p = nan};
    MannKendall test = mann_kendall(values);
    test.variance_factor = factor_of(ranks_of(less_its_line(values)));
    test.variance *= test.variance_factor;
    judge(test);
    return test;
}

}  // namespace slipledger::analytics::stats
