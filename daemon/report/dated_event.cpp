#include "daemon/report/dated_event.hpp"

#include <fmt/format.h>

#include <nlohmann/json.hpp>

namespace slipledger::report {

namespace {

std::string text_of(const ledger::Event& event) {
    const nlohmann::json body = nlohmann::json::parse(event.body, nullptr, false);
    std::string out;
    if (!body.is_object()) return out;
    const auto add = [&out](const std::string& part) { out += (out.empty() ? "" : ", ") + part; };
    for (const char* key : {"text", "note", "why", "model", "found"})
        if (const auto value = body.find(key); value != body.end() && value->is_string() && *value != "")
            add((key == std::string_view("found") ? "found " : "") + value->get<std::string>());
    if (const auto cm3 = body.find("displacement_cm3"); cm3 != body.end() && cm3->is_number())
        add(fmt::format("{:g} cm3", cm3->get<double>()));
    return out;
}

}  // namespace

std::vector<DatedEvent> dated_events(std::span<const ledger::Event> events, std::string_view section, std::size_t most) {
    std::vector<DatedEvent> out;
    for (auto newest = events.rbegin(); newest != events.rend(); ++newest) {
        const ledger::Event& event = *newest;
        if (out.size() == most) break;
        const bool ours = event.section.empty() || event.section == section;
        if (!ours || event.at <= analytics::Instant{}) continue;
        out.push_back({event.at, event.kind, event.section, event.by.empty() ? event.user : event.by, text_of(event)});
    }
    return out;
}

}  // namespace slipledger::report
