#include "daemon/ledger/lives.hpp"

#include <algorithm>
#include <set>

#include "daemon/ledger/event_body.hpp"

namespace slipledger::ledger {
namespace {

using nlohmann::json;

constexpr std::chrono::days new_when_watched_within{7};

std::optional<analytics::MakerTest> maker_test_in(const json& body) {
    const auto found = body.find("maker_test");
    if (found == body.end() || !found->is_object()) return std::nullopt;
    const auto leakage = number_in(*found, "leakage_lpm");
    if (!leakage) return std::nullopt;
    analytics::MakerTest test;
    test.leakage_lpm = *leakage;
    test.at.pressure_bar = number_in(*found, "pressure_bar").value_or(analytics::unknown);
    test.at.speed_rpm = number_in(*found, "speed_rpm").value_or(analytics::unknown);
    test.at.temperature_c = number_in(*found, "temperature_c").value_or(analytics::unknown);
    test.viscosity_cst = number_in(*found, "viscosity_cst").value_or(analytics::unknown);
    return test;
}

Life fitted_by(const Event& event, std::int32_t number) {
    const json body = body_of(event);
    Life life;
    life.number = number;
    life.since = event.at;
    life.displacement_cm3 = number_in(body, "displacement_cm3");
    life.model = text_in(body, "model");
    life.maker_test = maker_test_in(body);
    life.note = text_in(body, "note");
    return life;
}

}  // namespace

std::vector<Life> lives_of(std::span<const Event> events, std::string_view section) {
    std::vector<Life> lives(1);
    for (const Event& event : events) {
        if (event.kind != "replaced" || event.pump.empty() || !(event.section.empty() || event.section == section)) continue;
        if (lives.back().since == event.at) lives.pop_back();  // told twice: the later entry corrects the earlier
        if (!lives.empty()) {
            lives.back().ended = event.at;
            lives.back().found = text_in(body_of(event), "found");
        }
        lives.push_back(fitted_by(event, static_cast<std::int32_t>(lives.size()) + 1));
    }
    return lives;
}

std::vector<Event> events_concerning(const config::Pump& pump, std::vector<Event> events) {
    std::set<std::string> reservoirs{pump.reservoir};
    for (const Event& event : events)
        if (event.kind == "plant-changed" && event.pump == pump.id)
            reservoirs.insert(text_in(object_in(body_of(event), "now"), "reservoir"));
    std::erase_if(events, [&](const Event& event) {
        return event.pump.empty() && !reservoirs.contains(reservoir_of(event));
    });
    return events;
}

std::vector<FactsFrom> facts_of(std::span<const Event> events) {
    std::vector<const Event*> told;
    for (const Event& event : events)
        if (event.kind == "plant-changed") told.push_back(&event);
    std::ranges::sort(told, {}, &Event::id);
    std::vector<FactsFrom> facts;
    for (const Event* event : told) {
        const json body = body_of(*event);
        const auto now = body.find("now");
        if (now == body.end()) continue;
        while (!facts.empty() && facts.back().at >= event->at) facts.pop_back();
        FactsFrom entry{event->at, now->dump(), std::nullopt};
        if (const auto since = number_in(body, "since_ms"))
            entry.since = Instant(analytics::Milliseconds(static_cast<std::int64_t>(*since)));
        facts.push_back(std::move(entry));
    }
    return facts;
}

std::string model_of(const Life& life, std::span<const FactsFrom> facts, const config::Section& today) {
    if (!life.model.empty()) return life.model;
    const auto after = std::ranges::upper_bound(facts, life.since.value_or(Instant::min()), {}, &FactsFrom::at);
    if (after == facts.end()) return today.model;
    const json then = json::parse((after == facts.begin() ? after : std::prev(after))->facts, nullptr, false);
    if (!then.is_object()) return today.model;
    const json section = object_in(object_in(then, "sections"), today.id.c_str());
    return section.contains("model") ? text_in(section, "model") : today.model;
}

bool watched_from_new(const Life& life, std::span<const FactsFrom> facts, std::optional<Instant> oldest) {
    if (life.since) return true;
    if (facts.empty() || !facts.front().since || !oldest) return false;
    return *oldest >= *facts.front().since && *oldest - *facts.front().since <= new_when_watched_within;
}

std::optional<Event> plant_change(const config::Pump& pump, std::span<const Event> events,
                                  std::optional<Instant> newest_reading, Instant now) {
    const json facts = json::parse(config::pump_facts(pump));
    json body{{"now", facts}};
    if (pump.since) body["since_ms"] = pump.since->time_since_epoch().count();
    Event event;
    event.pump = pump.id;
    event.kind = "plant-changed";
    event.entered = now;
    const auto last = std::ranges::max_element(events, {}, [](const Event& candidate) {
        return candidate.kind == "plant-changed" ? candidate.id : std::int64_t{-1};
    });
    if (last != events.end() && last->kind == "plant-changed") {
        const json told = body_of(*last);
        if (told.value("now", json()) == facts) return std::nullopt;
        body["before"] = told.value("now", json());
        const bool since_is_new = pump.since && told.value("since_ms", json()) != body["since_ms"];
        event.at = since_is_new ? *pump.since : newest_reading.value_or(now);
    }
    event.body = body.dump();
    return event;
}

}  // namespace slipledger::ledger
