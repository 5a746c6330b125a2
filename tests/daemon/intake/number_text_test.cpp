#include "daemon/intake/number_text.hpp"

#include <cmath>
#include <cstdio>
#include <cstdlib>
#include <random>
#include <string>

#include <gtest/gtest.h>

namespace slipledger::intake {
namespace {

TEST(NumberText, ReadsWhatLoggersWrite) {
    EXPECT_EQ(read_number("181.2")->value, 181.2);
    EXPECT_EQ(read_number("-0.5")->value, -0.5);
    EXPECT_EQ(read_number("+7")->value, 7.0);
    EXPECT_EQ(read_number(" 3.10 ")->value, 3.1);
    EXPECT_EQ(read_number(".5")->value, 0.5);
    EXPECT_EQ(read_number("5.")->value, 5.0);
    EXPECT_EQ(read_number("1.5e2")->value, 150.0);
    EXPECT_EQ(read_number("181,2", ',')->value, 181.2);
    EXPECT_EQ(read_number("1,5e-1", ',')->value, 0.15);
}

TEST(NumberText, RefusesWhatIsNoFiniteNumber) {
    for (const char* text : {"", " ", "-", "+", ".", "18l.2", "1.2.3", "1,5", "--1", "+-1", "nan", "inf", "0x10", "1e999", "1 2"})
        EXPECT_FALSE(read_number(text)) << text;
    EXPECT_FALSE(read_number("1.5", ','));
    EXPECT_FALSE(read_number("1.500,5", ','));
}

TEST(NumberText, KnowsWhetherSevenDigitsHoldIt) {
    EXPECT_TRUE(read_number("181.2")->short_enough);
    EXPECT_TRUE(read_number("0.0001234567")->short_enough);
    EXPECT_TRUE(read_number("1234567")->short_enough);
    EXPECT_FALSE(read_number("12345.678")->short_enough);
}

// Outside value: the C library's strtod.
TEST(NumberText, IsTheNearestDoubleAsStrtodHasIt) {
    std::mt19937_64 random(20261201);  // the seed of this test
    for (int i = 0; i < 20000; ++i) {
        char text[64];
        const double value = std::ldexp(static_cast<double>(random() >> 11), static_cast<int>(random() % 60) - 80);
        std::snprintf(text, sizeof text, "%.*f", static_cast<int>(random() % 24), value);
        const auto read = read_number(text);
        ASSERT_TRUE(read) << text;
        ASSERT_EQ(read->value, std::strtod(text, nullptr)) << text;
    }
}

}  // namespace
}  // namespace slipledger::intake
