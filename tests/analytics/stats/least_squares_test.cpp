#include "analytics/stats/least_squares.hpp"

#include <gtest/gtest.h>

#include "tests/analytics/reference_table.hpp"

namespace slipledger::analytics::stats {
namespace {

using analytics::testing::reference_table;

// reference: least_squares - outside: NIST StRD Longley, certified values (from memory; longley.py solves them exactly)
TEST(LeastSquares, MeetsTheCertifiedValuesOfLongley) {
    const auto data = reference_table("longley_data.csv");
    Eigen::MatrixXd columns(static_cast<Eigen::Index>(data.size()), 7);
    Eigen::VectorXd employed(columns.rows());
    for (Eigen::Index i = 0; i < columns.rows(); ++i) {
        const auto& row = data[static_cast<std::size_t>(i)];
        employed(i) = row[0];
        columns(i, 0) = 1.0;
        for (Eigen::Index j = 1; j < 7; ++j) columns(i, j) = row[static_cast<std::size_t>(j)];
    }
    const auto fit = least_squares(columns, employed);
    ASSERT_TRUE(fit);
    const auto certified = reference_table("longley.csv");
    for (std::size_t i = 0; i < certified.size(); ++i) {
        const auto at = static_cast<Eigen::Index>(i);
        // The set's condition number of 5e9 leaves some 7 to 9 digits of 16.
        EXPECT_NEAR(fit->coefficients(at) / certified[i][0], 1.0, 1e-7) << i;
        EXPECT_NEAR(fit->standard_errors(at) / certified[i][1], 1.0, 1e-7) << i;
    }
    EXPECT_NEAR(fit->residual_sd, 304.854073561965, 1e-5);
}

// reference: least_squares - hand-worked: y = 1 + 2 x through three points, nothing left over
TEST(LeastSquares, FindsALineThroughPointsThatLieOnOne) {
    Eigen::MatrixXd columns(3, 2);
    columns << 1.0, 0.0, 1.0, 1.0, 1.0, 2.0;
    const auto fit = least_squares(columns, Eigen::Vector3d(1.0, 3.0, 5.0));
    ASSERT_TRUE(fit);
    EXPECT_NEAR(fit->coefficients(0), 1.0, 1e-14);
    EXPECT_NEAR(fit->coefficients(1), 2.0, 1e-14);
    EXPECT_NEAR(fit->standard_errors(1), 0.0, 1e-13);
}

TEST(LeastSquares, DoesNotTellApartWhatAlwaysMovesTogether) {
    Eigen::MatrixXd columns(4, 2);
    columns << 1.0, 2.0, 1.0, 2.0, 1.0, 2.0, 1.0, 2.0;
    EXPECT_FALSE(least_squares(columns, Eigen::Vector4d(1.0, 2.0, 3.0, 4.0)));
    EXPECT_FALSE(least_squares(columns.topRows(2), Eigen::Vector2d(1.0, 2.0)));
}

}  // namespace
}  // namespace slipledger::analytics::stats
