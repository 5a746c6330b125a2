#include "config/json_tree.hpp"

#include <gtest/gtest.h>

namespace slipledger::config {
namespace {

TEST(JsonTree, KnowsTheLineOfEachValue) {
    const JsonReading reading = read_json("{\n  \"a\": 1,\n\n  \"b\": [true,\n \"x\"]\n}");
    ASSERT_TRUE(reading.complete);
    EXPECT_EQ(reading.root.line, 1);
    EXPECT_EQ(reading.root.find("a")->line, 2);
    EXPECT_EQ(reading.root.find("b")->items[1].line, 5);
    EXPECT_EQ(reading.root.find("c"), nullptr);
}

TEST(JsonTree, AllowsBothKindsOfComment) {
    const JsonReading reading = read_json("// first\n{ /* inside */ \"a\": 1 // after\n}");
    ASSERT_TRUE(reading.complete);
    EXPECT_EQ(reading.root.find("a")->number, 1.0);
}

TEST(JsonTree, TellsASyntaxErrorByLineAndColumn) {
    const JsonReading reading = read_json("{\n  \"a\": 1\n  \"b\": 2\n}");
    EXPECT_FALSE(reading.complete);
    ASSERT_EQ(reading.faults.size(), 1U);
    const Fault& fault = reading.faults[0];
    EXPECT_EQ(fault.code, "syntax");
    EXPECT_EQ(fault.line, 3);
    EXPECT_EQ(fault.column, 5);  // the last letter of "b", which is where the reader knows
    EXPECT_NE(fault.found.find("expected"), std::string::npos) << fault.found;
}

TEST(JsonTree, TellsAnEmptyOrCutText) {
    for (const std::string_view text : {"", "{", "{\"a\":", "[1,2", "\"abc", "/* open", "{} {}"}) {
        const JsonReading reading = read_json(text);
        EXPECT_FALSE(reading.complete) << text;
        ASSERT_EQ(reading.faults.size(), 1U) << text;
        EXPECT_EQ(reading.faults[0].code, "syntax") << text;
        EXPECT_GT(reading.faults[0].line, 0) << text;
    }
}

TEST(JsonTree, RefusesAKeyWrittenTwiceAndKeepsTheFirst) {
    const JsonReading reading = read_json("{\"a\": {\"x\": 1,\n\"x\": {\"y\": 1, \"y\": [1]}},\n \"b\": 2}");
    ASSERT_TRUE(reading.complete);
    ASSERT_EQ(reading.faults.size(), 2U);
    EXPECT_EQ(reading.faults[0].pointer, "/a/x");
    EXPECT_EQ(reading.faults[0].line, 2);
    EXPECT_EQ(reading.faults[0].code, "duplicate-key");
    EXPECT_EQ(reading.faults[1].pointer, "/a/x/y");
    EXPECT_EQ(reading.root.find("a")->find("x")->number, 1.0);
    EXPECT_EQ(reading.root.find("b")->number, 2.0);
}

TEST(JsonTree, StopsAtHostileNesting) {
    const JsonReading reading = read_json(std::string(1'000'000, '['));
    EXPECT_FALSE(reading.complete);
    ASSERT_EQ(reading.faults.size(), 1U);
    EXPECT_NE(reading.faults[0].found.find("levels"), std::string::npos);
}

TEST(JsonTree, EscapesPointersAsRfc6901) {  // RFC 6901, section 3: ~ is ~0, / is ~1
    EXPECT_EQ(step_into("/tags", "a/b~c"), "/tags/a~1b~0c");
    EXPECT_EQ(step_into("/pumps", std::size_t{3}), "/pumps/3");
}

TEST(JsonTree, DescribesWhatStandsThere) {
    const JsonReading reading = read_json("[null, false, 1e3, \"x\", [1, 2], {}]");
    ASSERT_TRUE(reading.complete);
    const std::vector<std::string> wanted{"null", "false", "1e3", "\"x\"", "a list of 2", "an object"};
    for (std::size_t i = 0; i < wanted.size(); ++i) EXPECT_EQ(describe(reading.root.items[i]), wanted[i]);
}

}  // namespace
}  // namespace slipledger::config
