#include "analytics/instant.hpp"

#include <gtest/gtest.h>

#include <type_traits>

namespace slipledger::analytics {
namespace {

// What would silently go wrong must not compile.
static_assert(!std::is_convertible_v<double, RunningHours>);
static_assert(!std::is_convertible_v<RunningHours, double>);
static_assert(!std::is_convertible_v<long, Instant>);

template <class T>
concept Addable = requires(T a, T b) {
    a + b;
};
static_assert(!Addable<Instant>);
static_assert(Addable<RunningHours>);

TEST(RunningHours, AddAndCompare) {
    EXPECT_EQ((RunningHours{40.0} + RunningHours{2.5}).h, 42.5);
    EXPECT_EQ((RunningHours{40.0} - RunningHours{2.5}).h, 37.5);
    EXPECT_LT(RunningHours{1.0}, RunningHours{2.0});
}

}  // namespace
}  // namespace slipledger::analytics
