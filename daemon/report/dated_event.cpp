#include "daemon/report/dated_event.hpp"

#include "daemon/report/event_words.hpp"

namespace slipledger::report {

std::vector<DatedEvent> dated_events(std::span<const ledger::Event> events, std::string_view section, std::size_t most) {
    std::vector<DatedEvent> out;
    for (auto newest = events.rbegin(); newest != events.rend(); ++newest) {
        const ledger::Event& event = *newest;
        if (out.size() == most) break;
        const bool ours = event.section.empty() || event.section == section;
        if (!ours || event.at <= analytics::Instant{}) continue;
        out.push_back({event.at, event.kind, event.section, event.by.empty() ? event.user : event.by, event_words(event)});
    }
    return out;
}

}  // namespace slipledger::report
