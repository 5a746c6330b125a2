// Source: RFC 4180, section 2 (rules 1 to 7 and their examples), from memory.
#include "daemon/intake/csv_line.hpp"

#include <string>
#include <vector>

#include <gtest/gtest.h>

namespace slipledger::intake {
namespace {

struct Case {
    std::string name;
    std::string line;
    char delimiter;
    std::vector<std::string> fields;
};

class CsvLineSplits : public testing::TestWithParam<Case> {};

TEST_P(CsvLineSplits, IntoItsFields) {
    CsvLine csv(GetParam().delimiter);
    const auto fields = csv.split(GetParam().line);
    ASSERT_TRUE(fields) << fields.error().message();
    EXPECT_EQ(std::vector<std::string>(fields->begin(), fields->end()), GetParam().fields);
}

INSTANTIATE_TEST_SUITE_P(
    Rfc4180, CsvLineSplits,
    testing::Values(Case{"Rule1Plain", "aaa,bbb,ccc", ',', {"aaa", "bbb", "ccc"}},
                    Case{"Rule4SpacesBelongToTheField", "a ,  b", ',', {"a ", "  b"}},
                    Case{"Rule5Quoted", R"("aaa","bbb","ccc")", ',', {"aaa", "bbb", "ccc"}},
                    Case{"Rule6DelimiterInside", R"("a,a",b)", ',', {"a,a", "b"}},
                    Case{"Rule7DoubledQuote", R"("aaa","b""bb","ccc")", ',', {"aaa", "b\"bb", "ccc"}},
                    Case{"OnlyDoubledQuotes", R"("""""",x)", ',', {"\"\"", "x"}},
                    Case{"EmptyQuoted", R"("",b)", ',', {"", "b"}},
                    Case{"EmptyFieldsAtTheEnds", ",b,", ',', {"", "b", ""}},
                    Case{"Semicolon", "1,5;2", ';', {"1,5", "2"}}, Case{"Tab", "a\tb", '\t', {"a", "b"}},
                    Case{"QuoteInsidePlainFieldStays", "a\"b,c", ',', {"a\"b", "c"}},
                    Case{"OneField", "a", ',', {"a"}}),
    [](const auto& each) { return each.param.name; });

TEST(CsvLine, RefusesAQuotedFieldThatGoesOnInTheNextLine) {
    CsvLine csv(',');
    const auto fields = csv.split("a,\"b");
    ASSERT_FALSE(fields);
    EXPECT_EQ(fields.error().reason, Reason::bad_quote);
}

TEST(CsvLine, RefusesTextBehindAClosingQuote) {
    CsvLine csv(',');
    const auto fields = csv.split("\"a\"b,c");
    ASSERT_FALSE(fields);
    EXPECT_EQ(fields.error().reason, Reason::bad_quote);
}

TEST(CsvLine, KeepsEveryUnescapedFieldInPlaceWhileOthersFollow) {
    CsvLine csv(',');
    std::string line;
    for (int i = 0; i < 50; ++i) line += (i == 0 ? "\"" : ",\"") + std::to_string(i) + "\"\"\"";
    const auto fields = csv.split(line);
    ASSERT_TRUE(fields);
    for (std::size_t i = 0; i < 50; ++i) EXPECT_EQ((*fields)[i], std::to_string(i) + "\"");
}

}  // namespace
}  // namespace slipledger::intake
