#include "daemon/watch/judge.hpp"

#include <algorithm>

#include "daemon/watch/notices.hpp"
#include "daemon/watch/section_days.hpp"
#include "daemon/watch/sisters.hpp"
#include "daemon/watch/track_run.hpp"

namespace slipledger::watch {
namespace {

using analytics::Basis;
using analytics::DayVerdict;
using analytics::Instant;
using analytics::UnjudgedReason;

const config::Pump* pump_of(const config::Plant& plant, const ledger::Directory& directory, ledger::PumpId id) {
    for (const auto& [name, candidate] : directory.pumps)
        if (candidate == id) return plant.find_pump(name);
    return nullptr;
}

// The last finished day that every track with stored days has reached.
std::optional<std::int32_t> stored_until(const ledger::Reader& reader, const ledger::Directory& directory,
                                         std::string_view pump) {
    std::optional<std::int32_t> until;
    for (const ledger::TrackEntry& track : directory.tracks) {
        if (track.pump_name != pump) continue;
        const auto last = reader.last_day(track.id);
        if (!last) continue;
        const std::int32_t finished = last->verdict.day.date - (last->finished ? 0 : 1);
        until = until ? std::min(*until, finished) : finished;
    }
    return until;
}

// Readings changed up to the mark's end; a fact that begins within the mark changes everything after it.
Span changed_by(const ledger::Mark& mark, std::span<const ledger::Event> events, Instant newest) {
    Span changed{mark.from, mark.to};
    for (const ledger::Event& event : events)
        if (changes_facts(event) && event.at >= mark.from && event.at <= mark.to) changed.to = newest;
    return changed;
}

constexpr std::int32_t before_all_days = -1'000'000;

// Threads: one pass, then gone.
class PumpPass {
public:
    PumpPass(const ledger::Reader& reader, const config::Plant& plant, const ledger::Directory& directory,
             const config::Pump& pump, const PlantDays& days, const PassSpan& pass, Instant oldest,
             std::vector<ledger::Event> events)
        : reader_(reader), plant_(plant), directory_(directory), pump_(pump), days_(days), pass_(pass), oldest_(oldest),
          events_(std::move(events)), sisters_(reader, plant, directory), told_(reader.notices(pump.id)),
          facts_(reader.day_facts(directory.pumps.at(pump.id), first_date_needed() - analytics::usual_days,
                                  pass.last_date + 1)) {}

    void run(ledger::AnalysisResult& result) {
        for (const config::Section& section : pump_.sections) judge(section, result);
        mark_told_otherwise(result);
    }

private:
    // The estimate is led on from a checkpoint that may lie weeks before the pass, over days whose facts count again.
    std::int32_t first_date_needed() const {
        std::int32_t first = pass_.first_date;
        for (const ledger::TrackEntry& track : directory_.tracks) {
            if (track.pump_name != pump_.id) continue;
            const auto checkpoint = reader_.checkpoint_before(track.id, pass_.first_date);
            if (checkpoint) first = std::min(first, checkpoint->date);
            else if (reader_.last_day(track.id)) first = before_all_days;
        }
        return first;
    }

    static std::vector<FreshDays> fresh_days(const ledger::AnalysisResult& result) {
        std::vector<FreshDays> fresh;
        for (const ledger::TrackResult& track : result.tracks) fresh.push_back({track.track, track.from_date, track.days});
        return fresh;
    }

    // Lives that were told of this pump what it no longer says: their pumps are marked with what is stored of this one.
    void mark_told_otherwise(ledger::AnalysisResult& result) const {
        std::vector<ledger::LifePriorRecord> priors;
        for (const ledger::TrackResult& track : result.tracks)
            priors.insert(priors.end(), track.life_priors.begin(), track.life_priors.end());
        for (const ledger::LifePriorRecord& prior : sisters_.told_otherwise(priors, fresh_days(result))) {
            const auto track = std::ranges::find(directory_.tracks, prior.track, &ledger::TrackEntry::id);
            result.told_otherwise.push_back({track->pump, prior.begins});
        }
    }

    FactsByDate stored_facts(const std::string& section) const {
        FactsByDate facts;
        for (const ledger::DayFactsRecord& record : facts_)
            if (record.section == section) facts[record.date] = record.facts;
        return facts;
    }

    void judge(const config::Section& section, ledger::AnalysisResult& result) {
        SectionView view{plant_,
                         days_,
                         pass_,
                         stretches_of(pump_, section, events_, oldest_),
                         tests_of(events_, section.id),
                         stored_facts(section.id)};
        const RemadeSummaries remade = remake_summaries(reader_, directory_, pump_, section, view);
        result.day_facts.insert(result.day_facts.end(), remade.facts.begin(), remade.facts.end());
        const std::vector<FreshDays> fresh = fresh_days(result);
        const SistersAsked sisters{sisters_, fresh};
        TrackRun drain = run_track(reader_, track(section, Basis::case_drain), view, remade, sisters);
        TrackRun delivery = run_track(reader_, track(section, Basis::delivery), view, remade, sisters);
        add_days_without_basis(drain, delivery, view, remade);
        keep(section, view, std::move(drain), result);
        keep(section, view, std::move(delivery), result);
    }

    const ledger::TrackEntry& track(const config::Section& section, Basis basis) const {
        return directory_.track(pump_.id, section.id, basis);
    }

    // A section without a flow of its own is not passed over in silence: its days say why it is not judged.
    void add_days_without_basis(TrackRun& drain, const TrackRun& delivery, const SectionView& view,
                                const RemadeSummaries& remade) {
        const std::int32_t never = pass_.last_date + 1;
        const std::int32_t began = std::min(drain.began.value_or(never), delivery.began.value_or(never));
        if (began <= pass_.first_date) return;
        std::vector<ledger::DayRecord> before = reader_.days(drain.result.track, pass_.first_date - 1, pass_.last_date + 1);
        bool shared = false;
        std::vector<ledger::DayRecord> rows;
        for (std::int32_t date = pass_.first_date; date < began; ++date) {
            shared = shared || was_shared(before, date) || is_shared(view, remade, date);
            rows.push_back(day_without_basis(view, date, shared));
        }
        auto& days = drain.result.days;
        days.insert(days.begin(), rows.begin(), rows.end());
    }

    static bool was_shared(const std::vector<ledger::DayRecord>& stored, std::int32_t date) {
        return std::ranges::any_of(stored, [&](const ledger::DayRecord& day) {
            return day.verdict.day.date <= date && day.verdict.reason == UnjudgedReason::shared_drain;
        });
    }

    bool is_shared(const SectionView& view, const RemadeSummaries& remade, std::int32_t date) const {
        const Instant end = std::min(days_.day(date).end, pass_.boundary);
        const bool configured = drains_with_others(plant_, view.stretches[stretch_at(view.stretches, end)].section);
        return configured || (remade.first_shared_drain && *remade.first_shared_drain < end);
    }

    ledger::DayRecord day_without_basis(const SectionView& view, std::int32_t date, bool shared) const {
        DayVerdict verdict;
        verdict.day = days_.day(date);
        verdict.life = view.stretches[stretch_at(view.stretches, verdict.day.end - analytics::Milliseconds(1))].life.number;
        verdict.reason = shared ? UnjudgedReason::shared_drain : UnjudgedReason::no_basis;
        return {verdict, pass_.is_finished(verdict.day)};
    }

    void keep(const config::Section& section, const SectionView& view, TrackRun run, ledger::AnalysisResult& result) {
        const bool nothing = run.result.days.empty() && run.result.summaries.empty();
        if (nothing && !reader_.last_day(run.result.track)) return;
        add_notices(section, view, run, result);
        result.tracks.push_back(std::move(run.result));
    }

    void add_notices(const config::Section& section, const SectionView& view, const TrackRun& run,
                     ledger::AnalysisResult& result) {
        const Basis basis = basis_of(run.result.track);
        std::vector<analytics::AlarmChange> stored = reader_.alarm_changes(run.result.track);
        std::erase_if(stored, [&](const analytics::AlarmChange& change) { return change.at < run.result.from; });
        const bool temperature = seen_before(view.facts, pass_.last_date).value_or(SeenSensors{}).temperature;
        const NoticeContext context{plant_,         pump_,             section,     basis,
                                    view.stretches, run.finished_days, temperature, oldest_};
        const ChangesOfPass changes{run.result.alarm_changes, stored, told_, run.result.from, pass_.boundary};
        std::vector<ledger::Notice> notices = notices_of(context, changes);
        result.notices.insert(result.notices.end(), notices.begin(), notices.end());
    }

    Basis basis_of(ledger::TrackId id) const {
        return std::ranges::find(directory_.tracks, id, &ledger::TrackEntry::id)->basis;
    }

    const ledger::Reader& reader_;
    const config::Plant& plant_;
    const ledger::Directory& directory_;
    const config::Pump& pump_;
    const PlantDays& days_;
    const PassSpan& pass_;
    Instant oldest_;
    std::vector<ledger::Event> events_;
    Sisters sisters_;
    std::vector<ledger::Notice> told_;
    std::vector<ledger::DayFactsRecord> facts_;
};

}  // namespace

ledger::AnalysisResult judge_pump(const ledger::Reader& reader, const config::Plant& plant,
                                  const ledger::Directory& directory, const ledger::Mark& mark) {
    ledger::AnalysisResult result;
    result.pump = mark.pump;
    result.generation = mark.generation;
    const config::Pump* pump = pump_of(plant, directory, mark.pump);
    const auto oldest = reader.oldest(mark.pump);
    const auto newest = reader.newest(mark.pump);
    if (pump == nullptr || !oldest || !newest) return result;
    const PlantDays days(plant.time_zone);
    PassInput input;
    input.summary_length = std::chrono::minutes(plant.summary_minutes);
    input.lateness = plant.lateness;
    input.oldest = *oldest;
    input.newest = *newest;
    std::vector<ledger::Event> events = ledger::events_concerning(*pump, reader.events(pump->id));
    input.mark = changed_by(mark, events, *newest);
    input.stored_until = stored_until(reader, directory, pump->id);
    const auto pass = pass_span(input, days);
    if (!pass) return result;
    PumpPass(reader, plant, directory, *pump, days, *pass, *oldest, std::move(events)).run(result);
    std::ranges::stable_sort(result.notices, {}, &ledger::Notice::at);
    if (pass->cut_short) result.mark_again_from = pass->boundary;
    return result;
}

}  // namespace slipledger::watch
