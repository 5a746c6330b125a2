#include "daemon/watch/stretches.hpp"

#include <algorithm>
#include <array>
#include <nlohmann/json.hpp>

#include "daemon/ledger/event_body.hpp"
#include "daemon/watch/told_facts.hpp"

namespace slipledger::watch {
namespace {

using analytics::Instant;
using ledger::Event;
using ledger::FactsFrom;
using ledger::Life;

// Kinds of events that change what is seen of a section without changing the plant file's facts.
constexpr std::array<std::string_view, 4> unsettling{"oil-changed", "oil-sample", "compensator-set", "instrument-changed"};

bool unsettles(const Event& event, std::string_view section) {
    const bool meant = event.section.empty() || event.section == section;
    return meant && std::ranges::find(unsettling, event.kind) != unsettling.end();
}

analytics::ReferenceTest test_in(const nlohmann::json& body) {
    const auto number = [&](const char* key) { return ledger::number_in(body, key).value_or(analytics::unknown); };
    analytics::ReferenceTest test;
    if (ledger::text_in(body, "of") == "delivery") test.of = analytics::Basis::delivery;
    test.flow_lpm = number("flow_lpm");
    test.at = {number("pressure_bar"), number("speed_rpm"), number("temperature_c")};
    test.viscosity_cst = number("viscosity_cst");
    if (const auto percent = ledger::number_in(body, "accuracy_percent")) test.accuracy = *percent / 100.0;
    const auto as_new = body.find("as_new");
    test.as_new = as_new != body.end() && as_new->is_boolean() && as_new->get<bool>();
    return test;
}

bool same_facts(const config::Pump& one, const config::Pump& other, std::string_view section) {
    config::Pump a = one;
    config::Pump b = other;
    a.sections = {*one.find_section(section)};
    b.sections = {*other.find_section(section)};
    return a == b;
}

std::vector<Instant> cuts_of(std::span<const Life> lives, std::span<const Event> events, std::span<const FactsFrom> facts,
                             const PlantFileFacts& told, std::string_view section) {
    std::vector<Instant> cuts;
    for (const Life& life : lives)
        if (life.since) cuts.push_back(*life.since);
    for (const Event& event : events)
        if (unsettles(event, section)) cuts.push_back(event.at);
    for (std::size_t i = 1; i < facts.size(); ++i)
        if (!same_facts(told.at(facts[i - 1].at), told.at(facts[i].at), section))
            cuts.push_back(facts[i].at);
    std::ranges::sort(cuts);
    cuts.erase(std::unique(cuts.begin(), cuts.end()), cuts.end());
    return cuts;
}

// The pump at `at`: as the plant file told of it, with what people told since laid over it.
void lay_facts(Stretch& stretch, const PlantFileFacts& told, std::string_view section, std::span<const Event> events,
               Instant at) {
    stretch.pump = told.at(at);
    stretch.pump.fluid = told_oil(stretch.pump, events, told.oil_since(at), at);
    const Instant set = told.setting_since(at, section);
    if (set != Instant::min()) stretch.setting_since = set;
    config::Section& mine = *std::ranges::find(stretch.pump.sections, section, &config::Section::id);
    if (const auto setting = told_setting(section, events, set, at)) {
        mine.compensator_bar = setting->bar;
        stretch.setting_since = setting->since;
    }
    stretch.section = mine;
}

}  // namespace

std::vector<Stretch> stretches_of(const config::Pump& today, const config::Section& section,
                                  std::span<const Event> events, std::optional<Instant> oldest) {
    const std::vector<Life> lives = ledger::lives_of(events, section.id);
    const std::vector<FactsFrom> facts = ledger::facts_of(events);
    const PlantFileFacts told(today, facts);
    std::vector<Stretch> stretches;
    const auto begin_at = [&](Instant at) {
        Stretch stretch;
        stretch.from = at;
        stretch.life = *std::ranges::find_if(lives, [&](const Life& life) { return life.covers(at); });
        lay_facts(stretch, told, section.id, events, at);
        stretch.watched_from_new = ledger::watched_from_new(stretch.life, facts, oldest);
        if (!stretches.empty()) {
            stretches.back().to = at;
            stretch.begins_with = change_between(stretches.back().pump, stretch.pump, section.id, events, at);
        }
        stretches.push_back(std::move(stretch));
    };
    begin_at(Instant::min());
    for (const Instant cut : cuts_of(lives, events, facts, told, section.id)) begin_at(cut);
    return stretches;
}

std::string model_of(const Stretch& stretch) {
    return stretch.life.model.empty() ? stretch.section.model : stretch.life.model;
}

double displacement_of(const Stretch& stretch) {
    return stretch.life.displacement_cm3.value_or(stretch.section.displacement_cm3);
}

bool changes_facts(const Event& event) {
    return event.kind == "replaced" || event.kind == "plant-changed" ||
           std::ranges::find(unsettling, event.kind) != unsettling.end();
}

std::vector<DatedTest> tests_of(std::span<const Event> events, std::string_view section) {
    std::vector<DatedTest> tests;
    for (const Event& event : events) {
        if (event.kind != "reference-test" || !(event.section.empty() || event.section == section)) continue;
        tests.push_back({event.at, test_in(ledger::body_of(event))});
    }
    return tests;
}

std::size_t stretch_at(std::span<const Stretch> stretches, Instant at) {
    const auto after = std::ranges::upper_bound(stretches, at, {}, &Stretch::from);
    return static_cast<std::size_t>(after - stretches.begin()) - 1;
}

}  // namespace slipledger::watch
