#include "daemon/report/health_query.hpp"

#include <algorithm>
#include <cmath>
#include <limits>
#include <set>
#include <span>
#include <tuple>

#include "analytics/onset.hpp"
#include "analytics/outlook.hpp"
#include "daemon/ledger/lives.hpp"
#include "daemon/report/alarm_query.hpp"
#include "daemon/report/sentence.hpp"
#include "daemon/report/speaking_track.hpp"
#include "daemon/report/when.hpp"

namespace slipledger::report {

namespace {

constexpr std::size_t most_events = 20;
constexpr std::int32_t days_looked_at = 365;  // among which are the newest 180 judged ones of all but idle pumps

// What a report asks for once and every section of the pump uses.
struct Asked {
    const ledger::Reader& reader;
    const config::Plant& plant;
    const ledger::Directory& directory;
    std::optional<Instant> plant_newest;
};

bool is_silent(const Asked& asked, const std::optional<Instant>& newest) {
    return newest && asked.plant_newest && *newest + silent_after < *asked.plant_newest;
}

DataFacts data_facts(const Asked& asked, const config::Pump& pump, const config::Section& section,
                     const SpeakingTrack& speaking) {
    DataFacts data;
    const std::set<ledger::PointId> points{*asked.directory.point(pump.id, section.id), *asked.directory.point(pump.id, "")};
    for (const ledger::PointId point : points) {
        const ledger::StoredCount count = asked.reader.count(point);
        data.readings += count.readings;
        data.disputed += count.disputed;
    }
    if (!speaking.newest_day) return data;
    const auto counts = asked.reader.standing_counts(speaking.track.id, speaking.newest_day->verdict.life);
    for (std::size_t i = 0; i < counts.size(); ++i) {
        const auto standing = static_cast<analytics::Standing>(i);
        if (is_judged(standing))
            data.used += counts[i];
        else if (counts[i] > 0)
            data.set_aside.emplace(name_of(standing), counts[i]);
    }
    return data;
}

LifeFacts life_facts(const Asked& asked, const config::Pump& pump, const config::Section& section,
                     const SpeakingTrack& speaking, std::span<const ledger::Event> events) {
    LifeFacts facts;
    if (speaking.newest_day) {
        facts.number = speaking.newest_day->verdict.life;
        facts.running_hours = speaking.newest_day->verdict.life_running_h;
    }
    const std::optional<Instant> oldest = asked.reader.oldest(asked.directory.pumps.at(pump.id));
    const std::vector<ledger::FactsFrom> told = ledger::facts_of(events);
    bool from_new = false;
    for (const ledger::Life& life : ledger::lives_of(events, section.id)) {
        if (life.number != facts.number) continue;
        facts.started = life.since ? life.since : oldest;
        from_new = ledger::watched_from_new(life, told, oldest);
    }
    const std::string began = facts.started ? local_date(*facts.started, asked.plant.time_zone) : std::string("not yet");
    const auto unwatched = from_new ? analytics::BaselineKind::from_new : analytics::BaselineKind::watching_began;
    const auto kind = speaking.newest_day ? speaking.newest_day->verdict.baseline : unwatched;
    facts.baseline = std::string(name_of(kind));
    if (kind == analytics::BaselineKind::watching_began) facts.baseline += " (" + began + ")";
    facts.compared_with = compared_with(kind, from_new, began);
    return facts;
}

std::vector<std::string> notes_of(const config::Pump& pump, const config::Section& section,
                                  const SpeakingTrack& speaking, const DataFacts& data) {
    std::vector<std::string> notes;
    if (speaking.track.basis == analytics::Basis::case_drain)
        notes.emplace_back("Judged by case drain flow: leakage that returns inside the pump is not seen, so efficiency is "
                           "an upper bound.");
    else
        notes.emplace_back("Judged by delivery: what the flow meter and the displacement are uncertain by is in the range.");
    if (!section.sensors.contains(analytics::Quantity::shaft_speed) && pump.motor.slip_at_rated == 0.0)
        notes.emplace_back("Speed is a convention: the motor's nominal speed, taken as constant, unless a feed brings "
                           "shaft_speed.");
    if (data.set_aside.contains(std::string(name_of(analytics::Standing::no_temperature))))
        notes.emplace_back("Fluid temperature is missing for some or all points: those are not judged, and no level above "
                           "watch is given on raw drain share alone.");
    return notes;
}

bool spare_in_stock(const config::Pump& pump, const config::Section& section) {
    const std::optional<config::Spare>& spare = section.spare ? section.spare : pump.spare;
    return spare && spare->in_stock > 0;
}

SentenceFacts sentence_facts(const Asked& asked, const config::Pump& pump, const config::Section& section,
                             const SectionHealth& health, bool silent) {
    SentenceFacts facts;
    facts.type = pump.type;
    facts.section = section.id;
    facts.only_section = health.only_section;
    facts.basis = health.basis.value_or(analytics::Basis::case_drain);
    facts.compared_with = health.life.compared_with;
    facts.temperature_known = !health.data.set_aside.contains(std::string(name_of(analytics::Standing::no_temperature))) ||
                              health.data.used > 0;
    facts.least_judged_h = section.baseline.min_h;
    facts.act_ratio = section.limits.leakage_ratio.act.value_or(analytics::unknown);
    facts.act_points_lost = section.limits.efficiency_points.act.value_or(analytics::unknown);
    facts.act_drain_share_percent = section.limits.drain_share_percent.act.value_or(analytics::unknown);
    facts.spare_in_stock = spare_in_stock(pump, section);
    if (silent) facts.silent_since = local_minute(*health.as_of, asked.plant.time_zone);
    facts.time_zone = asked.plant.time_zone;
    if (health.verdict) facts.verdict = *health.verdict;
    return facts;
}

std::vector<analytics::DayVerdict> newest_days(const Asked& asked, const SpeakingTrack& speaking) {
    const std::int32_t last = speaking.newest_day->verdict.day.date;
    std::vector<analytics::DayVerdict> days;
    for (const ledger::DayRecord& day : asked.reader.days(speaking.track.id, last - days_looked_at, last + 1))
        days.push_back(day.verdict);
    return days;
}

std::optional<Instant> begin_of(std::span<const analytics::DayVerdict> days, std::int32_t date) {
    const auto day = std::ranges::find(days, date, [](const analytics::DayVerdict& verdict) { return verdict.day.date; });
    return day == days.end() ? std::nullopt : std::optional(day->day.begin);
}

// Looks back on stored days: what was said of each stays said, only the day on which wear began is quoted anew.
void look_back(SectionHealth& health, std::span<const analytics::DayVerdict> days, bool with_witnesses) {
    std::int32_t since = std::numeric_limits<std::int32_t>::min();
    const bool worn = health.verdict->level > analytics::Level::sound;
    if (const auto onset = worn ? analytics::onset_of(days, *health.basis) : std::nullopt) {
        health.verdict->trend.onset = begin_of(days, onset->date);
        if (!onset->earlier) health.onset_range.low = begin_of(days, onset->low);
        health.onset_range.high = begin_of(days, onset->high);
        since = onset->date;
    }
    if (with_witnesses) health.witnesses = analytics::witnesses_of(days, since);
}

DatesInHand dates_in_hand(const analytics::DayVerdict& day) {
    const analytics::HoursInHand& left = day.hours_in_hand;
    const auto date = [&](double hours) { return analytics::instant_ahead(day.day.end, hours, left.duty_h_per_day); };
    return {date(left.low), date(left.mid), date(left.high)};
}

enum class Depth : std::uint8_t { list, report };

SectionHealth section_health(const Asked& asked, const config::Pump& pump, const config::Section& section, Depth depth) {
    SectionHealth health;
    health.pump = pump.id;
    health.section = section.id;
    health.pump_name = pump.name;
    health.machine = pump.machine;
    health.area = pump.area;
    health.model = section.model;
    health.part = replaceable_part(pump.type);
    health.only_section = pump.sections.size() == 1;
    health.as_of = asked.reader.newest(asked.directory.pumps.at(pump.id));

    const SpeakingTrack speaking = speaking_track(asked.reader, asked.directory, pump.id, section.id);
    health.data = data_facts(asked, pump, section, speaking);
    const std::vector<ledger::Event> events = ledger::events_concerning(pump, asked.reader.events(pump.id));
    health.life = life_facts(asked, pump, section, speaking, events);
    health.reason = std::string(name_of(analytics::UnjudgedReason::no_data));
    if (speaking.newest_day) {
        const analytics::DayVerdict& day = speaking.newest_day->verdict;
        health.basis = speaking.track.basis;
        health.verdict = day;
        health.level = day.level;
        health.reason = day.level == analytics::Level::unjudged ? std::string(name_of(day.reason)) : std::string();
        health.cost = query_cost(asked.reader, asked.plant, pump, section, speaking.track, day);
        health.causes = words_of(day.causes, {pump.type, speaking.track.basis, section.reference.pressure_bar,
                                              asked.plant.display_units});
        health.notes = notes_of(pump, section, speaking, health.data);
        health.dates_in_hand = dates_in_hand(day);
        if (depth == Depth::report || day.level > analytics::Level::sound)
            look_back(health, newest_days(asked, speaking), depth == Depth::report);
    }
    if (asked.plant.economics) health.currency = asked.plant.economics->currency;
    const bool silent = is_silent(asked, health.as_of);
    if (silent) {
        health.level = analytics::Level::unjudged;
        health.reason = std::string(name_of(analytics::UnjudgedReason::silent));
    }
    health.sentence = sentence(sentence_facts(asked, pump, section, health, silent));
    health.alarms = query_alarms(asked.reader, asked.directory, pump.id, section.id);
    health.events = dated_events(events, section.id, most_events);
    std::erase_if(health.alarms, [](const Episode& episode) { return episode.cleared.has_value(); });
    std::stable_sort(health.alarms.begin(), health.alarms.end(),
                     [](const Episode& a, const Episode& b) { return a.level > b.level; });
    return health;
}

Asked ask(const ledger::Reader& reader, const config::Plant& plant, const ledger::Directory& directory) {
    return Asked{reader, plant, directory, reader.newest_of_plant()};
}

double hours_left(const SectionHealth& health) {
    const double low = health.verdict ? health.verdict->hours_in_hand.low : analytics::unknown;
    return std::isfinite(low) ? low : std::numeric_limits<double>::infinity();
}

double ratio_of(const SectionHealth& health) {
    const double ratio = health.verdict ? health.verdict->leakage_ratio.value : analytics::unknown;
    return std::isfinite(ratio) ? ratio : 0.0;
}

bool more_urgent(const SectionHealth& a, const SectionHealth& b) {
    if (a.level != b.level) return a.level > b.level;
    if (hours_left(a) != hours_left(b)) return hours_left(a) < hours_left(b);
    if (ratio_of(a) != ratio_of(b)) return ratio_of(a) > ratio_of(b);
    return std::tie(a.pump, a.section) < std::tie(b.pump, b.section);
}

}  // namespace

PumpHealth query_health(const ledger::Reader& reader, const config::Plant& plant, const config::Pump& pump) {
    const ledger::Directory directory = reader.directory();
    const Asked asked = ask(reader, plant, directory);
    PumpHealth health{pump.id, {}};
    for (const config::Section& section : pump.sections)
        health.sections.push_back(section_health(asked, pump, section, Depth::report));
    return health;
}

std::vector<SectionHealth> query_fleet(const ledger::Reader& reader, const config::Plant& plant) {
    const ledger::Directory directory = reader.directory();
    const Asked asked = ask(reader, plant, directory);
    std::vector<SectionHealth> fleet;
    for (const config::Pump& pump : plant.pumps)
        for (const config::Section& section : pump.sections) fleet.push_back(section_health(asked, pump, section, Depth::list));
    std::stable_sort(fleet.begin(), fleet.end(), more_urgent);
    return fleet;
}

}  // namespace slipledger::report
