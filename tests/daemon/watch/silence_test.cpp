#include "daemon/watch/silence.hpp"

#include <gmock/gmock.h>
#include <gtest/gtest.h>

namespace slipledger::watch {
namespace {

using namespace std::chrono_literals;
using analytics::Instant;
using testing::IsEmpty;
using testing::SizeIs;

constexpr Instant start{1772000000s};

std::vector<config::Feed> feed_with_limit(std::optional<std::chrono::seconds> limit) {
    config::Feed feed;
    feed.id = "press-hall";
    feed.silent_after = limit;
    return {feed};
}

TEST(FeedSilence, BeginsAfterTheLimitAndEndsWithTheNextReading) {
    Silence silence(feed_with_limit(60s), {}, start);
    silence.heard("press-hall", start + 10s);
    EXPECT_THAT(silence.look(start + 69s), IsEmpty());
    const auto begun = silence.look(start + 70s);
    ASSERT_THAT(begun, SizeIs(1));
    EXPECT_EQ(begun.front().kind, "feed-silent");
    EXPECT_THAT(silence.look(start + 300s), IsEmpty());

    silence.heard("press-hall", start + 301s);
    const auto ended = silence.look(start + 302s);
    ASSERT_THAT(ended, SizeIs(1));
    EXPECT_EQ(ended.front().kind, "feed-heard");
    EXPECT_EQ(ended.front().episode, begun.front().episode);
    EXPECT_NE(ended.front().id, begun.front().id);
}

TEST(FeedSilence, IsToldOnceAlsoAcrossARestart) {
    Silence before(feed_with_limit(60s), {}, start);
    const auto told = before.look(start + 61s);
    ASSERT_THAT(told, SizeIs(1));

    Silence after(feed_with_limit(60s), told, start + 100s);
    EXPECT_THAT(after.look(start + 101s), IsEmpty());
    EXPECT_THAT(after.look(start + 500s), IsEmpty());
    after.heard("press-hall", start + 501s);
    const auto ended = after.look(start + 502s);
    ASSERT_THAT(ended, SizeIs(1));
    EXPECT_EQ(ended.front().kind, "feed-heard");
    EXPECT_EQ(ended.front().episode, told.front().episode);
}

TEST(FeedSilence, OfAFeedWithoutALimitIsNotWatched) {
    Silence silence(feed_with_limit(std::nullopt), {}, start);
    EXPECT_THAT(silence.look(start + 1000h), IsEmpty());
}

TEST(FeedSilence, CountsFromTheStartWhereNothingWasEverHeard) {
    Silence silence(feed_with_limit(60s), {}, start);
    EXPECT_THAT(silence.look(start + 59s), IsEmpty());
    EXPECT_THAT(silence.look(start + 60s), SizeIs(1));
}

}  // namespace
}  // namespace slipledger::watch
