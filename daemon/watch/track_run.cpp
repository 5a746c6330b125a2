#include "daemon/watch/track_run.hpp"

#include <date/date.h>

#include <algorithm>

namespace slipledger::watch {
namespace {

using analytics::Course;
using analytics::DaySpan;
using analytics::Instant;
using analytics::Summary;

constexpr analytics::Milliseconds tick{1};
constexpr std::int32_t newest_checkpoints = 3;  // of days; beside them the first of each month is kept

bool is_first_of_month(std::int32_t date) {
    return date::year_month_day(date::sys_days(date::days(date))).day() == date::day(1);
}

// Stored summaries that still hold, and those made anew.
std::vector<Summary> summaries_from(const ledger::Reader& reader, const ledger::TrackEntry& track,
                                    const SectionView& view, const RemadeSummaries& remade, Instant from) {
    std::vector<Summary> all;
    const bool all_anew = !remade.spans.empty() && remade.spans.size() == 1 &&
                          remade.spans.front().from <= from && remade.spans.front().to >= view.pass.boundary;
    if (!all_anew)
        for (const ledger::SummaryRecord& stored : reader.summaries(track.id, from, view.pass.boundary))
            if (!remade.replaces(stored.summary.start)) all.push_back(stored.summary);
    const auto& anew = remade.summaries[static_cast<std::size_t>(track.basis)];
    all.insert(all.end(), anew.begin(), anew.end());
    std::ranges::stable_sort(all, {}, &Summary::start);
    return all;
}

// Threads: one pass, then gone.
class Running {
public:
    Running(const ledger::Reader& reader, const ledger::TrackEntry& track, const SectionView& view,
            const RemadeSummaries& remade, const SistersAsked& sisters)
        : reader_(reader), track_(track), view_(view), sisters_(sisters), course_(track.basis),
          emit_from_(view.pass.from), emit_date_(view.pass.first_date) {
        take_up(remade);
    }

    TrackRun run() {
        if (next_ < summaries_.size() || run_.began) {
            const std::int32_t last_finished = last_finished_date();
            for (std::int32_t date = first_date(); date <= view_.pass.last_date; ++date) take_day(date, last_finished);
        }
        run_.result.track = track_.id;
        run_.result.from = emit_from_;
        run_.result.from_date = emit_date_;
        keep_changes_at_seam();
        return std::move(run_);
    }

    std::optional<Replay> replay(const ledger::SummaryRecord& until) {
        if (next_ == summaries_.size()) return std::nullopt;
        for (std::int32_t date = first_date(); date < until.date; ++date) take_day(date, until.date);
        const DaySpan day = view_.days.day(until.date);
        adopt_inputs(day);
        analytics::SummaryVerdict verdict;
        for (; next_ < summaries_.size() && summaries_[next_].start <= until.summary.start; ++next_)
            verdict = take(summaries_[next_], day);
        return Replay{std::move(course_), spec(day), verdict, day};
    }

private:
    void take_up(const RemadeSummaries& remade) {
        const auto checkpoint = reader_.checkpoint_before(track_.id, view_.pass.first_date);
        if (checkpoint && restore(*checkpoint)) {
            next_date_ = checkpoint->date + 1;
            seam_ = view_.days.day(checkpoint->date).end;
            run_.began = checkpoint->date;
            for (const ledger::DayRecord& day : reader_.days(track_.id, checkpoint->date, checkpoint->date + 1))
                run_.finished_days.push_back(day.verdict);
        } else if (checkpoint) {  // of an earlier version: what it led to is judged anew with it
            emit_from_ = Instant::min();
            emit_date_ = std::numeric_limits<std::int32_t>::min();
        }
        const Instant from = next_date_ ? view_.pass.summaries_of(view_.days.day(*next_date_)).from : Instant::min();
        summaries_ = summaries_from(reader_, track_, view_, remade, from);
    }

    bool restore(const ledger::CheckpointRecord& checkpoint) {
        const DaySpan day = view_.days.day(checkpoint.date);
        const Instant end = view_.pass.summaries_of(day).to - tick;
        stretch_ = stretch_at(view_.stretches, end);
        next_test_ = first_test_after(end);
        inputs_ = inputs_of(day, day.begin);
        if (const auto prior = reader_.life_prior(track_.id, stretch().life.number)) heed(prior->sisters);
        auto restored = Course::restore(checkpoint.state, spec(day));
        if (restored) course_ = std::move(*restored);
        return restored.has_value();
    }

    std::int32_t date_of(const Summary& summary) const {
        return view_.days.day_of(floor_to(summary.start, view_.pass.summary_length) + view_.pass.summary_length - tick)
            .date;
    }

    std::int32_t first_date() const { return next_date_ ? *next_date_ : date_of(summaries_.front()); }

    std::int32_t last_finished_date() const {
        const std::int32_t last = view_.pass.last_date;
        return view_.pass.is_finished(view_.days.day(last)) ? last : last - 1;
    }

    // Undated inputs of the specification that change from day to day without being a change of the pump.
    struct DayInputs {
        SeenSensors seen;
        std::optional<Instant> stop;
        std::optional<std::size_t> as_new;  // reference test of the part as it was new

        bool operator==(const DayInputs&) const = default;
    };

    DayInputs inputs_of(const DaySpan& day, Instant told_by) const {
        return {seen_before(view_.facts, day.date).value_or(SeenSensors{}),
                second_next_stop(view_.plant, stretch().pump.area, day.begin), as_new_test(told_by)};
    }

    // The newest test of the life's part as new that was made by then.
    std::optional<std::size_t> as_new_test(Instant by) const {
        std::optional<std::size_t> found;
        for (std::size_t i = 0; i < view_.tests.size() && view_.tests[i].at <= by; ++i) {
            const DatedTest& dated = view_.tests[i];
            if (dated.test.as_new && dated.test.of == track_.basis && stretch().life.covers(dated.at)) found = i;
        }
        return found;
    }

    std::size_t first_test_after(Instant at) const {
        return static_cast<std::size_t>(std::ranges::upper_bound(view_.tests, at, {}, &DatedTest::at) - view_.tests.begin());
    }

    const Stretch& stretch() const { return view_.stretches[stretch_]; }

    analytics::SectionSpec spec(const DaySpan& day) const {
        analytics::SectionSpec spec = view_.spec(stretch(), day, inputs_.seen);
        if (inputs_.as_new) heed_as_new(spec, view_.tests[*inputs_.as_new].test);
        spec.sisters = analytics::sisters_figure(told_, spec);
        spec.life_prior = life_prior_;
        return spec;
    }

    void heed(const std::string& told) {
        told_ = sisters_in(told);
        life_prior_ = analytics::life_prior(past_lives_in(told));
    }

    // Asks the sisters for a life that begins at `at`, and keeps with it what they say.
    void ask_sisters(Instant at) {
        const AskingLife asking{track_, stretch().life.number, model_of(stretch()), view_.days.day_of(at).date};
        std::vector<FreshDays> fresh(sisters_.fresh.begin(), sisters_.fresh.end());
        fresh.push_back({track_.id, emit_date_, run_.result.days});
        const std::string told = sisters_.sisters.told_to(asking, fresh);
        heed(told);
        if (asking.model.empty() || asking.date < emit_date_) return;
        run_.result.life_priors.push_back({track_.id, asking.life, asking.date, at, asking.model, told});
    }

    // Put down and taken up again with other inputs: the estimate goes on as if nothing had happened, since nothing has.
    void adopt_inputs(const DaySpan& day) {
        const DayInputs inputs = inputs_of(day, day.begin);
        if (inputs == inputs_ || !run_.began) return;
        inputs_ = inputs;
        collect_changes();
        if (auto again = Course::restore(course_.checkpoint(), spec(day))) course_ = std::move(*again);
    }

    void collect_changes() {
        for (const analytics::AlarmChange& change : course_.drain_alarm_changes())
            if (change.at >= emit_from_) run_.result.alarm_changes.push_back(change);
    }

    // What was found before the checkpoint but bears a time that is replaced, such as the end of the checkpoint's day, is not
    // found again: it is carried over.
    void keep_changes_at_seam() {
        if (!seam_) return;
        auto& changes = run_.result.alarm_changes;
        std::vector<analytics::AlarmChange> kept;
        for (const analytics::AlarmChange& stored : reader_.alarm_changes(track_.id)) {
            const bool at_seam = stored.at >= emit_from_ && stored.at <= *seam_;
            const bool again = std::ranges::any_of(changes, [&](const analytics::AlarmChange& change) {
                return change.rule == stored.rule && change.edge == stored.edge && change.at == stored.at &&
                       change.life == stored.life;
            });
            if (at_seam && !again) kept.push_back(stored);
        }
        changes.insert(changes.begin(), kept.begin(), kept.end());
    }

    void begin(const DaySpan& day, Instant at) {
        stretch_ = stretch_at(view_.stretches, at);
        next_test_ = first_test_after(at);
        inputs_ = inputs_of(day, at);
        ask_sisters(at);
        course_.begin_life({stretch().life.number, stretch().life.since.value_or(at)}, spec(day));
        run_.began = day.date;
    }

    // Facts and tests in the order of their times, up to `at`.
    void go_on_to(const DaySpan& day, Instant at) {
        while (stretch().to <= at) {
            take_tests(stretch().to - tick);
            go_on_to_next_stretch(day);
        }
        take_tests(at);
    }

    void take_tests(Instant to) {
        for (; next_test_ < view_.tests.size() && view_.tests[next_test_].at <= to; ++next_test_)
            course_.reference_test(view_.tests[next_test_].at, view_.tests[next_test_].test);
    }

    void go_on_to_next_stretch(const DaySpan& day) {
        const std::int32_t life = stretch().life.number;
        ++stretch_;
        const Instant from = stretch().from;
        if (stretch().life.number == life) return course_.change_facts(from, spec(day), stretch().begins_with);
        inputs_.as_new = as_new_test(from);
        ask_sisters(from);
        course_.begin_life({stretch().life.number, from}, spec(day));
    }

    void take_day(std::int32_t date, std::int32_t last_finished) {
        const DaySpan day = view_.days.day(date);
        const Span starts = common(view_.pass.summaries_of(day), {Instant::min(), view_.pass.boundary});
        adopt_inputs(day);
        for (; next_ < summaries_.size() && summaries_[next_].start < starts.to; ++next_)
            take(summaries_[next_], day);
        if (!run_.began) return;
        go_on_to(day, starts.to - tick);
        const bool finished = view_.pass.is_finished(day);
        const analytics::DayVerdict verdict = finished ? course_.finish_day(day) : course_.quote(day);
        if (finished) run_.finished_days.push_back(verdict);
        collect_changes();
        if (date < emit_date_) return;
        run_.result.days.push_back({verdict, finished});
        if (finished && (is_first_of_month(date) || date > last_finished - newest_checkpoints))
            run_.result.checkpoints.push_back({date, course_.checkpoint()});
    }

    analytics::SummaryVerdict take(const Summary& summary, const DaySpan& day) {
        if (!run_.began) begin(day, summary.start);
        go_on_to(day, summary.start);
        const analytics::SummaryVerdict verdict = course_.take(summary);
        if (summary.start >= emit_from_) run_.result.summaries.push_back({summary, verdict, day.date});
        return verdict;
    }

    const ledger::Reader& reader_;
    const ledger::TrackEntry& track_;
    const SectionView& view_;
    const SistersAsked& sisters_;
    Course course_;
    Instant emit_from_;
    std::int32_t emit_date_;
    std::optional<std::int32_t> next_date_;
    std::optional<Instant> seam_;  // end of the checkpoint's day
    std::size_t stretch_ = 0;
    std::size_t next_test_ = 0;  // of view_.tests: not yet taken
    std::vector<analytics::Sister> told_;  // of the life in service
    analytics::LifePrior life_prior_;      // the same of lives that are over
    DayInputs inputs_;
    std::vector<Summary> summaries_;
    std::size_t next_ = 0;
    TrackRun run_;
};

}  // namespace

TrackRun run_track(const ledger::Reader& reader, const ledger::TrackEntry& track, const SectionView& view,
                   const RemadeSummaries& remade, const SistersAsked& sisters) {
    return Running(reader, track, view, remade, sisters).run();
}

std::optional<Replay> replay_track(const ledger::Reader& reader, const ledger::TrackEntry& track,
                                   const SectionView& view, const ledger::SummaryRecord& until) {
    return Running(reader, track, view, {}).replay(until);
}

}  // namespace slipledger::watch
