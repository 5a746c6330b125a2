#include "schema/schema.hpp"

#include <charconv>

#include "schema/embedded.hpp"

namespace slipledger::schema {

std::vector<Migration> ledger_migrations() {
    constexpr std::string_view folder = "ledger/";
    std::vector<Migration> migrations;
    for (const Text& text : embedded_texts()) {  // sorted by name, so numbers written with equal width ascend
        if (!text.name.starts_with(folder)) continue;
        Migration migration{.number = 0, .name = text.name.substr(folder.size()), .sql = text.text};
        std::from_chars(migration.name.data(), migration.name.data() + migration.name.size(), migration.number);
        migrations.push_back(migration);
    }
    return migrations;
}

std::string_view plant_schema() {
    return text_named("plant.schema.json");
}
std::string_view reading_schema() {
    return text_named("reading.schema.json");
}
std::string_view alert_schema() {
    return text_named("alert.schema.json");
}

std::string_view text_named(std::string_view name) {
    for (const Text& text : embedded_texts())
        if (text.name == name) return text.text;
    return {};
}

}  // namespace slipledger::schema
