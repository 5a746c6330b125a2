// A page of working as its steps and as laid out: what is printed is what a reader works with.
#include "daemon/report/work_sheet.hpp"

#include <gmock/gmock.h>
#include <gtest/gtest.h>

#include <nlohmann/json.hpp>
#include <sstream>

#include "daemon/report/render_working.hpp"

namespace slipledger::report {
namespace {

using testing::HasSubstr;

Working page_with(std::vector<WorkStep> steps) {
    WorkSheet sheet;
    sheet.chapter("Oil");
    for (WorkStep& step : steps) sheet.put(std::move(step));
    Working working;
    working.pump = "press-1";
    working.chapters = sheet.take();
    return working;
}

const WorkStep& last_step(const Working& working) {
    return working.chapters.back().steps.back();
}

TEST(WorkSheet, PutsTheNumbersAsPrintedIntoTheFormula) {
    const Working page =
        page_with({{.name = "temperature", .symbol = "t", .value = 48.6123456, .unit = "degC"},
                   {.name = "intercept", .symbol = "A", .value = 9.45582865217, .digits = 9},
                   {.name = "sum", .symbol = "s", .value = 331.2, .formula = "A + log10(t + 273.15)"}});
    EXPECT_EQ(last_step(page).numbers, "9.45582865 + log10(48.6123 + 273.15)");
}

TEST(WorkSheet, BracketsWhatIsBelowNoughtAndKnowsStandardDeviations) {
    const Working page =
        page_with({{.name = "wear", .symbol = "x", .value = -0.02, .sd = 0.011},
                   {.name = "low", .symbol = "w_low", .value = 0.966, .formula = "exp(x - 1.28 * sd_x)"}});
    EXPECT_EQ(last_step(page).numbers, "exp((-0.02) - 1.28 * 0.011)");
}

TEST(WorkSheet, TakesWholeNamesOnly) {
    const Working page = page_with({{.name = "a", .symbol = "p", .value = 200.0},
                                    {.name = "b", .symbol = "p_c", .value = 1.5},
                                    {.name = "c", .symbol = "dp", .value = 198.5, .formula = "p - p_c + exp(0)"}});
    EXPECT_EQ(last_step(page).numbers, "200 - 1.5 + exp(0)");
}

TEST(Written, CarriesSixDigitsAndNoMinusNought) {
    EXPECT_EQ(written(105.0832719), "105.083");
    EXPECT_EQ(written(-0.0), "0");
    EXPECT_EQ(written(analytics::unknown), "-");
}

TEST(WorkingText, FitsEightyColumnsHoweverLongAFormula) {
    const Working page = page_with({{.name = "slope", .symbol = "B", .value = 3.7},
                                    {.name = "a very long name that has no room in its column",
                                     .symbol = "nu",
                                     .value = 31.4215,
                                     .unit = "mm2/s",
                                     .formula = "10 ^ (10 ^ (B - B * log10(B + 273.15))) - 0.7 + B * B * B * B * B * B",
                                     .source = "a source that is told in quite a few words, and then in some more"}});
    std::istringstream lines(working_text(page, config::Plant{}, false));
    for (std::string line; std::getline(lines, line);) EXPECT_LE(line.size(), 80U) << line;
}

TEST(WorkingText, SaysWhyItEndsAndCarriesTheCautions) {
    Working page = page_with({});
    page.ends_because = "it is still run in.";
    const std::string text = working_text(page, config::Plant{}, false);
    EXPECT_THAT(text, HasSubstr("The working ends here: it is still run in.\n"));
    EXPECT_THAT(text, HasSubstr("lock out"));
}

TEST(WorkingText, MakesForeignTextPrintable) {
    Working page = page_with({{.name = "first point", .symbol = "t_1", .value = 40.0, .source = "oil\033[2J"}});
    page.pump_name = "press\033[1m";
    EXPECT_THAT(working_text(page, config::Plant{}, false), testing::Not(HasSubstr("\033")));
}

TEST(WorkingJson, IsAListOfStepsWithTheDigitsOfTheText) {
    const auto json = to_json(page_with(
        {{.name = "density", .symbol = "rho", .value = 852.912345, .unit = "kg/m3", .source = "D1250"},
         {.name = "twice", .symbol = "y", .value = 1705.82469, .formula = "2 * rho", .source = "definition"}}));
    const auto& step = json["steps"][1];
    EXPECT_EQ(json["steps"][0]["value"].dump(), "852.912");
    EXPECT_TRUE(json["steps"][0]["formula"].is_null());
    EXPECT_EQ(step["chapter"], "Oil");
    EXPECT_EQ(step["formula"], "2 * rho");
    EXPECT_EQ(step["numbers"], "2 * 852.912");
    EXPECT_EQ(step["value"].dump(), "1705.82");
    for (const char* key : {"pump", "section", "basis", "at", "summary", "life", "ends_because", "points", "cautions"})
        EXPECT_TRUE(json.contains(key)) << key;
}

}  // namespace
}  // namespace slipledger::report
