#include "analytics/trimmed_moments.hpp"

#include <gtest/gtest.h>

#include <fstream>
#include <map>
#include <sstream>
#include <string>

#include "analytics/summary.hpp"

namespace slipledger::analytics {
namespace {

JudgedPoint point_at(double leakage_lpm, double laminar, double orifice = 1.0, double speed = 1.0) {
    JudgedPoint point;
    point.leakage_lpm = leakage_lpm;
    point.features = {.laminar = laminar, .orifice = orifice, .speed = speed};
    point.pressure_rise_bar = 200.0 * laminar;
    point.temperature_c = 50.0;
    return point;
}

// Rows of a CSV without its header, by the name in the first column.
std::multimap<std::string, std::vector<double>> rows_of(const std::string& file) {
    std::ifstream in(SLIPLEDGER_SOURCE_DIR "/tests/reference/" + file);
    std::multimap<std::string, std::vector<double>> rows;
    std::string line;
    std::getline(in, line);
    while (std::getline(in, line)) {
        std::istringstream cells(line);
        std::string name;
        std::string cell;
        std::getline(cells, name, ',');
        const auto row = rows.emplace(name, std::vector<double>{});
        while (std::getline(cells, cell, ',')) row->second.push_back(std::stod(cell));
    }
    return rows;
}

std::vector<double> flattened(const Moments& moments) {
    std::vector<double> values{static_cast<double>(moments.count),
                               moments.leakage_lpm,
                               moments.feature[0],
                               moments.feature[1],
                               moments.feature[2],
                               moments.dp_bar,
                               moments.temperature_c};
    values.insert(values.end(), moments.covariance.begin(), moments.covariance.end());
    values.insert(values.end(), {moments.dp_variance, moments.dp_temperature_covariance, moments.temperature_variance,
                                 moments.standard_error_lpm});
    return values;
}

// reference: PointSample::moments - outside: NumPy (polyfit, mean, cov) and SciPy (trimmed_stde, winsorize);
// tests/reference/trimmed_moments.py made both files
TEST(TrimmedMoments, AreWhatNumPyAndSciPyMakeOfTheSamePoints) {
    const auto points = rows_of("trimmed_moments_points.csv");
    const auto expected = rows_of("trimmed_moments_expected.csv");
    ASSERT_EQ(expected.size(), 6u);
    PointSample sample;
    for (const auto& [name, wanted] : expected) {
        sample.clear();
        const auto [first, last] = points.equal_range(name);
        for (auto it = first; it != last; ++it) {
            const std::vector<double>& row = it->second;
            JudgedPoint point = point_at(row[0], row[1], row[2], row[3]);
            point.pressure_rise_bar = row[4];
            point.temperature_c = row[5];
            sample.add(point);
        }
        const std::vector<double> got = flattened(sample.moments());
        ASSERT_EQ(got.size(), wanted.size());
        // The files carry 9 and 12 digits; sums run in another order.
        for (std::size_t i = 0; i < got.size(); ++i)
            EXPECT_NEAR(got[i], wanted[i], 1e-9 * (1.0 + std::abs(wanted[i]))) << name << ' ' << i;
    }
}

// On paper: points (f1, y) = (1, 2), (2, 4), (3, 7): means 2 and 13/3; population var(f1) 2/3, cov 5/3, var(y) 38/9.
// Line: slope 2.5; residuals 1/6, -1/3, 1/6; sum of squares 1/6 on one degree of freedom; successive products -1/9, so
// no correlation; se = sqrt(1/6 / 1 / 3) = 0.2357. reference: PointSample::moments - hand-worked: three points, figures
// above
TEST(TrimmedMoments, OfThreePointsAreAsOnPaper) {
    PointSample sample;
    sample.add(point_at(2.0, 1.0));
    sample.add(point_at(4.0, 2.0));
    sample.add(point_at(7.0, 3.0));
    const Moments moments = sample.moments();
    EXPECT_EQ(moments.count, 3u);
    EXPECT_NEAR(moments.leakage_lpm, 13.0 / 3.0, 1e-12);
    EXPECT_NEAR(moments.feature[0], 2.0, 1e-12);
    EXPECT_NEAR(moments.covariance[0], 38.0 / 9.0, 1e-12);
    EXPECT_NEAR(moments.covariance[1], 5.0 / 3.0, 1e-12);
    EXPECT_NEAR(moments.covariance[2], 2.0 / 3.0, 1e-12);
    EXPECT_NEAR(moments.standard_error_lpm, 0.2357, 1e-4);
    EXPECT_NEAR(moments.dp_variance, 2.0 / 3.0 * 200.0 * 200.0, 1e-9);
}

TEST(TrimmedMoments, LeaveOutTheWildestOfTwentyButOfNineteenNone) {
    PointSample sample;
    for (int i = 0; i < 19; ++i) sample.add(point_at(i == 7 ? 50.0 : i == 9 ? -50.0 : 2.0, 1.0));
    EXPECT_EQ(sample.moments().count, 19u);
    sample.add(point_at(2.0, 1.0));
    const Moments moments = sample.moments();
    EXPECT_EQ(moments.count, 18u);
    EXPECT_DOUBLE_EQ(moments.leakage_lpm, 2.0);
    EXPECT_NEAR(moments.covariance[0], 0.0, 1e-12);
}

// Why means: leakage goes with the features, so the mean leakage is the leakage at the mean features even when the duty
// swings, and nothing of it is trimmed for being loaded.
TEST(TrimmedMoments, OfASwingingDutyLieOnTheLawOfTheLeakage) {
    PointSample sample;
    for (int i = 0; i < 200; ++i) {
        const double laminar = i % 20 < 7 ? 1.3 : 0.2;
        sample.add(point_at(2.0 * laminar + 0.3 * std::sqrt(laminar) + 0.1, laminar, std::sqrt(laminar)));
    }
    const Moments moments = sample.moments();
    EXPECT_NEAR(moments.leakage_lpm, 2.0 * moments.feature[0] + 0.3 * moments.feature[1] + 0.1, 1e-12);
    EXPECT_GT(moments.covariance[2], 0.2);
}

TEST(TrimmedMoments, CountSuccessiveRowsThatRepeatEachOtherForLess) {
    PointSample repeated;
    PointSample alternating;
    for (int i = 0; i < 400; ++i) {
        repeated.add(point_at((i / 20) % 2 == 0 ? 1.9 : 2.1, 1.0));
        alternating.add(point_at(i % 2 == 0 ? 1.9 : 2.1, 1.0));
    }
    EXPECT_GT(repeated.moments().standard_error_lpm, 4.0 * alternating.moments().standard_error_lpm);
}

TEST(TrimmedMoments, OfNoneOrTwoPointsClaimNoError) {
    PointSample sample;
    EXPECT_EQ(sample.moments().count, 0u);
    sample.add(point_at(2.0, 1.0));
    sample.add(point_at(3.0, 1.5));
    EXPECT_EQ(sample.moments().count, 2u);
    EXPECT_EQ(sample.moments().standard_error_lpm, 0.0);
}

}  // namespace
}  // namespace slipledger::analytics
