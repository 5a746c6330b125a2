#include "daemon/report/history.hpp"

#include <algorithm>
#include <chrono>
#include <limits>
#include <span>
#include <string_view>

#include "daemon/ledger/lives.hpp"
#include "daemon/report/speaking_track.hpp"

namespace slipledger::report {

namespace {

// Each event into the row in whose time it lies.
void add_events(std::span<HistoryRow> rows, std::span<const ledger::Event> events, std::string_view section) {
    if (rows.empty()) return;
    std::vector<DatedEvent> told = dated_events(events, section, events.size());
    for (auto event = told.rbegin(); event != told.rend(); ++event) {
        const auto after = std::ranges::upper_bound(rows, event->at, {}, &HistoryRow::time);
        (after == rows.begin() ? *after : *std::prev(after)).events.push_back(std::move(*event));
    }
}

template <typename AppendRows>
std::vector<HistoryRow> for_each_section(const ledger::Reader& reader, const config::Pump& pump,
                                         const std::optional<std::string>& section, AppendRows append) {
    const ledger::Directory directory = reader.directory();
    const std::vector<ledger::Event> events = ledger::events_concerning(pump, reader.events(pump.id));
    std::vector<HistoryRow> rows;
    for (const config::Section& each : pump.sections) {
        if (section && *section != each.id) continue;
        const std::size_t before = rows.size();
        append(speaking_track(reader, directory, pump.id, each.id).track, rows);
        add_events(std::span(rows).subspan(before), events, each.id);
    }
    return rows;
}

std::string reason_word(analytics::Level level, analytics::UnjudgedReason reason) {
    return level == analytics::Level::unjudged ? std::string(name_of(reason)) : std::string();
}

HistoryRow row_of(const ledger::TrackEntry& track, const analytics::DayVerdict& day) {
    HistoryRow row;
    row.time = day.day.begin;
    row.pump = track.pump_name;
    row.section = track.section;
    row.basis = track.basis;
    row.life = day.life;
    row.level = day.level;
    row.reason = reason_word(day.level, day.reason);
    const bool nothing = day.reason == analytics::UnjudgedReason::no_data || day.reason == analytics::UnjudgedReason::no_basis;
    row.stood_still = !row.reason.empty() && nothing && day.running_h == 0.0 && day.judged_h == 0.0;
    row.leakage_ratio = day.leakage_ratio;
    row.efficiency = day.efficiency;
    row.excess_lpm = day.excess_lpm;
    row.hours_in_hand = day.hours_in_hand;
    row.cause = day.cause == analytics::CauseKind::none ? "" : std::string(name_of(day.cause));
    return row;
}

HistoryRow row_of(const ledger::TrackEntry& track, const ledger::SummaryRecord& record) {
    HistoryRow row;
    row.time = record.summary.start;
    row.pump = track.pump_name;
    row.section = track.section;
    row.basis = track.basis;
    row.life = record.summary.life;
    row.level = record.verdict.level;
    row.reason = reason_word(record.verdict.level, record.verdict.reason);
    row.leakage_ratio = record.verdict.leakage_ratio;
    row.filtered_ratio = record.verdict.filtered_ratio;
    row.efficiency = record.verdict.efficiency;
    row.excess_lpm = record.verdict.excess_lpm;
    return row;
}

}  // namespace

std::vector<HistoryRow> history_by_day(const ledger::Reader& reader, const config::Pump& pump,
                                       const std::optional<std::string>& section) {
    return for_each_section(reader, pump, section, [&](const ledger::TrackEntry& track, std::vector<HistoryRow>& rows) {
        constexpr auto first = std::numeric_limits<std::int32_t>::min();
        constexpr auto last = std::numeric_limits<std::int32_t>::max();
        for (const ledger::DayRecord& day : reader.days(track.id, first, last))
            rows.push_back(row_of(track, day.verdict));
    });
}

std::vector<HistoryRow> history_by_summary(const ledger::Reader& reader, const config::Pump& pump,
                                           const std::optional<std::string>& section) {
    return for_each_section(reader, pump, section, [&](const ledger::TrackEntry& track, std::vector<HistoryRow>& rows) {
        for (const ledger::SummaryRecord& record :
             reader.summaries(track.id, analytics::Instant::min(), analytics::Instant::max()))
            rows.push_back(row_of(track, record));
    });
}

}  // namespace slipledger::report
