#include "analytics/wear_motion.hpp"

#include <cmath>

#include <gtest/gtest.h>

namespace slipledger::analytics {
namespace {

// reference: wear_motion - hand-worked: x 10 * v; phi = exp(-1); 0.004^2 * 10 + 0.0006^2 * 1000 / 3 = 2.8e-4 on x,
// 0.0006^2 * 50 = 1.8e-5 between, 3.6e-6 on v, 0.03^2 (1 - exp(-2)) = 7.78e-4 on u
TEST(WearMotion, CarriesWearByItsDriftAndForgetsTheDisturbance) {
    const WearMotion wear = wear_motion(10.0, 10.0, Basis::case_drain);
    const Eigen::Vector3d moved = wear.motion * Eigen::Vector3d(0.2, 0.001, 0.05);
    EXPECT_NEAR(moved(0), 0.21, 1e-15);
    EXPECT_NEAR(moved(1), 0.001, 1e-15);
    EXPECT_NEAR(moved(2), 0.05 * std::exp(-1.0), 1e-15);
    EXPECT_NEAR(wear.noise(0, 0), 2.8e-4, 1e-12);
    EXPECT_NEAR(wear.noise(0, 1), 1.8e-5, 1e-12);
    EXPECT_NEAR(wear.noise(1, 1), 3.6e-6, 1e-12);
    EXPECT_NEAR(wear.noise(2, 2), 7.78e-4, 1e-6);
}

TEST(WearMotion, StandsStillWhereNoTimePasses) {
    EXPECT_TRUE(wear_motion(-1.0, -1.0, Basis::delivery).motion.isIdentity());
    EXPECT_TRUE(wear_motion(0.0, 0.0, Basis::delivery).noise.isZero());
}

}  // namespace
}  // namespace slipledger::analytics
