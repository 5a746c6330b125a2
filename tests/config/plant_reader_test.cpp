#include "config/plant_reader.hpp"

#include <gmock/gmock.h>
#include <gtest/gtest.h>

#include <random>

#include "tests/config/patched_plant.hpp"

namespace slipledger::config {
namespace {

using namespace std::chrono_literals;
using analytics::Quantity;

TEST(PlantReader, FillsInWhatTheFileLeavesOut) {
    const PlantReading reading = read_plant(sound_plant());
    ASSERT_TRUE(reading) << told(reading);
    const Plant& plant = *reading.plant;
    EXPECT_EQ(plant.name, "Test plant");
    EXPECT_EQ(plant.summary_minutes, 60);
    EXPECT_EQ(plant.lateness, 10min);
    EXPECT_EQ(plant.store.raw_days, 400);
    const Pump& press = *plant.find_pump("press-2");
    EXPECT_EQ(press.name, "press-2");
    EXPECT_EQ(press.fluid.name, "HLP 46");
    EXPECT_EQ(press.fluid.viscosity_index, 100.0);
    EXPECT_EQ(press.drain, Drain::external);
    EXPECT_EQ(press.minimum_speed_rpm, 0.0);
    EXPECT_EQ(plant.find_pump("nobody"), nullptr);
}

TEST(PlantReader, GivesAPumpWithoutSectionsOneCalledA) {
    const PlantReading reading = read_plant(sound_plant());
    ASSERT_TRUE(reading) << told(reading);
    const Pump& press = reading.plant->pumps[0];
    ASSERT_EQ(press.sections.size(), 1U);
    const Section& section = press.sections[0];
    EXPECT_EQ(section.id, "A");
    EXPECT_EQ(section.displacement_cm3, 71.0);
    EXPECT_EQ(section.compensator_bar, 250.0);
    EXPECT_EQ(section.sensors.at(Quantity::case_drain_flow).range_high, 40.0);
    EXPECT_EQ(section.limits, default_limits(analytics::PumpType::axial_piston));
}

TEST(PlantReader, LaysASectionsOwnFactsOverItsPumps) {
    const PlantReading reading = read_plant(sound_plant());
    ASSERT_TRUE(reading) << told(reading);
    const Pump& saw = reading.plant->pumps[1];
    ASSERT_EQ(saw.sections.size(), 2U);
    EXPECT_EQ(saw.minimum_speed_rpm, 600.0);  // vane pumps, common practice
    EXPECT_EQ(saw.find_section("A")->displacement_cm3, 55.0);
    EXPECT_EQ(saw.find_section("B")->displacement_cm3, 28.0);
    EXPECT_EQ(saw.find_section("B")->rated, (Duty{140.0, 1480.0, 50.0}));
    EXPECT_EQ(saw.find_section("C"), nullptr);
}

TEST(PlantReader, QuotesTheRatioAtThreeQuartersOfRatedPressureUnlessToldOtherwise) {
    const PlantReading plain = read_plant(sound_plant());
    ASSERT_TRUE(plain) << told(plain);
    EXPECT_EQ(plain.plant->pumps[1].sections[1].reference, (Duty{105.0, 1480.0, 50.0}));
    const PlantReading told_so =
        read_patched(R"([{"op": "add", "path": "/pumps/1/reference", "value": {"pressure_bar": 100}},
                         {"op": "add", "path": "/pumps/1/sections/1/reference", "value": {"fluid_temperature_c": 45}}])");
    ASSERT_TRUE(told_so) << told(told_so);
    EXPECT_EQ(told_so.plant->pumps[1].sections[0].reference, (Duty{100.0, 1480.0, 50.0}));
    EXPECT_EQ(told_so.plant->pumps[1].sections[1].reference, (Duty{100.0, 1480.0, 45.0}));
}

TEST(PlantReader, LaysLimitsInOrderTypePlantPumpSection) {
    const PlantReading reading = read_patched(
        R"([{"op": "add", "path": "/alerts/limits", "value": {"leakage_ratio": {"plan": 1.8, "act": 2.5}}},
            {"op": "add", "path": "/pumps/1/limits", "value": {"leakage_ratio": {"act": 2.8}}},
            {"op": "add", "path": "/pumps/1/sections/1/limits", "value": {"leakage_ratio": {"watch": 1.3, "on_delay": "2 d"}}}])");
    ASSERT_TRUE(reading) << told(reading);
    const Ladder& of_b = reading.plant->pumps[1].sections[1].limits.leakage_ratio;
    EXPECT_EQ(of_b.watch, 1.3);
    EXPECT_EQ(of_b.plan, 1.8);
    EXPECT_EQ(of_b.act, 2.8);
    EXPECT_EQ(of_b.on_delay, 48h);
    EXPECT_EQ(reading.plant->pumps[0].sections[0].limits.leakage_ratio.act, 2.5);
    EXPECT_EQ(reading.plant->pumps[0].sections[0].limits.leakage_ratio.watch, 1.17);  // method.md, built in
}

TEST(PlantReader, ReadsFeedsWithTheirMapping) {
    const PlantReading reading = read_patched(
        R"([{"op": "add", "path": "/feeds/1/time", "value": {"column": "Zeit", "pattern": "%d.%m.%Y %H:%M"}},
            {"op": "add", "path": "/feeds/1/delimiter", "value": "tab"},
            {"op": "add", "path": "/feeds/1/layout", "value": "long"},
            {"op": "add", "path": "/feeds/1/columns/P/section", "value": "A"},
            {"op": "add", "path": "/feeds/1/corrects", "value": "hall"}])");
    ASSERT_TRUE(reading) << told(reading);
    const Feed& hall = reading.plant->feeds[0];
    EXPECT_EQ(hall.listen, (Endpoint{"127.0.0.1", 7310}));
    EXPECT_EQ(hall.format, FeedFormat::ndjson);
    EXPECT_EQ(hall.tags.at("HPU2.PT1").unit, "psi");
    EXPECT_EQ(hall.time.zone, "Europe/Berlin");
    const Feed& files = reading.plant->feeds[1];
    EXPECT_EQ(files.format, FeedFormat::csv);
    EXPECT_EQ(files.layout, CsvLayout::tall);
    EXPECT_EQ(files.delimiter, '\t');
    EXPECT_EQ(files.section, "B");
    EXPECT_EQ(files.corrects, "hall");
    EXPECT_EQ(files.columns.at("P").quantity, Quantity::outlet_pressure);
    EXPECT_EQ(files.columns.at("P").section, "A");  // of the feed's pump
    EXPECT_EQ(files.time.pattern, "%d.%m.%Y %H:%M");
}

TEST(PlantReader, BeginsAPlannedStopAtMidnightInThePlant) {
    const PlantReading reading = read_plant(sound_plant());
    ASSERT_TRUE(reading) << told(reading);
    // Europe/Berlin is two hours ahead of UTC in August.
    EXPECT_EQ(reading.plant->planned_stops[0].from, analytics::Instant{std::chrono::sys_days{2026y / 8 / 2} + 22h});
}

TEST(PlantReader, TellsEveryFaultAtOnceInTheFilesOrder) {
    const PlantReading reading = read_plant(R"({
      "plant": "P", "lateness": 10,
      "reservoirs": [{"id": "tank", "fluid": "HLP 45"}],
      "pumps": [
        {"id": "a b", "reservoir": "tonk",
         "type": "axial", "displacment_cm3": 71,
         "rated": {"pressure_bar": -1, "speed_rpm": 1480, "fluid_temperature_c": 50}}]})");
    EXPECT_FALSE(reading);
    std::vector<std::string> lines;
    for (const Fault& fault : reading.faults) lines.push_back(format_fault(fault));
    EXPECT_THAT(
        lines,
        testing::ElementsAre(
            "/lateness (line 2): 10; wanted a duration such as \"10 min\" (ms, s, min, h, d): how long after its end a "
            "summary waits for late rows (wrong-type)",
            "/reservoirs/0/fluid (line 3): \"HLP 45\"; wanted the name of a fluid (built in, or under \"fluids\") of "
            "this "
            "file; perhaps \"HLP 15\" (unknown-reference)",
            "/pumps/0/id (line 5): \"a b\"; wanted up to 64 letters, digits, dots, dashes and underscores (bad-name)",
            "/pumps/0/reservoir (line 5): \"tonk\"; wanted the name of a reservoir of this file; perhaps \"tank\" "
            "(unknown-reference)",
            "/pumps/0/displacement_cm3 (line 5): nothing stands here; wanted a number in cm3/rev above 0, up to 10000: "
            "name "
            "plate displacement (missing)",
            "/pumps/0/displacment_cm3 (line 6): unknown key \"displacment_cm3\"; wanted \"displacement_cm3\", which is "
            "the "
            "nearest known key (unknown-key)",
            "/pumps/0/type (line 6): \"axial\"; wanted one of axial-piston, radial-piston, vane, external-gear, "
            "internal-gear: kind of pump (not-a-choice)",
            "/pumps/0/rated/pressure_bar (line 7): -1; wanted a number in bar above 0, up to 1000: outlet pressure "
            "(out-of-range)"));
}

TEST(PlantReader, TellsOnceWhatAPumpSaysWronglyOfAllItsSections) {
    const PlantReading reading = read_patched(R"([{"op": "add", "path": "/pumps/1/compensator_bar", "value": 200}])");
    ASSERT_EQ(reading.faults.size(), 1U) << told(reading);
    EXPECT_EQ(reading.faults[0].pointer, "/pumps/1/compensator_bar");
}

TEST(PlantReader, TellsThatAFileCannotBeRead) {
    const PlantReading reading = read_plant_file("no-such-folder/plant.json");
    ASSERT_EQ(reading.faults.size(), 1U);
    EXPECT_EQ(reading.faults[0].code, "unreadable");
    EXPECT_FALSE(read_plant_file("/"));
}

TEST(PlantReader, SurvivesAFileCutOrSpoiledAnywhere) {
    const std::string whole = sound_plant();
    for (std::size_t length = 0; length < whole.size(); length += 7) {
        const PlantReading reading = read_plant(std::string_view(whole).substr(0, length));
        EXPECT_EQ(reading.plant.has_value(), reading.faults.empty());
        EXPECT_FALSE(reading) << "cut at " << length;
    }
    std::mt19937 random(20260301);
    for (int round = 0; round < 3000; ++round) {
        std::string spoiled = whole;
        for (int i = 0; i < 3; ++i) spoiled[random() % spoiled.size()] = static_cast<char>(random() % 256);
        const PlantReading reading = read_plant(spoiled);
        EXPECT_EQ(reading.plant.has_value(), reading.faults.empty()) << "round " << round << " of seed 20260301";
    }
}

struct Spoiled {
    const char* name;
    const char* patch;
    const char* pointer;
    const char* code;
};

class SpoiledPlant : public testing::TestWithParam<Spoiled> {};

TEST_P(SpoiledPlant, HasThatOneFault) {
    const PlantReading reading = read_patched(GetParam().patch);
    EXPECT_FALSE(reading);
    ASSERT_EQ(reading.faults.size(), 1U) << told(reading);
    EXPECT_EQ(reading.faults[0].pointer, GetParam().pointer);
    EXPECT_EQ(reading.faults[0].code, GetParam().code);
    EXPECT_FALSE(reading.faults[0].found.empty());
    EXPECT_FALSE(reading.faults[0].wanted.empty());
}

constexpr Spoiled spoiled[] = {
    {"UnknownKeyAtTheTop", R"([{"op":"add","path":"/colour","value":1}])", "/colour", "unknown-key"},
    {"UnknownKeyDeepDown", R"([{"op":"add","path":"/pumps/0/rated/pressure","value":1}])", "/pumps/0/rated/pressure",
     "unknown-key"},
    {"PlantWithoutName", R"([{"op":"remove","path":"/plant"}])", "/plant", "missing"},
    {"PlantThatIsAList", R"([{"op":"replace","path":"","value":[]}])", "", "wrong-type"},
    {"UnknownTimeZone", R"([{"op":"replace","path":"/time_zone","value":"Europe/Berlim"}])", "/time_zone", "bad-zone"},
    {"SummaryThatDoesNotDivideAnHour", R"([{"op":"add","path":"/summary_minutes","value":7}])", "/summary_minutes",
     "out-of-range"},
    {"SummaryOfHalfAMinute", R"([{"op":"add","path":"/summary_minutes","value":2.5}])", "/summary_minutes",
     "wrong-type"},
    {"DurationWithoutUnit", R"([{"op":"add","path":"/lateness","value":"10"}])", "/lateness", "bad-duration"},
    {"MoreHoursThanAWeekHas", R"([{"op":"replace","path":"/duty_h_per_week","value":169}])", "/duty_h_per_week",
     "out-of-range"},
    {"StoreThatKeepsNothing", R"([{"op":"add","path":"/store","value":{"raw_days":0}}])", "/store/raw_days",
     "out-of-range"},
    {"OilWithoutViscosity", R"([{"op":"add","path":"/fluids/other","value":{}}])", "/fluids/other", "implausible"},
    {"OilWithAGradeThatDoesNotExist",
     R"([{"op":"add","path":"/fluids/other","value":{"iso_vg":47,"viscosity_index":100}}])", "/fluids/other/iso_vg",
     "out-of-range"},
    {"OilWithoutIndex", R"([{"op":"add","path":"/fluids/other","value":{"iso_vg":46}}])",
     "/fluids/other/viscosity_index", "missing"},
    {"OilThatThickensWhenHot", R"([{"op":"replace","path":"/fluids/site oil/points/1/viscosity_cst","value":50}])",
     "/fluids/site oil/points", "implausible"},
    {"OilOfOnePoint", R"([{"op":"remove","path":"/fluids/site oil/points/1"}])", "/fluids/site oil/points",
     "implausible"},
    {"UnknownFluid", R"([{"op":"replace","path":"/reservoirs/0/fluid","value":"water"}])", "/reservoirs/0/fluid",
     "unknown-reference"},
    {"ReservoirTwice", R"([{"op":"replace","path":"/reservoirs","value":[{"id":"tank","fluid":"HLP 46"},
      {"id":"small-tank","fluid":"HLP 46"},{"id":"tank","fluid":"HLP 46"}]}])",
     "/reservoirs/2/id", "duplicate-name"},
    {"PumpTwice", R"([{"op":"replace","path":"/pumps/1/id","value":"press-2"},
                      {"op":"remove","path":"/feeds/1"}])",
     "/pumps/1/id", "duplicate-name"},
    {"UnknownReservoir", R"([{"op":"replace","path":"/pumps/0/reservoir","value":"lake"}])", "/pumps/0/reservoir",
     "unknown-reference"},
    {"NoPumps", R"([{"op":"replace","path":"/pumps","value":[]},{"op":"remove","path":"/planned_stops"},
                    {"op":"remove","path":"/feeds"}])",
     "/pumps", "empty"},
    {"PumpWithoutType", R"([{"op":"remove","path":"/pumps/0/type"}])", "/pumps/0/type", "missing"},
    {"PumpWithoutDisplacement", R"([{"op":"remove","path":"/pumps/0/displacement_cm3"}])", "/pumps/0/displacement_cm3",
     "missing"},
    {"SectionWithoutDisplacement", R"([{"op":"remove","path":"/pumps/1/displacement_cm3"}])",
     "/pumps/1/sections/0/displacement_cm3", "missing"},
    {"RatedPointWithoutTemperature", R"([{"op":"remove","path":"/pumps/0/rated/fluid_temperature_c"}])",
     "/pumps/0/rated", "missing"},
    {"PressureAsText", R"([{"op":"replace","path":"/pumps/0/rated/pressure_bar","value":"280"}])",
     "/pumps/0/rated/pressure_bar", "wrong-type"},
    {"SectionTwice", R"([{"op":"replace","path":"/pumps/1/sections/0/id","value":"B"}])", "/pumps/1/sections/1/id",
     "duplicate-name"},
    {"NoSections", R"([{"op":"replace","path":"/pumps/1/sections","value":[]},{"op":"remove","path":"/feeds/1"}])",
     "/pumps/1/sections", "empty"},
    {"SensorOfUnknownQuantity", R"([{"op":"add","path":"/pumps/0/sensors/drain_flow","value":{}}])",
     "/pumps/0/sensors/drain_flow", "unknown-quantity"},
    {"SensorWithItsRangeUpsideDown",
     R"([{"op":"replace","path":"/pumps/0/sensors/case_drain_flow/range","value":[40,0]}])",
     "/pumps/0/sensors/case_drain_flow/range", "wrong-type"},
    {"LimitsThatFall", R"([{"op":"add","path":"/pumps/0/limits","value":{"leakage_ratio":{"plan":4}}}])",
     "/pumps/0/limits/leakage_ratio", "implausible"},
    {"PlantLimitsThatFall", R"([{"op":"add","path":"/alerts/limits","value":{"leakage_ratio":{"plan":4}}}])",
     "/alerts/limits/leakage_ratio", "implausible"},
    {"LearningThatEndsTooEarly", R"([{"op":"add","path":"/pumps/0/baseline","value":{"min_h":50,"max_h":50}}])",
     "/pumps/0/baseline/max_h", "implausible"},
    {"MakerTestWithoutLeakage", R"([{"op":"add","path":"/pumps/0/maker_test","value":{"points":
      [{"pressure_bar":280,"speed_rpm":1480,"viscosity_cst":32}]}}])",
     "/pumps/0/maker_test/points/0/case_drain_lpm", "missing"},
    {"SinceAtNoTime", R"([{"op":"add","path":"/pumps/0/since","value":"last week"}])", "/pumps/0/since", "bad-time"},
    {"DrainGroupOfOne", R"([{"op":"add","path":"/pumps/0/drain_group","value":"hall"}])", "/pumps",
     "unknown-reference"},
    {"StopThatEndsBeforeItBegins", R"([{"op":"replace","path":"/planned_stops/0/to","value":"2026-08-03"}])",
     "/planned_stops/0/to", "implausible"},
    {"StopOfAnUnknownArea", R"([{"op":"replace","path":"/planned_stops/0/areas","value":["moon"]}])",
     "/planned_stops/0/areas", "unknown-reference"},
    {"FeedTwice", R"([{"op":"replace","path":"/feeds/1/id","value":"hall"}])", "/feeds/1/id", "duplicate-name"},
    {"FeedWithoutKind", R"([{"op":"remove","path":"/feeds/0/kind"}])", "/feeds/0/kind", "missing"},
    {"ListenerWithoutAddress", R"([{"op":"remove","path":"/feeds/0/listen"}])", "/feeds/0/listen", "missing"},
    {"ListenerWithoutPort", R"([{"op":"replace","path":"/feeds/0/listen","value":"127.0.0.1"}])", "/feeds/0/listen",
     "bad-address"},
    {"FolderOfAListener", R"([{"op":"add","path":"/feeds/0/folder","value":"in"}])", "/feeds/0/folder", "misplaced"},
    {"ReplyOfAFolder", R"([{"op":"add","path":"/feeds/1/reply","value":true}])", "/feeds/1/reply", "misplaced"},
    {"DelimiterOfNdjson", R"([{"op":"add","path":"/feeds/0/delimiter","value":";"}])", "/feeds/0/delimiter",
     "misplaced"},
    {"DelimiterThatIsTheDecimalSign", R"([{"op":"add","path":"/feeds/1/decimal","value":","}])", "/feeds/1/decimal",
     "implausible"},
    {"DelimiterOfTwoCharacters", R"([{"op":"add","path":"/feeds/1/delimiter","value":";;"}])", "/feeds/1/delimiter",
     "not-a-choice"},
    {"HeaderlessWithoutNames", R"([{"op":"add","path":"/feeds/1/header","value":false}])", "/feeds/1/header_names",
     "missing"},
    {"TimeInAnUnknownZone", R"([{"op":"add","path":"/feeds/1/time","value":{"zone":"CETT"}}])", "/feeds/1/time/zone",
     "bad-zone"},
    {"TimePatternWithoutFields", R"([{"op":"add","path":"/feeds/1/time","value":{"pattern":"dd.mm.yyyy"}}])",
     "/feeds/1/time/pattern", "not-a-choice"},
    {"FeedOfAnUnknownPump", R"([{"op":"replace","path":"/feeds/1/pump","value":"saw-2"}])", "/feeds/1/pump",
     "unknown-reference"},
    {"FeedOfAnUnknownSection", R"([{"op":"replace","path":"/feeds/1/section","value":"C"}])", "/feeds/1/section",
     "unknown-reference"},
    {"FeedOfASectionOfNoPump", R"([{"op":"remove","path":"/feeds/1/pump"}])", "/feeds/1/section", "missing"},
    {"ColumnOfAnUnknownSectionOfTheFeedsPump", R"([{"op":"add","path":"/feeds/1/columns/P/section","value":"C"}])",
     "/feeds/1/columns/P/section", "unknown-reference"},
    {"TagOfAnUnknownPump", R"([{"op":"replace","path":"/feeds/0/tags/HPU2.PT1/pump","value":"press2"}])",
     "/feeds/0/tags/HPU2.PT1/pump", "unknown-reference"},
    {"TagOfNoPlace", R"([{"op":"remove","path":"/feeds/0/tags/HPU2.PT1/pump"}])", "/feeds/0/tags/HPU2.PT1", "missing"},
    {"TagOfTwoPlaces", R"([{"op":"add","path":"/feeds/0/tags/HPU2.PT1/reservoir","value":"tank"}])",
     "/feeds/0/tags/HPU2.PT1", "implausible"},
    {"ColumnOfAnUnknownQuantity", R"([{"op":"replace","path":"/feeds/1/columns/P/quantity","value":"pressure"}])",
     "/feeds/1/columns/P/quantity", "unknown-quantity"},
    {"PressureInLitres", R"([{"op":"replace","path":"/feeds/0/tags/HPU2.PT1/unit","value":"L/min"}])",
     "/feeds/0/tags/HPU2.PT1/unit", "unknown-unit"},
    {"FeedThatCorrectsItself", R"([{"op":"add","path":"/feeds/0/corrects","value":"hall"}])", "/feeds/0/corrects",
     "unknown-reference"},
    {"TwoFeedsOnOneFolder", R"([{"op":"replace","path":"/feeds/0","value":{"id":"x","kind":"drop","folder":"in"}}])",
     "/feeds/1/folder", "duplicate-name"},
    {"WebhookWithoutScheme", R"([{"op":"replace","path":"/alerts/webhooks/0/url","value":"works.example/hook"}])",
     "/alerts/webhooks/0/url", "bad-address"},
    {"PagesWithoutPort", R"([{"op":"add","path":"/http","value":{"listen":"localhost"}}])", "/http/listen",
     "bad-address"},
    {"MoneyWithoutCurrency", R"([{"op":"add","path":"/economics","value":{"energy_price_per_kwh":0.21}}])",
     "/economics/currency", "missing"},
    {"FixedPumpThatMakesUpByStroke", R"([{"op":"add","path":"/pumps/1/makes_up_by","value":"stroke"}])",
     "/pumps/1/makes_up_by", "implausible"},
    {"NothingWhereTextIsWanted", R"([{"op":"add","path":"/alerts/log","value":""}])", "/alerts/log", "empty"},
    {"NullIsNoValue", R"([{"op":"add","path":"/pumps/0/relief_bar","value":null}])", "/pumps/0/relief_bar",
     "wrong-type"},
};

INSTANTIATE_TEST_SUITE_P(PlantFaults, SpoiledPlant, testing::ValuesIn(spoiled),
                         [](const auto& row) { return std::string(row.param.name); });

}  // namespace
}  // namespace slipledger::config
