#include "tests/config/documented_keys.hpp"

#include <fmt/format.h>

#include <cmath>
#include <nlohmann/json.hpp>

#include "config/keys.hpp"

namespace slipledger::config {
namespace {

using Json = nlohmann::ordered_json;

constexpr std::string_view duration_pattern = "^[0-9]+(\\.[0-9]+)? ?(ms|s|min|h|d)$";
constexpr std::string_view time_pattern = "^[0-9]{4}-[0-9]{2}-[0-9]{2}(T.+)?$";

Json reference(std::string_view object) {
    return {{"$ref", fmt::format("#/$defs/{}", object)}};
}

void put_bounds(const Key& key, Json& json) {
    if (std::isfinite(key.low)) json[key.low_allowed ? "minimum" : "exclusiveMinimum"] = key.low;
    if (std::isfinite(key.high)) json["maximum"] = key.high;
}

Json type_of(const Key& key) {
    Json json;
    switch (key.kind) {
        case KeyKind::text:
            return {{"type", "string"}, {"minLength", 1}};
        case KeyKind::texts:
            return {{"type", "array"}, {"items", {{"type", "string"}}}};
        case KeyKind::number:
        case KeyKind::whole:
            json["type"] = key.kind == KeyKind::whole ? "integer" : "number";
            put_bounds(key, json);
            return json;
        case KeyKind::pair:
            return {{"type", "array"}, {"items", {{"type", "number"}}}, {"minItems", 2}, {"maxItems", 2}};
        case KeyKind::truth:
            return {{"type", "boolean"}};
        case KeyKind::choice:
            return {{"enum", words_of(key)}};
        case KeyKind::duration:
            return {{"type", "string"}, {"pattern", duration_pattern}};
        case KeyKind::time:
            return {{"type", "string"}, {"pattern", time_pattern}};
        case KeyKind::object:
            return reference(key.of);
        case KeyKind::list:
            return {{"type", "array"}, {"items", reference(key.of)}};
        case KeyKind::map:
            return {{"type", "object"}, {"additionalProperties", reference(key.of)}};
    }
    return json;
}

std::vector<std::string_view> objects() {
    std::vector<std::string_view> names;
    for (const Key& key : plant_keys())
        if (std::ranges::find(names, key.object) == names.end()) names.push_back(key.object);
    return names;
}

Json schema_of(std::string_view object) {
    Json properties = Json::object();
    Json required = Json::array();
    for (const Key& key : plant_keys()) {
        if (key.object != object) continue;
        Json property = type_of(key);
        property["description"] = key.meaning;
        properties[std::string(key.name)] = property;
        if (key.fallback == "required") required.push_back(key.name);
    }
    Json json{{"type", "object"}, {"additionalProperties", false}, {"properties", properties}};
    if (!required.empty()) json["required"] = required;
    return json;
}

std::string unit_or_kind(const Key& key) {
    switch (key.kind) {
        case KeyKind::number:
        case KeyKind::whole:
            return key.of.empty() ? "number" : std::string(key.of);
        case KeyKind::pair:
            return "[low, high]";
        case KeyKind::truth:
            return "true, false";
        case KeyKind::choice:
            return fmt::format("{}", fmt::join(words_of(key), ", "));
        case KeyKind::text:
            return "text";
        case KeyKind::texts:
            return "list of text";
        case KeyKind::duration:
            return "duration";
        case KeyKind::time:
            return "time";
        case KeyKind::object:
            return fmt::format("`{}`", key.of);
        case KeyKind::list:
            return fmt::format("list of `{}`", key.of);
        case KeyKind::map:
            return fmt::format("named `{}`", key.of);
    }
    return "";
}

}  // namespace

std::string schema_of_keys() {
    Json json{{"$schema", "https://json-schema.org/draft/2020-12/schema"},
              {"title", "Slipledger plant file"},
              {"description",
               "What each key means, its unit and its default: config/README.md. The plant file may have // and /* */ "
               "comments, which must be removed before validating it against this schema. slipledger check-plant "
               "checks more: references, physics, time zones."}};
    json.update(schema_of("plant"));
    for (const std::string_view object : objects())
        if (object != "plant") json["$defs"][std::string(object)] = schema_of(object);
    return json.dump(2) + "\n";
}

std::string tables_of_keys() {
    std::string text;
    for (const std::string_view object : objects()) {
        text += fmt::format("\n### `{}`\n\n| key | unit or kind | default | meaning |\n| --- | --- | --- | --- |\n",
                            object);
        for (const Key& key : plant_keys())
            if (key.object == object)
                text +=
                    fmt::format("| `{}` | {} | {} | {} |\n", key.name, unit_or_kind(key), key.fallback, key.meaning);
    }
    return text;
}

}  // namespace slipledger::config
