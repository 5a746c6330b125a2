#include "daemon/report/alarm_query.hpp"

#include <algorithm>
#include <iterator>
#include <tuple>

namespace slipledger::report {

namespace {

void append_track(const ledger::Reader& reader, const ledger::TrackEntry& track,
                  const std::vector<ledger::Event>& acts, analytics::Instant now, std::vector<Episode>& all) {
    const std::vector<analytics::AlarmChange> changes = reader.alarm_changes(track.id);
    if (changes.empty()) return;
    const AlarmPlace place{track.pump_name, track.section, track.basis};
    std::vector<Episode> episodes = episodes_of(place, changes, acts, now);
    std::move(episodes.begin(), episodes.end(), std::back_inserter(all));
}

}  // namespace

std::vector<Episode> query_alarms(const ledger::Reader& reader, const ledger::Directory& directory,
                                  std::string_view pump, std::string_view section) {
    std::vector<Episode> all;
    const std::vector<ledger::Event> acts = reader.events(pump);
    const analytics::Instant now = reader.newest_of_plant().value_or(analytics::Instant{});
    for (const analytics::Basis basis : {analytics::Basis::case_drain, analytics::Basis::delivery})
        append_track(reader, directory.track(pump, section, basis), acts, now, all);
    std::stable_sort(all.begin(), all.end(), [](const Episode& a, const Episode& b) { return a.raised < b.raised; });
    return all;
}

std::vector<Episode> query_alarms(const ledger::Reader& reader, const config::Plant& plant, bool open_only) {
    const ledger::Directory directory = reader.directory();
    std::vector<Episode> all;
    for (const config::Pump& pump : plant.pumps)
        for (const config::Section& section : pump.sections) {
            std::vector<Episode> some = query_alarms(reader, directory, pump.id, section.id);
            std::move(some.begin(), some.end(), std::back_inserter(all));
        }
    if (open_only) std::erase_if(all, [](const Episode& episode) { return episode.cleared.has_value(); });
    std::stable_sort(all.begin(), all.end(), [](const Episode& a, const Episode& b) {
        return std::tie(b.raised, a.pump, a.section, a.rule) < std::tie(a.raised, b.pump, b.section, b.rule);
    });
    return all;
}

}  // namespace slipledger::report
