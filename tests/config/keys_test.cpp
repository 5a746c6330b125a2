#include "config/keys.hpp"

#include <gtest/gtest.h>

#include <filesystem>
#include <fstream>
#include <iterator>
#include <nlohmann/json.hpp>
#include <set>

#include "schema/schema.hpp"
#include "tests/config/documented_keys.hpp"

namespace slipledger::config {
namespace {

std::string text_of(const std::filesystem::path& path) {
    std::ifstream file(path);
    return {std::istreambuf_iterator<char>(file), {}};
}

// Where the wanted text can be taken from when a key was added.
std::string leave_for_copying(const std::string& name, const std::string& text) {
    const auto path = std::filesystem::path(testing::TempDir()) / name;
    std::ofstream(path) << text;
    return "what it must hold was written to " + path.string();
}

TEST(Keys, AreTheSameInTheJsonSchemaAsInTheReader) {
    const std::string wanted = schema_of_keys();
    const auto published = nlohmann::json::parse(schema::plant_schema(), nullptr, false);
    ASSERT_FALSE(published.is_discarded()) << leave_for_copying("plant.schema.json", wanted);
    EXPECT_EQ(published, nlohmann::json::parse(wanted)) << leave_for_copying("plant.schema.json", wanted);
}

TEST(Keys, AreTheSameInTheReadmeAsInTheReader) {
    const std::string readme = text_of(std::filesystem::path(SLIPLEDGER_SOURCE_DIR) / "config/README.md");
    const std::string wanted = tables_of_keys();
    EXPECT_NE(readme.find(wanted), std::string::npos) << leave_for_copying("config-keys.md", wanted);
}

TEST(Keys, StandOnceInEachObject) {
    std::set<std::pair<std::string_view, std::string_view>> seen;
    for (const Key& key : plant_keys())
        EXPECT_TRUE(seen.emplace(key.object, key.name).second) << key.object << "/" << key.name;
}

TEST(Keys, NameOnlyObjectsThatHaveKeys) {
    for (const Key& key : plant_keys()) {
        const bool nested = key.kind == KeyKind::object || key.kind == KeyKind::list || key.kind == KeyKind::map;
        EXPECT_EQ(nested, !key_names(key.of).empty()) << key.object << "/" << key.name;
    }
}

TEST(Keys, SayWhatIsWantedWithUnitRangeAndMeaning) {
    EXPECT_EQ(wanted_for(*find_key("section", "displacement_cm3")),
              "a number in cm3/rev above 0, up to 10000: name plate displacement");
    EXPECT_EQ(wanted_for(*find_key("pump", "drain")), "one of external, internal: where its case leakage goes");
    EXPECT_EQ(wanted_for(*find_key("economics", "motor_efficiency")),
              "a number in fraction from 0.3 to 1: of the pump's motor");
    EXPECT_EQ(find_key("pump", "colour"), nullptr);
}

}  // namespace
}  // namespace slipledger::config
