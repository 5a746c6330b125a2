#include "daemon/intake/command_request.hpp"

#include <date/date.h>
#include <nlohmann/json.hpp>

#include "daemon/intake/time_text.hpp"
#include "daemon/ledger/event_body.hpp"

namespace slipledger::intake {
namespace {

using nlohmann::json;

Refusal bad(std::string where, std::string found, std::string wanted) {
    return Refusal(Reason::bad_syntax, std::move(where), std::move(found), std::move(wanted));
}

std::string text_at(const json& object, const char* key) {
    const auto found = object.find(key);
    return found != object.end() && found->is_string() ? found->get<std::string>() : std::string();
}

Checked<ledger::Event> read_event(const json& given, const ledger::Directory& directory) {
    if (!given.is_object()) return bad("event", "is missing", "an object");
    ledger::Event event;
    event.kind = text_at(given, "kind");
    event.pump = text_at(given, "pump");
    event.section = text_at(given, "section");
    event.by = text_at(given, "by");
    if (event.kind.empty()) return bad("event.kind", "is missing", "what happened, e.g. \"replaced\"");
    if (!event.pump.empty() && !directory.pumps.contains(event.pump))
        return Refusal(Reason::unknown_pump, "event.pump", in_quotes(event.pump) + " is not in the plant file");
    if (!event.section.empty() && !directory.points.contains({event.pump, event.section}))
        return Refusal(Reason::unknown_section, "event.section", in_quotes(event.section) + " is no section of " + in_quotes(event.pump));
    const auto at = TimeReader(config::TimeFormat{}).read(text_at(given, "at"));
    if (!at) return at.error();
    event.at = *at;
    const auto body = given.find("body");
    event.body = body == given.end() ? "{}" : body->dump();
    const std::string reservoir = ledger::reservoir_of(event);
    if (!reservoir.empty() && !directory.reservoirs.contains(reservoir))
        return bad("event.body.reservoir", in_quotes(reservoir), "a reservoir of the plant file");
    return event;
}

Checked<CommandRequest> read_load(const json& given) {
    CommandRequest request;
    request.kind = CommandRequest::Kind::load;
    request.feed = text_at(given, "feed");
    request.file = text_at(given, "file");
    const auto again = given.find("again");
    request.again = again != given.end() && again->is_boolean() && again->get<bool>();
    if (request.file.empty()) return bad("file", "is missing", "the name of the file");
    return request;
}

Checked<CommandRequest> read_backup(const json& given) {
    CommandRequest request;
    request.kind = CommandRequest::Kind::backup;
    request.file = text_at(given, "file");
    if (!request.file.starts_with('/')) return bad("file", in_quotes(request.file), "an absolute path");
    return request;
}

}  // namespace

Checked<CommandRequest> read_command(std::string_view line, const ledger::Directory& directory) {
    const json given = json::parse(line, nullptr, false);
    if (!given.is_object()) return bad({}, "not one JSON object", "{\"do\":\"status\"}");
    const std::string what = text_at(given, "do");
    CommandRequest request;
    if (what == "load") return read_load(given);
    if (what == "backup") return read_backup(given);
    if (what == "event") {
        request.kind = CommandRequest::Kind::event;
        const auto event = read_event(given.value("event", json()), directory);
        if (!event) return event.error();
        request.event = *event;
        return request;
    }
    if (what == "drain") request.kind = CommandRequest::Kind::drain;
    else if (what != "status") return bad("do", in_quotes(what), "load, event, backup, status or drain");
    return request;
}

std::string command_line(const CommandRequest& request) {
    json asked;
    switch (request.kind) {
        case CommandRequest::Kind::load:
            asked = {{"do", "load"}, {"feed", request.feed}, {"file", request.file}, {"again", request.again}};
            break;
        case CommandRequest::Kind::event: {
            const ledger::Event& event = request.event;
            json body = json::parse(event.body, nullptr, false);
            if (body.is_discarded()) body = json::object();
            asked = {{"do", "event"},
                     {"event",
                      {{"kind", event.kind},
                       {"pump", event.pump},
                       {"section", event.section},
                       {"at", date::format("%FT%TZ", event.at)},
                       {"by", event.by},
                       {"body", body}}}};
            break;
        }
        case CommandRequest::Kind::backup:
            asked = {{"do", "backup"}, {"file", request.file}};
            break;
        case CommandRequest::Kind::status:
            asked = {{"do", "status"}};
            break;
        case CommandRequest::Kind::drain:
            asked = {{"do", "drain"}};
            break;
    }
    return asked.dump(-1, ' ', false, json::error_handler_t::replace) + "\n";
}

}  // namespace slipledger::intake
