#include "analytics/departure_look.hpp"

#include <cmath>

#include <gtest/gtest.h>

namespace slipledger::analytics {
namespace {

using std::chrono::hours;

void feed(DepartureLook& look, int from, int to, double seen, double expected) {
    for (int i = from; i < to; ++i) look.add(Instant{hours(i)}, {.leakage_lpm = seen, .healthy_lpm = expected}, 1.0);
}

// reference: DepartureLook::changes - hand-worked: 2 to 4 L/min seen, 2 expected throughout
TEST(DepartureLook, SeesThatTheLeakageMoved) {
    DepartureLook look;
    feed(look, 0, 60, 2.0, 2.0);
    feed(look, 60, 63, 4.0, 2.0);
    EXPECT_TRUE(std::isnan(look.changes().seen));
    ASSERT_TRUE(look.begin(Instant{hours(60)}));
    EXPECT_NEAR(look.changes().seen, std::log(2.0), 1e-12);
    EXPECT_NEAR(look.changes().expected, 0.0, 1e-12);
}

// reference: DepartureLook::changes - hand-worked: 2 L/min seen throughout, 2 to 1.5 expected
TEST(DepartureLook, SeesThatOnlyTheExpectationMoved) {
    DepartureLook look;
    feed(look, 0, 60, 2.0, 2.0);
    feed(look, 60, 63, 2.0, 1.5);
    look.begin(Instant{hours(60)});
    EXPECT_NEAR(look.changes().seen, 0.0, 1e-12);
    EXPECT_NEAR(look.changes().expected, std::log(0.75), 1e-12);
    EXPECT_NEAR(look.changes().expected_scatter, 0.0, 1e-9);
    feed(look, 63, 90, 2.0, 1.5);  // a day's running hours later the days before are what it is held against
    EXPECT_NEAR(look.changes().expected, std::log(0.75), 0.02);
}

// reference: DepartureLook::begin - hand-worked: told twice, begun once
TEST(DepartureLook, BeginsOncePerDeparture) {
    DepartureLook look;
    feed(look, 0, 10, 2.0, 2.0);
    EXPECT_TRUE(look.begin(Instant{hours(8)}));
    EXPECT_FALSE(look.begin(Instant{hours(8)}));
    EXPECT_TRUE(look.begin(Instant{hours(9)}));
}

}  // namespace
}  // namespace slipledger::analytics
