#include "daemon/watch/stretches.hpp"

#include <algorithm>
#include <array>

#include "daemon/watch/past_facts.hpp"

namespace slipledger::watch {
namespace {

using analytics::Instant;
using ledger::Event;
using ledger::FactsFrom;
using ledger::Life;

// Kinds of events that change what is seen of a section without changing the plant file's facts.
constexpr std::array<std::string_view, 3> unsettling{"oil-changed", "compensator-set", "instrument-changed"};

bool unsettles(const Event& event, std::string_view section) {
    const bool meant = event.section.empty() || event.section == section;
    return meant && std::ranges::find(unsettling, event.kind) != unsettling.end();
}

// What held at `at`: today's plant file from the last change on.
config::Pump pump_at(const config::Pump& today, std::span<const FactsFrom> facts, Instant at) {
    const auto after = std::ranges::upper_bound(facts, at, {}, &FactsFrom::at);
    if (after == facts.end()) return today;
    return with_facts(today, after == facts.begin() ? after->facts : std::prev(after)->facts);
}

bool same_facts(const config::Pump& one, const config::Pump& other, std::string_view section) {
    config::Pump a = one;
    config::Pump b = other;
    a.sections = {*one.find_section(section)};
    b.sections = {*other.find_section(section)};
    return a == b;
}

std::vector<Instant> cuts_of(std::span<const Life> lives, std::span<const Event> events, std::span<const FactsFrom> facts,
                             const config::Pump& today, std::string_view section) {
    std::vector<Instant> cuts;
    for (const Life& life : lives)
        if (life.since) cuts.push_back(*life.since);
    for (const Event& event : events)
        if (unsettles(event, section)) cuts.push_back(event.at);
    for (std::size_t i = 1; i < facts.size(); ++i)
        if (!same_facts(pump_at(today, facts, facts[i - 1].at), pump_at(today, facts, facts[i].at), section))
            cuts.push_back(facts[i].at);
    std::ranges::sort(cuts);
    cuts.erase(std::unique(cuts.begin(), cuts.end()), cuts.end());
    return cuts;
}

}  // namespace

std::vector<Stretch> stretches_of(const config::Pump& today, const config::Section& section,
                                  std::span<const Event> events, std::optional<Instant> oldest) {
    const std::vector<Life> lives = ledger::lives_of(events, section.id);
    const std::vector<FactsFrom> facts = ledger::facts_of(events);
    std::vector<Stretch> stretches;
    const auto begin_at = [&](Instant at) {
        Stretch stretch;
        stretch.from = at;
        stretch.life = *std::ranges::find_if(lives, [&](const Life& life) { return life.covers(at); });
        stretch.pump = pump_at(today, facts, at);
        stretch.section = *stretch.pump.find_section(section.id);
        stretch.watched_from_new = ledger::watched_from_new(stretch.life, facts, oldest);
        if (!stretches.empty()) stretches.back().to = at;
        stretches.push_back(std::move(stretch));
    };
    begin_at(Instant::min());
    for (const Instant cut : cuts_of(lives, events, facts, today, section.id)) begin_at(cut);
    return stretches;
}

bool changes_facts(const Event& event) {
    return event.kind == "replaced" || event.kind == "plant-changed" ||
           std::ranges::find(unsettling, event.kind) != unsettling.end();
}

std::size_t stretch_at(std::span<const Stretch> stretches, Instant at) {
    const auto after = std::ranges::upper_bound(stretches, at, {}, &Stretch::from);
    return static_cast<std::size_t>(after - stretches.begin()) - 1;
}

}  // namespace slipledger::watch
