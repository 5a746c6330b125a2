#include "daemon/watch/section_days.hpp"

#include <algorithm>

#include "daemon/watch/section_readings.hpp"

namespace slipledger::watch {
namespace {

using analytics::Basis;
using analytics::DayFacts;
using analytics::DaySpan;
using analytics::Instant;
using analytics::Quantity;
using analytics::Summary;
using analytics::Usual;

std::vector<DayFacts> facts_before(const FactsByDate& facts, std::int32_t date) {
    std::vector<DayFacts> before;
    for (auto at = facts.lower_bound(date - analytics::usual_days); at != facts.end() && at->first < date; ++at)
        before.push_back(at->second);
    return before;
}

bool has_reading(const analytics::Series& series, const Span& span) {
    const auto first = std::ranges::lower_bound(series.times, span.from);
    return first != series.times.end() && *first < span.to;
}

// Threads: one pass, then gone.
class Remaking {
public:
    Remaking(SectionReadings readings, const config::Section& section, SectionView& view)
        : readings_(std::move(readings)), section_(section), view_(view), stored_(view.facts) {}

    RemadeSummaries run() {
        for (std::int32_t date = view_.pass.first_date; date <= view_.pass.last_date; ++date) take(date);
        made_.first_shared_drain = readings_.first_shared_drain();
        return std::move(made_);
    }

private:
    void take(std::int32_t date) {
        const DaySpan day = view_.days.day(date);
        const Span closed = common(view_.pass.summaries_of(day), {view_.pass.from, view_.pass.boundary});
        const auto seen = seen_before(view_.facts, date);
        const bool changed = seen != seen_before(stored_, date) || usual_changed(closed, day);
        const Span remade = changed ? closed : common(closed, view_.pass.touched);
        if (!remade.empty()) remake(remade, day, seen);
        if (view_.pass.is_finished(day)) take_facts(day);
    }

    bool usual_changed(const Span& closed, const DaySpan& day) const {
        if (facts_before(view_.facts, day.date) == facts_before(stored_, day.date)) return false;
        for (std::size_t i = stretch_at(view_.stretches, closed.from); i < view_.stretches.size(); ++i) {
            const Stretch& stretch = view_.stretches[i];
            if (stretch.from >= closed.to) break;
            const analytics::SectionSpec spec = view_.spec(stretch, day, {});
            if (usual_on(view_.facts, view_.days, day.date, stretch, spec) != usual_on(stored_, view_.days, day.date, stretch, spec)) return true;
        }
        return false;
    }

    void remake(const Span& span, const DaySpan& day, const std::optional<SeenSensors>& seen) {
        if (!made_.spans.empty() && made_.spans.back().to == span.from)
            made_.spans.back().to = span.to;
        else
            made_.spans.push_back(span);
        const auto length = view_.pass.summary_length;
        if (seen) return summarise(span, day, *seen);
        for (Instant at = span.from; at < span.to; at += length) {
            const Span one{at, at + length};
            summarise(one, day, seen_in(readings_.covering(one.from, one.to), one));
        }
    }

    void summarise(const Span& span, const DaySpan& day, const SeenSensors& seen) {
        const analytics::SectionReadings& readings = readings_.covering(span.from, span.to);
        for (std::size_t i = stretch_at(view_.stretches, span.from); i < view_.stretches.size(); ++i) {
            const Stretch& stretch = view_.stretches[i];
            const Span piece = common(span, {stretch.from, stretch.to});
            if (piece.empty()) break;
            const analytics::SectionSpec spec = view_.spec(stretch, day, seen);
            const Usual usual = usual_on(view_.facts, view_.days, day.date, stretch, spec);
            for (const Basis basis : both_bases) {
                if (readings[index_of(flow_quantity(basis))].times.empty()) continue;
                std::vector<Summary> made = analytics::summarise(readings, spec, usual, basis, stretch.life.number,
                                                                 piece.from, piece.to, view_.pass.summary_length);
                auto& all = made_.summaries[static_cast<std::size_t>(basis)];
                all.insert(all.end(), made.begin(), made.end());
            }
        }
    }

    void take_facts(const DaySpan& day) {
        const bool known = stored_.contains(day.date);
        if (known && !view_.pass.touched.overlaps({day.begin, day.end})) return;
        const Stretch& stretch = view_.stretches[stretch_at(view_.stretches, day.begin)];
        const analytics::SectionSpec spec = view_.spec(stretch, day, {});
        const DayFacts facts = analytics::day_facts(readings_.covering(day.begin, day.end), spec, day.begin, day.end);
        view_.facts[day.date] = facts;
        if (!known || stored_.at(day.date) != facts) made_.facts.push_back({section_.id, day.date, facts});
    }

    SectionReadings readings_;
    const config::Section& section_;
    SectionView& view_;
    FactsByDate stored_;
    RemadeSummaries made_;
};

}  // namespace

std::optional<SeenSensors> seen_before(const FactsByDate& facts, std::int32_t date) {
    SeenSensors seen{false, false};
    bool any = false;
    for (const DayFacts& day : facts_before(facts, date)) {
        any = any || std::ranges::any_of(day.interval_s, [](double interval) { return interval > 0.0; });
        seen.speed = seen.speed || day.interval_s[index_of(Quantity::shaft_speed)] > 0.0;
        seen.temperature = seen.temperature || day.interval_s[index_of(Quantity::fluid_temperature)] > 0.0;
    }
    return any ? std::optional(seen) : std::nullopt;
}

Usual usual_on(const FactsByDate& facts, const PlantDays& days, std::int32_t date, const Stretch& stretch,
               const analytics::SectionSpec& spec) {
    std::vector<DayFacts> before = facts_before(facts, date);
    if (stretch.setting_since) {
        const std::int32_t set_on = days.day_of(*stretch.setting_since).date;
        auto day = facts.lower_bound(date - analytics::usual_days);
        for (DayFacts& one : before)
            if ((day++)->first <= set_on) one.plateau_bar = 0.0;
    }
    return analytics::usual_from(before, spec, given_holds(stretch.section));
}

SeenSensors seen_in(const analytics::SectionReadings& readings, const Span& summary) {
    const Span span{summary.from - analytics::summary_lead_in, summary.to};
    return {has_reading(readings[index_of(Quantity::shaft_speed)], span),
            has_reading(readings[index_of(Quantity::fluid_temperature)], span)};
}

analytics::SectionSpec SectionView::spec(const Stretch& stretch, const DaySpan& day, const SeenSensors& seen) const {
    return section_spec_of(plant, stretch.pump, stretch.section, stretch.life, stretch.watched_from_new, seen,
                           day.begin);
}

bool RemadeSummaries::replaces(Instant start) const {
    const auto after = std::ranges::upper_bound(spans, start, {}, &Span::from);
    return after != spans.begin() && start < std::prev(after)->to;
}

RemadeSummaries remake_summaries(const ledger::Reader& reader, const ledger::Directory& directory,
                                 const config::Pump& pump, const config::Section& section, SectionView& view) {
    SectionReadings readings(reader, sources_of(directory, view.plant, pump, section), view.pass.boundary);
    return Remaking(std::move(readings), section, view).run();
}

}  // namespace slipledger::watch
