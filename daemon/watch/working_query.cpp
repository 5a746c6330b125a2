#include "daemon/watch/working_query.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <limits>

#include "daemon/report/speaking_track.hpp"
#include "daemon/report/when.hpp"
#include "daemon/watch/section_readings.hpp"
#include "daemon/watch/track_run.hpp"

namespace slipledger::watch {
namespace {

using analytics::Basis;
using analytics::Instant;
using analytics::JudgedPoint;
using ledger::SummaryRecord;
using report::WorkingFacts;

constexpr analytics::Milliseconds tick{1};
constexpr std::size_t days_that_decide = 2;
constexpr std::int32_t days_at_once = 32;  // looked through for the last that was judged

bool has_judged(const SummaryRecord& record) {
    return record.summary.judged[0].count + record.summary.judged[1].count > 0;
}

std::array<std::uint32_t, analytics::standing_count> counts_of(const std::vector<JudgedPoint>& points) {
    std::array<std::uint32_t, analytics::standing_count> counts{};
    for (const JudgedPoint& point : points) ++counts[static_cast<std::size_t>(point.standing)];
    return counts;
}

bool decided(const ledger::DayRecord& day) {
    return day.finished && day.verdict.judged_h > 0.0 && day.verdict.learning_h_left == 0.0;
}

// Finished days up to `last` that decided the level, newest first found, in time order.
std::vector<ledger::DayRecord> last_judged_days(const ledger::Reader& reader, ledger::TrackId track, std::int32_t last,
                                                std::int32_t life) {
    std::vector<ledger::DayRecord> found;
    for (std::int32_t to = last + 1; found.size() < days_that_decide; to -= days_at_once) {
        const std::vector<ledger::DayRecord> days = reader.days(track, to - days_at_once, to);
        if (days.empty()) break;
        for (auto day = days.rbegin(); day != days.rend() && found.size() < days_that_decide; ++day)
            if (day->verdict.life == life && decided(*day)) found.insert(found.begin(), *day);
    }
    return found;
}

// Threads: one question, then gone.
class Gathering {
public:
    Gathering(const ledger::Reader& reader, const config::Plant& plant, const config::Pump& pump,
              const config::Section& section, const WorkingQuestion& question)
        : reader_(reader),
          plant_(plant),
          question_(question),
          directory_(reader.directory()),
          days_(plant.time_zone),
          track_(track_of(pump, section)),
          length_(std::chrono::minutes(plant.summary_minutes)),
          facts_{.plant = plant, .pump = pump, .section = section} {}

    WorkingFacts run() {
        facts_.basis = track_.basis;
        facts_.record = question_.at ? summary_at(*question_.at) : last_judged_summary();
        if (!facts_.record) {
            facts_.nothing_because = why_nothing();
            return std::move(facts_);
        }
        const std::optional<Instant> oldest = reader_.oldest(track_.pump);
        const std::vector<ledger::Event> events = reader_.events(facts_.pump.id);
        const SectionView view{plant_, days_, pass(), stretches_of(facts_.pump, facts_.section, events, oldest),
                               stored_facts()};
        const Stretch& stretch = view.stretches[stretch_at(view.stretches, facts_.record->summary.start)];
        facts_.oil = stretch.pump.fluid;
        facts_.compared_with = compared_with(stretch, oldest);
        add_replay(view);
        add_points(view, stretch);
        add_days();
        add_cost();
        return std::move(facts_);
    }

private:
    const ledger::TrackEntry& track_of(const config::Pump& pump, const config::Section& section) const {
        const Basis basis =
            question_.basis.value_or(report::speaking_track(reader_, directory_, pump.id, section.id).track.basis);
        return directory_.track(pump.id, section.id, basis);
    }

    std::optional<SummaryRecord> summary_at(Instant at) const {
        std::optional<SummaryRecord> found;
        for (const SummaryRecord& record : reader_.summaries(track_.id, floor_to(at, length_), at + tick))
            if (at < record.summary.start + record.summary.length) found = record;
        return found;
    }

    // The last summary with a judged point, else the last of all.
    std::optional<SummaryRecord> last_judged_summary() const {
        const std::optional<ledger::DayRecord> last_day = reader_.last_day(track_.id);
        if (!last_day) return std::nullopt;
        std::optional<SummaryRecord> last;
        for (std::int32_t to = last_day->verdict.day.date + 1;; to -= days_at_once) {
            const std::vector<ledger::DayRecord> days = reader_.days(track_.id, to - days_at_once, to);
            if (days.empty()) return last;
            const std::vector<SummaryRecord> records = reader_.summaries(
                track_.id, floor_to(days.front().verdict.day.begin, length_), days.back().verdict.day.end);
            const auto judged = std::find_if(records.rbegin(), records.rend(), has_judged);
            if (judged != records.rend()) return *judged;
            if (!last && !records.empty()) last = records.back();
        }
    }

    std::string why_nothing() const {
        if (question_.at)
            return fmt::format("no closed summary of {} holds {}; `slipledger history {} --by summary` lists them.",
                               facts_.pump.id, report::local_second(*question_.at, plant_.time_zone), facts_.pump.id);
        const std::optional<ledger::DayRecord> day = reader_.last_day(track_.id);
        const std::string reason(name_of(day ? day->verdict.reason : analytics::UnjudgedReason::no_data));
        return fmt::format("there is no operating point to show ({}): none stands without a reading of {}.", reason,
                           name_of(flow_quantity(track_.basis)));
    }

    // A pass that ends with the summary asked for and makes nothing anew.
    PassSpan& pass() {
        pass_.summary_length = length_;
        pass_.from = floor_to(facts_.record->summary.start, length_);
        pass_.boundary = pass_.from + length_;
        pass_.touched = {pass_.boundary, pass_.boundary};
        pass_.first_date = pass_.last_date = facts_.record->date;
        return pass_;
    }

    FactsByDate stored_facts() const {
        const auto checkpoint = reader_.checkpoint_before(track_.id, facts_.record->date);
        const std::int32_t from =
            checkpoint ? checkpoint->date - analytics::usual_days : std::numeric_limits<std::int32_t>::min();
        FactsByDate facts;
        for (const ledger::DayFactsRecord& record : reader_.day_facts(track_.pump, from, facts_.record->date + 1))
            if (record.section == facts_.section.id) facts[record.date] = record.facts;
        return facts;
    }

    std::string compared_with(const Stretch& stretch, const std::optional<Instant>& oldest) const {
        if (stretch.watched_from_new || !oldest) return "when new";
        return fmt::format("when watching began ({})", report::local_date(*oldest, plant_.time_zone));
    }

    void add_replay(const SectionView& view) {
        std::optional<Replay> replay = replay_track(reader_, track_, view, *facts_.record);
        if (!replay) return;
        facts_.spec = replay->spec;
        facts_.day = replay->day;
        facts_.so_far = replay->course.quote(replay->day);
        facts_.course = std::move(replay->course);
    }

    void add_points(const SectionView& view, const Stretch& stretch) {
        const analytics::Summary& summary = facts_.record->summary;
        const Span span{summary.start, summary.start + summary.length};
        SectionReadings source(reader_, sources_of(directory_, plant_, facts_.pump, facts_.section), span.to);
        const analytics::SectionReadings& readings = source.covering(span.from, span.to);
        const SeenSensors seen = seen_before(view.facts, facts_.record->date)
                                     .value_or(seen_in(readings, {floor_to(span.from, length_), view.pass.boundary}));
        const analytics::SectionSpec spec = view.spec(stretch, days_.day(facts_.record->date), seen);
        const analytics::Usual usual = usual_on(view.facts, view.days, facts_.record->date, stretch, spec);
        facts_.points = judge_points(readings, spec, usual, track_.basis, span.from, span.to);
        if (!facts_.points.empty() && counts_of(facts_.points) != summary.counts)
            facts_.remark = "Readings of this summary have changed since it was judged and wait to be judged again.";
        if (facts_.points.empty()) {
            facts_.remark = "The raw readings of this summary are no longer kept: the working begins with its means.";
            return;
        }
        facts_.point = point_facts(readings, usual, spec, chosen_point());
    }

    // The one asked for, else the last judged one in the regime with the most points, else the last of all.
    const JudgedPoint& chosen_point() const {
        const auto& points = facts_.points;
        if (question_.at) {
            const auto after = std::ranges::upper_bound(points, *question_.at, {}, &JudgedPoint::time);
            return after == points.begin() ? points.front() : *std::prev(after);
        }
        const auto& [full, compensating] = facts_.record->summary.judged;
        const auto wanted =
            compensating.count > full.count ? analytics::Standing::compensating : analytics::Standing::full_flow;
        const auto last = std::find_if(points.rbegin(), points.rend(),
                                       [&](const JudgedPoint& point) { return point.standing == wanted; });
        return last == points.rend() ? points.back() : *last;
    }

    report::PointFacts point_facts(const analytics::SectionReadings& readings, const analytics::Usual& usual,
                                   const analytics::SectionSpec& spec, const JudgedPoint& point) const {
        report::PointFacts facts;
        facts.point = point;
        facts.joined = align(readings, track_.basis, usual, point.time, point.time + tick).front();
        for (const analytics::JoinedReading& reading : readings_behind(readings, track_.basis, usual, point.time))
            facts.cells.push_back(cell_of(reading));
        if (spec.control == analytics::Control::pressure_compensated)
            facts.plateau_bar = usual.plateau_bar > 0.0 ? usual.plateau_bar : spec.compensator_bar;
        return facts;
    }

    report::ReadCell cell_of(const analytics::JoinedReading& reading) const {
        report::ReadCell cell{.reading = reading, .place = facts_.pump.id, .conversions = {}};
        for (const Source& source : sources_of(directory_, plant_, facts_.pump, facts_.section)) {
            if ((source.quantities >> index_of(reading.quantity) & 1U) == 0) continue;
            const ledger::PointRows rows = reader_.rows(source.point, reading.taken, reading.taken + tick);
            const std::vector<double>& column = rows.columns[index_of(reading.quantity)];
            if (column.empty() || std::isnan(column.front())) continue;
            cell.place = place_of(source.point);
            cell.conversions = conversions_at(source.point, reading.quantity);
            break;
        }
        return cell;
    }

    std::string place_of(ledger::PointId point) const {
        for (const auto& [name, id] : directory_.reservoirs)
            if (id == point) return "reservoir " + name;
        for (const auto& [name, id] : directory_.drain_groups)
            if (id == point) return "drain group " + name;
        const bool of_section = facts_.pump.sections.size() > 1 && directory_.point(facts_.pump.id, "") != point;
        return of_section ? facts_.pump.id + " section " + facts_.section.id : facts_.pump.id;
    }

    // Of every feed whose plant file entry says that it writes this quantity of this place in another unit.
    std::vector<report::EdgeConversion> conversions_at(ledger::PointId point, analytics::Quantity quantity) const {
        std::vector<report::EdgeConversion> conversions;
        for (const config::Feed& feed : plant_.feeds)
            for (const auto* targets : {&feed.columns, &feed.tags})
                for (const auto& [name, target] : *targets)
                    if (target.quantity == quantity && point_of(feed, target) == point) add(conversions, feed, target);
        return conversions;
    }

    std::optional<ledger::PointId> point_of(const config::Feed& feed, const config::Target& target) const {
        if (!target.reservoir.empty()) return directory_.reservoirs.find(target.reservoir)->second;
        if (!target.drain_group.empty()) return directory_.drain_groups.find(target.drain_group)->second;
        const std::string& pump = target.pump.empty() ? feed.pump : target.pump;
        if (!pump.empty() && pump != facts_.pump.id) return std::nullopt;
        const std::string& section = target.section.empty() ? feed.section : target.section;
        return directory_.point(facts_.pump.id, section);
    }

    static void add(std::vector<report::EdgeConversion>& conversions, const config::Feed& feed,
                    const config::Target& target) {
        const analytics::Unit unit = analytics::unit_named(target.quantity, target.unit).value_or(analytics::Unit{});
        if (unit.factor == 1.0 && unit.offset == 0.0 && target.scale == 1.0 && target.offset == 0.0) return;
        conversions.push_back({.feed = feed.id,
                               .unit = std::string(unit.name),
                               .scale = target.scale,
                               .offset = target.offset,
                               .shift = unit.offset,
                               .factor = unit.factor});
    }

    void add_days() {
        const std::int32_t date = facts_.record->date;
        const std::vector<ledger::DayRecord> own = reader_.days(track_.id, date, date + 1);
        if (!own.empty()) facts_.day_record = own.front();
        facts_.judged_days = last_judged_days(reader_, track_.id, date, facts_.record->summary.life);
        const bool over = facts_.day_record && facts_.day_record->finished;
        const Instant until = over ? facts_.day.end : facts_.record->summary.start + facts_.record->summary.length;
        for (const analytics::AlarmChange& change : reader_.alarm_changes(track_.id))
            if (change.at <= until && change.life == facts_.record->summary.life) facts_.changes.push_back(change);
    }

    void add_cost() {
        if (!facts_.day_record) return;
        facts_.cost =
            report::query_cost(reader_, plant_, facts_.pump, facts_.section, track_, facts_.day_record->verdict);
    }

    const ledger::Reader& reader_;
    const config::Plant& plant_;
    const WorkingQuestion& question_;
    ledger::Directory directory_;
    PlantDays days_;
    const ledger::TrackEntry& track_;
    analytics::Milliseconds length_;
    PassSpan pass_;
    WorkingFacts facts_;
};

}  // namespace

report::WorkingFacts query_working(const ledger::Reader& reader, const config::Plant& plant, const config::Pump& pump,
                                   const config::Section& section, const WorkingQuestion& question) {
    return Gathering(reader, plant, pump, section, question).run();
}

}  // namespace slipledger::watch
