#include "daemon/watch/pass_span.hpp"

#include <gtest/gtest.h>

namespace slipledger::watch {
namespace {

using namespace std::chrono_literals;
using analytics::Instant;

constexpr std::int32_t first_of_march = 20513;  // 2026-03-01, days since 1970 (Python datetime)

Instant march(int day, int hour, int minute = 0) {
    return Instant(std::chrono::days(first_of_march + day - 1)) + std::chrono::hours(hour) + std::chrono::minutes(minute);
}

PassInput input() {
    PassInput in;
    in.summary_length = 1h;
    in.lateness = 10min;
    in.oldest = march(1, 6, 30);
    in.newest = march(5, 9, 5);
    in.mark = {march(5, 7), march(5, 7, 59)};
    in.stored_until = first_of_march + 3;
    return in;
}

TEST(PassSpan, ClosesAnHourOnlyWhenTheNewestReadingIsLatenessPastItsEnd) {
    const PlantDays days("UTC");
    PassInput in = input();
    in.newest = march(5, 9, 9);
    EXPECT_EQ(pass_span(in, days)->boundary, march(5, 8));
    in.newest = march(5, 9, 10);
    EXPECT_EQ(pass_span(in, days)->boundary, march(5, 9));
}

TEST(PassSpan, TakesTheUnfinishedDayUpFromItsBeginningAndMakesOnlyTouchedSummariesAnew) {
    const auto pass = pass_span(input(), PlantDays("UTC"));
    ASSERT_TRUE(pass);
    EXPECT_EQ(pass->from, march(5, 0));
    EXPECT_EQ(pass->touched.from, march(5, 7));
    EXPECT_EQ(pass->touched.to, march(5, 8));
    EXPECT_EQ(pass->first_date, first_of_march + 4);
    EXPECT_EQ(pass->last_date, first_of_march + 4);
}

TEST(PassSpan, OfALateRowReachesFourHoursAheadAndJudgesAllDaysAfter) {
    PassInput in = input();
    in.mark = {march(2, 10), march(2, 10, 20)};
    const auto pass = pass_span(in, PlantDays("UTC"));
    ASSERT_TRUE(pass);
    EXPECT_EQ(pass->touched.from, march(2, 10));
    EXPECT_EQ(pass->touched.to, march(2, 15));
    EXPECT_EQ(pass->first_date, first_of_march + 1);
    EXPECT_EQ(pass->last_date, first_of_march + 4);
}

TEST(PassSpan, IsEverythingWhereNothingIsStoredYet) {
    PassInput in = input();
    in.stored_until.reset();
    const auto pass = pass_span(in, PlantDays("UTC"));
    ASSERT_TRUE(pass);
    EXPECT_EQ(pass->from, march(1, 6));
    EXPECT_EQ(pass->touched.from, march(1, 6));
    EXPECT_EQ(pass->touched.to, pass->boundary);
}

TEST(PassSpan, GivesASummaryToTheDayInWhichItEnds) {
    const PlantDays kolkata("Asia/Kolkata");  // days begin at 18:30 UTC
    const auto pass = pass_span(input(), kolkata);
    ASSERT_TRUE(pass);
    const analytics::DaySpan day = kolkata.day(first_of_march);
    EXPECT_EQ(pass->summaries_of(day).from, march(0, 18));
    EXPECT_EQ(pass->summaries_of(day).to, march(1, 18));
}

TEST(PassSpan, IsCutAtADaysEndWhereMoreIsClosedThanOnePassTakes) {
    PassInput in = input();
    in.stored_until.reset();
    in.most_summaries = 50;
    const auto pass = pass_span(in, PlantDays("UTC"));
    ASSERT_TRUE(pass);
    EXPECT_TRUE(pass->cut_short);
    EXPECT_EQ(pass->boundary, march(3, 0));
}

TEST(PassSpan, IsNoneWhereNothingHasClosed) {
    PassInput in = input();
    in.stored_until.reset();
    in.newest = in.oldest + 20min;
    EXPECT_FALSE(pass_span(in, PlantDays("UTC")));
}

}  // namespace
}  // namespace slipledger::watch
