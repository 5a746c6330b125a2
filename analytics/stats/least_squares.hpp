// A linear fit by least squares, with what is not known of it. By an orthogonal decomposition, not by normal equations,
// so that it stands up to badly conditioned data (NIST's Longley set is the test).
#pragma once

#include <optional>

#include <Eigen/Core>

namespace slipledger::analytics::stats {

struct Fit {
    Eigen::VectorXd coefficients;
    Eigen::VectorXd standard_errors;
    double residual_sd = 0.0;
};

// y = X beta + e, least sum of squares:
//
//   beta = argmin |y - X beta|^2,   s^2 = |y - X beta|^2 / (n - k),   se_j = s sqrt([(X'X)^-1]_jj)
//
//   X   columns   n x k, n > k, one row a sighting, a column of ones where a constant is wanted
//   y   seen      n
//
// nullopt where n <= k or the columns do not tell k coefficients apart.
// Example: y = 1, 3, 5 at x = 0, 1, 2 with a constant -> 1 and 2, standard errors 0.
// Source: any text; checked against NIST StRD Longley.
std::optional<Fit> least_squares(const Eigen::MatrixXd& columns, const Eigen::VectorXd& seen);

}  // namespace slipledger::analytics::stats
