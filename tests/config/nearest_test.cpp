#include "config/nearest.hpp"

#include <gtest/gtest.h>

#include <array>

namespace slipledger::config {
namespace {

constexpr std::array<std::string_view, 4> names{"displacement_cm3", "drain", "drain_group", "relief_bar"};

TEST(NearestName, FindsALetterDroppedAddedChangedOrSwapped) {
    EXPECT_EQ(nearest_name("displacment_cm3", names), "displacement_cm3");
    EXPECT_EQ(nearest_name("draain", names), "drain");
    EXPECT_EQ(nearest_name("relief_bat", names), "relief_bar");
    EXPECT_EQ(nearest_name("darin", names), "drain");
}

TEST(NearestName, SaysNothingWhereNothingIsNear) {
    EXPECT_EQ(nearest_name("colour", names), "");
    EXPECT_EQ(nearest_name("", names), "");
    EXPECT_EQ(nearest_name(std::string(100000, 'x'), names), "");
}

TEST(NearestName, PrefersTheFewestChanges) {
    EXPECT_EQ(nearest_name("drain_grup", names), "drain_group");
    EXPECT_EQ(nearest_name("drains", names), "drain");
}

}  // namespace
}  // namespace slipledger::config
