#include "analytics/signs.hpp"

#include <set>

#include <gtest/gtest.h>

namespace slipledger::analytics {
namespace {

// reference: strength_between - hand-worked: half way between 1 and 2; beyond both, downwards too; NaN
TEST(Signs, GrowOnAStraightLine) {
    EXPECT_DOUBLE_EQ(strength_between(1.5, 1.0, 2.0), 0.5);
    EXPECT_DOUBLE_EQ(strength_between(1.5, 3.0, 2.0), 1.0);
    EXPECT_DOUBLE_EQ(strength_between(0.5, 1.0, 2.0), 0.0);
    EXPECT_DOUBLE_EQ(strength_between(9.0, 1.0, 2.0), 1.0);
    EXPECT_DOUBLE_EQ(strength_between(unknown, 1.0, 2.0), 0.0);
}

TEST(Signs, HaveNamesOfTheirOwn) {
    const std::set<std::string_view> names(sign_names.begin(), sign_names.end());
    EXPECT_EQ(names.size(), sign_count);
    EXPECT_EQ(name_of(Sign::flow_unmoved), "flow-unmoved");
}

}  // namespace
}  // namespace slipledger::analytics
