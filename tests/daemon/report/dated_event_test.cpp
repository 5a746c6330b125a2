#include "daemon/report/dated_event.hpp"

#include <gtest/gtest.h>

namespace slipledger::report {
namespace {

ledger::Event event_at(int hour, const std::string& kind, const std::string& section, const std::string& body) {
    ledger::Event event;
    event.kind = kind;
    event.section = section;
    event.at = analytics::Instant{} + std::chrono::hours(hour);
    event.by = "fitter";
    event.body = body;
    return event;
}

TEST(DatedEvents, AreTheNewestOfTheSectionAndItsPumpWithWhatWasSaid) {
    const std::vector<ledger::Event> events{
        event_at(0, "plant-changed", "", R"({"now":{}})"),
        event_at(1, "note", "", R"({"text":"strainer cleaned"})"),
        event_at(2, "note", "B", R"({"text":"of the other section"})"),
        event_at(3, "replaced", "A", R"({"note":"","found":"worn","displacement_cm3":71.0})"),
    };
    const auto told = dated_events(events, "A", 5);
    ASSERT_EQ(told.size(), 2U);
    EXPECT_EQ(told[0].kind, "replaced");
    EXPECT_EQ(told[0].text, "found worn, 71 cm3");
    EXPECT_EQ(told[1].text, "strainer cleaned");
    EXPECT_EQ(told[1].by, "fitter");
    EXPECT_EQ(dated_events(events, "A", 1).size(), 1U);
}

}  // namespace
}  // namespace slipledger::report
