#include "analytics/trimmed_moments.hpp"

#include <algorithm>
#include <array>
#include <cmath>

#include "analytics/summary.hpp"

namespace slipledger::analytics {
namespace {

constexpr double trimmed_share = 0.05;
constexpr std::size_t least_to_trim = 20;
constexpr double most_correlation = 0.95;  // beyond it an hour would count as less than a fortieth of its points
constexpr double least_spread = 1e-9;      // of f1, relative: below it there is no line to fit

}  // namespace

void PointSample::add(const JudgedPoint& point) {
    rows_.push_back({.leakage_lpm = point.leakage_lpm,
                     .features = point.features,
                     .pressure_rise_bar = point.pressure_rise_bar,
                     .temperature_c = point.temperature_c,
                     .viscosity_cst = point.viscosity_cst,
                     .speed_rpm = point.speed_rpm,
                     .delivery_lpm = point.delivery_lpm,
                     .theoretical_lpm = point.theoretical_lpm});
}

Moments PointSample::moments() {
    Moments moments;
    if (rows_.empty()) return moments;
    fit_line();
    trim();
    moments.count = static_cast<std::uint32_t>(rows_.size() - 2 * trimmed_);
    moments.standard_error_lpm = standard_error_lpm();
    take_means(moments);
    take_covariances(moments);
    return moments;
}

void PointSample::fit_line() {
    const double n = static_cast<double>(rows_.size());
    double mean_y = 0.0;
    double mean_f = 0.0;
    for (const Row& row : rows_) {
        mean_y += row.leakage_lpm / n;
        mean_f += row.features.laminar / n;
    }
    double spread = 0.0;
    double together = 0.0;
    for (const Row& row : rows_) {
        const double f = row.features.laminar - mean_f;
        spread += f * f;
        together += f * (row.leakage_lpm - mean_y);
    }
    const double slope = spread > n * std::pow(least_spread * mean_f, 2) ? together / spread : 0.0;
    residuals_.resize(rows_.size());
    for (std::size_t i = 0; i < rows_.size(); ++i)
        residuals_[i] = rows_[i].leakage_lpm - mean_y - slope * (rows_[i].features.laminar - mean_f);
}

void PointSample::trim() {
    const std::size_t n = rows_.size();
    kept_.assign(n, 1);
    trimmed_ = n < least_to_trim ? 0 : static_cast<std::size_t>(trimmed_share * static_cast<double>(n));
    if (trimmed_ == 0) return;
    ordered_.resize(n);
    for (std::size_t i = 0; i < n; ++i) ordered_[i] = {residuals_[i], static_cast<std::uint32_t>(i)};
    const auto low = ordered_.begin() + static_cast<std::ptrdiff_t>(trimmed_);
    const auto high = ordered_.end() - static_cast<std::ptrdiff_t>(trimmed_) - 1;
    std::nth_element(ordered_.begin(), low, ordered_.end());
    const double lowest_kept = low->value;
    std::nth_element(low, high, ordered_.end());
    const double highest_kept = high->value;
    for (auto it = ordered_.begin(); it != low; ++it) kept_[it->row] = 0;
    for (auto it = high + 1; it != ordered_.end(); ++it) kept_[it->row] = 0;
    for (double& residual : residuals_) residual = std::clamp(residual, lowest_kept, highest_kept);
}

double PointSample::standard_error_lpm() const {
    const std::size_t n = residuals_.size();
    if (n < 3) return 0.0;
    const double count = static_cast<double>(n);
    double mean = 0.0;
    for (const double residual : residuals_) mean += residual / count;
    double squares = 0.0;
    double products = 0.0;
    for (std::size_t i = 0; i < n; ++i) {
        const double here = residuals_[i] - mean;
        squares += here * here;
        if (i > 0) products += here * (residuals_[i - 1] - mean);
    }
    if (!(squares > 0.0)) return 0.0;
    const double correlation = std::clamp(products / squares, 0.0, most_correlation);
    const double kept_share = 1.0 - 2.0 * static_cast<double>(trimmed_) / count;
    return std::sqrt(squares / (count - 2.0) / count * (1.0 + correlation) / (1.0 - correlation)) / kept_share;
}

void PointSample::take_means(Moments& moments) const {
    const double share = 1.0 / static_cast<double>(moments.count);
    for (std::size_t i = 0; i < rows_.size(); ++i) {
        if (!kept_[i]) continue;
        const Row& row = rows_[i];
        moments.leakage_lpm += share * row.leakage_lpm;
        moments.feature[0] += share * row.features.laminar;
        moments.feature[1] += share * row.features.orifice;
        moments.feature[2] += share * row.features.speed;
        moments.dp_bar += share * row.pressure_rise_bar;
        moments.temperature_c += share * row.temperature_c;
        moments.viscosity_cst += share * row.viscosity_cst;
        moments.speed_rpm += share * row.speed_rpm;
        moments.delivery_lpm += share * row.delivery_lpm;
        moments.theoretical_lpm += share * row.theoretical_lpm;
    }
}

void PointSample::take_covariances(Moments& moments) const {
    const double share = 1.0 / static_cast<double>(moments.count);
    for (std::size_t i = 0; i < rows_.size(); ++i) {
        if (!kept_[i]) continue;
        const Row& row = rows_[i];
        const std::array<double, 4> off{
            row.leakage_lpm - moments.leakage_lpm, row.features.laminar - moments.feature[0],
            row.features.orifice - moments.feature[1], row.features.speed - moments.feature[2]};
        std::size_t packed = 0;
        for (std::size_t r = 0; r < off.size(); ++r)
            for (std::size_t c = 0; c <= r; ++c) moments.covariance[packed++] += share * off[r] * off[c];
        const double dp = row.pressure_rise_bar - moments.dp_bar;
        const double temperature = row.temperature_c - moments.temperature_c;
        moments.dp_variance += share * dp * dp;
        moments.dp_temperature_covariance += share * dp * temperature;
        moments.temperature_variance += share * temperature * temperature;
    }
}

}  // namespace slipledger::analytics
