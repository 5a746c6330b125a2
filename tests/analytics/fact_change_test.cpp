#include "analytics/fact_change.hpp"

#include <gtest/gtest.h>

namespace slipledger::analytics {
namespace {

FactChange instrument(Quantity quantity) {
    FactChange change;
    change.instruments = static_cast<std::uint16_t>(1U << index_of(quantity));
    return change;
}

TEST(FactChange, OpensTheBaselineWhereItsOwnInstrumentsOrTheOilsLabelChanged) {
    EXPECT_FALSE(FactChange{}.opens_baseline(Basis::case_drain));
    EXPECT_FALSE((FactChange{.oil = true, .setting = true}).opens_baseline(Basis::case_drain));
    EXPECT_TRUE((FactChange{.oil = true, .oil_by_label = true}).opens_baseline(Basis::case_drain));
    EXPECT_TRUE(instrument(Quantity::case_drain_flow).opens_baseline(Basis::case_drain));
    EXPECT_FALSE(instrument(Quantity::case_drain_flow).opens_baseline(Basis::delivery));
    EXPECT_TRUE(instrument(Quantity::delivery_flow).opens_baseline(Basis::delivery));
    EXPECT_FALSE(instrument(Quantity::shaft_speed).opens_baseline(Basis::case_drain));
    EXPECT_TRUE(instrument(Quantity::shaft_speed).opens_baseline(Basis::delivery));
    EXPECT_FALSE(instrument(Quantity::filter_dp).opens_baseline(Basis::delivery));
}

}  // namespace
}  // namespace slipledger::analytics
