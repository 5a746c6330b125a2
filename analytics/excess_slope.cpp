#include "analytics/excess_slope.hpp"

#include <algorithm>

#include "analytics/stats/least_squares.hpp"

namespace slipledger::analytics {

namespace {
constexpr std::uint32_t fewest = 10;
constexpr double clearly_wear = 1.1;
constexpr double quantile_95 = 1.645;  // of the standard normal: one end of a 90 % interval
}  // namespace

Slope slope_of(double value, double standard_error) {
    return {.value = value,
            .standard_error = standard_error,
            .low = value - quantile_95 * standard_error,
            .high = value + quantile_95 * standard_error};
}

void ExcessSlope::add(const OwnReading& own) {
    healthy_[next_] = own.healthy_lpm;
    seen_[next_] = own.leakage_lpm;
    next_ = static_cast<std::uint32_t>((next_ + 1) % most);
    count_ = std::min<std::uint32_t>(count_ + 1, most);
}

std::optional<Slope> ExcessSlope::slope() const {
    if (count_ < fewest) return std::nullopt;
    const auto n = static_cast<Eigen::Index>(count_);
    Eigen::MatrixXd columns(n, 2);
    columns.col(0).setOnes();
    columns.col(1) = Eigen::Map<const Eigen::VectorXd>(healthy_.data(), n);
    const auto fit = stats::least_squares(columns, Eigen::Map<const Eigen::VectorXd>(seen_.data(), n));
    if (!fit) return std::nullopt;
    return slope_of(fit->coefficients(1), fit->standard_errors(1));
}

bool ExcessSlope::scales_with_leakage() const {
    const auto found = slope();
    return found && found->low > clearly_wear;
}

}  // namespace slipledger::analytics
