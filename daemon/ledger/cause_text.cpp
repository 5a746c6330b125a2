#include "daemon/ledger/cause_text.hpp"

#include <algorithm>
#include <charconv>
#include <cmath>
#include <nlohmann/json.hpp>
#include <optional>

namespace slipledger::ledger {
namespace {

using analytics::CauseKind;
using analytics::Evidence;
using analytics::RankedCause;
using nlohmann::json;

template <typename Number>
std::string exactly(Number value) {
    if (!std::isfinite(value)) return "null";
    char text[32];
    return {text, std::to_chars(text, text + sizeof text, value).ptr};
}

std::string quoted(std::string_view name) { return '"' + std::string(name) + '"'; }

std::string text_of(const std::vector<Evidence>& evidence) {
    std::string text = "[";
    for (const Evidence& each : evidence) {
        if (text.size() > 1) text += ',';
        text += '[' + quoted(name_of(each.sign)) + ',' + (each.present ? '1' : '0') + ',' + exactly(each.value) + ',' +
                exactly(each.beside) + ',' + (each.quantity ? quoted(name_of(*each.quantity)) : "null") + ',' +
                exactly(each.adds) + ']';
    }
    return text + ']';
}

float number_of(const json& value) {
    return value.is_number() ? value.get<float>() : std::numeric_limits<float>::quiet_NaN();
}

template <typename Names>
std::optional<std::size_t> place_of(const json& name, const Names& names) {
    const auto found = name.is_string() ? std::ranges::find(names, name.get_ref<const std::string&>()) : names.end();
    return found == names.end() ? std::nullopt : std::optional(static_cast<std::size_t>(found - names.begin()));
}

std::vector<Evidence> evidence_of(const json& rows) {
    std::vector<Evidence> evidence;
    for (const json& row : rows) {
        const auto sign = row.is_array() && row.size() == 6 ? place_of(row[0], analytics::sign_names) : std::nullopt;
        if (!sign) continue;
        Evidence each;
        each.sign = static_cast<analytics::Sign>(*sign);
        each.present = row[1] == 1;
        each.value = number_of(row[2]);
        each.beside = number_of(row[3]);
        if (row[4].is_string()) each.quantity = analytics::quantity_named(row[4].get_ref<const std::string&>());
        each.adds = number_of(row[5]);
        evidence.push_back(each);
    }
    return evidence;
}

}  // namespace

std::string text_of(const std::vector<RankedCause>& causes) {
    std::string text = "[";
    for (const RankedCause& cause : causes) {
        if (text.size() > 1) text += ',';
        text += "{\"cause\":" + quoted(name_of(cause.kind)) + ",\"weight\":" + exactly(cause.weight) +
                ",\"for\":" + text_of(cause.in_favour) + ",\"against\":" + text_of(cause.against) + '}';
    }
    return text + ']';
}

std::vector<RankedCause> causes_of(std::string_view text) {
    std::vector<RankedCause> causes;
    const json rows = json::parse(text, nullptr, false);
    if (!rows.is_array()) return causes;
    for (const json& row : rows) {
        const auto kind = place_of(row.value("cause", json()), analytics::cause_names);
        if (!kind) continue;
        causes.push_back({.kind = static_cast<CauseKind>(*kind),
                          .weight = row.value("weight", 0.0),
                          .in_favour = evidence_of(row.value("for", json::array())),
                          .against = evidence_of(row.value("against", json::array()))});
    }
    return causes;
}

}  // namespace slipledger::ledger
