#include "daemon/watch/pass_span.hpp"

#include <algorithm>

#include "daemon/watch/section_readings.hpp"

namespace slipledger::watch {
namespace {

using analytics::DaySpan;
using analytics::Instant;
using analytics::Milliseconds;

constexpr Milliseconds tick{1};

std::int32_t date_of_summary(Instant start, Milliseconds length, const PlantDays& days) {
    return days.day_of(start + length - tick).date;
}

Instant begin_of_summaries(const DaySpan& day, Milliseconds length) { return floor_to(day.begin, length); }

}  // namespace

Span common(const Span& one, const Span& other) {
    return {std::max(one.from, other.from), std::min(one.to, other.to)};
}

Instant floor_to(Instant at, Milliseconds length) {
    const auto since = at.time_since_epoch();
    auto rest = since % length;
    if (rest < Milliseconds(0)) rest += length;
    return Instant(since - rest);
}

Span PassSpan::summaries_of(const DaySpan& day) const {
    return {floor_to(day.begin, summary_length), floor_to(day.end, summary_length)};
}

std::optional<PassSpan> pass_span(const PassInput& in, const PlantDays& days) {
    const Milliseconds length = in.summary_length;
    PassSpan pass;
    pass.summary_length = length;
    pass.boundary = floor_to(in.newest - in.lateness, length);
    const Instant beginning = floor_to(in.oldest, length);
    pass.touched.from = in.stored_until ? std::max(beginning, floor_to(in.mark.from, length)) : beginning;
    const bool all = !in.stored_until || in.mark.to > pass.boundary - reach;
    pass.touched.to = all ? pass.boundary : floor_to(in.mark.to + reach, length) + length;
    pass.from = pass.touched.from;
    if (in.stored_until) {
        // A day left unfinished by the pass before is taken up even where the mark does not reach back to it.
        const Instant unfinished = begin_of_summaries(days.day(*in.stored_until + 1), length);
        pass.from = std::max(beginning, std::min(pass.from, unfinished));
    }
    if (const Instant most = pass.from + in.most_summaries * length; most < pass.boundary) {
        pass.boundary = begin_of_summaries(days.day(date_of_summary(most, length, days)), length);
        pass.cut_short = true;
    }
    if (pass.from >= pass.boundary) return std::nullopt;
    pass.touched = common(pass.touched, {beginning, pass.boundary});
    pass.first_date = date_of_summary(pass.from, length, days);
    pass.last_date = date_of_summary(pass.boundary - length, length, days);
    return pass;
}

}  // namespace slipledger::watch
