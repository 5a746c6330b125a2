#include "analytics/stats/least_squares.hpp"

#include <cmath>

#include <Eigen/QR>

namespace slipledger::analytics::stats {

std::optional<Fit> least_squares(const Eigen::MatrixXd& columns, const Eigen::VectorXd& seen) {
    const Eigen::Index n = columns.rows();
    const Eigen::Index k = columns.cols();
    if (k == 0 || n <= k || seen.size() != n) return std::nullopt;
    const Eigen::ColPivHouseholderQR<Eigen::MatrixXd> decomposed(columns);
    if (decomposed.rank() < k) return std::nullopt;
    Fit fit;
    fit.coefficients = decomposed.solve(seen);
    fit.residual_sd = std::sqrt((seen - columns * fit.coefficients).squaredNorm() / static_cast<double>(n - k));
    // (X'X)^-1 = P R^-1 R^-T P': its diagonal is the row norms of P R^-1.
    const Eigen::MatrixXd r = decomposed.matrixR().topRows(k).triangularView<Eigen::Upper>();
    Eigen::MatrixXd inverse = Eigen::MatrixXd::Identity(k, k);
    r.triangularView<Eigen::Upper>().solveInPlace(inverse);
    fit.standard_errors = fit.residual_sd * (decomposed.colsPermutation() * inverse).rowwise().norm();
    return fit;
}

}  // namespace slipledger::analytics::stats
