#include "daemon/intake/ndjson_line.hpp"

#include <string>

#include <gtest/gtest.h>

namespace slipledger::intake {
namespace {

TEST(NdjsonLine, ReadsKeysNumbersTextsTruthsAndNothing) {
    NdjsonLine ndjson;
    const auto row = ndjson.read(R"({"time":"2026-03-01T06:00:00Z","p":182.4,"n":-3,"running":true,"x":null})");
    ASSERT_TRUE(row) << row.error().message();
    ASSERT_EQ(row->size(), 5U);
    EXPECT_EQ((*row)[0].text, "2026-03-01T06:00:00Z");
    EXPECT_EQ((*row)[1].number, 182.4);
    EXPECT_EQ((*row)[1].text, "182.4");
    EXPECT_EQ((*row)[2].number, -3.0);
    EXPECT_EQ((*row)[3].kind, JsonField::Kind::truth);
    EXPECT_EQ((*row)[4].kind, JsonField::Kind::nothing);
}

TEST(NdjsonLine, ForgetsTheLongerRowBefore) {
    NdjsonLine ndjson;
    ASSERT_TRUE(ndjson.read(R"({"a":1,"b":2,"c":3})"));
    const auto row = ndjson.read(R"({"d":4})");
    ASSERT_TRUE(row);
    ASSERT_EQ(row->size(), 1U);
    EXPECT_EQ((*row)[0].key, "d");
}

struct Refused {
    std::string name;
    std::string line;
    Reason reason;
};

class NdjsonLineRefuses : public testing::TestWithParam<Refused> {};

TEST_P(NdjsonLineRefuses, WithItsReason) {
    NdjsonLine ndjson;
    const auto row = ndjson.read(GetParam().line);
    ASSERT_FALSE(row);
    EXPECT_EQ(row.error().reason, GetParam().reason) << row.error().message();
}

INSTANTIATE_TEST_SUITE_P(
    Lines, NdjsonLineRefuses,
    testing::Values(Refused{"KeyTwice", R"({"a":1,"a":2})", Reason::duplicate_key},
                    Refused{"KeyTwiceByEscape", R"({"a":1,"\u0061":2})", Reason::duplicate_key},
                    Refused{"ObjectInside", R"({"a":{"b":1}})", Reason::bad_syntax},
                    Refused{"ListInside", R"({"a":[1]})", Reason::bad_syntax},
                    Refused{"List", "[1,2]", Reason::bad_syntax}, Refused{"NumberAlone", "42", Reason::bad_syntax},
                    Refused{"TwoObjects", "{\"a\":1}{\"a\":1}", Reason::bad_syntax},
                    Refused{"CutOff", R"({"a":1)", Reason::bad_syntax},
                    Refused{"NotANumber", R"({"a":NaN})", Reason::bad_syntax},
                    Refused{"TooLargeANumber", R"({"a":1e999})", Reason::bad_syntax},
                    Refused{"DeepNest", std::string(30000, '['), Reason::bad_syntax},
                    Refused{"NotUtf8", "{\"a\":\"\xff\"}", Reason::bad_syntax}),
    [](const auto& each) { return each.param.name; });

TEST(NdjsonLine, RefusesMoreKeysThanARowCanHave) {
    std::string line = "{\"k\":1";
    for (int i = 0; i < 300; ++i) line += ",\"k" + std::to_string(i) + "\":1";
    NdjsonLine ndjson;
    EXPECT_FALSE(ndjson.read(line + "}"));
}

}  // namespace
}  // namespace slipledger::intake
