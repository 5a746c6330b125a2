#include "schema/schema.hpp"

#include <gtest/gtest.h>

#include <nlohmann/json.hpp>

namespace slipledger::schema {
namespace {

TEST(EmbeddedSchemas, AreJson) {
    for (const std::string_view text : {plant_schema(), reading_schema(), alert_schema()}) {
        const auto json = nlohmann::json::parse(text, nullptr, false);
        ASSERT_TRUE(json.is_object());
        EXPECT_EQ(json.at("$schema"), "https://json-schema.org/draft/2020-12/schema");
    }
}

TEST(EmbeddedMigrations, AreNumberedWithoutAGapFromOne) {
    const std::vector<Migration> migrations = ledger_migrations();
    ASSERT_FALSE(migrations.empty());
    for (std::size_t i = 0; i < migrations.size(); ++i) {
        EXPECT_EQ(migrations[i].number, static_cast<int>(i) + 1) << migrations[i].name;
        EXPECT_FALSE(migrations[i].sql.empty());
    }
}

TEST(EmbeddedTexts, AreFoundByName) {
    EXPECT_EQ(text_named("no-such-file"), "");
}

}  // namespace
}  // namespace slipledger::schema
