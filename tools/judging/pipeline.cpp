#include "tools/judging/pipeline.hpp"

#include <algorithm>
#include <atomic>
#include <cmath>
#include <map>
#include <set>
#include <stdexcept>

#include "config/plant_reader.hpp"
#include "daemon/clock.hpp"
#include "daemon/intake/batch_builder.hpp"
#include "daemon/intake/file_load.hpp"
#include "daemon/intake/mapping.hpp"
#include "daemon/intake/seven_digits.hpp"
#include "daemon/ledger/open_ledger.hpp"
#include "daemon/ledger/reader.hpp"
#include "daemon/report/health_query.hpp"
#include "daemon/watch/judge.hpp"
#include "daemon/watch/plant_changes.hpp"

namespace slipledger::judging {
namespace {

using analytics::Basis;
using plantsim::Row;

constexpr std::size_t rows_of_batch = 16384;

config::Plant read(const std::string& text, const std::filesystem::path& folder) {
    config::PlantReading reading = config::read_plant(text);
    if (!reading) {
        const std::string fault = config::format_fault(reading.faults.front());
        throw std::runtime_error("the bench wrote a plant file that is not taken: " + fault);
    }
    reading.plant->store.path = folder / "ledger.db";
    return *std::move(reading.plant);
}

analytics::Instant instant(Millis time) {
    return analytics::Instant(analytics::Milliseconds(time));
}

Millis millis(analytics::Instant at) {
    return at.time_since_epoch().count();
}

// As the logger writes it: with the column's decimals, and no more digits than intake keeps.
double as_written(double value, std::size_t column) {
    static constexpr std::array<double, 4> tens{1.0, 10.0, 100.0, 1000.0};
    const double scale = tens[static_cast<std::size_t>(plantsim::column_table[column].decimals)];
    return intake::seven_digits(std::round(value * scale) / scale);
}

// Rows into batches, by intake's own map of names, places and ranges. Threads: one at a time.
class Loading {
public:
    Loading(const config::Plant& plant, ledger::Writer& writer)
        : writer_(writer),
          mapping_(*intake::feed_for_load(plant.feeds, "", "bench.csv", plant.time_zone), writer.directory(),
                   plant.pumps),
          batch_(mapping_.feed_id(), "", rows_of_batch) {
        for (std::size_t i = 0; i < plantsim::column_count; ++i)
            measures_[i] = mapping_.column(plantsim::column_table[i].name);
    }

    void add(const Row& row) {
        const intake::PumpPlaces& places = *mapping_.pump(row.pump);
        const intake::Place* place = *mapping_.place(places, row.pump, row.section);
        batch_.line(++line_, {}, {});
        batch_.open_row(instant(row.time));
        bool any = false;
        for (std::size_t i = 0; i < plantsim::column_count; ++i) {
            if (std::isnan(row.values[i])) continue;
            const analytics::Quantity quantity = measures_[i]->quantity;
            const intake::Place* at = intake::is_of_pump(quantity) ? places.pump : place;
            const double value = as_written(row.values[i], i);
            const intake::ValueRange& range = at->ranges[analytics::index_of(quantity)];
            if (!(value >= range.low && value <= range.high)) continue;  // intake refuses such a cell
            batch_.add(at->point, quantity, value);
            any = true;
        }
        if (any) batch_.close_row();
        if (batch_.full()) submit();
    }

    void finish() {
        submit();
        writer_.drain();
        if (failed_) throw std::runtime_error("the ledger did not store what the bench brought");
    }

    std::uint64_t rows() const { return line_; }

private:
    void submit() {
        intake::ReadBatch read = batch_.take();
        if (!read.batch.rows.empty())
            writer_.submit(std::move(read.batch), [this](const ledger::IntakeOutcome& outcome) {
                if (outcome.failed) failed_ = true;
            });
    }

    ledger::Writer& writer_;
    intake::Mapping mapping_;
    intake::BatchBuilder batch_;
    std::array<const intake::Measure*, plantsim::column_count> measures_{};
    std::uint64_t line_ = 0;
    std::atomic<bool> failed_ = false;  // set on the writer's thread
};

std::uint64_t load(const Story& story, const plantsim::Mill& mill, const config::Plant& plant, ledger::Writer& writer,
                   const std::function<void(std::span<const Row>)>& see) {
    Loading loading(plant, writer);
    std::vector<Row> rows;
    for (Millis time = story.plant.year_begins; time < story.plant.year_ends; time += story.interval) {
        rows.clear();
        for (std::size_t pump = 0; pump < story.plant.pumps.size(); ++pump) mill.sample(pump, time, rows);
        for (const Row& row : rows) loading.add(row);
        see(rows);
    }
    loading.finish();
    return loading.rows();
}

void enter(const Story& story, ledger::Writer& writer) {
    for (const Entry& entry : story.entries) {
        ledger::Event event;
        event.pump = story.plant.pumps[entry.pump].id;
        event.section = entry.section;
        event.kind = entry.kind;
        event.at = instant(entry.at);
        event.entered = event.at;
        event.by = "bench";
        event.body = entry.body;
        writer.store(event);
    }
}

void judge(const config::Plant& plant, ledger::Writer& writer, const ledger::Reader& reader) {
    for (std::vector<ledger::Mark> marks = reader.marks(); !marks.empty(); marks = reader.marks())
        for (const ledger::Mark& mark : marks) writer.store(watch::judge_pump(reader, plant, writer.directory(), mark));
}

DayTold told_of(const ledger::DayRecord& record, Basis basis) {
    const analytics::DayVerdict& day = record.verdict;
    DayTold told{.end = millis(day.day.end),
                 .judged = day.level != analytics::Level::unjudged,
                 .alerting = day.level > analytics::Level::sound,
                 .seen = basis == Basis::case_drain ? plantsim::Seen::drain : plantsim::Seen::everything,
                 .ratio = day.leakage_ratio.value,
                 .efficiency = day.efficiency.value,
                 .at_rated = day.efficiency_at_rated,
                 .cause = std::string(name_of(day.cause))};
    const analytics::HoursInHand& left = day.hours_in_hand;
    told.life_given = day.trend.established && std::isfinite(left.low);
    if (told.life_given) {
        told.life_low_h = left.low;
        told.life_mid_h = left.mid;
        told.life_high_h = left.high;
    }
    return told;
}

bool tells_wear(analytics::Rule rule) {
    return analytics::decides_level(rule);
}

// Alarms of both bases as one: a section is alerted from the first until the last of them is taken back.
void take_alarms(std::vector<std::pair<Basis, analytics::AlarmChange>> changes, SectionTold& told) {
    std::ranges::stable_sort(changes, {}, [](const auto& change) { return change.second.at; });
    std::set<std::pair<Basis, analytics::Rule>> open;
    for (const auto& [basis, change] : changes) {
        if (!tells_wear(change.rule)) continue;
        const bool was_open = !open.empty();
        if (change.edge == analytics::AlarmEdge::returned)
            open.erase({basis, change.rule});
        else
            open.insert({basis, change.rule});
        if (!was_open && !open.empty()) told.alerts.push_back({.raised = millis(change.at)});
        if (was_open && open.empty()) told.alerts.back().cleared = millis(change.at);
        if (change.rule == analytics::Rule::step_change && change.edge == analytics::AlarmEdge::raised)
            told.steps.push_back(millis(change.at));
    }
}

// Day by day the more urgent basis speaks, of equals the drain.
void take_days(const std::vector<ledger::DayRecord>& drain, const std::vector<ledger::DayRecord>& delivery,
               SectionTold& told) {
    std::map<std::int32_t, DayTold> speaking;
    std::map<std::int32_t, analytics::Level> levels;
    std::map<std::int32_t, DayTold> other;
    const auto take = [&](const std::vector<ledger::DayRecord>& days, Basis basis) {
        for (const ledger::DayRecord& day : days) {
            if (!day.finished) continue;
            const std::int32_t date = day.verdict.day.date;
            DayTold now = told_of(day, basis);
            const auto before = speaking.find(date);
            if (before == speaking.end()) {
                levels[date] = day.verdict.level;
                speaking.emplace(date, std::move(now));
            } else if (day.verdict.level > levels[date]) {
                levels[date] = day.verdict.level;
                other.emplace(date, std::exchange(before->second, std::move(now)));
            } else {
                other.emplace(date, std::move(now));
            }
        }
    };
    take(drain, Basis::case_drain);
    take(delivery, Basis::delivery);
    for (auto& [date, day] : speaking) told.days.push_back(std::move(day));
    for (auto& [date, day] : other) told.other_days.push_back(std::move(day));
}

SectionTold read_back(const ledger::Reader& reader, const ledger::Directory& directory, const std::string& pump,
                      const std::string& section) {
    constexpr std::int32_t no_date_reaches = 1000000;
    SectionTold told;
    std::vector<std::pair<Basis, analytics::AlarmChange>> changes;
    std::array<std::vector<ledger::DayRecord>, 2> days;
    for (const Basis basis : {Basis::case_drain, Basis::delivery}) {
        const ledger::TrackId track = directory.track(pump, section, basis).id;
        for (const analytics::AlarmChange& change : reader.alarm_changes(track)) changes.emplace_back(basis, change);
        days[static_cast<std::size_t>(basis)] = reader.days(track, 0, no_date_reaches);
    }
    take_alarms(std::move(changes), told);
    take_days(days[0], days[1], told);
    return told;
}

void take_report(const ledger::Reader& reader, const config::Plant& plant, const config::Pump& pump,
                 const std::string& section, SectionTold& told) {
    const report::PumpHealth health = report::query_health(reader, plant, pump);
    for (const report::SectionHealth& part : health.sections) {
        if (part.section != section) continue;
        told.compared_with = part.life.baseline;
        told.sentence = part.sentence;
        told.sound_at_end = part.level == analytics::Level::sound;
    }
}

}  // namespace

PipelineResult run_pipeline(const Story& story, const plantsim::Mill& mill, Spoil spoil,
                            const std::filesystem::path& folder, const std::function<void(std::span<const Row>)>& see) {
    PipelineResult result;
    result.plant = read(spoilt(story.plant_file, spoil), folder);
    ledger::Writer writer(ledger::open_ledger(result.plant), result.plant.store.commit_interval);
    const SystemClock clock;
    watch::store_plant_changes(result.plant, writer, clock);
    if (!story.plant_file_after.empty()) {
        result.plant = read(spoilt(story.plant_file_after, spoil), folder);
        watch::store_plant_changes(result.plant, writer, clock);
    }
    enter(story, writer);
    result.rows = load(story, mill, result.plant, writer, see);
    const ledger::Reader reader(result.plant.store.path);
    judge(result.plant, writer, reader);
    for (const SectionStory& section : story.sections) {
        const plantsim::PumpDrawing& pump = story.plant.pumps[section.pump];
        const std::string& part = pump.sections[section.section].id;
        SectionTold told = read_back(reader, writer.directory(), pump.id, part);
        take_report(reader, result.plant, *result.plant.find_pump(pump.id), part, told);
        result.told.push_back(std::move(told));
    }
    return result;
}

}  // namespace slipledger::judging
