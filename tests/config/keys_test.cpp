#include "config/keys.hpp"

#include <gtest/gtest.h>

#include <filesystem>
#include <fstream>
#include <iterator>
#include <map>
#include <nlohmann/json.hpp>
#include <optional>
#include <set>

#include "config/plant_reader.hpp"
#include "config/written_values.hpp"
#include "schema/schema.hpp"
#include "tests/config/documented_keys.hpp"
#include "tests/config/patched_plant.hpp"

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

// The plant the defaults are tried in: every object whose keys have defaults is there.
nlohmann::json plant_for_defaults() {
    auto plant = nlohmann::json::parse(sound_plant());
    plant["economics"] = {{"energy_price_per_kwh", 0.2}, {"currency", "EUR"}};
    plant["pumps"][0]["spare"] = {{"part_number", "RG-71"}};
    plant["pumps"][0]["replacement"] = nlohmann::json::object();
    plant["pumps"][0]["sensors"]["delivery_flow"] = nlohmann::json::object();
    return plant;
}

std::string place_of(const Key& key) {
    const std::map<std::string_view, std::string> places{
        {"plant", ""},
        {"store", "/store"},
        {"fluid", "/fluids/site oil"},
        {"pump", "/pumps/1"},
        {"section", "/pumps/1/sections/0"},
        {"motor", "/pumps/0/motor"},
        {"steady", "/pumps/0/steady"},
        {"baseline", "/pumps/0/baseline"},
        {"limits", "/pumps/0/limits"},
        {"sensor", "/pumps/0/sensors/delivery_flow"},
        {"spare", "/pumps/0/spare"},
        {"replacement", "/pumps/0/replacement"},
        {"feed", key.name == "reply" || key.name == "idle_timeout" ? "/feeds/0" : "/feeds/1"},
        {"target", "/feeds/1/columns/P"},
        {"webhook", "/alerts/webhooks/0"},
        {"economics", "/economics"},
    };
    return places.at(key.object) + "/" + std::string(key.name);
}

// The default as a value that can be written into a plant file; none where the table only describes it.
std::optional<nlohmann::json> written_default(const Key& key) {
    const bool is_word = key.kind == KeyKind::choice || key.kind == KeyKind::duration;
    const bool is_value = key.kind == KeyKind::number || key.kind == KeyKind::whole || key.kind == KeyKind::truth;
    const std::vector<std::string_view> words = words_of(key);
    if (key.kind == KeyKind::choice && std::ranges::find(words, key.fallback) == words.end()) return std::nullopt;
    if (key.kind == KeyKind::duration && !parse_duration(key.fallback)) return std::nullopt;
    if (is_word) return nlohmann::json(key.fallback);
    const auto value = nlohmann::json::parse(key.fallback, nullptr, false);
    return is_value && !value.is_discarded() ? std::optional(value) : std::nullopt;
}

TEST(Keys, HaveTheDefaultsTheTableSays) {
    const PlantReading without = read_plant(plant_for_defaults().dump());
    ASSERT_TRUE(without) << told(without);
    int tried = 0;
    for (const Key& key : plant_keys()) {
        const auto value = written_default(key);
        if (!value) continue;
        auto plant = plant_for_defaults();
        plant[nlohmann::json::json_pointer(place_of(key))] = *value;
        const PlantReading with = read_plant(plant.dump());
        ASSERT_TRUE(with) << place_of(key) << "\n" << told(with);
        EXPECT_EQ(*with.plant, *without.plant) << place_of(key) << " = " << *value;
        ++tried;
    }
    EXPECT_GE(tried, 40);
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
