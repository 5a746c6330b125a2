#include "analytics/duty.hpp"

#include <cmath>

#include <gtest/gtest.h>

namespace slipledger::analytics {
namespace {

// reference: DutyWindow::running_h_per_day - hand-worked: 8 h on 5 days and 0 on 2: 40 / 7
TEST(Duty, IsRunningHoursOverTheDaysWatched) {
    DutyWindow duty;
    EXPECT_TRUE(std::isnan(duty.running_h_per_day(100)));
    for (std::int32_t day = 0; day < 7; ++day) duty.add(100 + day, {.running_h = day < 5 ? 8.0 : 0.0, .judged_h = 1.0});
    EXPECT_DOUBLE_EQ(duty.running_h_per_day(106), 40.0 / 7.0);
}

TEST(Duty, ForgetsWhatIsOlderThanThirtyDays) {
    DutyWindow duty;
    duty.add(-10, {.running_h = 24.0, .judged_h = 24.0});
    for (std::int32_t day = 1; day <= 45; ++day) duty.add(day, {.running_h = 10.0, .judged_h = 2.0});
    const DutyDay total = duty.total(46, {.running_h = 5.0, .judged_h = 1.0});
    EXPECT_DOUBLE_EQ(total.running_h, 29 * 10.0 + 5.0);
    EXPECT_DOUBLE_EQ(total.judged_h, 29 * 2.0 + 1.0);
    EXPECT_DOUBLE_EQ(duty.total(200, {}).running_h, 0.0);
}

}  // namespace
}  // namespace slipledger::analytics
