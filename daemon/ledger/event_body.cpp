#include "daemon/ledger/event_body.hpp"

namespace slipledger::ledger {

using nlohmann::json;

json body_of(const Event& event) {
    json body = json::parse(event.body, nullptr, false);
    return body.is_object() ? body : json::object();
}

std::string text_in(const json& body, const char* key) {
    const auto found = body.find(key);
    return found != body.end() && found->is_string() ? found->get<std::string>() : std::string();
}

std::optional<double> number_in(const json& body, const char* key) {
    const auto found = body.find(key);
    return found != body.end() && found->is_number() ? std::optional(found->get<double>()) : std::nullopt;
}

json object_in(const json& body, const char* key) {
    const auto found = body.find(key);
    return found != body.end() && found->is_object() ? *found : json::object();
}

std::string reservoir_of(const Event& event) {
    return event.pump.empty() ? text_in(body_of(event), "reservoir") : std::string();
}

}  // namespace slipledger::ledger
