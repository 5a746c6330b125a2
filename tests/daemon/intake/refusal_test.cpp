#include "daemon/intake/refusal.hpp"

#include <gtest/gtest.h>

namespace slipledger::intake {
namespace {

static_assert(!std::is_constructible_v<Refusal, std::string>, "else `return text;` in a Checked<std::string> is ambiguous");

TEST(Refusal, TellsWhereWhatWantedAndCode) {
    const Refusal refusal(Reason::bad_number, "outlet_pressure", "\"18l.2\" is not a number", "bar, e.g. 181.2");
    EXPECT_EQ(refusal.message(), "outlet_pressure \"18l.2\" is not a number; wanted bar, e.g. 181.2 (bad-number)");
}

TEST(Refusal, LeavesOutWhatItDoesNotKnow) {
    EXPECT_EQ(Refusal(Reason::line_too_long, {}, "longer than 64 KiB").message(), "longer than 64 KiB (line-too-long)");
}

TEST(Refusal, QuotesAnyBytesSoThatALogLineStaysOne) {
    EXPECT_EQ(in_quotes("a\nb\xff\"c"), "\"a?b??c\"");
    EXPECT_EQ(in_quotes(std::string(50, 'x'), 3), "\"xxx...\"");
}

}  // namespace
}  // namespace slipledger::intake
