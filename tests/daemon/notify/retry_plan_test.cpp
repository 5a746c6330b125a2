#include "daemon/notify/retry_plan.hpp"

#include <gtest/gtest.h>

namespace slipledger::notify {
namespace {

using namespace std::chrono_literals;
using analytics::Instant;

constexpr Instant now{1772000000s};

TEST(RetryPlan, BeginsWithSecondsAndNeverPausesLongerThanAFifthOverAQuarterOfAnHour) {
    const RetryPlan plan;
    std::chrono::milliseconds nominal = 5s;
    for (int attempts = 1; attempts <= 200; ++attempts) {
        const auto next = next_try(plan, attempts, "a", now);
        ASSERT_TRUE(next) << attempts;
        EXPECT_GE(*next - now, nominal * 8 / 10) << attempts;
        EXPECT_LE(*next - now, nominal * 12 / 10) << attempts;
        nominal = std::min<std::chrono::milliseconds>(nominal * 2, 15min);
    }
}

// Hand-worked: 5, 10, 20 ... 640 s are 8 pauses of 1275 s in all; three days less these are 257925 s, 286.6 pauses of 900 s:
// after the 295th pause three days are over.
TEST(RetryPlan, GivesUpAfterThreeDaysOfPauses) {
    EXPECT_TRUE(next_try({}, 295, "a", now));
    EXPECT_FALSE(next_try({}, 296, "a", now));
}

TEST(RetryPlan, SpreadsNoticesThatFailedTogether) {
    const auto one = next_try({}, 3, "notice-1", now);
    EXPECT_EQ(one, next_try({}, 3, "notice-1", now));
    EXPECT_NE(one, next_try({}, 3, "notice-2", now));
}

}  // namespace
}  // namespace slipledger::notify
